package chem

import (
	"fmt"
	"math"
)

// An ageingLaw is how a reagent loses strength in store.
type ageingLaw struct {
	name   string
	order  int     // 1: dw/dt = −k·w; 2: dw/dt = −k·w²
	rate   float64 // k at 25 °C, per day; for order 2 per day and mass fraction
	factor float64 // by how much k grows over 10 K
	source string
	low    Temperature // range in which the factor was seen
	high   Temperature
}

// Ageing laws by name.
//
// Hypochlorite decays by the second order, 3.5 times faster over 10 °C (maker's
// technical note on sodium hypochlorite, decomposition; read). Its rate is set by
// a published stock table: 12.50 trade % (11.34 % w/w) keeps 8.40 trade % over
// three months at 75 °F, 23.9 °C (breakdown of bleach over time by storage
// temperature, pool owners' wiki; read), which gives 0.0542 a day at 25 °C. Metals
// and light make it faster, an excess of alkali is taken for granted.
//
// Stabilised hydrogen peroxide loses about 1 % of what is there a year at 25 °C,
// 2.2 times as much over 10 °C (makers' handbooks, from memory). Dirt makes it
// faster without limit.
var ageingLaws = []ageingLaw{
	{"hypochlorite", 2, 0.0542, 3.5,
		"second order, 3.5-fold over 10 °C (maker's technical note); rate from a stock table at 23.9 °C", Celsius(0), Celsius(40)},
	{"peroxide", 1, 0.01 / 365.25, 2.2,
		"stabilised hydrogen peroxide, 1 % a year at 25 °C, 2.2-fold over 10 °C (from memory)", Celsius(0), Celsius(50)},
}

// AgeingLaws returns the names that AgedFraction knows.
func AgeingLaws() []string {
	names := make([]string, len(ageingLaws))
	for i, l := range ageingLaws {
		names[i] = l.name
	}
	return names
}

// AgeingSource says where a law comes from; "" for an unknown one.
func AgeingSource(law string) string {
	for _, l := range ageingLaws {
		if l.name == law {
			return l.source
		}
	}
	return ""
}

// AgedFraction returns the mass fraction that is left of w0 after days in store
// at temperature t, by the law "hypochlorite" or "peroxide":
//
//	second order: w = w0 / (1 + k·w0·d)
//	first order:  w = w0 · exp(−k·d)
//
// It is an estimate, good to a tenth of the loss at best: titrate what matters.
// A law that isn't known and a temperature outside its range are refused.
func AgedFraction(law string, w0 Fraction, days float64, t Temperature) (Fraction, error) {
	if err := checkFraction("strength", w0); err != nil {
		return 0, err
	}
	if !(days >= 0) || math.IsInf(days, 0) {
		return 0, outOfRange("ageing of "+law, "time", days, 0, math.MaxFloat64, "days", "give 0 or more")
	}
	for _, l := range ageingLaws {
		if l.name != law {
			continue
		}
		if !(t >= l.low && t <= l.high) {
			return 0, outOfRange("ageing of "+law, "temperature", t.Celsius(), l.low.Celsius(), l.high.Celsius(), "°C", "titrate it")
		}
		k := l.rate * math.Pow(l.factor, (t.Celsius()-25)/10)
		if l.order == 2 {
			return w0 / Fraction(1+k*float64(w0)*days), nil
		}
		return w0 * Fraction(math.Exp(-k*days)), nil
	}
	return 0, fmt.Errorf("ageing: no law %q; known: %v", law, AgeingLaws())
}

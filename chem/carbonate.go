package chem

import (
	"fmt"
	"math"
)

// carbonPKa are the constants of dissolved carbon dioxide at 25 °C (handbook
// values of data/pka.csv; both steps change by less than 0.1 from 15 to 35 °C).
var carbonPKa = [2]float64{6.35, 10.33}

// CarbonDioxideSolubility returns the concentration of CO2 in water under a
// pressure of it,
//
//	c = 0.034 mol/(L atm) · p · exp(2400 K·(1/T − 1/298.15 K))
//
// (R. Sander, Atmos. Chem. Phys. 15 (2015) 4399, from memory; others give
// 0.03 to 0.04), from 0 to 80 °C. Salt lowers it.
func CarbonDioxideSolubility(p Pressure, t Temperature) (Concentration, error) {
	if !(t >= ZeroCelsius && t <= ZeroCelsius+80) {
		return 0, outOfRange("solubility of carbon dioxide", "temperature", t.Celsius(), 0, 80, "°C", "")
	}
	if !(p >= 0) || !Finite(p) {
		return 0, fmt.Errorf("solubility of carbon dioxide: pressure %v Pa must be 0 or more", float64(p))
	}
	perAtmosphere := 34 * math.Exp(2400*(1/float64(t)-1/298.15)) // mol/m³
	return Concentration(perAtmosphere * float64(p/Atmosphere)), nil
}

// CarbonDioxideFrom returns the amount of CO2 that an amount of strong acid frees
// from carbonate and hydrogencarbonate, nothing staying dissolved: carbonate takes
// one proton first, and only what acid is left frees gas.
func CarbonDioxideFrom(carbonate, hydrogencarbonate, acid Amount) Amount {
	return max(0, min(acid-carbonate, carbonate+hydrogencarbonate))
}

// GasVolume returns the volume of an amount of ideal gas, V = n·R·T/p. It panics
// if p isn't positive.
func GasVolume(n Amount, t Temperature, p Pressure) Volume {
	if !(p > 0) {
		panic("chem: pressure must be positive")
	}
	return Volume(float64(n) * GasConstant * float64(t) / float64(p))
}

// Degassed is a solution that gave off what carbon dioxide it can't hold.
type Degassed struct {
	PH      float64
	Evolved Amount        // of CO2
	Left    Concentration // of CO2 and its ions in the solution
}

// Degas returns the pH of a solution that also holds an amount of carbonate of all
// forms, and the carbon dioxide that leaves until the rest is in equilibrium with
// the gas at a pressure of CO2: the air's whole pressure while it bubbles, 0 when
// it was boiled or blown out. The charge of the carbonate's counter-ions belongs
// in s.Strong.
func (s Solution) Degas(carbon Amount, p Pressure) (Degassed, error) {
	if !(s.Volume > 0) {
		return Degassed{}, fmt.Errorf("carbon dioxide given off: volume %v mL must be above 0", s.Volume.Millilitres())
	}
	if !(carbon >= 0) || !Finite(carbon) {
		return Degassed{}, fmt.Errorf("carbon dioxide given off: %v mol of carbonate must be 0 or more", float64(carbon))
	}
	held, err := CarbonDioxideSolubility(p, s.At)
	if err != nil {
		return Degassed{}, err
	}
	pKw, err := PKw(s.At)
	if err != nil {
		return Degassed{}, err
	}
	if err := checkMix(s.Mix, s.Strong); err != nil {
		return Degassed{}, err
	}
	total := Concentration(float64(carbon) / float64(s.Volume))
	closed := append([]Protolyte{{Name: "carbonic acid", PKa: carbonPKa[:], C: total}}, s.Mix...)
	b := balance{mix: closed, strong: float64(s.Strong), pKw: pKw}
	pH, err := b.solve()
	if err != nil {
		return Degassed{}, err
	}
	if float64(total)*float64(Ionised(carbonPKa[:], pH)[0]) <= float64(held) {
		return Degassed{pH, 0, total}, nil
	}
	b = balance{mix: s.Mix, strong: float64(s.Strong), pKw: pKw, carbonDioxide: float64(held), carbonPK: carbonPKa}
	if pH, err = b.solve(); err != nil {
		return Degassed{}, err
	}
	one, two := b.carbonIons(pH)
	left := min(total, held+Concentration(one+two))
	return Degassed{pH, Amount(float64(total-left) * float64(s.Volume)), left}, nil
}

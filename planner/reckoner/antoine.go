package reckoner

import (
	"fmt"
	"math"
	"strings"

	"stillroom/chem"
)

// vapourAntoineKey is the key under which a person's own coefficients come in.
func vapourAntoineKey() Key {
	return Key{"antoine", "Antoine coefficients A;B;C in place of the table's, with the units if they aren't mmHg and °C: A;B;C;bar;K, or A;B;C;Pa;K;ln", "8.07131;1730.63;233.426", true}
}

// An antoineReading is a way to read three coefficients.
type antoineReading struct {
	form chem.VapourForm
	unit chem.Pressure
	name string
}

// antoineReadings are the pairs of logarithm and unit that tables use.
var antoineReadings = []antoineReading{
	{chem.AntoineLog10, chem.MillimetreMercury, "log10(p/mmHg)"},
	{chem.AntoineLog10, chem.Pascal, "log10(p/Pa)"},
	{chem.AntoineLog10, chem.Bar, "log10(p/bar)"},
	{chem.AntoineLog10, chem.Kilopascal, "log10(p/kPa)"},
	{chem.AntoineLn, chem.Pascal, "ln(p/Pa)"},
	{chem.AntoineLn, chem.MillimetreMercury, "ln(p/mmHg)"},
	{chem.AntoineLn, chem.Kilopascal, "ln(p/kPa)"},
	{chem.AntoineLn, chem.Bar, "ln(p/bar)"},
}

// antoineEquation reads antoine=A;B;C, with its units or without, and
// antoine_range. Without units the coefficients tell: C is near 230 for °C and
// at or below nought for K, and of the readings the one holds that brings out
// the tabulated boiling point. Where none is tabulated, A decides: about 7 to 9
// goes with mmHg and °C, 9 to 11 with Pa, 4 to 5 with bar, above 18 with ln and
// Pa. The note says how they were read.
func antoineEquation(args Args, boiling *chem.Temperature) (chem.VapourEquation, string, error) {
	items, err := args.List("antoine")
	if err != nil {
		return chem.VapourEquation{}, "", err
	}
	if len(items) < 3 || len(items) == 4 || len(items) > 6 {
		return chem.VapourEquation{}, "", antoineFault(args, "not three numbers, nor three with two units")
	}
	var c [3]float64
	for i := range c {
		if c[i], err = chem.ParseNumber(items[i]); err != nil {
			return chem.VapourEquation{}, "", &KeyError{Key: "antoine", Text: items[i], Cause: err}
		}
	}
	from, to, err := antoineRange(args)
	if err != nil {
		return chem.VapourEquation{}, "", err
	}
	reading, zero, err := readingOf(args, items, c, boiling)
	if err != nil {
		return chem.VapourEquation{}, "", err
	}
	e, err := chem.Antoine(reading.form, c[0], c[1], c[2], reading.unit, zero, from, to)
	scale := "K"
	if zero > 0 {
		scale = "°C"
	}
	return e, fmt.Sprintf("coefficients read as %s = A − B/(T/%s + C)", reading.name, scale), err
}

func antoineFault(args Args, what string) error {
	return &KeyError{Key: "antoine", Text: args["antoine"], What: what, Wanted: "write A;B;C for log10(p/mmHg) and °C, or add the units: A;B;C;bar;K", Cause: chem.ErrSyntax}
}

// readingOf takes the units from the text, or from the coefficients.
func readingOf(args Args, items []string, c [3]float64, boiling *chem.Temperature) (antoineReading, chem.Temperature, error) {
	if len(items) == 3 {
		return guessReading(args, c, boiling)
	}
	unit, err := chem.ParsePressure("1 " + items[3])
	if err != nil {
		return antoineReading{}, 0, &KeyError{Key: "antoine", Text: items[3], Cause: err}
	}
	r := antoineReading{chem.AntoineLog10, unit, "log10(p/" + items[3] + ")"}
	if len(items) == 6 {
		switch strings.ToLower(items[5]) {
		case "ln":
			r.form, r.name = chem.AntoineLn, "ln(p/"+items[3]+")"
		case "log10", "log", "lg":
		default:
			return r, 0, antoineFault(args, "the last item must be log10 or ln")
		}
	}
	switch items[4] {
	case "K":
		return r, 0, nil
	case "°C", "C", "Cel":
		return r, chem.ZeroCelsius, nil
	}
	return r, 0, antoineFault(args, "the unit of temperature must be K or °C")
}

// celsiusFrom is the least C of coefficients fitted in °C: in kelvins the same
// ones would have C less 273, and none of a bench liquid's reaches up here.
const celsiusFrom = 100

// closeBoiling is how near a reading has to come to the tabulated boiling point.
const closeBoiling = 15 // K

func guessReading(args Args, c [3]float64, boiling *chem.Temperature) (antoineReading, chem.Temperature, error) {
	zero := chem.Temperature(0)
	if c[2] >= celsiusFrom {
		zero = chem.ZeroCelsius
	}
	if boiling != nil {
		if r, ok := readingByBoiling(c, zero, *boiling); ok {
			return r, zero, nil
		}
	}
	switch a := c[0]; {
	case zero > 0 && a < 9.3:
		return antoineReadings[0], zero, nil
	case a >= 18 && a < 30:
		return antoineReadings[4], zero, nil
	case a >= 8.6 && a < 12:
		return antoineReadings[1], zero, nil
	case zero == 0 && a > 3 && a < 5.7:
		return antoineReadings[2], zero, nil
	}
	return antoineReading{}, 0, antoineFault(args, "the unit can't be told from the coefficients")
}

// readingByBoiling returns the reading whose normal boiling point comes nearest
// to the tabulated one, if one comes near.
func readingByBoiling(c [3]float64, zero, boiling chem.Temperature) (antoineReading, bool) {
	var best antoineReading
	off := math.Inf(1)
	for _, r := range antoineReadings {
		log := math.Log10(float64(chem.Atmosphere / r.unit))
		if r.form == chem.AntoineLn {
			log *= math.Ln10
		}
		t := c[1]/(c[0]-log) - c[2] + float64(zero)
		if d := math.Abs(t - float64(boiling)); d < off {
			best, off = r, d
		}
	}
	return best, off <= closeBoiling
}

func antoineRange(args Args) (from, to chem.Temperature, err error) {
	if !args.Has("antoine_range") {
		return 0, 0, nil
	}
	ends, err := args.List("antoine_range")
	if err != nil {
		return 0, 0, err
	}
	if len(ends) != 2 {
		return 0, 0, &KeyError{Key: "antoine_range", Text: args["antoine_range"], What: "not two temperatures", Wanted: "write 1 °C; 100 °C", Cause: chem.ErrSyntax}
	}
	if from, err = chem.ParseTemperature(ends[0]); err == nil {
		to, err = chem.ParseTemperature(ends[1])
	}
	if err == nil && to <= from {
		return 0, 0, &KeyError{Key: "antoine_range", Text: args["antoine_range"], What: "the second isn't above the first", Wanted: "write 1 °C; 100 °C", Cause: chem.ErrOutOfRange}
	}
	return from, to, err
}

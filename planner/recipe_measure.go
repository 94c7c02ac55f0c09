package planner

import (
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"

	"stillroom/chem"
)

var (
	errNoNumber = errors.New("no number")
	errUnit     = errors.New("unit not understood")
	errRange    = errors.New("out of range")
)

type unit struct {
	name string
	size float64
}

var (
	massUnits     = []unit{{"kg", 1}, {"g", 1e-3}, {"mg", 1e-6}}
	volumeUnits   = []unit{{"mL", 1e-6}, {"L", 1e-3}}
	amountUnits   = []unit{{"mmol", 1e-3}, {"mol", 1}}
	timeUnits     = []unit{{"min", 60}, {"h", 3600}, {"s", 1}}
	pressureUnits = []unit{{"kPa", 1e3}, {"mbar", 100}, {"bar", 1e5}, {"Pa", 1}}
	densityUnits  = []unit{{"g/mL", 1e3}, {"kg/m3", 1}}
	energyUnits   = []unit{{"kJ/mol", 1e3}, {"J/mol", 1}}
	shareUnits    = []unit{{"%", 0.01}, {"", 1}}
)

// measured splits text into a number and its unit and returns it in the base unit.
func measured(text string, units []unit) (float64, error) {
	s := strings.TrimSpace(text)
	for _, u := range units {
		number, ok := strings.CutSuffix(s, u.name)
		if !ok {
			continue
		}
		x, err := strconv.ParseFloat(strings.TrimSpace(number), 64)
		if err != nil || math.IsNaN(x) || math.IsInf(x, 0) {
			continue
		}
		return x * u.size, nil
	}
	if _, err := strconv.ParseFloat(strings.Fields(s + " x")[0], 64); err != nil {
		return 0, errNoNumber
	}
	return 0, errUnit
}

func measuredIn[Q ~float64](units []unit, least float64) func(string) (Q, error) {
	return func(text string) (Q, error) {
		x, err := measured(text, units)
		if err == nil && x < least {
			err = errRange
		}
		return Q(x), err
	}
}

var (
	readMass     = measuredIn[chem.Mass](massUnits, 0)
	readVolume   = measuredIn[chem.Volume](volumeUnits, 0)
	readAmount   = measuredIn[chem.Amount](amountUnits, 0)
	readTime     = measuredIn[chem.Duration](timeUnits, 0)
	readPressure = measuredIn[chem.Pressure](pressureUnits, 1)
	readDensity  = measuredIn[chem.Density](densityUnits, 1e-3)
	readMolar    = measuredIn[chem.MolarEnergy](energyUnits, math.Inf(-1))
)

// readTemperature reads "15 °C".
func readTemperature(text string) (chem.Temperature, error) {
	number, ok := strings.CutSuffix(strings.TrimSpace(text), "°C")
	if !ok {
		return 0, errUnit
	}
	x, err := strconv.ParseFloat(strings.TrimSpace(number), 64)
	if err != nil {
		return 0, errNoNumber
	}
	if x < -273.15 {
		return 0, errRange
	}
	return chem.Celsius(x), nil
}

// readShare reads a fraction from 0 to 1, as "98 %" or 0.98.
func readShare(text string) (chem.Fraction, error) {
	x, err := measured(text, shareUnits)
	if err == nil && (x < 0 || x > 1) {
		err = errRange
	}
	return chem.Fraction(x), err
}

// readNumber reads a number that isn't negative, also as a quotient, "1/5".
func readNumber(text string) (float64, error) {
	over, under, quotient := strings.Cut(text, "/")
	x, err := strconv.ParseFloat(strings.TrimSpace(over), 64)
	if err == nil && quotient {
		var d float64
		if d, err = strconv.ParseFloat(strings.TrimSpace(under), 64); err == nil && d > 0 {
			x /= d
		}
	}
	if err != nil || math.IsNaN(x) || math.IsInf(x, 0) {
		return 0, errNoNumber
	}
	if x < 0 {
		return 0, errRange
	}
	return x, nil
}

// readSigned reads any finite number.
func readSigned(text string) (float64, error) {
	x, err := strconv.ParseFloat(strings.TrimSpace(text), 64)
	if err != nil || math.IsNaN(x) || math.IsInf(x, 0) {
		return 0, errNoNumber
	}
	return x, nil
}

// readCount reads a whole number from 1.
func readCount(text string) (int, error) {
	n, err := strconv.Atoi(text)
	if err != nil {
		return 0, fmt.Errorf("no whole number")
	}
	if n < 1 {
		return 0, errRange
	}
	return n, nil
}

// readPieces reads "3 pieces".
func readPieces(text string) (float64, error) {
	number, ok := strings.CutSuffix(strings.TrimSpace(text), "pieces")
	if !ok {
		return 0, errUnit
	}
	return readNumber(strings.TrimSpace(number))
}

// window is a range of fractions such as "95 % to 98 %".
type window struct{ least, most chem.Fraction }

func readWindow(text string) (window, error) {
	low, high, both := strings.Cut(text, " to ")
	least, err := readShare(low)
	if err != nil {
		return window{}, err
	}
	if !both {
		return window{least, least}, nil
	}
	most, err := readShare(high)
	if err == nil && most < least {
		err = errRange
	}
	return window{least, most}, err
}

// Spread is a number with its normal spread; SD 0 means exactly known.
type Spread struct{ Mean, SD float64 }

// readSpread reads a share with or without its spread: "95 %" or "95 % ± 2 %".
func readSpread(text string) (Spread, error) {
	mean, sd, both := strings.Cut(text, "±")
	m, err := readShare(mean)
	if err != nil || !both {
		return Spread{Mean: float64(m)}, err
	}
	d, err := readShare(sd)
	return Spread{float64(m), float64(d)}, err
}

package planner

import (
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"

	"stillroom/chem"
)

// What a recipe writes in a form of its own is read here; masses, volumes,
// times and the like are read by chem.

var (
	errNoNumber = errors.New("no number")
	errUnit     = errors.New("unit not understood")
	errRange    = errors.New("out of range")
)

// reason is what is wrong with a text, without quoting it again.
func reason(err error) string {
	var q *chem.QuantityError
	if errors.As(err, &q) {
		return q.What
	}
	return err.Error()
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

// readPH reads a pH from -1 to 15.
func readPH(text string) (float64, error) {
	x, err := strconv.ParseFloat(strings.TrimSpace(text), 64)
	if err != nil || math.IsNaN(x) {
		return 0, errNoNumber
	}
	if x < -1 || x > 15 {
		return 0, errRange
	}
	return x, nil
}

// mostTimes is more often than anybody washes or rinses by hand.
const mostTimes = 50

// readCount reads a whole number from 1 to mostTimes.
func readCount(text string) (int, error) {
	n, err := strconv.Atoi(text)
	if err != nil {
		return 0, fmt.Errorf("no whole number")
	}
	if n < 1 || n > mostTimes {
		return 0, fmt.Errorf("%w, 1 to %d", errRange, mostTimes)
	}
	return n, nil
}

// readDensity reads a density above 0.
func readDensity(text string) (chem.Density, error) {
	d, err := chem.ParseDensity(text)
	if err == nil && d <= 0 {
		err = errRange
	}
	return d, err
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
	least, err := chem.ParseFraction(low)
	if err != nil {
		return window{}, err
	}
	if !both {
		return window{least, least}, nil
	}
	most, err := chem.ParseFraction(high)
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
	m, err := chem.ParseFraction(mean)
	if err != nil || !both {
		return Spread{Mean: float64(m)}, err
	}
	d, err := chem.ParseFraction(sd)
	return Spread{float64(m), float64(d)}, err
}

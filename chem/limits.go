package chem

import (
	"errors"
	"fmt"
	"strconv"
)

// ErrOutOfRange is the cause of every refusal of a value outside what a method
// or a table covers. ErrNoData is the cause where there is no value at all.
var (
	ErrOutOfRange = errors.New("outside the range")
	ErrNoData     = errors.New("no data")
)

// A RangeError says which value was refused, the range that is covered, and
// what would do instead.
type RangeError struct {
	What      string  // what was asked for, such as "density of sulfuric acid"
	Quantity  string  // what is out of range, such as "temperature"
	Value     float64 // in Unit
	Low, High float64 // the range that is covered, in Unit
	Unit      string
	Advice    string // what would do; may be empty
}

// Error gives the value, the range and the advice.
func (e *RangeError) Error() string {
	covered := "only " + number(e.Low)
	if e.High != e.Low {
		covered = number(e.Low) + " to " + number(e.High)
	}
	text := fmt.Sprintf("%s: %s %s is %v; covered: %s", e.What, e.Quantity,
		unit(number(e.Value), e.Unit), ErrOutOfRange, unit(covered, e.Unit))
	if e.Advice != "" {
		text += "; " + e.Advice
	}
	return text
}

// Unwrap returns ErrOutOfRange.
func (e *RangeError) Unwrap() error { return ErrOutOfRange }

// A NoDataError says which value is missing, of what, and what would do.
type NoDataError struct {
	What   string // what is missing, such as "density"
	Of     string // of which substance or mixture
	Advice string // what would do, such as "give density=1.05 g/mL"
}

// Error gives what is missing and the advice.
func (e *NoDataError) Error() string {
	text := fmt.Sprintf("%v: %s of %s", ErrNoData, e.What, e.Of)
	if e.Advice != "" {
		text += "; " + e.Advice
	}
	return text
}

// Unwrap returns ErrNoData.
func (e *NoDataError) Unwrap() error { return ErrNoData }

// checkFraction refuses anything but a share from 0 to 1 inclusive.
func checkFraction(what string, f Fraction) error {
	if f >= 0 && f <= 1 {
		return nil
	}
	return &RangeError{What: what, Quantity: "fraction", Value: f.Percent(), High: 100, Unit: "%"}
}

// number writes a value in at most seven figures, for a message.
func number(x float64) string { return strconv.FormatFloat(x, 'g', 7, 64) }

// unit puts a unit behind a written number.
func unit(number, symbol string) string {
	if symbol == "" {
		return number
	}
	return number + " " + symbol
}

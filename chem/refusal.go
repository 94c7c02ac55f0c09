package chem

import (
	"errors"
	"fmt"
	"strconv"
	"strings"
)

// ErrOutOfRange is the cause of every refusal of a value outside what a method
// or a table covers, ErrNoData where there is no value at all, and ErrImpossible
// where no amount of anything gives what was asked.
var (
	ErrOutOfRange = errors.New("outside the range")
	ErrNoData     = errors.New("no data")
	ErrImpossible = errors.New("can't be reached")
)

// A DataError is a refusal: what was asked, why there is no answer, the limit
// that was met, and what would do instead.
type DataError struct {
	Of     string // what was being computed: "vapour pressure of pentanal at 300.0 °C"
	Err    error  // ErrNoData, ErrOutOfRange or ErrImpossible
	Limit  string // the range or limit in words; may be empty
	Remedy string // what would do: "give antoine=A;B;C"; may be empty
}

// Error puts the parts into one line.
func (e *DataError) Error() string {
	var b strings.Builder
	fmt.Fprintf(&b, "%s: %v", e.Of, e.Err)
	if e.Limit != "" {
		fmt.Fprintf(&b, " (%s)", e.Limit)
	}
	if e.Remedy != "" {
		fmt.Fprintf(&b, "; %s", e.Remedy)
	}
	return b.String()
}

// Unwrap returns the cause.
func (e *DataError) Unwrap() error { return e.Err }

// outOfRange refuses a value outside what is covered, both in unit, and says what
// would do.
func outOfRange(of, quantity string, value, low, high float64, symbol, remedy string) error {
	covered := "only " + number(low)
	if high != low {
		covered = number(low) + " to " + number(high)
	}
	return &DataError{
		Of: fmt.Sprintf("%s, %s %s", of, quantity, unit(number(value), symbol)), Err: ErrOutOfRange,
		Limit: "covered: " + unit(covered, symbol), Remedy: remedy,
	}
}

// noData refuses for want of a value and says what would do.
func noData(what, of, remedy string) error {
	return &DataError{Of: strings.TrimSpace(what + " of " + of), Err: ErrNoData, Remedy: remedy}
}

// mustBePositive refuses a value that isn't a number above zero.
func mustBePositive[Q ~float64](of, name string, x Q) error {
	if x > 0 && Finite(x) {
		return nil
	}
	return &DataError{Of: of, Err: ErrOutOfRange, Limit: name + " must be above zero", Remedy: "give a positive " + name}
}

// mustBeShare refuses a value that isn't from zero to below one, or to one
// where the upper end counts as well.
func mustBeShare[Q ~float64](of, name string, x Q, oneCounts bool) error {
	if x >= 0 && (x < 1 || (oneCounts && x == 1)) {
		return nil
	}
	limit := name + " must be from 0 % to below 100 %"
	if oneCounts {
		limit = name + " must be from 0 % to 100 %"
	}
	return &DataError{Of: of, Err: ErrOutOfRange, Limit: limit, Remedy: "give a share such as 95 %"}
}

// checkFraction refuses anything but a share from 0 to 1 inclusive.
func checkFraction(what string, f Fraction) error {
	if f >= 0 && f <= 1 {
		return nil
	}
	return outOfRange(what, "fraction", f.Percent(), 0, 100, "%", "")
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

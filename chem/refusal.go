package chem

import (
	"errors"
	"fmt"
	"strings"
)

// ErrImpossible is the cause where no amount of anything gives what was asked.
var ErrImpossible = errors.New("can't be reached")

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

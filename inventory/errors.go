package inventory

import (
	"errors"
	"fmt"
	"strings"
)

// The kinds of refusals and failures. Errors of this package are values with
// parts that wrap one of them; errors.Is tells the kind.
var (
	ErrNotFound     = errors.New("not found")
	ErrInvalid      = errors.New("not valid")
	ErrConflict     = errors.New("promised to another run")
	ErrInsufficient = errors.New("not enough in the bottle")
	ErrStale        = errors.New("changed by somebody else meanwhile")
	ErrDuplicate    = errors.New("exists already")
	ErrInUse        = errors.New("still referred to")
	ErrAppendOnly   = errors.New("append-only")
	ErrBusy         = errors.New("database is locked by somebody else")
	ErrReadOnly     = errors.New("database is read-only")
	ErrFull         = errors.New("no space left for the database")
	ErrCorrupt      = errors.New("database is damaged")
	ErrUnreachable  = errors.New("database can't be reached")
	ErrNewerSchema  = errors.New("database was written by a newer version")
)

// Error is a refusal: what was being done, to which thing, why not, and what
// would do instead.
type Error struct {
	Doing string // "draw", "earmark", "open"
	What  string // the thing: "bottle B7K2QM"
	Kind  error  // one of the sentinels
	Why   string // more than the kind says; may be ""
	Would string // what would do; may be ""
	Cause error  // what the engine said; may be nil
}

// Error says all of it in one line.
func (e *Error) Error() string {
	var b strings.Builder
	b.WriteString(e.Doing)
	if e.What != "" {
		b.WriteString(" " + e.What)
	}
	b.WriteString(": " + e.Kind.Error())
	if e.Why != "" {
		b.WriteString(": " + e.Why)
	}
	if e.Would != "" {
		b.WriteString("; " + e.Would)
	}
	if e.Cause != nil {
		b.WriteString(" (" + e.Cause.Error() + ")")
	}
	return b.String()
}

// Unwrap lets errors.Is and errors.As see the kind and the cause.
func (e *Error) Unwrap() []error {
	if e.Cause == nil {
		return []error{e.Kind}
	}
	return []error{e.Kind, e.Cause}
}

// PromiseError says that an amount of a bottle isn't free because other runs
// were promised it, and which. Amounts are in the unit of the bottle.
type PromiseError struct {
	Bottle  string
	Measure Measure
	Wanted  int64
	Free    int64
	Content int64
	Others  []Promise
}

// Promise is an earmark with the run it is for, as a person would name it.
type Promise struct {
	Run    int64
	Recipe string
	On     Date
	Owner  string
	Amount int64
	Ends   Date
}

// Error names the bottle, what is free and the runs that have the rest.
func (e *PromiseError) Error() string {
	const most = 5 // of the runs are named
	others := make([]string, 0, most+1)
	for i, o := range e.Others {
		if i == most {
			others = append(others, fmt.Sprintf("and %d more", len(e.Others)-most))
			break
		}
		others = append(others, fmt.Sprintf("run %d (%s on %s, %s) has %s until %s",
			o.Run, o.Recipe, o.On, o.Owner, amountText(o.Amount, e.Measure), o.Ends))
	}
	return fmt.Sprintf("bottle %s: %s wanted, %s free of %s: %s", e.Bottle, amountText(e.Wanted, e.Measure),
		amountText(e.Free, e.Measure), amountText(e.Content, e.Measure), strings.Join(others, ", "))
}

// Unwrap makes errors.Is(err, ErrConflict) true.
func (e *PromiseError) Unwrap() error { return ErrConflict }

// ShortError says that a bottle holds less than was asked of it.
type ShortError struct {
	Bottle          string
	Measure         Measure
	Wanted, Content int64
}

// Error names the bottle and both amounts.
func (e *ShortError) Error() string {
	return fmt.Sprintf("bottle %s: %s wanted, it holds %s; if it holds more, count it first", e.Bottle,
		amountText(e.Wanted, e.Measure), amountText(e.Content, e.Measure))
}

// Unwrap makes errors.Is(err, ErrInsufficient) true.
func (e *ShortError) Unwrap() error { return ErrInsufficient }

// amountText writes ledger units for an error message or a report, exactly.
func amountText(n int64, m Measure) string {
	switch m {
	case ByMass:
		return decimalText(n, 6) + " g"
	case ByVolume:
		return decimalText(n, 3) + " mL"
	}
	return fmt.Sprint(n)
}

// decimalText writes n·10^-digits without trailing zeros.
func decimalText(n int64, digits int) string {
	sign := ""
	if n < 0 {
		sign, n = "-", -n
	}
	s := fmt.Sprintf("%0*d", digits+1, n)
	whole, part := s[:len(s)-digits], strings.TrimRight(s[len(s)-digits:], "0")
	if part == "" {
		return sign + whole
	}
	return sign + whole + "." + part
}

func notFound(doing, what, would string) error {
	return &Error{Doing: doing, What: what, Kind: ErrNotFound, Would: would}
}

func invalid(doing, what, why, would string) error {
	return &Error{Doing: doing, What: what, Kind: ErrInvalid, Why: why, Would: would}
}

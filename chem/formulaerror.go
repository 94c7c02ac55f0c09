package chem

import (
	"errors"
	"fmt"
)

// Kinds of refusal of a formula, for errors.Is.
var (
	ErrUnknownElement = errors.New("unknown element")
	ErrBracket        = errors.New("unbalanced bracket")
	ErrAmbiguous      = errors.New("ambiguous")
	ErrSyntax         = errors.New("not understood")
	ErrNoMolarMass    = errors.New("no molar mass")
)

// FormulaError says what is wrong with a formula, where, and what would do.
type FormulaError struct {
	Text     string // the whole formula as given
	Position int    // the character it is about, counted from 1; 0 for the whole
	What     string // what is wrong
	Wanted   string // what would do; may be empty
	Cause    error  // one of the kinds above
}

func (e *FormulaError) Error() string {
	s := fmt.Sprintf("formula %q: %s", e.Text, e.What)
	if e.Position > 0 {
		s += fmt.Sprintf(" at character %d", e.Position)
	}
	if e.Wanted != "" {
		s += "; " + e.Wanted
	}
	return s
}

// Unwrap returns the kind.
func (e *FormulaError) Unwrap() error { return e.Cause }

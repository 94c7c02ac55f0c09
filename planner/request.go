package planner

import (
	"errors"
	"fmt"

	"stillroom/chem"
)

// Kinds of request that can't be planned.
var (
	ErrNoRecipe = errors.New("no recipe")
	ErrTarget   = errors.New("target out of range")
	ErrDate     = errors.New("date out of range")
	ErrBatches  = errors.New("number of batches out of range")
	ErrNoVessel = errors.New("no vessel fits")
)

// RequestError is a request that can't be planned, with the field at fault.
type RequestError struct {
	Field string // "recipe", "target", "on", "batches"
	Got   string // as it was given
	What  string // what is wrong with it
	Would string // what would do
	Err   error  // its kind
}

// Error says which field, what is wrong with it and what would do.
func (e *RequestError) Error() string {
	s := e.Field
	if e.Got != "" {
		s += " " + e.Got
	}
	s += ": " + e.What
	if e.Would != "" {
		s += "; " + e.Would
	}
	return s
}

// Unwrap returns the kind.
func (e *RequestError) Unwrap() error { return e.Err }

// The ledger's smallest unit, and far more than any laboratory makes: beyond
// them the numbers of a walk-through lose their meaning.
const (
	leastTarget = 1 * chem.Microgram
	mostTarget  = 1e6 * chem.Kilogram
)

// mostAsked bounds the batches that can be asked for.
const mostAsked = 1000

// check refuses what no plan can be made of, before anything is computed.
func (r *Request) check() error {
	switch {
	case r.Recipe == nil:
		return &RequestError{Field: "recipe", What: "none given", Would: "name one of the recipes", Err: ErrNoRecipe}
	case !chem.Finite(r.Target) || r.Target <= 0:
		return &RequestError{Field: "target", Got: fmt.Sprintf("%g g", r.Target.Grams()), What: "must be more than 0",
			Would: "give the mass of product wanted, such as 50 g", Err: ErrTarget}
	case r.Target < leastTarget || r.Target > mostTarget:
		return &RequestError{Field: "target", Got: fmt.Sprintf("%g g", r.Target.Grams()), What: "is no amount that could be weighed: less than a microgram or more than a million kilograms",
			Would: "give the mass of product wanted, such as 50 g", Err: ErrTarget}
	case !r.On.Set():
		return &RequestError{Field: "on", What: "no date given", Would: "give the day of the run, such as " + r.Today.String(), Err: ErrDate}
	case r.On < r.Today:
		return &RequestError{Field: "on", Got: r.On.String(), What: "lies in the past; today is " + r.Today.String(),
			Would: "give today or a later day", Err: ErrDate}
	case r.Batches < 0 || r.Batches > mostAsked:
		return &RequestError{Field: "batches", Got: fmt.Sprint(r.Batches), What: fmt.Sprintf("must be from 1 to %d", mostAsked), Would: "leave it out to have it worked out", Err: ErrBatches}
	case r.Certainty < 0 || r.Certainty >= 1 || !chem.Finite(r.Certainty):
		return &RequestError{Field: "certainty", Got: fmt.Sprintf("%g %%", r.Certainty.Percent()), What: "must be above 0 and below 100 %",
			Would: "leave it out to take the policy's", Err: ErrTarget}
	}
	return nil
}

package chem

import (
	"errors"
	"fmt"
	"math"
)

// Kinds of refusal of a stoichiometric question, for errors.Is.
var (
	ErrNotInReaction = errors.New("not in the reaction")
	ErrRunsShort     = errors.New("runs short")
)

// ReactionError says what is wrong with a question about a reaction.
type ReactionError struct {
	Species string
	What    string
	Wanted  string
	Cause   error
}

func (e *ReactionError) Error() string { return fmt.Sprintf("%s: %s; %s", e.Species, e.What, e.Wanted) }

// Unwrap returns the kind.
func (e *ReactionError) Unwrap() error { return e.Cause }

// SpeciesAmount is an amount of one species of a reaction.
type SpeciesAmount struct {
	Species string
	Amount  Amount
}

// Limiting tells how far a reaction can go with what there is.
type Limiting struct {
	Reagent string // the species that is used up first
	// Extent is the amount of the reaction as written that then has happened, in
	// moles: ξ = n / |ν| of the limiting reagent.
	Extent   Amount
	Reagents []Reagent // in the order of the equation
}

// Reagent is what a species on the left comes to.
type Reagent struct {
	Species string
	Amount  Amount // as put in
	// Equivalents is the amount relative to what the limiting reagent needs:
	// (n/ν) / (n/ν of the limiting reagent); 1 for the limiting reagent.
	Equivalents float64
	Excess      Fraction // Equivalents − 1
	Left        Amount   // after the reaction has gone to its end
}

// LimitingReagent finds the reagent that is used up first. Species on the left that
// aren't listed are taken to be in excess; at least one has to be listed. Of two that
// run out at once the first in the equation is named. The equation must balance.
//
//	ξ = min n/ν   (OpenStax Chemistry 2e, 4.4)
func LimitingReagent(e Equation, have []SpeciesAmount) (Limiting, error) {
	if err := e.Balanced(); err != nil {
		return Limiting{}, err
	}
	amounts, err := e.reagentAmounts(have)
	if err != nil {
		return Limiting{}, err
	}
	l := Limiting{Extent: Amount(math.Inf(1))}
	for j, n := range amounts {
		if n < 0 {
			continue // in excess
		}
		if extent := n / Amount(e.Left[j].Coefficient); extent < l.Extent {
			l.Reagent, l.Extent = e.Left[j].Species, extent
		}
	}
	for j, n := range amounts {
		if n < 0 {
			continue
		}
		need := l.Extent * Amount(e.Left[j].Coefficient)
		r := Reagent{Species: e.Left[j].Species, Amount: n, Left: max(n-need, 0)}
		if need > 0 {
			r.Equivalents = float64(n / need)
			r.Excess = Fraction(r.Equivalents - 1)
		}
		l.Reagents = append(l.Reagents, r)
	}
	return l, nil
}

// reagentAmounts puts the amounts in the order of the left side; -1 where none was
// listed.
func (e Equation) reagentAmounts(have []SpeciesAmount) ([]Amount, error) {
	amounts := make([]Amount, len(e.Left))
	for j := range amounts {
		amounts[j] = -1
	}
	if len(have) == 0 {
		return nil, &ReactionError{e.String(), "no amount of any reagent", "give at least one", ErrNoData}
	}
	for _, h := range have {
		j := e.reagent(h.Species)
		switch {
		case j < 0:
			return nil, &ReactionError{h.Species, "isn't on the left of " + e.String(), "give an amount of what reacts", ErrNotInReaction}
		case !(h.Amount >= 0) || !Finite(h.Amount):
			return nil, &ReactionError{h.Species, "the amount isn't a number from nought up", "give one such as 0.5 mol", ErrOutOfRange}
		case amounts[j] >= 0:
			amounts[j] += h.Amount
		default:
			amounts[j] = h.Amount
		}
	}
	return amounts, nil
}

// reagent returns the place of a species on the left, by its text or else by its
// atoms; -1 if it isn't there.
func (e Equation) reagent(species string) int {
	for j, t := range e.Left {
		if t.Species == species {
			return j
		}
	}
	f, err := ParseFormula(species)
	if err != nil {
		return -1
	}
	for j, t := range e.Left {
		if t.Formula.Hill() == f.Hill() {
			return j
		}
	}
	return -1
}

// FromAmount returns how much of one species goes with an amount of another in the
// reaction as written, on whichever side they stand:
//
//	n₂ = n₁ |ν₂| / |ν₁|
func (e Equation) FromAmount(of string, n Amount, to string) (Amount, error) {
	if err := e.Balanced(); err != nil {
		return 0, err
	}
	_, from, ok := e.Term(of)
	if !ok {
		return 0, &ReactionError{of, "isn't in " + e.String(), "name a species of the reaction", ErrNotInReaction}
	}
	_, wanted, ok := e.Term(to)
	if !ok {
		return 0, &ReactionError{to, "isn't in " + e.String(), "name a species of the reaction", ErrNotInReaction}
	}
	return n * Amount(math.Abs(float64(wanted))) / Amount(math.Abs(float64(from))), nil
}

// TheoreticalMass returns the mass of a product at an extent of reaction:
//
//	m = ξ ν M
func (e Equation) TheoreticalMass(product string, extent Amount) (Mass, error) {
	if err := e.Balanced(); err != nil {
		return 0, err
	}
	t, number, ok := e.Term(product)
	if !ok || number < 0 {
		return 0, &ReactionError{product, "isn't formed in " + e.String(), "name a product of the reaction", ErrNotInReaction}
	}
	if err := t.Formula.Weighable(); err != nil {
		return 0, err
	}
	return t.Formula.MolarMass().Mass(extent * Amount(number)), nil
}

// Yield returns the share of the theoretical mass that was found. Above one it is
// reported as it is: a product that is wet or impure, or a mistake. A theoretical
// mass that isn't above nought, or a negative one found, is refused.
func Yield(found, theoretical Mass) (Fraction, error) {
	if !(theoretical > 0) || !(found >= 0) || !Finite(found) || !Finite(theoretical) {
		return 0, &ReactionError{"yield", "it takes a theoretical mass above nought and a mass found from nought up", "check both", ErrOutOfRange}
	}
	return Fraction(found / theoretical), nil
}

// CatalystLoading returns the amount of a catalyst relative to the limiting reagent;
// 0.01 is 1 mol %.
func CatalystLoading(catalyst, limiting Amount) (Fraction, error) {
	if !(limiting > 0) || !(catalyst >= 0) || !Finite(catalyst) || !Finite(limiting) {
		return 0, &ReactionError{"catalyst loading", "it takes an amount above nought of the limiting reagent", "check both", ErrOutOfRange}
	}
	return Fraction(catalyst / limiting), nil
}

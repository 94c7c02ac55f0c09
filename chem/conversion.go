package chem

import (
	"fmt"
	"math"
	"slices"
)

// Branch is one of several reactions that compete for one reagent.
type Branch struct {
	Reaction Equation
	// Selectivity is the share of the converted reagent that goes this way. Over
	// all branches it sums to one.
	Selectivity Fraction
}

// React lets the share conversion of a key reagent react in one reaction and returns
// what is then there, in the order given, new species behind. Consecutive reactions
// are calls one after the other. What else the reaction needs has to be there: else
// the error names the species that runs short and the conversion that it allows.
func React(have []SpeciesAmount, reaction Equation, key string, conversion Fraction) ([]SpeciesAmount, error) {
	return ReactInBranches(have, key, conversion, []Branch{{reaction, 1}})
}

// ReactInBranches lets the share conversion of a key reagent react, split over
// parallel reactions by their selectivities:
//
//	n(i) = n₀(i) + Σ ν(i, r) ξ(r),   ξ(r) = n₀(key) X S(r) / |ν(key, r)|
//
// with X the conversion and S the selectivity of the key reagent. Every reaction must
// balance and use up the key; the selectivities must sum to one within 1e-9.
func ReactInBranches(have []SpeciesAmount, key string, conversion Fraction, branches []Branch) ([]SpeciesAmount, error) {
	if err := checkBranches(key, conversion, branches); err != nil {
		return nil, err
	}
	start := amountOf(have, key)
	if start < 0 {
		return nil, &ReactionError{key, "isn't in the vessel", "charge it first", ErrNotInReaction}
	}
	after := slices.Clone(have)
	for _, b := range branches {
		nu := b.Reaction.Left[b.Reaction.reagent(key)].Coefficient
		extent := start * Amount(conversion) * Amount(b.Selectivity) / Amount(nu)
		for _, t := range b.Reaction.Left {
			after = addAmount(after, t.Species, -extent*Amount(t.Coefficient))
		}
		for _, t := range b.Reaction.Right {
			after = addAmount(after, t.Species, extent*Amount(t.Coefficient))
		}
	}
	return after, checkLeft(have, after, start, conversion)
}

func checkBranches(key string, conversion Fraction, branches []Branch) error {
	if err := checkFraction("conversion of "+key, conversion); err != nil {
		return err
	}
	var sum Fraction
	for _, b := range branches {
		if err := checkFraction("selectivity", b.Selectivity); err != nil {
			return err
		}
		if err := b.Reaction.Balanced(); err != nil {
			return err
		}
		if b.Reaction.reagent(key) < 0 {
			return &ReactionError{key, "isn't on the left of " + b.Reaction.String(), "name a reagent of every branch", ErrNotInReaction}
		}
		sum += b.Selectivity
	}
	if math.Abs(float64(sum-1)) > 1e-9 {
		return &ReactionError{key, fmt.Sprintf("the selectivities sum to %.6g", float64(sum)), "make them sum to 1", ErrOutOfRange}
	}
	return nil
}

// checkLeft refuses an outcome in which more than there was has been used up, and
// clears what rounding leaves below nought.
func checkLeft(before, after []SpeciesAmount, start Amount, conversion Fraction) error {
	for i := range after {
		n := after[i].Amount
		if n >= 0 {
			continue
		}
		had := max(amountOf(before, after[i].Species), 0)
		if n > -1e-12*max(had, start) {
			after[i].Amount = 0
			continue
		}
		allowed := Fraction(had/(had-n)) * conversion
		return &ReactionError{after[i].Species, fmt.Sprintf("%.4g mol are needed and %.4g mol there", float64(had-n), float64(had)),
			fmt.Sprintf("a conversion up to %.4g %% works", allowed.Percent()), ErrRunsShort}
	}
	return nil
}

// amountOf returns the amount of a species; -1 if it isn't listed.
func amountOf(list []SpeciesAmount, species string) Amount {
	for _, s := range list {
		if s.Species == species {
			return s.Amount
		}
	}
	return -1
}

func addAmount(list []SpeciesAmount, species string, n Amount) []SpeciesAmount {
	for i := range list {
		if list[i].Species == species {
			list[i].Amount += n
			return list
		}
	}
	return append(list, SpeciesAmount{species, n})
}

package chem

import (
	"errors"
	"math"
	"strings"
	"testing"
)

func TestLimitingReagent(t *testing.T) {
	// OpenStax Chemistry 2e, example 4.12 and its check: silicon nitride from 2.00 g Si
	// and 1.50 g N2; silicon is limiting.
	e := sure(ParseEquation("3 Si + 2 N2 -> Si3N4"))(t)
	si, n2 := GramPerMole*28.085, GramPerMole*28.014
	l := sure(LimitingReagent(e, []SpeciesAmount{{"Si", si.Of(2 * Gram)}, {"N2", n2.Of(1.5 * Gram)}}))(t)
	if l.Reagent != "Si" || math.Abs(float64(l.Extent)-2/28.085/3) > 1e-12 {
		t.Errorf("limiting %s at %v mol, want Si at %v", l.Reagent, l.Extent, 2/28.085/3)
	}
	nitrogen := l.Reagents[1]
	if left := 1.5/28.014 - 2.0/3*2/28.085; math.Abs(float64(nitrogen.Left)-left) > 1e-12 {
		t.Errorf("left %v mol of N2, want %v", nitrogen.Left, left)
	}
	if want := (1.5 / 28.014 / 2) / (2 / 28.085 / 3); math.Abs(nitrogen.Equivalents-want) > 1e-9 || math.Abs(float64(nitrogen.Excess)-want+1) > 1e-9 {
		t.Errorf("%v equivalents of N2, want %v", nitrogen.Equivalents, want)
	}
}

func TestStoichiometryRefuses(t *testing.T) {
	e := sure(ParseEquation("2 H2 + O2 -> 2 H2O"))(t)
	for name, test := range map[string]struct {
		call func() error
		want error
	}{
		"nothing given":   {func() error { _, err := LimitingReagent(e, nil); return err }, ErrNoData},
		"not a reagent":   {func() error { _, err := LimitingReagent(e, []SpeciesAmount{{"H2O", 1}}); return err }, ErrNotInReaction},
		"negative amount": {func() error { _, err := LimitingReagent(e, []SpeciesAmount{{"H2", -1}}); return err }, ErrOutOfRange},
		"no number":       {func() error { _, err := LimitingReagent(e, []SpeciesAmount{{"H2", Amount(math.NaN())}}); return err }, ErrOutOfRange},
		"unbalanced": {func() error {
			_, err := LimitingReagent(sure(ParseEquation("H2 + O2 -> H2O"))(t), []SpeciesAmount{{"H2", 1}})
			return err
		}, ErrUnbalanced},
		"reagent as product": {func() error { _, err := e.TheoreticalMass("O2", 1); return err }, ErrNotInReaction},
		"yield of nothing":   {func() error { _, err := Yield(1, 0); return err }, ErrOutOfRange},
		"no limiting":        {func() error { _, err := CatalystLoading(1, 0); return err }, ErrOutOfRange},
		"absent species":     {func() error { _, err := e.FromAmount("H2", 1, "N2"); return err }, ErrNotInReaction},
	} {
		if err := test.call(); !errors.Is(err, test.want) {
			t.Errorf("%s: %v, want %v", name, err, test.want)
		}
	}
}

// A yield over the theoretical one is told, not clipped (METHODS a).
func TestYieldAboveOne(t *testing.T) {
	if got := sure(Yield(11, 10))(t); math.Abs(float64(got)-1.1) > 1e-12 {
		t.Errorf("Yield(11, 10) = %v, want 1.1", got)
	}
}

// Consecutive and parallel reactions: every element is kept, and the amounts follow by
// hand. 1 mol of alcohol, 90 % converted, 80 % of it to the aldehyde, the rest
// straight to the acid; then half of the aldehyde to the acid.
func TestReactInBranches(t *testing.T) {
	toAldehyde := sure(ParseEquation("C5H12O + NaOCl -> C5H10O + NaCl + H2O"))(t)
	toAcid := sure(ParseEquation("C5H12O + 2 NaOCl -> C5H10O2 + 2 NaCl + H2O"))(t)
	onward := sure(ParseEquation("C5H10O + NaOCl -> C5H10O2 + NaCl"))(t)
	start := []SpeciesAmount{{"C5H12O", 1}, {"NaOCl", 2}}
	first := sure(ReactInBranches(start, "C5H12O", 0.9, []Branch{{toAldehyde, 0.8}, {toAcid, 0.2}}))(t)
	second := sure(React(first, onward, "C5H10O", 0.5))(t)
	for species, want := range map[string]float64{"C5H12O": 0.1, "C5H10O": 0.36, "C5H10O2": 0.54, "NaCl": 1.44, "NaOCl": 0.56, "H2O": 0.9} {
		if got := float64(amountOf(second, species)); math.Abs(got-want) > 1e-12 {
			t.Errorf("%s: %v mol, want %v", species, got, want)
		}
	}
	for _, symbol := range []string{"C", "H", "O", "Na", "Cl"} {
		if before, after := atomsIn(t, start, symbol), atomsIn(t, second, symbol); math.Abs(before-after) > 1e-9*before {
			t.Errorf("%s: %v mol before, %v after", symbol, before, after)
		}
	}
}

func atomsIn(t *testing.T, list []SpeciesAmount, symbol string) float64 {
	t.Helper()
	var sum float64
	for _, s := range list {
		sum += float64(s.Amount) * sure(ParseFormula(s.Species))(t).Count(symbol)
	}
	return sum
}

func TestReactRefuses(t *testing.T) {
	e := sure(ParseEquation("C5H12O + 2 NaOCl -> C5H10O2 + 2 NaCl + H2O"))(t)
	have := []SpeciesAmount{{"C5H12O", 1}, {"NaOCl", 1}}
	_, err := React(have, e, "C5H12O", 0.9)
	if !errors.Is(err, ErrRunsShort) || !strings.Contains(err.Error(), "NaOCl") || !strings.Contains(err.Error(), "50 %") {
		t.Errorf("too little oxidant: %v, want NaOCl and a conversion up to 50 %%", err)
	}
	if _, err := ReactInBranches(have, "C5H12O", 0.5, []Branch{{e, 0.5}}); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("selectivities that sum to 0.5: %v", err)
	}
	if _, err := React(have, e, "C5H12O", 1.5); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("conversion 150 %%: %v", err)
	}
	if _, err := React(have, e, "H2O", 0.5); !errors.Is(err, ErrNotInReaction) {
		t.Errorf("a product as the key: %v", err)
	}
}

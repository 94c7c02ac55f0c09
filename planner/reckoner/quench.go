package reckoner

import (
	"context"
	"fmt"
	"strings"

	"stillroom/chem"
)

func quenchSum() Sum {
	return Sum{
		Name: "quench", Title: "Left-over oxidant", Group: heatGroup,
		About: "Gives the reductant that destroys an oxidant, the acid and base that go with it, and the sludge.",
		Keys: []Key{
			{"oxidant", "Oxidant; chromium(VI) counts chromium atoms", "chromium(VI)", false},
			{"amount", "Amount or mass of the oxidant", "0.421 mol", false},
			{"reductant", "Reductant", "sodium metabisulfite", false},
			{"excess", "Reductant beyond theory", "10 %", false},
			{"reduced", "Amount of the metal that is reduced already", "0.384 mol", true},
			{"free_acid", "H⁺ in the waste before", "0.5 mol", true},
		},
		Gives:   []string{"reductant_mass", "base_mass", "sludge_mass"},
		Example: []string{"oxidant=chromium(VI)", "amount=0.421 mol", "reductant=sodium bisulfite", "excess=10 %"},
		Range:   "stoichiometry: in dilute, aerated water much more reductant may be needed, so prove the end by a test",
		Source:  "half-reactions and pH windows in redox_agents.csv, each with its source; Beukes et al., Water SA 25 (1999) 363",
		Run:     runQuench,
	}
}

func runQuench(_ context.Context, args Args) (Answer, error) {
	oxidant, err := chem.OxidantOf(args["oxidant"])
	if err != nil {
		return Answer{}, err
	}
	amount, err := oxidantAmount(args, oxidant)
	if err != nil {
		return Answer{}, err
	}
	excess, note, err := excessOf(args, "reductant")
	if err != nil {
		return Answer{}, err
	}
	q := chem.Quench{Oxidant: args["oxidant"], Amount: amount, Reductant: args["reductant"], Excess: excess}
	if args.Has("reduced") {
		if q.Reduced, err = args.Amount("reduced"); err != nil {
			return Answer{}, err
		}
	}
	if args.Has("free_acid") {
		if q.FreeAcid, err = args.Amount("free_acid"); err != nil {
			return Answer{}, err
		}
	}
	w, err := q.Quenching()
	if err != nil {
		return Answer{}, err
	}
	return Answer{
		Results: []Result{
			Number("reductant_mass", w.ReductantMass.Grams(), "g"), Number("base_mass", w.BaseMass.Grams(), "g"), Number("sludge_mass", w.SludgeMass.Grams(), "g"),
			Number("reductant_amount", float64(w.Reductants), "mol"), Number("acid_mass", w.SulfuricAcid.Grams(), "g"), Text("equation", w.Equation),
		},
		Notes:      append(append([]string{note, "reductant_mass is that of " + w.Reductant.Formula.String() + ", " + w.Reductant.Name, "base_mass is sodium hydroxide, acid_mass pure sulfuric acid to be added; sludge is dry"}, w.Cautions...), sulfurNote(w)...),
		Derivation: quenchDerivation(q, w),
	}, nil
}

func sulfurNote(w chem.Quenching) []string {
	if w.SulfurDioxide <= 0 {
		return nil
	}
	return []string{fmt.Sprintf("the excess could give off up to %.3g mol of sulfur dioxide in acid", float64(w.SulfurDioxide))}
}

// oxidantAmount reads amount as moles, or as a mass of the oxidant as named.
func oxidantAmount(args Args, oxidant chem.RedoxAgent) (chem.Amount, error) {
	n, err := args.Amount("amount")
	if err == nil {
		return n, nil
	}
	m, asMass := chem.ParseMass(args["amount"])
	if asMass != nil {
		return 0, err
	}
	return oxidant.Formula.MolarMass().Of(m), nil
}

// excessOf reads the excess. A bare number from one up is taken as the factor on
// theory that it plainly is, and the note says so.
func excessOf(args Args, of string) (chem.Fraction, string, error) {
	if x, err := chem.ParseNumber(args["excess"]); err == nil && x >= 1 {
		return chem.Fraction(x - 1), fmt.Sprintf("excess %g is read as %g times theory, %.4g %% more", x, x, 100*(x-1)), nil
	}
	excess, err := args.Excess("excess")
	return excess, fmt.Sprintf("%.4g %% more %s than theory", excess.Percent(), of), err
}

func quenchDerivation(q chem.Quench, w chem.Quenching) chem.Derivation {
	molar := w.Reductant.Formula.MolarMass().GramsPerMole()
	s := quenchSum()
	return chem.Derivation{
		Of: "mass of " + w.Reductant.Name, Formula: "m = n · e(oxidant)/e(reductant) · (1 + excess) · M",
		Inserted: fmt.Sprintf("%.6g mol · %d/%d · %.6g · %.6g g/mol = %.6g g", float64(q.Amount), w.Oxidant.Electrons, w.Reductant.Electrons, 1+float64(q.Excess), molar, w.ReductantMass.Grams()),
		Inputs: []chem.Input{
			{Symbol: "n", Name: "amount of " + w.Oxidant.Name, Value: float64(q.Amount), Unit: "mol", Source: given},
			{Symbol: "e(oxidant)", Name: "electrons taken", Value: float64(w.Oxidant.Electrons), Source: w.Oxidant.Half},
			{Symbol: "e(reductant)", Name: "electrons given", Value: float64(w.Reductant.Electrons), Source: w.Reductant.Half},
			{Symbol: "M", Name: "molar mass of " + w.Reductant.Formula.String(), Value: molar, Unit: "g/mol", Source: "abridged standard atomic weights"},
		},
		Value: w.ReductantMass.Grams(), Unit: "g", Range: s.Range, Source: strings.Join([]string{w.Oxidant.Source, w.Reductant.Source}, "; "),
		Notes: w.Cautions,
	}
}

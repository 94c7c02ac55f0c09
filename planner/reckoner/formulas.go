package reckoner

import (
	"context"
	"errors"
	"fmt"

	"stillroom/chem"
)

// formulaSums are the sums on formulas, reactions and amounts.
func formulaSums() []Sum {
	return []Sum{molarMassSum(), balanceSum(), amountSum()}
}

func molarMassSum() Sum {
	return Sum{
		Name: "molar-mass", Title: "Molar mass", Group: "Formulas and reactions",
		About:   "Gives the molar mass of a formula with its uncertainty, and the share of each element.",
		Keys:    []Key{{"formula", "Formula, or the name of a substance", "Na2Cr2O7·2H2O", false}},
		Gives:   []string{"molar_mass", "uncertainty", "one row for each element"},
		Example: []string{"formula=Na2Cr2O7·2H2O"},
		Range:   "elements with a standard atomic weight, and the commoner nuclides",
		Source:  "IUPAC/CIAAW 2021 abridged standard atomic weights, revisions of 2024 added",
		Run:     runMolarMass,
	}
}

func runMolarMass(_ context.Context, args Args) (Answer, error) {
	f, err := formulaOf(args)
	if err != nil {
		return Answer{}, err
	}
	if err := f.Weighable(); err != nil {
		return Answer{}, &KeyError{Key: "formula", Text: args["formula"], Cause: err}
	}
	answer := Answer{
		Results: []Result{
			Number("molar_mass", f.MolarMass().GramsPerMole(), "g/mol"),
			Number("uncertainty", f.Uncertainty().GramsPerMole(), "g/mol"),
		},
		Notes: []string{"the uncertainty is a standard one, for material of normal terrestrial composition"},
	}
	for _, share := range f.Composition() {
		answer.Results = append(answer.Results, Number(share.Symbol, share.Fraction.Percent(), "% w/w"))
	}
	answer.Derivation = f.Derive()
	return answer, nil
}

// formulaOf reads the key formula, or takes the formula of the substance it names.
func formulaOf(args Args) (chem.Formula, error) {
	f, err := args.Formula("formula")
	if err == nil && (f.Weighable() == nil || f.Variable()) {
		return f, nil
	}
	if s, ok := chem.LookupSubstance(args["formula"]); ok && s.Formula != "" {
		return chem.ParseFormula(s.Formula)
	}
	return f, err
}

func balanceSum() Sum {
	return Sum{
		Name: "balance", Title: "Balancing a reaction", Group: "Formulas and reactions",
		About:   "Gives the smallest whole coefficients that balance a reaction, the charge included, and the electrons transferred.",
		Keys:    []Key{{"equation", "Reaction", "Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O", false}},
		Gives:   []string{"equation", "one row for each species", "electrons"},
		Example: []string{"equation=Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O"},
		Range:   "any reaction with one independent way to balance",
		Source:  "null space of the matrix of atom counts and charges, in exact arithmetic; oxidation numbers by the IUPAC rules (OpenStax Chemistry 2e, 4.2)",
		Run:     runBalance,
	}
}

func runBalance(_ context.Context, args Args) (Answer, error) {
	e, err := args.Equation("equation")
	if err != nil {
		return Answer{}, err
	}
	var answer Answer
	balanced, err := chem.Balance(e)
	if errors.Is(err, chem.ErrSeveralBalances) && e.Balanced() == nil {
		answer.Notes = append(answer.Notes, "several independent reactions are mixed in it; the coefficients given do balance and were kept")
		balanced, err = e, nil
	}
	if err != nil {
		return Answer{}, &KeyError{Key: "equation", Text: args["equation"], Cause: err}
	}
	answer.Results = []Result{Text("equation", balanced.String())}
	for _, t := range append(append([]chem.Term(nil), balanced.Left...), balanced.Right...) {
		answer.Results = append(answer.Results, Number(t.Species, float64(t.Coefficient), ""))
	}
	electrons, err := balanced.Electrons()
	if err != nil {
		answer.Notes = append(answer.Notes, "electrons not counted: "+err.Error())
	} else {
		answer.Results = append(answer.Results, Number("electrons", electrons, ""))
	}
	answer.Derivation = balanced.Derive()
	return answer, nil
}

func amountSum() Sum {
	return Sum{
		Name: "amount", Title: "Amount of substance", Group: "Formulas and reactions",
		About: "Gives the amount in a mass or a volume of a substance, or the mass that holds an amount.",
		Keys: []Key{
			{"substance", "Substance", "1-pentanol", true}, {"formula", "Formula, in place of a substance", "C5H12O", true},
			{"mass", "Mass", "50 g", true}, {"volume", "Volume, in place of the mass", "61.3 mL", true},
			{"amount", "Amount, in place of mass and volume", "0.5 mol", true},
			{"purity", "Purity by mass", "98 %", true}, densityKey, molarMassKey},
		Gives:   []string{"amount", "mass", "pure_mass", "volume"},
		Example: []string{"substance=1-pentanol", "volume=61.3 mL", "purity=99 %"},
		Range:   "a volume needs the density at the temperature at which it was measured",
		Source:  "n = m w / M (OpenStax Chemistry 2e, 3.1)",
		Run:     runAmount,
	}
}

func runAmount(_ context.Context, args Args) (Answer, error) {
	s, err := amountSubstance(args)
	if err != nil {
		return Answer{}, err
	}
	molarMass, err := NeedMolarMass(s)
	if err != nil {
		return Answer{}, err
	}
	purity, notes, err := purityOf(args, s)
	if err != nil {
		return Answer{}, err
	}
	s = densityAtPurity(s, purity)
	mass, err := amountMass(args, s, molarMass, purity)
	if err != nil {
		return Answer{}, err
	}
	n, derivation := chem.AmountIn(s.Name, mass, purity, molarMass)
	derivation.Inputs[2].Source = s.Sources["molar_mass"]
	answer := Answer{Derivation: derivation, Notes: notes, Results: []Result{
		Number("amount", float64(n), "mol"),
		Number("mass", mass.Grams(), "g"),
		Number("pure_mass", float64(purity)*mass.Grams(), "g"),
	}}
	if s.Density > 0 {
		answer.Results = append(answer.Results, Number("volume", s.Density.Volume(mass).Millilitres(), "mL"))
		answer.Notes = append(answer.Notes, densityNote(s))
	}
	return answer, nil
}

// purityOf reads the purity, which may be left out of what isn't sold as a solution.
func purityOf(args Args, s chem.Substance) (chem.Fraction, []string, error) {
	if !args.Has("purity") {
		if s.State == "liquid (solution)" {
			return 0, nil, &KeyError{Key: "purity", What: s.Name + " is sold as a solution, and no strength is given",
				Wanted: "give its strength, such as purity=\"37 %\"", Cause: ErrMissingKey}
		}
		return 1, []string{"taken as pure, since no purity is given"}, nil
	}
	purity, err := args.Fraction("purity")
	if err == nil && purity == 0 {
		return 0, nil, &KeyError{Key: "purity", Text: args["purity"], What: "nothing of the substance in it",
			Wanted: "give a purity above nought", Cause: chem.ErrOutOfRange}
	}
	return purity, nil, err
}

// nearlyPure is the purity from which the density of the pure substance stands in for
// that of the material: a liquid is sold as pure from about there on.
const nearlyPure = 0.95

// densityAtPurity puts the density of the aqueous solution in place of that of the pure
// substance where the table has one. Where it hasn't, and the material is far from pure,
// there is no density: somebody has to give it.
func densityAtPurity(s chem.Substance, purity chem.Fraction) chem.Substance {
	if purity == 1 || s.Sources["density"] == given {
		return s
	}
	const room = 20 // °C, at which volumes are measured unless said otherwise
	d, err := chem.SolutionDensity(s.CAS, purity, chem.Celsius(room))
	switch {
	case err == nil:
		s.Density, s.DensityAt = d, chem.Celsius(room)
		s.Sources["density"] = chem.SolutionDensitySource(s.CAS, purity, chem.Celsius(room)) + ", as an aqueous solution"
	case purity < nearlyPure:
		s.Density = 0
	}
	return s
}

// amountSubstance reads formula or substance, exactly one of them.
func amountSubstance(args Args) (chem.Substance, error) {
	key := "substance"
	switch {
	case args.Has("formula") && args.Has("substance"):
		return chem.Substance{}, &KeyError{Key: "formula", Text: args["formula"], What: "given beside substance", Wanted: "give one of the two", Cause: chem.ErrAmbiguous}
	case args.Has("formula"):
		f, err := args.Formula("formula")
		if err != nil {
			return chem.Substance{}, err
		}
		if err := f.Weighable(); err != nil && !args.Has("molar_mass") {
			return chem.Substance{}, &KeyError{Key: "formula", Text: args["formula"], Cause: err}
		}
		key = "formula"
	}
	return args.Substance(key)
}

// amountMass returns the mass of the material as weighed, from whichever of mass,
// volume and amount was given.
func amountMass(args Args, s chem.Substance, molarMass chem.MolarMass, purity chem.Fraction) (chem.Mass, error) {
	count := 0
	for _, key := range []string{"mass", "volume", "amount"} {
		if args.Has(key) {
			count++
		}
	}
	switch {
	case count == 0:
		return 0, missing("mass", "50 g")
	case count > 1:
		return 0, &KeyError{Key: "mass", What: "more than one of mass, volume and amount given", Wanted: "give one", Cause: chem.ErrAmbiguous}
	case args.Has("mass"):
		return args.Mass("mass")
	case args.Has("amount"):
		n, err := args.Amount("amount")
		return molarMass.Mass(n) / chem.Mass(purity), err
	}
	v, err := args.Volume("volume")
	if err != nil {
		return 0, err
	}
	d, err := NeedDensity(s)
	return d.Mass(v), err
}

func densityNote(s chem.Substance) string {
	text := fmt.Sprintf("density %.4g g/mL", s.Density.GramsPerMillilitre())
	if s.DensityAt > 0 {
		text += fmt.Sprintf(" at %.4g °C", s.DensityAt.Celsius())
	}
	if source := s.Sources["density"]; source != "" {
		text += ", " + source
	}
	return text
}

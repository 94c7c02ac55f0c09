package reckoner

import (
	"context"
	"fmt"

	"stillroom/chem"
)

func neutraliseSum() Sum {
	return Sum{
		Name: "neutralise", Title: "Neutralisation", Group: solutionGroup,
		About: "Gives the base for an acid, the carbon dioxide and the salt.",
		Keys: []Key{
			{"acid", "Acid", "butanoic acid", false},
			{"base", "Base", "NaHCO3", false},
			{"amount", "Amount of acid", "0.5 mol", true},
			{"mass", "Mass of acid, in place of the amount", "88.1 g", true},
			{"purity", "Strength of the acid, where its mass isn't that of the pure one", "37 %", true},
			{"excess", "Excess of base; none if not given", "10 %", true},
			{"protons", "Acid protons of one molecule, in place of the table's", "2", true},
			{"acid_molar_mass", "Molar mass of the acid, in place of the table's", "88.106 g/mol", true},
			{"base_molar_mass", "Molar mass of the base, in place of the table's", "84.006 g/mol", true},
			{"temperature", "Temperature of the gas; 20 °C if none is given", "20 °C", true},
			{"pressure", "Pressure of the gas; 101.325 kPa if none is given", "101.325 kPa", true},
		},
		Gives:   []string{"base_mass", "gas_volume", "salt_mass", "base_amount"},
		Example: []string{"acid=butanoic acid", "mass=88.1 g", "base=NaHCO3"},
		Range:   "hydroxides, oxides, carbonates and hydrogencarbonates of groups 1 and 2, ammonia and amines; acid protons with a pKa up to 8",
		Source:  "OpenStax Chemistry 2e, 4.5; V = n R T / p",
		Run:     runNeutralise,
	}
}

func runNeutralise(_ context.Context, args Args) (Answer, error) {
	acid, protons, notes, err := acidToNeutralise(args)
	if err != nil {
		return Answer{}, err
	}
	strength, more, err := acidStrength(args, acid)
	if err != nil {
		return Answer{}, err
	}
	notes = append(notes, more...)
	base, base1, baseFormula, err := baseToAdd(args)
	if err != nil {
		return Answer{}, err
	}
	n, err := amountOfAcid(args, acid, strength)
	if err != nil {
		return Answer{}, err
	}
	var excess chem.Fraction
	if args.Has("excess") {
		var note string
		if excess, note, err = excessOf(args, "base"); err != nil {
			return Answer{}, err
		}
		notes = append(notes, note)
	}
	acidFormula, _ := chem.ParseFormula(acid.Formula)
	acidMass := acid.MolarMass - chem.MolarMass(chem.AcidWaters(acid.Name, acid.CAS, acidFormula))*waterMolarMass()
	anhydrous := base.MolarMass - chem.MolarMass(baseFormula.Waters())*waterMolarMass()
	out, err := chem.Neutralise(n, acidMass, protons, base1, base.MolarMass, anhydrous, excess)
	if err != nil {
		return Answer{}, err
	}
	gas, more, err := gasVolume(args, out.CarbonDioxide)
	if err != nil {
		return Answer{}, err
	}
	notes = append(notes, more...)
	notes = append(notes, fmt.Sprintf("%s acid protons per molecule of %s, %s taken up per formula of %s", figures(protons), acid.Name, figures(base1.Protons), base.Name))
	if out.CarbonDioxide > 0 {
		notes = append(notes, "gas: add in portions to an open vessel with room for foam; some carbon dioxide stays dissolved")
	}
	return Answer{
		Results: []Result{
			Number("base_mass", out.Base.Grams(), "g"),
			Number("gas_volume", gas.Litres(), "L"),
			Number("salt_mass", out.Salt.Grams(), "g"),
			Number("base_amount", float64(out.BaseAmount), "mol"),
		},
		Notes:      notes,
		Derivation: chem.DeriveNeutralisation(acid.Name, base.Name, n, protons, base1, base.MolarMass, excess, out),
	}, nil
}

// waterMolarMass is that of H2O by the formula.
func waterMolarMass() chem.MolarMass {
	f, err := chem.ParseFormula("H2O")
	if err != nil {
		return 0
	}
	return f.MolarMass()
}

// acidToNeutralise reads the acid and how many protons it has.
func acidToNeutralise(args Args) (chem.Substance, float64, []string, error) {
	acid, err := namedSubstance(args, "acid")
	if err != nil {
		return acid, 0, nil, err
	}
	if args.Has("protons") {
		protons, err := args.Positive("protons")
		return acid, protons, nil, err
	}
	f, _ := chem.ParseFormula(acid.Formula)
	protons, assumed, err := chem.AcidProtons(acid.Name, acid.CAS, f)
	if err != nil {
		return acid, 0, nil, &KeyError{Key: "acid", Text: args["acid"], Cause: err}
	}
	if assumed != "" {
		return acid, protons, []string{assumed}, nil
	}
	return acid, protons, nil, nil
}

// baseToAdd reads the base, what one formula of it takes up, and its formula.
func baseToAdd(args Args) (chem.Substance, chem.Base, chem.Formula, error) {
	base, err := args.Substance("base")
	if err != nil {
		return base, chem.Base{}, chem.Formula{}, err
	}
	f, _ := chem.ParseFormula(base.Formula)
	b, err := chem.BaseOf(base.Name, base.CAS, f)
	if err != nil {
		return base, b, f, &KeyError{Key: "base", Text: args["base"], Cause: err}
	}
	if !(base.MolarMass > 0) {
		return base, b, f, &KeyError{Key: "base_molar_mass", What: "no molar mass of " + base.Name + " in the table",
			Wanted: `give base_molar_mass="84.006 g/mol"`, Cause: chem.ErrNoData}
	}
	return base, b, f, nil
}

// acidStrength reads the purity; without one a mass is that of the pure acid, and the
// note says so.
func acidStrength(args Args, acid chem.Substance) (chem.Fraction, []string, error) {
	if !args.Has("purity") {
		if args.Has("mass") {
			return 1, []string{"the mass is taken as that of pure " + acid.Name + "; for a solution give its strength, such as purity=\"37 %\""}, nil
		}
		return 1, nil, nil
	}
	purity, err := args.Fraction("purity")
	return purity, nil, err
}

// amountOfAcid reads the amount, or the mass over the molar mass; exactly one of them.
func amountOfAcid(args Args, acid chem.Substance, strength chem.Fraction) (chem.Amount, error) {
	switch {
	case args.Has("amount") && args.Has("mass"):
		return 0, &KeyError{Key: "amount", Text: args["amount"], What: "given beside mass", Wanted: "give one of the two", Cause: chem.ErrAmbiguous}
	case !args.Has("amount") && !args.Has("mass"):
		return 0, missing("amount", "0.5 mol")
	case !(acid.MolarMass > 0):
		return 0, &KeyError{Key: "acid_molar_mass", What: "no molar mass of " + acid.Name + " in the table",
			Wanted: `give acid_molar_mass="88.106 g/mol"`, Cause: chem.ErrNoData}
	case args.Has("amount"):
		return args.Amount("amount")
	}
	m, err := args.Mass("mass")
	return acid.MolarMass.Of(m * chem.Mass(strength)), err
}

// gasVolume gives the volume of a gas at the temperature and pressure given, or at
// 20 °C and 101.325 kPa with a note that says so.
func gasVolume(args Args, n chem.Amount) (chem.Volume, []string, error) {
	t, p := chem.Celsius(20), chem.Atmosphere
	var notes []string
	var err error
	if n > 0 && (!args.Has("temperature") || !args.Has("pressure")) {
		notes = append(notes, "gas volume at 20 °C and 101.325 kPa, as far as nothing else was given")
	}
	if args.Has("temperature") {
		if t, err = args.Temperature("temperature"); err != nil {
			return 0, nil, err
		}
	}
	if args.Has("pressure") {
		if p, err = args.Pressure("pressure"); err != nil {
			return 0, nil, err
		}
		if p == 0 {
			return 0, nil, &KeyError{Key: "pressure", Text: args["pressure"], What: "no pressure", Wanted: "give one above nought", Cause: chem.ErrOutOfRange}
		}
	}
	return chem.GasVolume(n, t, p), notes, nil
}

package reckoner

import (
	"context"
	"slices"
	"strings"

	"stillroom/chem"
)

func metricsSum() Sum {
	return Sum{
		Name: "metrics", Title: "Green metrics", Group: solutionGroup,
		About: "Gives the atom economy of an equation and the mass that a process takes for its product.",
		Keys: []Key{
			{"product", "Product, as written in the equation, with its mass or alone", "C4H8O2: 23.6 g", false},
			{"equation", "Balanced equation, for the atom economy", "C4H10O + 2 NaOCl -> C4H8O2 + 2 NaCl + H2O", true},
			{"product_mass", "Mass of product, where it isn't behind the product", "23.6 g", true},
			{"inputs", "Masses of all inputs, with names or without", "1-butanol: 21.9 g; water: 500 g", true},
			{"solvents", "Inputs that are solvents, by their names above", "water", true},
			{"reactants", "Inputs that are reactants, by their names above", "1-butanol", true},
		},
		Gives: []string{"atom_economy", "e_factor", "process_mass_intensity", "reaction_mass_efficiency", "solvent_share"},
		Example: []string{"equation=C4H10O + 2 NaOCl -> C4H8O2 + 2 NaCl + H2O", "product=C4H8O2: 23.6 g",
			"inputs=1-butanol: 21.9 g; sodium hypochlorite: 44.0 g; water: 500 g", "solvents=water", "reactants=1-butanol; sodium hypochlorite"},
		Range:  "the equation balanced; whether water counts is for whoever lists the inputs to say",
		Source: "Trost 1991; Sheldon; Constable, Curzons and Cunningham, Green Chem. 4 (2002) 521",
		Run:    runMetrics,
	}
}

func runMetrics(_ context.Context, args Args) (Answer, error) {
	if !args.Has("equation") && !args.Has("inputs") {
		return Answer{}, missing("equation", "C4H10O + 2 NaOCl -> C4H8O2 + 2 NaCl + H2O")
	}
	product, mass, err := productOf(args)
	if err != nil {
		return Answer{}, err
	}
	var answer Answer
	if args.Has("equation") {
		if err := answer.addAtomEconomy(args, product); err != nil {
			return Answer{}, err
		}
	}
	if args.Has("inputs") {
		if err := answer.addMassMetrics(args, mass); err != nil {
			return Answer{}, err
		}
	}
	return answer, nil
}

// productOf reads the product and its mass, of which either may be missing.
func productOf(args Args) (species string, mass chem.Mass, err error) {
	text, err := args.Text("product")
	if err != nil {
		return "", 0, err
	}
	species, behind, with := strings.Cut(text, ":")
	species = strings.TrimSpace(species)
	switch {
	case args.Has("product_mass"):
		mass, err = args.Mass("product_mass")
	case with:
		mass, err = chem.ParseMass(behind)
	case !args.Has("equation"):
		mass, err = chem.ParseMass(text)
	}
	if err != nil {
		return "", 0, &KeyError{Key: "product", Text: text, Cause: err}
	}
	return species, mass, nil
}

// addAtomEconomy adds the atom economy; a product may be named as a substance whose
// formula stands in the equation.
func (a *Answer) addAtomEconomy(args Args, product string) error {
	equation, err := args.Equation("equation")
	if err != nil {
		return err
	}
	if s, ok := chem.LookupSubstance(product); ok && s.Formula != "" {
		product = s.Formula
	}
	economy, err := chem.AtomEconomy(equation, product)
	if err != nil {
		return &KeyError{Key: "equation", Text: args["equation"], Cause: err}
	}
	a.Results = append(a.Results, Number("atom_economy", economy.Percent(), "%"))
	a.Derivation = chem.DeriveAtomEconomy(equation, product, economy)
	return nil
}

// input is one input of a process.
type input struct {
	name string
	mass chem.Mass
}

// addMassMetrics adds what follows from the masses.
func (a *Answer) addMassMetrics(args Args, product chem.Mass) error {
	inputs, err := inputsOf(args)
	if err != nil {
		return err
	}
	all, err := chosen(args, "", inputs)
	if err != nil {
		return err
	}
	if product == 0 {
		return missing("product_mass", "23.6 g")
	}
	e, err := chem.EFactor(all, product)
	if err != nil {
		return &KeyError{Key: "inputs", Text: args["inputs"], Cause: err}
	}
	intensity, err := chem.ProcessMassIntensity(all, product)
	if err != nil {
		return err
	}
	a.Results = append(a.Results, Number("e_factor", e, "kg/kg"), Number("process_mass_intensity", intensity, "kg/kg"))
	if args.Has("reactants") {
		reactants, err := chosen(args, "reactants", inputs)
		if err != nil {
			return err
		}
		efficiency, err := chem.ReactionMassEfficiency(reactants, product)
		if err != nil {
			return &KeyError{Key: "reactants", Text: args["reactants"], Cause: err}
		}
		a.Results = append(a.Results, Number("reaction_mass_efficiency", efficiency.Percent(), "%"))
	}
	if args.Has("solvents") {
		solvents, err := chosen(args, "solvents", inputs)
		if err != nil {
			return err
		}
		share, err := chem.SolventShare(solvents, all)
		if err != nil {
			return err
		}
		a.Results = append(a.Results, Number("solvent_share", share.Percent(), "%"))
	}
	return a.derive(all, product)
}

// derive explains the mass intensity where no equation did already.
func (a *Answer) derive(all []chem.Mass, product chem.Mass) error {
	var sum chem.Mass
	for _, m := range all {
		sum += m
	}
	d := chem.DeriveMassIntensity(sum, product)
	if a.Derivation.Formula == "" {
		a.Derivation = d
	} else {
		a.Derivation.Notes = append(a.Derivation.Notes, d.Formula+"; "+d.Inserted)
	}
	return nil
}

// inputsOf reads masses with or without names.
func inputsOf(args Args) ([]input, error) {
	items, err := args.List("inputs")
	if err != nil {
		return nil, err
	}
	inputs := make([]input, len(items))
	for i, item := range items {
		text := item
		if at := strings.LastIndex(item, ":"); at >= 0 {
			inputs[i].name, text = strings.TrimSpace(item[:at]), item[at+1:]
		}
		if inputs[i].mass, err = chem.ParseMass(text); err != nil {
			return nil, &KeyError{Key: "inputs", Text: item, Cause: err}
		}
	}
	return inputs, nil
}

// chosen returns the masses of the inputs that a key names, or of all.
func chosen(args Args, key string, inputs []input) ([]chem.Mass, error) {
	var names []string
	if key != "" {
		var err error
		if names, err = args.List(key); err != nil {
			return nil, err
		}
	}
	var masses []chem.Mass
	for _, in := range inputs {
		if key == "" || slices.Contains(names, in.name) {
			masses = append(masses, in.mass)
		}
	}
	for _, name := range names {
		if !slices.ContainsFunc(inputs, func(in input) bool { return in.name == name }) {
			return nil, &KeyError{Key: key, Text: name, What: "not among the inputs", Wanted: "write the name as in inputs=", Cause: chem.ErrNoData}
		}
	}
	return masses, nil
}

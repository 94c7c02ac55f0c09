package planner

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/goccy/go-yaml"
	"github.com/goccy/go-yaml/ast"
	"github.com/goccy/go-yaml/parser"

	"stillroom/chem"
)

// ParseRecipe reads a recipe file. The name of the file is used in messages
// only. A file with faults gives a *RecipeErrors that holds all of them with
// line and column.
func ParseRecipe(file string, text []byte) (*Recipe, error) {
	errs := &RecipeErrors{}
	root, fault := parseYAML(file, text)
	if fault != nil {
		return nil, &RecipeErrors{Faults: []RecipeFault{*fault}}
	}
	f := newFields(file, errs, root, "the recipe")
	r := readRecipe(f)
	f.done()
	checkNames(r, errs)
	r.Text = string(text)
	if err := errs.sorted(); err != nil {
		return nil, err
	}
	r.once = &compiledOnce{}
	return r, nil
}

func parseYAML(file string, text []byte) (ast.Node, *RecipeFault) {
	tree, err := parser.ParseBytes(text, 0)
	if err != nil {
		fault := RecipeFault{File: file, Line: 1, Column: 1, What: err.Error(), Expected: "YAML: keys, values, lists"}
		var syntax *yaml.SyntaxError
		if errors.As(err, &syntax) {
			fault.What = syntax.Message
			fault.Line, fault.Column = syntax.Token.Position.Line, syntax.Token.Position.Column
		}
		return nil, &fault
	}
	if len(tree.Docs) == 0 || tree.Docs[0].Body == nil {
		return nil, &RecipeFault{File: file, Line: 1, Column: 1, What: "the file is empty", Expected: "a recipe"}
	}
	return tree.Docs[0].Body, nil
}

func readRecipe(f *fields) *Recipe {
	r := &Recipe{
		Name:     f.text("recipe", true),
		Title:    f.text("title", true),
		Version:  f.text("version", true),
		About:    f.text("about", false),
		Product:  f.text("product", true),
		Limiting: f.text("limiting", true),
		Sources:  f.texts("sources"),
		Controls: f.texts("controls"),
	}
	readYield(f, r)
	readProven(f, r)
	f.entries("substances", false, "substance", func(name string, g *fields) {
		r.Substances = append(r.Substances, readSubstance(name, g))
	})
	f.entries("vessels", true, "vessel", func(name string, g *fields) {
		r.Vessels = append(r.Vessels, VesselNote{name, g.text("ware", true), g.text("for", false), g.place()})
	})
	f.entries("reactions", false, "reaction", func(name string, g *fields) {
		r.Reactions = append(r.Reactions, readReaction(name, g))
	})
	f.each("steps", true, "step", func(g *fields) {
		r.Steps = append(r.Steps, readStep(len(r.Steps)+1, g))
	})
	return r
}

func (f *fields) place() place { return place{f.file, f.at.Line, f.at.Column} }

func readYield(f *fields, r *Recipe) {
	g := f.inner("yield", true)
	if g == nil {
		return
	}
	r.Yield.Mean, _ = take(g, "mean", true, chem.ParseFraction, "a share such as 68 %")
	r.Yield.SD, _ = take(g, "spread", true, chem.ParseFraction, "a standard deviation in points, such as 6 %")
	r.Yield.Cap, _ = take(g, "at-most", false, chem.ParseFraction, "a share such as 95 %")
	r.Yield.Basis = g.text("basis", true)
	runs, _ := take(g, "runs", false, readNumber, "a whole number of own runs")
	r.Yield.Runs = int(runs)
	if r.Yield.Basis != "" && r.Yield.Basis != "prior" && r.Yield.Basis != "own runs" {
		g.faultAt(g.values["basis"], fmt.Sprintf("basis %q", r.Yield.Basis), "prior or own runs")
	}
	g.done()
}

func readProven(f *fields, r *Recipe) {
	g := f.inner("proven", false)
	if g == nil {
		return
	}
	r.ProvenScale, _ = take(g, "scale", true, chem.ParseAmount, "an amount of limiting reagent such as 0.5 mol")
	runs, _ := take(g, "runs", true, readNumber, "a whole number of runs")
	r.ProvenRuns = int(runs)
	g.done()
}

var phaseNames = []string{"aqueous", "organic", "solid", "gas"}

func readSubstance(name string, f *fields) SubstanceNote {
	s := SubstanceNote{
		Name: name, Formula: f.text("formula", false), CAS: f.text("cas", false),
		Phase: f.text("phase", false), Source: f.text("source", false), at: f.place(),
	}
	s.Density, _ = take(f, "density", false, readDensity, "a density such as 0.81 g/mL")
	s.Boiling, _ = take(f, "boiling", false, chem.ParseTemperature, "a temperature such as 186 °C")
	s.Azeotrope, _ = take(f, "azeotrope", false, chem.ParseFraction, "the mass fraction in the vapour over water, such as 38 %")
	s.AzeotropeBoils, _ = take(f, "azeotrope-boils", false, chem.ParseTemperature, "a temperature such as 95 °C")
	if s.Phase != "" && !slices.Contains(phaseNames, s.Phase) {
		f.faultAt(f.values["phase"], fmt.Sprintf("phase %q", s.Phase), "one of "+strings.Join(phaseNames, ", "))
	}
	return s
}

func readReaction(name string, f *fields) Reaction {
	r := Reaction{Name: name, EnthalpySource: f.text("enthalpy-source", false), at: f.place()}
	r.Consumes = readTerms(f, "consumes")
	r.Forms = readTerms(f, "forms")
	if g := f.inner("ions", false); g != nil {
		r.IonsConsumed, r.IonsFormed = readTerms(g, "consumes"), readTerms(g, "forms")
		g.done()
	}
	var stated bool
	r.Enthalpy, stated = take(f, "enthalpy", false, chem.ParseMolarEnergy, "an enthalpy such as -510 kJ/mol")
	if stated && r.EnthalpySource == "" {
		f.fault(f.at, fmt.Sprintf("reaction %s states an enthalpy without its source", name), "a line enthalpy-source: …")
	}
	return r
}

func readTerms(f *fields, key string) []Term {
	g := f.inner(key, true)
	if g == nil {
		return nil
	}
	var terms []Term
	for _, pair := range g.keys {
		name := pair.Key.GetToken().Value
		n, ok := take(g, name, true, readNumber, "a stoichiometric number such as 2")
		if ok && n == 0 {
			g.faultAt(pair.Value, name+" has the number 0", "a positive stoichiometric number")
		}
		terms = append(terms, Term{name, n, placeOf(g.file, pair.Key)})
	}
	return terms
}

func readStep(n int, f *fields) Step {
	s := Step{N: n, Do: f.text("do", true), Name: f.text("name", true), Vessel: f.text("vessel", true),
		Hold: f.text("hold-point", false), Cautions: f.texts("cautions"), Controls: f.texts("controls"), at: f.place()}
	f.what = fmt.Sprintf("step %d (%s)", n, s.Do)
	if f.values["time"] != nil && nodeText(f.values["time"]) == "set for this scale" {
		f.known = append(f.known, "time")
		s.ForScale = true
	} else {
		s.Time, _ = take(f, "time", false, chem.ParseDuration, `a time such as 2 h, or "set for this scale"`)
	}
	s.spec = newOperation(s.Do)
	if s.spec == nil {
		if s.Do != "" {
			f.faultAt(f.values["do"], fmt.Sprintf("unknown step kind %q", s.Do), "one of "+strings.Join(StepKinds(), ", "))
		}
		for _, pair := range f.keys {
			f.known = append(f.known, pair.Key.GetToken().Value)
		}
		return s
	}
	s.spec.read(f)
	return s
}

// checkNames notes vessels and reactions that nothing declares, and
// substances that are in no table.
func checkNames(r *Recipe, errs *RecipeErrors) {
	declared := func(name string) bool {
		return slices.ContainsFunc(r.Vessels, func(v VesselNote) bool { return v.Name == name })
	}
	names := make([]string, len(r.Vessels))
	for i, v := range r.Vessels {
		names[i] = v.Name
	}
	for _, s := range r.Steps {
		if s.Vessel != "" && !declared(s.Vessel) {
			errs.add(s.at, fmt.Sprintf("step %d names the vessel %q, which isn't declared", s.N, s.Vessel), "one of "+strings.Join(names, ", "))
		}
		if s.spec != nil {
			s.spec.names(func(kind, name string, at place) { checkName(r, errs, s, kind, name, at, names) })
		}
	}
	for _, x := range r.Reactions {
		for _, t := range slices.Concat(x.Consumes, x.Forms) {
			checkSubstance(r, errs, t.Substance, t.at)
		}
	}
	checkSubstanceNotes(r, errs)
}

func checkName(r *Recipe, errs *RecipeErrors, s Step, kind, name string, at place, vessels []string) {
	switch kind {
	case "vessel":
		if !slices.Contains(vessels, name) {
			errs.add(at, fmt.Sprintf("step %d names the vessel %q, which isn't declared", s.N, name), "one of "+strings.Join(vessels, ", "))
		}
	case "reaction":
		if !slices.ContainsFunc(r.Reactions, func(x Reaction) bool { return x.Name == name }) {
			errs.add(at, fmt.Sprintf("step %d names the reaction %q, which isn't declared", s.N, name), "a reaction under reactions:")
		}
	case "substance":
		checkSubstance(r, errs, name, at)
	}
}

func checkSubstance(r *Recipe, errs *RecipeErrors, name string, at place) {
	if _, err := findMatter(r, name); err != nil {
		errs.add(at, err.Error(), "a name, synonym or CAS number of the table of substances, or an entry under substances:")
	}
}

func checkSubstanceNotes(r *Recipe, errs *RecipeErrors) {
	for _, s := range r.Substances {
		if s.Formula == "" {
			continue
		}
		if _, err := chem.ParseFormula(s.Formula); err != nil {
			errs.add(s.at, fmt.Sprintf("substance %s: %v", s.Name, err), "a formula such as C5H10O2")
		}
	}
}

func (e *RecipeErrors) add(at place, what, expected string) {
	e.Faults = append(e.Faults, RecipeFault{at.file, at.line, at.column, shortened(what), expected})
}

// longestFault bounds what a fault quotes, so that a file that is no recipe at
// all doesn't come back whole as its own error message.
const longestFault = 240

func shortened(what string) string {
	if letters := []rune(what); len(letters) > longestFault {
		return string(letters[:longestFault]) + " …"
	}
	return what
}

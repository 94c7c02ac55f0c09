package chem

import (
	"strings"
	"testing"
)

// TestWorkedBalances reproduces the rows of b_redox_balance: the text of the
// balanced equation, and that the electrons lost equal those gained.
func TestWorkedBalances(t *testing.T) {
	for _, row := range workedExamples(t, "b_redox_balance") {
		e := sure(ParseEquation(row.input("skeleton")))(t)
		got, err := Balance(e)
		if err != nil || got.String() != row.expected {
			t.Errorf("%s: Balance(%s) = %s, %v; want %s (%s)", row.id, e, got, err, row.expected, row.source)
			continue
		}
		if n, err := got.Electrons(); err != nil || n <= 0 {
			t.Errorf("%s: Electrons(%s) = %v, %v; want some, it is a redox reaction", row.id, got, n, err)
		}
	}
}

// TestWorkedStoichiometry reproduces the rows of a_stoichiometry.
func TestWorkedStoichiometry(t *testing.T) {
	for _, row := range workedExamples(t, "a_stoichiometry") {
		t.Run(row.id, func(t *testing.T) { solveStoichiometry(t, row) })
	}
}

func solveStoichiometry(t *testing.T, row workedExample) {
	if row.input("equation") == "" {
		solveOneToOne(t, row)
		return
	}
	ask, of, _ := strings.Cut(row.ask, " ")
	e := sure(ParseEquation(row.input("equation")))(t)
	switch ask {
	case "limiting_reagent":
		if got := sure(LimitingReagent(e, reagentsOf(t, row, e)))(t).Reagent; got != row.expected {
			t.Errorf("%s: limiting reagent %s, want %s", row.id, got, row.expected)
		}
	case "theoretical", "mass":
		row.check(t, massFrom(t, e, reagentsOf(t, row, e), strings.TrimPrefix(of, "mass ")).Grams())
	case "amount":
		have := knownAmounts(t, row, e)
		row.check(t, float64(sure(e.FromAmount(have[0].Species, have[0].Amount, of))(t)))
	case "percent":
		product, found := foundProduct(t, row, e)
		theory := massFrom(t, e, reagentsOf(t, row, e), product)
		row.check(t, sure(Yield(found, theory))(t).Percent())
	default:
		t.Fatalf("%s: no way to compute %q", row.id, row.ask)
	}
}

// solveOneToOne solves the rows that give a substrate and not the whole reaction.
func solveOneToOne(t *testing.T, row workedExample) {
	switch row.ask {
	case "percent yield":
		found, formula := productIn(t, row.input("product"))
		theory := formula.MolarMass().Mass(amountIn(t, row.input("substrate")))
		row.check(t, sure(Yield(found, theory))(t).Percent())
	case "maximum mass urea":
		n := sure(ParseFormula("C"))(t).MolarMass().Of(sure(ParseMass(row.input("carbon")))(t))
		urea := sure(ParseFormula("CO(NH2)2"))(t)
		row.check(t, float64(urea.MolarMass().Mass(n)/Kilogram))
	case "catalyst loading":
		tempo := amountIn(t, row.input("TEMPO"))
		row.check(t, sure(CatalystLoading(tempo, amountIn(t, row.input("substrate"))))(t).Percent())
	case "equivalents NaOCl":
		reaction := sure(ParseEquation("C5H12O + NaOCl -> C5H10O + NaCl + H2O"))(t)
		v, c, _ := strings.Cut(row.input("NaOCl"), " of ")
		n := Amount(float64(sure(ParseVolume(v))(t)) * float64(sure(ParseConcentration(c))(t)))
		l := sure(LimitingReagent(reaction, []SpeciesAmount{{"C5H12O", amountIn(t, row.input("substrate"))}, {"NaOCl", n}}))(t)
		row.check(t, l.Reagents[1].Equivalents)
	default:
		t.Fatalf("%s: no way to compute %q", row.id, row.ask)
	}
}

// massFrom returns the mass of a species that goes with what there is, on either
// side of the reaction.
func massFrom(t *testing.T, e Equation, have []SpeciesAmount, of string) Mass {
	t.Helper()
	if _, number, ok := e.Term(of); ok && number > 0 && e.reagent(have[0].Species) >= 0 {
		return sure(e.TheoreticalMass(of, sure(LimitingReagent(e, have))(t).Extent))(t)
	}
	n := sure(e.FromAmount(have[0].Species, have[0].Amount, of))(t)
	return sure(ParseFormula(of))(t).MolarMass().Mass(n)
}

// reagentsOf collects the amounts of a row that stand on the left.
func reagentsOf(t *testing.T, row workedExample, e Equation) []SpeciesAmount {
	t.Helper()
	known := knownAmounts(t, row, e)
	var have []SpeciesAmount
	for _, k := range known {
		if e.reagent(k.Species) >= 0 {
			have = append(have, k)
		}
	}
	if len(have) == 0 {
		return known
	}
	return have
}

// knownAmounts reads the amounts of all species of the reaction that a row gives as
// mass, amount, volume with density, volume with concentration, or as an ore.
func knownAmounts(t *testing.T, row workedExample, e Equation) []SpeciesAmount {
	t.Helper()
	var have []SpeciesAmount
	for _, name := range e.Species() {
		molarMass := sure(ParseFormula(name))(t).MolarMass()
		volume, density, concentration := row.input(name+"_volume"), row.input(name+"_density"), row.input(name+"_conc")
		share := row.input(name + "_mass_fraction")
		switch text := row.input(name); {
		case text == "excess":
		case strings.HasSuffix(text, " g"):
			have = append(have, SpeciesAmount{name, molarMass.Of(sure(ParseMass(text))(t))})
		case strings.HasSuffix(text, " mol"):
			have = append(have, SpeciesAmount{name, sure(ParseAmount(text))(t)})
		case density != "":
			m := sure(ParseDensity(density))(t).Mass(sure(ParseVolume(volume))(t))
			have = append(have, SpeciesAmount{name, molarMass.Of(m)})
		case concentration != "":
			n := float64(sure(ParseVolume(volume))(t)) * float64(sure(ParseConcentration(concentration))(t))
			have = append(have, SpeciesAmount{name, Amount(n)})
		case share != "":
			m := sure(ParseMass(row.input("ore")))(t) * Mass(sure(ParseFraction(share))(t))
			have = append(have, SpeciesAmount{name, molarMass.Of(m)})
		}
	}
	if len(have) == 0 {
		t.Fatalf("%s: no amount understood", row.id)
	}
	return have
}

// foundProduct reads what was obtained.
func foundProduct(t *testing.T, row workedExample, e Equation) (string, Mass) {
	t.Helper()
	for _, name := range e.Species() {
		if text := row.input(name + "_obtained"); text != "" {
			return name, sure(ParseMass(text))(t)
		}
	}
	product := e.Right[0].Species
	if volume := row.input(product + "_volume"); volume != "" {
		return product, sure(ParseDensity(row.input(product + "_density")))(t).Mass(sure(ParseVolume(volume))(t))
	}
	return product, sure(ParseMass(row.input("product")))(t)
}

// productIn reads a product as "menthone C10H18O 74 g".
func productIn(t *testing.T, text string) (Mass, Formula) {
	t.Helper()
	words := strings.Fields(text)
	found := sure(ParseMass(strings.Join(words[len(words)-2:], " ")))(t)
	return found, sure(ParseFormula(words[len(words)-3]))(t)
}

// amountIn reads the amount behind a formula: "menthol C10H20O 90 g", "C5H12O 0.50 mol".
func amountIn(t *testing.T, text string) Amount {
	t.Helper()
	words := strings.Fields(text)
	quantity := strings.Join(words[len(words)-2:], " ")
	if strings.HasSuffix(quantity, "mol") {
		return sure(ParseAmount(quantity))(t)
	}
	formula := sure(ParseFormula(words[len(words)-3]))(t)
	return formula.MolarMass().Of(sure(ParseMass(quantity))(t))
}

// sure returns a function that fails the test on an error and otherwise gives the
// value: sure(f())(t).
func sure[T any](value T, err error) func(*testing.T) T {
	return func(t *testing.T) T {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
		return value
	}
}

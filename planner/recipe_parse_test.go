package planner

import (
	"errors"
	"math/rand/v2"
	"strings"
	"testing"

	"stillroom/chem"
)

const smallRecipe = `recipe: small
title: Salt
version: "1"
product: sodium chloride
limiting: sodium hydroxide
yield: {mean: 90 %, spread: 0 %, basis: prior}
vessels:
  pot: {ware: beaker}
reactions:
  salt:
    consumes: {sodium hydroxide: 1, hydrochloric acid: 1}
    forms: {sodium chloride: 1, water: 1}
steps:
`

// withSteps is the small recipe with these steps.
func withSteps(steps string) string { return smallRecipe + steps }

func TestParseRecipeNamesEveryFault(t *testing.T) {
	text := withSteps(`  - do: charge
    name: base
    vessel: pot
    colour: red
    charges:
      - {substance: sodium hydroxide, equivalents: many}
      - {substance: unobtainium, equivalents: 1}
      - {substance: water, per-mole: 3 furlongs}
      - {substance: water, per-mole: 30 mL, fixed: 3 mL}
  - do: simmer
    name: fire
    vessel: pot
  - do: cool
    name: down
    vessel: kettle
    to: 10
`)
	_, err := ParseRecipe("small.yaml", []byte(text))
	var faults *RecipeErrors
	if !errors.As(err, &faults) {
		t.Fatalf("ParseRecipe gave %v, want *RecipeErrors", err)
	}
	want := []string{
		`small.yaml:17:5: unknown key "colour" in step 1 (charge)`,
		`small.yaml:19:52: equivalents "many": no number`,
		`small.yaml:20:10: no such substance "unobtainium"`,
		`small.yaml:21:38: per-mole "3 furlongs": unknown unit "furlongs"`,
		`small.yaml:22:10: the charge of water says its amount 2 times`,
		`small.yaml:23:9: unknown step kind "simmer"`,
		`small.yaml:26:5: step 3 names the vessel "kettle", which isn't declared`,
		`small.yaml:29:9: to "10": no unit`,
	}
	for i, w := range want {
		if i >= len(faults.Faults) || !strings.HasPrefix(faults.Faults[i].Error(), w) {
			t.Errorf("fault %d: want %q; all faults:\n%v", i, w, err)
			break
		}
	}
	if len(faults.Faults) != len(want) {
		t.Errorf("%d faults, want %d:\n%v", len(faults.Faults), len(want), err)
	}
	for _, f := range faults.Faults {
		if f.Expected == "" {
			t.Errorf("%v says nothing of what was expected", f)
		}
	}
}

func TestParseRecipeRefusesBrokenYAML(t *testing.T) {
	for _, text := range []string{"", "recipe: [", "- a\n- b", "recipe: x\nrecipe: y\n", "\t"} {
		_, err := ParseRecipe("x.yaml", []byte(text))
		var faults *RecipeErrors
		if !errors.As(err, &faults) || len(faults.Faults) == 0 || faults.Faults[0].Line < 1 {
			t.Errorf("ParseRecipe(%q) = %v, want *RecipeErrors with a line", text, err)
		}
	}
}

func TestUnbalancedReactionIsRefusedByElement(t *testing.T) {
	text := strings.Replace(withSteps(`  - do: charge
    name: base
    vessel: pot
    charges:
      - {substance: sodium hydroxide, equivalents: 1}
      - {substance: hydrochloric acid, equivalents: 1, strength: 36 % to 38 %, solution: yes}
  - do: react
    name: salt
    vessel: pot
    reactions:
      - {reaction: salt, conversion: 100 %}
    time: 1 min
`), "forms: {sodium chloride: 1, water: 1}", "forms: {sodium chloride: 1, water: 2}", 1)
	r, err := ParseRecipe("small.yaml", []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	_, err = Compile(r)
	var step *StepError
	if !errors.As(err, &step) || !errors.Is(err, ErrUnbalanced) || step.Step != 2 || !strings.Contains(step.What, "H differs by +2") {
		t.Errorf("Compile = %v, want step 2 refused for H by +2", err)
	}
}

func TestEveryStepKindIsKnown(t *testing.T) {
	for _, kind := range StepKinds() {
		if newOperation(kind) == nil {
			t.Errorf("step kind %q has no operation", kind)
		}
	}
	used := map[string]bool{}
	for _, r := range Recipes() {
		for _, s := range r.Steps {
			used[s.Do] = true
		}
	}
	for _, kind := range StepKinds() {
		if !used[kind] {
			t.Errorf("no recipe of the demonstration lab uses %q", kind)
		}
	}
}

// Recipes with bytes changed at random are refused or walked, never a panic, a
// balance that is off, or a walk without end.
func TestDamagedRecipes(t *testing.T) {
	alphabet := []byte("0123456789 :{}[]-%,abcxyz\n\"°")
	r := rand.New(rand.NewPCG(1, 2))
	walked := 0
	for range 300 {
		text := []byte(Recipes()[r.IntN(len(Recipes()))].Text)
		for range 1 + r.IntN(4) {
			text[r.IntN(len(text))] = alphabet[r.IntN(len(alphabet))]
		}
		recipe, err := ParseRecipe("x.yaml", text)
		if err != nil {
			continue
		}
		p, err := Compile(recipe)
		if err != nil {
			continue
		}
		w, err := p.Walk(labConditions(0.5))
		if err != nil {
			continue
		}
		walked++
		if !(w.Balance <= balanceTolerance) || !chem.Finite(w.Product.Mass) {
			t.Errorf("balance off by %v, product %v", w.Balance, w.Product.Mass)
		}
	}
	if walked < 20 {
		t.Errorf("only %d of 300 damaged recipes could be walked: the test has lost its meaning", walked)
	}
}

func FuzzParseRecipe(f *testing.F) {
	for _, r := range Recipes() {
		f.Add(r.Text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		r, err := ParseRecipe("x.yaml", []byte(text))
		if (r == nil) == (err == nil) {
			t.Errorf("ParseRecipe gave %v, %v", r, err)
		}
		if err != nil {
			return
		}
		p, err := Compile(r)
		if err != nil {
			return
		}
		if w, err := p.Walk(labConditions(0.5)); err == nil && !(w.Balance <= balanceTolerance) {
			t.Errorf("a walk that balances to %v only was let through", w.Balance)
		}
	})
}

// A file that is no recipe doesn't come back whole in its own error message.
func TestFaultsAreShort(t *testing.T) {
	_, err := ParseRecipe("noise.yaml", []byte(strings.Repeat("noise ", 5000)))
	var faults *RecipeErrors
	if !errors.As(err, &faults) {
		t.Fatalf("ParseRecipe of noise = %v, want *RecipeErrors", err)
	}
	for _, f := range faults.Faults {
		if n := len(f.Error()); n > 2*longestFault {
			t.Errorf("a fault of %d bytes, want at most %d: %.80s…", n, 2*longestFault, f)
		}
	}
}

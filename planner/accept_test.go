package planner

import (
	"slices"
	"strings"
	"testing"

	"stillroom/inventory"
)

func TestInCommon(t *testing.T) {
	instead := []Substitute{{Substance: "calcium chloride", Factor: 1.1}}
	for _, c := range []struct {
		name       string
		a, b, both Accept
		clash      string
	}{
		{name: "a bound against none", a: Accept{Least: 0.99}, both: Accept{Least: 0.99}},
		{name: "windows overlap", a: Accept{Least: 0.93, Most: 0.98, Solution: true}, b: Accept{Least: 0.95, Most: 0.99, Solution: true}, both: Accept{Least: 0.95, Most: 0.98, Solution: true}},
		{name: "windows touch", a: Accept{Most: 0.37}, b: Accept{Least: 0.37}, both: Accept{Least: 0.37, Most: 0.37}},
		{name: "windows apart", a: Accept{Least: 0.95, Most: 0.98}, b: Accept{Most: 0.1}, clash: "no stock is both 95 to 98 % and at most 10 %"},
		{name: "leave of one isn't leave of both", a: Accept{Hydrate: true, Solution: true, WithAdditive: true, Substitutes: instead}},
		{name: "any grade against one", a: Accept{Grades: []string{"reagent"}}, both: Accept{Grades: []string{"reagent"}}},
		{name: "a grade in common", a: Accept{Grades: []string{"reagent", "HPLC"}}, b: Accept{Grades: []string{"hplc"}}, both: Accept{Grades: []string{"HPLC"}}},
		{name: "no grade in common", a: Accept{Grades: []string{"reagent"}}, b: Accept{Grades: []string{"HPLC", "dry"}}, clash: "no grade is both reagent and HPLC or dry"},
		{name: "the same substitute", a: Accept{Substitutes: instead}, b: Accept{Substitutes: instead}, both: Accept{Substitutes: instead}},
	} {
		both, clash := inCommon(c.a, c.b)
		if clash != c.clash {
			t.Errorf("%s: clash %q, want %q", c.name, clash, c.clash)
		}
		if c.clash == "" && !(both.Least == c.both.Least && both.Most == c.both.Most && both.Hydrate == c.both.Hydrate && both.Solution == c.both.Solution &&
			both.WithAdditive == c.both.WithAdditive && slices.Equal(both.Grades, c.both.Grades) && slices.Equal(both.Substitutes, c.both.Substitutes)) {
			t.Errorf("%s: %+v, want %+v", c.name, both, c.both)
		}
	}
}

// What a run asks of one substance is one need over all its charges, hidden
// ones among them, unless no stock would do for all.
func TestOneNeedPerSubstance(t *testing.T) {
	lab := dichromateLab()
	lab.Substances = append(lab.Substances, inventory.Substance{ID: 3, Name: "ethyl acetate", Formula: "C4H8O2"})
	ask := func(step string, accept Accept) Ask {
		a := testAsk(t, "ethyl acetate", "C4H8O2", 1, accept)
		a.StepName = step
		return a
	}
	rinse := ask("rinse", Accept{Most: 0.999})
	rinse.Hidden, rinse.Key, rinse.Why = true, "rinses", "held back"
	a := &asked{asks: []Ask{ask("extract", Accept{Least: 0.99}), rinse, ask("wash", Accept{Most: 0.5})}}
	plan := planOf(t, a, inventory.NewShelf(lab), grams(50))
	if len(plan.Needs) != 2 {
		t.Fatalf("%d needs, want one for extract and rinse and one for the wash", len(plan.Needs))
	}
	n := plan.Needs[0]
	if got := strings.Join(n.For, ", "); got != "extract, rinse" {
		t.Errorf("the need is for %s", got)
	}
	if n.Hidden || len(n.Parts) != 1 || n.Parts[0].Key != "rinses" {
		t.Errorf("hidden %v, parts %+v, want the rinse as a part of a need that isn't hidden", n.Hidden, n.Parts)
	}
	for _, n := range plan.Needs {
		if !strings.Contains(n.Because, "no stock is both 99 to 99.9 % and at most 50 %") {
			t.Errorf("%v doesn't say why it stands alone: %s", n.For, n.Because)
		}
	}
}

package views

import (
	"slices"
	"strings"
	"testing"

	"stillroom/planner"
)

// Every pair of the chart is said exactly once, and the pairs that end in fire,
// explosion or toxic gas aren't among those that only warm up.
func TestGroupPairsSaysEveryPairOnce(t *testing.T) {
	p := paperPlan(t)
	groups := groupPairs(p)
	count := map[[2]string]int{}
	for _, g := range slices.Concat(groups.Grave, groups.Mild) {
		for _, k := range g.Kinds {
			for _, with := range k.Partners {
				count[[2]string{min(g.With, with.Name), max(g.With, with.Name)}]++
			}
		}
	}
	for _, pair := range p.Pairs {
		if n := count[[2]string{min(pair.A, pair.B), max(pair.A, pair.B)}]; n != 1 {
			t.Errorf("%s and %s said %d times, want once", pair.A, pair.B, n)
		}
	}
	if len(count) != len(p.Pairs) {
		t.Errorf("%d pairs said of %d", len(count), len(p.Pairs))
	}
	for _, g := range groups.Mild {
		for _, k := range g.Kinds {
			for _, word := range []string{"fire", "explosion", "toxic gas", "flammable gas formation; ", "unknown"} {
				if strings.Contains(strings.ReplaceAll(k.Consequences, "innocuous and non-flammable gas", ""), word) {
					t.Errorf("%s: %s is among the mild ones", g.With, k.Consequences)
				}
			}
		}
	}
}

// EPA-600/2-80-076 has H F for alcohols and glycols (4) with strong oxidisers
// (104). The made-up plan adds the alcohol to the oxidant in step 3, and the
// ester solvent comes near the oxidant in no step.
func TestGroupPairsNamesTheStep(t *testing.T) {
	groups := groupPairs(paperPlan(t))
	i := slices.IndexFunc(groups.Grave, func(g pairGroup) bool { return g.With == "sodium dichromate" })
	if i != 0 {
		t.Fatalf("the oxidant's group is number %d, want the first", i+1)
	}
	steps := map[string]int{}
	for _, k := range groups.Grave[0].Kinds {
		for _, with := range k.Partners {
			if strings.Contains(k.Consequences, "fire") {
				steps[with.Name] = with.Step
			}
		}
	}
	if got, ok := steps["1-pentanol"]; !ok || got != 3 {
		t.Errorf("oxidant and alcohol meet in step %d (listed: %v), want 3", got, ok)
	}
	if got, ok := steps["ethyl acetate"]; !ok || got != 0 {
		t.Errorf("oxidant and ethyl acetate meet in step %d (listed: %v), want in none", got, ok)
	}
}

// What somebody looked at and found no class for isn't called unknown, and what
// nobody looked at isn't called unclassified.
func TestCodesText(t *testing.T) {
	for _, tc := range []struct {
		note planner.HazardNote
		want string
	}{
		{planner.HazardNote{Basis: "not classified, from memory, unverified: read the supplier's sheet"}, "not classified"},
		{planner.HazardNote{Basis: "no data: not assessed, read the supplier's sheet"}, "no data"},
		{planner.HazardNote{}, "no data"},
		{planner.HazardNote{Basis: "harmonised (CLP Annex VI Table 3)", Statements: []string{"H225 Highly flammable liquid and vapour", "EUH066 Repeated exposure"}}, "H225, EUH066"},
	} {
		if got := codesText(tc.note); got != tc.want {
			t.Errorf("codesText(%q) = %q, want %q", tc.note.Basis, got, tc.want)
		}
	}
}

package planner

import (
	"testing"

	"stillroom/inventory"
)

// A run planned by itself among the others finds what it finds on the slate,
// byte for byte by its fingerprint; one that moves before the others finds what
// it would find alone.
func TestPlanAmongAgreesWithTheSlate(t *testing.T) {
	today := inventory.NewDate(2026, 12, 1)
	shelf := inventory.NewShelf(inventory.DemoLab(today))
	var runs []SlateRun
	for _, r := range shelf.Runs {
		recipe, ok := RecipeByName(r.Recipe)
		if !ok {
			t.Fatalf("no recipe %q", r.Recipe)
		}
		runs = append(runs, SlateRun{r, recipe})
	}
	slate := SlateOf(runs, shelf, today)
	differ := 0
	for i, l := range slate.Lines {
		req := requestOf(SlateRun{l.Run, l.Plan.Recipe}, today)
		among, err := PlanAmong(req, slate, shelf)
		if err != nil {
			t.Fatal(err)
		}
		if among.Revision != l.Plan.Revision {
			t.Errorf("run %d: %s among the others, %s on the slate", l.Run.ID, among.Revision, l.Plan.Revision)
		}
		alone, err := MakePlan(req, shelf)
		if err != nil {
			t.Fatal(err)
		}
		if i == 0 && alone.Revision != among.Revision {
			t.Error("the first run of the slate differs from the run alone")
		}
		if alone.Revision != among.Revision {
			differ++
		}
	}
	if differ == 0 {
		t.Error("no run of the slate is touched by those before it, so that the test shows nothing")
	}
	last := slate.Lines[len(slate.Lines)-1]
	req := requestOf(SlateRun{last.Run, last.Plan.Recipe}, today)
	req.On = today
	among, err := PlanAmong(req, slate, shelf)
	if err != nil {
		t.Fatal(err)
	}
	if alone, err := MakePlan(req, shelf); err != nil || alone.Revision != among.Revision {
		t.Errorf("moved before all others: %s, alone %s, %v", among.Revision, alone.Revision, err)
	}
}

package planner

import (
	"context"
	"slices"
	"testing"
	"time"

	"stillroom/inventory"
)

// A plan against the part of the shelf a recipe names is the plan against the
// whole shelf, whatever else stands there.
func TestPartOfTheShelfGivesTheSamePlan(t *testing.T) {
	today := inventory.NewDate(2026, 12, 1)
	noon := today.Time().Add(12 * time.Hour)
	ctx := context.Background()
	store, err := inventory.Open(ctx, inventory.Options{Memory: true, Now: func() time.Time { return noon }})
	if err != nil {
		t.Fatal(err)
	}
	defer store.Close()
	if err := store.Fill(ctx, inventory.DemoLab(today), inventory.Act{By: "test"}); err != nil {
		t.Fatal(err)
	}
	whole, err := store.Load(ctx)
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range Recipes() {
		names, err := SubstancesOf(r)
		if err != nil {
			t.Fatal(err)
		}
		part, err := store.LoadFor(ctx, names)
		if err != nil {
			t.Fatal(err)
		}
		if len(part.Bottles) == 0 || len(part.Bottles) >= len(whole.Bottles) {
			t.Errorf("%s: %d of %d bottles loaded", r.Name, len(part.Bottles), len(whole.Bottles))
		}
		req := Request{Recipe: r, Target: 0.02, On: today.AddDays(14), Today: today}
		a, errWhole := MakePlan(req, whole)
		b, errPart := MakePlan(req, part)
		if errWhole != nil || errPart != nil {
			t.Fatal(r.Name, errWhole, errPart)
		}
		if a.Revision != b.Revision {
			t.Errorf("%s: revision %s with the whole shelf, %s with its part", r.Name, a.Revision, b.Revision)
		}
		for _, n := range b.Needs {
			if !slices.Contains(names, n.Substance) && !slices.Contains(names, n.CAS) {
				t.Errorf("%s: a need of %s, which isn't named", r.Name, n.Substance)
			}
		}
	}
}

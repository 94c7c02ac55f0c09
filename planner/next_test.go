package planner

import (
	"testing"

	"stillroom/inventory"
)

// The bottle named to fall back on holds the same substance by the shelf's own
// records, stands where the shelf says, and nothing in the run is drawn from it.
// Where none is named, every other bottle of the substance is barred, drawn from
// or needs making up.
func TestNextBottle(t *testing.T) {
	lab := inventory.DemoLab(demoToday)
	shelf := inventory.NewShelf(lab)
	plan, err := MakePlan(demoRequest(t, "pentanoic-acid-dichromate", 50, 44), shelf)
	if err != nil {
		t.Fatal(err)
	}
	drawn := map[string]bool{}
	for _, n := range plan.Needs {
		for _, d := range n.Draws {
			drawn[d.Bottle.Code] = true
		}
	}
	named := 0
	for _, n := range plan.Needs {
		if n.Next == nil {
			continue
		}
		named++
		place, _ := shelf.Place(n.Next.Bottle.PlaceID)
		form, _ := shelf.Form(n.Next.Bottle.FormID)
		if drawn[n.Next.Bottle.Code] || n.Next.Place.String() != place.String() || n.Next.Form.Name != form.Name {
			t.Errorf("%s: next bottle %s of %s at %s", n.Substance, n.Next.Bottle.Code, n.Next.Form.Name, n.Next.Place)
		}
		if len(n.Draws) > 0 && n.Draws[0].Form.SubstanceID != form.SubstanceID {
			t.Errorf("%s: next bottle %s holds something else", n.Substance, n.Next.Bottle.Code)
		}
		for _, b := range n.Barred {
			if b.Bottle.Code == n.Next.Bottle.Code {
				t.Errorf("%s: next bottle %s is barred: %s", n.Substance, b.Bottle.Code, b.Why)
			}
		}
	}
	if named == 0 {
		t.Error("no need has a bottle to fall back on, though the lab keeps more than one of some")
	}
}

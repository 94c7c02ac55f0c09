package inventory

import (
	"math"
	"reflect"
	"testing"
	"time"

	"stillroom/chem"
)

var demoDay = NewDate(2026, time.December, 1)

func TestDemoLabIsTheSameOnTheSameDay(t *testing.T) {
	if !reflect.DeepEqual(DemoLab(demoDay), DemoLab(demoDay)) {
		t.Fatal("two demonstration labs of the same day differ")
	}
}

func TestDemoLabHoldsTogether(t *testing.T) {
	lab := DemoLab(demoDay)
	shelf := NewShelf(lab)
	if n := len(lab.Bottles); n < 85 || n > 95 {
		t.Errorf("%d bottles, want some ninety", n)
	}
	for _, b := range lab.Bottles {
		form, ok := shelf.Form(b.FormID)
		if !ok {
			t.Errorf("bottle %s: no form %d", b.Code, b.FormID)
		}
		if _, ok := shelf.SubstanceByID(form.SubstanceID); !ok {
			t.Errorf("form %s: no substance", form.Name)
		}
		if place, ok := shelf.Place(b.PlaceID); !ok || place.StoreID != b.StoreID {
			t.Errorf("bottle %s: place %v in store %d, bottle in %d", b.Code, place, place.StoreID, b.StoreID)
		}
		if b.Content < 0 || b.Content > b.Size {
			t.Errorf("bottle %s of %s holds %d of %d", b.Code, form.Name, b.Content, b.Size)
		}
		if (b.State == Sealed) == b.Opened.Set() {
			t.Errorf("bottle %s of %s is %s and was opened %q", b.Code, form.Name, b.State, b.Opened)
		}
		var promised int64
		for _, e := range shelf.EarmarksOn(b.ID) {
			promised += e.Amount
		}
		if promised > b.Content {
			t.Errorf("bottle %s of %s holds %d and %d are promised", b.Code, form.Name, b.Content, promised)
		}
		if code, err := NormalCode(b.Code); err != nil || code != b.Code {
			t.Errorf("bottle code %q: %v", b.Code, err)
		}
	}
}

// The faults are those of the demonstration lab's description in README.md.
func TestDemoLabHasItsFaults(t *testing.T) {
	shelf := NewShelf(DemoLab(demoDay))
	dichromate, ok := shelf.Substance("sodium dichromate dihydrate")
	if !ok || dichromate.Name != "sodium dichromate" {
		t.Fatalf("the dihydrate's name leads to %+v", dichromate)
	}
	if byNumber, _ := shelf.Substance("7789-12-0"); byNumber.ID != dichromate.ID {
		t.Errorf("the dihydrate's number leads to %+v", byNumber)
	}
	for _, f := range shelf.FormsOf(dichromate.ID) {
		if f.HydrateWaters != 2 {
			t.Errorf("%s is no dihydrate", f.Name)
		}
	}
	expired := 0
	ether, _ := shelf.Substance("diethyl ether")
	for _, f := range shelf.FormsOf(ether.ID) {
		for _, b := range shelf.BottlesOf(f.ID) {
			if b.Expiry < demoDay {
				expired++
				if b.PeroxideTested.Set() {
					t.Error("the expired ether has a peroxide test")
				}
			}
		}
	}
	if expired != 1 {
		t.Errorf("%d expired ethers, want 1", expired)
	}
	nearlyFull := 0
	for _, c := range shelf.Carboys {
		if float64(c.ContentUL) > .95*c.FillLimit*float64(c.SizeUL) {
			nearlyFull++
		}
	}
	if nearlyFull != 1 {
		t.Errorf("%d carboys nearly full, want 1", nearlyFull)
	}
	states := map[RunState]bool{}
	for _, r := range shelf.Runs {
		states[r.State] = true
	}
	if len(states) != 5 {
		t.Errorf("runs in %d states, want all 5", len(states))
	}
}

// The embedded table knows every substance that has a number, under the same
// name or synonym, and the formulas agree.
func TestDemoLabAgreesWithTheTable(t *testing.T) {
	lab := DemoLab(demoDay)
	for _, s := range lab.Substances {
		if s.CAS == "" {
			continue
		}
		known, ok := chem.SubstanceByCAS(s.CAS)
		if !ok || !ValidCAS(s.CAS) {
			t.Errorf("%s: CAS %s isn't in the table", s.Name, s.CAS)
			continue
		}
		if byName, ok := chem.LookupSubstance(s.Name); !ok || byName.CAS != s.CAS {
			t.Errorf("%s: the table doesn't know the name", s.Name)
		}
		if s.Formula != "" && formulaFits(s.Formula, known) != nil {
			t.Errorf("%s: formula %s, the table has %s", s.Name, s.Formula, known.Formula)
		}
	}
	shelf := NewShelf(lab)
	for _, f := range lab.Forms {
		s, _ := shelf.SubstanceByID(f.SubstanceID)
		if hydrate, ok := chem.SubstanceByCAS(f.CAS); f.CAS != "" && (!ok || hydrate.Hydrate() != f.HydrateWaters) {
			t.Errorf("%s: CAS %s, %v waters", f.Name, f.CAS, f.HydrateWaters)
		}
		if f.DensityGML == 0 || f.Diluent == "" || f.Additive != "" {
			continue
		}
		d, err := chem.SolutionDensity(s.CAS, f.Assay(), chem.Celsius(20))
		if got := f.DensityGML; err != nil || math.Abs(d.GramsPerMillilitre()-got) > .01 {
			t.Errorf("%s: density %v, the solution table has %v, %v", f.Name, got, d.GramsPerMillilitre(), err)
		}
	}
}

package views

import (
	"reflect"
	"testing"

	"stillroom/inventory"
	"stillroom/planner"
)

// Every field of an offer has to reach the fingerprint, also one that is added
// to the type later.
func TestFingerprintSeesEveryFieldOfAnOffer(t *testing.T) {
	m := newMemory()
	of := func(o inventory.Offer) uint64 {
		return m.fingerprint(inventory.NewShelf(inventory.Lab{Offers: []inventory.Offer{o}}))
	}
	plain := of(inventory.Offer{})
	for i := range reflect.TypeFor[inventory.Offer]().NumField() {
		var o inventory.Offer
		f := reflect.ValueOf(&o).Elem().Field(i)
		switch f.Kind() {
		case reflect.Int, reflect.Int64:
			f.SetInt(1)
		case reflect.String:
			f.SetString("x")
		case reflect.Slice:
			f.Set(reflect.MakeSlice(f.Type(), 1, 1))
		default:
			t.Fatalf("field %s is of a kind the test doesn't know", reflect.TypeFor[inventory.Offer]().Field(i).Name)
		}
		if of(o) == plain {
			t.Errorf("field %s doesn't change the fingerprint", reflect.TypeFor[inventory.Offer]().Field(i).Name)
		}
	}
}

// A plan is made once for the same question and anew when the stock changes.
func TestPlansAreRemembered(t *testing.T) {
	made := 0
	s := newSampleServer(t)
	s.Plan = func(req planner.Request, shelf *inventory.Shelf) (*planner.Plan, error) {
		made++
		return samplePlan(req, shelf)
	}
	for _, step := range []struct {
		name string
		do   func()
		want int
	}{
		{"first", func() { get(t, s, "/runs/1") }, 1},
		{"again", func() { get(t, s, "/runs/1") }, 1},
		{"explained", func() { get(t, s, "/runs/1/explain/need-1") }, 1},
		{"another target", func() { get(t, s, "/runs/1?wanted=70+g") }, 2},
		{"a bottle counted", func() {
			post(t, s, "/shelf/bottles/"+s.firstBottle(t)+"/count", "amount", "20 mL", "by", "weighed", "who", "Ines", "key", "1")
			get(t, s, "/runs/1")
		}, 3},
		{"moved along", func() {
			post(t, s, "/runs/1/stand", "to", "cleared", "who", "Ines", "key", "2")
			get(t, s, "/runs/1")
		}, 4},
	} {
		step.do()
		if made != step.want {
			t.Errorf("%s: %d plans made, want %d", step.name, made, step.want)
		}
	}
}

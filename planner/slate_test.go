package planner

import (
	"math"
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
)

// oneNeedSlate plans runs that ask only for sodium dichromate, 0.7 mol for a
// mole, against 300 g of the dihydrate.
func oneNeedSlate(t *testing.T, lab inventory.Lab, runs ...inventory.Run) *Slate {
	t.Helper()
	shelf := inventory.NewShelf(lab)
	s := slating{shelf: shelf, today: onDay - 2, claims: map[int64]int64{}}
	s.planFor = func(req Request, shelf *inventory.Shelf, claims map[int64]int64) (*Plan, error) {
		a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{Hydrate: true})}, molar: 102.13 * chem.GramPerMole}
		p := planning{req: req, shelf: shelf, program: a, claims: claims}
		return p.plan()
	}
	var list []SlateRun
	for _, r := range runs {
		list = append(list, SlateRun{r, &Recipe{Name: "test", Limiting: "1-pentanol"}})
	}
	return s.slate(list)
}

func run(id int64, days int, target float64) inventory.Run {
	return inventory.Run{ID: id, StoreID: 1, Recipe: "test", TargetUG: int64(target * 1e6), On: onDay.AddDays(days), State: inventory.Pencilled}
}

// Each run sees what earlier promises leave it: 50 g of product take
// 0.8160 mol · 0.7 = 0.5712 mol of dichromate, 171.1 g of the dihydrate of
// 99.5 %; of the 297.5 g that can be got out the second run finds 126.4 g.
func TestSlateNetsInDateOrder(t *testing.T) {
	s := oneNeedSlate(t, dichromateLab(), run(1, 5, 50), run(2, 1, 50))
	if s.Lines[0].Run.ID != 2 || s.Lines[1].Run.ID != 1 {
		t.Fatalf("runs in the order %d, %d, want by date", s.Lines[0].Run.ID, s.Lines[1].Run.ID)
	}
	first, second := needOf(t, s.Lines[0].Plan, "sodium dichromate"), needOf(t, s.Lines[1].Plan, "sodium dichromate")
	if first.State > Tight || second.State != Short {
		t.Errorf("states %v and %v, want the earlier run covered and the later short", first.State, second.State)
	}
	moles := 50 / 102.13 / 0.6 * 0.7
	if got, want := second.Draws[0].Mass.Grams(), 297.5-moles*297.995/.995; math.Abs(got-want) > 0.05 {
		t.Errorf("second run draws %.3f g, want the %.3f g left", got, want)
	}
	line := s.TimeLines[0]
	if line.RunsOut != onDay.AddDays(5) || len(line.Events) != 2 {
		t.Errorf("time line runs out on %v with %d events, want the second run's day", line.RunsOut, len(line.Events))
	}
	if got, want := line.Events[1].Balance.Grams(), 300*.995*261.965/297.995-2*moles*261.965; math.Abs(got-want) > 0.1 {
		t.Errorf("balance at the end %.3f g, want %.3f g", got, want)
	}
}

// What a run has earmarked isn't promised to it once more.
func TestSlateCountsEarmarksOnce(t *testing.T) {
	lab := dichromateLab()
	lab.Earmarks = []inventory.Earmark{{ID: 1, BottleID: 1, RunID: 2, Amount: 180e6}}
	s := oneNeedSlate(t, lab, run(2, 1, 50), run(1, 5, 30))
	if n := needOf(t, s.Lines[1].Plan, "sodium dichromate"); n.State > Tight {
		t.Errorf("second run %v (%s): 300 g less 180 g earmarked leave enough for 103 g", n.State, n.Because)
	}
}

func TestSlateLeavesOutClosedRuns(t *testing.T) {
	closed := run(3, 0, 50)
	closed.State = inventory.Closed
	if s := oneNeedSlate(t, dichromateLab(), closed, run(1, 5, 50)); len(s.Lines) != 1 {
		t.Errorf("%d runs on the slate, want one", len(s.Lines))
	}
}

// Expiries and orders stand on the time line: the bottle is lost the day it
// expires, after a run of that day.
func TestSlateTimeLineEvents(t *testing.T) {
	lab := dichromateLab()
	lab.Bottles[0].Expiry = onDay.AddDays(3)
	lab.Offers = []inventory.Offer{{ID: 1, FormID: 1, Supplier: "S", PackSize: 500e6, LeadDays: 3, LeadDays90: 8}}
	lab.Orders = []inventory.Order{{ID: 1, OfferID: 1, FormID: 1, Packs: 1, Ordered: onDay - 2, Due: onDay.AddDays(4), State: inventory.OrderUnderWay}}
	s := oneNeedSlate(t, lab, run(1, 3, 20), run(2, 9, 20))
	var kinds []string
	for _, e := range s.TimeLines[0].Events {
		kinds = append(kinds, e.Kind)
	}
	if got := strings.Join(kinds, " "); got != "run expiry order run" {
		t.Errorf("events %q, want the run, the expiry of that day, the order, the next run", got)
	}
}

func testPlanning(t *testing.T, lab inventory.Lab, target float64, days int) *planning {
	t.Helper()
	a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{Hydrate: true})}, molar: 102.13 * chem.GramPerMole}
	req := Request{Recipe: &Recipe{Name: "test", Limiting: "1-pentanol"}, Target: grams(target), On: onDay.AddDays(days), Today: onDay - 2}
	return &planning{req: req, shelf: inventory.NewShelf(lab), program: a}
}

// The largest batch follows from the bottle by proportion: 297.5 g of dihydrate
// of 99.5 % hold 0.99333 mol, 1.4190 mol of limiting reagent, 86.96 g of product.
func TestOutlookLargest(t *testing.T) {
	o, err := testPlanning(t, dichromateLab(), 50, 3).outlook()
	if err != nil {
		t.Fatal(err)
	}
	want := 297.5 * .995 / 297.995 / 0.7 * 0.6 * 102.13
	if math.Abs(o.Largest.Grams()-want) > 1e-3*want || o.Limits != "sodium dichromate" {
		t.Errorf("largest %.3f g, limited by %q, want %.3f g", o.Largest.Grams(), o.Limits, want)
	}
	if o.Earliest != onDay-2 {
		t.Errorf("earliest %v, want today", o.Earliest)
	}
}

// Short of dichromate, an offer takes 8 days and one for receiving; an order
// under way is due in 6 days.
func TestOutlookEarliest(t *testing.T) {
	lab := dichromateLab()
	lab.Offers = []inventory.Offer{{ID: 1, FormID: 1, Supplier: "S", Currency: "EUR", PriceMinor: 100, PackSize: 500e6, LeadDays: 3, LeadDays90: 8}}
	o, err := testPlanning(t, lab, 150, 1).outlook()
	if err != nil {
		t.Fatal(err)
	}
	if o.Earliest.Set() || o.EarliestBuying != (onDay-2).AddDays(9) {
		t.Errorf("earliest %v, buying %v, want none and nine days from today", o.Earliest, o.EarliestBuying)
	}
	lab.Orders = []inventory.Order{{ID: 1, OfferID: 1, FormID: 1, Packs: 1, Ordered: onDay - 4, Due: (onDay - 2).AddDays(6), State: inventory.OrderUnderWay}}
	if o, err = testPlanning(t, lab, 150, 1).outlook(); err != nil || o.Earliest != (onDay-2).AddDays(6) {
		t.Errorf("earliest %v, %v, want the day the order is due", o.Earliest, err)
	}
}

// Late by an order: covered on the day it is due.
func TestPlanLate(t *testing.T) {
	lab := dichromateLab()
	lab.Offers = []inventory.Offer{{ID: 1, FormID: 1, Supplier: "S", Currency: "EUR", PriceMinor: 100, PackSize: 500e6, LeadDays: 3, LeadDays90: 8}}
	lab.Orders = []inventory.Order{{ID: 1, OfferID: 1, FormID: 1, Packs: 1, Ordered: onDay - 4, Due: onDay.AddDays(6), State: inventory.OrderUnderWay}}
	plan, err := testPlanning(t, lab, 150, 1).plan()
	if err != nil {
		t.Fatal(err)
	}
	n := needOf(t, plan, "sodium dichromate")
	if n.State != Late || n.CoveredOn != onDay.AddDays(6) {
		t.Errorf("state %v, covered on %v, want late until the order is due: %s", n.State, n.CoveredOn, n.Because)
	}
}

// Half of the orders of the median lead time have come by then: P(late) given
// that an order of today is wanted in 3 days less one for receiving.
func TestLateChance(t *testing.T) {
	p := testPlanning(t, dichromateLab(), 50, 2) // four days from today
	p.policy = newPolicyTable(p.shelf.Policy)
	m, err := newMatcher(p.req, p.shelf, p.policy)
	if err != nil {
		t.Fatal(err)
	}
	offer := inventory.Offer{LeadDays: 3, LeadDays90: 8}
	if got := m.lateChance(inventory.Order{Ordered: onDay - 2, Due: onDay}, offer); math.Abs(got-0.5) > 1e-9 {
		t.Errorf("chance of being late %.4f at the median, want 0.5", got)
	}
	p.req.On = onDay.AddDays(7)
	m.req = p.req
	if got := m.lateChance(inventory.Order{Ordered: onDay - 2, Due: onDay}, offer); math.Abs(got-0.1) > 1e-9 {
		t.Errorf("chance of being late %.4f at the ninth decile, want 0.1", got)
	}
}

// Every rung that applies is there, in the order of design §4.6, and what it
// promises holds.
func TestLadder(t *testing.T) {
	lab := dichromateLab()
	base := lab.Bottles[0]
	other := base
	other.ID, other.Code, other.StoreID, other.PlaceID = 3, "D2", 2, 2
	lab.Bottles[0].Content = 150e6
	lab.Bottles = append(lab.Bottles, other)
	lab.Earmarks = []inventory.Earmark{{ID: 1, BottleID: 1, RunID: 9, Amount: 60e6, Ends: onDay - 5}}
	lab.Offers = []inventory.Offer{{ID: 1, FormID: 1, Supplier: "S", Currency: "EUR", PriceMinor: 2000, OrderFee: 500, PackSize: 250e6, LeadDays: 1, LeadDays90: 2}}
	rungs, err := testPlanning(t, lab, 40, 4).ladder()
	if err != nil {
		t.Fatal(err)
	}
	var acts []string
	byAct := map[string]Rung{}
	for _, r := range rungs {
		acts = append(acts, r.Act)
		byAct[r.Act] = r
	}
	if got := strings.Join(acts, " "); got != "free borrow split shrink buy" {
		t.Fatalf("rungs %q", got)
	}
	for _, act := range acts {
		if r := byAct[act]; !r.Works || r.Text == "" {
			t.Errorf("%s doesn't work: %+v", act, r)
		}
	}
	if b := byAct["buy"]; b.Cost != 2500 || b.Left <= 0 || b.On > onDay.AddDays(4) {
		t.Errorf("buy %+v, want one pack and the fee, in time", b)
	}
	if s := byAct["split"]; math.Abs(s.Target.Grams()-20) > 1e-9 {
		t.Errorf("split into runs of %.3f g, want 20 g", s.Target.Grams())
	}
}

func TestLadderOfCoveredRun(t *testing.T) {
	if rungs, err := testPlanning(t, dichromateLab(), 20, 4).ladder(); err != nil || rungs != nil {
		t.Errorf("ladder of a covered run: %+v, %v", rungs, err)
	}
}

// Short of dichromate with offers of two suppliers: the cheapest that arrives in
// time is taken, the dearer one if only that does; the hydrate is converted.
func TestPlanBuys(t *testing.T) {
	lab := dichromateLab()
	lab.Offers = []inventory.Offer{
		{ID: 1, FormID: 1, Supplier: "Slow", Item: "S1", Currency: "EUR", PriceMinor: 1000, OrderFee: 100, PackSize: 500e6, LeadDays: 8, LeadDays90: 20},
		{ID: 2, FormID: 1, Supplier: "Quick", Item: "Q1", Currency: "EUR", PriceMinor: 3000, OrderFee: 200, Surcharge: 50, PackSize: 250e6, LeadDays: 1, LeadDays90: 2},
	}
	for _, tc := range []struct {
		days int
		item string
		cost int64
	}{{30, "S1", 1100}, {5, "Q1", 3250}} {
		plan, err := testPlanning(t, lab, 120, tc.days).plan()
		if err != nil {
			t.Fatal(err)
		}
		if len(plan.Buy) != 1 || plan.Buy[0].Offer.Item != tc.item || plan.Buy[0].Cost != tc.cost || !plan.Buy[0].InTime {
			t.Fatalf("in %d days: %+v, want %s for %d in time", tc.days, plan.Buy, tc.item, tc.cost)
		}
		// What is left over is the pack's anhydrous content less what was short.
		n, b := needOf(t, plan, "sodium dichromate"), plan.Buy[0]
		want := float64(b.Offer.PackSize)*1e-6*.995*261.965/297.995 - n.Short.Grams()
		if math.Abs(b.Leftover.Grams()-want) > 0.01 {
			t.Errorf("left over %.3f g, want %.3f g", b.Leftover.Grams(), want)
		}
		if want := onDay.AddDays(tc.days).AddDays(-b.Offer.LeadDays90 - 1); b.OrderBy != want {
			t.Errorf("order by %v, want %v: the lead time and a day for receiving before the run", b.OrderBy, want)
		}
	}
}

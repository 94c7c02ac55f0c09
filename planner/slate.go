package planner

import (
	"cmp"
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// SlateRun is a run to be planned on the slate, with its recipe; a nil recipe
// is a run whose recipe could not be read.
type SlateRun struct {
	Run    inventory.Run
	Recipe *Recipe
}

// SlateLine is a run of the slate with what it finds once the runs before it
// have been served.
type SlateLine struct {
	Run  inventory.Run
	Plan *Plan
	Err  error // why there is no plan
}

// Slate is the runs to come, in date order, and what they do to the stock.
type Slate struct {
	Lines     []SlateLine
	TimeLines []TimeLine // by substance
}

// Event is something that changes the stock of a substance.
type Event struct {
	On   inventory.Date
	Kind string // "run", "expiry", "order"
	What string // the run's recipe, the bottle's code, the supplier
	Run  int64  // of a "run"
	// Change and Balance are of the pure substance, or pieces.
	Change, Balance             chem.Mass
	ChangePieces, BalancePieces float64
}

// TimeLine is the stock of one substance over time: what is fit today, then
// every draw, expiry and arrival.
type TimeLine struct {
	Substance   string
	Count       bool
	Start       chem.Mass
	StartPieces float64
	Events      []Event
	// RunsOut is the first day on which what the runs ask is no longer there;
	// no date if that doesn't happen within the slate.
	RunsOut inventory.Date
}

// SlateOf plans the runs in the order of their dates, then of their numbers,
// each against what the promises of earlier ones leave. Closed and dropped runs
// are left out. What a run draws counts as promised for those after it, as far
// as its earmarks don't cover that already.
func SlateOf(runs []SlateRun, shelf *inventory.Shelf, today inventory.Date) *Slate {
	s := slating{shelf: shelf, today: today, claims: map[int64]int64{}, planFor: planAgainst}
	return s.slate(runs)
}

type slating struct {
	shelf   *inventory.Shelf
	today   inventory.Date
	claims  map[int64]int64
	planFor func(Request, *inventory.Shelf, map[int64]int64) (*Plan, error)
}

func (s *slating) slate(runs []SlateRun) *Slate {
	runs = slices.DeleteFunc(slices.Clone(runs), func(r SlateRun) bool {
		return r.Run.State == inventory.Closed || r.Run.State == inventory.Dropped
	})
	slices.SortStableFunc(runs, func(a, b SlateRun) int {
		return cmp.Or(cmp.Compare(a.Run.On, b.Run.On), cmp.Compare(a.Run.ID, b.Run.ID))
	})
	slate := &Slate{}
	for _, r := range runs {
		plan, err := s.planFor(requestOf(r, s.today), s.shelf, s.claims)
		slate.Lines = append(slate.Lines, SlateLine{r.Run, plan, err})
		if plan != nil {
			s.claim(r.Run.ID, plan)
		}
	}
	slate.TimeLines = s.timeLines(slate.Lines)
	return slate
}

func requestOf(r SlateRun, today inventory.Date) Request {
	return Request{
		Recipe: r.Recipe, Target: inventory.MassUnits(r.Run.TargetUG), On: r.Run.On,
		Today: today, Run: r.Run.ID, Store: r.Run.StoreID,
	}
}

// claim promises what a plan draws to its run.
func (s *slating) claim(run int64, plan *Plan) {
	drawn := map[int64]int64{}
	for i := range plan.Needs {
		for k := range plan.Needs[i].Draws {
			d := &plan.Needs[i].Draws[k]
			drawn[d.Bottle.ID] += d.Units()
		}
	}
	for bottle, units := range drawn {
		for _, e := range s.shelf.EarmarksOn(bottle) {
			if e.RunID == run {
				units -= e.Amount
			}
		}
		if units > 0 {
			s.claims[bottle] += units
		}
	}
}

// Units is the draw in the ledger units of its bottle, rounded up.
func (d *Draw) Units() int64 {
	if d.Form.Measure == inventory.ByCount {
		n, _ := inventory.UnitsUp(chem.Mass(d.Pieces * 1e-9))
		return n
	}
	if d.HasVolume {
		n, _ := inventory.UnitsUp(d.Volume)
		return min(n, d.Bottle.Content)
	}
	n, _ := inventory.UnitsUp(d.Mass)
	return min(n, d.Bottle.Content)
}

// timeLines sets the events of every substance that a run of the slate asks
// for beside each other.
func (s *slating) timeLines(lines []SlateLine) []TimeLine {
	byName := map[string]*history{}
	for _, l := range lines {
		if l.Plan == nil {
			continue
		}
		for i := range l.Plan.Needs {
			n := &l.Plan.Needs[i]
			h := byName[n.Substance]
			if h == nil {
				h = s.history(n)
				byName[n.Substance] = h
			}
			h.asks = append(h.asks, asking{l.Run, l.Plan.Recipe.Name, n})
		}
	}
	names := make([]string, 0, len(byName))
	for name := range byName {
		names = append(names, name)
	}
	slices.Sort(names)
	var out []TimeLine
	for _, name := range names {
		out = append(out, byName[name].line())
	}
	return out
}

// asking is a run's need of a substance.
type asking struct {
	run    inventory.Run
	recipe string
	need   *Need
}

// history gathers what happens to a substance.
type history struct {
	name    string
	count   bool
	today   inventory.Date
	bottles []held
	orders  []Event
	asks    []asking
}

// held is a bottle with what is left in it.
type held struct {
	id   int64
	code string
	ends inventory.Date
	left float64 // pure, or pieces
}

// history starts with the bottles that are fit today but for their date, and
// the orders under way.
func (s *slating) history(n *Need) *history {
	h := &history{name: n.Substance, count: n.Count, today: s.today}
	substance, ok := s.shelf.Substance(n.Substance)
	if !ok {
		return h
	}
	m, err := newMatcher(Request{On: s.today, Today: s.today}, s.shelf, newPolicyTable(s.shelf.Policy))
	if err != nil {
		return h
	}
	d := demand{name: n.Substance, substance: substance, known: true, count: n.Count, accept: Accept{Hydrate: true, Solution: true, WithAdditive: true}}
	if n.Amount > 0 {
		d.molar = chem.MolarMass(float64(n.Mass) / float64(n.Amount))
	}
	for _, x := range m.match(&d).fits {
		h.bottles = append(h.bottles, held{x.bottle.ID, x.bottle.Code, x.life, float64(x.bottle.Content) * x.pure})
	}
	m.eachForm(&d, func(f *formMatch) {
		for _, o := range s.shelf.OrdersOf(f.form.ID) {
			if offer, ok := m.offer(f.form.ID, o.OfferID); ok && o.State == inventory.OrderUnderWay {
				h.orders = append(h.orders, h.event(max(o.Due, s.today), "order", offer.Supplier, f.purePack(offer)*float64(o.Packs)))
			}
		}
	})
	return h
}

func (h *history) event(on inventory.Date, kind, what string, change float64) Event {
	e := Event{On: on, Kind: kind, What: what}
	if h.count {
		e.ChangePieces = change
	} else {
		e.Change = chem.Mass(change)
	}
	return e
}

// line plays the events through in order: arrivals of a day before its runs,
// expiries after, since a bottle is good on its last day.
func (h *history) line() TimeLine {
	t := TimeLine{Substance: h.name, Count: h.count}
	balance := 0.0
	for _, b := range h.bottles {
		balance += b.left
	}
	if h.count {
		t.StartPieces = balance
	} else {
		t.Start = chem.Mass(balance)
	}
	events := slices.Clone(h.orders)
	for _, a := range h.asks {
		events = append(events, h.draw(a))
	}
	last := inventory.Date(0)
	for _, e := range events {
		last = max(last, e.On)
	}
	for _, b := range h.bottles {
		if b.ends.Set() && b.ends <= last && b.left > 0 {
			events = append(events, h.event(b.ends, "expiry", b.code, -b.left))
		}
	}
	rank := map[string]int{"order": 0, "run": 1, "expiry": 2}
	slices.SortStableFunc(events, func(a, b Event) int {
		return cmp.Or(cmp.Compare(a.On, b.On), cmp.Compare(rank[a.Kind], rank[b.Kind]), cmp.Compare(a.Run, b.Run))
	})
	for i := range events {
		balance += float64(events[i].Change) + events[i].ChangePieces
		if h.count {
			events[i].BalancePieces = balance
		} else {
			events[i].Balance = chem.Mass(balance)
		}
		if balance < -1e-12 && !t.RunsOut.Set() {
			t.RunsOut = events[i].On
		}
	}
	t.Events = events
	return t
}

// draw is what a run asks, and takes what it draws out of its bottles, so that
// these have less left when they expire.
func (h *history) draw(a asking) Event {
	n := a.need
	asked := float64(n.Mass)
	if h.count {
		asked = n.Pieces
	}
	for i := range n.Draws {
		for k := range h.bottles {
			if h.bottles[k].id == n.Draws[i].Bottle.ID {
				h.bottles[k].left = max(0, h.bottles[k].left-float64(n.Draws[i].Pure)-n.Draws[i].Pieces)
			}
		}
	}
	e := h.event(a.run.On, "run", a.recipe, -asked)
	e.Run = a.run.ID
	return e
}

// planAgainst makes a plan against a shelf of which some is promised besides
// the earmarks, in ledger units by bottle.
func planAgainst(req Request, shelf *inventory.Shelf, claims map[int64]int64) (*Plan, error) {
	p, err := newPlanning(req, shelf)
	if err != nil {
		return nil, err
	}
	p.claims = claims
	return p.plan()
}

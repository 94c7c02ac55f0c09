package planner

import (
	"fmt"
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// Rung is one way out of a shortfall.
type Rung struct {
	Act  string // "weigh", "free", "borrow", "another form", "split", "shrink", "buy", "move"
	Text string // what to do, in words
	// Works says that every need would be covered or tight with it; the other
	// figures then say how.
	Works    bool
	On       inventory.Date
	Target   chem.Mass
	Cost     int64 // minor units of Currency
	Currency string
	Left     chem.Mass // left over of what was bought, all substances together
	Enough   float64   // chance that everything suffices; negative for not assessed
}

// LadderOf answers a shortfall by the ladder, cheapest rung first: weigh the
// doubtful bottle, free a lapsed earmark, borrow from another store, another
// form with conversion, split, shrink, buy, move the date. Rungs that can't
// apply are left out; those that apply and don't suffice say so. A request that
// is covered has no ladder. The error is that of the request itself.
func LadderOf(req Request, shelf *inventory.Shelf) ([]Rung, error) {
	p, err := newPlanning(req, shelf)
	if err != nil {
		return nil, err
	}
	return p.ladder()
}

func (p *planning) ladder() ([]Rung, error) {
	plan, err := p.again(nil)
	if err != nil {
		return nil, err
	}
	if plan.Verdict == Covered {
		return nil, nil
	}
	l := laddering{planning: p, plan: plan}
	var rungs []Rung
	for _, step := range []func() (Rung, bool){l.weigh, l.free, l.borrow, l.anotherForm, l.split, l.shrink, l.buy, l.move} {
		if r, ok := step(); ok {
			rungs = append(rungs, r)
		}
	}
	return rungs, nil
}

// again plans anew after a change.
func (p *planning) again(change func(*planning)) (*Plan, error) {
	try := planning{req: p.req, shelf: p.shelf, program: p.program, claims: p.claims}
	if change != nil {
		change(&try)
	}
	return try.plan()
}

type laddering struct {
	*planning
	plan *Plan
}

// rung plans with a change and writes down what it brings.
func (l *laddering) rung(act, text string, change func(*planning)) (Rung, bool) {
	plan, err := l.again(change)
	if err != nil {
		return Rung{}, false
	}
	return Rung{
		Act: act, Text: text, Works: plan.Verdict <= Tight, On: plan.On, Target: plan.Target.Mass,
		Enough: plan.Risk.RunEnough,
	}, true
}

// worthWeighing is the fall of the risk below which weighing isn't worth saying:
// what rounding to whole per cents would hide.
const worthWeighing = 0.005

// weigh helps where the doubt is in a bottle's content.
func (l *laddering) weigh() (Rung, bool) {
	code := l.plan.Risk.WeighFirst
	if code == "" || l.plan.Verdict > Tight || l.plan.Risk.WeighBefore-l.plan.Risk.WeighAfter < worthWeighing {
		return Rung{}, false
	}
	text := "weigh %s; if it holds what the record says, everything suffices with %s"
	if l.plan.Risk.LookOnly {
		text = "make sure that %s is there; then everything suffices with %s"
	}
	return Rung{
		Act: "weigh", Text: fmt.Sprintf(text, code, percent(1-l.plan.Risk.WeighAfter)),
		Works: true, On: l.plan.On, Target: l.plan.Target.Mass, Enough: 1 - l.plan.Risk.WeighAfter,
	}, true
}

// wanted are the substances that aren't covered.
func (l *laddering) wanted() []*Need {
	var list []*Need
	for i := range l.plan.Needs {
		if l.plan.Needs[i].State > Tight {
			list = append(list, &l.plan.Needs[i])
		}
	}
	return list
}

func (l *laddering) free() (Rung, bool) {
	var ids []int64
	var names []string
	for _, n := range l.wanted() {
		for _, b := range l.bottlesOf(n.Substance) {
			for _, e := range l.shelf.EarmarksOn(b.ID) {
				if e.Ends.Set() && e.Ends < l.req.Today && e.RunID != l.req.Run {
					ids = append(ids, e.ID)
					names = append(names, fmt.Sprintf("run %d's on %s", e.RunID, b.Code))
				}
			}
		}
	}
	if len(ids) == 0 {
		return Rung{}, false
	}
	return l.rung("free", "free the earmarks that have lapsed: "+joined(names), func(p *planning) {
		p.req.Free = append(slices.Clone(p.req.Free), ids...)
	})
}

func (l *laddering) bottlesOf(substance string) []inventory.Bottle {
	s, ok := l.shelf.Substance(substance)
	if !ok {
		return nil
	}
	var list []inventory.Bottle
	forms := l.shelf.FormsOf(s.ID)
	for i := range forms {
		list = append(list, l.shelf.BottlesOf(forms[i].ID)...)
	}
	return list
}

func (l *laddering) borrow() (Rung, bool) {
	home := homeStore(l.req, l.shelf)
	var stores []int64
	var names []string
	for _, n := range l.wanted() {
		for _, b := range n.Barred {
			if b.Kind != string(barStore) || b.Bottle.StoreID == home {
				continue
			}
			if !slices.Contains(stores, b.Bottle.StoreID) {
				stores = append(stores, b.Bottle.StoreID)
			}
			place, _ := l.shelf.Place(b.Bottle.PlaceID)
			names = append(names, fmt.Sprintf("%s from %s", b.Bottle.Code, firstOf(place.Store, "another store")))
		}
	}
	if len(stores) == 0 {
		return Rung{}, false
	}
	return l.rung("borrow", "borrow "+joined(names), func(p *planning) {
		p.req.Leave = append(slices.Clone(p.req.Leave), stores...)
	})
}

// anotherForm allows hydrates and other grades where the recipe doesn't, but
// never a hydrate in a drying step. It is the chemist's decision.
func (l *laddering) anotherForm() (Rung, bool) {
	var names []string
	for _, n := range l.wanted() {
		for _, b := range n.Barred {
			if b.Kind == string(barGrade) || b.Kind == string(barHydrate) && !l.dries(n) {
				names = append(names, fmt.Sprintf("%s (%s)", b.Bottle.Code, b.Form.Name))
			}
		}
	}
	if len(names) == 0 {
		return Rung{}, false
	}
	text := "take " + joined(names) + " with conversion, if whoever answers for the recipe agrees: it doesn't allow that form"
	return l.rung("another form", text, func(p *planning) { p.relax = l.relaxed() })
}

func (l *laddering) dries(n *Need) bool {
	for _, s := range l.plan.Steps {
		if s.Do == "dry" && slices.Contains(n.For, s.Name) {
			return true
		}
	}
	return false
}

func (l *laddering) relaxed() func(*Ask) {
	dry := map[int]bool{}
	for _, s := range l.plan.Steps {
		dry[s.N] = s.Do == "dry"
	}
	return func(a *Ask) {
		a.Accept.Grades = nil
		a.Accept.Hydrate = a.Accept.Hydrate || !dry[a.Step]
	}
}

// mostParts is into how many runs it is worth splitting one of which only the
// first can be made.
const mostParts = 4

// split looks for the fewest equal parts of which the first can be made from
// the shelf.
func (l *laddering) split() (Rung, bool) {
	for k := 2; k <= mostParts; k++ {
		target := l.req.Target / chem.Mass(k)
		text := fmt.Sprintf("split into %d runs of %s: the shelf suffices for the first", k, massText(target))
		if r, ok := l.rung("split", text, func(p *planning) { p.req.Target = target }); ok && r.Works {
			return r, true
		}
	}
	return Rung{}, false
}

func (l *laddering) shrink() (Rung, bool) {
	most, limits := l.largest()
	if most <= 0 || most >= l.req.Target {
		return Rung{}, false
	}
	text := fmt.Sprintf("make %s, the most the shelf allows; %s sets the limit", massText(most), limits)
	return l.rung("shrink", text, func(p *planning) { p.req.Target = most })
}

func (l *laddering) buy() (Rung, bool) {
	if len(l.plan.Buy) == 0 {
		return Rung{}, false
	}
	r := Rung{Act: "buy", On: l.plan.On, Target: l.plan.Target.Mass, Works: true, Enough: -1}
	var names []string
	for _, b := range l.plan.Buy {
		r.Cost += b.Cost
		r.Currency = b.Currency
		r.Left += b.Leftover
		r.Works = r.Works && b.InTime
		r.On = max(r.On, b.Arrives)
		names = append(names, fmt.Sprintf("%d × %s %s from %s by %s", b.Packs, b.Form.Name, b.Offer.Item, b.Offer.Supplier, max(b.OrderBy, l.req.Today).Short()))
	}
	for _, n := range l.wanted() {
		r.Works = r.Works && len(n.buys) > 0
	}
	r.Text = "order " + joined(names)
	if !r.Works && r.On > l.plan.On {
		r.Text += "; all of it is there by " + r.On.Short()
	}
	return r, true
}

func (l *laddering) move() (Rung, bool) {
	days, err := l.dates()
	if err != nil {
		return Rung{}, false
	}
	for _, on := range days {
		if on <= l.req.On {
			continue
		}
		verdict, buys, err := l.tryOn(on)
		if err != nil {
			return Rung{}, false
		}
		if verdict <= Tight {
			return l.rung("move", "move the run to "+on.Short()+": the shelf and the orders under way cover it then", func(p *planning) { p.req.On = on })
		}
		if buys {
			r, ok := l.rung("move", "order today and move the run to "+on.Short(), func(p *planning) { p.req.On = on })
			r.Works, r.Enough = ok, -1
			return r, ok
		}
	}
	return Rung{}, false
}

// joined lists names, the first five of them.
func joined(names []string) string {
	slices.Sort(names)
	names = slices.Compact(names)
	more := ""
	if len(names) > 5 {
		more = fmt.Sprintf(" and %d more", len(names)-5)
		names = names[:5]
	}
	text := ""
	for i, n := range names {
		if i > 0 {
			text += ", "
		}
		text += n
	}
	return text + more
}

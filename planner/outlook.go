package planner

import (
	"errors"
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// Outlook answers what a lab manager asks besides: when, and how much.
type Outlook struct {
	// Earliest is the first day on which the shelf and the orders under way
	// cover the run; EarliestBuying the same if what is short is ordered today.
	// No date means not within the policy's horizon.
	Earliest, EarliestBuying inventory.Date
	// Largest is the most product that can start today from the shelf; Limits
	// names the substance that sets it.
	Largest chem.Mass
	Limits  string
}

// OutlookOf works the request backwards: the earliest dates and the largest
// batch. The error is that of the request itself.
func OutlookOf(req Request, shelf *inventory.Shelf) (Outlook, error) {
	p, err := newPlanning(req, shelf)
	if err != nil {
		return Outlook{}, err
	}
	return p.outlook()
}

func (p *planning) outlook() (Outlook, error) {
	if err := p.req.check(); err != nil {
		return Outlook{}, err
	}
	var o Outlook
	days, err := p.dates()
	if err != nil {
		return o, err
	}
	for _, on := range days {
		verdict, buys, err := p.tryOn(on)
		if err != nil {
			return o, err
		}
		if verdict <= Tight && !o.Earliest.Set() {
			o.Earliest = on
		}
		if !o.EarliestBuying.Set() && (verdict <= Tight || buys) {
			o.EarliestBuying = on
		}
		if o.Earliest.Set() {
			break
		}
	}
	o.Largest, o.Limits = p.largest()
	return o, nil
}

// dates are the days on which something can change for the better: today, the
// day asked for, and the days on which what is short can arrive.
func (p *planning) dates() ([]inventory.Date, error) {
	try := planning{req: p.req, shelf: p.shelf, program: p.program, claims: p.claims, light: true}
	if _, err := try.plan(); err != nil {
		return nil, err
	}
	today := p.req.Today
	horizon := today.AddDays(int(try.policy.value("slate.horizon")))
	days := []inventory.Date{today, p.req.On}
	for i := range try.covers {
		if c := &try.covers[i]; c.alloc.short > 0 {
			days = append(days, try.matcher.arrivals(c)...)
		}
	}
	slices.Sort(days)
	days = slices.Compact(days)
	return slices.DeleteFunc(days, func(d inventory.Date) bool { return d < today || d > horizon && d != p.req.On }), nil
}

// arrivals are the days on which orders under way are due and offers would
// arrive if ordered today.
func (m *matcher) arrivals(c *coverage) []inventory.Date {
	var days []inventory.Date
	receiving := int(m.policy.value("buy.receiving-days"))
	m.eachForm(&c.demand, func(f *formMatch) {
		for _, o := range m.shelf.OrdersOf(f.form.ID) {
			if o.State == inventory.OrderUnderWay {
				days = append(days, o.Due)
			}
		}
		for _, o := range m.shelf.OffersOf(f.form.ID) {
			days = append(days, m.req.Today.AddDays(max(o.LeadDays, o.LeadDays90)+receiving))
		}
	})
	return days
}

// tryOn plans for a day and reports the verdict, and whether all that is short
// could be bought in time.
func (p *planning) tryOn(on inventory.Date) (State, bool, error) {
	try := planning{req: p.req, shelf: p.shelf, program: p.program, claims: p.claims, light: true}
	try.req.On = on
	plan, err := try.plan()
	if err != nil {
		return Short, false, err
	}
	for i := range plan.Needs {
		n := &plan.Needs[i]
		if n.State <= Tight {
			continue
		}
		if len(n.buys) == 0 || !plan.Buy[n.buys[0]].InTime {
			return plan.Verdict, false, nil
		}
	}
	return plan.Verdict, true, nil
}

// suffices reports whether fit bottles cover a target today, and if not, of
// what there is too little.
func (p *planning) suffices(target chem.Mass) (bool, string) {
	try := planning{req: p.req, shelf: p.shelf, program: p.program, claims: p.claims}
	try.req.Target, try.req.On = target, p.req.Today
	try.policy = newPolicyTable(p.shelf.Policy)
	if try.chooseScale() != nil {
		return false, "the recipe"
	}
	if err := try.fitAndMatch(); err != nil {
		if errors.Is(err, ErrNoVessel) {
			return false, "vessels"
		}
		return false, "the recipe"
	}
	for i := range try.covers {
		if try.covers[i].alloc.short > 0 {
			return false, try.covers[i].demand.name
		}
	}
	return true, ""
}

// largest doubles the target until something runs out, then halves the
// interval.
func (p *planning) largest() (chem.Mass, string) {
	low, high, limits := chem.Mass(0), p.req.Target, ""
	for range 20 {
		ok, what := p.suffices(high)
		if !ok {
			limits = what
			break
		}
		low, high = high, 2*high
	}
	if limits == "" {
		return low, ""
	}
	for range int(newPolicyTable(p.shelf.Policy).value("slate.steps")) {
		if high-low <= low*1e-4 {
			break
		}
		mid := (low + high) / 2
		if ok, what := p.suffices(mid); ok {
			low = mid
		} else {
			high, limits = mid, what
		}
	}
	return low, limits
}

package inventory

import (
	"cmp"
	"fmt"
	"slices"

	"stillroom/chem"
)

// ToCount is a bottle of the daily short list of a stock-take.
type ToCount struct {
	Bottle Bottle
	Form   StockForm
	Place  Place
	Why    []string // the weightiest reason first
	Weight int
}

// The weights of the reasons, each more than all weaker ones together: what is
// promised soon, regulated, lapsing, long unseen, missing (common practice:
// count by risk, not by price).
const (
	weighsMissing = 1 << iota
	weighsUnseen
	weighsLapsing
	weighsRegulated
	weighsPromised
)

// ShortList returns the bottles that are most worth looking at today, at most as
// many as the policy's stocktake.list, in walking order. It needs the policy's
// stocktake rows and leaves out what they don't say.
func (s *Shelf) ShortList(today Date) []ToCount {
	var list []ToCount
	for _, b := range s.Bottles {
		switch b.State {
		case Empty, Discarded:
			continue
		}
		form, _ := s.Form(b.FormID)
		c := ToCount{Bottle: b, Form: form}
		c.Place, _ = s.Place(b.PlaceID)
		s.weigh(&c, today)
		if c.Weight > 0 && b.MeasuredOn != today {
			list = append(list, c)
		}
	}
	slices.SortFunc(list, func(a, b ToCount) int {
		return cmp.Or(cmp.Compare(b.Weight, a.Weight), cmp.Compare(a.Bottle.MeasuredOn, b.Bottle.MeasuredOn), cmp.Compare(a.Bottle.Code, b.Bottle.Code))
	})
	if most, ok := s.Policy.Value("stocktake.list"); ok && len(list) > int(most) {
		list = list[:int(most)]
	}
	slices.SortStableFunc(list, func(a, b ToCount) int { return cmp.Compare(a.Place.Walk, b.Place.Walk) })
	return list
}

func (s *Shelf) weigh(c *ToCount, today Date) {
	add := func(weight int, why string, args ...any) {
		c.Weight += weight
		c.Why = append(c.Why, fmt.Sprintf(why, args...))
	}
	b := c.Bottle
	if days, ok := s.Policy.Value("stocktake.promised-days"); ok {
		for _, m := range s.EarmarksOn(b.ID) {
			if m.ForDate >= today && m.ForDate <= today.AddDays(int(days)) {
				add(weighsPromised, "promised to run %d on %s", m.RunID, m.ForDate.Short())
				break
			}
		}
	}
	substance, _ := s.SubstanceByID(c.Form.SubstanceID)
	if notes := chem.PurchaseNotes(substance.Name, chem.Fraction(c.Form.AssayHigh)); len(notes) > 0 {
		add(weighsRegulated, "regulated: %s", notes[0].Instrument)
	}
	if days, ok := s.Policy.Value("stocktake.lapsing-days"); ok && b.Expiry >= today && b.Expiry <= today.AddDays(int(days)) {
		add(weighsLapsing, "lapses on %s", b.Expiry.Short())
	}
	if days, ok := s.Policy.Value("stocktake.unseen-days"); ok && b.MeasuredOn.Set() && b.MeasuredOn.AddDays(int(days)) < today {
		add(weighsUnseen, "unseen since %s", b.MeasuredOn.Short())
	}
	if b.State == Missing {
		add(weighsMissing, "missing")
	}
}

package planner

import (
	"cmp"
	"slices"
)

// mostSpares bounds the bottles named beside those drawn on.
const mostSpares = 2

// nameSpares adds fit bottles that aren't drawn on, the least trouble first,
// until the chance is within share.
func (a *assessor) nameSpares(r *needRisk, share float64) {
	before := r.chance
	for len(r.cover.need.Spares) < mostSpares && r.chance > share {
		x := a.nextSpare(r)
		if x == nil {
			break
		}
		spare := a.bottleRisk(x, 0)
		was := r.chance
		bottles := append(slices.Clone(r.bottles), spare)
		r.drawSpare(bottles)
		if r.chance >= was {
			break
		}
		r.bottles = bottles
		place, _ := a.m.shelf.Place(x.bottle.PlaceID)
		r.cover.need.Spares = append(r.cover.need.Spares, Spare{Bottle: *x.bottle, Form: *x.form, Place: place})
	}
	for k := range r.cover.need.Spares {
		s := &r.cover.need.Spares[k]
		s.Why = plainf("%s at hand as a spare takes the chance of running short from %.2g %% to %.2g %%", s.Bottle.Code, before*100, r.chance*100)
	}
}

// nameNext names the bottle to fetch if one drawn on turns out not to serve.
func (a *assessor) nameNext(r *needRisk) {
	var best *fit
	for i := range r.cover.found.fits {
		x := &r.cover.found.fits[i]
		if x.dilute || x.blended || x.free <= 0 || a.m.used[x.bottle.ID] > 0 {
			continue
		}
		if best == nil || lessTrouble(x, best) < 0 {
			best = x
		}
	}
	r.cover.need.Next = nil
	if best == nil {
		return
	}
	place, _ := a.m.shelf.Place(best.bottle.PlaceID)
	r.cover.need.Next = &Spare{Bottle: *best.bottle, Form: *best.form, Place: place, Why: "fit, and nothing in the run is drawn from it"}
}

// drawSpare looks again at the draws that are short: a further bottle can only
// help. What is certain of the bottles drawn on doesn't hold for the spares.
func (r *needRisk) drawSpare(bottles []bottleRisk) {
	bad := 0
	for i := range r.short {
		if r.short[i] {
			r.short[i] = r.shortOf(bottles, i)
			bad += b2i(r.short[i])
		}
	}
	r.chance = float64(bad) / float64(len(r.short))
}

// nextSpare is the fit bottle, neither drawn on nor a spare yet, that is the
// least trouble: opened, then the first to expire, then by code.
func (a *assessor) nextSpare(r *needRisk) *fit {
	var best *fit
	for i := range r.cover.found.fits {
		x := &r.cover.found.fits[i]
		if x.free <= a.m.used[x.bottle.ID] || slices.ContainsFunc(r.bottles, func(b bottleRisk) bool { return b.fit.bottle.ID == x.bottle.ID }) {
			continue
		}
		if best == nil || lessTrouble(x, best) < 0 {
			best = x
		}
	}
	return best
}

func lessTrouble(x, y *fit) int {
	return cmp.Or(
		cmp.Compare(b2i(x.sealed), b2i(y.sealed)),
		cmp.Compare(endOfLife(x.life), endOfLife(y.life)),
		cmp.Compare(x.bottle.Code, y.bottle.Code),
	)
}

package planner

import (
	"cmp"
	"slices"
)

// Blending: where the fit bottles aren't enough and the recipe allows a
// solution in a window of strengths, bottles below the window help out as long
// as the blend stays in it. With P and M the pure and the whole mass drawn so
// far, a bottle of strength w gives at most
//
//	x = (P/least − M) / (1/w − 1/least)
//
// of pure substance before the blend falls below the least strength.

// blend adds weaker bottles to an allocation that is short, the strongest
// first, ties first-expired-first-out. The fits of the coverage are replaced,
// because those found are shared between passes.
func (m *matcher) blend(c *coverage) {
	least := float64(c.demand.accept.Least)
	if c.alloc.short <= 0 || len(c.alloc.taken) == 0 || least <= 0 || len(c.found.weak) == 0 {
		return
	}
	pure, mass := 0.0, 0.0
	for _, t := range c.alloc.taken {
		x := &c.found.fits[t.line]
		pure += t.amount
		mass += t.amount / x.pure * x.content
	}
	found := *c.found
	found.fits = slices.Clone(found.fits)
	weak := slices.Clone(c.found.weak)
	slices.SortStableFunc(weak, func(a, b fit) int {
		return cmp.Or(cmp.Compare(b.share, a.share), cmp.Compare(endOfLife(a.life), endOfLife(b.life)), cmp.Compare(a.bottle.Code, b.bottle.Code))
	})
	for i := range weak {
		x := &weak[i]
		x.free -= m.used[x.bottle.ID]
		room := (pure/least - mass) / (1/float64(x.share) - 1/least)
		amount := min(c.alloc.short, float64(max(0, x.free))*x.pure, room)
		if amount <= c.demand.amount*enough {
			continue
		}
		x.blended = true
		c.alloc.taken = append(c.alloc.taken, taken{len(found.fits), amount})
		found.fits = append(found.fits, *x)
		found.barred = slices.DeleteFunc(slices.Clone(found.barred), func(b Barred) bool { return b.Bottle.ID == x.bottle.ID })
		pure += amount
		mass += amount / float64(x.share)
		if c.alloc.short -= amount; c.alloc.short <= c.demand.amount*enough {
			c.alloc.short = 0
			break
		}
	}
	c.found, c.blendOf = &found, pure/mass
}

// blends says of every blend what to heed.
func (p *planning) blends(plan *Plan) {
	for i := range p.covers {
		c := &p.covers[i]
		var weak []string
		for _, t := range c.alloc.taken {
			if x := &c.found.fits[t.line]; x.blended {
				weak = append(weak, x.bottle.Code)
			}
		}
		if len(weak) == 0 {
			continue
		}
		plan.Findings = append(plan.Findings, Finding{
			Kind: "blend", Severity: Warning, Step: c.need.Draws[0].Steps[0].Step,
			Text: plainf("%s is too weak by itself; blended with the stronger %s it makes %.3g %%, within what the recipe allows. "+
				"Pour the stronger into the weaker, slowly, stirred and cooled; the heat of blending is not assessed: treat it as large", joined(weak), c.demand.name, c.blendOf*100),
			Would: "a fit bottle instead",
		})
	}
}

package planner

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// coverage is a demand with the bottles found for it.
type coverage struct {
	demand demand
	found  *matches
	alloc  allocation
	need   Need
	first  inventory.Date // when the first fit bottle reaches its end of life
	coming coming
	// blendOf is the strength of a blend with bottles too weak alone; 0 for none.
	blendOf float64
	// onlyFinding says that it suffices for certain if its bottles are found.
	onlyFinding bool
}

// coverAll matches and allocates every demand. Demands of one substance share
// its bottles: the strictest is served first, so that nested acceptances are
// covered whenever that is possible at all.
func (m *matcher) coverAll(asks []Ask, demands []demand, limiting string) []coverage {
	covers := make([]coverage, len(demands))
	order := make([]int, len(demands))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(i, j int) int { return cmp.Compare(laxity(&demands[i]), laxity(&demands[j])) })
	prices := allocatePoints(m.policy)
	for k := 0; k < len(order); k++ {
		i := order[k]
		covers[i] = coverage{demand: demands[i], found: m.match(&demands[i]), need: demands[i].need(asks)}
		together := []*coverage{&covers[i]}
		if !demands[i].alone {
			together = m.likewise(asks, covers, demands, order, k)
			order = slices.DeleteFunc(order, func(j int) bool { return j != i && covers[j].found != nil && slices.Contains(together, &covers[j]) })
		}
		m.cover(asks, together, prices, limiting)
	}
	return covers
}

// likewise finds, behind the demand at order[k], those of the same substance
// that the same bottles are fit for: they are covered together, so that no
// bottle is opened twice over.
func (m *matcher) likewise(asks []Ask, covers []coverage, demands []demand, order []int, k int) []*coverage {
	first := &covers[order[k]]
	together := []*coverage{first}
	for _, j := range order[k+1:] {
		if !demands[j].known || demands[j].substance.ID != first.demand.substance.ID || demands[j].count != first.demand.count {
			continue
		}
		found := m.match(&demands[j])
		if !sameFits(found.fits, first.found.fits) {
			continue
		}
		covers[j] = coverage{demand: demands[j], found: found, need: demands[j].need(asks)}
		together = append(together, &covers[j])
	}
	return together
}

func sameFits(a, b []fit) bool {
	return slices.EqualFunc(a, b, func(x, y fit) bool {
		return x.bottle == y.bottle && x.pure == y.pure && x.free == y.free && x.dilute == y.dilute
	})
}

// laxity is small for a strict acceptance. Substances don't compete with each
// other, so that only the order within one matters.
func laxity(d *demand) float64 {
	a := d.accept
	lax := 4 * float64(1-a.Least)
	for _, allowed := range []bool{a.Hydrate, a.Solution, a.WithAdditive, len(a.Grades) == 0, a.Most == 0} {
		lax += float64(b2i(allowed))
	}
	return lax + float64(len(a.Substitutes))
}

// cover allocates demands that the same bottles are fit for as one, and hands
// what is drawn to them in their order.
func (m *matcher) cover(asks []Ask, together []*coverage, prices points, limiting string) {
	first := together[0]
	oneLot, amount := false, 0.0
	for _, c := range together {
		oneLot = oneLot || c.demand.name == limiting || c.demand.asksFor(asks, limiting)
		amount += c.demand.amount
	}
	lines := m.lines(first, oneLot)
	whole := allocate(amount, lines, prices)
	for _, c := range together {
		c.first = firstLife(lines)
		c.alloc = whole.part(c.demand.amount)
		m.blend(c)
		m.writeDraws(c, asks)
		m.writeAmounts(c)
	}
}

// part splits the next amount off an allocation; what is left of it stays.
func (a *allocation) part(amount float64) allocation {
	p := allocation{proven: a.proven, mixed: a.mixed, cost: a.cost}
	left := amount
	for left > amount*enough && len(a.taken) > 0 {
		t := &a.taken[0]
		use := min(left, t.amount)
		if t.amount-use <= t.amount*enough {
			use = t.amount
		}
		p.taken = append(p.taken, taken{t.line, use})
		left -= use
		if t.amount -= use; t.amount <= 0 {
			a.taken = a.taken[1:]
		}
	}
	if left > amount*enough {
		p.short = left
	}
	return p
}

// asksFor reports whether one of the demand's asks goes by that name.
func (d *demand) asksFor(asks []Ask, name string) bool {
	return slices.ContainsFunc(d.asks, func(i int) bool { return asks[i].Substance == name })
}

// lines puts fit bottles before the allocation. The limiting reagent keeps to
// one lot, and peroxide formers of different age aren't mixed, if that is
// possible (practice §4).
func (m *matcher) lines(c *coverage, oneLot bool) []line {
	lines := make([]line, len(c.found.fits))
	var place inventory.Place
	for i := range c.found.fits {
		x := &c.found.fits[i]
		if place.ID != x.bottle.PlaceID {
			place, _ = m.shelf.Place(x.bottle.PlaceID)
		}
		lines[i] = line{
			at: i, free: float64(x.free) * x.pure, all: float64(x.bottle.Content-m.dead(x)) * x.pure,
			life: x.life, sealed: x.sealed, walk: place.Walk, code: x.bottle.Code,
			heel: float64(m.uselessHeel(x)) * x.pure,
		}
		switch {
		case oneLot:
			lines[i].class = x.bottle.Lot
		case x.form.PeroxideTestDays > 0 && x.sealed:
			lines[i].class = "sealed"
		}
	}
	return lines
}

// dead is what can't be poured or scraped out, in ledger units.
func (m *matcher) dead(x *fit) int64 {
	if x.form.Measure == inventory.ByCount {
		return 0
	}
	return int64(m.unusable * float64(x.bottle.Size))
}

// uselessHeel is the remainder below which a bottle is of no use: a share of
// its size, for liquids also a volume, which counts up to twice that share so
// that a small bottle isn't useless from the start.
func (m *matcher) uselessHeel(x *fit) int64 {
	if x.form.Measure == inventory.ByCount {
		return 0
	}
	heel := m.heelShare * float64(x.bottle.Size)
	if x.form.Measure == inventory.ByVolume {
		heel = max(heel, min(m.heelUL, 2*heel))
	}
	return int64(heel)
}

// writeDraws turns the allocation into draws and shares them out to the steps.
func (m *matcher) writeDraws(c *coverage, asks []Ask) {
	c.need.Draws = make([]Draw, 0, len(c.alloc.taken))
	parts := newSharer(c, asks)
	for k, t := range c.alloc.taken {
		x := &c.found.fits[t.line]
		units := t.amount / x.pure
		c.need.Draws = append(c.need.Draws, m.draw(c, x, t.amount, units))
		d := &c.need.Draws[k]
		d.Steps = parts.share(t.amount, x)
		m.used[x.bottle.ID] += min(x.free, int64(math.Ceil(units*(1-enough))))
	}
}

func (m *matcher) draw(c *coverage, x *fit, amount, units float64) Draw {
	place, _ := m.shelf.Place(x.bottle.PlaceID)
	d := Draw{Bottle: *x.bottle, Form: *x.form, Place: place, Opens: x.sealed}
	left := max(0, float64(x.bottle.Content-m.used[x.bottle.ID])-units)
	if c.demand.count {
		d.Pieces, d.LeavesPieces = amount, left
	} else {
		d.Mass = chem.Mass(units * x.content)
		d.Pure = chem.Mass(amount)
		d.Leaves = chem.Mass(left * x.content)
	}
	if x.form.Measure == inventory.ByVolume {
		d.HasVolume = true
		d.Volume = chem.Volume(units) * chem.Microlitre
		d.LeavesVolume = chem.Volume(left) * chem.Microlitre
	}
	d.Why = m.whyDraw(c, x, left)
	d.Derivation = drawDerivation(c, x, amount, &d)
	return d
}

// whyDraw says why this bottle and this much.
func (m *matcher) whyDraw(c *coverage, x *fit, left float64) string {
	var why string
	switch {
	case x.sealed && len(c.alloc.taken) == 1:
		why = "the opened bottles aren't enough or there are none; this one has to be opened"
		if len(c.found.fits) == 1 {
			why = "the only fit bottle; it has to be opened"
		}
	case len(c.found.fits) == 1:
		why = "the only fit bottle"
	case x.sealed:
		why = "the opened ones aren't enough"
	case x.life.Set() && x.life == c.first:
		why = "the first of the fit bottles to expire, " + x.life.Short()
	default:
		why = "least trouble of the fit bottles by expiry, opening, number and walk"
	}
	if left <= float64(m.dead(x))+1 {
		why += "; finishes it"
	}
	if x.standsIn != "" {
		why += "; stands in for " + c.demand.name
	}
	if x.dilute {
		why += plainf("; stronger than asked (%.3g %%), so it is made up to %.3g %% first", x.top.Percent(), c.demand.accept.Most.Percent())
	}
	if x.blended {
		why += plainf("; too weak alone (%.3g %%), only as part of a blend of %.3g %%", x.strength.Percent(), c.blendOf*100)
	}
	if x.aged {
		why += plainf("; counted at %.3g %%, its strength on the day at room temperature: titrate it before use", x.strength.Percent())
	}
	if c.alloc.mixed && x.form.PeroxideTestDays > 0 {
		why += "; don't pour old and fresh together"
	}
	return why
}

func drawDerivation(c *coverage, x *fit, amount float64, d *Draw) chem.Derivation {
	if c.demand.count {
		return chem.Derivation{Of: x.form.Name, Formula: "N", Value: amount, Inserted: plainf("%.4g", amount), Source: "share of the need taken from this bottle"}
	}
	out := chem.Derivation{
		Of: x.form.Name + " out of " + x.bottle.Code, Formula: "m = mₚ / w", Unit: "g", Value: d.Mass.Grams(),
		Source: "conversion of pure, anhydrous substance to stock by mass",
	}
	pure := amount
	out.Inputs = append(out.Inputs, chem.Input{Symbol: "mₚ", Name: "pure, anhydrous " + c.demand.name + " from this bottle", Value: pure * 1e3, Unit: "g", Source: "the need, shared out between bottles"})
	if f := x.content * float64(x.share) / x.pure; math.Abs(f-1) > 1e-9 {
		out.Formula = "m = mₚ · f / w"
		out.Inputs = append(out.Inputs, chem.Input{Symbol: "f", Name: "mass of " + x.standsIn + " that does the work of one of " + c.demand.name, Value: f, Source: "recipe"})
		pure *= f
	}
	wSource := "low end of the label's range"
	if x.bottle.LotAssay > 0 {
		wSource = "assay of the lot"
	}
	if x.aged {
		wSource += ", less what it loses with age until the run"
	}
	if a := float64(x.share / x.strength); x.form.HydrateWaters > 0 {
		out.Formula += " / a"
		out.Inputs = append(out.Inputs, chem.Input{Symbol: "a", Name: fmt.Sprintf("anhydrous share of the hydrate with %g H₂O", x.form.HydrateWaters), Value: a, Source: "molar masses"})
	}
	out.Inputs = append(out.Inputs, chem.Input{Symbol: "w", Name: "assay of " + x.form.Name, Value: float64(x.strength), Source: wSource})
	out.Inserted = plainf("%.5g g / %.4g = %.5g g", pure*1e3, float64(x.share), d.Mass.Grams())
	if d.HasVolume {
		out.Notes = append(out.Notes, plainf("%.4g mL at %.4g g/mL (%s)", d.Volume.Millilitres(), x.form.DensityGML, firstOf(x.form.DensitySource, "source of the density: no data")))
	}
	return out
}

// writeAmounts fills in what the shelf holds, what is promised and what is
// short.
func (m *matcher) writeAmounts(c *coverage) {
	n := &c.need
	n.Barred, n.BarredMore = c.found.barred, c.found.more
	if c.demand.count {
		n.ShortPieces = c.alloc.short
		n.OnShelfPieces = c.found.onShelf
		n.EarmarkedPieces = c.found.promised
		return
	}
	n.OnShelf = chem.Mass(c.found.onShelf)
	n.Earmarked = chem.Mass(c.found.promised)
	n.Short = chem.Mass(c.alloc.short)
}

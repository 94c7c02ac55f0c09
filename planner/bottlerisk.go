package planner

import (
	"math"

	"stillroom/chem"
	"stillroom/inventory"
)

// bottleRisk is a bottle's part in a need.
type bottleRisk struct {
	fit      *fit
	missing  float64 // chance that it isn't found
	found    chem.Stream
	content  quantity // ledger units
	strength quantity // against the low end that was planned with
	off      float64  // ledger units that aren't for this need
	floor    float64  // what it gives at the least if it is found, in the unit of the need
	doubtful bool     // weighing would tell more
}

// isMissing reports whether the bottle isn't found in draw i.
func (b *bottleRisk) isMissing(i int) bool { return b.found.Uniform(i) < b.missing }

// have is what the bottle gives in draw i, in the unit of the need.
func (b *bottleRisk) have(i int) float64 {
	if b.isMissing(i) {
		return 0
	}
	return b.holds(i)
}

// holds is the same of a bottle that is found.
func (b *bottleRisk) holds(i int) float64 {
	return max(0, b.content.at(i)-b.off) * b.strength.at(i) * b.fit.pure
}

func (b *bottleRisk) least() float64 {
	return max(0, b.content.extreme(false)-b.off) * b.strength.extreme(false) * b.fit.pure
}

// bottleRisk sets up a bottle of which a need takes own ledger units.
func (a *assessor) bottleRisk(x *fit, own float64) bottleRisk {
	b := x.bottle
	r := bottleRisk{
		fit: x, missing: a.missing(x), found: chem.NewStream(a.seed, "found "+b.Code),
	}
	// What isn't for this need: promised, taken by other needs, dead.
	r.off = float64(x.promised+a.m.used[b.ID]+a.m.dead(x)) - own
	r.content, r.doubtful = a.content(x)
	r.strength = quantity{stream: chem.NewStream(a.seed, "assay "+b.Code), mean: 1, least: 1, most: 1}
	if x.top > x.strength && b.LotAssay == 0 && x.form.Measure != inventory.ByCount && !x.aged {
		r.strength.flat, r.strength.most = true, float64(x.top/x.strength)
	}
	r.floor = r.least()
	return r
}

// missing is the chance that a bottle isn't found, by when it was last seen.
func (a *assessor) missing(x *fit) float64 {
	if standsStill(x.bottle, x.form, a.m.policy.value("prior.missing.most-size")) {
		return 0
	}
	seen := max(x.bottle.MeasuredOn, x.bottle.Received, x.bottle.Opened)
	switch age := a.m.req.Today - seen; {
	case seen.Set() && age <= 30:
		return a.m.policy.value("prior.missing.recent")
	case seen.Set() && age <= 365:
		return a.m.policy.value("prior.missing.year")
	}
	return a.m.policy.value("prior.missing.older")
}

// standsStill reports whether a container is so large, in litres or kilograms,
// that it is neither mislaid nor carried.
func standsStill(b *inventory.Bottle, form *inventory.StockForm, most float64) bool {
	switch form.Measure {
	case inventory.ByMass:
		return float64(inventory.MassUnits(b.Size)) >= most
	case inventory.ByVolume:
		return inventory.VolumeUnits(b.Size).Litres() >= most
	}
	return false
}

// content is the distribution of what is in a bottle, by how that was found
// out, and whether weighing it would tell more.
func (a *assessor) content(x *fit) (quantity, bool) {
	b := x.bottle
	has, size := float64(b.Content), max(float64(b.Size), float64(b.Content))
	q := quantity{stream: chem.NewStream(a.seed, "content "+b.Code), mean: has, least: 0, most: size * 1.05}
	prior := func(key string) float64 { return a.m.policy.value("prior.content." + key) }
	switch b.MeasuredBy {
	case inventory.ByUnopened:
		q.flat, q.least, q.most = true, has*(1+prior("unopened-low")), has*(1+prior("unopened-high"))
		return q, false
	case inventory.ByWeighing:
		q.sd = has * prior("weighed")
		return q, false
	case inventory.ByLedger:
		q.sd = has * prior("ledger")
		if x.form.StorageClass == flammable && b.MeasuredOn.Set() {
			months := max(0, float64(a.m.req.On-b.MeasuredOn)/30)
			q.sd = math.Hypot(q.sd, has*prior("ledger-month")*months)
		}
	case inventory.ByLevel:
		q.sd = size * prior(levelKey(x.form))
	default: // guessed, or nobody said how
		q.sd = size * prior("guessed")
	}
	return q, x.form.Measure != inventory.ByCount
}

// levelKey takes a liquid's bottle for amber, because its glass isn't recorded
// and a level is read less surely through amber.
func levelKey(form *inventory.StockForm) string {
	if form.Measure == inventory.ByVolume {
		return "level-amber"
	}
	return "level-powder"
}

// weighed is the content once the bottle has been weighed, if what is thought
// to be in it is right.
func (a *assessor) weighed(b *bottleRisk) quantity {
	q := b.content
	q.sd = q.mean * a.m.policy.value("prior.content.weighed")
	return q
}

// enoughAbove is the random number above which the content, at the weakest the
// bottle may be, is more than an amount; 1 if there is none.
func (b *bottleRisk) enoughAbove(amount float64) float64 {
	units := amount/(b.strength.extreme(false)*b.fit.pure) + b.off
	q := &b.content
	switch {
	case q.dist != nil || q.sd == 0 || q.flat || units >= q.most:
		return 1
	case units < q.least:
		return 0
	}
	low, high := 0.0, 1.0
	for range 30 {
		if mid := (low + high) / 2; q.mean+float64(q.sd*standardNormal(mid)) > units {
			high = mid
		} else {
			low = mid
		}
	}
	return high
}

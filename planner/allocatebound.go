package planner

import (
	"cmp"
	"math"
	"slices"
)

// What keeps the search for bottles short: lines that can't be in a best answer
// are left out beforehand, and branches that can't beat it are not gone down.

// worthwhile leaves out lines that can't be in a best answer. With any price λ
// for a unit of amount, an answer that draws on the lines S costs at least
//
//	λ · need + Σ over S of rᵢ,   rᵢ = least points of line i less λ times its amount
//
// (Lagrangian relaxation), so a line is left out if λ · need, the negative rᵢ
// and its own come to more than an answer that is known. λ is the points for
// the last unit if bottles could be bought by the unit.
func (a *allocator) worthwhile() []int {
	keep := make([]int, 0, 64)
	known, price := a.known()
	floor := price * a.need
	for i := range a.lines {
		if a.lines[i].free > 0 {
			floor += min(0, a.reduced(&a.lines[i], price))
		}
	}
	// Half a thousandth of a point for the rounding of each draw, of 32 at the most.
	limit := known + 16
	for i := range a.lines {
		l := &a.lines[i]
		if l.free > 0 && floor+max(0, a.reduced(l, price)) <= limit {
			keep = append(keep, i)
		}
	}
	return keep
}

// reduced is rᵢ: the least of the line used up and of the line used in part.
func (a *allocator) reduced(l *line, price float64) float64 {
	fixed, later := a.fixed(l), a.later(l)/a.need
	part := fixed - max(0, price-later)*min(l.free, a.need)
	if l.free > a.need {
		return part
	}
	return min(part, fixed+later*l.free+a.heel(l, l.free)-price*l.free)
}

// known returns the points of an answer, and a price for a unit of amount: the
// least any line asks for one if some line is enough alone, else that of the
// last unit if bottles could be bought by the unit.
func (a *allocator) known() (points, price float64) {
	points, price = math.Inf(1), math.Inf(1)
	for i := range a.lines {
		l := &a.lines[i]
		if l.free <= 0 {
			continue
		}
		price = min(price, a.perUnit(l))
		if l.free >= a.need*(1-enough) {
			points = min(points, a.fixed(l)+a.later(l)+a.heel(l, a.need))
		}
	}
	if !math.IsInf(points, 1) {
		return points, price
	}
	return a.knownOfSeveral()
}

// perUnit is the least a unit out of a line costs.
func (a *allocator) perUnit(l *line) float64 {
	use := min(l.free, a.need)
	return (a.fixed(l) + a.later(l)*use/a.need + min(0, a.heel(l, use))) / use
}

func (a *allocator) knownOfSeveral() (points, price float64) {
	type offer struct {
		line  int
		ratio float64
	}
	offers := make([]offer, 0, len(a.lines))
	for i := range a.lines {
		if a.lines[i].free > 0 {
			offers = append(offers, offer{i, a.perUnit(&a.lines[i])})
		}
	}
	slices.SortFunc(offers, func(x, y offer) int { return cmp.Or(cmp.Compare(x.ratio, y.ratio), cmp.Compare(x.line, y.line)) })
	left := a.need
	for _, o := range offers {
		l := &a.lines[o.line]
		points += a.fixed(l) + a.later(l)*min(l.free, left)/a.need + a.p.useless
		left -= l.free
		price = o.ratio
		if left <= a.need*enough {
			break
		}
	}
	return points, price
}

// skipTwin reports whether the item before is the same but for its code and
// was left out: then this one can't be better.
func (a *allocator) skipTwin(k int) bool {
	if k == 0 || len(a.chosen) > 0 && a.chosen[len(a.chosen)-1] == k-1 {
		return false
	}
	x, y := &a.lines[a.items[k-1].line], &a.lines[a.items[k].line]
	return x.free == y.free && x.all == y.all && x.life == y.life && x.sealed == y.sealed &&
		x.walk == y.walk && x.heel == y.heel
}

// bound is what any choice with at least one more item from k on costs at the
// least: as many further bottles as the largest could do with, and the whole
// need at the least points for keeping longer. All chosen bottles but the one
// that keeps longest are used up then. Half a thousandth for each draw allows
// for rounding.
func (a *allocator) bound(k int, rest float64, cost int64) int64 {
	more := int64(1)
	if rest > 0 {
		more = max(more, int64(math.Ceil(rest/a.maxFree[k]*(1-1e-9))))
	}
	whole := cost + more*a.minFixed[k]
	if whole >= a.best.cost {
		return whole
	}
	last := -1
	for _, c := range a.chosen {
		if last < 0 || a.items[c].place > a.items[last].place {
			last = c
		}
	}
	left, linear := a.need, 0.0
	for _, c := range a.chosen {
		if c != last {
			left -= a.items[c].free
			linear += a.items[c].later * a.items[c].free / a.need
		}
	}
	linear += a.cheapestLater(left)
	return whole + int64((linear-0.5*float64(int64(len(a.chosen))+more+1))*tie)
}

// cheapestLater is the least that an amount can cost by keeping longer, out of
// all items together.
func (a *allocator) cheapestLater(amount float64) float64 {
	points := 0.0
	for _, k := range a.byLater {
		if amount <= 0 {
			break
		}
		use := min(amount, a.items[k].free)
		points += a.items[k].later * use / a.need
		amount -= use
	}
	return points
}

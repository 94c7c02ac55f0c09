package planner

import (
	"cmp"
	"math"
	"slices"

	"stillroom/inventory"
)

// Allocation: which of the fit bottles give how much. It minimises, exactly,
//
//	Σ over the bottles drawn on of
//	    bottle + opening (if sealed) + walk · (position − least position)
//	    + later · (days it keeps longer than the first to expire) · share
//	    + useless-heel (if what is left is of no use) − finished (if nothing is left)
//
// where share is the part of the need that comes out of the bottle and the
// points stand in the policy table as allocate.*. Within the bottles chosen the
// draws go first-expired-first-out: by end of life, opened ones first, the
// smaller remainder first, then by code (Nahmias, Production and Operations Analysis), so that only the last one
// is left with a heel. Equal points are decided by the least sum of places in
// the order of codes, so that a plan is reproducible.

// line is a fit bottle as the allocation sees it.
type line struct {
	at     int            // index of the caller's
	free   float64        // what it can give, in the unit of the need
	all    float64        // what it holds, others' promises included
	life   inventory.Date // last day it may be used; 0 for none
	sealed bool
	walk   int
	code   string
	rank   int     // place of the code among the lines' codes
	class  string  // bottles of one class may be mixed without a second thought: a lot, an age
	heel   float64 // a remainder below this is of no use
}

// points are the prices of the objective in thousandths of a point.
type points struct {
	opening, bottle, finished, useless, later, laterMost, walk float64
}

func allocatePoints(p *policyTable) points {
	at := func(key string) float64 { return 1000 * p.value("allocate."+key) }
	return points{at("opening"), at("bottle"), at("finished"), at("useless-heel"), at("later"), at("later-most"), at("walk")}
}

// taken is an amount out of a line.
type taken struct {
	line   int // index into the lines
	amount float64
}

// allocation is the answer: what is taken, and what is missing.
type allocation struct {
	taken  []taken // in the order of drawing
	short  float64
	cost   int64
	proven bool
	mixed  bool // no class alone was enough
}

// enough is the relative amount by which a sum of bottles may miss a need and
// still count as covering it: the rounding of sums of a few dozen numbers.
const enough = 1e-12

// allocate covers a need from lines, or takes all there is. If one class alone
// can cover it, classes aren't mixed.
func allocate(need float64, lines []line, p points) allocation {
	if need <= 0 {
		return allocation{proven: true}
	}
	rankByCode(lines)
	if best, ok := allocateOneClass(need, lines, p); ok {
		return best
	}
	best := newAllocator(need, lines, p).solve()
	best.mixed = classes(lines) > 1
	return best
}

// rankByCode numbers the lines in the order of their codes. Shelves keep their
// bottles in that order, so that there is mostly nothing to sort.
func rankByCode(lines []line) {
	byCode := func(a, b line) int { return cmp.Compare(a.code, b.code) }
	if slices.IsSortedFunc(lines, byCode) {
		for i := range lines {
			lines[i].rank = i
		}
		return
	}
	order := make([]int, len(lines))
	for i := range order {
		order[i] = i
	}
	slices.SortFunc(order, func(i, j int) int { return byCode(lines[i], lines[j]) })
	for rank, i := range order {
		lines[i].rank = rank
	}
}

func classes(lines []line) int {
	seen := map[string]bool{}
	for i := range lines {
		seen[lines[i].class] = true
	}
	return len(seen)
}

// allocateOneClass solves each class by itself and keeps the cheapest. It
// reports false if there is only one class, or none that is enough.
func allocateOneClass(need float64, lines []line, p points) (allocation, bool) {
	if !slices.ContainsFunc(lines, func(l line) bool { return l.class != lines[0].class }) {
		return allocation{}, false
	}
	byClass := map[string][]int{}
	sum := map[string]float64{}
	for i := range lines {
		c := lines[i].class
		byClass[c] = append(byClass[c], i)
		sum[c] += lines[i].free
	}
	names := make([]string, 0, len(byClass))
	for c := range byClass {
		if sum[c] >= need*(1-enough) {
			names = append(names, c)
		}
	}
	slices.Sort(names)
	best := allocation{cost: math.MaxInt64}
	for _, c := range names {
		part := make([]line, len(byClass[c]))
		for k, i := range byClass[c] {
			part[k] = lines[i]
		}
		a := newAllocator(need, part, p)
		a.firstLife, a.firstWalk = firstLife(lines), firstWalk(lines)
		if got := a.solve(); got.cost < best.cost {
			for k := range got.taken {
				got.taken[k].line = byClass[c][got.taken[k].line]
			}
			best = got
		}
	}
	return best, len(names) > 0
}

// allocator holds one branch and bound over the lines in the order of drawing.
type allocator struct {
	need      float64
	p         points
	lines     []line
	firstLife inventory.Date
	firstWalk int

	items     []item // candidates in order of points for their amount
	byLater   []int  // items by points for keeping longer
	minFixed  []int64
	maxFree   []float64
	chosen    []int // items
	pick      []int
	drawn     []taken
	best      allocation
	bestItems []int
	nodes     int
}

// item is a candidate with its points worked out.
type item struct {
	line  int
	place int // in the order of drawing
	free  float64
	fixed int64   // points if it is drawn on, whatever the amount, at the least
	later float64 // points for the whole need coming out of it
	rank  int64   // place in the order of codes
}

// allocateNodes bounds the search. Of 1,600 random bottles, a need that one or
// two cover takes some thousand nodes; one that takes three or more may reach
// the bound, and then the plan says that the choice isn't proven the best.
const allocateNodes = 200_000

// tie leaves room below a thousandth of a point for the sum of code places.
const tie = 1 << 24

func newAllocator(need float64, lines []line, p points) *allocator {
	return &allocator{need: need, p: p, lines: lines, firstLife: firstLife(lines), firstWalk: firstWalk(lines)}
}

func firstLife(lines []line) inventory.Date {
	var first inventory.Date
	for i := range lines {
		if l := lines[i].life; l.Set() && (!first.Set() || l < first) {
			first = l
		}
	}
	return first
}

func firstWalk(lines []line) int {
	first := math.MaxInt
	for i := range lines {
		first = min(first, lines[i].walk)
	}
	return first
}

func (a *allocator) solve() allocation {
	total := 0.0
	for i := range a.lines {
		total += a.lines[i].free
	}
	if total < a.need*(1-enough) {
		return a.everything(total)
	}
	a.prepare()
	a.best = allocation{cost: math.MaxInt64}
	a.greedy()
	a.branch(0, 0, 0)
	a.best.taken = slices.Clone(a.draws(a.bestItems))
	a.best.proven = a.nodes < allocateNodes
	return a.best
}

// everything takes all there is, for a need that can't be covered.
func (a *allocator) everything(total float64) allocation {
	a.number(a.keepAll())
	got := allocation{short: a.need - total, proven: true}
	for _, it := range a.items {
		if it.free > 0 {
			got.taken = append(got.taken, taken{it.line, it.free})
		}
	}
	return got
}

func (a *allocator) keepAll() []int {
	keep := make([]int, len(a.lines))
	for i := range keep {
		keep[i] = i
	}
	return keep
}

// prepare keeps the lines that can be part of a best answer, in the order in
// which the search takes them up.
func (a *allocator) prepare() {
	a.number(a.worthwhile())
	slices.SortStableFunc(a.items, func(x, y item) int {
		return cmp.Or(cmp.Compare(a.ratio(x), a.ratio(y)), cmp.Compare(x.rank, y.rank))
	})
	n := len(a.items)
	a.byLater = make([]int, n)
	for i := range a.byLater {
		a.byLater[i] = i
	}
	slices.SortStableFunc(a.byLater, func(i, j int) int { return cmp.Compare(a.items[i].later, a.items[j].later) })
	a.minFixed, a.maxFree = make([]int64, n+1), make([]float64, n+1)
	a.minFixed[n] = math.MaxInt64 / 4
	for i := n - 1; i >= 0; i-- {
		a.minFixed[i] = min(a.minFixed[i+1], a.items[i].fixed)
		a.maxFree[i] = max(a.maxFree[i+1], a.items[i].free)
	}
}

// ratio is the least a unit of amount costs out of an item.
func (a *allocator) ratio(it item) float64 { return float64(it.fixed)/it.free + it.later*tie/a.need }

// number gives the kept lines their places in the orders of drawing and code.
func (a *allocator) number(keep []int) {
	a.items = make([]item, 0, len(keep))
	for _, i := range keep {
		l := &a.lines[i]
		a.items = append(a.items, item{
			line: i, free: l.free, rank: int64(l.rank), later: a.later(l),
			fixed: int64(math.Round(a.fixed(l)-a.p.finished))*tie + int64(l.rank),
		})
	}
	slices.SortStableFunc(a.items, func(x, y item) int { return byDrawing(&a.lines[x.line], &a.lines[y.line]) })
	for k := range a.items {
		a.items[k].place = k
	}
}

// byDrawing orders first-expired-first-out; no date comes last.
func byDrawing(x, y *line) int {
	return cmp.Or(
		cmp.Compare(endOfLife(x.life), endOfLife(y.life)),
		cmp.Compare(b2i(x.sealed), b2i(y.sealed)),
		cmp.Compare(x.free, y.free),
		cmp.Compare(x.code, y.code),
	)
}

func endOfLife(d inventory.Date) inventory.Date {
	if !d.Set() {
		return math.MaxInt32
	}
	return d
}

func b2i(b bool) int {
	if b {
		return 1
	}
	return 0
}

// fixed are the points for drawing on a line at all.
func (a *allocator) fixed(l *line) float64 {
	f := a.p.bottle + a.p.walk*float64(l.walk-a.firstWalk)
	if l.sealed {
		f += a.p.opening
	}
	return f
}

// later are the points for drawing the whole need out of a line that keeps
// longer than the first to expire.
func (a *allocator) later(l *line) float64 {
	switch {
	case !a.firstLife.Set():
		return 0
	case !l.life.Set():
		return a.p.laterMost
	}
	return min(a.p.laterMost, a.p.later*float64(l.life-a.firstLife))
}

// heel are the points for what a draw leaves, which depends on the amount.
func (a *allocator) heel(l *line, amount float64) float64 {
	left := l.all - amount
	switch {
	case left <= l.all*1e-9:
		return -a.p.finished
	case left < l.heel:
		return a.p.useless
	}
	return 0
}

// greedy gives the first answer: in the order of the search, then without
// what turned out not to be needed.
func (a *allocator) greedy() {
	sum := 0.0
	var pick []int
	for k := range a.items {
		if sum >= a.need*(1-enough) {
			break
		}
		pick = append(pick, k)
		sum += a.items[k].free
	}
	for i := 0; i < len(pick); i++ {
		if rest := sum - a.items[pick[i]].free; rest >= a.need*(1-enough) {
			sum = rest
			pick = slices.Delete(pick, i, i+1)
			i--
		}
	}
	a.offer(pick)
}

// draws distributes the need over the items in the order of drawing. The
// answer is good until the next call.
func (a *allocator) draws(items []int) []taken {
	a.pick = append(a.pick[:0], items...)
	for i := 1; i < len(a.pick); i++ {
		for k := i; k > 0 && a.items[a.pick[k]].place < a.items[a.pick[k-1]].place; k-- {
			a.pick[k], a.pick[k-1] = a.pick[k-1], a.pick[k]
		}
	}
	left := a.need
	a.drawn = a.drawn[:0]
	for _, k := range a.pick {
		if amount := min(left, a.items[k].free); amount > 0 {
			a.drawn = append(a.drawn, taken{a.items[k].line, amount})
			left -= amount
		}
	}
	return a.drawn
}

// offer takes a complete choice if it beats the best so far.
func (a *allocator) offer(items []int) {
	cost := int64(0)
	for _, k := range items {
		cost += a.items[k].fixed
	}
	if cost-int64(len(items))*tie/2 >= a.best.cost {
		return
	}
	draws := a.draws(items)
	if len(draws) < len(items) {
		return // a bottle of the choice isn't needed: the choice without it is met elsewhere
	}
	for _, d := range draws {
		l := &a.lines[d.line]
		extra := a.later(l)*d.amount/a.need + a.heel(l, d.amount) + a.p.finished
		cost += int64(math.Round(extra)) * tie
	}
	if cost < a.best.cost {
		a.best.cost = cost
		a.bestItems = append(a.bestItems[:0], items...)
	}
}

// branch takes up item k or leaves it out. A choice that is enough may still
// gain by one more bottle, if that expires first.
func (a *allocator) branch(k int, sum float64, cost int64) {
	if sum >= a.need*(1-enough) {
		a.offer(a.chosen)
	}
	for ; k < len(a.items); k++ {
		a.nodes++
		if a.nodes >= allocateNodes || a.bound(k, a.need-sum, cost) >= a.best.cost {
			return
		}
		if a.skipTwin(k) {
			continue
		}
		a.chosen = append(a.chosen, k)
		a.branch(k+1, sum+a.items[k].free, cost+a.items[k].fixed)
		a.chosen = a.chosen[:len(a.chosen)-1]
	}
}

package planner

import (
	"errors"
	"fmt"
	"math"
	"sort"

	"stillroom/chem"
)

// ErrCarriersNotProven says that the search for the fewest carriers was given
// up before fewer were shown to be impossible. The carriers returned with it
// are still allowed ones.
var ErrCarriersNotProven = errors.New("fewest carriers not proven")

// carrierNodes bounds the search for the fewest carriers. A pick list of 60
// bottles takes a few hundred nodes; the bound keeps an odd one from hanging.
const carrierNodes = 2_000_000

// CarrierItem is a bottle that has to travel.
type CarrierItem struct {
	Code string
	Mass chem.Mass // of bottle and content; 0 if not known
	Walk int       // position in the order in which people walk past the places
}

// CarrierLimits bound what one carrier may take; 0 means no limit. A bottle
// that is over the weight by itself travels alone, with a note.
type CarrierLimits struct {
	MostMass  chem.Mass
	MostCount int
}

// GroupCarriers puts items into the fewest carriers so that no two for which
// conflict is true share one and no carrier is over its limits. Carriers, and
// the bottles in each, come in walking order, ties by code; the same items give
// the same carriers. conflict must be symmetric; it is asked once for a pair.
//
// Fewest carriers is the vertex colouring of the conflict graph with bounded
// colour classes. It is solved exactly by branch and bound: the vertex with the
// fewest carriers left to it first (Brélaz, Comm. ACM 22, 251, 1979), bounded
// from below by the heaviest clique of interchangeable items. If the search is
// cut off, the error is ErrCarriersNotProven and the carriers are allowed ones,
// but perhaps not the fewest.
func GroupCarriers(items []CarrierItem, conflict func(i, j int) bool, limits CarrierLimits) ([]Carrier, error) {
	if err := checkCarrierItems(items, limits); err != nil {
		return nil, err
	}
	if len(items) == 0 {
		return nil, nil
	}
	order := walkOrder(items)
	s := newCarrierSearch(items, order, conflict, limits)
	s.greedy()
	s.branch(0, 0)
	carriers := s.carriers()
	if s.best > s.bound && s.nodes >= carrierNodes {
		return carriers, fmt.Errorf("%d bottles in %d carriers, at least %d needed: %w",
			len(items), s.best, s.bound, ErrCarriersNotProven)
	}
	return carriers, nil
}

func checkCarrierItems(items []CarrierItem, limits CarrierLimits) error {
	if limits.MostCount < 0 || limits.MostMass < 0 || !chem.Finite(limits.MostMass) {
		return fmt.Errorf("carrier limits %d bottles, %g kg: must not be negative", limits.MostCount, float64(limits.MostMass))
	}
	for _, it := range items {
		if it.Mass < 0 || !chem.Finite(it.Mass) {
			return fmt.Errorf("carrier item %q: mass %g kg must not be negative", it.Code, float64(it.Mass))
		}
	}
	return nil
}

// walkOrder returns the indices of items in walking order, ties by code.
func walkOrder(items []CarrierItem) []int {
	order := make([]int, len(items))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(a, b int) bool {
		x, y := items[order[a]], items[order[b]]
		if x.Walk != y.Walk {
			return x.Walk < y.Walk
		}
		return x.Code < y.Code
	})
	return order
}

// carrierSearch holds the branch and bound. Items are numbered in walking
// order from here on.
type carrierSearch struct {
	items  []CarrierItem
	limits CarrierLimits
	apart  [][]bool
	degree []int
	twin   []int // the item before that is interchangeable with it, or -1
	bound  int   // at least so many carriers
	best   int   // so many carriers in bestIn
	bestIn []int
	in     []int // carrier of each item, or -1
	mass   []chem.Mass
	count  []int
	nodes  int
}

func newCarrierSearch(items []CarrierItem, order []int, conflict func(i, j int) bool, limits CarrierLimits) *carrierSearch {
	n := len(items)
	s := &carrierSearch{limits: limits, best: n + 1, apart: make([][]bool, n), degree: make([]int, n),
		twin: make([]int, n), in: make([]int, n), mass: make([]chem.Mass, n), count: make([]int, n)}
	for i := range order {
		s.items = append(s.items, items[order[i]])
		s.apart[i] = make([]bool, n)
		s.in[i] = -1
	}
	for i := range order {
		for j := i + 1; j < n; j++ {
			if conflict != nil && conflict(order[i], order[j]) {
				s.apart[i][j], s.apart[j][i] = true, true
				s.degree[i]++
				s.degree[j]++
			}
		}
	}
	s.bound = s.lowerBound(s.classes())
	return s
}

// classes groups items that conflict with the same others and not with each
// other, and links items of equal mass within a group as twins.
func (s *carrierSearch) classes() [][]int {
	var classes [][]int
	for i := range s.items {
		s.twin[i] = -1
		k := 0
		for ; k < len(classes); k++ {
			if s.sameNeighbours(classes[k][0], i) {
				break
			}
		}
		if k == len(classes) {
			classes = append(classes, nil)
		}
		for _, j := range classes[k] {
			if s.items[j].Mass == s.items[i].Mass {
				s.twin[i] = j
			}
		}
		classes[k] = append(classes[k], i)
	}
	return classes
}

func (s *carrierSearch) sameNeighbours(i, j int) bool {
	if s.apart[i][j] {
		return false
	}
	for k := range s.apart[i] {
		if s.apart[i][k] != s.apart[j][k] {
			return false
		}
	}
	return true
}

// lowerBound is the largest of what count and weight ask for and of the
// heaviest clique of classes, each class weighing the carriers it fills alone.
func (s *carrierSearch) lowerBound(classes [][]int) int {
	all := make([]int, len(s.items))
	for i := range all {
		all[i] = i
	}
	weight := make([]int, len(classes))
	for k, class := range classes {
		weight[k] = s.filled(class)
	}
	c := cliqueSearch{weight: weight, apart: func(a, b int) bool { return s.apart[classes[a][0]][classes[b][0]] }}
	candidates := make([]int, len(classes))
	for k := range candidates {
		candidates[k] = k
	}
	c.grow(candidates, 0)
	return max(s.filled(all), c.best)
}

// filled is how many carriers a set fills by count and by weight, whatever
// conflicts there are. A bottle over the weight fills one.
func (s *carrierSearch) filled(set []int) int {
	least, alone, mass := 1, 0, chem.Mass(0)
	for _, i := range set {
		if s.tooHeavy(i) {
			alone++
			continue
		}
		mass += s.items[i].Mass
	}
	rest := len(set) - alone
	if s.limits.MostCount > 0 {
		least = max(least, alone+(rest+s.limits.MostCount-1)/s.limits.MostCount)
	}
	if s.limits.MostMass > 0 {
		// A billionth of slack keeps rounding of the sum from asking for one too many.
		byMass := int(math.Ceil(float64(mass/s.limits.MostMass) - 1e-9))
		least = max(least, alone+max(byMass, min(rest, 1)))
	}
	return least
}

func (s *carrierSearch) tooHeavy(i int) bool {
	return s.limits.MostMass > 0 && s.items[i].Mass > s.limits.MostMass
}

// cliqueSearch finds the heaviest clique of a small graph. It may stop early:
// any clique is a bound.
type cliqueSearch struct {
	weight []int
	apart  func(a, b int) bool
	best   int
	nodes  int
}

func (c *cliqueSearch) grow(candidates []int, weight int) {
	c.best = max(c.best, weight)
	left := 0
	for _, k := range candidates {
		left += c.weight[k]
	}
	for n, k := range candidates {
		if c.nodes++; weight+left <= c.best || c.nodes > carrierNodes/10 {
			return
		}
		left -= c.weight[k]
		var next []int
		for _, m := range candidates[n+1:] {
			if c.apart(k, m) {
				next = append(next, m)
			}
		}
		c.grow(next, weight+c.weight[k])
	}
}

// fits reports whether item i may join carrier k, which is one of those in use.
func (s *carrierSearch) fits(i, k int) bool {
	if s.limits.MostCount > 0 && s.count[k] >= s.limits.MostCount {
		return false
	}
	if s.limits.MostMass > 0 && s.mass[k]+s.items[i].Mass > s.limits.MostMass*(1+1e-12) {
		return false
	}
	for j, in := range s.in {
		if in == k && s.apart[i][j] {
			return false
		}
	}
	return true
}

func (s *carrierSearch) put(i, k int) {
	s.in[i] = k
	s.count[k]++
	s.mass[k] += s.items[i].Mass
}

// take undoes put; before is the carrier's mass before it, because subtracting
// would leave rounding behind.
func (s *carrierSearch) take(i, k int, before chem.Mass) {
	s.in[i] = -1
	s.count[k]--
	s.mass[k] = before
}

// next returns the unplaced item with the fewest of the used carriers left to
// it, ties by most conflicts, then by walking order, and those carriers.
func (s *carrierSearch) next(used int) (item int, left []int) {
	item = -1
	for i := range s.items {
		if s.in[i] >= 0 {
			continue
		}
		var fit []int
		for k := range used {
			if s.fits(i, k) {
				fit = append(fit, k)
			}
		}
		if item < 0 || len(fit) < len(left) || len(fit) == len(left) && s.degree[i] > s.degree[item] {
			item, left = i, fit
		}
	}
	return item, left
}

// greedy gives the first answer: each item into the first carrier it fits.
func (s *carrierSearch) greedy() {
	used := 0
	for range s.items {
		i, left := s.next(used)
		k := used
		if len(left) > 0 {
			k = left[0]
		} else {
			used++
		}
		s.put(i, k)
	}
	s.keep(used)
	for i := range s.in {
		s.in[i], s.count[i], s.mass[i] = -1, 0, 0
	}
}

func (s *carrierSearch) keep(used int) {
	s.best = used
	s.bestIn = append(s.bestIn[:0], s.in...)
}

// branch places one more item in every way that can still lead to fewer
// carriers than the best so far.
func (s *carrierSearch) branch(placed, used int) {
	if s.best <= s.bound || used >= s.best || s.nodes >= carrierNodes {
		return
	}
	s.nodes++
	if placed == len(s.items) {
		s.keep(used)
		return
	}
	i, left := s.next(used)
	for _, k := range left {
		if s.twin[i] >= 0 && k < s.in[s.twin[i]] {
			continue // its twin and it can be exchanged
		}
		before := s.mass[k]
		s.put(i, k)
		s.branch(placed+1, used)
		s.take(i, k, before)
	}
	if used+1 < s.best {
		s.put(i, used)
		s.branch(placed+1, used+1)
		s.take(i, used, 0)
	}
}

// carriers writes the best answer down in walking order.
func (s *carrierSearch) carriers() []Carrier {
	number := make([]int, s.best)
	var carriers []Carrier
	for i, k := range s.bestIn {
		if number[k] == 0 {
			carriers = append(carriers, Carrier{N: len(carriers) + 1})
			number[k] = len(carriers)
		}
		c := &carriers[number[k]-1]
		c.Bottles = append(c.Bottles, s.items[i].Code)
		c.Mass += s.items[i].Mass
		if s.tooHeavy(i) {
			c.Note = "over the weight of a carrier by itself: take a trolley or two people"
		}
	}
	return carriers
}

package planner

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"
)

// Packs: the cheapest order that covers several needs at once. Each supplier's
// order costs its fee and, if anything hazardous is in it, a surcharge; goods
// below the supplier's least order value are charged at that value. The least
// cost is found by listing, for each need, the ways of covering it and by
// branch and bound over the needs, because fees are shared between them.

// ErrPacksNotProven says that there were too many ways to list, so that the
// order given is a good one but perhaps not the cheapest.
var ErrPacksNotProven = errors.New("cheapest order not proven")

// PackOffer is a pack on offer for one need.
type PackOffer struct {
	Name     string
	Supplier string
	Size     float64 // in the unit of the need; positive
	// Price is of one pack in minor units; Breaks, rising by From, replace it
	// from a number of packs on.
	Price  int64
	Breaks []PackBreak
	// Fee is per order at the supplier, Surcharge per order with this in it,
	// Least the least value of goods in an order at the supplier.
	Fee, Surcharge, Least int64
}

// PackBreak is the price of a pack from a number of packs on.
type PackBreak struct{ From, Price int64 }

// total is the price of n packs.
func (o PackOffer) total(n int64) int64 {
	price := o.Price
	for _, b := range o.Breaks {
		if n >= b.From {
			price = b.Price
		}
	}
	return n * price
}

// PackNeed is an amount to be covered from offers.
type PackNeed struct {
	Amount float64
	Offers []PackOffer
}

// PackChoice is a number of packs of one offer.
type PackChoice struct {
	Offer int // index into the need's offers
	Packs int64
}

// PackOrder is the answer: what to take for each need, and what all costs.
type PackOrder struct {
	Choices [][]PackChoice // by need, offers in order
	Cost    int64          // with fees, surcharges and least order values
	Left    []float64      // by need, what is left over
}

// waysMost bounds the ways listed for one need, packNodes the search over needs.
const (
	waysMost  = 20_000
	packNodes = 2_000_000
)

// CheapestPacks returns the order of least cost that covers every need; of
// equally cheap ones that with the least left over in total relative to the
// needs, then the fewest packs, then the offers that come first. It returns an
// error for a need that isn't positive or can't be covered, and
// ErrPacksNotProven with a valid order if the search was cut off.
func CheapestPacks(needs []PackNeed) (PackOrder, error) {
	if err := checkPackNeeds(needs); err != nil {
		return PackOrder{}, err
	}
	if len(needs) == 1 {
		if order, ok := packTable(needs[0]); ok {
			return order, nil
		}
	}
	s := packSearch{needs: needs, best: packCost{math.MaxInt64, math.Inf(1), math.MaxInt64}}
	cut := false
	for i := range needs {
		ways, all := waysToCover(needs[i])
		cut = cut || !all
		s.ways = append(s.ways, ways)
	}
	s.lists()
	s.branch(0, packCost{})
	order := s.order()
	if cut || s.nodes >= packNodes {
		return order, ErrPacksNotProven
	}
	return order, nil
}

func checkPackNeeds(needs []PackNeed) error {
	for i, n := range needs {
		if !(n.Amount > 0) || math.IsInf(n.Amount, 0) {
			return fmt.Errorf("need %d: %g is not a positive amount", i+1, n.Amount)
		}
		if len(n.Offers) == 0 {
			return fmt.Errorf("need %d: nothing is on offer for it", i+1)
		}
		for _, o := range n.Offers {
			if !(o.Size > 0) || math.IsInf(o.Size, 0) || o.Price < 0 || o.Fee < 0 || o.Surcharge < 0 || o.Least < 0 {
				return fmt.Errorf("offer %q: a pack needs a size above 0 and prices of 0 or more", o.Name)
			}
			if n.Amount/o.Size > 1e6 {
				return fmt.Errorf("offer %q: it would take more than a million packs: give a larger pack", o.Name)
			}
		}
	}
	return nil
}

// way is one way of covering a need.
type way struct {
	packs []int64 // by offer
	goods int64   // price of the goods alone
	left  float64 // over, relative to the need
	count int64
}

// waysToCover lists the covers from which no pack can be taken away, and those
// that are larger only to reach a lower price. It reports false if there are
// more than it lists; then the list holds the cheapest cover of each offer by
// itself besides.
func waysToCover(n PackNeed) ([]way, bool) {
	l := wayList{need: n, packs: make([]int64, len(n.Offers))}
	l.add(0, n.Amount)
	if len(l.ways) >= waysMost {
		for i := range n.Offers {
			clear(l.packs)
			l.packs[i] = packsFor(n.Amount, n.Offers[i].Size)
			l.keep()
		}
		return l.ways, false
	}
	return l.undominated(), true
}

type wayList struct {
	need  PackNeed
	packs []int64
	ways  []way
}

// packsFor is how many packs of a size cover an amount, rounding forgiven.
func packsFor(amount, size float64) int64 {
	if amount <= 0 {
		return 0
	}
	return max(1, int64(math.Ceil(amount/size*(1-enough))))
}

func (l *wayList) add(i int, rest float64) {
	if len(l.ways) >= waysMost {
		return
	}
	if i == len(l.packs) {
		if rest <= l.need.Amount*enough {
			l.keep()
		}
		return
	}
	o := l.need.Offers[i]
	most := packsFor(rest, o.Size)
	from := int64(0)
	if i == len(l.packs)-1 {
		from = most
	}
	for n := from; n <= most; n++ {
		l.packs[i] = n
		l.add(i+1, rest-float64(n)*o.Size)
	}
	for _, b := range o.Breaks {
		if b.From > most {
			l.packs[i] = b.From
			l.add(i+1, rest-float64(b.From)*o.Size)
		}
	}
	l.packs[i] = 0
}

func (l *wayList) keep() {
	w := way{packs: slices.Clone(l.packs)}
	sum := 0.0
	for i, n := range w.packs {
		w.goods += l.need.Offers[i].total(n)
		sum += float64(n) * l.need.Offers[i].Size
		w.count += n
	}
	w.left = sum/l.need.Amount - 1
	l.ways = append(l.ways, w)
}

// undominated leaves out a way if another uses the same suppliers' goods for
// no more money, with no more left over and no more packs.
func (l *wayList) undominated() []way {
	slices.SortStableFunc(l.ways, func(a, b way) int {
		return cmp.Or(cmp.Compare(a.goods, b.goods), cmp.Compare(a.left, b.left), cmp.Compare(a.count, b.count))
	})
	type key string
	seen := map[key]way{}
	var out []way
	for _, w := range l.ways {
		k := key(l.suppliersOf(w))
		if best, ok := seen[k]; ok && best.left <= w.left && best.count <= w.count && !l.leastMatters() {
			continue
		} else if !ok {
			seen[k] = w
		}
		out = append(out, w)
	}
	return out
}

// leastMatters reports whether a least order value could make dearer goods
// cost no more.
func (l *wayList) leastMatters() bool {
	return slices.ContainsFunc(l.need.Offers, func(o PackOffer) bool { return o.Least > 0 })
}

func (l *wayList) suppliersOf(w way) string {
	var text []byte
	for i, n := range w.packs {
		if n > 0 {
			o := l.need.Offers[i]
			text = fmt.Appendf(text, "%s|%d|%d;", o.Supplier, o.Fee, o.Surcharge)
		}
	}
	return string(text)
}

// packCost is what is minimised, in this order.
type packCost struct {
	money int64
	left  float64
	count int64
}

func (a packCost) less(b packCost) bool {
	if a.money != b.money {
		return a.money < b.money
	}
	if math.Abs(a.left-b.left) > 1e-9 {
		return a.left < b.left
	}
	return a.count < b.count
}

// packSearch is the branch and bound over the needs.
type packSearch struct {
	needs     []PackNeed
	ways      [][]way
	suppliers []string
	goods     []int64 // by supplier, of the choices so far
	fee       []int64
	surcharge []int64
	least     []int64
	cheapest  []int64 // goods of the cheapest ways of the needs from here on
	taken     []int
	best      packCost
	bestTaken []int
	nodes     int
}

// lists numbers the suppliers and works out the bounds.
func (s *packSearch) lists() {
	for _, n := range s.needs {
		for _, o := range n.Offers {
			if !slices.Contains(s.suppliers, o.Supplier) {
				s.suppliers = append(s.suppliers, o.Supplier)
			}
		}
	}
	k := len(s.suppliers)
	s.goods, s.fee, s.surcharge, s.least = make([]int64, k), make([]int64, k), make([]int64, k), make([]int64, k)
	s.cheapest = make([]int64, len(s.needs)+1)
	for i := len(s.needs) - 1; i >= 0; i-- {
		least := int64(math.MaxInt64)
		for _, w := range s.ways[i] {
			least = min(least, w.goods)
		}
		s.cheapest[i] = s.cheapest[i+1] + least
	}
	s.taken = make([]int, len(s.needs))
}

// money is what the orders cost as they stand.
func (s *packSearch) money() int64 {
	sum := int64(0)
	for k := range s.suppliers {
		if s.goods[k] >= 0 && s.fee[k] >= 0 && s.used(k) {
			sum += max(s.goods[k], s.least[k]) + s.fee[k] + s.surcharge[k]
		}
	}
	return sum
}

func (s *packSearch) used(k int) bool { return s.goods[k] > 0 || s.fee[k] > 0 || s.surcharge[k] > 0 }

func (s *packSearch) branch(i int, cost packCost) {
	s.nodes++
	if s.nodes >= packNodes && s.bestTaken != nil {
		return
	}
	cost.money = s.money()
	if i == len(s.needs) {
		if cost.less(s.best) {
			s.best = cost
			s.bestTaken = slices.Clone(s.taken)
		}
		return
	}
	if s.floor(i) > s.best.money {
		return
	}
	for w := range s.ways[i] {
		s.take(i, w, cost)
	}
}

// floor is what the orders cost at the least once all needs are covered.
func (s *packSearch) floor(i int) int64 {
	sum := s.cheapest[i]
	for k := range s.suppliers {
		sum += s.goods[k] + s.fee[k] + s.surcharge[k]
	}
	return sum
}

// take goes down one way and comes back.
func (s *packSearch) take(i, w int, cost packCost) {
	saved := [...][]int64{slices.Clone(s.goods), slices.Clone(s.fee), slices.Clone(s.surcharge), slices.Clone(s.least)}
	for k, n := range s.ways[i][w].packs {
		if n == 0 {
			continue
		}
		o := s.needs[i].Offers[k]
		at := slices.Index(s.suppliers, o.Supplier)
		s.goods[at] += o.total(n)
		s.fee[at] = max(s.fee[at], o.Fee)
		s.surcharge[at] = max(s.surcharge[at], o.Surcharge)
		s.least[at] = max(s.least[at], o.Least)
	}
	cost.left += s.ways[i][w].left
	cost.count += s.ways[i][w].count
	s.taken[i] = w
	s.branch(i+1, cost)
	s.goods, s.fee, s.surcharge, s.least = saved[0], saved[1], saved[2], saved[3]
}

func (s *packSearch) order() PackOrder {
	order := PackOrder{Cost: s.best.money, Choices: make([][]PackChoice, len(s.needs)), Left: make([]float64, len(s.needs))}
	for i, w := range s.bestTaken {
		for k, n := range s.ways[i][w].packs {
			if n > 0 {
				order.Choices[i] = append(order.Choices[i], PackChoice{k, n})
			}
		}
		order.Left[i] = max(0, s.ways[i][w].left*s.needs[i].Amount)
	}
	return order
}

package planner

import "math"

// tableCells bounds the table of packTable.
const tableCells = 4_000_000

// packTable solves one need without fees, price breaks and least order values
// by a table over amounts in the packs' common step: best[a] is the least cost,
// and then the fewest packs, that make up exactly a. It reports false if the
// problem isn't of that kind or the table would be too large.
func packTable(n PackNeed) (PackOrder, bool) {
	sizes, need, ok := inSteps(n)
	if !ok {
		return PackOrder{}, false
	}
	largest := 0
	for _, s := range sizes {
		largest = max(largest, s)
	}
	best := make([]cell, need+largest)
	for a := 1; a < len(best); a++ {
		best[a] = cheapestCell(n.Offers, sizes, best, a)
	}
	at := 0
	for a := need; a < len(best); a++ {
		if best[a].offer >= 0 && (at == 0 || best[a].money < best[at].money) {
			at = a
		}
	}
	order := PackOrder{Cost: best[at].money, Left: []float64{float64(at-need) / float64(need) * n.Amount}}
	packs := make([]int64, len(sizes))
	for a := at; a > 0; a -= sizes[best[a].offer] {
		packs[best[a].offer]++
	}
	var choices []PackChoice
	for i, k := range packs {
		if k > 0 {
			choices = append(choices, PackChoice{i, k})
		}
	}
	order.Choices = [][]PackChoice{choices}
	return order, true
}

// cell is the best way to an amount, by its last pack; offer is −1 for none.
type cell struct {
	money int64
	count int32
	offer int32
}

func cheapestCell(offers []PackOffer, sizes []int, best []cell, a int) cell {
	c := cell{offer: -1, money: math.MaxInt64}
	for i, s := range sizes {
		if s > a || a > s && best[a-s].offer < 0 {
			continue
		}
		money, count := best[a-s].money+offers[i].Price, best[a-s].count+1
		if money < c.money || money == c.money && count < c.count {
			c = cell{money, count, int32(i)}
		}
	}
	return c
}

// inSteps turns sizes and need into whole multiples of the sizes' largest
// common divisor, counted in billionths of the unit. The need is rounded up.
func inSteps(n PackNeed) ([]int, int, bool) {
	var step int64
	whole := make([]int64, len(n.Offers))
	for i, o := range n.Offers {
		if o.Fee != 0 || o.Surcharge != 0 || o.Least != 0 || len(o.Breaks) > 0 {
			return nil, 0, false
		}
		x := o.Size * 1e9
		whole[i] = int64(math.Round(x))
		if x > 1e17 || whole[i] < 1 || math.Abs(x-float64(whole[i])) > 1e-3 {
			return nil, 0, false
		}
		step = gcd(step, whole[i])
	}
	need := math.Ceil(n.Amount * 1e9 / float64(step) * (1 - enough))
	sizes := make([]int, len(whole))
	for i := range whole {
		if whole[i]/step > tableCells {
			return nil, 0, false
		}
		sizes[i] = int(whole[i] / step)
	}
	if need < 1 || need > tableCells {
		return nil, 0, false
	}
	return sizes, int(need), true
}

func gcd(a, b int64) int64 {
	for b != 0 {
		a, b = b, a%b
	}
	return a
}

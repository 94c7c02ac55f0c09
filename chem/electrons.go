package chem

import (
	"cmp"
	"math"
	"slices"
)

// Electrons returns how many electrons pass from what is oxidised to what is
// reduced in the reaction as written, by the change of oxidation numbers; in a half
// reaction it is the number of electrons shown. Atoms of an element are matched in
// the order of their numbers, so that no electron is counted that need not move.
// The reaction must balance (ErrUnbalanced); where the rules don't settle an
// oxidation number the error is an *OxidationError.
func (e Equation) Electrons() (float64, error) {
	if err := e.Balanced(); err != nil {
		return 0, err
	}
	left, order, err := oxidationSide(e.Left)
	if err != nil {
		return 0, err
	}
	right, _, err := oxidationSide(e.Right)
	if err != nil {
		return 0, err
	}
	var rise, fall float64
	for _, symbol := range order {
		up, down := matchNumbers(left[symbol], right[symbol])
		rise += up
		fall += down
	}
	n := math.Max(rise, fall)
	if whole := math.Round(n); math.Abs(n-whole) < 1e-6 {
		return whole, nil
	}
	return n, nil
}

// oxidationSide gathers the atoms of one side by element, and the elements in the
// order of first appearance.
func oxidationSide(terms []Term) (map[string][]OxidationNumber, []string, error) {
	side := map[string][]OxidationNumber{}
	var order []string
	for _, t := range terms {
		numbers, err := t.Formula.OxidationNumbers()
		if err != nil {
			return nil, nil, err
		}
		for _, n := range numbers {
			if _, ok := side[n.Symbol]; !ok {
				order = append(order, n.Symbol)
			}
			n.Count *= float64(t.Coefficient)
			side[n.Symbol] = append(side[n.Symbol], n)
		}
	}
	return side, order, nil
}

// matchNumbers pairs the atoms of one element, lowest numbers first, and sums how far
// they rise and fall.
func matchNumbers(left, right []OxidationNumber) (rise, fall float64) {
	byNumber := func(a, b OxidationNumber) int { return cmp.Compare(a.Number, b.Number) }
	slices.SortFunc(left, byNumber)
	slices.SortFunc(right, byNumber)
	i, j := 0, 0
	for i < len(left) && j < len(right) {
		n := math.Min(left[i].Count, right[j].Count)
		if change := right[j].Number - left[i].Number; change > 0 {
			rise += n * change
		} else {
			fall -= n * change
		}
		left[i].Count -= n
		right[j].Count -= n
		if left[i].Count < 1e-9 {
			i++
		}
		if right[j].Count < 1e-9 {
			j++
		}
	}
	return rise, fall
}

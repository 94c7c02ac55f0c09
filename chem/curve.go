package chem

import (
	"sort"

	"gonum.org/v1/gonum/interp"
)

// A curve is a table of points read between its rows by a piecewise cubic that
// never overshoots: it rises where the rows rise, falls where they fall, and
// has a maximum only at a row that is one (F. N. Fritsch and J. Butland, SIAM
// J. Sci. Stat. Comput. 5 (1984) 300).
type curve struct {
	xs, ys []float64
	spline interp.FritschButland
}

// newCurve makes a curve of rows in any order. Rows with the same x are
// replaced by their mean. It panics with fewer than two different x, which is
// a mistake in an embedded table.
func newCurve(xs, ys []float64) *curve {
	c := &curve{}
	order := make([]int, len(xs))
	for i := range order {
		order[i] = i
	}
	sort.SliceStable(order, func(i, j int) bool { return xs[order[i]] < xs[order[j]] })
	for k := 0; k < len(order); {
		x, sum, n := xs[order[k]], 0.0, 0
		for ; k < len(order) && xs[order[k]] == x; k++ {
			sum += ys[order[k]]
			n++
		}
		c.xs, c.ys = append(c.xs, x), append(c.ys, sum/float64(n))
	}
	if err := c.spline.Fit(c.xs, c.ys); err != nil {
		panic("chem: embedded table: " + err.Error())
	}
	return c
}

func (c *curve) low() float64  { return c.xs[0] }
func (c *curve) high() float64 { return c.xs[len(c.xs)-1] }

// covers reports whether x lies between the first and the last row.
func (c *curve) covers(x float64) bool { return x >= c.low() && x <= c.high() }

// at returns the value at x, which must be covered.
func (c *curve) at(x float64) float64 { return c.spline.Predict(x) }

// pooled replaces runs of rows that fall where the series must rise by their
// mean (pool adjacent violators: M. Ayer et al., Ann. Math. Stat. 26 (1955)
// 641). The rows have to be in rising order of x.
func pooled(ys []float64) []float64 {
	type block struct {
		sum float64
		n   int
	}
	var blocks []block
	for _, y := range ys {
		blocks = append(blocks, block{y, 1})
		for len(blocks) > 1 {
			a, b := blocks[len(blocks)-2], blocks[len(blocks)-1]
			if a.sum*float64(b.n) <= b.sum*float64(a.n) {
				break
			}
			blocks = append(blocks[:len(blocks)-2], block{a.sum + b.sum, a.n + b.n})
		}
	}
	level := make([]float64, 0, len(ys))
	for _, b := range blocks {
		for range b.n {
			level = append(level, b.sum/float64(b.n))
		}
	}
	return level
}

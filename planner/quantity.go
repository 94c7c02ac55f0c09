package planner

import (
	"sync"

	"stillroom/chem"
)

// quantity is something uncertain: a name for its stream and a distribution.
type quantity struct {
	stream chem.Stream
	mean   float64
	sd     float64 // of a normal distribution around mean, cut at least and most
	least  float64
	most   float64
	flat   bool      // uniform between least and most
	dist   chem.Dist // any other; nil for none
}

// at returns draw i.
func (q *quantity) at(i int) float64 {
	switch {
	case q.dist != nil:
		return q.stream.Draw(q.dist, i)
	case q.flat:
		return q.least + float64((q.most-q.least)*q.stream.Uniform(i))
	case q.sd == 0:
		return q.mean
	}
	return min(max(q.mean+float64(q.sd*standardNormal(q.stream.Uniform(i))), q.least), q.most)
}

// extreme returns a value that isn't passed, downwards or upwards: for other
// than normal and uniform distributions less than once in 10¹² draws.
func (q *quantity) extreme(up bool) float64 {
	p, z := 1e-12, standardNormal(0)
	if up {
		p, z = 1-1e-12, -z
	}
	switch {
	case q.dist != nil:
		return q.dist.Quantile(p)
	case q.flat && up:
		return q.most
	case q.flat:
		return q.least
	}
	return min(max(q.mean+q.sd*z, q.least), q.most)
}

// constant reports whether every draw is the same.
func (q *quantity) constant() bool { return q.dist == nil && !q.flat && q.sd == 0 }

// usual is a value that isn't passed in draws whose random number is at most
// usualShare.
func (q *quantity) usual() float64 {
	switch {
	case q.dist != nil:
		return q.dist.Quantile(usualShare)
	case q.flat:
		return q.least + (q.most-q.least)*usualShare
	}
	return min(max(q.mean+q.sd*standardNormal(usualShare), q.least), q.most)
}

// normalSteps is how finely the standard normal distribution is tabulated: the
// outermost step lies at 4.3 standard deviations.
const normalSteps = 1 << 16

var normalTable = sync.OnceValue(func() []float64 {
	standard, err := chem.NewNormal(0, 1)
	if err != nil {
		panic(err) // 0 and 1 are a mean and a standard deviation
	}
	table := make([]float64, normalSteps)
	for i := range table {
		table[i] = standard.Quantile((float64(i) + 0.5) / normalSteps)
	}
	return table
})

// standardNormal is the quantile of p by the table.
func standardNormal(p float64) float64 { return normalTable()[int(p*normalSteps)] }

// shiftedLogNormal is base plus a log-normal part.
type shiftedLogNormal struct {
	base float64
	chem.LogNormal
}

// Quantile returns the value that a share p lies below.
func (s shiftedLogNormal) Quantile(p float64) float64 { return s.base + s.LogNormal.Quantile(p) }

// shifted returns base plus a log-normal part, or nil, which is no loss at all,
// if the prior isn't one.
func shifted(base, mean, sd float64) chem.Dist {
	l, err := chem.NewLogNormal(mean, sd)
	if err != nil {
		return nil
	}
	return shiftedLogNormal{base, l}
}

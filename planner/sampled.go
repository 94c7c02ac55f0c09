package planner

import (
	"runtime"
	"slices"
	"sync"

	"stillroom/chem"
)

// sampler is a walk-through that can be drawn.
type sampler interface {
	Workspace(Conditions) *Workspace
	Uncertain() int
	UncertainName(i int) string
	Sample(w *Workspace, u []float64) Outcome
}

// sampled holds draws of the whole walk-through: every charge and the product
// come out of the same pass, so that what is lost in one step is missing in the
// next.
type sampled struct {
	asked   [][]float64 // by demand, then draw: kilograms or pieces
	product []float64   // kilograms
	failed  []bool      // a step could not be done
}

// drawWalks walks the recipe through n times. Draw i takes number i of the
// stream of every uncertain quantity, so that the outcome doesn't depend on how
// many processors share the work. asks are those of the walk, by which the
// demands count.
func drawWalks(s sampler, in Conditions, covers []coverage, asks []Ask, seed uint64, n int) *sampled {
	out := &sampled{product: make([]float64, n), failed: make([]bool, n), asked: make([][]float64, len(covers))}
	for i := range out.asked {
		out.asked[i] = make([]float64, n)
	}
	streams := make([]chem.Stream, s.Uncertain())
	for k := range streams {
		streams[k] = chem.NewStream(seed, "walk "+s.UncertainName(k))
	}
	workers := min(runtime.GOMAXPROCS(0), n)
	var wait sync.WaitGroup
	for w := range workers {
		wait.Go(func() {
			out.stretch(s, in, covers, asks, streams, w*n/workers, (w+1)*n/workers)
		})
	}
	wait.Wait()
	return out
}

// stretch makes the draws from one number to another with a workspace of its own.
func (out *sampled) stretch(s sampler, in Conditions, covers []coverage, asks []Ask, streams []chem.Stream, from, to int) {
	ws := s.Workspace(in)
	u := make([]float64, len(streams))
	for i := from; i < to; i++ {
		for k := range u {
			u[k] = streams[k].Uniform(i)
		}
		o := s.Sample(ws, u)
		out.failed[i], out.product[i] = o.Failed, float64(o.Product)
		for c := range covers {
			out.asked[c][i] = askedOf(&covers[c], asks, o.Asks)
		}
	}
}

// askedOf sums what a draw asks of a demand. The water of make-ups isn't the
// recipe's, and is the demand's as planned.
func askedOf(c *coverage, asks []Ask, drawn []float64) float64 {
	sum := 0.0
	for k, i := range c.demand.asks {
		if i < len(asks) {
			sum += drawn[asks[i].Index]
		} else {
			sum += c.demand.charges[k]
		}
	}
	return sum
}

// drawn puts the range of the product and the chance of the target from the
// draws in the place of those from the yield alone.
func (r *Risk) drawn(s *sampled, target chem.Mass) {
	r.Drawn = true
	met, failed := 0, 0
	for i, m := range s.product {
		if s.failed[i] {
			failed++
		} else if m >= float64(target)*(1-enough) {
			met++
		}
	}
	n := float64(len(s.product))
	r.TargetMet, r.Failed = float64(met)/n, float64(failed)/n
	sorted := slices.Sorted(slices.Values(s.product))
	o := chem.Outcome{Values: sorted}
	r.MassLow, r.MassMedian, r.MassHigh = chem.Mass(o.Quantile(0.05)), chem.Mass(o.Quantile(0.5)), chem.Mass(o.Quantile(0.95))
	r.ScaleFor90 = chem.Mass(o.Quantile(0.10))
}

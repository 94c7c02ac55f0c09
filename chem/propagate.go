package chem

import (
	"fmt"
	"math"
	"slices"
)

// Outcome is the distribution of a result.
type Outcome struct {
	Mean float64
	SD   float64 // standard deviation
	// StandardError is that of the mean: how far off it is for want of draws.
	StandardError float64
	// Values are the results in rising order, for Quantile.
	Values []float64
}

// Quantile returns the value that a share p of the draws, 0 to 1, lies below,
// in proportion between two neighbours (definition 7 of R. J. Hyndman and
// Y. Fan, Am. Stat. 50 (1996) 361).
func (o Outcome) Quantile(p float64) float64 {
	at := min(max(p, 0), 1) * float64(len(o.Values)-1)
	i := int(at)
	if i == len(o.Values)-1 {
		return o.Values[i]
	}
	return o.Values[i] + (at-float64(i))*(o.Values[i+1]-o.Values[i])
}

// Propagate carries distributions through a function by n draws (JCGM 101:2008,
// Monte Carlo method). Input k draws from the stream of its number under the
// seed, so that the same seed gives the same draws in every call. f must not
// keep the slice. A result that is no number is an error that names the draw.
func Propagate(f func(x []float64) float64, inputs []Dist, n int, seed uint64) (Outcome, error) {
	if n < 2 {
		return Outcome{}, errNoDraws
	}
	streams := make([]Stream, len(inputs))
	for k := range inputs {
		streams[k] = NewStream(seed, fmt.Sprintf("input %d", k))
	}
	x, values := make([]float64, len(inputs)), make([]float64, n)
	for i := range values {
		for k, d := range inputs {
			x[k] = streams[k].Draw(d, i)
		}
		values[i] = f(x)
		if !Finite(values[i]) {
			return Outcome{}, fmt.Errorf("draw %d of %d: the result of %v is no number", i, n, x)
		}
	}
	return summarise(values), nil
}

// summarise sorts the values and takes their moments.
func summarise(values []float64) Outcome {
	n := float64(len(values))
	var sum, square float64
	for _, v := range values {
		sum += v
	}
	mean := sum / n
	for _, v := range values {
		square += float64((v - mean) * (v - mean))
	}
	sd := math.Sqrt(square / (n - 1))
	slices.Sort(values)
	return Outcome{mean, sd, sd / math.Sqrt(n), values}
}

// FirstOrder carries means and standard deviations of independent inputs
// through a function by its slopes at the means,
//
//	u(y)² = Σ (∂f/∂x)²·u(x)²
//
// (JCGM 100:2008, 5.1.2), with central differences a tenth of a standard
// deviation wide. shares are the parts of the variance, input by input, and add
// up to one where there is any. It holds where f is nearly straight over the
// spread of its inputs; Propagate doesn't need that.
func FirstOrder(f func(x []float64) float64, inputs []Dist) (mean, sd float64, shares []float64, err error) {
	x := make([]float64, len(inputs))
	for k, d := range inputs {
		x[k] = d.Mean()
	}
	mean = f(x)
	shares = make([]float64, len(inputs))
	var variance float64
	for k, d := range inputs {
		if d.SD() == 0 {
			continue
		}
		centre, step := x[k], d.SD()/10
		x[k] = centre + step
		above := f(x)
		x[k] = centre - step
		below := f(x)
		x[k] = centre
		u := (above - below) / (2 * step) * d.SD()
		shares[k] = u * u
		variance += u * u
	}
	if !Finite(mean) || !Finite(variance) {
		return 0, 0, nil, fmt.Errorf("first-order uncertainty: the result near %v is no number", x)
	}
	for k := range shares {
		if variance > 0 {
			shares[k] /= variance
		}
	}
	return mean, math.Sqrt(variance), shares, nil
}

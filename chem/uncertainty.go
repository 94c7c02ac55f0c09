package chem

import (
	"errors"
	"fmt"
	"math"
)

// A Dist is the distribution of a quantity that isn't known exactly. Quantile
// returns the value that a share p of all values, 0 < p < 1, lies below, so
// that the same p gives the same cautious or lucky value in two plans that are
// compared (common random numbers). The distributions of this package sample
// without allocation and to the same bit on every machine.
type Dist interface {
	Quantile(p float64) float64
	Mean() float64
	SD() float64
}

// Exactly is a value that is known.
type Exactly float64

// Quantile returns the value.
func (e Exactly) Quantile(float64) float64 { return float64(e) }

// Mean returns the value.
func (e Exactly) Mean() float64 { return float64(e) }

// SD returns 0.
func (e Exactly) SD() float64 { return 0 }

// Normal is the normal distribution.
type Normal struct{ mean, sd float64 }

// NewNormal returns the normal distribution with this mean and standard
// deviation, which must be 0 or more.
func NewNormal(mean, sd float64) (Normal, error) {
	if !Finite(mean) || !Finite(sd) || sd < 0 {
		return Normal{}, fmt.Errorf("normal distribution: mean %v, standard deviation %v; want numbers, the second 0 or more", mean, sd)
	}
	return Normal{mean, sd}, nil
}

// Quantile returns the value that a share p lies below.
func (n Normal) Quantile(p float64) float64 { return n.mean + float64(n.sd*standardQuantile(p)) }

// Mean returns the mean.
func (n Normal) Mean() float64 { return n.mean }

// SD returns the standard deviation.
func (n Normal) SD() float64 { return n.sd }

// Uniform is the distribution with the same chance everywhere between two ends.
type Uniform struct{ low, high float64 }

// NewUniform returns the uniform distribution between low and high.
func NewUniform(low, high float64) (Uniform, error) {
	if !Finite(low) || !Finite(high) || low > high {
		return Uniform{}, fmt.Errorf("uniform distribution: from %v to %v; want two numbers in rising order", low, high)
	}
	return Uniform{low, high}, nil
}

// Quantile returns the value that a share p lies below.
func (u Uniform) Quantile(p float64) float64 { return u.low + float64((u.high-u.low)*p) }

// Mean returns the middle.
func (u Uniform) Mean() float64 { return u.low/2 + u.high/2 }

// SD returns the standard deviation, the width over √12.
func (u Uniform) SD() float64 { return (u.high - u.low) / math.Sqrt(12) }

// Triangular is the distribution that rises to a most likely value and falls
// from it, in straight lines.
type Triangular struct{ low, likely, high float64 }

// NewTriangular returns the triangular distribution from low to high with its
// peak at likely.
func NewTriangular(low, likely, high float64) (Triangular, error) {
	if !Finite(low) || !Finite(likely) || !Finite(high) || likely < low || high < likely {
		return Triangular{}, fmt.Errorf("triangular distribution: %v, %v, %v; want three numbers in rising order", low, likely, high)
	}
	return Triangular{low, likely, high}, nil
}

// Quantile returns the value that a share p lies below.
func (t Triangular) Quantile(p float64) float64 {
	width, rise, fall := t.high-t.low, t.likely-t.low, t.high-t.likely
	if width == 0 {
		return t.low
	}
	if p*width < rise {
		return t.low + math.Sqrt(float64(float64(width*rise)*p))
	}
	return t.high - math.Sqrt(float64(float64(width*fall)*(1-p)))
}

// Mean returns the mean.
func (t Triangular) Mean() float64 { return (t.low + t.likely + t.high) / 3 }

// SD returns the standard deviation.
func (t Triangular) SD() float64 {
	a, b, c := t.low-t.likely, t.high-t.likely, t.high-t.low
	return math.Sqrt(float64(a*a)/36 + float64(b*b)/36 + float64(c*c)/36)
}

// LogNormal is the distribution of a positive quantity whose logarithm is
// normal: factors and losses that can't fall below nothing.
type LogNormal struct{ mu, sigma float64 }

// NewLogNormal returns the log-normal distribution with this mean, more than 0,
// and standard deviation, 0 or more, of the quantity itself.
func NewLogNormal(mean, sd float64) (LogNormal, error) {
	if !(mean > 0) || !Finite(mean) || !(sd >= 0) || !Finite(sd) {
		return LogNormal{}, fmt.Errorf("log-normal distribution: mean %v, standard deviation %v; want numbers more than 0", mean, sd)
	}
	ratio := sd / mean
	variance := portableLog(1 + float64(ratio*ratio))
	return LogNormal{portableLog(mean) - variance/2, math.Sqrt(variance)}, nil
}

// Quantile returns the value that a share p lies below.
func (l LogNormal) Quantile(p float64) float64 {
	return portableExp(l.mu + float64(l.sigma*standardQuantile(p)))
}

// Mean returns the mean.
func (l LogNormal) Mean() float64 { return portableExp(l.mu + float64(l.sigma*l.sigma)/2) }

// SD returns the standard deviation.
func (l LogNormal) SD() float64 {
	return float64(l.Mean() * math.Sqrt(portableExp(float64(l.sigma*l.sigma))-1))
}

// Bernoulli is 1 with a chance and 0 without it.
type Bernoulli float64

// NewBernoulli returns the distribution that is 1 with chance p, 0 ≤ p ≤ 1.
func NewBernoulli(p float64) (Bernoulli, error) {
	if !(p >= 0 && p <= 1) {
		return 0, fmt.Errorf("chance %v: want 0 to 1", p)
	}
	return Bernoulli(p), nil
}

// Quantile returns 1 for the upper share of p, 0 for the rest.
func (b Bernoulli) Quantile(p float64) float64 {
	if p > 1-float64(b) {
		return 1
	}
	return 0
}

// Mean returns the chance.
func (b Bernoulli) Mean() float64 { return float64(b) }

// SD returns the standard deviation.
func (b Bernoulli) SD() float64 { return math.Sqrt(float64(b) * (1 - float64(b))) }

// Clipped is a distribution cut off at two ends and spread over what is left, as
// for a share that stays between 0 and 1.
type Clipped struct {
	of            Dist
	low, high     float64
	below, inside float64 // share of the whole that lies below low; between the ends
	mean, sd      float64
}

// NewClipped returns d between low and high. It fails where d has next to
// nothing there.
func NewClipped(d Dist, low, high float64) (Clipped, error) {
	if !(low < high) {
		return Clipped{}, fmt.Errorf("clipped distribution: from %v to %v; want two numbers in rising order", low, high)
	}
	c := Clipped{of: d, low: low, high: high}
	c.below = shareBelow(d, low)
	c.inside = shareBelow(d, high) - c.below
	if c.inside < 1e-6 {
		return Clipped{}, fmt.Errorf("clipped distribution: next to nothing lies between %v and %v", low, high)
	}
	c.mean, c.sd = moments(c)
	return c, nil
}

// Quantile returns the value that a share p lies below.
func (c Clipped) Quantile(p float64) float64 {
	x := c.of.Quantile(c.below + float64(c.inside*p))
	return min(max(x, c.low), c.high)
}

// Mean returns the mean.
func (c Clipped) Mean() float64 { return c.mean }

// SD returns the standard deviation.
func (c Clipped) SD() float64 { return c.sd }

// shareBelow inverts the quantile by halving.
func shareBelow(d Dist, x float64) float64 {
	low, high := 0.0, 1.0
	for high-low > 1e-12 {
		p := (low + high) / 2
		if d.Quantile(p) < x {
			low = p
		} else {
			high = p
		}
	}
	return (low + high) / 2
}

// moments integrates a distribution over its quantiles at 4096 middles.
func moments(d Dist) (mean, sd float64) {
	const n = 4096
	for i := range n {
		mean += d.Quantile((float64(i) + 0.5) / n)
	}
	mean /= n
	var square float64
	for i := range n {
		off := d.Quantile((float64(i)+0.5)/n) - mean
		square += float64(off * off)
	}
	return mean, math.Sqrt(square / n)
}

// A Stream is an endless row of random numbers that belongs to one seed and one
// name. Number i can be asked for in any order, and is the same whatever else
// is drawn: two plans that share a bottle share its luck.
type Stream uint64

// NewStream returns the stream of a name under a seed.
func NewStream(seed uint64, name string) Stream {
	h := uint64(14695981039346656037) // FNV-1a, 64 bit
	for i := range len(name) {
		h = (h ^ uint64(name[i])) * 1099511628211
	}
	return Stream(scramble(scramble(seed) ^ h))
}

// Uniform returns number i of the stream, between 0 and 1 and neither.
func (s Stream) Uniform(i int) float64 {
	bits := scramble(uint64(s)+uint64(i)*0x9e3779b97f4a7c15) >> 11 // 53 bits
	return (float64(bits) + 0.5) * 0x1p-53
}

// Draw returns number i of the stream as drawn from d.
func (s Stream) Draw(d Dist, i int) float64 { return d.Quantile(s.Uniform(i)) }

// scramble is the output function of SplitMix64: G. L. Steele, D. Lea and
// C. H. Flood, OOPSLA 2014, with the constants of D. Stafford's variant 13.
func scramble(z uint64) uint64 {
	z += 0x9e3779b97f4a7c15
	z = (z ^ z>>30) * 0xbf58476d1ce4e5b9
	z = (z ^ z>>27) * 0x94d049bb133111eb
	return z ^ z>>31
}

// errNoDraws is the cause where a propagation is asked for no draws.
var errNoDraws = errors.New("number of draws must be 2 or more")

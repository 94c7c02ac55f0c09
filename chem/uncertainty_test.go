package chem

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/stat/distuv"
)

func must[D any](d D, err error) D {
	if err != nil {
		panic(err)
	}
	return d
}

// TestQuantiles checks against gonum's distributions, which are independent of
// this package.
func TestQuantiles(t *testing.T) {
	sigma := math.Sqrt(math.Log(1 + 0.25*0.25))
	tests := []struct {
		name string
		got  Dist
		want interface {
			Quantile(float64) float64
			Mean() float64
			StdDev() float64
		}
	}{
		{"normal", must(NewNormal(75, 7)), distuv.Normal{Mu: 75, Sigma: 7}},
		{"uniform", must(NewUniform(-1, 3)), distuv.Uniform{Min: -1, Max: 3}},
		{"log-normal", must(NewLogNormal(2, 0.5)), distuv.LogNormal{Mu: math.Log(2) - sigma*sigma/2, Sigma: sigma}},
		{"triangular", must(NewTriangular(1, 2, 5)), distuv.NewTriangle(1, 5, 2, nil)},
	}
	for _, c := range tests {
		for _, p := range []float64{1e-12, 1e-6, 0.01, 0.1, 0.3, 0.5, 0.77, 0.95, 0.9999} {
			if got, want := c.got.Quantile(p), c.want.Quantile(p); math.Abs(got-want) > 1e-9*(1+math.Abs(want)) {
				t.Errorf("%s: Quantile(%v) = %v, want %v", c.name, p, got, want)
			}
		}
		if math.Abs(c.got.Mean()-c.want.Mean()) > 1e-12 || math.Abs(c.got.SD()-c.want.StdDev()) > 1e-12 {
			t.Errorf("%s: mean %v, sd %v; want %v, %v", c.name, c.got.Mean(), c.got.SD(), c.want.Mean(), c.want.StdDev())
		}
	}
}

// TestPortable checks the elementary functions against the standard library.
func TestPortable(t *testing.T) {
	for x := -60.0; x < 60; x += 0.37 {
		if got, want := portableExp(x), math.Exp(x); math.Abs(got/want-1) > 4e-15 {
			t.Errorf("portableExp(%v) = %v, want %v", x, got, want)
		}
		if got := portableLog(math.Exp(x)); math.Abs(got-x) > 4e-15*(1+math.Abs(x)) {
			t.Errorf("portableLog(exp %v) = %v", x, got)
		}
	}
}

// TestBits holds the very bits of a few draws: the same on every machine.
func TestBits(t *testing.T) {
	s := NewStream(1, "yield")
	d, l := must(NewNormal(75, 7)), must(NewLogNormal(2, 0.5))
	var sum uint64
	for i := range 1000 {
		sum = scramble(sum ^ math.Float64bits(s.Draw(d, i)) ^ math.Float64bits(s.Draw(l, i)))
	}
	const golden = 0x30fad5cd58e5d57e
	if sum != golden {
		t.Errorf("fingerprint of a thousand draws: %#x, want %#x (golden)", sum, uint64(golden))
	}
}

func TestSamplingAllocatesNothing(t *testing.T) {
	s := NewStream(1, "fill")
	ds := []Dist{must(NewNormal(1, 1)), must(NewLogNormal(1, 0.3)), must(NewTriangular(0, 1, 2)),
		must(NewBernoulli(0.05)), must(NewClipped(must(NewNormal(0.9, 0.1)), 0, 1)), Exactly(2)}
	i := 0
	var sum float64
	if n := testing.AllocsPerRun(100, func() {
		for _, d := range ds {
			sum += s.Draw(d, i)
		}
		i++
	}); n != 0 {
		t.Errorf("sampling allocates %v times", n)
	}
}

// TestPropagate checks the product of two lengths of JCGM 100's kind: relative
// variances add up (to first order), and both ways agree.
func TestPropagate(t *testing.T) {
	product := func(x []float64) float64 { return x[0] * x[1] }
	inputs := []Dist{must(NewNormal(10, 0.3)), must(NewNormal(5, 0.2))}
	want := 50 * math.Sqrt(0.03*0.03+0.04*0.04) // 2.5
	mean, sd, shares, err := FirstOrder(product, inputs)
	if err != nil || math.Abs(mean-50) > 1e-12 || math.Abs(sd-want) > 1e-9 || math.Abs(shares[0]-0.36) > 1e-9 {
		t.Errorf("FirstOrder = %v, %v, %v, %v; want 50, %v, first share 0.36", mean, sd, shares, err, want)
	}
	o, err := Propagate(product, inputs, 20000, 7)
	if err != nil || math.Abs(o.Mean-50) > 4*o.StandardError || math.Abs(o.SD/want-1) > 0.03 {
		t.Errorf("Propagate: mean %v ± %v, sd %v, %v; want 50, %v", o.Mean, o.StandardError, o.SD, err, want)
	}
	if p := o.Quantile(0.9); math.Abs(p-(50+1.2816*want)) > 0.15 {
		t.Errorf("90th percentile %v, want %v", p, 50+1.2816*want)
	}
}

// TestStreamsAreIndependent checks that neighbouring names and seeds don't move
// together, and that the numbers fill the unit interval evenly.
func TestStreamsAreIndependent(t *testing.T) {
	a, b, c := NewStream(1, "a"), NewStream(1, "b"), NewStream(2, "a")
	const n = 20000
	var ab, ac, mean, square float64
	for i := range n {
		x, y, z := a.Uniform(i)-0.5, b.Uniform(i)-0.5, c.Uniform(i)-0.5
		ab, ac, mean, square = ab+x*y, ac+x*z, mean+x, square+x*x
	}
	limit := 4 / 12.0 / math.Sqrt(n) // four standard errors of a product of uniforms
	if math.Abs(ab/n) > limit || math.Abs(ac/n) > limit {
		t.Errorf("covariances %v, %v; want under %v", ab/n, ac/n, limit)
	}
	if math.Abs(mean/n) > 4*math.Sqrt(1.0/12/n) || math.Abs(square/n-1.0/12) > 0.003 {
		t.Errorf("mean %v, variance %v; want 0, 1/12", mean/n, square/n)
	}
}

func TestBadDistributions(t *testing.T) {
	if _, err := NewNormal(1, -1); err == nil {
		t.Error("a negative standard deviation is taken")
	}
	if _, err := NewUniform(2, 1); err == nil {
		t.Error("a uniform distribution from 2 to 1 is taken")
	}
	if _, err := NewTriangular(0, 3, 2); err == nil {
		t.Error("a peak outside the triangle is taken")
	}
	if _, err := NewLogNormal(0, 1); err == nil {
		t.Error("a log-normal mean of 0 is taken")
	}
	if _, err := NewBernoulli(1.2); err == nil {
		t.Error("a chance of 1.2 is taken")
	}
	if _, err := NewClipped(must(NewNormal(0, 1)), 40, 41); err == nil {
		t.Error("a distribution with nothing in it is taken")
	}
	if _, err := Propagate(func([]float64) float64 { return math.NaN() }, []Dist{Exactly(1)}, 10, 1); err == nil {
		t.Error("a result that is no number is taken")
	}
}

func BenchmarkNormalDraw(b *testing.B) {
	s := NewStream(1, "x")
	var d Dist = must(NewNormal(1, 1))
	b.ReportAllocs()
	i := 0
	for b.Loop() {
		s.Draw(d, i)
		i++
	}
}

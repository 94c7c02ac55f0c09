package chem

import (
	"math"
	"testing"
)

// Against the standard library, which is good to a unit in the last place.
func TestPortablePowers(t *testing.T) {
	for _, x := range []float64{-12.3, -3, -0.5, 0, 1e-9, 0.3, 1, 7.25, 14} {
		if got, want := Exp10(x), math.Pow(10, x); math.Abs(got/want-1) > 1e-14 {
			t.Errorf("Exp10(%v) = %v, want %v", x, got, want)
		}
	}
	for _, x := range []float64{1e-9, 0.2, 1, 1.5, 40, 1e6} {
		if got, want := Ln(x), math.Log(x); math.Abs(got-want) > 1e-14*math.Max(1, math.Abs(want)) {
			t.Errorf("Ln(%v) = %v, want %v", x, got, want)
		}
		if got, want := Raised(x, 2.0/3), math.Pow(x, 2.0/3); math.Abs(got/want-1) > 1e-14 {
			t.Errorf("Raised(%v, 2/3) = %v, want %v", x, got, want)
		}
	}
	if Raised(0, 2.0/3) != 0 || !math.IsNaN(Ln(0)) || !math.IsNaN(Ln(-1)) {
		t.Error("edges: Raised(0, 2/3) is 0, Ln of nothing is NaN")
	}
}

package chem

import "math"

// Powers and logarithms that give the same bits on every machine, for what is
// drawn with a stored seed. They are good to a few units in the last place.

// Exp10 returns 10 to the power x.
func Exp10(x float64) float64 { return portableExp(float64(x * math.Ln10)) }

// Ln returns the natural logarithm of x; NaN if x isn't positive.
func Ln(x float64) float64 {
	if !(x > 0) {
		return math.NaN()
	}
	return portableLog(x)
}

// Raised returns x to the power y for an x that isn't negative; 0 for x = 0.
func Raised(x, y float64) float64 {
	if !(x > 0) {
		return 0
	}
	return portableExp(float64(y * portableLog(x)))
}

package chem

import "math/bits"

// ratio is an exact fraction num/den with den > 0 and no common factor, so that
// half a water of hydration stays half a water.
type ratio struct{ num, den int64 }

var one = ratio{1, 1}

// maxCount bounds the numbers in a formula. It is far above any real subscript
// and low enough that products of two stay within int64.
const maxCount = 1 << 31

func (r ratio) float() float64 { return float64(r.num) / float64(r.den) }

// times returns the product, or false if it leaves the bounds of a formula.
func (r ratio) times(s ratio) (ratio, bool) {
	a, b := gcd(r.num, s.den), gcd(s.num, r.den)
	num := (r.num / a) * (s.num / b)
	den := (r.den / b) * (s.den / a)
	return ratio{num, den}, num < maxCount && den < maxCount
}

// plus returns the sum, or false if it leaves the bounds of a formula.
func (r ratio) plus(s ratio) (ratio, bool) {
	if r.den == s.den && r.den == 1 {
		return ratio{r.num + s.num, 1}, r.num+s.num < maxCount
	}
	g := gcd(r.den, s.den)
	num, den := r.num*(s.den/g)+s.num*(r.den/g), r.den/g*s.den
	if k := gcd(num, den); k > 1 {
		num, den = num/k, den/k
	}
	return ratio{num, den}, num < maxCount && den < maxCount
}

// newRatio reduces num/den; both must be positive.
func newRatio(num, den int64) ratio {
	g := gcd(num, den)
	return ratio{num / g, den / g}
}

// gcd returns the greatest common divisor of the magnitudes; gcd(0, n) is |n|,
// and gcd(0, 0) is 1 so that it may be divided by.
func gcd(a, b int64) int64 {
	x, y := magnitude(a), magnitude(b)
	if x == 0 || y == 0 {
		return int64(max(x+y, 1))
	}
	shift := bits.TrailingZeros64(x | y)
	x >>= bits.TrailingZeros64(x)
	for y != 0 {
		y >>= bits.TrailingZeros64(y)
		if x > y {
			x, y = y, x
		}
		y -= x
	}
	return int64(x << shift)
}

func magnitude(a int64) uint64 {
	if a < 0 {
		return uint64(-a)
	}
	return uint64(a)
}

package chem

import "math"

// Elementary functions that give the same bits on every machine. The standard
// ones may use a processor's own instructions, and a compiler may fuse a
// product and a sum; the conversions below forbid it, as the language
// specification says ("Floating-point operators").

// standardQuantile returns the value that a share p of the standard normal
// distribution lies below: M. J. Wichura, algorithm AS 241 (PPND16), Appl.
// Stat. 37 (1988) 477, to about 1 part in 10¹⁶. p = 0 and 1 give the outermost
// values that 53 bits can tell apart, not infinity.
func standardQuantile(p float64) float64 {
	const outermost = 0x1p-54
	p = min(max(p, outermost), 1-0x1p-53)
	q := p - 0.5
	if math.Abs(q) <= 0.425 {
		r := 0.180625 - float64(q*q)
		return float64(q*horner(r, centreTop[:])) / horner(r, centreBottom[:])
	}
	r := p
	if q > 0 {
		r = 1 - p
	}
	r = math.Sqrt(-portableLog(r))
	var x float64
	if r <= 5 {
		x = horner(r-1.6, middleTop[:]) / horner(r-1.6, middleBottom[:])
	} else {
		x = horner(r-5, tailTop[:]) / horner(r-5, tailBottom[:])
	}
	if q < 0 {
		return -x
	}
	return x
}

// Coefficients of AS 241, highest power first.
var (
	centreTop = [8]float64{2.5090809287301226727e3, 3.3430575583588128105e4, 6.7265770927008700853e4,
		4.5921953931549871457e4, 1.3731693765509461125e4, 1.9715909503065514427e3,
		1.3314166789178437745e2, 3.3871328727963666080e0}
	centreBottom = [8]float64{5.2264952788528545610e3, 2.8729085735721942674e4, 3.9307895800092710610e4,
		2.1213794301586595867e4, 5.3941960214247511077e3, 6.8718700749205790830e2,
		4.2313330701600911252e1, 1}
	middleTop = [8]float64{7.74545014278341407640e-4, 2.27238449892691845833e-2, 2.41780725177450611770e-1,
		1.27045825245236838258e0, 3.64784832476320460504e0, 5.76949722146069140550e0,
		4.63033784615654529590e0, 1.42343711074968357734e0}
	middleBottom = [8]float64{1.05075007164441684324e-9, 5.47593808499534494600e-4, 1.51986665636164571966e-2,
		1.48103976427480074590e-1, 6.89767334985100004550e-1, 1.67638483018380384940e0,
		2.05319162663775882187e0, 1}
	tailTop = [8]float64{2.01033439929228813265e-7, 2.71155556874348757815e-5, 1.24266094738807843860e-3,
		2.65321895265761230930e-2, 2.96560571828504891230e-1, 1.78482653991729133580e0,
		5.46378491116411436990e0, 6.65790464350110377720e0}
	tailBottom = [8]float64{2.04426310338993978564e-15, 1.42151175831644588870e-7, 1.84631831751005468180e-5,
		7.86869131145613259100e-4, 1.48753612908506148525e-2, 1.36929880922735805310e-1,
		5.99832206555887937690e-1, 1}
)

// horner evaluates a polynomial, highest power first, without fused products.
func horner(x float64, coefficients []float64) float64 {
	sum := coefficients[0]
	for _, c := range coefficients[1:] {
		sum = float64(sum*x) + c
	}
	return sum
}

// portableLog returns the natural logarithm of a positive number to a few units
// in the last place, from ln(m) = 2·artanh((m−1)/(m+1)) with m between √½ and √2.
func portableLog(x float64) float64 {
	m, e := math.Frexp(x)
	if m < math.Sqrt2/2 {
		m, e = float64(2*m), e-1
	}
	s := (m - 1) / (m + 1)
	square := float64(s * s)
	sum := 0.0
	for k := 25; k >= 3; k -= 2 { // |s| < 0.172: the next term is below 1e-20
		sum = float64((sum + 1/float64(k)) * square)
	}
	const low = 1.9082149292705877000e-10 // ln 2 = high + low, high short enough to be exact times e
	const high = 6.93147180369123816490e-01
	return float64(float64(e)*high) + (float64(2*s) + float64(float64(2*s)*sum) + float64(float64(e)*low))
}

// portableExp returns e to the power x, by its series after taking out powers of
// two; 0 and the largest number stand for what can't be held.
func portableExp(x float64) float64 {
	switch {
	case x < -700:
		return 0
	case x > 700:
		return math.MaxFloat64
	}
	const high, low = 6.93147180369123816490e-01, 1.9082149292705877000e-10
	e := math.Floor(float64(x*(1/math.Ln2)) + 0.5)
	r := x - float64(e*high) - float64(e*low) // |r| ≤ 0.35
	sum := 1.0
	for k := 17; k >= 1; k-- {
		sum = 1 + float64(sum*r)/float64(k)
	}
	return math.Ldexp(sum, int(e))
}

package chem

import (
	"math"
	"math/big"
	"math/bits"
)

// nullSpace returns a basis of the vectors x with matrix·x = 0, each scaled to
// the smallest whole numbers, first number positive. It works on int64 by
// elimination without fractions and starts over with big integers should a
// number leave that range. A basis vector that doesn't fit int64 even then counts
// as absent; formulas are bounded so that this takes an absurd equation.
func nullSpace(matrix [][]int64, width int) [][]int64 {
	work := make([][]int64, len(matrix))
	cells := make([]int64, len(matrix)*width)
	for i, line := range matrix {
		work[i] = cells[i*width : (i+1)*width]
		copy(work[i], line)
	}
	pivots, ok := eliminate(work, width)
	if !ok {
		return nullSpaceBig(matrix, width)
	}
	var basis [][]int64
	for free := range width {
		if isPivot(pivots, free) {
			continue
		}
		v, ok := solveFor(work, pivots, free, width)
		if !ok {
			return nullSpaceBig(matrix, width)
		}
		basis = append(basis, v)
	}
	return basis
}

// eliminate brings the matrix to a form in which each pivot column has one
// number only, and returns the pivot column of each of the first rows. It
// reports false on overflow.
func eliminate(m [][]int64, width int) ([]int, bool) {
	var pivots []int
	for column := 0; column < width && len(pivots) < len(m); column++ {
		r := len(pivots)
		found := -1
		for i := r; i < len(m); i++ {
			if m[i][column] != 0 && (found < 0 || magnitude(m[i][column]) < magnitude(m[found][column])) {
				found = i
			}
		}
		if found < 0 {
			continue
		}
		m[r], m[found] = m[found], m[r]
		for i := range m {
			if i != r && m[i][column] != 0 && !clearCell(m[i], m[r], column) {
				return nil, false
			}
		}
		pivots = append(pivots, column)
	}
	return pivots, true
}

// clearCell subtracts a multiple of the pivot row so that the line's number in
// the column becomes 0, and divides the line by its common factor.
func clearCell(line, pivot []int64, column int) bool {
	g := gcd(line[column], pivot[column])
	p, q := pivot[column]/g, line[column]/g
	var common int64
	for k := range line {
		a, ok1 := multiply(line[k], p)
		b, ok2 := multiply(pivot[k], q)
		d, ok3 := subtract(a, b)
		if !ok1 || !ok2 || !ok3 {
			return false
		}
		line[k] = d
		if d != 0 {
			common = gcd(common, d)
		}
	}
	if common > 1 {
		for k := range line {
			line[k] /= common
		}
	}
	return true
}

// solveFor returns the vector of one free column.
func solveFor(m [][]int64, pivots []int, free, width int) ([]int64, bool) {
	scale := int64(1)
	for i, column := range pivots {
		if m[i][free] == 0 {
			continue
		}
		den := m[i][column] / gcd(m[i][column], m[i][free])
		var ok bool
		if scale, ok = multiply(scale/gcd(scale, den), int64(magnitude(den))); !ok {
			return nil, false
		}
	}
	v := make([]int64, width)
	v[free] = scale
	for i, column := range pivots {
		g := gcd(m[i][column], m[i][free])
		n, ok := multiply(-m[i][free]/g, scale/(m[i][column]/g))
		if !ok {
			return nil, false
		}
		v[column] = n
	}
	return smallest(v), true
}

// smallest divides a vector by its common factor and makes its first number
// positive.
func smallest(v []int64) []int64 {
	var common int64
	sign := int64(0)
	for _, n := range v {
		if n == 0 {
			continue
		}
		common = gcd(common, n)
		if sign == 0 {
			sign = 1
			if n < 0 {
				sign = -1
			}
		}
	}
	for i := range v {
		v[i] /= common * sign
	}
	return v
}

func isPivot(pivots []int, column int) bool {
	for _, p := range pivots {
		if p == column {
			return true
		}
	}
	return false
}

// multiply and subtract report false on overflow.
func multiply(a, b int64) (int64, bool) {
	hi, lo := bits.Mul64(magnitude(a), magnitude(b))
	if hi != 0 || lo > math.MaxInt64 {
		return 0, false
	}
	if (a < 0) != (b < 0) {
		return -int64(lo), true
	}
	return int64(lo), true
}

func subtract(a, b int64) (int64, bool) {
	d := a - b
	return d, (a >= b) == (d >= 0) && d != math.MinInt64
}

// nullSpaceBig is nullSpace with rational numbers of any size.
func nullSpaceBig(matrix [][]int64, width int) [][]int64 {
	m := make([][]*big.Rat, len(matrix))
	for i, line := range matrix {
		m[i] = make([]*big.Rat, width)
		for k, n := range line {
			m[i][k] = new(big.Rat).SetInt64(n)
		}
	}
	pivots := eliminateBig(m, width)
	var basis [][]int64
	for free := range width {
		if isPivot(pivots, free) {
			continue
		}
		v := make([]*big.Rat, width)
		for k := range v {
			v[k] = new(big.Rat)
		}
		v[free].SetInt64(1)
		for i, column := range pivots {
			v[column].Neg(m[i][free])
		}
		if whole, ok := wholeNumbers(v); ok {
			basis = append(basis, whole)
		}
	}
	return basis
}

func eliminateBig(m [][]*big.Rat, width int) []int {
	var pivots []int
	for column := 0; column < width && len(pivots) < len(m); column++ {
		r := len(pivots)
		found := r
		for found < len(m) && m[found][column].Sign() == 0 {
			found++
		}
		if found == len(m) {
			continue
		}
		m[r], m[found] = m[found], m[r]
		inverse := new(big.Rat).Inv(m[r][column])
		for k := range m[r] {
			m[r][k] = new(big.Rat).Mul(m[r][k], inverse)
		}
		for i := range m {
			if i == r || m[i][column].Sign() == 0 {
				continue
			}
			factor := new(big.Rat).Set(m[i][column])
			for k := range m[i] {
				m[i][k] = new(big.Rat).Sub(m[i][k], new(big.Rat).Mul(factor, m[r][k]))
			}
		}
		pivots = append(pivots, column)
	}
	return pivots
}

// wholeNumbers scales a vector to the smallest whole numbers.
func wholeNumbers(v []*big.Rat) ([]int64, bool) {
	scale := big.NewInt(1)
	for _, r := range v {
		g := new(big.Int).GCD(nil, nil, scale, r.Denom())
		scale.Div(scale, g).Mul(scale, r.Denom())
	}
	whole := make([]int64, len(v))
	common := new(big.Int)
	scaled := make([]*big.Int, len(v))
	for i, r := range v {
		scaled[i] = new(big.Int).Div(new(big.Int).Mul(r.Num(), scale), r.Denom())
		common.GCD(nil, nil, common, new(big.Int).Abs(scaled[i]))
	}
	for i, n := range scaled {
		n.Div(n, common)
		if !n.IsInt64() {
			return nil, false
		}
		whole[i] = n.Int64()
	}
	return smallest(whole), true
}

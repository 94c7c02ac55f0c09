package chem

const (
	maxWays    = 3  // independent reactions up to which one-way reactions are looked for
	maxSpecies = 16 // likewise species
)

// plainWays returns as many independent reactions as the basis has in which no species
// changes sides and as few as possible take part, because a chemist knows those:
// peroxide with permanganate comes out as peroxide by itself and permanganate by
// itself. Each has as many species left out as there are independent reactions less
// one. Where there aren't enough of them, or the reaction is too large, the basis
// comes back as it is.
func plainWays(basis [][]int64) [][]int64 {
	d, width := len(basis), len(basis[0])
	if d > maxWays || width > maxSpecies {
		return basis
	}
	var found [][]int64
	out := make([]int, d-1)
	var choose func(k, from int)
	choose = func(k, from int) {
		if len(found) == d {
			return
		}
		if k == len(out) {
			if v, ok := wayWithout(basis, out); ok && independent(found, v) {
				found = append(found, v)
			}
			return
		}
		for j := from; j < width; j++ {
			out[k] = j
			choose(k+1, j+1)
		}
	}
	choose(0, 0)
	if len(found) < d {
		return basis
	}
	return found
}

// wayWithout returns the one combination of the basis in which the given species take
// no part, if there is just one and none of its numbers is negative.
func wayWithout(basis [][]int64, out []int) ([]int64, bool) {
	conditions := make([][]int64, len(out))
	for i, j := range out {
		for _, b := range basis {
			conditions[i] = append(conditions[i], b[j])
		}
	}
	factors := nullSpace(conditions, len(basis))
	if len(factors) != 1 {
		return nil, false
	}
	v := make([]int64, len(basis[0]))
	for j := range v {
		for i, b := range basis {
			n, ok := multiply(factors[0][i], b[j])
			if !ok {
				return nil, false
			}
			if v[j], ok = subtract(v[j], -n); !ok {
				return nil, false
			}
		}
	}
	v = smallest(v)
	for _, n := range v {
		if n < 0 {
			return nil, false
		}
	}
	return v, true
}

// independent reports whether v isn't a combination of the others.
func independent(others [][]int64, v []int64) bool {
	rows := make([][]int64, 0, len(others)+1)
	for _, o := range append(others[:len(others):len(others)], v) {
		rows = append(rows, append([]int64(nil), o...))
	}
	pivots, ok := eliminate(rows, len(v))
	return ok && len(pivots) == len(rows)
}

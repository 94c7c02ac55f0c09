package chem

import (
	"errors"
	"fmt"
	"strings"
)

// Kinds of refusal of a reaction to be balanced, for errors.Is.
var (
	// ErrNoBalance: no set of coefficients balances the reaction.
	ErrNoBalance = errors.New("no way to balance")
	// ErrSeveralBalances: the species hold more than one independent reaction.
	ErrSeveralBalances = errors.New("several independent ways to balance")
	// ErrWrongSide: it balances only with a species on the other side or left out.
	ErrWrongSide = errors.New("balances only with a species moved")
)

// BalanceError says why a reaction has no one balanced form.
type BalanceError struct {
	Equation Equation // as given
	What     string
	Wanted   string
	// Ways are independent balanced reactions that together span all others;
	// only with ErrSeveralBalances. Species keep their sides where that can be.
	Ways  []Equation
	Cause error
}

func (e *BalanceError) Error() string {
	s := fmt.Sprintf("balancing %q: %s", e.Equation, e.What)
	for i, way := range e.Ways {
		s += fmt.Sprintf(" (%d) %s", i+1, way)
	}
	if e.Wanted != "" {
		s += "; " + e.Wanted
	}
	return s
}

// Unwrap returns the kind.
func (e *BalanceError) Unwrap() error { return e.Cause }

// Balance returns the equation with the smallest whole coefficients that balance
// every element and the charge, whatever coefficients it came with. The
// coefficients are the null space of the matrix of atom counts (reactants
// positive, products negative, one line more for the charge), found by exact
// arithmetic.
//
// A reaction that can't balance, that balances only with a species moved or
// dropped, or that holds several independent reactions is refused with a
// *BalanceError; of several the caller has to choose.
func Balance(e Equation) (Equation, error) {
	matrix, kinds := e.matrix()
	basis := nullSpace(matrix, len(e.Left)+len(e.Right))
	switch {
	case len(basis) == 0:
		return Equation{}, e.noBalance(kinds)
	case len(basis) > 1:
		return Equation{}, e.severalBalances(basis)
	}
	for j, c := range basis[0] {
		if c <= 0 {
			return Equation{}, e.wrongSide(j, c)
		}
	}
	return e.with(basis[0]), nil
}

// with returns the equation with the coefficients given in the order of species.
func (e Equation) with(coefficients []int64) Equation {
	b := Equation{Left: append([]Term(nil), e.Left...), Right: append([]Term(nil), e.Right...)}
	for j := range b.Left {
		b.Left[j].Coefficient = coefficients[j]
	}
	for j := range b.Right {
		b.Right[j].Coefficient = coefficients[len(b.Left)+j]
	}
	return b
}

// way returns one vector of the null space as a reaction, moving what is
// negative to the other side and leaving out what is nought.
func (e Equation) way(coefficients []int64) Equation {
	var w Equation
	for j, c := range coefficients {
		term := e.term(j)
		onLeft := j < len(e.Left)
		if c < 0 {
			c, onLeft = -c, !onLeft
		}
		term.Coefficient = c
		switch {
		case c == 0:
		case onLeft:
			w.Left = append(w.Left, term)
		default:
			w.Right = append(w.Right, term)
		}
	}
	return w
}

func (e Equation) term(j int) Term {
	if j < len(e.Left) {
		return e.Left[j]
	}
	return e.Right[j-len(e.Left)]
}

func (e Equation) noBalance(kinds []string) error {
	for i, line := range e.lines() {
		onLeft, onRight := false, false
		for j, n := range line {
			onLeft = onLeft || n != 0 && j < len(e.Left)
			onRight = onRight || n != 0 && j >= len(e.Left)
		}
		if onLeft != onRight && kinds[i] != chargeLine {
			return &BalanceError{Equation: e, What: "no coefficients do it: " + kinds[i] + " stands on one side only",
				Wanted: "add the species that takes it up or gives it", Cause: ErrNoBalance}
		}
	}
	return &BalanceError{Equation: e, What: "no coefficients balance every element and the charge",
		Wanted: "check the formulas, or add water, acid, base or electrons", Cause: ErrNoBalance}
}

func (e Equation) severalBalances(basis [][]int64) error {
	ways := make([]Equation, len(basis))
	for i, v := range plainWays(basis) {
		ways[i] = e.way(v)
	}
	return &BalanceError{Equation: e, What: fmt.Sprintf("%d independent reactions are mixed in it:", len(basis)),
		Wanted: "balance one at a time, or give the coefficients", Ways: ways, Cause: ErrSeveralBalances}
}

func (e Equation) wrongSide(j int, c int64) error {
	species := e.term(j).Species
	what, wanted := species+" would have to change sides", "move it"
	if c == 0 {
		what, wanted = species+" takes no part", "leave it out"
	}
	return &BalanceError{Equation: e, What: what, Wanted: wanted, Cause: ErrWrongSide}
}

const chargeLine = "charge"

// lines returns the rows of the matrix alone.
func (e Equation) lines() [][]int64 {
	matrix, _ := e.matrix()
	return matrix
}

// matrix returns one row of whole numbers for each element or nuclide and one for
// the charge, and what each row stands for. Columns are the species in order,
// products with the sign turned. A row with fractional counts is multiplied
// through by their common denominator.
func (e Equation) matrix() ([][]int64, []string) {
	width := len(e.Left) + len(e.Right)
	var kinds []atom
	for j := range width {
		for _, a := range e.term(j).Formula.atoms {
			if indexOfKind(kinds, a) < 0 {
				kinds = append(kinds, a)
			}
		}
	}
	cells := make([]int64, (len(kinds)+1)*width)
	matrix, names := make([][]int64, 0, len(kinds)+1), make([]string, 0, len(kinds)+1)
	for i, kind := range kinds {
		line := cells[i*width : (i+1)*width]
		e.fillLine(line, kind)
		matrix, names = append(matrix, line), append(names, kind.symbol())
	}
	line := cells[len(kinds)*width:]
	charged := false
	for j := range line {
		if line[j] = e.sign(j) * int64(e.term(j).Formula.charge); line[j] != 0 {
			charged = true
		}
	}
	if charged {
		matrix, names = append(matrix, line), append(names, chargeLine)
	}
	return matrix, names
}

func (e Equation) sign(j int) int64 {
	if j < len(e.Left) {
		return 1
	}
	return -1
}

func (e Equation) fillLine(line []int64, kind atom) {
	scale := int64(1)
	for j := range line {
		if r, ok := e.term(j).Formula.countOf(kind); ok {
			scale = scale / gcd(scale, r.den) * r.den
		}
	}
	for j := range line {
		if r, ok := e.term(j).Formula.countOf(kind); ok {
			line[j] = e.sign(j) * r.num * (scale / r.den)
		}
	}
}

func (f Formula) countOf(kind atom) (ratio, bool) {
	if i := indexOfKind(f.atoms, kind); i >= 0 {
		return f.atoms[i].count, true
	}
	return ratio{}, false
}

func indexOfKind(atoms []atom, kind atom) int {
	for i, a := range atoms {
		if a.z == kind.z && a.a == kind.a {
			return i
		}
	}
	return -1
}

// Species returns the species in the order written, left side first.
func (e Equation) Species() []string {
	var names []string
	for j := range len(e.Left) + len(e.Right) {
		names = append(names, strings.TrimSpace(e.term(j).Species))
	}
	return names
}

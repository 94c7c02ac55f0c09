package chem

import (
	"errors"
	"fmt"
	"strings"
	"unicode/utf8"
)

// Term is one species of an equation with its coefficient, at least 1.
type Term struct {
	Coefficient int64
	Species     string // as written, without the coefficient
	Formula     Formula
}

// Equation is a reaction: what is used up on the left, what is formed on the
// right, in the order written.
type Equation struct {
	Left, Right []Term
	// Written is by how much the coefficients exceed those of the text, where that
	// had fractions: 2 for "H2 + 1/2 O2 -> H2O". Nought counts as one.
	Written int64
}

// EquationError says what is wrong with an equation and what would do.
type EquationError struct {
	Text   string // the whole equation as given
	Part   string // the part it is about; may be empty
	What   string
	Wanted string
	Cause  error // ErrSyntax, a *FormulaError, or a kind of BalanceError
}

func (e *EquationError) Error() string {
	s := fmt.Sprintf("equation %q: %s", e.Text, e.What)
	if e.Part != "" {
		s = fmt.Sprintf("equation %q: %q: %s", e.Text, e.Part, e.What)
	}
	if e.Wanted != "" {
		s += "; " + e.Wanted
	}
	return s
}

// Unwrap returns the cause.
func (e *EquationError) Unwrap() error { return e.Cause }

// arrows part the two sides of an equation, the longer ones first.
var arrows = []string{"<=>", "<->", "-->", "==>", "->", "=>", "→", "⟶", "⇌", "⇄", "⇒", "="}

// ParseEquation reads a reaction such as
//
//	Cr2O7^2- + 6 Fe^2+ + 14 H^+ -> 2 Cr^3+ + 6 Fe^3+ + 7 H2O
//
// Species are parted by " + ", the sides by ->, →, ⇌ or =. Coefficients are
// optional and may be fractions, which scale the whole equation to whole
// numbers. The electron is written e^-. The equation need not balance. The error
// is an *EquationError.
func ParseEquation(text string) (Equation, error) {
	text = strings.TrimSpace(text)
	if len(text) > 4000 {
		return Equation{}, &EquationError{text[:40] + "…", "", "longer than 4000 characters", "give one reaction at a time", ErrSyntax}
	}
	left, right, ok := cutArrow(text)
	if !ok {
		return Equation{}, &EquationError{text, "", "no arrow between the two sides", "write A + B -> C", ErrSyntax}
	}
	var e Equation
	var factors []ratio
	for i, side := range []string{left, right} {
		terms, counts, err := parseSide(text, side)
		if err != nil {
			return Equation{}, err
		}
		factors = append(factors, counts...)
		if i == 0 {
			e.Left = terms
		} else {
			e.Right = terms
		}
	}
	return e, e.scaleTo(text, factors)
}

func cutArrow(text string) (left, right string, ok bool) {
	at, size := len(text), 0
	for _, arrow := range arrows {
		if i := strings.Index(text, arrow); i >= 0 && (i < at || i == at && len(arrow) > size) {
			at, size = i, len(arrow)
		}
	}
	if size == 0 {
		return "", "", false
	}
	if text[at:at+size] == "-->" && at > 0 && text[at-1] != ' ' {
		at, size = at+1, size-1 // "Cl-->": the first stroke is a charge
	}
	return text[:at], text[at+size:], true
}

func parseSide(text, side string) ([]Term, []ratio, error) {
	var terms []Term
	var factors []ratio
	for _, piece := range splitTerms(side) {
		piece = strings.TrimRight(strings.TrimSpace(piece), "↑↓ ") // gas given off, solid thrown down
		if piece == "" {
			return nil, nil, &EquationError{text, "", "a species is missing", "write one on either side of each plus and arrow", ErrSyntax}
		}
		if strings.ContainsAny(piece, "→⟶⇌⇄⇒=>") {
			return nil, nil, &EquationError{text, piece, "a second arrow", "give one reaction at a time", ErrSyntax}
		}
		factor, species := cutFactor(piece)
		formula, err := ParseFormula(species)
		if err != nil {
			return nil, nil, &EquationError{text, "", err.Error(), "", err}
		}
		if factor.num == 0 {
			return nil, nil, &EquationError{text, piece, "a coefficient of nought", "leave the species out", ErrSyntax}
		}
		terms = append(terms, Term{1, species, formula})
		factors = append(factors, factor)
	}
	return terms, factors, nil
}

// cutFactor takes the coefficient off a term; it is one if there is none.
func cutFactor(piece string) (ratio, string) {
	p := formulaParser{text: piece, formula: &Formula{}}
	factor, size := p.numberAt(0)
	if size == 0 {
		factor, size = p.halfAt(0)
	}
	if size == 0 {
		return one, piece
	}
	species := strings.TrimSpace(piece[size:])
	if rest, ok := strings.CutPrefix(species, "*"); ok {
		species = strings.TrimSpace(rest)
	}
	return factor, species
}

// scaleTo gives the terms whole coefficients in the ratio of the factors.
func (e *Equation) scaleTo(text string, factors []ratio) error {
	scale := int64(1)
	for _, f := range factors {
		scale = scale / gcd(scale, f.den) * f.den
		if scale >= maxCount {
			return &EquationError{text, "", "the fractions have no common denominator of a sensible size", "use whole coefficients", ErrSyntax}
		}
	}
	if scale > 1 {
		e.Written = scale
	}
	i := 0
	for _, side := range [][]Term{e.Left, e.Right} {
		for j := range side {
			side[j].Coefficient = factors[i].num * (scale / factors[i].den)
			i++
		}
	}
	return nil
}

// splitTerms cuts a side at the plus signs that part species and leaves those
// that are charges.
func splitTerms(side string) []string {
	var pieces []string
	begin := 0
	for i := 0; i < len(side); i++ {
		if side[i] == '+' && partsSpecies(side, begin, i) {
			pieces = append(pieces, side[begin:i])
			begin = i + 1
		}
	}
	return append(pieces, side[begin:])
}

// partsSpecies reports whether the plus at i, in a term that began at begin,
// parts two species. One right behind ^ or its number is a charge; one behind a
// blank parts; one behind a symbol parts if another species follows it.
func partsSpecies(side string, begin, i int) bool {
	before := strings.TrimRight(side[begin:i], "0123456789")
	if strings.HasSuffix(before, "^") || strings.HasSuffix(before, "{") && strings.HasSuffix(before, "^{") {
		return false
	}
	if strings.HasSuffix(before, " ") && len(before) < i-begin && strings.TrimSpace(before) != "" {
		return false // "Fe 3+"
	}
	if i > begin && (side[i-1] == ' ' || side[i-1] == '\t') || strings.TrimSpace(side[begin:i]) == "" {
		return true
	}
	rest := side[i+1:]
	after := strings.TrimLeft(rest, " ")
	if after == "" || after[0] == '+' || beginsWithState(after) {
		return false // the last sign of a charge, or the species ends here
	}
	if after == rest && isDigit(after[0]) {
		return strings.TrimLeft(after, "0123456789") != "" && !strings.HasPrefix(strings.TrimLeft(after, "0123456789"), " ")
	}
	r, _ := utf8.DecodeRuneInString(after)
	return strings.ContainsRune("([{^e", r) || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9' || r >= utf8.RuneSelf
}

// beginsWithState reports whether a text begins with (s), (l), (g) or (aq).
func beginsWithState(text string) bool {
	for _, state := range []string{"(s)", "(l)", "(g)", "(aq)"} {
		if strings.HasPrefix(text, state) {
			return true
		}
	}
	return false
}

// String returns the equation with coefficients of 1 left out.
func (e Equation) String() string { return e.over(1) }

// AsWritten is String with the coefficients of the text, fractions as decimals.
func (e Equation) AsWritten() string { return e.over(max(e.Written, 1)) }

func (e Equation) over(divisor int64) string {
	var b strings.Builder
	writeSide(&b, e.Left, divisor)
	b.WriteString(" -> ")
	writeSide(&b, e.Right, divisor)
	return b.String()
}

func writeSide(b *strings.Builder, terms []Term, divisor int64) {
	for i, t := range terms {
		if i > 0 {
			b.WriteString(" + ")
		}
		if t.Coefficient%divisor != 0 {
			b.WriteString(number(float64(t.Coefficient) / float64(divisor)))
			b.WriteByte(' ')
		} else if n := t.Coefficient / divisor; n != 1 {
			b.WriteString(decimalText(n))
			b.WriteByte(' ')
		}
		b.WriteString(t.Species)
	}
}

// Term returns the first term of a species, matched by its text or else by its
// atoms and charge, and its stoichiometric number: negative on the left.
func (e Equation) Term(species string) (t Term, number int64, ok bool) {
	same := func(t Term) bool { return t.Species == species }
	if t, number, ok = e.find(same); ok {
		return t, number, true
	}
	f, err := ParseFormula(species)
	if err != nil {
		return Term{}, 0, false
	}
	hill := f.Hill()
	return e.find(func(t Term) bool { return t.Formula.Hill() == hill })
}

func (e Equation) find(match func(Term) bool) (Term, int64, bool) {
	for _, t := range e.Left {
		if match(t) {
			return t, -t.Coefficient, true
		}
	}
	for _, t := range e.Right {
		if match(t) {
			return t, t.Coefficient, true
		}
	}
	return Term{}, 0, false
}

// ErrUnbalanced is the cause of the error of Balanced.
var ErrUnbalanced = errors.New("unbalanced")

// Balanced returns nil if every element and the charge balance with the
// coefficients as they are, otherwise an error that names the first that doesn't.
func (e Equation) Balanced() error {
	matrix, kinds := e.matrix()
	for i, line := range matrix {
		var left, right int64
		for j, n := range line {
			if j < len(e.Left) {
				left += n * e.Left[j].Coefficient
			} else {
				right -= n * e.Right[j-len(e.Left)].Coefficient
			}
		}
		if left != right {
			return &EquationError{e.String(), "", fmt.Sprintf("%s doesn't balance", kinds[i]), "balance it first", ErrUnbalanced}
		}
	}
	return nil
}

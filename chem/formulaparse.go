package chem

// The grammar of a formula:
//
//	formula  = part { dot [count] part } [charge] [state]
//	part     = { element [count] | open part close [count] }
//	dot      = "·" | "." | "*" and look-alikes
//	count    = digits, decimals, a fraction, subscript digits, "_2", "_{1.5}"; after a dot also "x"
//	element  = symbol | "D" | "T" | "[13C]" | "^13C" | "^{13}C" | "¹³C"
//	charge   = "^2-" | "^{2-}" | "²⁻" | "+" | "--" | "+2" | "]3-" | " 2-"
//	state    = "(s)" | "(l)" | "(g)" | "(aq)"

import (
	"strings"
	"unicode/utf8"
)

const (
	maxNesting = 16
	maxText    = 500 // bytes in one formula
)

// tokenKind is the role of a stretch of text within a formula.
type tokenKind uint8

const (
	tokenSymbol tokenKind = iota
	tokenBracket
	tokenCount      // a subscript
	tokenFactor     // the number after a dot
	tokenDot        // the dot itself
	tokenMassNumber // of a nuclide
	tokenCharge
	tokenState
)

// formulaParser reads one formula from left to right. The first error stops it.
type formulaParser struct {
	text    string
	at      int
	nesting int
	table   *elementTable
	atoms   []atom
	formula *Formula
	emit    func(tokenKind, string) // nil where only the atoms matter
	err     *FormulaError
}

// ParseFormula reads a chemical formula: nested brackets, dots before waters of
// hydration with whole, fractional or variable (x) numbers, a charge, nuclides
// such as D or [13C] and a state in brackets:
//
//	Na2Cr2O7·2H2O   CaSO4.0.5H2O   [Fe(CN)6]^4-   Cr2O7²⁻   NH4+   [2H]2O   NaCl(aq)   e^-
//
// A sign that could mean two things, as in I3- or SO42-, is refused. The error is
// a *FormulaError. A formula whose molar mass is unknown parses; see Weighable.
func ParseFormula(text string) (Formula, error) {
	var f Formula
	if err := f.read(text, nil); err != nil {
		return Formula{}, err
	}
	return f, nil
}

func (f *Formula) read(text string, emit func(tokenKind, string)) error {
	trimmed := strings.TrimSpace(text)
	var room [24]atom
	p := formulaParser{text: trimmed, table: elements(), formula: f, emit: emit, atoms: room[:0]}
	f.text = trimmed
	switch {
	case trimmed == "":
		p.fail(whole, "empty", "write one such as Na2Cr2O7·2H2O", ErrSyntax)
	case len(trimmed) > maxText:
		f.text = trimmed[:maxText]
		p.fail(whole, "longer than 500 characters", "give one formula at a time", ErrSyntax)
	case !utf8.ValidString(trimmed):
		p.fail(whole, "not valid UTF-8 text", "type it again", ErrSyntax)
	case !p.electron():
		p.chain(0)
		p.tail()
	}
	if p.err == nil && !f.total() {
		p.fail(whole, "the numbers are too large", "use counts below two thousand million", ErrSyntax)
	}
	if p.err != nil {
		return p.err
	}
	return nil
}

// electron takes the whole text if it is the electron.
func (p *formulaParser) electron() bool {
	switch p.text {
	case "e", "e-", "e^-", "e^{-}", "e⁻", "e−", "e^−", "e^1-", "e^-1", "e^{1-}":
	default:
		return false
	}
	p.formula.parts = []part{{count: one}}
	p.formula.charge = -1
	p.say(tokenSymbol, "e")
	p.say(tokenCharge, "-")
	return true
}

// chain reads parts separated by dots; from is where its first atom will stand.
func (p *formulaParser) chain(from int) {
	for n := 0; ; n++ {
		begin := p.at
		if n > 0 && !p.dot() {
			return
		}
		count, variable := one, false
		if n > 0 {
			count, variable = p.factor()
		}
		p.groups()
		if p.err != nil {
			return
		}
		if p.nesting > 0 {
			p.closeInner(from, count, variable)
			from = len(p.atoms)
			continue
		}
		atoms, ok := merge(p.atoms)
		if !ok {
			p.fail(p.at, "the numbers are too large", "use counts below two thousand million", ErrSyntax)
			return
		}
		p.formula.parts = append(p.formula.parts, part{count, variable, atoms, begin, p.at})
		p.atoms = p.atoms[:0]
	}
}

// closeInner ends a part that stands inside a bracket, whose number multiplies
// its atoms at once.
func (p *formulaParser) closeInner(from int, count ratio, variable bool) {
	if variable {
		p.fail(p.at, "a variable number inside a bracket", "write the variable waters last, outside", ErrSyntax)
		return
	}
	p.scale(from, count)
}

// groups reads elements and brackets up to what can't be part of them. There has
// to be at least one.
func (p *formulaParser) groups() {
	begin := p.at
	for p.err == nil && p.at < len(p.text) {
		from := len(p.atoms)
		c := p.text[p.at]
		switch {
		case isCapital(c):
			p.element(0)
		case c == '(' || c == '[' || c == '{':
			if p.stateAt(p.at) != "" {
				p.wantSome(begin)
				return
			}
			p.bracket(c)
		default:
			a, size := p.massNumberAt(p.at)
			if size == 0 {
				p.wantSome(begin)
				return
			}
			p.at += size
			p.element(a)
		}
		if p.err == nil {
			p.scale(from, p.subscript(from))
		}
	}
	p.wantSome(begin)
}

// wantSome refuses a part without any atoms.
func (p *formulaParser) wantSome(begin int) {
	if p.err != nil || p.at > begin {
		return
	}
	if p.at >= len(p.text) {
		p.fail(p.at, "ends where an element should stand", "write an element symbol", ErrSyntax)
		return
	}
	p.unexpected()
}

// element reads a symbol; a is the mass number read before it, 0 if none.
func (p *formulaParser) element(a int) {
	begin := p.at
	p.at++
	if p.at < len(p.text) && isSmall(p.text[p.at]) {
		p.at++
	}
	symbol := p.text[begin:p.at]
	z, mass := p.table.bySymbol[symbolKey(symbol)], uint16(a)
	switch {
	case symbol == "D" && a == 0:
		z, mass = 1, 2
	case symbol == "T" && a == 0:
		z, mass = 1, 3
	}
	if z == 0 {
		p.fail(begin, "unknown element \""+symbol+"\"", "write a symbol of the periodic table", ErrUnknownElement)
		return
	}
	if p.emit != nil {
		if a != 0 {
			p.emit(tokenMassNumber, decimalText(int64(a)))
		}
		p.emit(tokenSymbol, symbol)
	}
	p.atoms = append(p.atoms, atom{z, mass, one})
}

// bracket reads a group in brackets, or a nuclide such as [13C].
func (p *formulaParser) bracket(open byte) {
	begin, from := p.at, len(p.atoms)
	if p.nesting++; p.nesting > maxNesting {
		p.fail(begin, "more than 16 brackets inside each other", "write the formula out", ErrSyntax)
		return
	}
	p.at++
	if open == '[' && p.at < len(p.text) && isDigit(p.text[p.at]) {
		p.nuclide(begin)
		p.nesting--
		return
	}
	p.say(tokenBracket, string(open))
	p.chain(from)
	if p.err != nil {
		return
	}
	closing := closingOf(open)
	if p.at >= len(p.text) {
		p.fail(begin, "bracket \""+string(open)+"\" is never closed", "add \""+string(closing)+"\"", ErrBracket)
		return
	}
	if p.text[p.at] != closing {
		p.unclosed(open, closing)
		return
	}
	p.at++
	p.nesting--
	p.say(tokenBracket, string(closing))
}

// unclosed says what stands where a closing bracket was due.
func (p *formulaParser) unclosed(open, closing byte) {
	switch p.text[p.at] {
	case ')', ']', '}':
		p.fail(p.at, "bracket \""+string(open)+"\" is closed by \""+p.text[p.at:p.at+1]+"\"",
			"close it by \""+string(closing)+"\"", ErrBracket)
	default:
		p.unexpected()
	}
}

func closingOf(open byte) byte {
	switch open {
	case '(':
		return ')'
	case '[':
		return ']'
	}
	return '}'
}

// nuclide reads what follows "[" in [13C]; begin is where the bracket stands.
func (p *formulaParser) nuclide(begin int) {
	a, size := p.digitsAt(p.at)
	p.at += size
	if size > 3 || p.at >= len(p.text) || !isCapital(p.text[p.at]) {
		p.fail(begin, "not a nuclide", "write a mass number and a symbol, [13C]", ErrSyntax)
		return
	}
	if p.element(int(a)); p.err != nil {
		return
	}
	if p.at >= len(p.text) || p.text[p.at] != ']' {
		p.fail(begin, "the nuclide isn't closed", "write one element in the bracket and its count behind, [2H]6", ErrBracket)
		return
	}
	p.at++
}

// scale multiplies the atoms from an index on.
func (p *formulaParser) scale(from int, by ratio) {
	if by == one || p.err != nil {
		return
	}
	for i := from; i < len(p.atoms); i++ {
		var ok bool
		if p.atoms[i].count, ok = p.atoms[i].count.times(by); !ok {
			p.fail(p.at, "the numbers are too large", "use counts below two thousand million", ErrSyntax)
			return
		}
	}
}

func (p *formulaParser) say(kind tokenKind, text string) {
	if p.emit != nil {
		p.emit(kind, text)
	}
}

// whole stands for the whole text as the place of an error.
const whole = -1

// fail keeps the first error; at is a place in bytes, told in characters. The end
// of the text counts as its last character.
func (p *formulaParser) fail(at int, what, wanted string, cause error) {
	if p.err != nil {
		return
	}
	position := 0
	switch {
	case at >= len(p.text):
		position = utf8.RuneCountInString(p.text)
	case at >= 0:
		position = utf8.RuneCountInString(p.text[:at]) + 1
	}
	p.err = &FormulaError{p.formula.text, position, what, wanted, cause}
}

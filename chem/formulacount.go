package chem

import (
	"strconv"
	"strings"
	"unicode/utf8"
)

// subscript reads the number behind an element or a bracket, one if there is
// none. from is the first atom it will multiply.
func (p *formulaParser) subscript(from int) ratio {
	begin := p.at
	count, size := one, 0
	switch {
	case p.at >= len(p.text):
		return one
	case p.text[p.at] == '_':
		count, size = p.underscoreAt(p.at)
	case isDigit(p.text[p.at]):
		count, size = p.plainCountAt(from)
	case p.text[p.at] >= utf8.RuneSelf:
		count, size = p.subscriptDigitsAt(p.at)
	case p.text[p.at] == 'n' || p.text[p.at] == 'x':
		p.fail(begin, "a variable subscript", "write a number", ErrSyntax)
	}
	if p.err != nil || size == 0 {
		return one
	}
	p.at += size
	if count.num == 0 {
		p.fail(begin, "a subscript of nought", "leave the element out", ErrSyntax)
		return one
	}
	if p.emit != nil && count != one {
		p.emit(tokenCount, count.text())
	}
	return count
}

// plainCountAt reads plain digits as a subscript, unless a sign behind them makes
// them the number of a charge. A full stop behind them is a decimal point where
// nothing that could be a hydrate follows.
func (p *formulaParser) plainCountAt(from int) (ratio, int) {
	n, size := p.digitsAt(p.at)
	end := p.at + size
	if p.signEnds(end) {
		return p.countBeforeSign(n, size, from)
	}
	if end < len(p.text) && p.text[end] == '.' {
		if r, long := p.decimalAt(p.at); long > 0 && (n == 0 || !p.hydrateAt(p.at+long)) {
			return r, long
		}
	}
	if n >= maxCount {
		p.fail(p.at, "the number is too large", "use counts below two thousand million", ErrSyntax)
	}
	return ratio{n, 1}, size
}

// hydrateAt reports whether what stands at i could go on with a hydrate, so that
// the digits before i are its number: CaCl2.2H2O.
func (p *formulaParser) hydrateAt(i int) bool {
	if i >= len(p.text) {
		return false
	}
	switch c := p.text[i]; {
	case isCapital(c), c == '.', c == '/', c == '(' && p.stateAt(i) == "", c == '[', c == '{':
		return true
	}
	return false
}

// countBeforeSign settles whether n before a last sign is a subscript, as in
// NO3-, or the number of the charge, as in [Fe(CN)6]4- and Fe3+.
func (p *formulaParser) countBeforeSign(n int64, size, from int) (ratio, int) {
	last := p.text[p.at-1]
	alone := p.nesting == 0 && from == 0 && len(p.atoms) == 1 && len(p.formula.parts) == 0
	switch {
	case p.nesting > 0:
		return ratio{n, 1}, size
	case last == ']' && size == 1:
		return one, 0
	case alone && size == 1 && last != ')' && last != '}' && !nonmetal(p.atoms[0].z):
		return one, 0
	case size > 1 || alone || last == ')' || last == '}':
		p.fail(p.at, "can't tell the subscript from the charge", "write the charge with ^, as in SO4^2- or I3^-", ErrAmbiguous)
		return one, 0
	}
	return ratio{n, 1}, size
}

// signEnds reports whether a single sign stands at i and nothing but a state
// follows.
func (p *formulaParser) signEnds(i int) bool {
	_, size := signAt(p.text, i)
	if size == 0 {
		return false
	}
	rest := strings.TrimLeft(p.text[i+size:], " ")
	return rest == "" || p.stateAt(len(p.text)-len(rest)) != ""
}

// underscoreAt reads "_2" or "_{1.5}".
func (p *formulaParser) underscoreAt(i int) (ratio, int) {
	braced := i+1 < len(p.text) && p.text[i+1] == '{'
	begin := i + 1
	if braced {
		begin++
	}
	r, size := p.numberAt(begin)
	end := begin + size
	if size == 0 || braced && (end >= len(p.text) || p.text[end] != '}') {
		p.fail(i, "a subscript sign without its number", "write _2 or _{1.5}", ErrSyntax)
		return one, 0
	}
	if braced {
		end++
	}
	return r, end - i
}

// factor reads the number after a dot: whole, decimal, a fraction, or x.
func (p *formulaParser) factor() (ratio, bool) {
	p.spaces()
	if p.at < len(p.text) && (p.text[p.at] == 'x' || p.text[p.at] == 'n') {
		p.at++
		p.say(tokenFactor, "x")
		p.spaces()
		return one, true
	}
	begin := p.at
	r, size := p.numberAt(p.at)
	if size == 0 {
		r, size = p.halfAt(p.at)
	}
	if size == 0 {
		return one, false
	}
	if r.num == 0 {
		p.fail(begin, "a number of nought", "leave the part out", ErrSyntax)
	}
	p.at += size
	p.spaces()
	if p.emit != nil && r != one {
		p.emit(tokenFactor, r.text())
	}
	return r, false
}

// numberAt reads digits, a decimal or a fraction such as 8/3.
func (p *formulaParser) numberAt(i int) (ratio, int) {
	n, size := p.digitsAt(i)
	if size == 0 || n >= maxCount {
		return one, 0
	}
	end := i + size
	if end < len(p.text) && p.text[end] == '.' {
		return p.decimalAt(i)
	}
	if end < len(p.text) && p.text[end] == '/' {
		d, long := p.digitsAt(end + 1)
		if long == 0 || d == 0 || d >= maxCount {
			return one, 0
		}
		return newRatio(n, d), size + 1 + long
	}
	return ratio{n, 1}, size
}

// decimalAt reads a decimal number with up to six places.
func (p *formulaParser) decimalAt(i int) (ratio, int) {
	whole, size := p.digitsAt(i)
	places, long := p.digitsAt(i + size + 1)
	if long == 0 || long > 6 || size > 3 {
		return one, 0
	}
	scale := int64(1)
	for range long {
		scale *= 10
	}
	return newRatio(whole*scale+places, scale), size + 1 + long
}

// digitsAt reads plain digits and returns their value and their length; a value
// too large for a count comes back as maxCount.
func (p *formulaParser) digitsAt(i int) (int64, int) {
	n, begin := int64(0), i
	for ; i < len(p.text) && isDigit(p.text[i]); i++ {
		n = min(n*10+int64(p.text[i]-'0'), maxCount)
	}
	return n, i - begin
}

// subscriptDigitsAt reads ₀ to ₉.
func (p *formulaParser) subscriptDigitsAt(i int) (ratio, int) {
	n, size := int64(0), 0
	for {
		r, w := utf8.DecodeRuneInString(p.text[i+size:])
		if r < '₀' || r > '₉' {
			break
		}
		n = n*10 + int64(r-'₀')
		size += w
		if n >= maxCount {
			p.fail(i, "the number is too large", "use counts below two thousand million", ErrSyntax)
			return one, 0
		}
	}
	return ratio{n, 1}, size
}

// halfAt reads the signs ½, ⅓, ⅔, ¼ and ¾.
func (p *formulaParser) halfAt(i int) (ratio, int) {
	r, size := utf8.DecodeRuneInString(p.text[i:])
	switch r {
	case '½':
		return ratio{1, 2}, size
	case '⅓':
		return ratio{1, 3}, size
	case '⅔':
		return ratio{2, 3}, size
	case '¼':
		return ratio{1, 4}, size
	case '¾':
		return ratio{3, 4}, size
	}
	return one, 0
}

// dot takes a dot between two parts.
func (p *formulaParser) dot() bool {
	if p.err != nil {
		return false
	}
	rest := strings.TrimLeft(p.text[p.at:], " ")
	r, size := utf8.DecodeRuneInString(rest)
	switch r {
	case '.', '*', '·', '•', '⋅', '∙', '・':
	default:
		return false
	}
	p.at = len(p.text) - len(rest) + size
	p.say(tokenDot, "·")
	p.spaces()
	return true
}

func (p *formulaParser) spaces() {
	for p.at < len(p.text) && p.text[p.at] == ' ' {
		p.at++
	}
}

// text writes a count as short as it goes: 2, 0.5 or 8/3.
func (r ratio) text() string {
	if r.den == 1 {
		return decimalText(r.num)
	}
	if d := r.den; 1000000%d == 0 {
		return strconv.FormatFloat(r.float(), 'f', -1, 64)
	}
	return decimalText(r.num) + "/" + decimalText(r.den)
}

func decimalText(n int64) string { return strconv.FormatInt(n, 10) }

// subscriptText writes a count so that it can't be read as a hydrate.
func subscriptText(r ratio) string {
	if r.den == 1 {
		return r.text()
	}
	return "_{" + r.text() + "}"
}

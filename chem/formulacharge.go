package chem

import (
	"strings"
	"unicode/utf8"
)

const maxCharge = 99

// tail reads what follows the parts: the charge and the state.
func (p *formulaParser) tail() {
	if p.err != nil {
		return
	}
	p.spaces()
	p.charge()
	p.spaces()
	if p.err != nil || p.at >= len(p.text) {
		return
	}
	if state := p.stateAt(p.at); state != "" {
		p.formula.state = state
		p.say(tokenState, "("+state+")")
		return
	}
	p.unexpected()
}

// charge reads a charge, if one stands here.
func (p *formulaParser) charge() {
	if p.at >= len(p.text) {
		return
	}
	begin := p.at
	c, r := p.text[p.at], rune(0)
	r, _ = utf8.DecodeRuneInString(p.text[p.at:])
	_, isSign := signAt(p.text, p.at)
	switch {
	case c == '^':
		p.caretCharge()
	case isSign > 0:
		p.signedCharge()
	case isDigit(c):
		p.numberedCharge()
	case superscriptDigit(r) >= 0 || superscriptSign(r) != 0:
		p.superscriptCharge()
	default:
		return
	}
	if n := p.formula.charge; n > maxCharge || n < -maxCharge {
		p.fail(begin, "a charge above 99", "check the number", ErrSyntax)
	}
	if p.err == nil && p.emit != nil && p.formula.charge != 0 {
		p.emit(tokenCharge, chargeNumber(p.formula.charge))
	}
}

// caretCharge reads ^2-, ^-2, ^-, ^{2-} and the like.
func (p *formulaParser) caretCharge() {
	begin := p.at
	p.at++
	braced := p.at < len(p.text) && p.text[p.at] == '{'
	if braced {
		p.at++
	}
	before, _ := p.chargeDigits()
	sign, size := signAt(p.text, p.at)
	if size == 0 {
		p.fail(begin, "a charge without its sign", "write ^2- or ^+", ErrSyntax)
		return
	}
	p.at += size
	after, any := p.chargeDigits()
	if before > 0 && any {
		p.fail(begin, "two numbers in the charge", "write ^2-", ErrSyntax)
		return
	}
	if braced {
		if p.at >= len(p.text) || p.text[p.at] != '}' {
			p.fail(begin, "the charge isn't closed", "add \"}\"", ErrBracket)
			return
		}
		p.at++
	}
	p.formula.charge = sign * max(before, after, 1)
}

// chargeDigits reads the digits of a charge here.
func (p *formulaParser) chargeDigits() (int, bool) {
	n, size := p.digitsAt(p.at)
	p.at += size
	return int(n), size > 0
}

// signedCharge reads -, --, -2 and the same with +.
func (p *formulaParser) signedCharge() {
	sign, n := 0, 0
	for {
		s, size := signAt(p.text, p.at)
		if size == 0 {
			break
		}
		if sign != 0 && s != sign {
			p.fail(p.at, "both signs in one charge", "write ^2- or ^+", ErrSyntax)
			return
		}
		sign = s
		n++
		p.at += size
	}
	if digits, any := p.chargeDigits(); any && n == 1 {
		n = digits
	} else if any {
		p.fail(p.at, "a charge counted twice", "write ^2-", ErrSyntax)
		return
	}
	p.formula.charge = sign * n
}

// numberedCharge reads 2- where a subscript can't stand: after a space or a
// square bracket.
func (p *formulaParser) numberedCharge() {
	begin := p.at
	n, _ := p.chargeDigits()
	sign, size := signAt(p.text, p.at)
	if size == 0 {
		p.at = begin
		p.unexpected()
		return
	}
	p.at += size
	p.formula.charge = sign * n
}

// superscriptCharge reads ²⁻, ⁻, ⁺² and the like.
func (p *formulaParser) superscriptCharge() {
	begin, sign, n := p.at, 0, 0
	for p.at < len(p.text) {
		r, size := utf8.DecodeRuneInString(p.text[p.at:])
		if d := superscriptDigit(r); d >= 0 {
			n = min(n*10+d, maxCharge+1)
		} else if s := superscriptSign(r); s != 0 && sign == 0 {
			sign = s
		} else {
			break
		}
		p.at += size
	}
	if sign == 0 {
		p.fail(begin, "a charge without its sign", "write ²⁻ or ^2-", ErrSyntax)
		return
	}
	p.formula.charge = sign * max(n, 1)
}

// massNumberAt reads the mass number of a nuclide written ¹³C, ^13C or ^{13}C, and
// returns its length; 0 if none stands there.
func (p *formulaParser) massNumberAt(i int) (int, int) {
	end, a := i, 0
	for end < len(p.text) {
		r, size := utf8.DecodeRuneInString(p.text[end:])
		d := superscriptDigit(r)
		if d < 0 {
			break
		}
		a, end = min(a*10+d, 1000), end+size
	}
	if end == i && p.text[i] == '^' {
		a, end = p.caretNumber(i + 1)
	}
	if a == 0 || a > 300 || end >= len(p.text) || !isCapital(p.text[end]) {
		return 0, 0
	}
	return a, end - i
}

// caretNumber reads 13 or {13} at i and returns it with where it ends.
func (p *formulaParser) caretNumber(i int) (int, int) {
	braced := i < len(p.text) && p.text[i] == '{'
	if braced {
		i++
	}
	n, size := p.digitsAt(i)
	i += size
	if braced {
		if i >= len(p.text) || p.text[i] != '}' {
			return 0, i
		}
		i++
	}
	return int(n), i
}

// stateAt returns the state in brackets that ends the text at i, or "".
func (p *formulaParser) stateAt(i int) string {
	switch p.text[i:] {
	case "(s)", "(l)", "(g)", "(aq)":
		return p.text[i+1 : len(p.text)-1]
	}
	return ""
}

// unexpected refuses the character that stands here.
func (p *formulaParser) unexpected() {
	if p.err != nil {
		return
	}
	r, size := utf8.DecodeRuneInString(p.text[p.at:])
	shown := "\"" + p.text[p.at:p.at+size] + "\""
	switch {
	case r == ')' || r == ']' || r == '}':
		p.fail(p.at, "bracket "+shown+" closes none", "take it out or open one before", ErrBracket)
	case r >= 'a' && r <= 'z':
		p.fail(p.at, "small letter "+shown+" where a symbol should begin", "write a capital first", ErrUnknownElement)
	case r >= '0' && r <= '9':
		p.fail(p.at, "a number "+shown+" where a symbol should begin", "write a coefficient only in an equation or after a dot", ErrSyntax)
	default:
		p.fail(p.at, "unexpected "+shown, "write elements, counts, brackets, a dot or a charge", ErrSyntax)
	}
}

// signAt returns the sign at i as +1 or -1 and its length; 0 if none stands there.
func signAt(text string, i int) (sign, size int) {
	switch {
	case i >= len(text):
		return 0, 0
	case text[i] == '+':
		return 1, 1
	case text[i] == '-':
		return -1, 1
	case strings.HasPrefix(text[i:], "−"):
		return -1, len("−")
	}
	return 0, 0
}

func superscriptDigit(r rune) int {
	switch {
	case r == '¹':
		return 1
	case r == '²' || r == '³':
		return int(r-'²') + 2
	case r == '⁰' || r >= '⁴' && r <= '⁹':
		return int(r - '⁰')
	}
	return -1
}

func superscriptSign(r rune) int {
	switch r {
	case '⁺':
		return 1
	case '⁻':
		return -1
	}
	return 0
}

// chargeText writes a charge as "^2-", empty for none.
func chargeText(n int) string {
	if n == 0 {
		return ""
	}
	return "^" + chargeNumber(n)
}

// chargeNumber writes a charge as "2-" or "+".
func chargeNumber(n int) string {
	sign := "+"
	if n < 0 {
		sign, n = "-", -n
	}
	if n == 1 {
		return sign
	}
	return decimalText(int64(n)) + sign
}

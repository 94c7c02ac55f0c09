package chem

import (
	"strconv"
	"strings"
)

// numberReading is how a stretch of digits and marks was understood.
type numberReading struct {
	value float64
	rest  string // what follows the number
	err   error  // ErrNoNumber, ErrAmbiguous or ErrOutOfRange
}

// readNumber reads the number a text begins with. The decimal sign may be a stop
// or a comma; a single comma or stop before just three digits is taken as a
// decimal only where it can't part thousands, otherwise the number is ambiguous.
// Blanks may part thousands. An exponent is written 1e-3, 1×10^-3 or 1x10^-3.
//
//	1.5   1,5   0,125   1 234   1,234.5   1.234,5   2.5e-3   1.2×10^3
func readNumber(text string) numberReading {
	sign, body := cutSign(strings.TrimSpace(text))
	end := numberEnd(body)
	digits, err := plainDigits(body[:end])
	if err != nil {
		return numberReading{rest: body[end:], err: err}
	}
	exponent, rest := cutExponent(body[end:])
	value, parseErr := strconv.ParseFloat(digits+"e"+exponent, 64)
	if parseErr != nil || !Finite(value) {
		return numberReading{rest: rest, err: ErrOutOfRange}
	}
	return numberReading{value: sign * value, rest: strings.TrimSpace(rest)}
}

func cutSign(text string) (float64, string) {
	for _, minus := range []string{"-", "−", "–"} {
		if rest, ok := strings.CutPrefix(text, minus); ok {
			return -1, strings.TrimLeft(rest, " ")
		}
	}
	return 1, strings.TrimPrefix(text, "+")
}

// numberEnd returns where the digits with their marks end. A blank goes with them
// only if exactly three digits follow it, and at most three come before.
func numberEnd(text string) int {
	i := 0
	for i < len(text) {
		if c := text[i]; isDigit(c) || c == '.' || c == ',' {
			i++
			continue
		}
		size := blankAt(text, i)
		if size == 0 || !groupAt(text, i+size) || !isDigit(lastByte(text[:i])) {
			break
		}
		i += size + 3
	}
	return i
}

func lastByte(s string) byte {
	if s == "" {
		return 0
	}
	return s[len(s)-1]
}

// blankAt returns the length of a blank at i: a space, a no-break space, a thin
// or narrow one; 0 if none.
func blankAt(text string, i int) int {
	for _, blank := range []string{" ", "\u00a0", "\u2009", "\u202f"} {
		if strings.HasPrefix(text[i:], blank) {
			return len(blank)
		}
	}
	return 0
}

// groupAt reports whether exactly three digits stand at i.
func groupAt(text string, i int) bool {
	if i+3 > len(text) || !isDigit(text[i]) || !isDigit(text[i+1]) || !isDigit(text[i+2]) {
		return false
	}
	return i+3 == len(text) || !isDigit(text[i+3])
}

// plainDigits turns digits with marks into digits with a decimal point.
func plainDigits(s string) (string, error) {
	for _, blank := range []string{" ", "\u00a0", "\u2009", "\u202f"} {
		s = strings.ReplaceAll(s, blank, "")
	}
	if strings.Trim(s, ".,") == "" {
		return "", ErrNoNumber
	}
	commas, stops := strings.Count(s, ","), strings.Count(s, ".")
	switch {
	case commas == 0 && stops <= 1:
		return s, nil
	case commas == 1 && stops == 0:
		return commaAlone(s)
	case commas > 0 && stops > 0:
		return bothMarks(s)
	}
	mark := ","
	if commas == 0 {
		mark = "."
	}
	return grouped(s, mark)
}

// commaAlone reads a single comma as the decimal sign unless it might part
// thousands.
func commaAlone(s string) (string, error) {
	whole, places, _ := strings.Cut(s, ",")
	if len(places) == 3 && len(whole) >= 1 && len(whole) <= 3 && whole[0] != '0' {
		return "", ErrAmbiguous
	}
	return whole + "." + places, nil
}

// bothMarks reads a number with stops and commas: the last mark is the decimal
// sign, the other parts thousands.
func bothMarks(s string) (string, error) {
	decimal, part := ".", ","
	if strings.LastIndex(s, ",") > strings.LastIndex(s, ".") {
		decimal, part = ",", "."
	}
	if strings.Count(s, decimal) > 1 {
		return "", ErrAmbiguous
	}
	whole, places, _ := strings.Cut(s, decimal)
	whole, err := grouped(whole, part)
	return whole + "." + places, err
}

// grouped takes out a mark that parts thousands; every group but the first must
// have three digits.
func grouped(s, mark string) (string, error) {
	groups := strings.Split(s, mark)
	for i, g := range groups {
		if i == 0 && (len(g) < 1 || len(g) > 3) || i > 0 && len(g) != 3 {
			return "", ErrAmbiguous
		}
	}
	return strings.Join(groups, ""), nil
}

// cutExponent takes an exponent off the text behind the digits; "0" if none.
func cutExponent(text string) (string, string) {
	for _, mark := range []string{"e", "E", "×10^", "x10^", "·10^", " × 10^", " x 10^", "*10^"} {
		rest, ok := strings.CutPrefix(text, mark)
		if !ok {
			continue
		}
		i := 0
		if i < len(rest) && (rest[i] == '-' || rest[i] == '+') {
			i++
		}
		begin := i
		for i < len(rest) && isDigit(rest[i]) {
			i++
		}
		if i > begin && i-begin <= 4 {
			return rest[:i], rest[i:]
		}
	}
	return "0", text
}

package inventory

import (
	"errors"
	"fmt"
	"strings"
)

// Codes on bottles, carboys and places.
//
// A code is a kind letter, four or more symbols for a number, and one check
// symbol: B7K2QM. The symbols are the digits and the capital letters without
// I, L, O and U, so there are 32 of them, and they are read as the elements of
// the field GF(32) built on x⁵ + x² + 1. With g = x, which generates the
// field, the check symbol c₀ makes
//
//	c₀ + c₁·g + c₂·g² + … = 0
//
// where c₁ is the symbol before the check symbol, c₂ the one before that, and
// the kind letter is the last. Any one wrong symbol and any two exchanged
// symbols, neighbours or not, break the sum in codes of up to 31 symbols.
//
// The number is multiplied by an odd constant modulo 32ⁿ before it is written,
// so that bottles taken into stock one after the other look unlike.

// CodeKind is the letter a code starts with.
type CodeKind byte

// The kinds of things that carry codes.
const (
	BottleCode CodeKind = 'B'
	CarboyCode CodeKind = 'W'
	PlaceCode  CodeKind = 'P'
)

// ErrBadCode says that a text is no code, or one with a slip in it.
var ErrBadCode = errors.New("not a code")

// CodeError says what is wrong with a code that was typed or scanned.
type CodeError struct {
	Text string
	Why  string
}

// Error says which text, and why it is no code.
func (e *CodeError) Error() string { return fmt.Sprintf("code %q: %s", e.Text, e.Why) }

// Unwrap makes errors.Is(err, ErrBadCode) true.
func (e *CodeError) Unwrap() error { return ErrBadCode }

const (
	codeSymbols = "0123456789ABCDEFGHJKMNPQRSTVWXYZ"
	codeLeast   = 4      // symbols of the number
	codeStir    = 709921 // odd, and so without a common factor with 32ⁿ
)

// MakeCode returns the code of the n-th thing of a kind. It panics if n is
// negative, which is a programmer's mistake.
func MakeCode(kind CodeKind, n int64) string {
	if n < 0 {
		panic("inventory: code of a negative number")
	}
	width, room, first := codeLeast, int64(1)<<(5*codeLeast), int64(0)
	for n-first >= room && width < 11 {
		first, room, width = first+room, room<<5, width+1
	}
	stirred := uint64(n-first) * codeStir % uint64(room)
	symbols := make([]byte, width)
	for i := width - 1; i >= 0; i-- {
		symbols[i] = codeSymbols[stirred%32]
		stirred /= 32
	}
	body := string(kind) + string(symbols)
	return body + string(codeSymbols[codeCheck(body)])
}

// codeCheck returns the check symbol of a code without it: Horner's rule from
// the kind letter inwards.
func codeCheck(body string) int {
	sum := 0
	for i := range len(body) {
		sum = timesG(sum ^ strings.IndexByte(codeSymbols, body[i]))
	}
	return sum
}

// timesG multiplies by x modulo x⁵ + x² + 1.
func timesG(a int) int {
	a <<= 1
	if a&32 != 0 {
		a ^= 0b100101
	}
	return a
}

// NormalCode reads a typed or scanned code: case, spaces and hyphens don't
// matter. The error is a *CodeError that says what is wrong, such as a letter
// that no code has or a check symbol that doesn't fit.
func NormalCode(text string) (string, error) {
	code := strings.ToUpper(strings.NewReplacer(" ", "", "-", "").Replace(strings.TrimSpace(text)))
	if code == "" {
		return "", &CodeError{text, "want a code such as " + MakeCode(BottleCode, 0)}
	}
	if !strings.ContainsRune("BWP", rune(code[0])) {
		return "", &CodeError{text, "codes start with B (bottle), W (waste carboy) or P (place)"}
	}
	for _, r := range code {
		if strings.ContainsRune("ILOU", r) {
			return "", &CodeError{text, fmt.Sprintf("no code has the letter %c: look for a one or a zero", r)}
		}
		if !strings.ContainsRune(codeSymbols, r) {
			return "", &CodeError{text, fmt.Sprintf("codes are digits and letters, not %q", r)}
		}
	}
	if len(code) < codeLeast+2 || len(code) > 13 {
		return "", &CodeError{text, fmt.Sprintf("%d symbols, want %d or a few more", len(code), codeLeast+2)}
	}
	if last := len(code) - 1; codeSymbols[codeCheck(code[:last])] != code[last] {
		return "", &CodeError{text, "the last symbol doesn't fit the others: one of them was misread"}
	}
	return code, nil
}

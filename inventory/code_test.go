package inventory

import (
	"errors"
	"strings"
	"testing"
)

// A check symbol over a field catches every single wrong symbol and every
// exchange of two: theory of cyclic codes, the generator having order 31. The
// test goes through all of them for a spread of codes.
func TestCodeCatchesEverySlip(t *testing.T) {
	for n := int64(0); n < 1<<21; n += 40009 {
		code := MakeCode(BottleCode, n)
		for i := 1; i < len(code); i++ {
			for _, symbol := range codeSymbols {
				slip := code[:i] + string(symbol) + code[i+1:]
				if _, err := NormalCode(slip); slip != code && !errors.Is(err, ErrBadCode) {
					t.Fatalf("NormalCode(%q) passes for %q", slip, code)
				}
			}
			for j := i + 1; j < len(code); j++ {
				b := []byte(code)
				b[i], b[j] = b[j], b[i]
				if _, err := NormalCode(string(b)); string(b) != code && !errors.Is(err, ErrBadCode) {
					t.Fatalf("NormalCode(%q) passes for %q", b, code)
				}
			}
		}
	}
}

func TestCodesAreDistinct(t *testing.T) {
	seen := map[string]bool{}
	for n := range int64(200000) {
		seen[MakeCode(BottleCode, n)] = true
		seen[MakeCode(BottleCode, n+1<<20-100000)] = true // across the step to five symbols
	}
	if want := 400000; len(seen) != want {
		t.Errorf("%d codes, want %d", len(seen), want)
	}
}

func TestNormalCode(t *testing.T) {
	code := MakeCode(BottleCode, 12345)
	for _, typed := range []string{code, strings.ToLower(code), " " + code + "\n", code[:1] + "-" + code[1:5] + "-" + code[5:]} {
		if got, err := NormalCode(typed); err != nil || got != code {
			t.Errorf("NormalCode(%q) = %q, %v, want %q", typed, got, err, code)
		}
	}
	for typed, why := range map[string]string{
		"":        "such as",
		"X7K2QM":  "start with",
		"B7O2QM":  "no code has the letter O",
		"B7K2Q":   "symbols",
		"B7K2=MA": "not '='",
	} {
		_, err := NormalCode(typed)
		var bad *CodeError
		if !errors.As(err, &bad) || !strings.Contains(bad.Error(), why) {
			t.Errorf("NormalCode(%q): %v, want it to say %q", typed, err, why)
		}
	}
}

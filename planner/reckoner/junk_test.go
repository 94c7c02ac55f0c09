package reckoner

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"stillroom/chem"
)

// junk are values a slip of the hand or bad will may bring; the units cover those of
// all keys, with numbers at the ends of what a float64 and the bench know.
func junk() []string {
	values := []string{
		"", " ", "x", "NaN", "Inf", "-Inf", "∞", "1,234", "1.2.3", "0", "-1", "1e308", "1e-308", "1e999", "%", ";", ":", "a:", ":b", "a;b", "a:1;b:2",
		"H", "Xx", "e^-", "->", "A -> B", "H2 -> H2", "Tc", "water", "7732-18-5", "\x00", "ß", strings.Repeat("9", 400), strings.Repeat("(", 300),
		"water: 100 %", "water: 120 % w/w", "water: 0 %; water: 0 %", "acetic acid: 1e300 mol/L", "1;2;3", "0;0;0", "1e300;1e300;-1e300",
		"a-a", "a-b;b-a", "500 mL@-1", "0 mL@5", "500 mL@1e300", "1 mL@0",
	}
	for _, number := range []string{"0", "-5", "1e-300", "1e300", "5", "1e12"} {
		for _, unit := range []string{"g", "mL", "mol", "mol/L", "mol/kg", "%", "% w/w", "% w/v", "°C", "K", "kPa", "kJ", "kJ/mol", "W", "g/mL", "g/mol", "min", "J/(g K)", "m2", "equiv", "m"} {
			values = append(values, number+" "+unit)
		}
	}
	return values
}

// TestSumsRefuseJunk puts junk into every key of every sum, one key at a time: no sum
// panics, gives a number that is none, or refuses without a word.
func TestSumsRefuseJunk(t *testing.T) {
	values := junk()
	for _, s := range Sums() {
		t.Run(s.Name, func(t *testing.T) {
			for _, k := range s.Keys {
				for _, value := range values {
					args, err := ParseArgs(s.Example)
					if err != nil {
						t.Fatal(err)
					}
					args[k.Name] = value
					if complaint := tryJunk(s, args); complaint != "" {
						t.Errorf("%s with %s=%.60q: %s", s.Name, k.Name, value, complaint)
					}
				}
			}
		})
	}
}

// tryJunk runs a sum and says what is wrong with its answer, if anything.
func tryJunk(s Sum, args Args) (complaint string) {
	defer func() {
		if r := recover(); r != nil {
			complaint = fmt.Sprintf("panics: %v", r)
		}
	}()
	answer, err := s.Reckon(context.Background(), args)
	if err != nil {
		return badWords(err.Error(), args)
	}
	if len(answer.Results) == 0 {
		return "no results"
	}
	for _, r := range answer.Results {
		if !r.IsText && !chem.Finite(r.Value) {
			return r.Name + " is no number"
		}
	}
	for _, note := range answer.Notes {
		if bad := badWords(note, args); bad != "" {
			return bad
		}
	}
	return ""
}

// badWords complains of an empty text and of one that speaks of NaN or Inf although
// nobody typed it.
func badWords(text string, args Args) string {
	if strings.TrimSpace(text) == "" {
		return "an error without words"
	}
	typed := fmt.Sprint(args)
	for _, word := range []string{"NaN", "Inf"} {
		if strings.Contains(text, word) && !strings.Contains(typed, word) {
			return "words that speak of " + word + ": " + text
		}
	}
	return ""
}

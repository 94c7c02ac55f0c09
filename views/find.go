package views

import (
	"slices"
	"strings"
	"unicode"

	"golang.org/x/text/unicode/norm"

	"stillroom/inventory"
)

// spelledNearly reports that a name looked for occurs nowhere as it was typed,
// and that what was found is spelt nearly so.
func spelledNearly(find string, found inventory.Found) bool {
	words := foldedWords(find)
	return len(found.Substances) > 0 && len(found.Places) == 0 &&
		!slices.ContainsFunc(found.Substances, func(s inventory.Substance) bool { return isCalled(s, words) })
}

// isCalled reports whether every word occurs in what a substance is called.
func isCalled(s inventory.Substance, words []string) bool {
	called := folded(s.Name + ";" + s.Synonyms + ";" + s.CAS + ";" + s.Formula)
	for _, w := range words {
		if !strings.Contains(called, w) {
			return false
		}
	}
	return true
}

func foldedWords(text string) []string {
	words := strings.Fields(text)
	for i := range words {
		words[i] = folded(words[i])
	}
	return words
}

// folded writes a text in lower case without accents, hyphens, spaces and
// punctuation, so that "1-Pentanol" and "1 pentanol" are the same.
func folded(text string) string {
	return strings.Map(func(r rune) rune {
		if !unicode.IsLetter(r) && !unicode.IsDigit(r) {
			return -1
		}
		return unicode.ToLower(r)
	}, norm.NFKD.String(text))
}

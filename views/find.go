package views

import (
	"strings"
	"unicode"

	"golang.org/x/text/unicode/norm"

	"stillroom/inventory"
)

// answering tells which bottles of the shelf answer what was looked for. Substances
// and places stand for all their bottles.
type answering struct {
	all     bool // nothing was looked for
	bottles map[int64]bool
	forms   map[int64]bool
	places  map[int64]bool
	// nearly says that the name looked for occurs nowhere as it was typed.
	nearly bool
}

func newAnswering(find string, found inventory.Found, shelf *inventory.Shelf) answering {
	a := answering{all: find == "", bottles: map[int64]bool{}, forms: map[int64]bool{}, places: map[int64]bool{}}
	for _, b := range found.Bottles {
		a.bottles[b.ID] = true
	}
	for _, p := range found.Places {
		a.places[p.ID] = true
	}
	words := foldedWords(find)
	a.nearly = len(found.Substances) > 0 && len(found.Places) == 0
	for _, substance := range found.Substances {
		for _, f := range shelf.FormsOf(substance.ID) {
			a.forms[f.ID] = true
		}
		if isCalled(substance, words) {
			a.nearly = false
		}
	}
	return a
}

func (a answering) has(b *inventory.Bottle) bool {
	return a.all || a.bottles[b.ID] || a.forms[b.FormID] || a.places[b.PlaceID]
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

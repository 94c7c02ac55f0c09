package views

import (
	"strings"
	"unicode"

	"golang.org/x/text/unicode/norm"
)

// findRows returns the rows in which every word looked for occurs, whatever the
// case, hyphens and accents. Nearly allows one wrong, missing or additional
// letter in words of four letters and more.
func findRows(rows []shelfRow, find string, nearly bool) []shelfRow {
	words := strings.Fields(find)
	for i := range words {
		words[i] = folded(words[i])
	}
	if len(words) == 0 {
		return rows
	}
	var found []shelfRow
	for _, r := range rows {
		if holdsAll(r.searchText(), words, nearly) {
			found = append(found, r)
		}
	}
	return found
}

// searchText is everything by which a bottle may be looked for.
func (r *shelfRow) searchText() []string {
	return []string{r.Substance.Name, r.Substance.Synonyms, r.Substance.CAS, r.Substance.Formula, r.Form.Name, r.Code, r.Lot, r.Place.String(), r.Note, r.Supplier}
}

func holdsAll(texts []string, words []string, nearly bool) bool {
	for i, t := range texts {
		texts[i] = folded(t)
	}
	for _, w := range words {
		if !holdsWord(texts, w, nearly) {
			return false
		}
	}
	return true
}

func holdsWord(texts []string, word string, nearly bool) bool {
	for _, t := range texts {
		if strings.Contains(t, word) || nearly && containsNearly(t, word) {
			return true
		}
	}
	return false
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

// containsNearly reports whether some part of the text is at most one change
// away from the word (Sellers' algorithm: the edit distance with a free start
// and end in the text).
func containsNearly(text, word string) bool {
	w := []rune(word)
	if len(w) < 4 {
		return false
	}
	column := make([]int, len(w)+1)
	for i := range column {
		column[i] = i
	}
	for _, r := range text {
		diagonal := column[0]
		for i := 1; i <= len(w); i++ {
			cost := 1
			if w[i-1] == r {
				cost = 0
			}
			best := min(diagonal+cost, column[i]+1, column[i-1]+1)
			diagonal, column[i] = column[i], best
		}
		if column[len(w)] <= 1 {
			return true
		}
	}
	return false
}

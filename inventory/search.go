package inventory

import (
	"context"
	"strings"
	"unicode"

	"gorm.io/gorm"
)

// Found is what answers a search.
type Found struct {
	// Bottle is set when the query is the code of one: a scan goes straight there.
	Bottle *Bottle
	// Substances and Places answer by their names, the best first.
	Substances []Substance
	Places     []Place
	// Bottles answer by their own number, lot or note, or are of the substances
	// and in the places found, in this order.
	Bottles []Bottle
}

// searchBottles is how many bottles a search answers with at most.
const searchBottles = 50

// Search looks for a text as it is being typed: in codes, own numbers, lots and
// notes of bottles, in names, synonyms, registry numbers and formulas of
// substances, and in places. Upper and lower case, hyphens and blanks don't
// matter, and a slip in a longer word is forgiven in names. All words must fit.
func (s *Store) Search(ctx context.Context, query string) (found Found, err error) {
	query = strings.TrimSpace(query)
	if query == "" {
		return found, nil
	}
	names, err := s.catalogue(ctx)
	if err != nil {
		return found, err
	}
	substances, places := names.find(query)
	err = s.read(ctx, "search", func(tx *gorm.DB) error {
		found = Found{Places: places}
		for _, i := range substances {
			found.Substances = append(found.Substances, names.substances[i])
		}
		if code, err := NormalCode(query); err == nil {
			var b []Bottle
			if err := tx.Where("code = ?", code).Limit(1).Find(&b).Error; err != nil {
				return err
			}
			if len(b) == 1 {
				found.Bottle = &b[0]
			}
		}
		return s.searchBottles(tx, query, names, &found)
	})
	return found, err
}

// searchBottles gathers bottles until there are enough: by code, own number and
// lot, by note, of the substances, in the places.
func (s *Store) searchBottles(tx *gorm.DB, query string, names *catalogue, found *Found) error {
	seen := map[int64]bool{}
	add := func(db *gorm.DB) error {
		if len(found.Bottles) >= searchBottles {
			return nil
		}
		var rows []Bottle
		if err := db.Limit(searchBottles).Find(&rows).Error; err != nil {
			return err
		}
		for _, b := range rows {
			if !seen[b.ID] && len(found.Bottles) < searchBottles {
				seen[b.ID] = true
				found.Bottles = append(found.Bottles, b)
			}
		}
		return nil
	}
	if plain := spelledPlain(query); plain != "" {
		for _, column := range []string{"mark", "lot"} {
			if err := add(s.prefixed(tx, column, plain)); err != nil {
				return err
			}
		}
		code := strings.ToUpper(plain)
		if err := add(tx.Where("code >= ? AND code < ?", code, code+"~").Order("code")); err != nil {
			return err
		}
	}
	if words := noteWords(query); len(words) > 0 {
		if err := add(s.noted(tx, words)); err != nil {
			return err
		}
	}
	for _, substance := range found.Substances[:min(5, len(found.Substances))] {
		if forms := names.formsOf[substance.ID]; len(forms) > 0 {
			if err := add(tx.Where("form_id IN ? AND state <> ?", forms, Discarded).Order("form_id, id")); err != nil {
				return err
			}
		}
	}
	for _, place := range found.Places[:min(5, len(found.Places))] {
		if err := add(tx.Where("place_id = ? AND state <> ?", place.ID, Discarded).Order("place_id, id")); err != nil {
			return err
		}
	}
	return nil
}

// prefixed finds bottles whose number or lot begins with a text, by the index
// over the plain spelling.
func (s *Store) prefixed(tx *gorm.DB, column, plain string) *gorm.DB {
	spelling := s.plainColumn(column)
	return tx.Where(column+" <> '' AND "+spelling+" >= ? AND "+spelling+" < ?", plain, plain+"\U0010ffff").Order(spelling)
}

// plainColumn is the expression of the indexes over numbers and lots.
func (s *Store) plainColumn(column string) string {
	if s.engine == onPostgres {
		return "lower(replace(replace(" + column + `, '-', ''), ' ', '') COLLATE "C")`
	}
	return "lower(replace(replace(" + column + ", '-', ''), ' ', ''))"
}

// spelledPlain spells a text as plainColumn does in the database, where only the
// letters A to Z are made small.
func spelledPlain(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '-' || r == ' ':
			return -1
		case r >= 'A' && r <= 'Z':
			return r + 'a' - 'A'
		}
		return r
	}, s)
}

// noted finds bottles whose note has words that begin with all those given.
func (s *Store) noted(tx *gorm.DB, words []string) *gorm.DB {
	if s.engine == onPostgres {
		return tx.Where("note <> '' AND to_tsvector('simple', note) @@ to_tsquery('simple', ?)", strings.Join(words, ":* & ")+":*").Order("id")
	}
	return tx.Where("id IN (SELECT rowid FROM search_notes WHERE search_notes MATCH ? LIMIT ?)", `"`+strings.Join(words, `"* AND "`)+`"*`, searchBottles).Order("id")
}

// noteWords are the letters and digits of a query, word by word; none if a word
// is too short to be worth looking for.
func noteWords(query string) []string {
	words := strings.FieldsFunc(strings.ToLower(query), func(r rune) bool { return !unicode.IsLetter(r) && !unicode.IsDigit(r) })
	for _, w := range words {
		if len(w) < 3 {
			return nil
		}
	}
	return words
}

// plainText is how texts are compared: small letters and digits, without
// blanks, hyphens and accents that people leave out.
func plainText(s string) string {
	var b strings.Builder
	for _, r := range strings.ToLower(s) {
		switch r {
		case ' ', '-', '‐', '‑', '–', '—', '\u00a0', '\u2009', '\u202f':
			continue
		case '₀', '₁', '₂', '₃', '₄', '₅', '₆', '₇', '₈', '₉':
			r = '0' + r - '₀'
		}
		b.WriteRune(r)
	}
	return b.String()
}

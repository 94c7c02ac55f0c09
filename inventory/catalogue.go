package inventory

import (
	"cmp"
	"context"
	"slices"
	"strings"

	"gorm.io/gorm"
)

// catalogue holds the names of all substances and places in memory, in the
// spelling in which they are compared. There are some thousands of them however
// many bottles there are.
type catalogue struct {
	n          int64 // the count of changes it was read at
	substances []Substance
	entries    []catalogueEntry
	formsOf    map[int64][]int64
	forms      []StockForm // of which ID, substance, name, registry number and storage class are read
	places     []Place
	placeNames []string
}

// catalogueEntry is one name a substance goes by.
type catalogueEntry struct {
	plain     string
	substance int
	rank      int // 0 name, 1 number or synonym, 2 form, 3 formula
}

// catalogue returns the names as they are now; they are read again only after a
// change.
func (s *Store) catalogue(ctx context.Context) (*catalogue, error) {
	var c *catalogue
	err := s.read(ctx, "search", func(tx *gorm.DB) error {
		var n int64
		if err := tx.Raw("SELECT n FROM catalogue").Row().Scan(&n); err != nil {
			return err
		}
		if c = s.names.Load(); c != nil && c.n == n {
			return nil
		}
		c = &catalogue{n: n}
		return c.load(tx)
	})
	if err == nil {
		s.names.Store(c)
	}
	return c, err
}

func (c *catalogue) load(tx *gorm.DB) error {
	for _, err := range []error{tx.Order("id").Find(&c.substances).Error, tx.Order("walk, id").Find(&c.places).Error,
		tx.Select("id", "substance_id", "name", "cas", "storage_class").Order("id").Find(&c.forms).Error} {
		if err != nil {
			return err
		}
	}
	at := make(map[int64]int, len(c.substances))
	add := func(i, rank int, texts ...string) {
		for _, text := range texts {
			if plain := plainText(text); plain != "" {
				c.entries = append(c.entries, catalogueEntry{plain, i, rank})
			}
		}
	}
	for i, s := range c.substances {
		at[s.ID] = i
		add(i, 0, s.Name)
		add(i, 1, s.CAS)
		add(i, 1, strings.Split(s.Synonyms, ";")...)
		add(i, 3, s.Formula)
	}
	c.formsOf = make(map[int64][]int64, len(c.substances))
	for _, f := range c.forms {
		c.formsOf[f.SubstanceID] = append(c.formsOf[f.SubstanceID], f.ID)
		if i, ok := at[f.SubstanceID]; ok {
			add(i, 2, f.Name, f.CAS)
		}
	}
	for _, p := range c.places {
		c.placeNames = append(c.placeNames, plainText(p.Store+" "+p.Room+" "+p.Cabinet+" "+p.Shelf))
	}
	return nil
}

// mostNames is how many substances or places answer a search at most.
const mostNames = 20

// find returns the substances and places that fit a query, the best first: whole
// names, beginnings, parts, and if there are none, names with a slip in them.
func (c *catalogue) find(query string) (substances []int, places []Place) {
	plain := plainText(query)
	var words []string
	for _, w := range strings.Fields(query) {
		words = append(words, plainText(w))
	}
	best := map[int]int{}
	for _, e := range c.entries {
		if score := fit(e, plain, words); score >= 0 {
			if old, ok := best[e.substance]; !ok || score < old {
				best[e.substance] = score
			}
		}
	}
	if len(best) == 0 && len(plain) >= 5 {
		for _, e := range c.entries {
			if nearBeginning(e.plain, plain) {
				best[e.substance] = e.rank
			}
		}
	}
	for i := range best {
		substances = append(substances, i)
	}
	slices.SortFunc(substances, func(a, b int) int {
		return cmp.Or(cmp.Compare(best[a], best[b]), cmp.Compare(len(c.substances[a].Name), len(c.substances[b].Name)), cmp.Compare(a, b))
	})
	for i, name := range c.placeNames {
		if containsAll(name, words) && len(places) < mostNames {
			places = append(places, c.places[i])
		}
	}
	return substances[:min(mostNames, len(substances))], places
}

// fit scores a name against a query, smaller is better, -1 is no fit.
func fit(e catalogueEntry, plain string, words []string) int {
	at := strings.Index(e.plain, plain)
	switch {
	case e.plain == plain:
		return e.rank
	case at == 0:
		return 10 + e.rank
	case at > 0 && len(plain) >= 2 && e.rank < 3:
		return 20 + e.rank
	case len(words) > 1 && e.rank < 3 && containsAll(e.plain, words):
		return 30 + e.rank
	}
	return -1
}

func containsAll(text string, words []string) bool {
	for _, w := range words {
		if len(w) < 2 || !strings.Contains(text, w) {
			return false
		}
	}
	return len(words) > 0
}

// nearBeginning reports whether the query is the beginning of the name but for
// one slip: a letter wrong, missing, too many, or two exchanged.
func nearBeginning(name, query string) bool {
	i := 0
	for i < len(name) && i < len(query) && name[i] == query[i] {
		i++
	}
	if i == len(query) {
		return true
	}
	rest := query[i:]
	if i >= len(name) {
		return len(rest) <= 1
	}
	tail := name[i:]
	begins := func(at int, query string) bool { return at <= len(tail) && strings.HasPrefix(tail[at:], query) }
	return begins(1, rest[1:]) || begins(1, rest) || begins(0, rest[1:]) ||
		len(rest) > 1 && len(tail) > 1 && tail[0] == rest[1] && tail[1] == rest[0] && begins(2, rest[2:])
}

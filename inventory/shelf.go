package inventory

import (
	"cmp"
	"maps"
	"slices"
	"strings"
)

// Shelf is a consistent picture of everything the planner needs to know about
// stock, as plain values. It is made in one read transaction and never changes
// afterwards, so that any number of readers may share it. The slices its
// methods return are parts of the shelf and must not be changed.
type Shelf struct {
	// Lab holds the records. Forms lie in order of substance and ID, bottles in
	// order of form and code, earmarks of bottle and ID, offers and orders of
	// form and ID, places in walking order, everything else in order of ID.
	Lab

	byName     map[string]int // lower-case name, synonym, CAS → substance
	byID       map[int64]int  // substance
	forms      map[int64]int
	places     map[int64]int
	bottles    map[int64]int
	byCode     map[string]int // bottle
	runs       map[int64]int
	formsOf    map[int64]stretch // by substance
	bottlesOf  map[int64]stretch // by form
	earmarksOf map[int64]stretch // by bottle
	offersOf   map[int64]stretch // by form
	ordersOf   map[int64]stretch // by form
}

// A stretch is a half-open range of indexes into a sorted slice.
type stretch struct{ from, to int }

// NewShelf sorts copies of the lab's lists and indexes them. The lab may be
// changed afterwards without touching the shelf.
func NewShelf(lab Lab) *Shelf {
	lab = Lab{slices.Clone(lab.Substances), slices.Clone(lab.Forms), slices.Clone(lab.Places), slices.Clone(lab.Bottles),
		slices.Clone(lab.Earmarks), slices.Clone(lab.Offers), slices.Clone(lab.Orders), slices.Clone(lab.Carboys),
		slices.Clone(lab.Equipment), slices.Clone(lab.Runs), maps.Clone(lab.Policy)}
	return shelfOf(lab)
}

// shelfOf is NewShelf for a lab that nobody else has.
func shelfOf(lab Lab) *Shelf {
	lab.sort()
	s := &Shelf{Lab: lab}
	s.byID = positions(s.Substances, func(r *Substance) int64 { return r.ID })
	s.forms = positions(s.Forms, func(r *StockForm) int64 { return r.ID })
	s.places = positions(s.Places, func(r *Place) int64 { return r.ID })
	s.bottles = positions(s.Bottles, func(r *Bottle) int64 { return r.ID })
	s.byCode = positions(s.Bottles, func(r *Bottle) string { return r.Code })
	s.runs = positions(s.Runs, func(r *Run) int64 { return r.ID })
	s.formsOf = stretches(s.Forms, func(r *StockForm) int64 { return r.SubstanceID })
	s.bottlesOf = stretches(s.Bottles, func(r *Bottle) int64 { return r.FormID })
	s.earmarksOf = stretches(s.Earmarks, func(r *Earmark) int64 { return r.BottleID })
	s.offersOf = stretches(s.Offers, func(r *Offer) int64 { return r.FormID })
	s.ordersOf = stretches(s.Orders, func(r *Order) int64 { return r.FormID })
	s.byName = s.names()
	return s
}

// sort puts the lists into the order a Shelf promises. The keys are unique, so
// the order is the same whatever it was before.
func (lab *Lab) sort() {
	sortBy(lab.Substances, func(a, b *Substance) int { return cmp.Compare(a.ID, b.ID) })
	sortBy(lab.Forms, func(a, b *StockForm) int {
		return cmp.Or(cmp.Compare(a.SubstanceID, b.SubstanceID), cmp.Compare(a.ID, b.ID))
	})
	sortBy(lab.Places, func(a, b *Place) int { return cmp.Or(cmp.Compare(a.Walk, b.Walk), cmp.Compare(a.ID, b.ID)) })
	sortBy(lab.Bottles, func(a, b *Bottle) int {
		return cmp.Or(cmp.Compare(a.FormID, b.FormID), cmp.Compare(a.Code, b.Code))
	})
	sortBy(lab.Earmarks, func(a, b *Earmark) int {
		return cmp.Or(cmp.Compare(a.BottleID, b.BottleID), cmp.Compare(a.ID, b.ID))
	})
	sortBy(lab.Offers, func(a, b *Offer) int { return cmp.Or(cmp.Compare(a.FormID, b.FormID), cmp.Compare(a.ID, b.ID)) })
	sortBy(lab.Orders, func(a, b *Order) int { return cmp.Or(cmp.Compare(a.FormID, b.FormID), cmp.Compare(a.ID, b.ID)) })
	sortBy(lab.Carboys, func(a, b *Carboy) int { return cmp.Compare(a.ID, b.ID) })
	sortBy(lab.Equipment, func(a, b *Equipment) int { return cmp.Compare(a.ID, b.ID) })
	sortBy(lab.Runs, func(a, b *Run) int { return cmp.Compare(a.ID, b.ID) })
}

// sortBy leaves alone what is in order, as what a store loads is: a pass over
// it is far cheaper than moving large records about.
func sortBy[R any](rows []R, order func(a, b *R) int) {
	for i := 1; i < len(rows); i++ {
		if order(&rows[i-1], &rows[i]) > 0 {
			slices.SortStableFunc(rows, func(a, b R) int { return order(&a, &b) })
			return
		}
	}
}

func positions[R any, K comparable](rows []R, key func(*R) K) map[K]int {
	m := make(map[K]int, len(rows))
	for i := range rows {
		m[key(&rows[i])] = i
	}
	return m
}

func stretches[R any](rows []R, key func(*R) int64) map[int64]stretch {
	m := make(map[int64]stretch)
	for i := range rows {
		k := key(&rows[i])
		at, ok := m[k]
		if !ok {
			at.from = i
		}
		at.to = i + 1
		m[k] = at
	}
	return m
}

// names indexes names first, then synonyms and registry numbers, then the
// registry numbers of forms such as hydrates, so that a name always beats a
// synonym of something else.
func (s *Shelf) names() map[string]int {
	m := make(map[string]int, 3*len(s.Substances))
	add := func(key string, i int) {
		key = nameKey(key)
		if _, taken := m[key]; key != "" && !taken {
			m[key] = i
		}
	}
	for i := range s.Substances {
		add(s.Substances[i].Name, i)
	}
	for i := range s.Substances {
		add(s.Substances[i].CAS, i)
		for _, synonym := range strings.Split(s.Substances[i].Synonyms, ";") {
			add(synonym, i)
		}
	}
	for i := range s.Forms {
		if at, ok := s.byID[s.Forms[i].SubstanceID]; ok {
			add(s.Forms[i].CAS, at)
		}
	}
	return m
}

func nameKey(s string) string { return strings.ToLower(strings.TrimSpace(s)) }

// Substance returns the substance of a name, a synonym or a registry number;
// upper and lower case are the same.
func (s *Shelf) Substance(key string) (Substance, bool) {
	i, ok := s.byName[nameKey(key)]
	if !ok {
		return Substance{}, false
	}
	return s.Substances[i], true
}

// SubstanceByID returns the substance of an ID.
func (s *Shelf) SubstanceByID(id int64) (Substance, bool) { return at(s.Substances, s.byID, id) }

// Form returns the stock form of an ID.
func (s *Shelf) Form(id int64) (StockForm, bool) { return at(s.Forms, s.forms, id) }

// Place returns the place of an ID.
func (s *Shelf) Place(id int64) (Place, bool) { return at(s.Places, s.places, id) }

// Bottle returns the bottle of an ID.
func (s *Shelf) Bottle(id int64) (Bottle, bool) { return at(s.Bottles, s.bottles, id) }

// BottleByCode returns the bottle of a code as NormalCode writes it.
func (s *Shelf) BottleByCode(code string) (Bottle, bool) { return at(s.Bottles, s.byCode, code) }

// Run returns the run of an ID.
func (s *Shelf) Run(id int64) (Run, bool) { return at(s.Runs, s.runs, id) }

func at[R any, K comparable](rows []R, index map[K]int, key K) (R, bool) {
	i, ok := index[key]
	if !ok {
		var none R
		return none, false
	}
	return rows[i], true
}

// FormsOf returns the stock forms of a substance, by ID.
func (s *Shelf) FormsOf(substanceID int64) []StockForm { return part(s.Forms, s.formsOf[substanceID]) }

// BottlesOf returns the bottles of a form in every state, by code.
func (s *Shelf) BottlesOf(formID int64) []Bottle { return part(s.Bottles, s.bottlesOf[formID]) }

// EarmarksOn returns the earmarks on a bottle, lapsed ones included, by ID.
func (s *Shelf) EarmarksOn(bottleID int64) []Earmark {
	return part(s.Earmarks, s.earmarksOf[bottleID])
}

// OffersOf returns the offers for a form, by ID.
func (s *Shelf) OffersOf(formID int64) []Offer { return part(s.Offers, s.offersOf[formID]) }

// OrdersOf returns the orders of a form in every state, by ID.
func (s *Shelf) OrdersOf(formID int64) []Order { return part(s.Orders, s.ordersOf[formID]) }

// part caps the slice, so that appending to it can't write into the shelf.
func part[R any](rows []R, at stretch) []R { return rows[at.from:at.to:at.to] }

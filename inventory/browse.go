package inventory

import (
	"cmp"
	"context"
	"slices"
	"strings"

	"gorm.io/gorm"
)

// Browse asks for a page of the bottles in stock.
type Browse struct {
	Store string // name of the storeroom; "" for all
	Class string // storage class of the form; "" for all
	// State is the one asked for; "" means all but empty and discarded.
	State BottleState
	// Answers, if set, leaves only bottles that it names or whose substance or
	// place it names.
	Answers *Found
	// Sort is one of the BrowseOrders; "" means by substance. Bottles that are
	// alike in it follow each other by substance and code. Down turns all of it
	// round.
	Sort string
	Down bool
	Page int // from 1; one beyond the last is the last
	Rows int // on a page
}

// BrowseOrders are the ways to sort.
var BrowseOrders = []string{"substance", "bottle", "place", "expiry", "state"}

// Browsed is a page of bottles.
type Browsed struct {
	Bottles []Bottle // in the order asked for
	// Shelf has these bottles, their forms, substances and earmarks, and all
	// places.
	Shelf *Shelf
	Page  int // the one given
	Total int // bottles on all pages
	All   int // bottles on record
	// Stores, Classes and States are what can be asked for.
	Stores, Classes []string
	States          []BottleState
}

// Browse reads a page of the bottles in stock. Sorted by substance it reads only
// the bottles of the substances on the page, however many others there are; the
// other orders look at all that fit.
func (s *Store) Browse(ctx context.Context, q Browse) (page Browsed, err error) {
	const doing = "list the bottles"
	version, known, err := s.version(ctx)
	if err != nil {
		return page, translate(doing, err)
	}
	names, err := s.catalogue(ctx)
	if err != nil {
		return page, err
	}
	q.Page, q.Rows = max(q.Page, 1), max(q.Rows, 1)
	err = s.read(ctx, doing, func(tx *gorm.DB) error {
		counts := s.counted.Load()
		if !known || counts == nil || counts.version != version {
			counts = &census{version: version}
			if err := counts.take(tx); err != nil {
				return err
			}
			s.counted.Store(counts)
		}
		b := &browsing{store: s, tx: tx, q: q, names: names, counts: counts}
		page, err = b.page()
		return err
	})
	return page, err
}

// census counts the bottles by form, storeroom and state.
type census struct {
	version int64
	rows    []censusRow
}

type censusRow struct {
	FormID, StoreID int64
	State           BottleState
	N               int
}

func (c *census) take(tx *gorm.DB) error {
	rows, err := tx.Raw("SELECT form_id, store_id, state, count(*) FROM bottles GROUP BY form_id, store_id, state").Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		var r censusRow
		if err := rows.Scan(&r.FormID, &r.StoreID, &r.State, &r.N); err != nil {
			return err
		}
		c.rows = append(c.rows, r)
	}
	return rows.Err()
}

// browsing is one page in the making.
type browsing struct {
	store  *Store
	tx     *gorm.DB
	q      Browse
	names  *catalogue
	counts *census
	where  []string
	args   []any
	skip   int // rows that fit and come before those asked for
}

func (b *browsing) page() (page Browsed, err error) {
	page = Browsed{Shelf: NewShelf(Lab{}), Page: b.q.Page}
	b.choices(&page)
	b.filter()
	if b.q.Answers != nil {
		b.answering(b.q.Answers)
		var n int64
		if err := b.tx.Raw("SELECT count(*) FROM bottles b WHERE "+strings.Join(b.where, " AND "), b.args...).Row().Scan(&n); err != nil {
			return page, err
		}
		page.Total = int(n)
	} else {
		page.Total = b.fitting()
	}
	page.Page = max(min(page.Page, (page.Total+b.q.Rows-1)/b.q.Rows), 1)
	b.skip = (page.Page - 1) * b.q.Rows
	if b.q.Answers == nil && b.sort() == "substance" {
		b.narrow()
	}
	if page.Bottles, err = b.rows(); err != nil {
		return page, err
	}
	lab := Lab{Bottles: page.Bottles, Places: b.names.places}
	err = lab.loadAround(b.tx)
	page.Shelf = NewShelf(lab)
	return page, err
}

func (b *browsing) sort() string {
	if slices.Contains(BrowseOrders, b.q.Sort) {
		return b.q.Sort
	}
	return BrowseOrders[0]
}

func (b *browsing) choices(page *Browsed) {
	for _, p := range b.names.places {
		page.Stores = append(page.Stores, p.Store)
	}
	for _, f := range b.names.forms {
		if f.StorageClass != "" {
			page.Classes = append(page.Classes, f.StorageClass)
		}
	}
	for _, r := range b.counts.rows {
		page.All += r.N
		page.States = append(page.States, r.State)
	}
	page.Stores, page.Classes, page.States = distinct(page.Stores), distinct(page.Classes), distinct(page.States)
}

func distinct[T cmp.Ordered](list []T) []T {
	slices.Sort(list)
	return slices.Compact(list)
}

// filter writes the conditions but those of a search.
func (b *browsing) filter() {
	b.and("b.state NOT IN ?", []BottleState{Empty, Discarded})
	if b.q.State != "" {
		b.where, b.args = nil, nil
		b.and("b.state = ?", b.q.State)
	}
	if b.q.Store != "" {
		b.and("b.store_id IN (SELECT store_id FROM places WHERE store = ?)", b.q.Store)
	}
	if b.q.Class != "" {
		b.and("b.form_id IN (SELECT id FROM stock_forms WHERE storage_class = ?)", b.q.Class)
	}
}

func (b *browsing) and(condition string, args ...any) {
	b.where, b.args = append(b.where, condition), append(b.args, args...)
}

func (b *browsing) answering(found *Found) {
	none := []int64{0}
	b.and("(b.id IN ? OR b.form_id IN (SELECT id FROM stock_forms WHERE substance_id IN ?) OR b.place_id IN ?)",
		append(none, idsOf(found.Bottles, func(b *Bottle) int64 { return b.ID })...),
		append(none, idsOf(found.Substances, func(s *Substance) int64 { return s.ID })...),
		append(none, idsOf(found.Places, func(p *Place) int64 { return p.ID })...))
}

// passes is filter for a row of the census.
func (b *browsing) passes(r *censusRow, class string, stores map[int64]bool) bool {
	gone := r.State == Empty || r.State == Discarded
	return (b.q.State == "" && !gone || b.q.State == r.State) &&
		(b.q.Store == "" || stores[r.StoreID]) && (b.q.Class == "" || b.q.Class == class)
}

// eachFitting calls f for the rows of the census that pass the filters.
func (b *browsing) eachFitting(f func(*censusRow, *StockForm)) {
	stores := map[int64]bool{}
	for _, p := range b.names.places {
		if p.Store == b.q.Store {
			stores[p.StoreID] = true
		}
	}
	forms := make(map[int64]*StockForm, len(b.names.forms))
	for i := range b.names.forms {
		forms[b.names.forms[i].ID] = &b.names.forms[i]
	}
	for i := range b.counts.rows {
		r := &b.counts.rows[i]
		if form := forms[r.FormID]; form != nil && b.passes(r, form.StorageClass, stores) {
			f(r, form)
		}
	}
}

func (b *browsing) fitting() (n int) {
	b.eachFitting(func(r *censusRow, _ *StockForm) { n += r.N })
	return n
}

// narrow leaves only the bottles of the substances that stand on the page, which
// the census tells.
func (b *browsing) narrow() {
	counts := map[int64]int{}
	b.eachFitting(func(r *censusRow, f *StockForm) { counts[f.SubstanceID] += r.N })
	order := slices.Clone(b.names.substances)
	slices.SortFunc(order, func(x, y Substance) int {
		if b.q.Down {
			x, y = y, x
		}
		return cmp.Compare(x.Name, y.Name)
	})
	var forms []int64
	wanted := b.q.Rows
	for _, s := range order {
		n := counts[s.ID]
		switch {
		case n == 0:
		case len(forms) == 0 && n <= b.skip:
			b.skip -= n
		case wanted > 0:
			wanted -= n
			if len(forms) == 0 {
				wanted += b.skip
			}
			forms = append(forms, b.names.formsOf[s.ID]...)
		}
	}
	b.and("b.form_id IN ?", append(forms, 0))
}

// withSubstance and withPlace are what the orders need besides the bottles. Texts are compared
// byte by byte on both engines.
const (
	withSubstance = " LEFT JOIN stock_forms f ON f.id = b.form_id LEFT JOIN substances s ON s.id = f.substance_id"
	withPlace     = " LEFT JOIN places p ON p.id = b.place_id"
)

func (b *browsing) order() (join string, by []string) {
	bytewise := ""
	if b.store.engine == onPostgres {
		bytewise = ` COLLATE "C"`
	}
	code, substance := "b.code"+bytewise, "s.name"+bytewise
	switch b.sort() {
	case "bottle":
		return "", []string{code}
	case "place":
		return withSubstance + withPlace, []string{"p.walk", "p.id", substance, code}
	case "expiry":
		return withSubstance, []string{"(b.expiry IS NULL)", "b.expiry", substance, code}
	case "state":
		return withSubstance, []string{"b.state" + bytewise, substance, code}
	}
	return withSubstance, []string{substance, code}
}

// rows reads the bottles of the page, first their identities, so that sorting
// many carries little.
func (b *browsing) rows() ([]Bottle, error) {
	join, by := b.order()
	if b.q.Down {
		for i := range by {
			by[i] += " DESC"
		}
	}
	var ids []int64
	err := b.tx.Raw("SELECT b.id FROM bottles b"+join+" WHERE "+strings.Join(b.where, " AND ")+" ORDER BY "+strings.Join(by, ", ")+" LIMIT ? OFFSET ?",
		append(b.args, b.q.Rows, b.skip)...).Scan(&ids).Error
	if err != nil || len(ids) == 0 {
		return nil, err
	}
	var bottles []Bottle
	if err := b.tx.Where("id IN ?", ids).Find(&bottles).Error; err != nil {
		return nil, err
	}
	slices.SortFunc(bottles, func(x, y Bottle) int {
		return cmp.Compare(slices.Index(ids, x.ID), slices.Index(ids, y.ID))
	})
	return bottles, nil
}

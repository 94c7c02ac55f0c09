package views

import (
	"cmp"
	"html/template"
	"net/http"
	"net/url"
	"slices"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
)

// shelfRows is how many bottles stand on one page of the shelf.
const shelfRows = 50

// shelfPage is all bottles, or those that answer what was looked for.
type shelfPage struct {
	frame
	Query   shelfQuery
	Columns []shelfColumn
	Rows    []shelfRow
	Total   int // of rows on all pages
	Bottles int // on the shelf altogether
	Stores  []string
	Classes []string
	States  []inventory.BottleState
	Near    bool // nothing fits exactly; what is shown is spelt nearly so
	First   int  // number of the first row shown, from 1
	Last    int
	Earlier string // address of the page before, "" for none
	Later   string
}

// shelfQuery is what the address asks for.
type shelfQuery struct {
	Find, Store, Class, State string
	Sort                      string
	Down                      bool
	Page                      int
}

// shelfRow is a bottle on the shelf page.
type shelfRow struct {
	inventory.Bottle
	Form      inventory.StockForm
	Substance inventory.Substance
	Place     inventory.Place
	Picture   template.HTML
	Holds     string
	Free      string // what nobody was promised
	Promised  bool
	Lapsed    bool // expired today
}

// shelfColumn is a sortable heading.
type shelfColumn struct {
	Name, Label, Address string
	Sorted               string // "ascending", "descending" or ""
	Number               bool
}

// shelfEntry is a bottle with what the page sorts and filters by; the rest is
// looked up for the rows of one page only.
type shelfEntry struct {
	bottle    *inventory.Bottle
	substance string
	place     *inventory.Place
}

// shelfOrders are the ways to sort, by their names in the address.
var shelfOrders = map[string]func(a, b shelfEntry) int{
	"substance": func(a, b shelfEntry) int { return cmp.Compare(a.substance, b.substance) },
	"bottle":    func(a, b shelfEntry) int { return cmp.Compare(a.bottle.Code, b.bottle.Code) },
	"place": func(a, b shelfEntry) int {
		return cmp.Or(cmp.Compare(a.place.Walk, b.place.Walk), cmp.Compare(a.place.ID, b.place.ID))
	},
	"expiry": func(a, b shelfEntry) int {
		return cmp.Compare(lastIfNone(a.bottle.Expiry), lastIfNone(b.bottle.Expiry))
	},
	"state": func(a, b shelfEntry) int { return cmp.Compare(a.bottle.State, b.bottle.State) },
}

func lastIfNone(d inventory.Date) inventory.Date {
	if !d.Set() {
		return 1 << 30
	}
	return d
}

// showShelf answers /shelf. A bottle's code, typed or scanned, leads straight to
// the bottle.
func (s *Server) showShelf(c *gin.Context) error {
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return err
	}
	q := readShelfQuery(c.Request.URL.Query())
	found, err := s.Lab.Search(c.Request.Context(), q.Find)
	if err != nil {
		return err
	}
	if found.Bottle != nil {
		return s.goTo(c, "/shelf/bottles/"+found.Bottle.Code)
	}
	return s.render(c, http.StatusOK, "shelf", s.shelfPage(shelf, q, newAnswering(q.Find, found, shelf)))
}

// goTo sends the browser to another page; htmx has to be told by a header of
// its own, because it would follow a redirect inside of the page.
func (s *Server) goTo(c *gin.Context, address string) error {
	if c.GetHeader("HX-Request") == "true" {
		c.Header("HX-Redirect", address)
		c.Status(http.StatusNoContent)
		return nil
	}
	c.Redirect(http.StatusSeeOther, address)
	return nil
}

func readShelfQuery(v url.Values) shelfQuery {
	q := shelfQuery{Find: strings.TrimSpace(v.Get("find")), Store: v.Get("store"), Class: v.Get("class"), State: v.Get("state"),
		Sort: v.Get("sort"), Down: v.Get("down") == "1", Page: 1}
	if _, ok := shelfOrders[q.Sort]; !ok {
		q.Sort = "substance"
	}
	if n, err := strconv.Atoi(v.Get("page")); err == nil && n > 1 {
		q.Page = n
	}
	return q
}

// address writes the query as an address of the shelf page.
func (q shelfQuery) address() string {
	v := url.Values{}
	set := func(key, value, usual string) {
		if value != usual {
			v.Set(key, value)
		}
	}
	set("find", q.Find, "")
	set("store", q.Store, "")
	set("class", q.Class, "")
	set("state", q.State, "")
	set("sort", q.Sort, "substance")
	if q.Down {
		v.Set("down", "1")
	}
	set("page", strconv.Itoa(q.Page), "1")
	if len(v) == 0 {
		return "/shelf"
	}
	return "/shelf?" + v.Encode()
}

func (s *Server) shelfPage(shelf *inventory.Shelf, q shelfQuery, answers answering) *shelfPage {
	p := &shelfPage{Query: q, Bottles: len(shelf.Bottles), Near: answers.nearly}
	p.Title, p.Section, p.Find = "Shelf", "/shelf", q.Find
	p.Stores, p.Classes, p.States = shelfChoices(shelf)
	entries := shelfEntries(shelf, q, answers)
	order := shelfOrders[q.Sort]
	slices.SortFunc(entries, func(a, b shelfEntry) int {
		if q.Down {
			a, b = b, a
		}
		return cmp.Or(order(a, b), cmp.Compare(a.substance, b.substance), cmp.Compare(a.bottle.Code, b.bottle.Code))
	})
	today := s.Today()
	for _, e := range p.cut(entries) {
		p.Rows = append(p.Rows, newShelfRow(shelf, *e.bottle, today))
	}
	p.Columns = shelfColumns(q)
	return p
}

// cut gives the entries of the page asked for; a page beyond the last is the
// last.
func (p *shelfPage) cut(entries []shelfEntry) []shelfEntry {
	p.Total = len(entries)
	pages := max((p.Total+shelfRows-1)/shelfRows, 1)
	q := p.Query
	q.Page = min(q.Page, pages)
	from := (q.Page - 1) * shelfRows
	part := entries[from:min(from+shelfRows, p.Total)]
	p.First, p.Last = from+1, from+len(part)
	earlier, later := q, q
	earlier.Page--
	later.Page++
	if q.Page > 1 {
		p.Earlier = earlier.address()
	}
	if q.Page < pages {
		p.Later = later.address()
	}
	p.Query = q
	return part
}

func shelfColumns(q shelfQuery) []shelfColumn {
	columns := []shelfColumn{{Name: "bottle", Label: "bottle"}, {Name: "substance", Label: "substance"}, {Label: "holds", Number: true},
		{Label: "free", Number: true}, {Name: "state", Label: "stands"}, {Name: "expiry", Label: "good until"}, {Name: "place", Label: "place"}}
	for i := range columns {
		c := &columns[i]
		if c.Name == "" {
			continue
		}
		to := q
		to.Sort, to.Page, to.Down = c.Name, 1, false
		if c.Name == q.Sort {
			c.Sorted = "ascending"
			if q.Down {
				c.Sorted = "descending"
			}
			to.Down = !q.Down
		}
		c.Address = to.address()
	}
	return columns
}

// shelfEntries lists the bottles that answer and pass the filters. Without a
// filter on the state, empty and discarded bottles are left out.
func shelfEntries(shelf *inventory.Shelf, q shelfQuery, answers answering) []shelfEntry {
	names, classes := make(map[int64]string, len(shelf.Forms)), make(map[int64]string, len(shelf.Forms))
	for i := range shelf.Forms {
		f := &shelf.Forms[i]
		substance, _ := shelf.SubstanceByID(f.SubstanceID)
		names[f.ID], classes[f.ID] = substance.Name, f.StorageClass
	}
	places := make(map[int64]*inventory.Place, len(shelf.Places))
	for i := range shelf.Places {
		places[shelf.Places[i].ID] = &shelf.Places[i]
	}
	var entries []shelfEntry
	nowhere := &inventory.Place{}
	for i := range shelf.Bottles {
		b := &shelf.Bottles[i]
		place := cmp.Or(places[b.PlaceID], nowhere)
		if q.passes(b.State, place.Store, classes[b.FormID]) && answers.has(b) {
			entries = append(entries, shelfEntry{b, names[b.FormID], place})
		}
	}
	return entries
}

// passes reports whether a bottle's state, store and storage class are those
// asked for.
func (q shelfQuery) passes(state inventory.BottleState, store, class string) bool {
	gone := state == inventory.Empty || state == inventory.Discarded
	return (q.State == "" && !gone || q.State == string(state)) &&
		(q.Store == "" || q.Store == store) && (q.Class == "" || q.Class == class)
}

// newShelfRow works out what a row shows.
func newShelfRow(shelf *inventory.Shelf, b inventory.Bottle, today inventory.Date) shelfRow {
	r := shelfRow{Bottle: b}
	r.Form, _ = shelf.Form(b.FormID)
	r.Place, _ = shelf.Place(b.PlaceID)
	r.Substance, _ = shelf.SubstanceByID(r.Form.SubstanceID)
	r.Picture = drawBottle(b, r.Form, 27)
	r.Holds = stored(b.Content, r.Form.Measure)
	free := b.Content - promised(shelf, b.ID, today)
	r.Promised = free != b.Content
	r.Free = stored(max(free, 0), r.Form.Measure)
	r.Lapsed = b.Expiry.Set() && b.Expiry < today
	return r
}

// promised sums the earmarks on a bottle that haven't lapsed.
func promised(shelf *inventory.Shelf, bottleID int64, today inventory.Date) int64 {
	var sum int64
	for _, e := range shelf.EarmarksOn(bottleID) {
		if !e.Ends.Set() || e.Ends >= today {
			sum += e.Amount
		}
	}
	return sum
}

// shelfChoices lists what the filters offer: what occurs on the shelf.
func shelfChoices(shelf *inventory.Shelf) (stores, classes []string, states []inventory.BottleState) {
	for _, p := range shelf.Places {
		stores = append(stores, p.Store)
	}
	for _, f := range shelf.Forms {
		if f.StorageClass != "" {
			classes = append(classes, f.StorageClass)
		}
	}
	seen := map[inventory.BottleState]bool{}
	for i := range shelf.Bottles {
		if state := shelf.Bottles[i].State; !seen[state] {
			seen[state] = true
			states = append(states, state)
		}
	}
	slices.Sort(stores)
	slices.Sort(classes)
	slices.Sort(states)
	return slices.Compact(stores), slices.Compact(classes), states
}

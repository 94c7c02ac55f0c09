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

// shelfOrders are the ways to sort, by their names in the address.
var shelfOrders = map[string]func(a, b shelfRow) int{
	"substance": func(a, b shelfRow) int { return cmp.Compare(a.Substance.Name, b.Substance.Name) },
	"bottle":    func(a, b shelfRow) int { return cmp.Compare(a.Code, b.Code) },
	"place": func(a, b shelfRow) int {
		return cmp.Or(cmp.Compare(a.Place.Walk, b.Place.Walk), cmp.Compare(a.PlaceID, b.PlaceID))
	},
	"expiry": func(a, b shelfRow) int { return cmp.Compare(lastIfNone(a.Expiry), lastIfNone(b.Expiry)) },
	"state":  func(a, b shelfRow) int { return cmp.Compare(a.State, b.State) },
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
	if code, err := inventory.NormalCode(q.Find); err == nil {
		if _, ok := shelf.BottleByCode(code); ok {
			return s.goTo(c, "/shelf/bottles/"+code)
		}
	}
	return s.render(c, http.StatusOK, "shelf", s.shelfPage(shelf, q))
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

func (s *Server) shelfPage(shelf *inventory.Shelf, q shelfQuery) *shelfPage {
	p := &shelfPage{Query: q, Bottles: len(shelf.Bottles)}
	p.Title, p.Section, p.Find = "Shelf", "/shelf", q.Find
	p.Stores, p.Classes, p.States = shelfChoices(shelf)
	rows := s.shelfRowsOf(shelf, q)
	found := findRows(rows, q.Find, false)
	if len(found) == 0 && q.Find != "" {
		found, p.Near = findRows(rows, q.Find, true), true
	}
	order := shelfOrders[q.Sort]
	slices.SortStableFunc(found, func(a, b shelfRow) int {
		if q.Down {
			a, b = b, a
		}
		return cmp.Or(order(a, b), cmp.Compare(a.Substance.Name, b.Substance.Name), cmp.Compare(a.Code, b.Code))
	})
	p.cut(found)
	p.Columns = shelfColumns(q)
	today := s.Today()
	for i := range p.Rows {
		p.Rows[i].dress(shelf, today)
	}
	return p
}

// cut keeps the rows of the page asked for; a page beyond the last is the last.
func (p *shelfPage) cut(rows []shelfRow) {
	p.Total = len(rows)
	pages := max((p.Total+shelfRows-1)/shelfRows, 1)
	q := p.Query
	q.Page = min(q.Page, pages)
	from := (q.Page - 1) * shelfRows
	p.Rows = rows[from:min(from+shelfRows, p.Total)]
	p.First, p.Last = from+1, from+len(p.Rows)
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

// shelfRowsOf joins the bottles with what they hold and leaves out what the
// filters exclude. Without a filter on the state, empty and discarded bottles
// are left out.
func (s *Server) shelfRowsOf(shelf *inventory.Shelf, q shelfQuery) []shelfRow {
	rows := make([]shelfRow, 0, len(shelf.Bottles))
	for _, b := range shelf.Bottles {
		r := shelfRow{Bottle: b}
		r.Form, _ = shelf.Form(b.FormID)
		r.Place, _ = shelf.Place(b.PlaceID)
		gone := b.State == inventory.Empty || b.State == inventory.Discarded
		if q.State == "" && gone || q.State != "" && string(b.State) != q.State ||
			q.Store != "" && r.Place.Store != q.Store || q.Class != "" && r.Form.StorageClass != q.Class {
			continue
		}
		r.Substance, _ = shelf.SubstanceByID(r.Form.SubstanceID)
		rows = append(rows, r)
	}
	return rows
}

// dress works out what a row shows; only for the rows of one page.
func (r *shelfRow) dress(shelf *inventory.Shelf, today inventory.Date) {
	r.Picture = drawBottle(r.Bottle, r.Form, 27)
	r.Holds = stored(r.Content, r.Form.Measure)
	free := r.Content - promised(shelf, r.ID, today)
	r.Promised = free != r.Content
	r.Free = stored(max(free, 0), r.Form.Measure)
	r.Lapsed = r.Expiry.Set() && r.Expiry < today
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
	for _, b := range shelf.Bottles {
		states = append(states, b.State)
	}
	slices.Sort(stores)
	slices.Sort(classes)
	slices.Sort(states)
	return slices.Compact(stores), slices.Compact(classes), slices.Compact(states)
}

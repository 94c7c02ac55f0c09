package views

import (
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

// showShelf answers /shelf. A bottle's code, typed or scanned, leads straight to
// the bottle.
func (s *Server) showShelf(c *gin.Context) error {
	q := readShelfQuery(c.Request.URL.Query())
	found, err := s.Lab.Search(c.Request.Context(), q.Find)
	if err != nil {
		return err
	}
	if found.Bottle != nil {
		return s.goTo(c, "/shelf/bottles/"+found.Bottle.Code)
	}
	part, err := s.Lab.Browse(c.Request.Context(), q.browse(&found))
	if err != nil {
		return err
	}
	p := s.shelfPage(part, q)
	p.Near = q.Find != "" && spelledNearly(q.Find, found)
	return s.render(c, http.StatusOK, "shelf", p)
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
	if !slices.Contains(inventory.BrowseOrders, q.Sort) {
		q.Sort = inventory.BrowseOrders[0]
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

// browse asks the stock records for the page.
func (q shelfQuery) browse(found *inventory.Found) inventory.Browse {
	if q.Find == "" {
		found = nil
	}
	return inventory.Browse{Store: q.Store, Class: q.Class, State: inventory.BottleState(q.State),
		Answers: found, Sort: q.Sort, Down: q.Down, Page: q.Page, Rows: shelfRows}
}

func (s *Server) shelfPage(part inventory.Browsed, q shelfQuery) *shelfPage {
	q.Page = part.Page
	p := &shelfPage{Query: q, Bottles: part.All, Total: part.Total, Stores: part.Stores, Classes: part.Classes, States: part.States}
	p.Title, p.Section, p.Find = "Shelf", "/shelf", q.Find
	today := s.Today()
	for _, b := range part.Bottles {
		p.Rows = append(p.Rows, newShelfRow(part.Shelf, b, today))
	}
	p.Columns = shelfColumns(q)
	p.place()
	return p
}

// place says which rows are shown and where the pages before and after are.
func (p *shelfPage) place() {
	p.First = (p.Query.Page-1)*shelfRows + 1
	p.Last = p.First - 1 + len(p.Rows)
	earlier, later := p.Query, p.Query
	earlier.Page--
	later.Page++
	if p.Query.Page > 1 {
		p.Earlier = earlier.address()
	}
	if p.Last < p.Total {
		p.Later = later.address()
	}
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

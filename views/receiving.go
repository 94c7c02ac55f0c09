package views

import (
	"cmp"
	"errors"
	"net/http"
	"slices"
	"strconv"
	"strings"
	"time"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// receivePage takes bottles into stock: of an order under way, or of a stock
// form that was looked for.
type receivePage struct {
	frame
	Query  string // what form was looked for
	Orders []orderRow
	Forms  []inventory.StockForm // that answer the query
	Form   *inventory.StockForm  // the one chosen
	Order  *orderRow             // the order chosen
	Made   []madeBottle          // taken in just now
	Places []inventory.Place
	Today  inventory.Date
}

// madeBottle is a bottle that was taken in, to be labelled.
type madeBottle struct {
	Code, Form, Size string
	Place            inventory.Place
}

// mostForms is how many stock forms a search lists.
const mostForms = 40

// showReceive answers /shelf/receive.
func (s *Server) showReceive(c *gin.Context) error {
	p, shelf, err := s.receivePage(c, c.Query("order"), c.Query("form"))
	if err != nil {
		return err
	}
	p.Query = strings.TrimSpace(c.Query("what"))
	if p.Form == nil && p.Query != "" {
		found, err := s.Lab.Search(c.Request.Context(), p.Query)
		if err != nil {
			return err
		}
		for _, substance := range found.Substances {
			p.Forms = append(p.Forms, shelf.FormsOf(substance.ID)...)
		}
		p.Forms = p.Forms[:min(len(p.Forms), mostForms)]
	}
	for _, code := range strings.Fields(c.Query("made")) {
		if b, ok := shelf.BottleByCode(code); ok {
			form, _ := shelf.Form(b.FormID)
			place, _ := shelf.Place(b.PlaceID)
			p.Made = append(p.Made, madeBottle{b.Code, form.Name, storedPlain(b.Size, form.Measure), place})
		}
	}
	return s.render(c, http.StatusOK, "receive", p)
}

// receivePage makes the page for the order or the form an address names.
func (s *Server) receivePage(c *gin.Context, order, form string) (*receivePage, *inventory.Shelf, error) {
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return nil, nil, err
	}
	p := &receivePage{Places: shelf.Places, Today: s.Today()}
	p.Title, p.Section = "Take bottles in", "/shelf"
	p.Orders = ordersUnderWay(shelf, s.Today())
	if order != "" {
		i := slices.IndexFunc(p.Orders, func(o orderRow) bool { return strconv.FormatInt(o.ID, 10) == order })
		if i < 0 {
			return nil, nil, &missing{"order under way", order, "It may have been received already; the orders under way stand on the page “Take bottles in”."}
		}
		p.Order, p.Form = &p.Orders[i], &p.Orders[i].Form
		return p, shelf, nil
	}
	if form != "" {
		id, err := strconv.ParseInt(form, 10, 64)
		f, ok := shelf.Form(id)
		if err != nil || !ok {
			return nil, nil, &missing{"stock form", form, "Look for it by its name on the page “Take bottles in”."}
		}
		p.Form = &f
	}
	return p, shelf, nil
}

// One reports whether a single bottle is taken in, which may be weighed.
func (p *receivePage) One() bool {
	return (p.Order == nil || p.Order.Packs == 1) && p.Form.Measure != inventory.ByCount
}

// PlaceOptions are the places, those for the form's storage class first.
func (p *receivePage) PlaceOptions() []option {
	places := slices.Clone(p.Places)
	slices.SortStableFunc(places, func(a, b inventory.Place) int {
		return cmp.Compare(misfit(a, *p.Form), misfit(b, *p.Form))
	})
	return placeOptions(places, func(inventory.Place) bool { return true })
}

// misfit is 0 for a place of the form's storage class, 1 for any class, else 2.
func misfit(p inventory.Place, f inventory.StockForm) int {
	switch p.StorageClass {
	case f.StorageClass:
		return 0
	case "":
		return 1
	}
	return 2
}

// ExpiryHint says what an empty expiry stands for.
func (p *receivePage) ExpiryHint() string {
	hint := "like 14 Jan 2028, or Jan 2028 for its last day; "
	if p.Order != nil && p.Order.Offer.ShelfLifeDays > 0 {
		return hint + "left empty: " + strconv.Itoa(p.Order.Offer.ShelfLifeDays) + " days from today, as offered"
	}
	return hint + "left empty: no date known"
}

// takeIn answers the form that takes bottles into stock.
func (s *Server) takeIn(c *gin.Context) error {
	p, _, err := s.receivePage(c, c.PostForm("order"), c.PostForm("form"))
	if err != nil {
		return err
	}
	if p.Form == nil {
		return s.goTo(c, "/shelf/receive")
	}
	p.keep(c, "new")
	b := p.readBottle()
	act := p.act("received")
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "receive", p)
	}
	bottles, err := s.receive(c, p, b, act)
	if err != nil {
		status, err := p.refuse(err, "size")
		if err != nil {
			return err
		}
		if p.Order != nil { // there is no field for the size
			p.Faults[len(p.Faults)-1].Field = ""
		}
		return s.render(c, status, "receive", p)
	}
	codes := make([]string, len(bottles))
	for i, made := range bottles {
		codes[i] = made.Code
	}
	return s.goTo(c, "/shelf/receive?made="+strings.Join(codes, "+"))
}

func (s *Server) receive(c *gin.Context, p *receivePage, b inventory.Bottle, act inventory.Act) ([]inventory.Bottle, error) {
	if p.Order != nil {
		return s.Lab.ReceiveOrder(c.Request.Context(), p.Order.ID, b, act)
	}
	made, err := s.Lab.Receive(c.Request.Context(), b, act)
	return []inventory.Bottle{made}, err
}

// readBottle reads what is written down about a received bottle, which is
// sealed and full.
func (p *receivePage) readBottle() inventory.Bottle {
	b := inventory.Bottle{FormID: p.Form.ID, Lot: p.typed("lot"), Mark: p.typed("mark"), Supplier: p.typed("supplier"), Note: p.typed("note")}
	if p.Order != nil {
		b.Size = p.Order.Offer.PackSize
	} else if b.Size = readContent("new-size", p.typed("size"), *p.Form, &p.Faults); b.Size == 0 && p.Faults.Of("new-size") == "" {
		p.wrong("size", "A bottle holds more than nothing.")
	}
	b.Content = b.Size
	if place, ok := p.readPlace(p.Places, *p.Form); ok {
		b.PlaceID = place.ID
	}
	b.LotAssay = p.readLotAssay()
	b.Expiry = p.readExpiry()
	if p.One() {
		b.TareUG = p.readTare(b.Content)
	}
	return b
}

func (p *receivePage) readLotAssay() float64 {
	text := p.typed("assay")
	if text == "" {
		return 0
	}
	w, err := chem.ParseFraction(text)
	switch {
	case err != nil:
		p.wrong("assay", sentence(err.Error()))
	case !(w > 0 && w <= 1):
		p.wrong("assay", "“"+text+"” is no assay: give more than 0 and at most 100 %, like 99.4 %.")
	}
	return float64(w)
}

// readExpiry reads a day, or a month for its last day.
func (p *receivePage) readExpiry() inventory.Date {
	text := p.typed("expiry")
	if text == "" {
		return 0
	}
	for _, form := range []string{"2006-01", "Jan 2006", "January 2006"} {
		if t, err := time.Parse(form, text); err == nil {
			return inventory.DateOf(t.AddDate(0, 1, -1))
		}
	}
	day, err := readDate(text)
	if err != nil {
		p.wrong("expiry", sentence(err.Error()))
	}
	return day
}

// readTare works out the mass of the empty bottle from that of the full one.
func (p *receivePage) readTare(content int64) int64 {
	text := p.typed("gross")
	if text == "" {
		return 0
	}
	gross, err := chem.ParseMass(text)
	if err != nil {
		p.wrong("gross", sentence(err.Error()))
		return 0
	}
	tare, err := tareOf(gross, content, *p.Form)
	if err != nil {
		p.wrong("gross", sentence(err.Error()))
	}
	return tare
}

var (
	errNoDensity = errors.New("without a density (no data) the tare doesn’t follow from this; leave it empty")
	errTooLight  = errors.New("that is less than its content alone: check the balance, the size and their units")
)

func tareOf(gross chem.Mass, content int64, form inventory.StockForm) (int64, error) {
	inside := chem.Mass(content) * chem.Microgram
	if form.Measure == inventory.ByVolume {
		if form.DensityGML <= 0 {
			return 0, errNoDensity
		}
		density := chem.Density(form.DensityGML) * chem.GramPerMillilitre
		inside = density.Mass(chem.Volume(content) * chem.Microlitre)
	}
	tare, ok := inventory.UnitsNear(gross - inside)
	if !ok || tare == 0 {
		return 0, errTooLight
	}
	return tare, nil
}

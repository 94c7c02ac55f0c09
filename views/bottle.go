package views

import (
	"errors"
	"html/template"
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// bottlePage is one bottle: what it holds, who was promised it, and where its
// content comes from.
type bottlePage struct {
	frame
	inventory.Bottle
	Form      inventory.StockForm
	Substance inventory.Substance
	Place     inventory.Place
	Picture   template.HTML
	Holds     string
	Size      string
	Fill      string
	Free      string
	Mass      string // of a content measured by volume, if the density is known
	Lapsed    bool
	Earmarks  []earmarkRow
	Ledger    []ledgerRow
	Count     countForm
	Life      []lifeRow
	Out       *inventory.Weighing // a weigh-out that hasn't been weighed in
	Cut       []inventory.Run     // whose promises were cut just now
	Runs      []option            // that something may be taken for
	Places    []inventory.Place

	today         inventory.Date
	peroxideLimit float64 // ppm from which a bottle is barred; 0 for none set
}

// earmarkRow is a promise on the bottle's page.
type earmarkRow struct {
	inventory.Earmark
	Text   string
	Run    inventory.Run
	Lapsed bool
}

// ledgerRow is a line of the bottle's ledger, the newest first, with the content
// after it.
type ledgerRow struct {
	On, Kind, Change, After, Why, Who string
	RunID, ID, Amount                 int64
}

// showBottle answers /shelf/bottles/:code.
func (s *Server) showBottle(c *gin.Context) error {
	p, err := s.findBottle(c)
	if err != nil {
		return err
	}
	return s.render(c, http.StatusOK, "bottle", p)
}

// findBottle makes the page of the bottle an address names.
func (s *Server) findBottle(c *gin.Context) (*bottlePage, error) {
	b, shelf, err := s.Lab.LoadBottle(c.Request.Context(), c.Param("code"))
	if errors.Is(err, inventory.ErrNotFound) || errors.Is(err, inventory.ErrBadCode) {
		return nil, &missing{"bottle", c.Param("code"), "Look for it by the name of what is in it, with the field at the top. " + wrongCode(err)}
	}
	if err != nil {
		return nil, err
	}
	p := s.bottlePage(shelf, b)
	entries, err := s.Lab.Ledger(c.Request.Context(), b.Code, ledgerLines)
	if err != nil {
		return nil, err
	}
	p.Ledger = ledgerRows(entries, p.Form.Measure)
	p.Cut = cutRuns(c.Query("cut"), shelf)
	if p.Life, err = s.life(c.Request.Context(), b.Code); err != nil {
		return nil, err
	}
	out, is, err := s.Lab.WeighedOut(c.Request.Context(), b.Code)
	if is {
		p.Out = &out
	}
	return p, err
}

// ledgerLines is how many of the last entries of the ledger a page shows.
const ledgerLines = 50

func ledgerRows(entries []inventory.Entry, measure inventory.Measure) []ledgerRow {
	rows := make([]ledgerRow, len(entries))
	for i, e := range entries {
		change := stored(e.Amount, measure)
		if e.Amount > 0 {
			change = "+" + change
		}
		rows[i] = ledgerRow{On: inventory.DateOf(e.At.Time).Short(), Kind: string(e.Kind), Change: change,
			After: stored(e.Content, measure), Why: e.Why, Who: e.ByWhom, RunID: e.RunID, ID: e.ID, Amount: e.Amount}
	}
	return rows
}

func wrongCode(err error) string {
	if errors.Is(err, inventory.ErrNotFound) {
		return "The code reads well, but no bottle has it."
	}
	return sentence(err.Error())
}

func (s *Server) bottlePage(shelf *inventory.Shelf, b inventory.Bottle) *bottlePage {
	today := s.Today()
	p := &bottlePage{Bottle: b, today: today}
	p.Form, _ = shelf.Form(b.FormID)
	p.Substance, _ = shelf.SubstanceByID(p.Form.SubstanceID)
	p.Place, _ = shelf.Place(b.PlaceID)
	p.Title, p.Section = "Bottle "+b.Code+", "+p.Form.Name, "/shelf"
	p.Picture = drawBottle(b, p.Form, 190)
	p.Holds = stored(b.Content, p.Form.Measure)
	p.Size = "not known"
	if b.Size > 0 {
		p.Size = storedPlain(b.Size, p.Form.Measure)
		p.Fill = fillText(chem.Fraction(fillOf(b)))
	}
	p.Free = stored(max(b.Content-promised(shelf, b.ID, today), 0), p.Form.Measure)
	if p.Form.Measure == inventory.ByVolume && p.Form.DensityGML > 0 {
		density := chem.Density(p.Form.DensityGML) * chem.GramPerMillilitre
		p.Mass = massText(density.Mass(chem.Volume(b.Content) * chem.Microlitre))
	}
	p.Runs, p.Places = runOptions(shelf), shelf.Places
	p.peroxideLimit, _ = shelf.Policy.Value("peroxide.limit")
	p.Lapsed = b.Expiry.Set() && b.Expiry < today
	for _, e := range shelf.EarmarksOn(b.ID) {
		run, _ := shelf.Run(e.RunID)
		p.Earmarks = append(p.Earmarks, earmarkRow{e, stored(e.Amount, p.Form.Measure), run, e.Ends.Set() && e.Ends < today})
	}
	return p
}

// Assay writes the strength the bottle is planned with: that of its lot where a
// certificate gives one, else the range on the label.
func (p *bottlePage) Assay() string {
	switch {
	case p.LotAssay > 0:
		return percentText(chem.Fraction(p.LotAssay)) + ", by the certificate of the lot"
	case p.Form.AssayLow <= 0 && p.Form.AssayHigh <= 0:
		return "no data"
	case p.Form.AssayLow == p.Form.AssayHigh:
		return percentText(p.Form.Assay()) + ", by the label"
	}
	return percentText(chem.Fraction(p.Form.AssayLow)) + " to " + percentText(chem.Fraction(p.Form.AssayHigh)) + ", by the label"
}

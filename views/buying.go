package views

import (
	"net/http"
	"slices"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
)

// buyingPage is what to buy for the slate, and what is under way already.
type buyingPage struct {
	frame
	Runs   []buyingRun
	Totals []string // by currency
	Orders []orderRow
}

// buyingRun is what one run needs bought.
type buyingRun struct {
	inventory.Run
	Wanted, Product string
	Buy             []planner.Purchase
}

// orderRow is an order that hasn't come yet.
type orderRow struct {
	inventory.Order
	Offer inventory.Offer
	Form  inventory.StockForm
	Late  bool
}

// showBuying answers /buying.
func (s *Server) showBuying(c *gin.Context) error {
	shelf, lines, err := s.slate(c)
	if err != nil {
		return err
	}
	p := &buyingPage{Orders: ordersUnderWay(shelf, s.Today())}
	p.Title, p.Section = "Buying", "/buying"
	totals := map[string]int64{}
	for _, l := range lines {
		if l.Err != nil || len(l.Plan.Buy) == 0 {
			continue // the slate says why
		}
		p.Runs = append(p.Runs, buyingRun{l.Run, wantedText(l.Run), l.Plan.Recipe.Product, l.Plan.Buy})
		for _, b := range l.Plan.Buy {
			totals[b.Currency] += b.Cost
		}
	}
	for currency, minor := range totals {
		p.Totals = append(p.Totals, moneyText(minor, currency))
	}
	slices.Sort(p.Totals)
	return s.render(c, http.StatusOK, "buying", p)
}

func ordersUnderWay(shelf *inventory.Shelf, today inventory.Date) []orderRow {
	offers := map[int64]inventory.Offer{}
	for _, o := range shelf.Offers {
		offers[o.ID] = o
	}
	var rows []orderRow
	for _, o := range shelf.Orders {
		if o.State != "under way" {
			continue
		}
		form, _ := shelf.Form(o.FormID)
		rows = append(rows, orderRow{o, offers[o.OfferID], form, o.Due.Set() && o.Due < today})
	}
	return rows
}

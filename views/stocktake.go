package views

import (
	"cmp"
	"html/template"
	"net/http"
	"net/url"
	"slices"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// stockTakePage is the daily short list: the bottles most worth looking at
// today, with the reasons of each, and one field to scan into.
type stockTakePage struct {
	frame
	Who    string
	ByWalk bool // in walking order instead of by weight
	Rows   []stockTakeRow
	Done   string // what was written down last
	Alarm  string // what a loss may ask for
}

type stockTakeRow struct {
	inventory.ToCount
	Rank int // 1 is the weightiest
}

// Address leads to a bottle's count, or with "" to the list, and takes along
// who counts and the order.
func (p *stockTakePage) Address(code string) string {
	return stockTakeAddress(code, url.Values{"who": {p.Who}, "by": {map[bool]string{true: "walk"}[p.ByWalk]}})
}

// OtherOrder is the address of the list in the other order.
func (p *stockTakePage) OtherOrder() string {
	return stockTakeAddress("", url.Values{"who": {p.Who}, "by": {map[bool]string{false: "walk"}[p.ByWalk]}})
}

// stockTakeAddress writes an address without the values that are empty.
func stockTakeAddress(code string, v url.Values) string {
	address := "/shelf/stock-take"
	if code != "" {
		address += "/" + code
	}
	for name := range v {
		if v.Get(name) == "" {
			v.Del(name)
		}
	}
	if len(v) > 0 {
		address += "?" + v.Encode()
	}
	return address
}

// showStockTake answers /shelf/stock-take. A code that was scanned leads to its
// bottle.
func (s *Server) showStockTake(c *gin.Context) error {
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return err
	}
	p := &stockTakePage{Who: strings.TrimSpace(c.Query("who")), ByWalk: c.Query("by") == "walk"}
	p.Title, p.Section = "Stock-take", "/shelf"
	status := http.StatusOK
	if scan := strings.TrimSpace(c.Query("scan")); scan != "" {
		to, wrong := scanned(scan, shelf)
		if wrong == "" {
			if !strings.HasPrefix(to, "/") {
				to = p.Address(to)
			}
			return s.goTo(c, to)
		}
		p.sent = sentForm{"take", url.Values{"scan": {scan}}}
		p.wrong("scan", wrong)
		status = http.StatusUnprocessableEntity
	}
	p.Rows = rankedList(shelf.ShortList(s.Today()), p.ByWalk)
	if err := s.sayDone(c, p, shelf); err != nil {
		return err
	}
	return s.render(c, status, "stocktake", p)
}

// scanned tells where a code leads: the code of a bottle, or the address of a
// carboy's page.
func scanned(text string, shelf *inventory.Shelf) (to, wrong string) {
	code, err := inventory.NormalCode(text)
	if err != nil {
		return "", sentence(err.Error())
	}
	switch inventory.CodeKind(code[0]) {
	case inventory.CarboyCode:
		return carboyAddress(code), ""
	case inventory.PlaceCode:
		return "", "“" + text + "” is the code of a place. Scan a bottle."
	}
	if _, ok := shelf.BottleByCode(code); !ok {
		return "", "“" + text + "” reads well, but no bottle has it. Take the bottle into stock first."
	}
	return code, ""
}

// rankedList numbers the bottles by the weight of their reasons. The short list
// comes in walking order; bottles of one weight keep it.
func rankedList(list []inventory.ToCount, byWalk bool) []stockTakeRow {
	ranked := slices.Clone(list)
	slices.SortStableFunc(ranked, func(a, b inventory.ToCount) int { return cmp.Compare(b.Weight, a.Weight) })
	rank := map[int64]int{}
	for i, r := range ranked {
		rank[r.Bottle.ID] = i + 1
	}
	if byWalk {
		ranked = list
	}
	rows := make([]stockTakeRow, len(ranked))
	for i, r := range ranked {
		rows[i] = stockTakeRow{r, rank[r.Bottle.ID]}
	}
	return rows
}

// sayDone says what was written down about the bottle that was counted last.
func (s *Server) sayDone(c *gin.Context, p *stockTakePage, shelf *inventory.Shelf) error {
	code, err := inventory.NormalCode(c.Query("done"))
	b, ok := shelf.BottleByCode(code)
	if err != nil || !ok {
		return nil
	}
	form, _ := shelf.Form(b.FormID)
	if b.State == inventory.Missing {
		p.Done = b.Code + ", " + form.Name + ", stands as missing now."
		p.Alarm = lossText(shelf, form)
		return nil
	}
	entries, err := s.Lab.Ledger(c.Request.Context(), b.Code, 1)
	if err != nil || len(entries) == 0 {
		return err
	}
	p.Done = b.Code + ", " + form.Name + ": " + stored(b.Content, form.Measure) + ", as the ledger had it."
	if e := entries[0]; e.Kind == inventory.Counted && e.Amount != 0 {
		p.Done = b.Code + ", " + form.Name + ": " + stored(e.Content, form.Measure) + "; the ledger had " + stored(e.Content-e.Amount, form.Measure) + "."
	}
	for _, run := range cutRuns(c.Query("cut"), shelf) {
		p.Done += " What " + forRun(run.ID)[len("for "):] + " was promised of it no longer fits and was cut: tell " + run.Owner + "."
	}
	return nil
}

// lossText says what the loss of a regulated substance may ask for. No rule on
// record doesn't mean that there is none.
func lossText(shelf *inventory.Shelf, form inventory.StockForm) string {
	substance, _ := shelf.SubstanceByID(form.SubstanceID)
	notes := chem.PurchaseNotes(substance.Name, chem.Fraction(form.AssayHigh))
	if len(notes) == 0 {
		return ""
	}
	return "It is regulated (" + notes[0].Jurisdiction + ", " + notes[0].Instrument + "): a loss may have to be reported within a day. Tell the person in charge now; local law decides."
}

// countPage is the count of one bottle, for a tablet or telephone at the shelf.
// What the ledger says isn't shown, so that nobody reads it into the bottle.
type countPage struct {
	frame
	inventory.Bottle
	Form    inventory.StockForm
	Place   inventory.Place
	Picture template.HTML
	Why     []string
	By      string // the order of the list to go back to
	Who     string
}

// Ways are the ways to find out what a bottle holds.
func (p *countPage) Ways() []option {
	var options []option
	for _, w := range countWays {
		options = append(options, option{Value: w.Way, Words: w.Words})
	}
	return options
}

// Back leads to the list.
func (p *countPage) Back() string {
	return stockTakeAddress("", url.Values{"who": {p.Who}, "by": {p.By}})
}

// AskWho asks who counts; the name comes along from the bottle before.
func (p *countPage) AskWho() askField {
	a := p.Ask("take", "who", "by whom", "", "wide")
	if p.sent.name == "" {
		a.Value = p.Who
	}
	return a
}

// showCount answers /shelf/stock-take/:code.
func (s *Server) showCount(c *gin.Context) error {
	p, err := s.countPage(c)
	if err != nil {
		return err
	}
	return s.render(c, http.StatusOK, "count", p)
}

func (s *Server) countPage(c *gin.Context) (*countPage, error) {
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return nil, err
	}
	code, err := inventory.NormalCode(c.Param("code"))
	b, ok := shelf.BottleByCode(code)
	if err != nil || !ok {
		return nil, &missing{"bottle", c.Param("code"), "Scan it again, or take it into stock first. " + wrongCode(err)}
	}
	p := &countPage{Bottle: b, Who: strings.TrimSpace(c.Query("who")), By: c.Query("by")}
	p.Form, _ = shelf.Form(b.FormID)
	p.Place, _ = shelf.Place(b.PlaceID)
	p.Title, p.Section = "Count "+b.Code, "/shelf"
	for _, r := range shelf.ShortList(s.Today()) {
		if r.Bottle.ID == b.ID {
			p.Why = r.Why
		}
	}
	return p, nil
}

// takeStock answers the form of a bottle's count: what it holds, or that it
// isn't there.
func (s *Server) takeStock(c *gin.Context) error {
	p, err := s.countPage(c)
	if err != nil {
		return err
	}
	p.keep(c, "take")
	p.Who, p.By = p.typed("who"), p.typed("order")
	gone := p.typed("do") == "missing"
	var amount int64
	if !gone {
		amount = readContent("take-amount", p.typed("amount"), p.Form, &p.Faults)
	}
	act := p.act("stock-take")
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "count", p)
	}
	var cut []inventory.Promise
	if gone {
		err = s.Lab.SetBottleState(c.Request.Context(), p.Code, inventory.Missing, act)
	} else {
		count := inventory.Count{Bottle: p.Code, Content: amount, By: inventory.MeasuredBy(p.typed("by"))}
		_, cut, err = s.Lab.StockTake(c.Request.Context(), count, act)
	}
	if err != nil {
		status, err := p.refuse(err, "amount")
		if err != nil {
			return err
		}
		return s.render(c, status, "count", p)
	}
	runs := strings.ReplaceAll(strings.TrimPrefix(cutQuery(cut), "?cut="), "+", " ")
	return s.goTo(c, stockTakeAddress("", url.Values{"done": {p.Code}, "cut": {runs}, "who": {p.Who}, "by": {p.By}}))
}

package views

import (
	"cmp"
	"context"
	"slices"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// lifeRow is something that was done to a bottle besides what its ledger says.
type lifeRow struct {
	At                 inventory.Stamp
	On, What, Why, Who string
}

// lifeLines is how many of the last rows of the audit a page shows.
const lifeLines = 50

// life gathers the states a bottle went through and what the audit has of it,
// the newest first.
func (s *Server) life(ctx context.Context, code string) ([]lifeRow, error) {
	states, err := s.Lab.States(ctx, code)
	if err != nil {
		return nil, err
	}
	audit, err := s.Lab.Audit(ctx, "bottle "+code, lifeLines)
	if err != nil {
		return nil, err
	}
	var rows []lifeRow
	for _, change := range states {
		what := "stands " + string(change.State)
		if change.Was != "" {
			what = "from " + string(change.Was) + " to " + string(change.State)
		}
		rows = append(rows, newLifeRow(change.At, what, change.Why, change.ByWhom))
	}
	for _, a := range audit {
		rows = append(rows, newLifeRow(a.At, auditText(a), a.Why, a.ByWhom))
	}
	slices.SortStableFunc(rows, func(a, b lifeRow) int { return cmp.Compare(b.At.UnixMilli(), a.At.UnixMilli()) })
	return rows[:min(len(rows), lifeLines)], nil
}

func newLifeRow(at inventory.Stamp, what, why, who string) lifeRow {
	return lifeRow{at, at.Format("2 Jan 2006, 15:04") + " UTC", what, why, who}
}

// auditText says what was done, and from what to what.
func auditText(a inventory.AuditRow) string {
	text := strings.TrimSuffix(a.What, " of")
	switch {
	case a.Was != "" && a.IsNow != "":
		return text + ": " + a.IsNow + ", before it " + a.Was
	case a.Was != "" || a.IsNow != "":
		return text + ": " + a.Was + a.IsNow
	}
	return text
}

// stateOptions are the states that the bottle may be brought to.
func (p *bottlePage) StateOptions() []option {
	words := map[inventory.BottleState]string{
		inventory.Sealed: "sealed", inventory.Opened: "open", inventory.Quarantined: "quarantined: nothing may be taken from it",
		inventory.Missing: "missing: it isn’t where it should be", inventory.Empty: "empty",
	}
	found := map[bool]string{true: "found again, "}[p.State == inventory.Missing]
	var options []option
	for _, state := range p.NextStates() {
		options = append(options, option{Value: string(state), Words: found + words[state]})
	}
	return options
}

// changeState answers the form that says how a bottle stands now.
func (s *Server) changeState(c *gin.Context) error {
	return s.onBottle(c, "stands", "to", "h-life", func(p *bottlePage) (deed, string) {
		to := p.typed("to")
		if !slices.ContainsFunc(p.StateOptions(), func(o option) bool { return o.Value == to }) && to != string(p.State) {
			p.wrong("to", "A bottle that is "+string(p.State)+" can’t become “"+to+"”: choose one of the list.")
		}
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			return nil, s.Lab.SetBottleState(ctx, p.Code, inventory.BottleState(to), act)
		}, ""
	})
}

// discardBottle answers the form that takes a bottle out of stock for good. It
// can't be taken back, and so it asks for a tick.
func (s *Server) discardBottle(c *gin.Context) error {
	return s.onBottle(c, "discard", "sure", "h-life", func(p *bottlePage) (deed, string) {
		if p.typed("sure") == "" {
			p.wrong("sure", "Tick this if it is meant: it can’t be taken back.")
		}
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			return s.Lab.Discard(ctx, p.Code, act)
		}, ""
	})
}

// Sure is the tick that a discard asks for.
func (p *bottlePage) Sure() askField {
	return p.Ask("discard", "sure", "what is left, "+p.Holds+", leaves the ledger for good", "", "")
}

// moveBottle answers the form that puts a bottle in another place of its store.
func (s *Server) moveBottle(c *gin.Context) error {
	return s.onBottle(c, "move", "place", "h-life", func(p *bottlePage) (deed, string) {
		place, ok := p.readPlace(p.Places, p.Form)
		if ok && place.StoreID != p.StoreID {
			p.wrong("place", place.String()+" is in another store; that would be a loan.")
		}
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			return nil, s.Lab.MoveBottle(ctx, p.Code, place.ID, act)
		}, ""
	})
}

// PlaceOptions are the places of the bottle's store but its own.
func (p *bottlePage) PlaceOptions() []option {
	return placeOptions(p.Places, func(place inventory.Place) bool {
		return place.StoreID == p.StoreID && place.ID != p.PlaceID
	})
}

func placeOptions(places []inventory.Place, fit func(inventory.Place) bool) []option {
	options := []option{{Words: "choose"}}
	for _, place := range places {
		if !fit(place) {
			continue
		}
		words := place.String()
		if place.StorageClass != "" {
			words += " (" + place.StorageClass + ")"
		}
		options = append(options, option{Value: strconv.FormatInt(place.ID, 10), Words: words})
	}
	return options
}

// readPlace reads the place that was chosen for a stock form. One that is meant
// for another storage class is refused until somebody ticks that it is meant.
func (f *frame) readPlace(places []inventory.Place, form inventory.StockForm) (inventory.Place, bool) {
	id, err := strconv.ParseInt(f.typed("place"), 10, 64)
	i := slices.IndexFunc(places, func(p inventory.Place) bool { return p.ID == id })
	if err != nil || i < 0 {
		f.wrong("place", "Choose a place of the list.")
		return inventory.Place{}, false
	}
	place := places[i]
	if place.StorageClass != "" && place.StorageClass != form.StorageClass && f.typed("despite") == "" {
		f.wrong("place", place.String()+" is for "+place.StorageClass+"; this bottle is "+classWords(form.StorageClass)+". Choose another, or tick that it is meant.")
	}
	return place, true
}

func classWords(class string) string {
	if class == "" {
		return "of no storage class on record (no data)"
	}
	return class
}

// Despite is the tick for a place of another storage class; it is asked for
// only when that is what was wrong.
func (f *frame) Despite(form string) *askField {
	if f.sent.name != form || f.Faults.Of(form+"-place") == "" && f.typed("despite") == "" || f.typed("place") == "" {
		return nil
	}
	a := f.Ask(form, "despite", "it is meant to stand there", "", "")
	return &a
}

// testPeroxide answers the form for the result of a peroxide test of today.
func (s *Server) testPeroxide(c *gin.Context) error {
	return s.onBottle(c, "peroxide", "ppm", "h-life", func(p *bottlePage) (deed, string) {
		ppm, err := chem.ParseNumber(strings.TrimSpace(strings.TrimSuffix(p.typed("ppm"), "ppm")))
		if err != nil {
			p.wrong("ppm", "Say what the strip shows in ppm, like 5; 0 for none. "+sentence(err.Error()))
		}
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			return nil, s.Lab.NotePeroxideTest(ctx, p.Code, ppm, act)
		}, "peroxide test"
	})
}

// PeroxideLimit writes the content from which a bottle is barred, "" where the
// policy sets none.
func (p *bottlePage) PeroxideLimit() string {
	if p.peroxideLimit <= 0 {
		return ""
	}
	return with(numberText(p.peroxideLimit), "ppm")
}

// Cautions are what somebody should know before touching the bottle. That none
// is given says nothing about what isn't on record.
func (p *bottlePage) Cautions() []string {
	var cautions []string
	if p.Lapsed {
		cautions = append(cautions, "It expired on "+p.Expiry.Short()+".")
	}
	if since := p.testDue(); since.Set() && since < p.today {
		cautions = append(cautions, "Its peroxide test has been due since "+since.Short()+": don’t open or move it, ask the person in charge.")
	}
	if p.peroxideLimit > 0 && p.PeroxidePPM >= p.peroxideLimit {
		cautions = append(cautions, "Its last peroxide test found "+with(numberText(p.PeroxidePPM), "ppm")+", where plans leave a bottle alone from "+p.PeroxideLimit()+" on: don’t open or move it, ask the person in charge.")
	}
	return cautions
}

// testDue is the day by which a peroxide former has to be tested: counted from
// its last test, or from its opening; no day for what needs none.
func (p *bottlePage) testDue() inventory.Date {
	last := p.Opened
	if p.PeroxideTested.Set() {
		last = p.PeroxideTested
	}
	if p.Form.PeroxideTestDays == 0 || !last.Set() {
		return 0
	}
	return last.AddDays(p.Form.PeroxideTestDays)
}

package views

import (
	"context"
	"net/http"
	"slices"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// What people do with a bottle every day. Each act is a form on the bottle's
// page with an address of its own; a refusal brings the page back with the
// reason beside the field, and what was typed still there.

// A deed carries out what a form asks for and returns the promises that no
// longer fit, which were cut.
type deed func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error)

// onBottle answers a form of a bottle's page. read reads the fields, adds what
// is wrong with them, and returns the deed with the reason that stands for an
// empty one, "" if somebody has to give it. A refusal is shown at a field.
func (s *Server) onBottle(c *gin.Context, form, field, then string, read func(*bottlePage) (deed, string)) error {
	p, err := s.findBottle(c)
	if err != nil {
		return err
	}
	p.keep(c, form)
	do, why := read(p)
	act := p.act(why)
	if len(p.Faults) > 0 {
		return s.showRefused(c, http.StatusUnprocessableEntity, p)
	}
	cut, err := do(c.Request.Context(), act)
	if err != nil {
		status, err := p.refuse(err, field)
		if err != nil {
			return err
		}
		return s.showRefused(c, status, p)
	}
	return s.goTo(c, bottleAddress(p.Code)+cutQuery(cut)+"#"+then)
}

// showRefused shows the page again. The bottle may have changed so that the form
// isn't on it any more; what is wrong then stands at the head alone.
func (s *Server) showRefused(c *gin.Context, status int, p *bottlePage) error {
	if !p.shows(p.sent.name) {
		for i := range p.Faults {
			p.Faults[i].Field = ""
		}
	}
	return s.render(c, status, "bottle", p)
}

// shows reports whether a form is on the page.
func (p *bottlePage) shows(form string) bool {
	switch form {
	case "draw":
		return p.Drawable()
	case "back":
		return p.LastEntry() != nil
	case "out":
		return p.Weighable() && p.Out == nil
	case "in":
		return p.Weighable() && p.Out != nil
	case "peroxide":
		return p.State != inventory.Discarded && p.Form.PeroxideTestDays > 0
	case "stands":
		return len(p.NextStates()) > 0
	}
	return p.State != inventory.Discarded
}

func bottleAddress(code string) string { return "/shelf/bottles/" + code }

// cutQuery names the runs whose promises were cut, for the page that follows.
func cutQuery(cut []inventory.Promise) string {
	if len(cut) == 0 {
		return ""
	}
	runs := make([]string, len(cut))
	for i, promise := range cut {
		runs[i] = strconv.FormatInt(promise.Run, 10)
	}
	return "?cut=" + strings.Join(runs, "+")
}

// cutRuns reads what cutQuery wrote; runs that aren't there are left out.
func cutRuns(query string, shelf *inventory.Shelf) []inventory.Run {
	var runs []inventory.Run
	for _, text := range strings.Fields(query) {
		id, err := strconv.ParseInt(text, 10, 64)
		if run, ok := shelf.Run(id); err == nil && ok && !slices.ContainsFunc(runs, func(r inventory.Run) bool { return r.ID == id }) {
			runs = append(runs, run)
		}
	}
	return runs
}

// runOptions are the runs that something may be taken for.
func runOptions(shelf *inventory.Shelf) []option {
	options := []option{{Words: "no run"}}
	for _, r := range shelf.Runs {
		if !isOver(r) {
			id := strconv.FormatInt(r.ID, 10)
			options = append(options, option{Value: id, Words: "run " + id + ", " + r.Recipe + ", " + r.On.Short()})
		}
	}
	return options
}

// readRun reads the run that was chosen, 0 for none.
func (p *bottlePage) readRun() int64 {
	text := p.typed("run")
	if text == "" {
		return 0
	}
	if !slices.ContainsFunc(p.Runs, func(o option) bool { return o.Value == text }) {
		p.wrong("run", "Choose a run that isn’t over, or none.")
		return 0
	}
	id, _ := strconv.ParseInt(text, 10, 64)
	return id
}

func forRun(run int64) string {
	if run == 0 {
		return ""
	}
	return "for run " + strconv.FormatInt(run, 10)
}

// drawBottle answers the form that takes something out.
func (s *Server) drawBottle(c *gin.Context) error {
	return s.onBottle(c, "draw", "amount", "h-ledger", func(p *bottlePage) (deed, string) {
		amount := readContent("draw-amount", p.typed("amount"), p.Form, &p.Faults)
		run := p.readRun()
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			_, err := s.Lab.Draw(ctx, inventory.Taking{Bottle: p.Code, Amount: amount, Run: run}, act)
			return nil, err
		}, forRun(run)
	})
}

// takeBack answers the form that takes an entry of the ledger back.
func (s *Server) takeBack(c *gin.Context) error {
	return s.onBottle(c, "back", "why", "h-ledger", func(p *bottlePage) (deed, string) {
		entry, err := strconv.ParseInt(p.typed("entry"), 10, 64)
		if err != nil || !slices.ContainsFunc(p.Ledger, func(r ledgerRow) bool { return r.ID == entry }) {
			p.wrong("why", "The entry to take back isn’t in this bottle’s ledger. Open the page anew.")
		}
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			_, cut, err := s.Lab.Correct(ctx, entry, act)
			return cut, err
		}, ""
	})
}

// LastEntry is the newest line of the ledger, if it may be taken back here: a
// draw or a count that changed something.
func (p *bottlePage) LastEntry() *ledgerRow {
	if len(p.Ledger) == 0 || p.State == inventory.Discarded {
		return nil
	}
	last := &p.Ledger[0]
	kind := inventory.EntryKind(last.Kind)
	if kind != inventory.Drawn && kind != inventory.Counted || last.Amount == 0 {
		return nil
	}
	return last
}

// Drawable reports whether something may be taken out of the bottle.
func (p *bottlePage) Drawable() bool {
	return p.State == inventory.Sealed || p.State == inventory.Opened
}

// Weighable reports whether a difference of masses says how much was taken.
func (p *bottlePage) Weighable() bool {
	return p.Drawable() && (p.Form.Measure == inventory.ByMass || p.Form.Measure == inventory.ByVolume && p.Form.DensityGML > 0)
}

// Tare writes the mass of the empty bottle.
func (p *bottlePage) Tare() string {
	if p.TareUG == 0 {
		return ""
	}
	return massText(inventory.MassUnits(p.TareUG))
}

// weighOut answers the form before a draw by difference.
func (s *Server) weighOut(c *gin.Context) error {
	return s.onBottle(c, "out", "gross", "h-weigh", func(p *bottlePage) (deed, string) {
		gross, run := p.readGross(), p.readRun()
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			return s.Lab.WeighOut(ctx, p.Code, gross, run, act)
		}, "weighed before a draw"
	})
}

// weighIn answers the form after it.
func (s *Server) weighIn(c *gin.Context) error {
	return s.onBottle(c, "in", "gross", "h-ledger", func(p *bottlePage) (deed, string) {
		gross := p.readGross()
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			_, err := s.Lab.WeighIn(ctx, p.Code, gross, act)
			return nil, err
		}, "weighed after a draw"
	})
}

// forgetWeighing answers the form for a weigh-out after which nothing was taken.
func (s *Server) forgetWeighing(c *gin.Context) error {
	return s.onBottle(c, "in", "gross", "h-weigh", func(p *bottlePage) (deed, string) {
		return func(ctx context.Context, act inventory.Act) ([]inventory.Promise, error) {
			return nil, s.Lab.CancelWeighOut(ctx, p.Code, act)
		}, "nothing was taken"
	})
}

func (p *bottlePage) readGross() chem.Mass {
	text := p.typed("gross")
	if text == "" {
		p.wrong("gross", "Say what the balance shows, with its unit, like 412.6 g.")
		return 0
	}
	m, err := chem.ParseMass(text)
	if err != nil {
		p.wrong("gross", sentence(err.Error()))
	}
	return m
}

// OutGross is the mass with which the bottle went out.
func (p *bottlePage) OutGross() chem.Mass { return inventory.MassUnits(p.Out.GrossUG) }

package views

import (
	"crypto/rand"
	"net/http"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// What changes a run: keeping another target or day, moving it along, and
// promising it the bottles of its plan. Each is a form with an address of its
// own, carries the version it was made from and a key that makes a second
// sending harmless, and says who did it.

// Key is a fresh request key for a form.
func (f *frame) Key() string { return rand.Text() }

// actOf reads who acts, and the request key, out of a form. Nobody named is a
// fault.
func actOf(c *gin.Context, why string, wrong *faults) inventory.Act {
	who := strings.TrimSpace(c.PostForm("who"))
	if who == "" {
		wrong.add("who", "Say who does this.")
	}
	return inventory.Act{By: who, Why: why, Key: c.PostForm("key")}
}

// keepRun answers the form that keeps a tried target and day.
func (s *Server) keepRun(c *gin.Context) error {
	shelf, run, recipe, err := s.findRun(c)
	if err != nil {
		return err
	}
	p := s.runPageFor(run, recipe)
	p.tryAsk(c.PostForm("wanted"), c.PostForm("on"), "", s.Today())
	act := actOf(c, "another target or day", &p.Faults)
	if err := s.planRun(c.Request.Context(), p, shelf); err != nil {
		return err
	}
	if len(p.Faults) > 0 {
		return s.answerFaults(c, p)
	}
	version, _ := strconv.ParseInt(c.PostForm("version"), 10, 64)
	if _, err := s.Lab.SetTarget(c.Request.Context(), run.ID, micrograms(p.Ask.target), p.Ask.on, version, act); err != nil {
		return err
	}
	return s.goTo(c, runAddress(run.ID))
}

// moveRun answers the form that moves a run along: cleared, picked, closed,
// dropped or pencilled again.
func (s *Server) moveRun(c *gin.Context) error {
	_, run, recipe, err := s.findRun(c)
	if err != nil {
		return err
	}
	p := s.runPageFor(run, recipe)
	act := actOf(c, "", &p.Faults)
	to := inventory.RunState(c.PostForm("to"))
	if len(p.Faults) > 0 {
		return s.answerFaults(c, p)
	}
	version, _ := strconv.ParseInt(c.PostForm("version"), 10, 64)
	if _, err := s.Lab.SetState(c.Request.Context(), run.ID, to, version, act); err != nil {
		return err
	}
	return s.goTo(c, runAddress(run.ID))
}

// Moves lists where the run may go from where it stands.
func (p *runPage) Moves() []inventory.RunState {
	switch p.Run.State {
	case inventory.Pencilled:
		return []inventory.RunState{inventory.Cleared, inventory.Dropped}
	case inventory.Cleared:
		return []inventory.RunState{inventory.Picked, inventory.Pencilled, inventory.Dropped}
	case inventory.Picked:
		return []inventory.RunState{inventory.Closed, inventory.Cleared, inventory.Dropped}
	case inventory.Dropped:
		return []inventory.RunState{inventory.Pencilled}
	}
	return nil
}

// promisePage shows what a run would be promised before it is.
type promisePage struct {
	frame
	Run     inventory.Run
	Product string
	Lines   []promiseLine
	Held    int // earmarks the run has now
	Who     string
}

type promiseLine struct {
	Code, Form, Amount string
	want               inventory.Want
}

// showPromise answers /runs/:id/promise.
func (s *Server) showPromise(c *gin.Context) error {
	p, err := s.promisePage(c)
	if err != nil {
		return err
	}
	return s.render(c, http.StatusOK, "promise", p)
}

func (s *Server) promisePage(c *gin.Context) (*promisePage, error) {
	shelf, run, recipe, err := s.findRun(c)
	if err != nil {
		return nil, err
	}
	if isOver(run) {
		return nil, noPlan(run)
	}
	plan, err := s.planKept(c.Request.Context(), run, recipe, shelf)
	if err != nil {
		return nil, err
	}
	p := &promisePage{Run: run, Product: recipe.Product, Who: run.Owner, Lines: promiseLines(plan.Needs)}
	p.Title, p.Section = "Promise the bottles of run "+strconv.FormatInt(run.ID, 10), "/slate"
	for _, e := range shelf.Earmarks {
		if e.RunID == run.ID {
			p.Held++
		}
	}
	return p, nil
}

// promiseLines sums the draws of a plan by bottle, in the order of the plan.
// Amounts are rounded up to whole ledger units, so that no draw is promised
// less than it takes.
func promiseLines(needs []planner.Need) []promiseLine {
	var lines []promiseLine
	at := map[string]int{}
	for _, n := range needs {
		for _, d := range n.Draws {
			amount := ledgerAmount(d)
			if amount <= 0 {
				continue
			}
			i, ok := at[d.Bottle.Code]
			if !ok {
				i = len(lines)
				at[d.Bottle.Code] = i
				lines = append(lines, promiseLine{Code: d.Bottle.Code, Form: d.Form.Name, want: inventory.Want{Bottle: d.Bottle.Code}})
			}
			lines[i].want.Amount += amount
			lines[i].Amount = stored(lines[i].want.Amount, d.Form.Measure)
		}
	}
	return lines
}

// ledgerAmount is a draw in the unit of its bottle's ledger.
func ledgerAmount(d planner.Draw) int64 {
	switch d.Form.Measure {
	case inventory.ByVolume:
		if !d.HasVolume {
			return 0
		}
		return ceil(float64(d.Volume / chem.Microlitre))
	case inventory.ByMass:
		return ceil(float64(d.Mass / chem.Microgram))
	}
	return ceil(d.Pieces)
}

// ceil rounds up; what exceeds a whole number by less than a millionth of a
// unit is the noise of floating point.
func ceil(x float64) int64 {
	n := int64(x)
	if x-float64(n) > 1e-6 {
		n++
	}
	return n
}

// promise answers the form of /runs/:id/promise.
func (s *Server) promise(c *gin.Context) error {
	p, err := s.promisePage(c)
	if err != nil {
		return err
	}
	act := actOf(c, "plan of the run", &p.Faults)
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "promise", p)
	}
	wants := make([]inventory.Want, len(p.Lines))
	for i, l := range p.Lines {
		wants[i] = l.want
	}
	if _, err := s.Lab.EarmarkRun(c.Request.Context(), p.Run.ID, wants, act); err != nil {
		if wrong, ok := refusalFault(err); ok {
			p.Who = act.By
			p.Faults = append(p.Faults, wrong)
			return s.render(c, refusalStatus(err), "promise", p)
		}
		return err
	}
	return s.goTo(c, runAddress(p.Run.ID))
}

// release answers the form that frees what a run was promised.
func (s *Server) release(c *gin.Context) error {
	p, err := s.promisePage(c)
	if err != nil {
		return err
	}
	act := actOf(c, "freed by hand", &p.Faults)
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "promise", p)
	}
	if err := s.Lab.Release(c.Request.Context(), p.Run.ID, act); err != nil {
		return err
	}
	return s.goTo(c, runAddress(p.Run.ID))
}

func runAddress(id int64) string { return "/runs/" + strconv.FormatInt(id, 10) }

// micrograms writes a target in ledger units, to the nearest.
func micrograms(m chem.Mass) int64 { return int64(m/chem.Microgram + 0.5) }

package views

import (
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// answersPage is what would do about a run that something stops: the ladder,
// cheapest rung first, and the outlook. htmx takes its block "answers" into the
// page of shortfalls.
type answersPage struct {
	frame
	Run      inventory.Run
	Wanted   string
	Product  string
	Rungs    []rungRow
	Covered  bool // on its day
	Earliest string
	Buying   string
	Largest  string
	Limits   string
}

// rungRow is a rung of the ladder as people read it.
type rungRow struct {
	planner.Rung
	Day, Wanted, CostText, LeftText, EnoughText string
}

// showAnswers answers /runs/:id/answers.
func (s *Server) showAnswers(c *gin.Context) error {
	shelf, run, recipe, err := s.findRun(c)
	if err != nil {
		return err
	}
	if isOver(run) {
		return noPlan(run)
	}
	req := planner.Request{Recipe: recipe, Target: chem.Mass(run.TargetUG) * chem.Microgram, On: run.On,
		Today: s.Today(), Run: run.ID, Store: run.StoreID}
	runs, _, err := s.slateRuns(c.Request.Context(), shelf)
	if err != nil {
		return err
	}
	slate := s.slateFor(s.memory.stateOf(shelf, runs, req.Today), runs, shelf)
	rungs, err := planner.LadderAmong(req, slate, shelf)
	if err != nil {
		return err
	}
	outlook, err := planner.OutlookAmong(req, slate, shelf)
	if err != nil {
		return err
	}
	p := &answersPage{Run: run, Wanted: wantedText(run), Product: recipe.Product, Rungs: each(rungs, newRungRow),
		Earliest: outlook.Earliest.Long(), Buying: outlook.EarliestBuying.Long(), Limits: outlook.Limits}
	p.Covered = outlook.Earliest.Set() && outlook.Earliest <= run.On
	if outlook.Largest > 0 {
		p.Largest = massText(outlook.Largest)
	}
	p.Title, p.Section = "What would do for "+p.Wanted+" "+p.Product, "/shortfalls"
	return s.render(c, http.StatusOK, "answers", p)
}

func newRungRow(r planner.Rung) rungRow {
	row := rungRow{Rung: r, Day: r.On.Short(), Wanted: massPlain(r.Target), EnoughText: chanceText(r.Enough)}
	if r.Cost > 0 {
		row.CostText = moneyText(r.Cost, r.Currency)
	}
	if r.Left > 0 {
		row.LeftText = massText(r.Left)
	}
	return row
}

package views

import (
	"cmp"
	"net/http"
	"slices"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// slatePage is the runs to come, in the order of their dates.
type slatePage struct {
	frame
	Today inventory.Date
	Rows  []slateRow
}

// slateRow is a run on the slate with what its plan says.
type slateRow struct {
	inventory.Run
	Wanted  string
	Title   string // of the recipe
	Product string
	Word    string // verdict, or why there is none
	Planned bool
	Chance  string
	Lacks   []string // what stops it, the worst first
}

// showSlate answers /slate.
func (s *Server) showSlate(c *gin.Context) error {
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return err
	}
	p := &slatePage{Today: s.Today()}
	p.Title, p.Section = "Slate", "/slate"
	for _, run := range runsToCome(shelf.Runs) {
		p.Rows = append(p.Rows, s.slateRow(run, shelf))
	}
	return s.render(c, http.StatusOK, "slate", p)
}

// runsToCome leaves out what is closed or dropped and sorts by date, then by
// identity.
func runsToCome(runs []inventory.Run) []inventory.Run {
	var open []inventory.Run
	for _, r := range runs {
		if r.State != inventory.Closed && r.State != inventory.Dropped {
			open = append(open, r)
		}
	}
	slices.SortFunc(open, func(a, b inventory.Run) int {
		return cmp.Or(cmp.Compare(a.On, b.On), cmp.Compare(a.ID, b.ID))
	})
	return open
}

// slateRow plans a run. What can't be planned stays on the slate and says why.
func (s *Server) slateRow(run inventory.Run, shelf *inventory.Shelf) slateRow {
	row := slateRow{Run: run, Wanted: massPlain(chem.Mass(run.TargetUG) * chem.Microgram), Title: run.Recipe}
	plan, err := s.planKept(run, shelf)
	if err != nil {
		row.Word = sentence(err.Error())
		return row
	}
	row.Planned, row.Word = true, plan.Verdict.String()
	row.Title, row.Product = plan.Recipe.Title, plan.Recipe.Product
	row.Chance = chanceText(plan.Risk.RunEnough)
	row.Lacks = lacks(plan.Needs)
	return row
}

// planKept plans a run as it stands on the slate.
func (s *Server) planKept(run inventory.Run, shelf *inventory.Shelf) (*planner.Plan, error) {
	recipe, err := s.recipeOf(run)
	if err != nil {
		return nil, err
	}
	return s.Plan(planner.Request{
		Recipe: recipe, Target: chem.Mass(run.TargetUG) * chem.Microgram,
		On: run.On, Today: s.Today(), Run: run.ID,
	}, shelf)
}

// lacks lists the needs that stop a run, the worst first.
func lacks(needs []planner.Need) []string {
	worst := slices.Clone(needs)
	slices.SortStableFunc(worst, func(a, b planner.Need) int { return cmp.Compare(b.State, a.State) })
	var words []string
	for _, n := range worst {
		if n.State <= planner.Tight {
			break
		}
		words = append(words, n.Substance+" "+n.State.String())
	}
	return words
}

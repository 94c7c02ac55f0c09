package views

import (
	"cmp"
	"context"
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
	_, lines, err := s.slate(c)
	if err != nil {
		return err
	}
	p := &slatePage{Today: s.Today()}
	p.Title, p.Section = "Slate", "/slate"
	for _, l := range lines {
		p.Rows = append(p.Rows, newSlateRow(l))
	}
	return s.render(c, http.StatusOK, "slate", p)
}

// slate plans the runs to come in the order of their dates, each against what
// the earlier ones leave it. A run whose recipe can't be read is among them with
// the reason.
func (s *Server) slate(c *gin.Context) (*inventory.Shelf, []planner.SlateLine, error) {
	shelf, err := s.shelfFor(c.Request.Context(), nil)
	if err != nil {
		return nil, nil, err
	}
	runs, unread, err := s.slateRuns(c.Request.Context(), shelf)
	if err != nil {
		return nil, nil, err
	}
	lines := slices.Clone(s.slateFor(s.memory.stateOf(shelf, runs, s.Today()), runs, shelf).Lines)
	for i := range lines {
		if err := unread[lines[i].Run.ID]; err != nil {
			lines[i].Err = err
		}
	}
	return shelf, lines, nil
}

// slateRuns gives every run its recipe, and the reasons of those that have none.
func (s *Server) slateRuns(ctx context.Context, shelf *inventory.Shelf) ([]planner.SlateRun, map[int64]error, error) {
	recipes, unreadable, err := s.readRecipes(ctx)
	if err != nil {
		return nil, nil, err
	}
	runs := make([]planner.SlateRun, len(shelf.Runs))
	unread := map[int64]error{}
	for i, run := range shelf.Runs {
		recipe, err := s.recipeAs(run, func() (*planner.Recipe, error) { return named(recipes, unreadable, run.Recipe) })
		if err != nil {
			unread[run.ID] = err
		}
		runs[i] = planner.SlateRun{Run: run, Recipe: recipe}
	}
	return runs, unread, nil
}

// newSlateRow says what a plan found. What can't be planned stays on the slate
// and says why.
func newSlateRow(l planner.SlateLine) slateRow {
	row := slateRow{Run: l.Run, Wanted: wantedText(l.Run), Title: l.Run.Recipe}
	if l.Err != nil {
		row.Word = sentence(l.Err.Error())
		return row
	}
	row.Planned, row.Word = true, l.Plan.Verdict.String()
	row.Title, row.Product = l.Plan.Recipe.Title, l.Plan.Recipe.Product
	row.Chance = chanceText(l.Plan.Risk.RunEnough)
	row.Lacks = lacks(l.Plan.Needs)
	return row
}

// wantedText is the target of a run as it stands on the slate.
func wantedText(r inventory.Run) string { return massPlain(chem.Mass(r.TargetUG) * chem.Microgram) }

// planKept plans a run as it stands on the slate.
func (s *Server) planKept(ctx context.Context, run inventory.Run, recipe *planner.Recipe, shelf *inventory.Shelf) (*planner.Plan, error) {
	return s.plan(ctx, planner.Request{
		Recipe: recipe, Target: chem.Mass(run.TargetUG) * chem.Microgram,
		On: run.On, Today: s.Today(), Run: run.ID, Store: run.StoreID,
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

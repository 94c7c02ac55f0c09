package views

import (
	"context"
	"html/template"
	"net/http"
	"net/url"
	"slices"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// runPage is a run: what was asked, whether the shelf can give it, and
// everything that follows from the walk-through.
type runPage struct {
	frame
	Run    inventory.Run
	Recipe *planner.Recipe
	Ask    askForm
	// Kept says that what is shown is what is on the slate; otherwise it only
	// tries a change.
	Kept bool
	// Plan is nil where what was asked can't be read.
	Plan     *planner.Plan
	Warnings []planner.Finding
	Notes    []planner.Finding
	Lead     string // first part of the verdict, which says how likely
	Rest     string
	Needs    []needRow
	Steps    []stepRow
	Contents []contentRow
	Flow     template.HTML
	Budget   *budgetView // nil where there is none
	Newer    string      // version of the recipe that is the latest, if the run goes by another
	Risk     []string
	Hazards  []hazardRow // as stored, and what is formed
	Noted    int         // hazards noted altogether
	Pairs    pairGroups
	Waste    []wasteRow
	Paper    *paperCheck // set when the address came from a printed sheet

	carboys []inventory.Carboy
	drawn   bool // the chances come from draws of the whole walk-through
}

// Query carries what is asked to the addresses of papers and explanations. It
// is empty where the run is shown as it is kept.
func (p *runPage) Query() template.URL {
	if p.Kept {
		return ""
	}
	return template.URL("?" + p.Ask.query())
}

// PaperQuery is Query with the paper size of North America.
func (p *runPage) PaperQuery() template.URL {
	if p.Kept {
		return "?paper=letter"
	}
	return template.URL("?" + p.Ask.query() + "&paper=letter")
}

// Word is the verdict as a need state.
func (p *runPage) Word() string { return p.Plan.Verdict.String() }

// Covered says that nothing is short, late or unfit.
func (p *runPage) Covered() bool { return p.Plan != nil && p.Plan.Verdict <= planner.Tight }

// showRun answers /runs/:id. With a query it shows the run as if that were
// wanted and changes nothing.
func (s *Server) showRun(c *gin.Context) error {
	p, err := s.askedRun(c)
	if err != nil {
		return err
	}
	p.dress(c.Query("printed"))
	if p.Newer, err = s.newerVersion(c.Request.Context(), p.Recipe); err != nil {
		return err
	}
	return s.render(c, p.status(), "run", p)
}

// askedRun plans the run an address names, as it is kept or as the query asks.
// The page has faults where that can't be read or planned.
func (s *Server) askedRun(c *gin.Context) (*runPage, error) {
	shelf, run, recipe, err := s.findRun(c)
	if err != nil {
		return nil, err
	}
	p := s.runPageFor(run, recipe)
	p.readQuery(c.Request.URL.Query(), s.Today())
	if p.Over() && p.Kept {
		return p, nil
	}
	return p, s.planRun(c.Request.Context(), p, shelf)
}

// plannedRun is askedRun for what needs a plan: a run that is over has none.
func (s *Server) plannedRun(c *gin.Context) (*runPage, error) {
	p, err := s.askedRun(c)
	if err == nil && p.Plan == nil && len(p.Faults) == 0 {
		err = noPlan(p.Run)
	}
	return p, err
}

// Over says that the run is closed or dropped.
func (p *runPage) Over() bool { return isOver(p.Run) }

func isOver(r inventory.Run) bool {
	return r.State == inventory.Closed || r.State == inventory.Dropped
}

func noPlan(r inventory.Run) error {
	return &missing{"plan", "run " + strconv.FormatInt(r.ID, 10), "The run is " + string(r.State) + ", and what is over isn’t planned again."}
}

// readQuery tries what the query of an address asks, if it asks anything.
func (p *runPage) readQuery(typed url.Values, today inventory.Date) {
	off := offKeys(typed["off"])
	if typed.Has("wanted") || typed.Has("on") || typed.Has("certainty") || len(off) > 0 {
		p.tryAsk(typed.Get("wanted"), typed.Get("on"), typed.Get("certainty"), today)
		p.Ask.Off = off
		p.Kept = p.Kept && len(off) == 0
	}
}

// offKeys sorts the keys of what is left out, each once.
func offKeys(typed []string) []string {
	off := slices.DeleteFunc(slices.Clone(typed), func(k string) bool { return k == "" })
	slices.Sort(off)
	return slices.Compact(off)
}

// With gives the address of the run with one more hidden need left out.
func (p *runPage) With(key string) string { return p.offAddress(append(slices.Clone(p.Ask.Off), key)) }

// Without gives the address of the run with a hidden need put back.
func (p *runPage) Without(key string) string {
	return p.offAddress(slices.DeleteFunc(slices.Clone(p.Ask.Off), func(k string) bool { return k == key }))
}

func (p *runPage) offAddress(off []string) string {
	ask := p.Ask
	ask.Off = off
	return runAddress(p.Run.ID) + "?" + ask.query()
}

// answerFaults shows a page with what was typed and what is wrong with it.
func (s *Server) answerFaults(c *gin.Context, p *runPage) error {
	return s.render(c, http.StatusUnprocessableEntity, "run", p)
}

func (p *runPage) status() int {
	if len(p.Faults) > 0 {
		return http.StatusUnprocessableEntity
	}
	return http.StatusOK
}

// runPageFor makes the page of a run as it is kept.
func (s *Server) runPageFor(run inventory.Run, recipe *planner.Recipe) *runPage {
	target := chem.Mass(run.TargetUG) * chem.Microgram
	p := &runPage{Run: run, Recipe: recipe, Kept: true}
	p.Section = "/slate"
	p.Ask = askForm{Wanted: plainSpaces(massPlain(target)), On: run.On.Short(), target: target, on: run.On}
	p.Title = massPlain(target) + " " + recipe.Product + ", run " + strconv.FormatInt(run.ID, 10)
	return p
}

// tryAsk puts what was typed in place of what is kept.
func (p *runPage) tryAsk(wanted, on, certainty string, today inventory.Date) {
	kept := p.Ask
	if wanted == "" {
		wanted = kept.Wanted
	}
	if on == "" {
		on = kept.On
	}
	p.Ask, p.Faults = readAsk(wanted, on, certainty, today)
	p.Kept = p.Ask.target == kept.target && p.Ask.on == kept.on && p.Ask.certainty == 0
	if len(p.Faults) == 0 {
		p.Title = massPlain(p.Ask.target) + " " + p.Recipe.Product + ", run " + strconv.FormatInt(p.Run.ID, 10)
	}
}

// planRun makes the plan of what the page asks, unless that has faults. What the
// planner refuses becomes a fault of the field it is about.
func (s *Server) planRun(ctx context.Context, p *runPage, shelf *inventory.Shelf) error {
	if len(p.Faults) > 0 {
		return nil
	}
	plan, err := s.plan(ctx, planner.Request{
		Recipe: p.Recipe, Target: p.Ask.target, On: p.Ask.on, Today: s.Today(),
		Run: p.Run.ID, Store: p.Run.StoreID, Certainty: p.Ask.certainty, Drawn: p.drawn, Off: p.Ask.Off,
	}, shelf)
	if err != nil {
		return p.refused(err)
	}
	p.Plan, p.carboys = plan, shelf.Carboys
	return nil
}

// dress works out what the page shows of the plan. Printed is the revision of a
// sheet that somebody wants to know of whether it still holds.
func (p *runPage) dress(printed string) {
	plan := p.Plan
	if plan == nil {
		return
	}
	p.Lead, p.Rest = leadOf(bound(plan.Sentence))
	p.Needs = p.needRows()
	p.Steps = stepRows(plan.Steps, func(about string, n int) string {
		part := "/steps/"
		if about == "explain" {
			part = "/explain/step-"
		}
		return runAddress(p.Run.ID) + part + strconv.Itoa(n) + string(p.Query())
	})
	for _, f := range plan.Findings {
		if f.Severity == planner.Note {
			p.Notes = append(p.Notes, f)
		} else {
			p.Warnings = append(p.Warnings, f)
		}
	}
	p.Contents = contentRows(plan.Steps)
	p.Flow = drawFlow(plan.Flow)
	p.Budget = budgetOf(plan.Budget)
	p.Risk = riskWords(plan.Risk)
	p.Hazards, p.Noted, p.Pairs = hazardRows(plan.Hazards), len(plan.Hazards), groupPairs(plan)
	p.Waste = wasteRows(plan.Waste, p.carboys)
	p.Paper = checkPaper(printed, plan)
}

// refused makes a fault out of what the planner says can't be planned, or hands
// an unexpected error on.
func (p *runPage) refused(err error) error {
	wrong, ok := askFault(err)
	if !ok {
		return err
	}
	p.Faults = append(p.Faults, wrong)
	return nil
}

// findRun reads the run and the recipe it was planned with.
func (s *Server) findRun(c *gin.Context) (*inventory.Shelf, inventory.Run, *planner.Recipe, error) {
	shelf, err := s.Lab.LoadFor(c.Request.Context(), nil)
	if err != nil {
		return nil, inventory.Run{}, nil, err
	}
	id, err := strconv.ParseInt(c.Param("id"), 10, 64)
	run, ok := shelf.Run(id)
	if err != nil || !ok {
		return nil, run, nil, &missing{"run", c.Param("id"), "The runs to come are on the slate."}
	}
	recipe, err := s.recipeOf(c.Request.Context(), run)
	if err != nil {
		return nil, run, nil, err
	}
	shelf, err = s.shelfFor(c.Request.Context(), recipe)
	return shelf, run, recipe, err
}

// recipeOf returns the recipe a run was planned with: the text kept with the
// run, so that a later version of the recipe changes nothing in it. A run
// without a text goes by the recipe of its name.
func (s *Server) recipeOf(ctx context.Context, run inventory.Run) (*planner.Recipe, error) {
	return s.recipeAs(run, func() (*planner.Recipe, error) { return s.recipeNamed(ctx, run.Recipe) })
}

// recipeAs is the recipe by the text kept with the run, or else by its name.
func (s *Server) recipeAs(run inventory.Run, byName func() (*planner.Recipe, error)) (*planner.Recipe, error) {
	if run.RecipeText != "" {
		return s.book.recipe(run.Recipe, run.RecipeText)
	}
	return byName()
}

// leadOf cuts the verdict after what it says first, at a semicolon or a full
// stop; the rest is why, and what would change it.
func leadOf(text string) (lead, rest string) {
	for i := range len(text) - 1 {
		if (text[i] == ';' || text[i] == '.') && text[i+1] == ' ' {
			return text[:i+1], text[i+2:]
		}
	}
	return text, ""
}

// plainSpaces puts an ordinary space for the narrow one, for text in a field
// that somebody is going to change.
func plainSpaces(s string) string { return strings.ReplaceAll(s, narrow, " ") }

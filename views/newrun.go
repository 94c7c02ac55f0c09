package views

import (
	"context"
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
)

// newRunPage is the form for a run that isn't on the slate yet.
type newRunPage struct {
	frame
	Recipes []*planner.Recipe
	Chosen  string
	Who     string
	Ask     askForm
}

// newRun answers /runs/new.
func (s *Server) newRun(c *gin.Context) error {
	p, err := s.newRunForm(c)
	if err != nil {
		return err
	}
	p.Chosen = c.Query("recipe")
	p.Ask.Wanted, p.Ask.On = c.Query("wanted"), c.DefaultQuery("on", s.Today().AddDays(14).Short())
	return s.render(c, http.StatusOK, "newrun", p)
}

func (s *Server) newRunForm(c *gin.Context) (*newRunPage, error) {
	recipes, err := s.recipes(c.Request.Context())
	p := &newRunPage{Recipes: recipes}
	p.Title, p.Section = "Pencil in a run", "/slate"
	return p, err
}

// addRun answers the form. The run is planned before it is written down, so
// that nothing comes on the slate that can't be planned at all.
func (s *Server) addRun(c *gin.Context) error {
	p, err := s.newRunForm(c)
	if err != nil {
		return err
	}
	p.Chosen, p.Who = c.PostForm("recipe"), c.PostForm("who")
	p.Ask, p.Faults = readAsk(c.PostForm("wanted"), c.PostForm("on"), "", s.Today())
	act := actOf(c, "pencilled in", &p.Faults)
	recipe, err := s.recipeNamed(c.Request.Context(), p.Chosen)
	if err != nil {
		p.Faults = append(faults{{"recipe", "Choose one of the recipes."}}, p.Faults...)
	}
	if len(p.Faults) == 0 {
		if err := s.tryPlan(c.Request.Context(), recipe, p.Ask); err != nil {
			wrong, ok := askFault(err)
			if !ok {
				return err
			}
			p.Faults = append(p.Faults, wrong)
		}
	}
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "newrun", p)
	}
	run, err := s.Lab.AddRun(c.Request.Context(), inventory.Run{
		Recipe: recipe.Name, RecipeText: recipe.Text, TargetUG: micrograms(p.Ask.target), On: p.Ask.on, Owner: act.By,
	}, act)
	if err != nil {
		return err
	}
	return s.goTo(c, runAddress(run.ID))
}

func (s *Server) tryPlan(ctx context.Context, recipe *planner.Recipe, ask askForm) error {
	shelf, err := s.shelfFor(ctx, recipe)
	if err != nil {
		return err
	}
	_, err = s.plan(ctx, planner.Request{Recipe: recipe, Target: ask.target, On: ask.on, Today: s.Today()}, shelf)
	return err
}

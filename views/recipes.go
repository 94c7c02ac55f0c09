package views

import (
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
)

// recipesPage lists the written procedures.
type recipesPage struct {
	frame
	Recipes []recipeRow
	Unread  []string // names of those whose saved text can't be read
}

// recipeRow is a recipe in the list with the runs of it.
type recipeRow struct {
	*planner.Recipe
	runCount
}

// runCount is how many runs of a recipe there are.
type runCount struct{ Closed, Ahead int }

// recipePage is one written procedure, walked through at its proven scale.
type recipePage struct {
	frame
	Recipe   *planner.Recipe
	Check    *recipeCheck
	Steps    []stepRow
	Runs     runCount
	Shown    recipeVersion
	Versions []recipeVersion
}

// showRecipes answers /recipes.
func (s *Server) showRecipes(c *gin.Context) error {
	recipes, unread, err := s.readRecipes(c.Request.Context())
	if err != nil {
		return err
	}
	shelf, err := s.Lab.LoadFor(c.Request.Context(), nil)
	if err != nil {
		return err
	}
	p := &recipesPage{Unread: unread}
	for _, r := range recipes {
		p.Recipes = append(p.Recipes, recipeRow{r, runsOf(r.Name, shelf)})
	}
	p.Title, p.Section = "Recipes", "/recipes"
	return s.render(c, http.StatusOK, "recipes", p)
}

// runsOf counts the runs of a recipe that are closed and those to come.
func runsOf(name string, shelf *inventory.Shelf) runCount {
	var n runCount
	for _, run := range shelf.Runs {
		switch {
		case run.Recipe != name || run.State == inventory.Dropped:
		case run.State == inventory.Closed:
			n.Closed++
		default:
			n.Ahead++
		}
	}
	return n
}

// showRecipe answers /recipes/:name, with saved=… an earlier version of it. A
// text that can't be read is shown in the editor, beside what is wrong with it.
func (s *Server) showRecipe(c *gin.Context) error {
	versions, err := s.versions(c.Request.Context(), c.Param("name"))
	if err != nil {
		return err
	}
	shown, ok := versions.asked(c.Query("saved"))
	if !ok {
		return &missing{"version", c.Query("saved"), "The versions stand on the page of the recipe."}
	}
	if shown.recipe == nil {
		return s.goTo(c, "/recipes/"+versions.name+"/edit?saved="+shown.Address())
	}
	shelf, err := s.Lab.LoadFor(c.Request.Context(), nil)
	if err != nil {
		return err
	}
	p := &recipePage{Recipe: shown.recipe, Shown: shown, Versions: versions.all, Runs: runsOf(versions.name, shelf)}
	p.Title, p.Section = shown.recipe.Title, "/recipes"
	p.Check = checkRecipe(fileOf(versions.name), shown.text, shelf)
	if p.Check.Walk != nil {
		p.Steps = stepRows(p.Check.Walk.Steps, nowhere)
	}
	return s.render(c, http.StatusOK, "recipe", p)
}

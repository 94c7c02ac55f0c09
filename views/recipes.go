package views

import (
	"net/http"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// recipesPage lists the written procedures.
type recipesPage struct {
	frame
	Recipes []*planner.Recipe
}

// recipePage is one written procedure, walked through at its proven scale.
type recipePage struct {
	frame
	Recipe *planner.Recipe
	Lines  []string // of its text
	Scale  chem.Amount
	Proven bool // the scale is the largest proven one
	Walk   *planner.Walk
	Fault  string // why it can't be walked through
	Steps  []stepRow
	Vague  []planner.RecipeFault
}

// showRecipes answers /recipes.
func (s *Server) showRecipes(c *gin.Context) error {
	recipes, err := s.recipes(c.Request.Context())
	if err != nil {
		return err
	}
	p := &recipesPage{Recipes: recipes}
	p.Title, p.Section = "Recipes", "/recipes"
	return s.render(c, http.StatusOK, "recipes", p)
}

// showRecipe answers /recipes/:name.
func (s *Server) showRecipe(c *gin.Context) error {
	recipe, err := s.recipeNamed(c.Request.Context(), c.Param("name"))
	if err != nil {
		return err
	}
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return err
	}
	p := &recipePage{Recipe: recipe, Lines: strings.Split(strings.TrimRight(recipe.Text, "\n"), "\n")}
	p.Title, p.Section = recipe.Title, "/recipes"
	p.walk(shelf)
	p.Vague = planner.Lint(recipe.Name, recipe.Text)
	return s.render(c, http.StatusOK, "recipe", p)
}

// walk takes the recipe through once, at its proven scale or else at one mole,
// with the stock the recipe asks for and the ware of the lab. A recipe that
// can't be walked through is still shown, with the reason.
func (p *recipePage) walk(shelf *inventory.Shelf) {
	p.Scale, p.Proven = 1*chem.Mole, false
	if p.Recipe.ProvenScale > 0 {
		p.Scale, p.Proven = p.Recipe.ProvenScale, true
	}
	program, err := planner.Compile(p.Recipe)
	if err != nil {
		p.Fault = sentence(err.Error())
		return
	}
	walk, err := program.Walk(planner.Conditions{Limiting: p.Scale, Equipment: shelf.Equipment, Policy: shelf.Policy})
	if err != nil {
		p.Fault = sentence(err.Error())
		return
	}
	p.Walk = walk
	p.Steps = stepRows(walk.Steps, nowhere)
}

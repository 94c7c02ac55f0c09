package views

import (
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/planner"
)

// recipesPage lists the written procedures.
type recipesPage struct {
	frame
	Recipes []*planner.Recipe
}

// recipePage is one written procedure.
type recipePage struct {
	frame
	Recipe *planner.Recipe
}

// showRecipes answers /recipes.
func (s *Server) showRecipes(c *gin.Context) error {
	p := &recipesPage{Recipes: s.Recipes}
	p.Title, p.Section = "Recipes", "/recipes"
	return s.render(c, http.StatusOK, "recipes", p)
}

// showRecipe answers /recipes/:name.
func (s *Server) showRecipe(c *gin.Context) error {
	recipe, ok := s.recipeNamed(c.Param("name"))
	if !ok {
		return &missing{"recipe", c.Param("name"), "All recipes are listed on their own page."}
	}
	p := &recipePage{Recipe: recipe}
	p.Title, p.Section = recipe.Title, "/recipes"
	return s.render(c, http.StatusOK, "recipe", p)
}

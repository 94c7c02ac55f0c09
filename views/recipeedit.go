package views

import (
	"errors"
	"net/http"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/planner"
)

// editPage is a recipe's text to be changed, with what a check of it finds
// beside it. htmx takes its block "checked" while somebody types.
type editPage struct {
	frame
	Name    string // of the recipe it started from
	Text    string
	Who     string
	Checked *recipePage           // nil where the text can't be read
	Wrong   []planner.RecipeFault // why it can't
	Vague   []planner.RecipeFault
}

// mostRecipeBytes bounds the text of a recipe.
const mostRecipeBytes = 256 << 10

// showEdit answers /recipes/:name/edit.
func (s *Server) showEdit(c *gin.Context) error {
	recipe, err := s.recipeNamed(c.Request.Context(), c.Param("name"))
	if err != nil {
		return err
	}
	p := newEditPage(recipe.Name, recipe.Text)
	if err := s.check(c, p); err != nil {
		return err
	}
	return s.render(c, http.StatusOK, "edit", p)
}

func newEditPage(name, text string) *editPage {
	p := &editPage{Name: name, Text: text}
	p.Title, p.Section = "Change "+name, "/recipes"
	return p
}

// saveEdit answers the form: it checks the text, and saves it if that is what
// was asked and nothing is wrong. The text keeps the name it gives itself, so
// that changing the name makes another recipe.
func (s *Server) saveEdit(c *gin.Context) error {
	c.Request.Body = http.MaxBytesReader(c.Writer, c.Request.Body, 4*mostRecipeBytes)
	p := newEditPage(c.Param("name"), strings.ReplaceAll(c.PostForm("text"), "\r\n", "\n"))
	if len(p.Text) > mostRecipeBytes {
		p.Faults.add("text", "The text is longer than a recipe may be.")
		return s.render(c, http.StatusUnprocessableEntity, "edit", p)
	}
	if err := s.check(c, p); err != nil {
		return err
	}
	if c.PostForm("do") != "save" {
		return s.render(c, http.StatusOK, "edit", p)
	}
	act := actOf(c, "recipe changed", &p.Faults)
	p.Who = act.By
	switch {
	case p.Checked == nil:
		p.Faults.add("text", "The text can’t be read yet; what is wrong stands beside it.")
	case p.Checked.Fault != "":
		p.Faults.add("text", "The recipe can’t be walked through: "+p.Checked.Fault)
	}
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "edit", p)
	}
	name := p.Checked.Recipe.Name
	if err := s.Lab.SaveRecipe(c.Request.Context(), name, p.Text, act); err != nil {
		return err
	}
	return s.goTo(c, "/recipes/"+name)
}

// check reads the text, walks it through, and looks for vague words.
func (s *Server) check(c *gin.Context, p *editPage) error {
	recipe, err := planner.ParseRecipe(p.Name, []byte(p.Text))
	var wrong *planner.RecipeErrors
	switch {
	case errors.As(err, &wrong):
		p.Wrong = wrong.Faults
		return nil
	case err != nil:
		return err
	}
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return err
	}
	p.Checked = &recipePage{Recipe: recipe}
	p.Checked.walk(shelf)
	p.Vague = planner.Lint(p.Name, p.Text)
	return nil
}

package views

import (
	"context"
	"errors"
	"net/http"
	"regexp"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
)

// editPage is the text of a recipe to be changed, with what a check of it finds
// beside it. htmx takes its block "checked" while somebody types.
type editPage struct {
	frame
	Name     string // of the recipe that is changed; "" for a new one
	Text     string
	From     int64 // the saved version the text was written from, 0 for none
	Who, Why string
	Check    *recipeCheck
	Stale    bool              // somebody saved another version meanwhile
	Begin    []*planner.Recipe // what a new recipe may begin from
	Kinds    []string          // of steps
}

// Action is the address the form goes to.
func (p *editPage) Action() string {
	if p.Name == "" {
		return "/recipes/new"
	}
	return "/recipes/" + p.Name + "/edit"
}

func newEditPage(name, text string) *editPage {
	p := &editPage{Name: name, Text: text}
	p.Section, p.Title = "/recipes", "Change "+name
	if name == "" {
		p.Title = "Write a recipe"
	}
	return p
}

// showEdit answers /recipes/:name/edit: the latest text with the next version
// number, or, with saved=…, an earlier one to go back to.
func (s *Server) showEdit(c *gin.Context) error {
	versions, err := s.versions(c.Request.Context(), c.Param("name"))
	if err != nil {
		return err
	}
	shown, ok := versions.asked(c.Query("saved"))
	if !ok {
		return &missing{"version", c.Query("saved"), "The versions stand on the page of the recipe."}
	}
	p := newEditPage(versions.name, versions.bumped(shown.text))
	p.From = versions.all[0].ID
	return s.showChecked(c, http.StatusOK, p)
}

// showNew answers /recipes/new: an outline to be filled in, or, with from=…, the
// text of another recipe under a new name.
func (s *Server) showNew(c *gin.Context) error {
	text := outline
	if from := c.Query("from"); from != "" {
		recipe, err := s.recipeNamed(c.Request.Context(), from)
		if err != nil {
			return err
		}
		text = copied(recipe)
	}
	return s.showChecked(c, http.StatusOK, newEditPage("", text))
}

// copied is the text of a recipe as another one, which is proven at no scale.
func copied(r *planner.Recipe) string {
	text := nameLine.ReplaceAllString(r.Text, "recipe: "+r.Name+"-2")
	text = versionLine.ReplaceAllString(text, `version: "1"`)
	return provenLine.ReplaceAllString(text, "")
}

// saveNew answers the form of /recipes/new, saveEdit that of /recipes/:name/edit.
// Both check the text, and save it if that is what was asked and nothing is
// wrong.
func (s *Server) saveNew(c *gin.Context) error { return s.saveText(c, "") }

func (s *Server) saveEdit(c *gin.Context) error { return s.saveText(c, c.Param("name")) }

func (s *Server) saveText(c *gin.Context, name string) error {
	c.Request.Body = http.MaxBytesReader(c.Writer, c.Request.Body, 4*mostRecipeBytes)
	if err := c.Request.ParseForm(); err != nil {
		p := newEditPage(name, "")
		p.Faults.add("text", "The text is longer than a recipe may be.")
		return s.showChecked(c, http.StatusRequestEntityTooLarge, p)
	}
	p := newEditPage(name, strings.ReplaceAll(c.PostForm("text"), "\r\n", "\n"))
	p.Who, p.Why = strings.TrimSpace(c.PostForm("who")), strings.TrimSpace(c.PostForm("why"))
	p.From, _ = strconv.ParseInt(c.PostForm("from"), 10, 64)
	if c.PostForm("do") != "save" {
		return s.showChecked(c, http.StatusOK, p)
	}
	return s.save(c, p)
}

// save stores a text that is in order as a new version.
func (s *Server) save(c *gin.Context, p *editPage) error {
	act := actOf(c, p.Why, &p.Faults)
	if p.Why == "" {
		p.Faults.add("why", "Say what is changed and why.")
	}
	if err := s.check(c, p); err != nil {
		return err
	}
	if n := len(p.Check.Faults); n == 1 {
		p.Faults.add("text", "The text has a fault: "+p.Check.Faults[0].Error()+".")
	} else if n > 1 {
		p.Faults.add("text", "The text has "+strconv.Itoa(n)+" faults; they stand beside it.")
	}
	if len(p.Faults) > 0 {
		return s.showEditor(c, http.StatusUnprocessableEntity, p)
	}
	name := p.Check.Recipe.Name
	err := s.Lab.SaveRecipeAfter(c.Request.Context(), p.From, name, p.Text, act)
	if wrong, ok := refusalFault(err); err != nil && ok {
		p.Stale = errors.Is(err, inventory.ErrStale)
		p.Faults = append(p.Faults, wrong)
		return s.showEditor(c, refusalStatus(err), p)
	}
	if err != nil {
		return err
	}
	return s.goTo(c, "/recipes/"+name)
}

// showChecked checks the text of a page and shows it.
func (s *Server) showChecked(c *gin.Context, status int, p *editPage) error {
	if err := s.check(c, p); err != nil {
		return err
	}
	return s.showEditor(c, status, p)
}

func (s *Server) showEditor(c *gin.Context, status int, p *editPage) error {
	p.Kinds = planner.StepKinds()
	if p.Name == "" {
		all, err := s.recipes(c.Request.Context())
		if err != nil {
			return err
		}
		p.Begin = all
	}
	return s.render(c, status, "edit", p)
}

// check finds what is wrong with the text by itself and among the other
// recipes.
func (s *Server) check(c *gin.Context, p *editPage) error {
	shelf, err := s.Lab.LoadFor(c.Request.Context(), nil)
	if err != nil {
		return err
	}
	p.Check = checkRecipe(fileOf(p.Name), p.Text, shelf)
	if p.Check.Recipe == nil {
		return nil
	}
	return s.checkNames(c.Request.Context(), p)
}

// fileOf is what a text is called where its places are named.
func fileOf(name string) string {
	if name == "" {
		return "recipe.yaml"
	}
	return name + ".yaml"
}

var addressable = regexp.MustCompile(`^[a-z0-9]+(-[a-z0-9]+)*$`)

// checkNames finds a name that another recipe has or that no address can hold,
// and a version number that was given before.
func (s *Server) checkNames(ctx context.Context, p *editPage) error {
	name, k := p.Check.Recipe.Name, p.Check
	at := func(pattern *regexp.Regexp, what, expected string) {
		k.add(planner.RecipeFault{File: k.File, Line: lineOf(p.Text, pattern), Column: 1, What: what, Expected: expected})
	}
	switch {
	case p.Name != "" && name != p.Name:
		at(nameLine, "the recipe is called "+strconv.Quote(name)+" here", "the name "+p.Name+"; for another recipe begin a new one")
		return nil
	case !addressable.MatchString(name) || name == "new" || len(name) > 80:
		at(nameLine, "the name "+strconv.Quote(name)+" can’t stand in an address", "small letters, digits and hyphens, such as butanoic-acid-permanganate")
		return nil
	}
	versions, err := s.versions(ctx, name)
	var none *missing
	switch {
	case errors.As(err, &none):
		return nil
	case err != nil:
		return err
	case p.Name == "":
		at(nameLine, "there is a recipe "+strconv.Quote(name)+" already", "another name")
		return nil
	}
	if before, ok := versions.numbered(k.Recipe.Version); ok && before.text != p.Text {
		at(versionLine, "version "+strconv.Quote(k.Recipe.Version)+" is there already with another text", "the next one, such as "+versions.next())
	}
	return nil
}

// outline is what a new recipe begins with.
const outline = `recipe: name-of-the-recipe
title: What it makes and from what
version: "1"
product:
limiting:
yield: {mean: 70 %, spread: 9 %, at-most: 95 %, basis: prior}
sources:
  - "where the quantities come from"
controls:
  - hood, splash goggles, gloves

vessels:
  pot: {ware: round flask, for: reaction}

reactions:

steps:
  - do: charge
    name: into the pot
    vessel: pot
    charges:
      - {substance: , equivalents: 1, exact: yes}
    time: 10 min
`

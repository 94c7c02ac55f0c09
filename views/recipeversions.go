package views

import (
	"context"
	"net/http"
	"strconv"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
)

// recipeVersions is every text a recipe has had.
type recipeVersions struct {
	name string
	all  []recipeVersion // the latest first; never empty
}

// recipeVersion is one text of a recipe. The one that came with the program has
// the ID 0.
type recipeVersion struct {
	ID               int64
	Number           string // as the text gives it, "" where it can't be read
	When, By, Why    string
	Latest, Original bool

	text   string
	recipe *planner.Recipe // nil where it can't be read
}

// Address is the version in the query of an address.
func (v recipeVersion) Address() string { return strconv.FormatInt(v.ID, 10) }

// Title names the version in a list of choices.
func (v recipeVersion) Title() string {
	title := "version " + v.Number
	if v.Number == "" {
		title = "unreadable version"
	}
	if v.Original {
		return title + ", came with the program"
	}
	return title + ", " + v.When + ", " + v.By
}

// versions reads the texts of a recipe, or returns a *missing.
func (s *Server) versions(ctx context.Context, name string) (*recipeVersions, error) {
	saved, err := s.Lab.RecipeVersions(ctx, name)
	if err != nil {
		return nil, err
	}
	v := &recipeVersions{name: name}
	for _, t := range saved {
		v.all = append(v.all, s.savedVersion(t))
	}
	for _, r := range s.Recipes {
		if r.Name == name {
			v.all = append(v.all, recipeVersion{Number: r.Version, When: "–", By: "came with the program", Original: true, text: r.Text, recipe: r})
		}
	}
	if len(v.all) == 0 {
		return nil, &missing{"recipe", name, "All recipes are listed on their own page."}
	}
	v.all[0].Latest = true
	return v, nil
}

func (s *Server) savedVersion(t inventory.RecipeText) recipeVersion {
	v := recipeVersion{ID: t.ID, When: t.Made.Format("2 Jan 2006, 15:04 UTC"), By: t.ByWhom, Why: t.Why, text: t.Text}
	if r, err := s.book.recipe(fileOf(t.Name), t.Text); err == nil {
		v.recipe, v.Number = r, r.Version
	}
	return v
}

// asked is the version an address names by its ID; "" is the latest.
func (v *recipeVersions) asked(id string) (recipeVersion, bool) {
	if id == "" {
		return v.all[0], true
	}
	for _, x := range v.all {
		if x.Address() == id {
			return x, true
		}
	}
	return recipeVersion{}, false
}

// before is the version that came before another one, or that one itself.
func (v *recipeVersions) before(id int64) recipeVersion {
	for i, x := range v.all {
		if x.ID == id {
			return v.all[min(i+1, len(v.all)-1)]
		}
	}
	return v.all[0]
}

// numbered finds the version that gives itself a number.
func (v *recipeVersions) numbered(number string) (recipeVersion, bool) {
	for _, x := range v.all {
		if x.recipe != nil && x.Number == number {
			return x, true
		}
	}
	return recipeVersion{}, false
}

// next is a number that no version has: one more than the highest whole one.
func (v *recipeVersions) next() string {
	highest := 0
	for _, x := range v.all {
		if n, err := strconv.Atoi(x.Number); err == nil {
			highest = max(highest, n)
		}
	}
	return strconv.Itoa(highest + 1)
}

// bumped is a text with the next number in place of its own.
func (v *recipeVersions) bumped(text string) string {
	return versionLine.ReplaceAllLiteralString(text, `version: "`+v.next()+`"`)
}

// differencePage is what two versions of a recipe don't have alike.
type differencePage struct {
	frame
	Name     string
	All      []recipeVersion
	From, To recipeVersion
	Words    []string
	Keys     []planner.KeyChange
	Unread   string // why they can't be compared key by key
	Lines    []planner.Change
}

// showDifference answers /recipes/:name/difference: the version named by to=…
// against the one named by from=…; without them the latest against the one
// before.
func (s *Server) showDifference(c *gin.Context) error {
	versions, err := s.versions(c.Request.Context(), c.Param("name"))
	if err != nil {
		return err
	}
	to, ok := versions.asked(c.Query("to"))
	if !ok {
		return &missing{"version", c.Query("to"), "The versions stand on the page of the recipe."}
	}
	from := versions.before(to.ID)
	if id := c.Query("from"); id != "" {
		if from, ok = versions.asked(id); !ok {
			return &missing{"version", id, "The versions stand on the page of the recipe."}
		}
	}
	p := &differencePage{Name: versions.name, All: versions.all, From: from, To: to}
	p.Title, p.Section = "Versions of "+versions.name+" compared", "/recipes"
	p.compare()
	return s.render(c, http.StatusOK, "difference", p)
}

func (p *differencePage) compare() {
	if p.From.recipe != nil && p.To.recipe != nil {
		p.Words = planner.DifferenceInWords(p.From.recipe, p.To.recipe)
	}
	var err error
	if p.Keys, err = planner.KeyDifference(p.From.text, p.To.text); err != nil {
		p.Unread = sentence(err.Error())
	}
	p.Lines = changedLines(planner.Difference(p.From.text, p.To.text))
}

// contextLines is how many like lines stand around a changed one.
const contextLines = 2

// changedLines leaves out what is far from any change.
func changedLines(lines []planner.Change) []planner.Change {
	near := make([]bool, len(lines))
	for i, l := range lines {
		if l.Kept() {
			continue
		}
		for k := max(0, i-contextLines); k <= min(len(lines)-1, i+contextLines); k++ {
			near[k] = true
		}
	}
	var kept []planner.Change
	for i, l := range lines {
		if near[i] {
			kept = append(kept, l)
		}
	}
	return kept
}

package views

import (
	"net/http"
	"strings"
	"testing"

	"stillroom/planner"
)

// A text with a fault is named by line and column and not saved; a good one is
// saved and takes the place of the old one, while a run keeps its own.
func TestEditingARecipe(t *testing.T) {
	s := newDemoServer(t)
	const at = "/recipes/pentanoic-acid-dichromate"
	r, ok := planner.RecipeByName("pentanoic-acid-dichromate")
	if !ok {
		t.Fatal("no such recipe")
	}
	broken := strings.Replace(r.Text, "limiting:", "limitng:", 1)
	w := post(t, s, at+"/edit", "text", broken, "who", "Ines", "do", "save")
	if w.Code != http.StatusUnprocessableEntity || len(all(parse(t, w), ".places li b")) == 0 {
		t.Errorf("a broken text = %d, want 422 with its places", w.Code)
	}
	part := post(t, s, at+"/edit", "text", broken)
	if part.Code != 200 {
		t.Errorf("checking a broken text = %d, want 200", part.Code)
	}
	better := strings.Replace(r.Text, "title: ", "title: Revised ", 1)
	if w := post(t, s, at+"/edit", "text", better, "do", "save"); w.Code != http.StatusUnprocessableEntity {
		t.Errorf("saved by nobody = %d, want 422", w.Code)
	}
	if w := post(t, s, at+"/edit", "text", better, "who", "Ines", "do", "save"); w.Code != http.StatusSeeOther {
		t.Fatalf("saving = %d", w.Code)
	}
	if got := text(one(t, parse(t, get(t, s, at)), "h1")); !strings.HasPrefix(got, "Revised ") {
		t.Errorf("the recipe is called %q", got)
	}
}

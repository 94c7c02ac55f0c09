package main

import (
	"bytes"
	"strings"
	"testing"

	"stillroom/inventory"
	"stillroom/planner"
)

// A recipe saved in the lab is planned by its name, and takes the place of the
// one that comes with the program.
func TestPlanTakesSavedRecipes(t *testing.T) {
	dir := t.TempDir()
	store, err := inventory.Open(t.Context(), inventory.Options{Dir: dir})
	if err != nil {
		t.Fatal(err)
	}
	r, _ := planner.RecipeByName("pentyl-pentanoate")
	for name, text := range map[string]string{
		"pentyl-pentanoate": strings.Replace(r.Text, "recipe: pentyl-pentanoate", "recipe: pentyl-pentanoate # ours", 1),
		"own-ester":         strings.Replace(r.Text, "recipe: pentyl-pentanoate", "recipe: own-ester", 1),
		"broken":            "recipe: [",
	} {
		if err := store.SaveRecipe(t.Context(), name, text, inventory.Act{By: "Rut"}); err != nil {
			t.Fatal(err)
		}
	}
	if err := store.Close(); err != nil {
		t.Fatal(err)
	}
	plan := func(recipe string) (int, string) {
		var out, wrong bytes.Buffer
		status := run(t.Context(), []string{"plan", recipe, "--target", "10g", "--data", dir}, &out, &wrong)
		return status, out.String() + wrong.String()
	}
	if status, said := plan("own-ester"); status != statusBlocked || !strings.Contains(said, "by own-ester") {
		t.Errorf("a saved recipe: status %d, want a plan that an empty shelf can't cover: %.300s", status, said)
	}
	if status, said := plan("broken"); status != statusUsage || !strings.Contains(said, "broken.yaml:1:") {
		t.Errorf("a saved text that can't be read: status %d: %.300s", status, said)
	}
	if _, said := plan("no-such"); !strings.Contains(said, "own-ester") {
		t.Errorf("the saved recipe isn't among the names: %.300s", said)
	}
}

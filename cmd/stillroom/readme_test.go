package main

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"stillroom/inventory"
	"stillroom/planner"
)

func readme(t *testing.T) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "..", "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// TestReadmeRecipe plans the recipe that the README shows.
func TestReadmeRecipe(t *testing.T) {
	block := regexp.MustCompile("(?s)```yaml\n(.*?)```").FindStringSubmatch(readme(t))
	if block == nil {
		t.Fatal("the README shows no recipe")
	}
	recipe, err := planner.ParseRecipe("README.md", []byte(block[1]))
	if err != nil {
		t.Fatal(err)
	}
	today := inventory.NewDate(2026, 12, 1)
	plan, err := planner.MakePlan(planner.Request{Recipe: recipe, Target: 0.2, On: today.AddDays(daysAhead), Today: today},
		inventory.NewShelf(inventory.DemoLab(today)))
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range plan.Findings {
		if f.Severity > planner.Note {
			t.Errorf("the README's recipe isn't a good example: %s: %s", f.Kind, f.Text)
		}
	}
}

// TestReadmeNamesEverything wants every command and every step kind in the README.
func TestReadmeNamesEverything(t *testing.T) {
	text := readme(t)
	for _, cmd := range newRoot(nil, nil).Commands() {
		if !strings.Contains(text, "stillroom "+cmd.Name()) {
			t.Errorf("the README doesn't mention %q", "stillroom "+cmd.Name())
		}
	}
	for _, kind := range planner.StepKinds() {
		if !strings.Contains(text, "`"+kind+"`") {
			t.Errorf("the README doesn't mention the step kind %q", kind)
		}
	}
}

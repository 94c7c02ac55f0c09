package views

import (
	"regexp"
	"strconv"
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// The longest recipe's sheet is short enough to be read at a hood, and leaves
// nothing out for it: every step, statement, limit and stream is there, in at
// least 11 points, and what discards says where to.
func TestHazardSheetOfTheLongestRecipe(t *testing.T) {
	today := inventory.NewDate(2026, 12, 1)
	recipe, ok := planner.RecipeByName("pentanoic-acid-dichromate")
	if !ok {
		t.Fatal("no such recipe")
	}
	p, err := planner.MakePlan(planner.Request{Recipe: recipe, Target: 50 * chem.Gram, On: today.AddDays(44), Today: today}, inventory.NewShelf(inventory.DemoLab(today)))
	if err != nil {
		t.Fatal(err)
	}
	o := paperOptions()
	o.Plain = true
	content, err := HazardSheet(p, o)
	if err != nil {
		t.Fatal(err)
	}
	if got := strings.Count(string(content), "/Type /Page\n"); got < 1 || got > 9 {
		t.Errorf("%d pages, want 9 at most", got)
	}
	sizes := regexp.MustCompile(`/F\w+ ([0-9.]+) Tf`).FindAllStringSubmatch(string(content), -1)
	if len(sizes) == 0 {
		t.Error("no sizes of type found")
	}
	for _, s := range sizes {
		if size, err := strconv.ParseFloat(s[1], 64); err != nil || size < 11 {
			t.Fatalf("type of %s points", s[1])
		}
	}
	text := paperText(t, writePaper(t, HazardSheet, p, o))
	for _, s := range p.Steps {
		wantText(t, text, s.Name)
		if s.Do == "discard" && s.Stream == "" {
			t.Errorf("step %d discards to nowhere", s.N)
		}
		if s.Stream != "" {
			wantText(t, text, s.Stream)
		}
	}
	for _, n := range p.Hazards {
		if n.At != planner.AsStored && !n.Formed {
			continue
		}
		wantText(t, text, n.Signal)
		for _, s := range n.Statements {
			code, _, _ := strings.Cut(s, " ")
			wantText(t, text, code)
		}
		for _, code := range n.P {
			wantText(t, text, code+" ")
		}
	}
	wantText(t, text, "not evidence of safety", "NO DATA: not assessed", "Exposure limits: no data", "unverified: read the supplier's sheet",
		"step 4, controlled", "assessed by", "reviewed by", "P501 Dispose of contents/container to")
}

// Two steps may have one name; each says what is in its own vessel.
func TestHazardSheetTellsStepsOfOneNameApart(t *testing.T) {
	p := paperPlan(t)
	p.Steps[6].Name = p.Steps[0].Name
	p.Hazards = planner.NoteHazards(p.Needs, p.Steps, p.Waste)
	s, err := newSheet(p, paperOptions(), "Hazard sheet")
	if err != nil {
		t.Fatal(err)
	}
	fresh, _ := (&hazardSheet{s}).contents(p.Steps[0], said{})
	for _, text := range fresh {
		if strings.Contains(text, "ethyl acetate") {
			t.Errorf("the first step says what is in the seventh: %s", text)
		}
	}
	if len(fresh) == 0 {
		t.Error("the first step says nothing of its vessel")
	}
}

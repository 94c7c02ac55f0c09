package views

import (
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"

	"golang.org/x/net/html"

	"stillroom/inventory"
	"stillroom/planner"
)

const dichromate = "/recipes/pentanoic-acid-dichromate"

// revised is the dichromate recipe with another number and changes; pairs are
// old and new texts.
func revised(t *testing.T, pairs ...string) string {
	t.Helper()
	r, ok := planner.RecipeByName("pentanoic-acid-dichromate")
	if !ok {
		t.Fatal("no such recipe")
	}
	text := versionLine.ReplaceAllString(r.Text, `version: "revised"`)
	for i := 0; i+1 < len(pairs); i += 2 {
		changed := strings.Replace(text, pairs[i], pairs[i+1], 1)
		if changed == text {
			t.Fatalf("the recipe doesn't say %q", pairs[i])
		}
		text = changed
	}
	return text
}

func save(t *testing.T, s *Server, address, recipe string) *httptest.ResponseRecorder {
	t.Helper()
	return post(t, s, address, "text", recipe, "who", "Ines", "why", "a try", "from", "0", "do", "save")
}

// A fault is named by file, line and column, quoted, linked to its line and not
// saved.
func TestEditorShowsPlaces(t *testing.T) {
	s := newDemoServer(t)
	broken := revised(t, "limiting:", "limitng:")
	w := save(t, s, dichromate+"/edit", broken)
	doc := parse(t, w)
	if w.Code != http.StatusUnprocessableEntity {
		t.Errorf("saving a broken text = %d, want 422", w.Code)
	}
	words := text(one(t, doc, "#checked"))
	line := strings.Count(broken[:strings.Index(broken, "limitng")], "\n") + 1
	for _, want := range []string{"2 faults", "pentanoic-acid-dichromate.yaml:" + itoa(line) + ":1", "limitng: 1-pentanol", `Unknown key "limitng"`} {
		if !strings.Contains(plainWords(words), plainWords(want)) {
			t.Errorf("the check doesn't say %q: %.400s", want, words)
		}
	}
	for _, n := range all(doc, "#checked .places a") {
		to, _ := attribute(n, "href")
		if len(all(doc, "code"+to)) != 1 {
			t.Errorf("%s leads nowhere", to)
		}
	}
	if typed := text(one(t, doc, "textarea#text")); !strings.Contains(typed, "limitng") {
		t.Error("what was typed is lost")
	}
	if versions, _ := s.Lab.RecipeVersions(t.Context(), "pentanoic-acid-dichromate"); len(versions) != 0 {
		t.Errorf("%d versions were saved", len(versions))
	}
}

func itoa(n int) string { return strings.TrimSpace(numberText(float64(n))) }

func plainWords(s string) string { return strings.Join(strings.Fields(s), "") }

// A step that can't be done is a fault on the line on which the step begins.
func TestEditorPlacesFaultsOfTheWalk(t *testing.T) {
	s := newDemoServer(t)
	wrong := revised(t, "name: take the ester off\n    vessel: funnel\n    move: organic\n    to: ester", "name: take the ester off\n    vessel: spent-brine\n    move: organic\n    to: ester")
	w := post(t, s, dichromate+"/edit", "text", wrong)
	lines := strings.Split(wrong, "\n")
	links := all(parse(t, w), "#checked .places a[data-line]")
	if len(links) != 1 {
		t.Fatalf("%d faults, want one: %s", len(links), text(one(t, parse(t, w), "#checked")))
	}
	at, _ := attribute(links[0], "data-line")
	for i, line := range lines {
		if strings.Contains(line, "take the ester off") && at != itoa(i) && at != itoa(i+1) {
			t.Errorf("the fault stands on line %s, want the step on line %d", at, i)
		}
	}
}

// The balance of every step stands beside the text, with what is lost.
func TestEditorShowsTheBalance(t *testing.T) {
	s := newDemoServer(t)
	w := get(t, s, dichromate+"/edit", "HX-Request", "true", "HX-Target", "checked")
	doc := parse(t, w)
	r, _ := planner.RecipeByName("pentanoic-acid-dichromate")
	rows := all(doc, "table.balance tbody tr")
	if len(rows) != len(r.Steps) {
		t.Errorf("%d steps are balanced, want %d", len(rows), len(r.Steps))
	}
	if len(all(doc, "header")) != 0 {
		t.Error("a part holds the whole page")
	}
	words := text(doc)
	for _, want := range []string{"the largest proven scale", "loses", "gives off", "aqueous"} {
		if !strings.Contains(words, want) {
			t.Errorf("the balance doesn't say %q", want)
		}
	}
	vague := post(t, s, dichromate+"/edit", "text", revised(t, "name: acid into the oxidant", "name: slowly acid into the oxidant"))
	if words := text(one(t, parse(t, vague), "#checked")); !strings.Contains(words, "leaves it to the reader") {
		t.Error("a vague word isn't asked about")
	}
}

// Markup in a text comes out as text, wherever it is shown.
func TestEditorEscapes(t *testing.T) {
	s := newDemoServer(t)
	const markup = `<script>alert(1)</script></textarea><b id="x">`
	for _, recipe := range []string{markup, revised(t, "title: ", "title: '"+markup+"' #"), revised(t, "limiting:", "\""+strings.ReplaceAll(markup, `"`, `'`)+"\": x\nlimiting:")} {
		w := post(t, s, dichromate+"/edit", "text", recipe, "who", markup, "why", markup, "do", "save", "from", "9")
		doc := parse(t, w)
		for n := range doc.Descendants() {
			if id, _ := attribute(n, "id"); id == "x" {
				t.Errorf("markup got into the page: %.60s", recipe)
			}
			if n.Type == html.ElementNode && n.Data == "script" && n.FirstChild != nil {
				t.Errorf("a script got into the page: %.60s", recipe)
			}
		}
	}
}

// A good text is saved as the next version, is used from then on, and can be
// compared with the one before; a run keeps the text it was planned with.
func TestSavingAVersion(t *testing.T) {
	s := newDemoServer(t)
	original, _ := planner.RecipeByName("pentanoic-acid-dichromate")
	before := post(t, s, "/runs/new", "recipe", "pentanoic-acid-dichromate", "wanted", "20 g", "on", "14 Jan 2027", "who", "Rut")
	run := before.Header().Get("Location")
	if before.Code != http.StatusSeeOther {
		t.Fatalf("pencilling in = %d", before.Code)
	}
	next := revised(t, "title: ", "title: Revised ", "time: 2 h", "time: 3 h")
	if w := post(t, s, dichromate+"/edit", "text", next, "do", "save"); w.Code != http.StatusUnprocessableEntity {
		t.Errorf("saved by nobody for no reason = %d, want 422", w.Code)
	}
	if w := get(t, s, "/slate"); strings.Contains(w.Body.String(), "Revised") {
		t.Error("the slate has the new recipe before it is saved")
	}
	if w := save(t, s, dichromate+"/edit", next); w.Code != http.StatusSeeOther || w.Header().Get("Location") != dichromate {
		t.Fatalf("saving = %d to %q: %s", w.Code, w.Header().Get("Location"), text(one(t, parse(t, w), "main")))
	}
	page := parse(t, get(t, s, dichromate))
	if got := text(one(t, page, "h1")); !strings.HasPrefix(got, "Revised ") {
		t.Errorf("the recipe is called %q", got)
	}
	versions := text(one(t, page, "section[aria-labelledby=h-versions]"))
	for _, want := range []string{"revised", "latest", "Ines", "a try", "came with the program"} {
		if !strings.Contains(versions, want) {
			t.Errorf("the versions don't say %q: %s", want, versions)
		}
	}
	if w := get(t, s, "/slate"); !strings.Contains(w.Body.String(), "Revised") {
		t.Error("the slate keeps the old recipe for runs that have no text of their own")
	}
	if words := text(one(t, parse(t, get(t, s, "/recipes")), "table")); !strings.Contains(words, "Revised Pentanoic") {
		t.Error("the list has the old recipe")
	}
	difference := text(one(t, parse(t, get(t, s, dichromate+"/difference")), "main"))
	for _, want := range []string{"steps › reflux › time changed 2 h 3 h", "version changed 5 revised"} {
		if !strings.Contains(difference, want) {
			t.Errorf("the difference doesn't say %q: %.600s", want, difference)
		}
	}
	kept := parse(t, get(t, s, run))
	if words := text(one(t, kept, "p.sub")); strings.Contains(words, "Revised") {
		t.Errorf("the run changed with the recipe: %s", words)
	}
	if words := text(one(t, kept, "main")); !strings.Contains(words, "Planned by version "+original.Version+" of the recipe, which it keeps; the latest is version revised.") {
		t.Error("the run doesn't say that its recipe has a later version")
	}
	if w := get(t, s, dichromate+"?saved=0"); w.Code != 200 || !strings.Contains(text(parse(t, w)), "earlier version") {
		t.Errorf("the version from before = %d", w.Code)
	}
	if w := get(t, s, dichromate+"?saved=99"); w.Code != http.StatusNotFound {
		t.Errorf("a version that isn't there = %d, want 404", w.Code)
	}
}

// What can't be saved says why, on the line that would have to change.
func TestEditorRefusals(t *testing.T) {
	s := newDemoServer(t)
	if w := save(t, s, dichromate+"/edit", revised(t)); w.Code != http.StatusSeeOther {
		t.Fatalf("saving = %d", w.Code)
	}
	tests := []struct {
		name, address, text, says string
		status                    int
	}{
		{"another name", dichromate + "/edit", revised(t, "recipe: pentanoic-acid-dichromate", "recipe: something-else"), "begin a new one", 422},
		{"a number given before", dichromate + "/edit", revised(t, "title: ", "title: Other "), "is there already with another text", 422},
		{"over somebody's version", dichromate + "/edit", revised(t, `version: "revised"`, `version: "7"`), "saved another version", 409},
		{"a name that is there", "/recipes/new", revised(t), "already", 422},
		{"a name for no address", "/recipes/new", revised(t, "recipe: pentanoic-acid-dichromate", "recipe: ../A b"), "can’t stand in an address", 422},
		{"nothing", "/recipes/new", "", "there is no text", 422},
		{"no text", "/recipes/new", "a\x00b", "aren’t letters", 422},
		{"too many lines", "/recipes/new", strings.Repeat("\n", mostRecipeLines+1) + "x", "at most", 422},
		{"too long", "/recipes/new", strings.Repeat("x", 5*mostRecipeBytes), "longer than a recipe", 413},
	}
	for _, tt := range tests {
		w := save(t, s, tt.address, tt.text)
		if words := text(one(t, parse(t, w), "main")); w.Code != tt.status || !strings.Contains(words, tt.says) {
			t.Errorf("%s = %d, want %d and %q: %.300s", tt.name, w.Code, tt.status, tt.says, words)
		}
	}
	if w := save(t, s, "/recipes/new", revised(t, "recipe: pentanoic-acid-dichromate", "recipe: another-acid")); w.Code != http.StatusSeeOther {
		t.Errorf("a new recipe = %d: %s", w.Code, text(one(t, parse(t, w), "main")))
	}
}

// A text that an earlier program saved and this one can't read isn't replaced in
// silence.
func TestUnreadableRecipe(t *testing.T) {
	s := newDemoServer(t)
	store := s.Lab.(*inventory.Store)
	if err := store.SaveRecipe(t.Context(), "pentyl-pentanoate", "recipe: [", inventory.Act{By: "Rut"}); err != nil {
		t.Fatal(err)
	}
	list := text(one(t, parse(t, get(t, s, "/recipes")), "main"))
	if !strings.Contains(list, "Can’t be read") {
		t.Error("the list doesn't name it")
	}
	if w := get(t, s, "/recipes/pentyl-pentanoate"); w.Code != http.StatusSeeOther {
		t.Errorf("its page = %d, want it in the editor", w.Code)
	}
	if w := get(t, s, "/recipes/pentyl-pentanoate/edit"); w.Code != 200 || !strings.Contains(w.Body.String(), "1 fault") {
		t.Errorf("the editor = %d", w.Code)
	}
	if w := get(t, s, "/slate"); w.Code != 200 || !strings.Contains(w.Body.String(), "no readable recipe") {
		t.Errorf("the slate = %d and doesn't say so", w.Code)
	}
}

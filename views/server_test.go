package views

import (
	"net/http"
	"net/http/httptest"
	"net/url"
	"strings"
	"testing"

	"golang.org/x/net/html"

	"stillroom/inventory"
)

// get asks a server for an address as a browser does.
func get(t testing.TB, s http.Handler, address string, header ...string) *httptest.ResponseRecorder {
	t.Helper()
	r := httptest.NewRequest(http.MethodGet, address, nil)
	for i := 0; i+1 < len(header); i += 2 {
		r.Header.Set(header[i], header[i+1])
	}
	w := httptest.NewRecorder()
	s.ServeHTTP(w, r)
	return w
}

// post sends a form; fields are names and values in turn.
func post(t testing.TB, s http.Handler, address string, fields ...string) *httptest.ResponseRecorder {
	t.Helper()
	form := url.Values{}
	for i := 0; i+1 < len(fields); i += 2 {
		form.Set(fields[i], fields[i+1])
	}
	r := httptest.NewRequest(http.MethodPost, address, strings.NewReader(form.Encode()))
	r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
	w := httptest.NewRecorder()
	s.ServeHTTP(w, r)
	return w
}

// parse reads a page.
func parse(t testing.TB, w *httptest.ResponseRecorder) *html.Node {
	t.Helper()
	doc, err := html.Parse(strings.NewReader(w.Body.String()))
	if err != nil {
		t.Fatal(err)
	}
	return doc
}

// all returns the elements of a selector made of parts by spaces, each a tag,
// a #identity, a .class or an [attribute=value], in any combination.
func all(doc *html.Node, selector string) []*html.Node {
	found := []*html.Node{doc}
	for _, part := range strings.Fields(selector) {
		var next []*html.Node
		for _, n := range found {
			for d := range n.Descendants() {
				if matches(d, part) {
					next = append(next, d)
				}
			}
		}
		found = next
	}
	return found
}

func matches(n *html.Node, part string) bool {
	if n.Type != html.ElementNode {
		return false
	}
	if i := strings.IndexByte(part, '['); i >= 0 {
		name, value, exact := strings.Cut(strings.TrimSuffix(part[i+1:], "]"), "=")
		got, ok := attribute(n, name)
		if !ok || exact && got != value {
			return false
		}
		part = part[:i]
	}
	if i := strings.IndexByte(part, '#'); i >= 0 {
		if id, _ := attribute(n, "id"); id != part[i+1:] {
			return false
		}
		part = part[:i]
	}
	if i := strings.IndexByte(part, '.'); i >= 0 {
		class, _ := attribute(n, "class")
		if !strings.Contains(" "+class+" ", " "+part[i+1:]+" ") {
			return false
		}
		part = part[:i]
	}
	return part == "" || n.Data == part
}

func attribute(n *html.Node, name string) (string, bool) {
	for _, a := range n.Attr {
		if a.Key == name {
			return a.Val, true
		}
	}
	return "", false
}

// text returns the words of an element with ordinary single spaces.
func text(n *html.Node) string {
	var b strings.Builder
	for d := range n.Descendants() {
		if d.Type == html.TextNode {
			b.WriteString(d.Data + " ")
		}
	}
	return strings.Join(strings.Fields(b.String()), " ")
}

// one returns the only element of a selector.
func one(t testing.TB, doc *html.Node, selector string) *html.Node {
	t.Helper()
	found := all(doc, selector)
	if len(found) != 1 {
		t.Fatalf("%d elements are %q, want 1", len(found), selector)
	}
	return found[0]
}

func TestRoutes(t *testing.T) {
	s := newSampleServer(t)
	tests := []struct {
		address string
		status  int
		h1      string // "" for what isn't a page
	}{
		{"/slate", 200, "The slate"},
		{"/runs/new", 200, "Pencil in a run"},
		{"/runs/1", 200, "50 g pentanoic acid"},
		{"/runs/1?wanted=80+g&on=14+Jan+2027", 200, "80 g pentanoic acid"},
		{"/runs/1?wanted=80+g&on=2027-01-14", 200, "80 g pentanoic acid"},
		{"/runs/1?wanted=1,234+g", 422, "1,234 g pentanoic acid"},
		{"/runs/1?wanted=-5+g", 422, "-5 g pentanoic acid"},
		{"/runs/1?wanted=0+g", 422, "0 g pentanoic acid"},
		{"/runs/1?wanted=5+stone", 422, "5 stone pentanoic acid"},
		{"/runs/1?wanted=50+g&on=30+Nov+2026", 422, "50 g pentanoic acid"},
		{"/runs/1?wanted=50+g&on=03/04/2027", 422, "50 g pentanoic acid"},
		{"/runs/1/promise", 200, "Promise the bottles"},
		{"/runs/1/explain/need-2", 200, "How 138 g sodium dichromate came about"},
		{"/runs/1/explain/draw-1-1", 200, ""},
		{"/runs/1/explain/step-1", 200, "How step 1, make up the oxidant, came about"},
		{"/runs/1/explain/scale", 200, "How the scale came about"},
		{"/runs/1/explain/need-99", 404, "No explanation “need-99”"},
		{"/runs/1/explain/draw-1-x", 404, ""},
		{"/runs/1/steps/1", 200, "1 make up the oxidant"},
		{"/runs/1/steps/0", 404, "No step “0”"},
		{"/runs/1/hazards", 200, "Hazards, step by step"},
		{"/runs/1/answers", 200, "What would do"},
		{"/runs/1/pick-list.pdf", 200, ""},
		{"/runs/1/hazard-sheet.pdf?paper=letter", 200, ""},
		{"/runs/1/requisition.pdf", 200, ""},
		{"/runs/1/pick-list.pdf?wanted=1,234+g", 422, "1,234 g pentanoic acid"},
		{"/runs/1/laundry-list.pdf", 404, "No such page"},
		{"/runs/6", 200, "25 g pentanoic acid"},
		{"/runs/6/pick-list.pdf", 404, "No plan “run 6”"},
		{"/runs/6/promise", 404, "No plan “run 6”"},
		{"/runs/6/answers", 404, "No plan “run 6”"},
		{"/runs/6/explain/need-1", 404, "No plan “run 6”"},
		{"/runs/77", 404, "No run “77”"},
		{"/runs/x", 404, "No run “x”"},
		{"/shelf", 200, "The shelf"},
		{"/shelf?find=pentanl", 200, "The shelf"},
		{"/shelf?find=nothing+of+that+name", 200, "The shelf"},
		{"/shelf?page=99&sort=expiry&down=1", 200, "The shelf"},
		{"/shelf.csv", 200, ""},
		{"/shelf.xlsx", 200, ""},
		{"/shelf.json", 200, ""},
		{"/shelf/import", 200, "Bring in a stock list"},
		{"/shelf/bottles/NOSUCH", 404, "No bottle “NOSUCH”"},
		{"/shelf/receive", 200, "Take bottles in"},
		{"/shelf/receive?what=acid", 200, "Take bottles in"},
		{"/shelf/receive?what=nothing+of+that+name", 200, "Take bottles in"},
		{"/shelf/receive?form=1", 200, "Take bottles in"},
		{"/shelf/receive?form=x", 404, "No stock form “x”"},
		{"/shelf/receive?order=1", 200, "Take bottles in"},
		{"/shelf/receive?order=3", 404, "No order under way “3”"},
		{"/shelf/stock-take", 200, "Stock-take"},
		{"/shelf/stock-take?by=walk&who=Ines", 200, "Stock-take"},
		{"/shelf/stock-take?scan=BOGUS", 422, "Stock-take"},
		{"/shelf/stock-take?scan=BG9SH1", 303, ""},
		{"/shelf/stock-take/NOSUCH", 404, "No bottle “NOSUCH”"},
		{"/waste/NOSUCH", 404, "No carboy “NOSUCH”"},
		{"/recipes", 200, "Recipes"},
		{"/recipes/pentanoic-acid-dichromate", 200, "Pentanoic acid from 1-pentanol with acid dichromate"},
		{"/recipes/pentanoic-acid-dichromate/edit", 200, "Change pentanoic-acid-dichromate"},
		{"/recipes/lead-into-gold/edit", 404, "No recipe “lead-into-gold”"},
		{"/runs/1/chance", 200, "Chance, drawn through the whole run"},
		{"/recipes/pentanoic-acid-dichromate/difference", 200, "What changed"},
		{"/recipes/new", 200, "Write a recipe"},
		{"/recipes/new?from=pentyl-pentanoate", 200, "Write a recipe"},
		{"/recipes/lead-into-gold", 404, "No recipe “lead-into-gold”"},
		{"/recipes/lead-into-gold/edit", 404, "No recipe “lead-into-gold”"},
		{"/shortfalls", 200, "Shortfalls"},
		{"/buying", 200, "Buying"},
		{"/waste", 200, "Waste"},
		{"/reckoner", 200, "Reckoner"},
		{"/reckoner/amount", 200, "Amount of substance"},
		{"/reckoner/amount?mass=50+g", 200, "Amount of substance"},
		{"/reckoner/amount?mass=50+furlongs", 422, "Amount of substance"},
		{"/reckoner/astrology", 404, "No sum “astrology”"},
		{"/healthz", 200, ""},
		{"/metrics", 200, ""},
		{"/nowhere", 404, "No such page"},
	}
	for _, tt := range tests {
		w := get(t, s, tt.address)
		if w.Code != tt.status {
			t.Errorf("GET %s = %d, want %d", tt.address, w.Code, tt.status)
		}
		if tt.h1 == "" {
			continue
		}
		doc := parse(t, w)
		if got := text(one(t, doc, "h1")); got != tt.h1 {
			t.Errorf("GET %s: h1 %q, want %q", tt.address, got, tt.h1)
		}
		title := text(one(t, doc, "title"))
		if wrong := strings.HasPrefix(title, "Error: "); wrong != (tt.status == 422) {
			t.Errorf("GET %s: title %q with status %d", tt.address, title, tt.status)
		}
	}
}

func TestRedirects(t *testing.T) {
	s := newSampleServer(t)
	code := s.firstBottle(t)
	for address, to := range map[string]string{
		"/":                                    "/slate",
		"/runs":                                "/slate",
		"/shelf?find=" + code:                  "/shelf/bottles/" + code,
		"/shelf?find=" + strings.ToLower(code): "/shelf/bottles/" + code,
	} {
		w := get(t, s, address)
		if w.Code != http.StatusSeeOther || w.Header().Get("Location") != to {
			t.Errorf("GET %s = %d to %q, want %d to %q", address, w.Code, w.Header().Get("Location"), http.StatusSeeOther, to)
		}
	}
}

func (s *Server) firstBottle(t testing.TB) string {
	t.Helper()
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	return shelf.Bottles[0].Code
}

// Every page has a language, one main heading, landmarks, a way past the bar,
// and no identity twice; every label belongs to a field and every field that
// people fill in has one.
func TestPagesAreWellFormed(t *testing.T) {
	s := newSampleServer(t)
	for _, address := range []string{"/slate", "/runs/new", "/runs/1", "/runs/1?wanted=x", "/runs/1/promise", "/runs/1/hazards", "/runs/1/answers", "/runs/1/steps/1", "/runs/1/explain/need-2",
		"/shelf", "/shelf/receive", "/shelf/receive?what=acid", "/shelf/receive?order=1", "/shelf/receive?form=1", "/shelf/stock-take", "/shelf/stock-take?scan=BOGUS", "/shelf/stock-take/" + s.firstBottle(t), "/waste/" + inventory.MakeCode(inventory.CarboyCode, 2), "/shelf?find=zzzz", "/shelf/import", "/shelf/bottles/" + s.firstBottle(t), "/recipes", "/recipes/pentanoic-acid-dichromate", "/recipes/pentanoic-acid-dichromate/edit", "/recipes/pentanoic-acid-dichromate/difference", "/recipes/new", "/runs/1/chance",
		"/shortfalls", "/buying", "/waste", "/reckoner", "/reckoner/amount?mass=50+g", "/reckoner/amount?mass=x", "/nowhere"} {
		doc := parse(t, get(t, s, address))
		if lang, _ := attribute(one(t, doc, "html"), "lang"); lang != "en" {
			t.Errorf("%s: lang %q", address, lang)
		}
		for _, selector := range []string{"main#main", "header", "footer", "h1", "a.skip", "title"} {
			if n := len(all(doc, selector)); n != 1 {
				t.Errorf("%s: %d of %s", address, n, selector)
			}
		}
		identities := map[string]bool{}
		for _, n := range all(doc, "[id]") {
			id, _ := attribute(n, "id")
			if identities[id] {
				t.Errorf("%s: id %q twice", address, id)
			}
			identities[id] = true
		}
		labelled := map[string]bool{}
		for _, n := range all(doc, "label") {
			to, _ := attribute(n, "for")
			labelled[to] = true
			if !identities[to] {
				t.Errorf("%s: label for %q, which isn't there", address, to)
			}
		}
		for _, tag := range []string{"input", "select", "textarea"} {
			for _, n := range all(doc, tag) {
				id, _ := attribute(n, "id")
				if kind, _ := attribute(n, "type"); kind != "hidden" && !labelled[id] {
					t.Errorf("%s: field %q has no label", address, id)
				}
			}
		}
		for _, name := range []string{"aria-labelledby", "aria-describedby"} {
			for _, n := range all(doc, "["+name+"]") {
				ids, _ := attribute(n, name)
				for _, id := range strings.Fields(ids) {
					if !identities[id] {
						t.Errorf("%s: %s %q isn't there", address, name, id)
					}
				}
			}
		}
	}
}

// Every run and every recipe of the demonstration lab has a page, planned by the
// planner itself.
func TestDemonstrationLabIsShown(t *testing.T) {
	s := newDemoServer(t)
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	for _, run := range shelf.Runs {
		doc := parse(t, get(t, s, runAddress(run.ID)))
		if run.State == inventory.Closed || run.State == inventory.Dropped {
			if got := text(one(t, doc, "#verdict b")); got != "This run is "+string(run.State)+"." {
				t.Errorf("run %d says %q", run.ID, got)
			}
			continue
		}
		if len(all(doc, "#verdict")) != 1 || len(all(doc, "#needs tbody tr")) == 0 || len(all(doc, ".strip li.v svg")) == 0 {
			t.Errorf("run %d has no verdict, no needs or no walk-through", run.ID)
		}
		for _, n := range all(doc, "#needs tbody tr") {
			if word, _ := attribute(n, "data-state"); stateShapes[word] == "" {
				t.Errorf("run %d: a need is %q", run.ID, word)
			}
		}
	}
	for _, r := range s.Recipes {
		doc := parse(t, get(t, s, "/recipes/"+r.Name))
		if len(all(doc, ".strip li.v svg")) == 0 {
			t.Errorf("recipe %s isn't walked through", r.Name)
		}
	}
}

// The page of a run says what the slate says of it, whatever earlier runs were
// promised.
func TestRunPageAgreesWithTheSlate(t *testing.T) {
	s := newDemoServer(t)
	rows := all(parse(t, get(t, s, "/slate")), "tbody tr")
	if len(rows) == 0 {
		t.Fatal("the slate is empty")
	}
	for _, row := range rows {
		address, _ := attribute(all(row, "th a")[0], "href")
		page, _ := attribute(one(t, parse(t, get(t, s, address)), "#verdict"), "data-state")
		if slate := text(all(row, ".state")[0]); slate != page {
			t.Errorf("%s is %s on the slate and %s on its page", address, slate, page)
		}
	}
}

// The content security policy forbids what a page must not hold in the first
// place.
func TestNothingInline(t *testing.T) {
	s := newSampleServer(t)
	for _, address := range []string{"/slate", "/runs/1", "/shelf", "/waste", "/recipes/new", "/reckoner/amount"} {
		w := get(t, s, address)
		if csp := w.Header().Get("Content-Security-Policy"); !strings.HasPrefix(csp, "default-src 'none'") || strings.Contains(csp, "unsafe") {
			t.Errorf("%s: policy %q", address, csp)
		}
		doc := parse(t, w)
		for n := range doc.Descendants() {
			if n.Type != html.ElementNode {
				continue
			}
			if n.Data == "style" || n.Data == "script" && n.FirstChild != nil {
				t.Errorf("%s: inline %s", address, n.Data)
			}
			for _, a := range n.Attr {
				if a.Key == "style" || strings.HasPrefix(a.Key, "on") {
					t.Errorf("%s: %s has the attribute %s", address, n.Data, a.Key)
				}
				if (a.Key == "src" || a.Key == "href" || a.Key == "action") && strings.Contains(a.Val, "//") {
					t.Errorf("%s: %s leads elsewhere: %s", address, n.Data, a.Val)
				}
			}
		}
	}
}

func TestHeaders(t *testing.T) {
	w := get(t, newSampleServer(t), "/slate")
	for name, want := range map[string]string{"Vary": "HX-Request", "X-Content-Type-Options": "nosniff", "Referrer-Policy": "same-origin", "Cache-Control": "no-store"} {
		if got := w.Header().Get(name); got != want {
			t.Errorf("%s: %q, want %q", name, got, want)
		}
	}
}

func TestPostFromAnotherSiteIsRefused(t *testing.T) {
	s := newSampleServer(t)
	r := httptest.NewRequest(http.MethodPost, "/runs/1/stand", strings.NewReader("to=dropped&who=Mallory"))
	r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
	r.Header.Set("Sec-Fetch-Site", "cross-site")
	w := httptest.NewRecorder()
	s.ServeHTTP(w, r)
	if w.Code != http.StatusForbidden {
		t.Errorf("post from another site = %d, want %d", w.Code, http.StatusForbidden)
	}
}

// The same address answers a whole page or the part htmx asks for.
func TestParts(t *testing.T) {
	s := newSampleServer(t)
	whole := get(t, s, "/runs/1").Body.String()
	part := get(t, s, "/runs/1?wanted=80+g&on=14+Jan+2027", "HX-Request", "true", "HX-Target", "plan")
	if body := part.Body.String(); strings.Contains(body, "<html") || !strings.HasPrefix(body, "<title>") || !strings.Contains(body, `id="needs"`) {
		t.Errorf("the part isn't a part: %.200s", body)
	}
	if !strings.Contains(whole, "<html") {
		t.Error("the whole page isn't whole")
	}
	restored := get(t, s, "/runs/1", "HX-Request", "true", "HX-History-Restore-Request", "true").Body.String()
	if !strings.Contains(restored, "<html") {
		t.Error("a restored page has to be whole")
	}
	if body := get(t, s, "/runs/1/explain/need-2", "HX-Request", "true", "HX-Target", "why").Body.String(); strings.Contains(body, "<title>") {
		t.Error("a note must not change the title of the window")
	}
	note := parse(t, get(t, s, "/runs/1/explain/need-2", "HX-Request", "true", "HX-Target", "why"))
	if n := len(all(note, "dialog[open] h2")); n != 1 {
		t.Errorf("%d headings in the note, want 1", n)
	}
}

func TestFaultsStandBesideTheirFields(t *testing.T) {
	s := newSampleServer(t)
	doc := parse(t, get(t, s, "/runs/1?wanted=1,234+g&on=30+Nov+2026"))
	field := one(t, doc, "input#wanted")
	if v, _ := attribute(field, "value"); v != "1,234 g" {
		t.Errorf("the field holds %q, want what was typed", v)
	}
	if v, _ := attribute(field, "aria-invalid"); v != "true" {
		t.Error("the field isn't marked")
	}
	summary, beside := all(doc, ".faults li a[href=#wanted]"), one(t, doc, "#wanted-fault")
	if len(summary) != 1 || text(summary[0]) != text(beside) {
		t.Errorf("the summary says other words than the field: %q", text(beside))
	}
	if len(all(doc, ".faults li")) != 2 {
		t.Error("both faults have to be named")
	}
}

func TestUserTextIsEscaped(t *testing.T) {
	s := newSampleServer(t)
	const evil = `<script>alert(1)</script>"'><b>`
	for _, address := range []string{"/runs/1?wanted=" + url.QueryEscape(evil), "/shelf?find=" + url.QueryEscape(evil),
		"/reckoner/amount?mass=" + url.QueryEscape(evil), "/runs/" + url.PathEscape(evil), "/runs/1?printed=" + url.QueryEscape(evil)} {
		body := get(t, s, address).Body.String()
		if strings.Contains(body, "<script>alert") || strings.Contains(body, "'><b>") {
			t.Errorf("%s: markup came through", address)
		}
	}
	w := post(t, s, "/runs/new", "recipe", "pentanoic-acid-dichromate", "wanted", "40 g", "on", "14 Jan 2027", "who", evil)
	if w.Code != http.StatusSeeOther {
		t.Fatalf("post = %d", w.Code)
	}
	if body := get(t, s, w.Header().Get("Location")).Body.String(); strings.Contains(body, "<script>alert") {
		t.Error("an owner's markup came through")
	}
}

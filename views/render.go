package views

import (
	"bytes"
	"embed"
	"fmt"
	"html/template"
	"net/http"
	"path"
	"strings"
	"sync"

	"github.com/gin-gonic/gin"

	"stillroom/static"
)

//go:embed templates/*.html
var templateFiles embed.FS

// templateSets holds one set for each page: the layout, the parts shared by
// several pages, and the page's own blocks.
type templateSets map[string]*template.Template

// parseTemplates reads every page template and checks that it has the block
// "main" that the layout places.
func parseTemplates() (templateSets, error) {
	base, err := template.New("layout").Funcs(templateFuncs).
		ParseFS(templateFiles, "templates/layout.html", "templates/parts*.html")
	if err != nil {
		return nil, fmt.Errorf("reading the layout: %w", err)
	}
	entries, err := templateFiles.ReadDir("templates")
	if err != nil {
		return nil, fmt.Errorf("listing templates: %w", err)
	}
	sets := templateSets{}
	for _, e := range entries {
		name := strings.TrimSuffix(e.Name(), ".html")
		if name == "layout" || strings.HasPrefix(name, "parts") {
			continue
		}
		set := template.Must(base.Clone())
		if _, err := set.ParseFS(templateFiles, path.Join("templates", e.Name())); err != nil {
			return nil, fmt.Errorf("reading template %s: %w", name, err)
		}
		if set.Lookup("main") == nil {
			return nil, fmt.Errorf("template %s has no block main", name)
		}
		sets[name] = set
	}
	return sets, nil
}

// A frame is what every page has: its title, its place in the bar, and what was
// wrong with what was typed.
type frame struct {
	Title   string // without the program's name
	Section string // address of the part of the program it belongs to
	Find    string // what stands in the search field
	Faults  faults
	sent    sentForm
}

func (f *frame) top() *frame { return f }

// A pageValue is a page: any struct that embeds frame.
type pageValue interface{ top() *frame }

var buffers = sync.Pool{New: func() any { return new(bytes.Buffer) }}

// render answers with the page of the template's name, or with the block that
// htmx asked for. Nothing is sent before the whole of it has been made.
func (s *Server) render(c *gin.Context, status int, name string, p pageValue) error {
	set, ok := s.sets[name]
	if !ok {
		return fmt.Errorf("no template %q", name)
	}
	b := buffers.Get().(*bytes.Buffer)
	defer buffers.Put(b)
	b.Reset()
	block := wantedBlock(c.Request, set)
	if block != "layout" && !besides[block] {
		// htmx takes the title of the window out of the part as well.
		if err := set.ExecuteTemplate(b, "title", p); err != nil {
			return fmt.Errorf("rendering the title of %s: %w", name, err)
		}
	}
	if err := set.ExecuteTemplate(b, block, p); err != nil {
		return fmt.Errorf("rendering %s: %w", name, err)
	}
	c.Data(status, "text/html; charset=utf-8", b.Bytes())
	return nil
}

// besides are the blocks that come into a page that stays what it is; the title
// of the window isn't theirs.
var besides = map[string]bool{"why": true, "answers": true, "chance": true, "checked": true}

// wantedBlock names the block a request wants: the whole layout, or, when htmx
// exchanges a part, the block that has the name of the part's identity without
// the number at its end. A request that restores the history gets the whole
// page.
func wantedBlock(r *http.Request, set *template.Template) string {
	h := r.Header
	if h.Get("HX-Request") != "true" || h.Get("HX-Boosted") == "true" || h.Get("HX-History-Restore-Request") == "true" {
		return "layout"
	}
	target := strings.TrimRight(h.Get("HX-Target"), "-0123456789")
	if target != "" && target != "layout" && set.Lookup(target) != nil {
		return target
	}
	return "main"
}

// templateFuncs are the few functions templates may call; all of them only
// write a value.
var templateFuncs = template.FuncMap{
	"asset":    assetAddress,
	"mass":     massText,
	"massOf":   massPlain,
	"volume":   volumeText,
	"volumeOf": volumePlain,
	"amount":   amountText,
	"percent":  percentText,
	"chance":   chanceText,
	"celsius":  celsiusText,
	"heat":     heatText,
	"time":     timeText,
	"pieces":   piecesText,
	"money":    moneyText,
	"number":   numberText,
	"formula":  formulaHTML,
	"sentence": sentence,
	"bound":    bound,
	"state":    stateMark,
	"severity": severityWord,
	"unstated": codesText,
	"packSize": packSize,
	"bar":      func() []barEntry { return barEntries },
	"add":      func(a, b int) int { return a + b },
	"join":     strings.Join,
}

// A barEntry is a part of the program in the bar at the head of every page.
type barEntry struct{ Name, Address string }

var barEntries = []barEntry{
	{"Slate", "/slate"}, {"Shelf", "/shelf"}, {"Recipes", "/recipes"}, {"Shortfalls", "/shortfalls"},
	{"Buying", "/buying"}, {"Waste", "/waste"}, {"Reckoner", "/reckoner"},
}

// assetAddress gives the address of an embedded file. A name that isn't there
// is a fault of the template, found by the first test that renders it.
func assetAddress(name string) (string, error) {
	a, ok := static.Address(name)
	if !ok {
		return "", fmt.Errorf("no embedded file %q", name)
	}
	return a, nil
}

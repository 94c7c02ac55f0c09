package views

import (
	"html"
	"html/template"
	"strings"

	"stillroom/chem"
)

// formulaHTML writes a formula with real subscripts and superscripts. Text that
// isn't a formula is shown as it stands.
func formulaHTML(text string) template.HTML {
	if text == "" {
		return ""
	}
	f, err := chem.ParseFormula(text)
	if err != nil {
		return template.HTML(html.EscapeString(text))
	}
	var b strings.Builder
	for _, span := range f.Rich() {
		t := html.EscapeString(span.Text)
		switch span.Level {
		case -1:
			t = "<sub>" + t + "</sub>"
		case 1:
			t = "<sup>" + t + "</sup>"
		}
		b.WriteString(t)
	}
	return template.HTML(b.String())
}

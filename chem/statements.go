package chem

import (
	"strings"
	"sync"
)

// Statement returns the standard's words for a hazard, supplemental or
// precautionary statement code, such as "H314" or "P305+P351+P338". A code with
// a letter for the effect, such as H360FD, has words of its own where the
// standard has; the letter is never dropped silently, so an unknown code is not
// found.
//
// The words are those of UN GHS Rev.10 and EU CLP Annex III and IV
// (data/ghs_statements.csv, with the source of each row).
func Statement(code string) (string, bool) {
	text, ok := statements()[code]
	if ok || !strings.Contains(code, "+") {
		return text, ok
	}
	var parts []string
	for c := range strings.SplitSeq(code, "+") {
		part, ok := statements()[c]
		if !ok {
			return "", false
		}
		parts = append(parts, part)
	}
	return strings.Join(parts, " "), true
}

// StatementLine returns the code followed by its words, or by "no data" if the
// table has none.
func StatementLine(code string) string {
	if line, ok := statementLines()[code]; ok {
		return line
	}
	text, ok := Statement(code)
	if !ok {
		text = "no data: wording not in the table"
	}
	return code + " " + text
}

var statementLines = sync.OnceValue(func() map[string]string {
	lines := map[string]string{}
	for code, text := range statements() {
		lines[code] = code + " " + text
	}
	return lines
})

var statements = sync.OnceValue(func() map[string]string {
	byCode := map[string]string{}
	for _, row := range readTable("ghs_statements.csv") {
		byCode[strings.ReplaceAll(row.text("code"), " ", "")] = row.text("statement")
	}
	return byCode
})

// A HazardClass is a hazard class with its category and statement code, as in
// "STOT RE 1 H372".
type HazardClass struct {
	Name     string // "STOT RE"
	Category string // "1"; empty where the class has none
	Code     string // "H372"
}

// String returns the class as it is written in a classification.
func (c HazardClass) String() string {
	parts := []string{c.Name}
	if c.Category != "" {
		parts = append(parts, c.Category)
	}
	if c.Code != "" {
		parts = append(parts, c.Code)
	}
	return strings.Join(parts, " ")
}

// ParseHazardClass reads an entry of a classification, such as "Skin Corr. 1A
// H314" or "STOT RE 1 H372 (lungs) (Inhalation)". What follows the code, an
// organ, a route or the asterisks of Annex VI, is left out. It reports false
// for a text without a statement code.
func ParseHazardClass(s string) (HazardClass, bool) {
	fields := strings.Fields(strings.ReplaceAll(s, "Irrit.2", "Irrit. 2"))
	for i, f := range fields {
		code := strings.Trim(f, ";:,")
		if i == 0 || !isStatementCode(code) {
			continue
		}
		c := HazardClass{Code: code}
		name := fields[:i]
		if last := strings.Trim(name[i-1], ";"); i > 1 && isCategory(last) {
			c.Category = last
			name = name[:i-1]
		}
		c.Name = strings.Trim(strings.Join(name, " "), ";")
		return c, true
	}
	return HazardClass{}, false
}

func isStatementCode(s string) bool {
	digits := strings.TrimPrefix(strings.TrimPrefix(s, "EU"), "H")
	return len(digits) < len(s) && len(digits) >= 3 && isDigits(digits[:3])
}

func isDigits(s string) bool {
	for _, r := range s {
		if r < '0' || r > '9' {
			return false
		}
	}
	return s != ""
}

func isCategory(s string) bool {
	return s != "" && (s[0] >= '0' && s[0] <= '9' || s[0] == '(' || len(s) <= 2 && strings.Trim(s, "ABCDEFG") == "")
}

// LabelElements are what the standard puts on a label for one class and
// category.
type LabelElements struct {
	Signal     string   // "Danger", "Warning" or empty
	Pictograms []string // "GHS05"
	P          []string // codes for prevention, response, storage and disposal, in that order
}

// LabelElementsOf returns the label elements of a class, and whether the table
// has them (data/ghs_classes.csv, with the source of each row).
func LabelElementsOf(c HazardClass) (LabelElements, bool) {
	e, ok := labelElements()[classKey(c)]
	return e, ok
}

// classKey folds the spellings under which a class is found: the effect letters
// of H360FD or H350i, and the categories that share a row.
func classKey(c HazardClass) HazardClass {
	switch {
	case c.Name == "Press. Gas":
		c.Category = ""
	case c.Name != "Org. Perox." && c.Name != "Self-react.":
	case c.Category == "C" || c.Category == "D":
		c.Category = "CD"
	case c.Category == "E" || c.Category == "F":
		c.Category = "EF"
	}
	c.Code = baseCode(c.Code)
	return c
}

// baseCode drops the effect letters: H360FD is H360.
func baseCode(code string) string {
	return strings.TrimRight(code, "abcdefghijklmnopqrstuvwxyzABCDEFGIJKLMNOPQRSTUVWXYZ")
}

var labelElements = sync.OnceValue(func() map[HazardClass]LabelElements {
	byClass := map[HazardClass]LabelElements{}
	for _, row := range readTable("ghs_classes.csv") {
		e := LabelElements{Signal: row.text("signal_word")}
		for p := range strings.SplitSeq(row.text("pictogram"), ";") {
			if p = strings.TrimSpace(p); p != "" {
				e.Pictograms = append(e.Pictograms, p)
			}
		}
		for _, column := range []string{"p_prevention_clp", "p_response_clp", "p_storage_clp", "p_disposal_clp"} {
			e.P = append(e.P, strings.Fields(row.text(column))...)
		}
		for code := range strings.SplitSeq(row.text("h_code"), ";") {
			if c, ok := ParseHazardClass(row.text("clp_abbreviation") + " " + code); ok {
				byClass[classKey(c)] = e
			}
		}
	}
	return byClass
})

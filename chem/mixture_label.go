package chem

import (
	"fmt"
	"slices"
	"strings"
)

// supplements adds the supplemental statements that ingredients bring along
// (CLP Annex II): from their specific limit or, without one, from 1 % on; and
// EUH208 for sensitisers below their limit (Annex I Table 3.4.6).
func (m *mixture) supplements() {
	for _, p := range m.parts {
		for _, code := range p.Hazard.EUH {
			if low, found := lowest(p.limits, func(l specificLimit) bool { return l.Code == code }); found && !atLeast(p.limited, low) {
				continue
			} else if !found && !atLeast(p.percent, 1) {
				continue
			}
			m.supplement(StatementLine(code))
		}
		m.elicitation(p)
	}
}

func (m *mixture) supplement(line string) {
	if !slices.Contains(m.euh, line) {
		m.euh = append(m.euh, line)
	}
}

func (m *mixture) elicitation(p mixPart) {
	for _, name := range []string{"Skin Sens.", "Resp. Sens."} {
		c, ok := p.class(name)
		if !ok || m.has(name, "") {
			continue
		}
		limit := ruleLimit("SE-013")
		if c.Category == "1A" {
			limit = ruleLimit("SE-014")
		}
		if low, found := lowest(p.limitsOf(name), func(specificLimit) bool { return true }); found {
			limit = min(limit, low/10) // SE-015: a tenth of the specific limit
		}
		if atLeast(p.percent, limit) {
			m.supplement("EUH208 Contains " + p.Name + ". May produce an allergic reaction")
		}
	}
}

// pureShare is the per cent from which a mixture has the physical hazards of
// its one ingredient: what is sold as pure. A choice of this program.
const pureShare = 99

// physical lists the physical hazards of the ingredients from 1 % on. What is
// all but pure has those of its substance.
func (m *mixture) physical() {
	for _, p := range m.parts {
		if atLeast(p.percent, pureShare) && p.Known {
			m.physicalOf(p)
			return
		}
	}
	var classes []HazardClass
	var from []string
	for _, p := range m.parts {
		if !atLeast(p.percent, 1) {
			continue
		}
		for _, c := range p.classes {
			if classRank(c.Name) < classRank("Acute Tox.") && !slices.Contains(classes, c) {
				classes = append(classes, c)
				from = append(from, p.Name)
			}
		}
	}
	if len(classes) == 0 {
		m.note("physical hazards of the mixture not determined; its ingredients from 1 %% on have none on record")
		return
	}
	var words []string
	for i, c := range classes {
		words = append(words, fmt.Sprintf("%s (%s)", c, from[i]))
	}
	m.note("physical hazards not determined, a flash point or other test is needed; treat as the worst ingredient: %s", strings.Join(words, ", "))
	sortClasses(classes)
	for _, c := range classes {
		m.out.Physical = append(m.out.Physical, c.String())
	}
}

// physicalOf takes the physical hazards over from the substance that is all
// but pure.
func (m *mixture) physicalOf(p mixPart) {
	for _, c := range p.classes {
		if classRank(c.Name) < classRank("Acute Tox.") {
			m.classes = append(m.classes, c)
		}
	}
	m.note("physical hazards are those of %s, which is %g %% of it", p.Name, p.percent)
}

func (m *mixture) label() {
	sortClasses(m.classes)
	for _, c := range m.classes {
		m.out.Classes = append(m.out.Classes, c.String())
	}
	label := LabelOf(m.classes)
	m.out.Signal, m.out.Pictograms, m.out.P = label.Signal, label.Pictograms, label.P
	m.out.Statements = append(label.Statements, m.euh...)
}

// Label is what stands on a label for a set of classes.
type Label struct {
	Signal     string
	Pictograms []string
	Statements []string // codes with words
	P          []string // codes
}

// LabelOf puts the label elements of classes together by the standard's rules
// of precedence (CLP Art. 20, 26 and 27): one signal word, pictograms that a
// graver one covers left out, statements that another covers left out.
func LabelOf(classes []HazardClass) Label {
	var l Label
	for _, c := range classes {
		e, _ := LabelElementsOf(c)
		if e.Signal == "Danger" || l.Signal == "" {
			l.Signal = e.Signal
		}
		l.P = appendNew(l.P, e.P...)
		if !covered(c, classes) {
			l.Statements = appendNew(l.Statements, StatementLine(c.Code))
		}
	}
	l.Pictograms = pictogramsOf(classes)
	return l
}

func appendNew(list []string, items ...string) []string {
	for _, item := range items {
		if !slices.Contains(list, item) {
			list = append(list, item)
		}
	}
	return list
}

// covered reports a statement that another one says already: H314 covers H318,
// H410 covers H400 (rules LB-007 to LB-009).
func covered(c HazardClass, classes []HazardClass) bool {
	switch c.Code {
	case "H318":
		return hasCode(classes, "H314")
	case "H400":
		return hasCode(classes, "H410")
	case "H401":
		return hasCode(classes, "H410") || hasCode(classes, "H411")
	}
	return false
}

func hasCode(classes []HazardClass, code string) bool {
	for _, c := range classes {
		if c.Code == code {
			return true
		}
	}
	return false
}

// pictogramCodes are the nine of the standard, in order.
var pictogramCodes = [...]string{"GHS01", "GHS02", "GHS03", "GHS04", "GHS05", "GHS06", "GHS07", "GHS08", "GHS09"}

// Positions in pictogramCodes.
const (
	corrosion   = 4
	skull       = 5
	exclamation = 6
)

// pictogramsOf applies rules LB-003 to LB-005: GHS07 stays only if a class asks
// for it that no graver pictogram covers. Pictograms that the standard makes
// optional (LB-001, LB-002) stay.
func pictogramsOf(classes []HazardClass) []string {
	var shown [len(pictogramCodes)]bool
	for _, c := range classes {
		e, _ := LabelElementsOf(c)
		for _, p := range e.Pictograms {
			if i := slices.Index(pictogramCodes[:], p); i >= 0 {
				shown[i] = true
			}
		}
	}
	if shown[exclamation] {
		shown[exclamation] = false
		for _, c := range classes {
			shown[exclamation] = shown[exclamation] || keepsExclamation(c, classes, shown[skull], shown[corrosion])
		}
	}
	var list []string
	for i, on := range shown {
		if on {
			list = append(list, pictogramCodes[i])
		}
	}
	return list
}

func keepsExclamation(c HazardClass, classes []HazardClass, skull, corrosion bool) bool {
	e, _ := LabelElementsOf(c)
	switch {
	case c.Name == "Ozone":
		return true // the precedences are between health hazards
	case skull || !slices.Contains(e.Pictograms, pictogramCodes[exclamation]):
		return false
	}
	irritant := c.Name == "Skin Irrit." || c.Name == "Eye Irrit."
	if irritant && corrosion {
		return false
	}
	return !(irritant || c.Name == "Skin Sens.") || !hasName(classes, "Resp. Sens.")
}

func hasName(classes []HazardClass, name string) bool {
	for _, c := range classes {
		if c.Name == name {
			return true
		}
	}
	return false
}

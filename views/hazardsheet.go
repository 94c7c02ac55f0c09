package views

import (
	"slices"
	"strings"

	"stillroom/planner"
)

// HazardSheet prints the risk assessment of a run as far as the plan knows it:
// what to do in an emergency, the scale, then in the order recognise, assess,
// minimise, prepare the substances used and formed, the pairs that must not
// meet, every step with what can go wrong, the waste and the signatures. What is
// not known is printed as "no data" or "not assessed", never left blank.
func HazardSheet(p *planner.Plan, o PaperOptions) ([]byte, error) {
	s, err := newSheet(p, o, "Hazard sheet")
	if err != nil {
		return nil, err
	}
	h := &hazardSheet{s}
	h.caution()
	h.emergency()
	h.scale()
	h.recognise()
	h.assess()
	h.minimise()
	h.prepare()
	return s.finish()
}

type hazardSheet struct{ *sheet }

// caution says what the sheet is and isn't.
func (h *hazardSheet) caution() {
	h.paragraph("", marginLeft, h.right-marginLeft, "A calculated draft. It does not replace a heat measurement, the suppliers' safety data sheets or a competent person's assessment, and it yields to local rules and law. Cross out what does not apply, so that it is seen to have been considered. Where it says no data or not assessed, find out before you start.")
	h.y += 2
}

// recognise lists the substances and the pairs.
func (h *hazardSheet) recognise() {
	h.heading("Recognise: substances used", 42)
	h.notes(func(n planner.HazardNote) bool { return n.At == planner.AsStored && !n.Formed })
	formed := func(n planner.HazardNote) bool { return n.Formed }
	if slices.ContainsFunc(h.plan.Hazards, formed) {
		h.heading("Recognise: substances formed on the way", 14)
		h.notes(formed)
	}
	h.unclassified()
	h.heading("Recognise: pairs that must not meet", 15)
	if len(h.plan.Pairs) == 0 {
		h.paragraph("", textLeft, h.right-textLeft, "None listed by the chart. A pair that is not listed is not shown to be harmless.")
		return
	}
	groups := groupPairs(h.plan)
	for _, g := range groups.Grave {
		h.pairGroup(g)
	}
	if len(groups.Mild) > 0 {
		h.paragraph("", textLeft, h.right-textLeft, "Besides, in brackets the step that brings them together: "+mildText(groups.Mild))
	}
	h.y++
	h.paragraph("", textLeft, h.right-textLeft, "By the chart of EPA-600/2-80-076 and supplementary rows. “Step n, controlled”: the recipe brings the pair together on purpose; only as that step says. A pair that is not listed is not shown to be harmless.")
}

// pairGroup writes what must not meet one substance.
func (h *hazardSheet) pairGroup(g pairGroup) {
	var texts []styledText
	for i, k := range g.Kinds {
		t := styledText{text: k.Text()}
		if i == 0 {
			t.lead = g.With
		}
		texts = append(texts, t)
	}
	lines := h.flow(texts, 0, 0)
	h.room(min(float64(len(lines))*lineHeight, 40))
	h.writeLines(lines, 0)
	h.y += 1.5
}

// notes writes the substances wanted, but not those with nothing to say.
func (h *hazardSheet) notes(want func(planner.HazardNote) bool) {
	for _, n := range h.plan.Hazards {
		if want(n) && !notClassified(n) {
			h.note(n)
		}
	}
}

// notClassified tells a substance that has been looked at and has no hazard
// statement from one that nobody looked at. It is still not shown to be harmless.
func notClassified(n planner.HazardNote) bool {
	return strings.HasPrefix(n.Basis, "not classified") && len(n.Statements) == 0 && len(n.Notes) == 0
}

// unclassified lists the substances without a hazard statement, by their
// exposure limits.
func (h *hazardSheet) unclassified() {
	var kinds [][2]string // limits and basis
	names := map[[2]string][]string{}
	for _, n := range h.plan.Hazards {
		if n.At != planner.AsStored && !n.Formed || !notClassified(n) {
			continue
		}
		kind := [2]string{limitsText(n), basisText(n)}
		if _, ok := names[kind]; !ok {
			kinds = append(kinds, kind)
		}
		name := n.What
		if n.Formed && n.At != "" {
			name += " (formed in " + n.At + ")"
		}
		names[kind] = append(names[kind], name)
	}
	if len(kinds) == 0 {
		return
	}
	texts := []styledText{{style: "B", text: "No hazard statement on record; not evidence of safety"}}
	for _, kind := range kinds {
		texts = append(texts, styledText{text: sentence(strings.Join(names[kind], "; ") + ". Exposure limits: " + kind[0] + ". Classification: " + kind[1])})
	}
	lines := h.flow(texts, 0, 0)
	h.room(min(float64(len(lines))*lineHeight, 40))
	h.writeLines(lines, 0)
}

const pictogramSide = 11.0

// note writes one substance: pictograms at the right, words beside and below.
func (h *hazardSheet) note(n planner.HazardNote) {
	obstacle := float64(len(n.Pictograms)) * (pictogramSide + 1)
	name := n.What
	if n.Formed && n.At != "" {
		name += ", formed in " + n.At
	}
	if n.Signal != "" {
		name += ". " + n.Signal + "."
	}
	words := []string{"Exposure limits: " + limitsText(n) + ".", sentence("classification: " + basisText(n))}
	for _, note := range n.Notes {
		words = append(words, sentence(note))
	}
	texts := []styledText{{lead: name, text: statementsText(n)}, {text: strings.Join(words, " ")}}
	lines := h.flow(texts, obstacle, pictogramSide+1)
	h.room(max(float64(min(len(lines), 5))*lineHeight, pictogramSide))
	for i, code := range n.Pictograms {
		h.drawPictogram(code, h.right-float64(len(n.Pictograms)-i)*(pictogramSide+1), h.y, pictogramSide)
	}
	least := 0.0
	if len(n.Pictograms) > 0 {
		least = pictogramSide
	}
	h.writeLines(lines, least)
	h.y += 0.8
	h.rule(hairline)
	h.y += 1.2
}

// styledText is text with a lead in bold before it, on the same line if there
// is room.
type styledText struct{ style, text, lead string }

// flow breaks texts into lines beside an obstacle at the right that is width
// wide and reaches height down.
func (s *sheet) flow(texts []styledText, width, height float64) []styledText {
	var lines []styledText
	limit := func() float64 {
		if float64(len(lines))*lineHeight < height {
			return s.right - textLeft - width - 2
		}
		return s.right - textLeft
	}
	for _, t := range texts {
		lead, rest := t.lead, t.text
		for lead != "" && s.leadWidth(lead) > 0.6*limit() {
			var first string
			first, lead = s.firstLine(family, "B", textSize, lead, limit())
			lines = append(lines, styledText{style: "B", text: first})
		}
		for rest != "" || lead != "" {
			var first string
			first, rest = s.firstLine(family, t.style, textSize, rest, limit()-s.leadWidth(lead))
			lines = append(lines, styledText{t.style, first, lead})
			lead = ""
		}
	}
	return lines
}

// leadWidth is the width of a lead with the gap after it.
func (s *sheet) leadWidth(lead string) float64 {
	if lead == "" {
		return 0
	}
	return s.measure(family, "B", textSize, lead+"  ")
}

// writeLines writes lines from textLeft on and moves on by least at least.
func (s *sheet) writeLines(lines []styledText, least float64) {
	from := s.y
	for _, line := range lines {
		if s.room(lineHeight) {
			from = s.y
			least = 0
		}
		if line.lead != "" {
			s.put(family, "B", textSize, textLeft, s.y, line.lead)
		}
		x := textLeft + s.leadWidth(line.lead)
		s.put(family, line.style, textSize, x, s.y, line.text)
		s.end = x + s.measure(family, line.style, textSize, line.text)
		s.y += lineHeight
	}
	s.y = max(s.y, from+least)
}

func statementsText(n planner.HazardNote) string {
	if len(n.Statements) > 0 {
		var words []string
		for _, s := range n.Statements {
			words = append(words, sentence(s))
		}
		return strings.Join(words, " ")
	}
	if strings.HasPrefix(n.Basis, "no data") {
		return "NO DATA: not assessed. Treat it as hazardous until the supplier's sheet says otherwise."
	}
	return "No hazard statement on record. That is not evidence of safety."
}

// limitUnits keeps numbers of exposure limits with their units.
var limitUnits = strings.NewReplacer(" mg/m3", "\u00a0mg/m³", " ppm", "\u00a0ppm", " 8 h", "\u00a08\u00a0h", " 15 min", "\u00a015\u00a0min")

func limitsText(n planner.HazardNote) string {
	if len(n.Limits) == 0 {
		return "no data"
	}
	return limitUnits.Replace(strings.Join(n.Limits, "; "))
}

func basisText(n planner.HazardNote) string {
	if n.Basis == "" {
		return "no data"
	}
	return n.Basis
}

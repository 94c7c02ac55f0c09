package views

import (
	"slices"
	"strings"

	"stillroom/chem"
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
	h.heading("Recognise: substances used", 55)
	h.notes(func(n planner.HazardNote) bool { return n.At == planner.AsStored && !n.Formed })
	formed := func(n planner.HazardNote) bool { return n.Formed }
	if slices.ContainsFunc(h.plan.Hazards, formed) {
		h.heading("Recognise: substances formed on the way", 30)
		h.notes(formed)
	}
	h.heading("Recognise: pairs that must not meet", 15)
	if len(h.plan.Pairs) == 0 {
		h.paragraph("", textLeft, h.right-textLeft, "None listed by the chart. A pair that is not listed is not shown to be harmless.")
		return
	}
	for _, p := range h.plan.Pairs {
		if grave(p) {
			h.pair(p)
		}
	}
	h.mildPairs()
	h.y++
	h.paragraph("", textLeft, h.right-textLeft, "By the chart of EPA-600/2-80-076 and supplementary rows. Pairs that the recipe brings together on purpose are among them: only as the step says. A pair that is not listed is not shown to be harmless.")
}

func (h *hazardSheet) pair(p chem.Incompatibility) {
	text := p.Consequences
	if p.Note != "" {
		text += ": " + p.Note
	}
	title := p.A + " and " + p.B
	titles := h.split(family, "B", textSize, title, h.right-textLeft)
	lines := h.split(family, "", textSize, text, h.right-textLeft)
	h.room(float64(len(titles)+len(lines)) * lineHeight)
	h.put(family, "B", textSize, marginLeft, h.y, strings.Join(p.Codes, " "))
	for _, line := range titles {
		h.put(family, "B", textSize, textLeft, h.y, line)
		h.y += lineHeight
	}
	for _, line := range lines {
		h.put(family, "", textSize, textLeft, h.y, line)
		h.y += lineHeight
	}
	h.y++
}

// grave tells the pairs that get lines of their own from those that only warm
// up, fizz or dissolve.
func grave(p chem.Incompatibility) bool {
	return slices.ContainsFunc(p.Codes, func(code string) bool { return code != "H" && code != "G" && code != "S" })
}

// mildPairs gathers the others by what they do.
func (h *hazardSheet) mildPairs() {
	var kinds []string
	pairs := map[string][]string{}
	for _, p := range h.plan.Pairs {
		if grave(p) {
			continue
		}
		if _, ok := pairs[p.Consequences]; !ok {
			kinds = append(kinds, p.Consequences)
		}
		pairs[p.Consequences] = append(pairs[p.Consequences], p.A+" and "+p.B)
	}
	for _, kind := range kinds {
		h.room(3 * lineHeight)
		h.put(family, "B", textSize, textLeft, h.y, sentence(kind))
		h.y += lineHeight
		h.paragraph("", textLeft, h.right-textLeft, sentence(strings.Join(pairs[kind], "; ")))
		h.y++
	}
}

func (h *hazardSheet) notes(want func(planner.HazardNote) bool) {
	for _, n := range h.plan.Hazards {
		if want(n) {
			h.note(n)
		}
	}
}

const pictogramSide = 14.0

// note writes one substance: pictograms at the right, words beside and below.
func (h *hazardSheet) note(n planner.HazardNote) {
	obstacle := float64(len(n.Pictograms)) * (pictogramSide + 1)
	name := n.What
	if n.Formed && n.At != "" {
		name += ", formed in " + n.At
	}
	texts := []styledText{{"B", name}}
	if n.Signal != "" {
		texts = append(texts, styledText{"B", n.Signal})
	}
	texts = append(texts, styledText{"", statementsText(n)}, styledText{"", "Exposure limits: " + limitsText(n)}, styledText{"", "Classification: " + basisText(n)})
	for _, note := range n.Notes {
		texts = append(texts, styledText{"", sentence(note)})
	}
	lines := h.flow(texts, obstacle, pictogramSide+1)
	height := max(float64(len(lines))*lineHeight, pictogramSide) + 2
	if h.room(min(height, h.bottom-60)) {
		lines = h.flow(texts, obstacle, pictogramSide+1)
	}
	for i, code := range n.Pictograms {
		h.drawPictogram(code, h.right-float64(len(n.Pictograms)-i)*(pictogramSide+1), h.y, pictogramSide)
	}
	h.writeLines(lines, pictogramSide)
	h.y += 1
	h.rule(hairline)
	h.y += 2.5
}

type styledText struct{ style, text string }

// flow breaks texts into lines beside an obstacle at the right that is width
// wide and reaches height down.
func (s *sheet) flow(texts []styledText, width, height float64) []styledText {
	var lines []styledText
	for _, t := range texts {
		rest := t.text
		for rest != "" {
			limit := s.right - textLeft
			if float64(len(lines))*lineHeight < height {
				limit -= width + 2
			}
			var first string
			first, rest = s.firstLine(family, t.style, textSize, rest, limit)
			lines = append(lines, styledText{t.style, first})
		}
	}
	return lines
}

// writeLines writes lines from textLeft on and moves on by least at least.
func (s *sheet) writeLines(lines []styledText, least float64) {
	from := s.y
	for _, line := range lines {
		if s.room(lineHeight) {
			from = s.y
			least = 0
		}
		s.put(family, line.style, textSize, textLeft, s.y, line.text)
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

func limitsText(n planner.HazardNote) string {
	if len(n.Limits) == 0 {
		return "no data"
	}
	return strings.ReplaceAll(strings.Join(n.Limits, "; "), "mg/m3", "mg/m³")
}

func basisText(n planner.HazardNote) string {
	if n.Basis == "" {
		return "no data"
	}
	return n.Basis
}

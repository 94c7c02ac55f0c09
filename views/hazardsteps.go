package views

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// assess goes through the run step by step.
func (h *hazardSheet) assess() {
	h.heading("Assess: step by step", 50)
	h.paragraph("", textLeft, h.right-textLeft, "Codes are those of the mixture in the vessel at its fullest moment, each layer by itself. Physical hazards of mixtures need a test that nobody made: they are taken from the worst ingredient. A step without the line “what if” was not assessed beyond the stop order on page 1.")
	h.y += 2
	said := map[string]int{}
	for i, s := range h.plan.Steps {
		if i > 0 {
			h.rule(hairline)
			h.y += 2.5
		}
		h.step(s, said)
	}
	if len(h.plan.Steps) == 0 {
		h.paragraph("", textLeft, h.right-textLeft, "No steps: not assessed.")
	}
}

// step writes one step: its numbers, what is in the vessel at the worst moment,
// cautions, and what if.
// said remembers in which step something was said, so that it isn't said again.
func (h *hazardSheet) step(s planner.StepReport, said map[string]int) {
	pictograms := h.stepPictograms(s)
	obstacle := float64(len(pictograms)) * (pictogramSide + 1)
	texts := []styledText{{"B", s.Name}, {"", stepNumbers(s)}}
	var vessel []string
	for _, n := range h.plan.Hazards {
		if n.At == s.Name && !n.Formed && s.Do != "discard" {
			vessel = append(vessel, vesselText(n))
		}
	}
	contents := once(said, s.N, "contents", vessel)
	if s.Do == "discard" {
		contents = []string{"Goes to waste: see “Prepare: waste”."}
	}
	for _, text := range contents {
		texts = append(texts, styledText{"", text})
	}
	failures := once(said, s.N, "", whatIf(s))
	// A step that brings nothing new is short: no signs, no line for controls.
	brief := len(s.Cautions) == 0 && len(failures) == 0 && !slices.Equal(contents, vessel)
	if brief {
		pictograms, obstacle = nil, 0
	}
	lines := h.flow(texts, obstacle, pictogramSide+1)
	height := float64(len(lines)) * lineHeight
	if !brief {
		height = max(height, pictogramSide) + float64(len(s.Cautions)+len(failures))*lineHeight + 15
	}
	h.room(min(height, h.bottom-60))
	for i, code := range pictograms {
		h.drawPictogram(code, h.right-float64(len(pictograms)-i)*(pictogramSide+1), h.y, pictogramSide)
	}
	h.putRight(family, "B", 13, textLeft-4, h.y-0.5, fmt.Sprint(s.N))
	least := pictogramSide
	if len(pictograms) == 0 {
		least = 0
	}
	h.writeLines(lines, least)
	for _, c := range s.Cautions {
		h.labelledIn("caution", sentence(c), "B")
	}
	for _, w := range failures {
		h.labelledIn("what if", w, "")
	}
	if s.HoldPoint {
		h.labelledIn("hold", "may stop here: "+orNotAssessed(s.HoldNote), "")
	}
	if brief {
		h.y += 1.5
		return
	}
	h.room(8)
	h.y++
	h.blank(textLeft, h.y, h.right-textLeft-h.measure(family, "", textSize, "control, gloves and their change")-1.5, "control, gloves and their change")
	h.y += 8
}

// once returns texts, or a reference to the step that had the same ones.
func once(said map[string]int, step int, what string, texts []string) []string {
	if len(texts) == 0 {
		return nil
	}
	key := strings.Join(texts, "\x00")
	if before, ok := said[key]; ok {
		return []string{sentence(strings.TrimSpace(fmt.Sprintf("%s as in step %d", what, before)))}
	}
	said[key] = step
	return texts
}

func orNotAssessed(s string) string {
	if s == "" {
		return "how long not assessed"
	}
	return s
}

// labelledIn writes a word in the margin and text in the text column.
func (s *sheet) labelledIn(label, text, style string) {
	lines := s.split(family, style, textSize, text, s.right-textLeft)
	s.room(float64(min(len(lines), 3)) * lineHeight)
	s.put(family, "", textSize, marginLeft, s.y, label)
	for _, line := range lines {
		s.room(lineHeight)
		s.put(family, style, textSize, textLeft, s.y, line)
		s.y += lineHeight
	}
}

// stepPictograms gathers the pictograms of what is in the vessel and what forms.
func (h *hazardSheet) stepPictograms(s planner.StepReport) []string {
	var codes []string
	for _, n := range h.plan.Hazards {
		if n.At != s.Name {
			continue
		}
		for _, code := range n.Pictograms {
			if !slices.Contains(codes, code) {
				codes = append(codes, code)
			}
		}
	}
	slices.Sort(codes)
	return codes
}

// stepNumbers are temperature, heat, gas, time and vessel in a sentence.
func stepNumbers(s planner.StepReport) string {
	words := []string{wareName(s.Vessel)}
	if s.Vessel.Fill > 0 {
		words[0] += ", " + percentText(s.Vessel.Fill) + " full"
	}
	if s.Vessel.Ware == "" && !s.Vessel.Fits {
		words = append(words, "none of the lab's fits")
	}
	if s.Temperature > 0 {
		words = append(words, "at "+celsiusText(s.Temperature))
	} else {
		words = append(words, "temperature not assessed")
	}
	switch {
	case s.Heat > 0:
		words = append(words, "gives off "+heatText(s.Heat))
	case s.Heat < 0:
		words = append(words, "takes up "+heatText(-s.Heat))
	default:
		words = append(words, "heat not assessed")
	}
	if s.Gas > 0 {
		words = append(words, volumeText(s.Gas)+" of "+s.GasOf)
	} else if s.GasOf != "" {
		words = append(words, s.GasOf+" may be given off, amount not assessed")
	}
	if s.Ice > 0 {
		words = append(words, massText(s.Ice)+" of ice")
	}
	switch {
	case s.Shortest > 0:
		words = append(words, "not faster than "+timeText(s.Shortest))
	case s.Time > 0 && !s.TimeNotAssessed:
		words = append(words, timeText(s.Time))
	default:
		words = append(words, "time not assessed")
	}
	return sentence(strings.Trim(strings.Join(words, "; "), "; ,"))
}

// vesselText is the mixture in a vessel with its codes.
func vesselText(n planner.HazardNote) string {
	text := sentence(n.What)
	text = strings.TrimSuffix(text, ".") + ". "
	var codes []string
	for _, s := range n.Statements {
		code, _, _ := strings.Cut(s, " ")
		codes = append(codes, code)
	}
	switch {
	case len(codes) > 0:
		text += strings.TrimSpace(n.Signal + " " + strings.Join(codes, ", "))
	case strings.HasPrefix(n.Basis, "no data"):
		text += "NO DATA"
	default:
		text += "No hazard statement computed"
	}
	for _, note := range n.Notes {
		if _, worst, ok := strings.Cut(note, "treat as the worst ingredient: "); ok {
			text += "; untested, as the worst ingredient: " + worst
		}
		if strings.Contains(note, "no hazard data") {
			text += "; " + note
		}
	}
	return text + "."
}

// whatIf lists failures of a kind of step with what to do (common practice),
// with the plan's own numbers where it has them.
func whatIf(s planner.StepReport) []string {
	var list []string
	switch s.Do {
	case "add", "make-up", "react":
		reached := "the temperature reached was not assessed"
		if s.IfCoolingLost > 0 {
			reached = "up to " + celsiusText(s.IfCoolingLost)
		}
		list = append(list, "Cooling lost: "+reached+". Stop the addition, keep stirring, ice into the bath.",
			"Stirrer stops: stop the addition. What was added lies unreacted: restart slowly, watch the thermometer.",
			"Added too fast: temperature runs ahead. Stop, cool, wait until it falls.")
	case "heat", "co-distil", "boil-down", "distil", "strip":
		list = append(list, "Condenser water lost: vapour escapes. Heat off, source away, sash down.",
			"Boils dry: stop while at least a tenth of the liquid is left.")
	case "extract", "wash", "separate":
		list = append(list, "Pressure builds: vent often, away from faces. No closed funnel while gas forms.",
			"Layers do not part: wait, then brine. Do not heat, do not throw a layer away before the end.")
	case "neutralise", "acidify":
		list = append(list, "Foams up: stop adding, stir; the vessel holds three times the volume.",
			"Too warm: pause and cool.")
	case "quench":
		list = append(list, "Gas or heat comes suddenly: stop adding, sash down, cool.",
			"Test still shows oxidant: more reductant in portions, test again; never into the drain.")
	case "filter", "rinse", "dry":
		list = append(list, "Filter or solid dries out: keep oxidiser residues wet, away from paper dust and flames.")
	}
	if s.Gas > 0 && s.Do != "neutralise" && s.Do != "acidify" {
		list = append(list, "Outlet blocked: pressure. Never close the vessel while gas is given off.")
	}
	return list
}

// minimise has the blanks for controls and the precautionary statements.
func (h *hazardSheet) minimise() {
	h.heading("Minimise: controls", 40)
	for _, label := range []string{"less hazardous way considered", "hood or containment", "gloves: material, thickness, change every", "eyes and face, body", "monitoring or health surveillance"} {
		h.room(8)
		h.blank(marginLeft, h.y, h.right-marginLeft-h.measure(family, "", textSize, label)-1.5, label)
		h.y += 8
	}
	var codes []string
	for _, n := range h.plan.Hazards {
		if n.At != planner.AsStored && !n.Formed {
			continue
		}
		for _, p := range n.P {
			if !slices.Contains(codes, p) {
				codes = append(codes, p)
			}
		}
	}
	slices.SortStableFunc(codes, strings.Compare)
	var lines []string
	for _, code := range codes {
		lines = append(lines, chem.StatementLine(code))
	}
	if len(lines) == 0 {
		lines = []string{"No precautionary statements on record: no data"}
	}
	for i := range lines {
		lines[i] = sentence(lines[i])
	}
	h.room(3 * lineHeight)
	h.put(family, "B", textSize, textLeft, h.y, "Precautionary statements of the substances used and formed")
	h.y += lineHeight
	h.paragraph("", textLeft, h.right-textLeft, strings.Join(lines, " "))
}

// prepare has waste, people and signatures.
func (h *hazardSheet) prepare() {
	h.heading("Prepare: waste", 35)
	if len(h.plan.Waste) == 0 {
		h.paragraph("", textLeft, h.right-textLeft, "No waste computed: not assessed.")
	}
	for _, w := range h.plan.Waste {
		h.wasteLot(w)
	}
	h.heading("Prepare: people and signatures", 70)
	for _, row := range [][2]string{{"done by", "trained on"}, {"second person nearby", "lone or unattended work"}, {"people exposed, and how long", "designated area"},
		{"assessed by", "date"}, {"reviewed by", "date"}, {"next review", "changed since the last approval"}} {
		h.room(9)
		half := (h.right - marginLeft) / 2
		h.blank(marginLeft, h.y, half-h.measure(family, "", textSize, row[0])-5, row[0])
		h.blank(marginLeft+half, h.y, half-h.measure(family, "", textSize, row[1])-1.5, row[1])
		h.y += 9
	}
}

func (h *hazardSheet) wasteLot(w planner.WasteLot) {
	where := w.Carboy
	if where == "" {
		where = "no carboy"
	} else if !w.Fits {
		where += ", DOES NOT FIT"
	}
	texts := []styledText{{"B", fmt.Sprintf("%s: %s, %s", w.Stream, volumeText(w.Volume), where)}}
	stream, known := chem.WasteStreamNamed(w.Stream)
	if known {
		texts = append(texts, styledText{"", sentence(strings.Join(nonEmpty(stream.How, stream.Never, "codes that often apply: "+strings.ReplaceAll(strings.Join(nonEmpty(stream.CodeUS, stream.CodeEU), ", "), "<=", "≤ ")), "; ") + "; defer to local law and the contractor")})
	} else {
		texts = append(texts, styledText{"", "No rule on record for this stream: not assessed."})
	}
	if w.Note != "" {
		texts = append(texts, styledText{"B", sentence(w.Note)})
	}
	for _, n := range h.plan.Hazards {
		if n.At == planner.InWaste && strings.HasPrefix(n.What, w.Stream+":") {
			texts = append(texts, styledText{"", vesselText(n)})
		}
	}
	lines := h.flow(texts, 0, 0)
	h.room(min(float64(len(lines))*lineHeight, 40))
	h.writeLines(lines, 0)
	h.y += 1.5
}

func nonEmpty(texts ...string) []string {
	var list []string
	for _, t := range texts {
		if t != "" {
			list = append(list, t)
		}
	}
	return list
}

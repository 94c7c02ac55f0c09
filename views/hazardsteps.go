package views

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/planner"
)

// assess goes through the run step by step; what only goes to waste is a table.
func (h *hazardSheet) assess() {
	h.heading("Assess: step by step", 50)
	h.paragraph("", textLeft, h.right-textLeft, "Codes are those of the mixture in the vessel at its fullest moment, each layer by itself. Physical hazards of mixtures need a test that nobody made: “untested” ones are taken from the ingredient named. “As in step n” holds for the controls too. A step without “what if” was not assessed beyond the stop order on page 1.")
	h.y += 2
	said := said{}
	var discards []planner.StepReport
	for _, s := range h.plan.Steps {
		if s.Do == "discard" && len(s.Cautions) == 0 {
			discards = append(discards, s)
			continue
		}
		h.step(s, said)
	}
	if len(h.plan.Steps) == 0 {
		h.paragraph("", textLeft, h.right-textLeft, "No steps: not assessed.")
	}
	h.discards(discards)
}

// step writes one step: its numbers, what is in the vessel at the worst moment,
// cautions, and what if. A step that brings nothing new is short.
func (h *hazardSheet) step(s planner.StepReport, said said) {
	contents, again := h.contents(s, said)
	failures, failed := said.once("what if", s.N, whatIf(s))
	brief := len(contents) == 0 && len(failures) == 0 && len(s.Cautions) == 0
	lead := styledText{lead: s.Name, text: stepNumbers(s) + references(again, failed)}
	texts := []styledText{lead}
	for _, text := range contents {
		texts = append(texts, styledText{text: text})
	}
	var pictograms []string
	least := 0.0
	if !brief {
		pictograms, least = h.stepPictograms(s), 2*lineHeight
	}
	const side = 2*lineHeight - 0.5
	obstacle := float64(len(pictograms)) * (side + 1)
	lines := h.flow(texts, obstacle, least)
	h.room(max(least, float64(min(len(lines), 4))*lineHeight))
	for i, code := range pictograms {
		h.drawPictogram(code, h.right-float64(len(pictograms)-i)*(side+1), h.y, side)
	}
	h.putRight(family, "B", 13, textLeft-4, h.y-0.5, fmt.Sprint(s.N))
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
	if !brief {
		h.controls()
	}
	h.y += 0.7
	h.rule(hairline)
	h.y += 1.3
}

// controls is the blank for what protects in a step: after the last line if
// there is room to write, else on a line of its own.
func (h *hazardSheet) controls() {
	const label, gap, least = "controls, gloves", 4.0, 34.0
	width := h.measure(family, "", textSize, label) + 1.5
	x, y := h.end+gap, h.y-lineHeight
	if h.right-x < width+least {
		h.room(lineHeight + 1)
		x, y = textLeft, h.y+0.5
		h.y += lineHeight + 0.5
	}
	x = max(x, h.right-width-90)
	h.blank(x, y, h.right-x-width, label)
	h.y++
}

// contents are the layers in the vessel of a step that no step before had, and
// the steps that had the others.
func (h *hazardSheet) contents(s planner.StepReport, said said) (fresh []string, again []string) {
	layers := 0
	for _, n := range h.plan.Hazards {
		if n.Step != s.N || n.Formed {
			continue
		}
		layers++
		key := n.What + "\x00" + strings.Join(n.Statements, "\x00")
		before, ok := said[key]
		if !ok {
			said[key] = s.N
		}
		if !ok || before == s.N {
			fresh = append(fresh, vesselText(n))
			continue
		}
		layer, _, _ := strings.Cut(n.What, ":")
		again = appendOnce(again, fmt.Sprintf("%s as in step\u00a0%d", layer, before))
	}
	if len(fresh) == 0 && len(again) > 0 && sameStep(again) {
		_, step, _ := strings.Cut(again[0], " as in ")
		again = []string{"contents as in " + step}
	}
	if layers == 0 {
		again = []string{"contents not assessed"}
	}
	return fresh, again
}

// sameStep reports that all references lead to one step.
func sameStep(again []string) bool {
	_, first, _ := strings.Cut(again[0], " as in ")
	return !slices.ContainsFunc(again, func(text string) bool { return !strings.HasSuffix(text, " as in "+first) })
}

// references are what a step has in common with steps before, in a sentence.
func references(lists ...[]string) string {
	all := slices.Concat(lists...)
	if len(all) == 0 {
		return ""
	}
	return " " + sentence(strings.Join(all, "; "))
}

// said remembers in which step something was said, so that it isn't said again.
type said map[string]int

// once returns those of the texts that no step said before, and the steps that
// said the others.
func (s said) once(what string, step int, texts []string) (fresh, again []string) {
	for _, text := range texts {
		before, ok := s[text]
		if !ok {
			s[text] = step
			fresh = append(fresh, text)
			continue
		}
		again = appendOnce(again, fmt.Sprintf("%s as in step\u00a0%d", what, before))
	}
	return fresh, again
}

// discards is the table of where what is thrown away goes.
func (h *hazardSheet) discards(steps []planner.StepReport) {
	if len(steps) == 0 {
		return
	}
	h.room(float64(min(len(steps)+1, 15)) * lineHeight) // on one page, if it isn't long
	h.put(family, "B", textSize, textLeft, h.y, "Where it goes: steps that only discard, see “Prepare: waste”")
	h.y += lineHeight
	what, vessel := textLeft, textLeft+44
	stream := vessel + 50
	for _, s := range steps {
		to := s.Stream
		if to == "" {
			to = "stream not assessed"
		}
		columns := [][]string{
			h.split(family, "B", textSize, s.Name, vessel-what-2),
			h.split(family, "", textSize, wareName(s.Vessel)+atText(s), stream-vessel-2),
			h.split(family, "", textSize, to, h.right-stream),
		}
		rows := max(len(columns[0]), len(columns[1]), len(columns[2]))
		h.room(float64(rows) * lineHeight)
		h.putRight(family, "B", textSize, textLeft-4, h.y, fmt.Sprint(s.N))
		for c, x := range []float64{what, vessel, stream} {
			style := ""
			if c == 0 {
				style = "B"
			}
			for i, line := range columns[c] {
				h.put(family, style, textSize, x, h.y+float64(i)*lineHeight, line)
			}
		}
		h.y += float64(rows) * lineHeight
	}
}

// atText names the temperature of what is thrown away hot or cold.
func atText(s planner.StepReport) string {
	switch t := s.Temperature.Celsius(); {
	case s.Temperature <= 0:
		return ", temperature not assessed"
	case t > 40 || t < 0:
		return ", at " + celsiusText(s.Temperature)
	}
	return ""
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
		s.end = textLeft + s.measure(family, style, textSize, line)
		s.y += lineHeight
	}
}

// stepPictograms gathers the pictograms of what is in the vessel and what forms.
func (h *hazardSheet) stepPictograms(s planner.StepReport) []string {
	var codes []string
	for _, n := range h.plan.Hazards {
		if n.Step != s.N {
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
	if s.IfCoolingLost > 0 {
		words = append(words, "up to "+celsiusText(s.IfCoolingLost)+" if cooling is lost")
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
			text += "; untested: " + codesOnly(worst)
		}
		if strings.Contains(note, "no hazard data") {
			text += "; " + note
		}
	}
	return text + "."
}

// codesOnly leaves the classes off: "Flam. Liq. 2 H225 (ethyl acetate)" gives
// "H225 (ethyl acetate)".
func codesOnly(worst string) string {
	parts := strings.Split(worst, "), ")
	for i, part := range parts {
		class, ingredient, ok := strings.Cut(part, " (")
		if at := strings.LastIndex(class, " H"); ok && at >= 0 {
			parts[i] = class[at+1:] + " (" + ingredient
		}
	}
	return strings.Join(parts, "), ")
}

// whatIf lists failures of a kind of step with what to do (common practice),
// with the plan's own numbers where it has them.
func whatIf(s planner.StepReport) []string {
	var list []string
	switch s.Do {
	case "add", "make-up", "react":
		list = append(list, "Cooling lost: the step gives the temperature reached, or it was not assessed. Stop the addition, keep stirring, ice into the bath.",
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

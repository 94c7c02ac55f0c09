package views

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// The first page of a hazard sheet: what to do in an emergency, and the scale.

// emergency is the strip that is read first.
func (h *hazardSheet) emergency() {
	h.rule(1.2)
	h.y += 3
	h.put(family, "B", 16, marginLeft, h.y, "In an emergency")
	h.y += 8
	for i, line := range h.stopOrder() {
		h.numbered(i+1, line)
	}
	h.y += 1
	for _, row := range [][2]string{{"Spill", h.spill()}, {"Fire", h.fire()}, {"First aid", firstAid}} {
		h.labelled(row[0], row[1])
	}
	h.y += 2
	x := h.blank(marginLeft, h.y, 45, "emergency number")
	h.blank(x, h.y, h.right-x-h.measure(family, "", textSize, "safety officer")-1.5, "safety officer")
	h.y += 8
	x = h.blank(marginLeft, h.y, 45, "first aider")
	h.blank(x, h.y, h.right-x-h.measure(family, "", textSize, "assembly point")-1.5, "assembly point")
	h.y += 8
	h.rule(1.2)
	h.y += 3
}

func (h *hazardSheet) numbered(n int, text string) {
	lines := h.split(family, "B", 12, text, h.right-textLeft)
	h.room(float64(len(lines)) * 5.5)
	h.putRight(family, "B", 12, textLeft-4, h.y, fmt.Sprint(n))
	for _, line := range lines {
		h.put(family, "B", 12, textLeft, h.y, line)
		h.y += 5.5
	}
}

// labelled writes a label in the margin and text beside it.
func (s *sheet) labelled(label, text string) {
	const column = 26.0
	lines := s.split(family, "", textSize, text, s.right-marginLeft-column)
	s.room(float64(min(len(lines), 3)) * lineHeight)
	s.put(family, "B", textSize, marginLeft, s.y, label)
	for _, line := range lines {
		s.room(lineHeight)
		s.put(family, "", textSize, marginLeft+column, s.y, line)
		s.y += lineHeight
	}
}

// stopOrder is the order in which a run is stopped (common practice), by the
// kinds of its steps.
func (h *hazardSheet) stopOrder() []string {
	var order []string
	if h.anyStep("add", "make-up", "neutralise", "acidify", "quench") {
		order = append(order, "Stop the addition.")
	}
	if h.anyStep("heat", "co-distil", "boil-down", "strip", "distil", "react") {
		order = append(order, "Heating off, heat source away; leave condenser water on.")
	}
	order = append(order, "Leave stirring and cooling on.", "Sash down, everybody out of the room.", "Call the number below; wait for help at the door, with this sheet.")
	return order
}

func (h *hazardSheet) anyStep(kinds ...string) bool {
	return slices.ContainsFunc(h.plan.Steps, func(s planner.StepReport) bool { return slices.Contains(kinds, s.Do) })
}

// hasPictogram reports a pictogram on anything stored or in a vessel.
func (h *hazardSheet) hasPictogram(code string) bool {
	return slices.ContainsFunc(h.plan.Hazards, func(n planner.HazardNote) bool { return slices.Contains(n.Pictograms, code) })
}

// spill names absorbents by what is there, and the carbonate that all the
// strong acid takes.
func (h *hazardSheet) spill() string {
	var words []string
	if m := carbonateForAcid(h.plan); m > 0 {
		words = append(words, "strong acid: sodium hydrogencarbonate, at least "+massText(m)+" for all of it, sprinkled from the edge (it foams)")
	}
	if h.hasPictogram("GHS03") {
		words = append(words, "oxidiser: inert absorbent only, no paper and no sawdust; keep it wet")
	}
	if h.hasPictogram("GHS02") {
		words = append(words, "flammable liquid: flames and switches first, then inert absorbent")
	}
	words = append(words, "anything else: inert absorbent, into a closed labelled container")
	return strings.Join(words, "; ") + "."
}

// carbonateForAcid is the sodium hydrogencarbonate that neutralises every strong
// mineral acid of the run: one mole for each acid hydrogen of the formula
// (row WA-149 of the table of waste rules for sulfuric acid, 1.713 g per g).
func carbonateForAcid(p *planner.Plan) chem.Mass {
	carbonate, ok := chem.LookupSubstance("sodium hydrogencarbonate")
	if !ok {
		return 0
	}
	total := chem.Mass(0)
	for _, n := range p.Needs {
		s, ok := chem.LookupSubstance(n.Substance)
		if !ok || s.MolarMass <= 0 || !slices.ContainsFunc(s.ReactiveGroups, func(g int) bool { return g == 1 || g == 2 }) {
			continue
		}
		f, err := chem.ParseFormula(s.Formula)
		if err != nil {
			continue
		}
		hydrogens := f.Count("H")
		total += carbonate.MolarMass.Mass(chem.Amount(hydrogens) * s.MolarMass.Of(n.Mass))
	}
	return total
}

func (h *hazardSheet) fire() string {
	switch flammable, oxidiser := h.hasPictogram("GHS02"), h.hasPictogram("GHS03"); {
	case flammable && oxidiser:
		return "carbon dioxide or dry powder on burning liquid; much water on the oxidiser, because smothering does not stop it. Only a small fire, only with the way out behind you."
	case oxidiser:
		return "much water: smothering does not stop an oxidiser. Only a small fire, only with the way out behind you."
	}
	return "carbon dioxide or dry powder. Only a small fire, only with the way out behind you."
}

const firstAid = "skin or eyes: water for at least 15 minutes, clothes off under the shower; breathed in: fresh air; swallowed: rinse the mouth, no vomiting. Then a doctor in every case, with this sheet."

// scale is the box of sizes.
func (h *hazardSheet) scale() {
	p := h.plan
	h.heading("Scale", 20)
	factor := "no proven scale on record: treat as a first run"
	if p.Scale.Factor > 0 {
		factor = figures(p.Scale.Factor, 2) + " times the largest proven scale"
	}
	h.labelled("This run", fmt.Sprintf("%s of %s from %s of %s; %s", massPlain(p.Target.Mass), p.Target.Substance, amountText(p.Scale.Amount), p.Scale.Limiting, factor))
	h.labelled("Heat", h.worstHeat())
	h.labelled("Gas", h.worstGas())
	h.labelled("Fullest", h.fullest())
	h.labelled("Special", h.special())
	for _, f := range p.Findings {
		if f.Severity >= planner.Warning {
			text := f.Text
			if f.Would != "" {
				text += "; " + f.Would
			}
			h.labelled("Warning", text)
		}
	}
}

func (h *hazardSheet) worstHeat() string {
	worst := planner.StepReport{}
	for _, s := range h.plan.Steps {
		if s.Heat > worst.Heat {
			worst = s
		}
	}
	if worst.Heat <= 0 {
		return "not assessed, or none given off"
	}
	text := fmt.Sprintf("at most %s, in step %d (%s)", heatText(worst.Heat), worst.N, worst.Name)
	if worst.IfCoolingLost > 0 {
		text += "; " + celsiusText(worst.IfCoolingLost) + " if cooling is lost"
	} else {
		text += "; temperature without cooling not assessed"
	}
	return text + ". Onset of decomposition: not assessed, it must be measured."
}

func (h *hazardSheet) worstGas() string {
	worst := planner.StepReport{}
	for _, s := range h.plan.Steps {
		if s.Gas > worst.Gas {
			worst = s
		}
	}
	if worst.Gas <= 0 {
		return "none computed; gases of side reactions not assessed"
	}
	return fmt.Sprintf("at most %s of %s at 20 °C, in step %d (%s)", volumeText(worst.Gas), worst.GasOf, worst.N, worst.Name)
}

func (h *hazardSheet) fullest() string {
	worst := planner.StepReport{}
	for _, s := range h.plan.Steps {
		if s.Vessel.Fill > worst.Vessel.Fill {
			worst = s
		}
	}
	if worst.Vessel.Fill <= 0 {
		return "not assessed"
	}
	return fmt.Sprintf("%s of %s in step %d (%s)", percentText(worst.Vessel.Fill), wareName(worst.Vessel), worst.N, worst.Name)
}

// special names what calls for more than the usual care: carcinogens and the
// like, what kills in small amounts, and what the law watches.
func (h *hazardSheet) special() string {
	var cmr, fatal, watched []string
	for _, n := range h.plan.Hazards {
		if n.At != planner.AsStored && !n.Formed {
			continue
		}
		for _, c := range n.Classes {
			switch {
			case strings.HasPrefix(c, "Carc."), strings.HasPrefix(c, "Muta."), strings.HasPrefix(c, "Repr."):
				cmr = appendOnce(cmr, n.What)
			case strings.HasPrefix(c, "Acute Tox. 1"), strings.HasPrefix(c, "Acute Tox. 2"):
				fatal = appendOnce(fatal, n.What)
			}
		}
	}
	for _, n := range h.plan.Needs {
		if !n.Count && len(chem.PurchaseNotes(n.Substance, 0)) > 0 {
			watched = appendOnce(watched, n.Substance)
		}
	}
	var words []string
	for _, kind := range []struct {
		what  string
		names []string
	}{{"causes or may cause cancer, genetic damage or harm to reproduction", cmr}, {"fatal in small amounts", fatal}, {"watched by law, look it up", watched}} {
		if len(kind.names) > 0 {
			words = append(words, kind.what+": "+strings.Join(kind.names, ", "))
		}
	}
	if len(words) == 0 {
		return "none on record; that is not evidence that there is none"
	}
	return sentence(strings.Join(words, "; "))
}

func appendOnce(list []string, item string) []string {
	if slices.Contains(list, item) {
		return list
	}
	return append(list, item)
}

func wareName(v planner.VesselReport) string {
	if v.Ware != "" {
		return v.Ware
	}
	if v.Size > 0 {
		return v.Kind + " " + volumePlain(v.Size)
	}
	return v.Kind
}

package views

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

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
		if strings.HasPrefix(lines[i], "P501 ") {
			lines[i] += " Here: as under “Prepare: waste”, by local rules."
		}
	}
	h.room(3 * lineHeight)
	h.put(family, "B", textSize, marginLeft, h.y, "Precautionary statements of the substances used and formed")
	h.y += lineHeight
	h.paragraph("", marginLeft, h.right-marginLeft, strings.Join(lines, " "))
}

// prepare has waste, people and signatures.
func (h *hazardSheet) prepare() {
	h.heading("Prepare: waste", 20)
	if len(h.plan.Waste) == 0 {
		h.paragraph("", textLeft, h.right-textLeft, "No waste computed: not assessed.")
	}
	for _, w := range h.plan.Waste {
		h.wasteLot(w)
	}
	h.heading("Prepare: people and signatures", 52)
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
	texts := []styledText{{style: "B", text: fmt.Sprintf("%s: %s, %s", w.Stream, volumeText(w.Volume), where)}}
	stream, known := chem.WasteStreamNamed(w.Stream)
	if known {
		texts = append(texts, styledText{text: sentence(strings.Join(nonEmpty(stream.How, stream.Never, "codes that often apply: "+strings.ReplaceAll(strings.Join(nonEmpty(stream.CodeUS, stream.CodeEU), ", "), "<=", "≤ ")), "; ") + "; defer to local law and the contractor")})
	} else {
		texts = append(texts, styledText{text: "No rule on record for this stream: not assessed."})
	}
	if w.Note != "" {
		texts = append(texts, styledText{style: "B", text: sentence(w.Note)})
	}
	for _, n := range h.plan.Hazards {
		if n.At == planner.InWaste && strings.HasPrefix(n.What, w.Stream+":") {
			texts = append(texts, styledText{text: vesselText(n)})
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

package views

import (
	"fmt"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// What a pick list says after the bottles: consumables, glassware, waste
// containers and the gate before the start.

func (l *pickList) consumables() {
	var rows []planner.Need
	for _, n := range l.plan.Needs {
		if n.Count {
			rows = append(rows, n)
		}
	}
	if len(rows) == 0 {
		return
	}
	l.heading("Consumables", 14)
	for _, n := range rows {
		place := "not on the shelf"
		if len(n.Draws) > 0 {
			place = n.Draws[0].Bottle.Code + ", " + n.Draws[0].Place.String()
		}
		l.tickLine(n.Substance, place, piecesText(n.Pieces))
	}
}

// tickLine is a box to tick with a name, a remark and an amount at the right.
func (l *sheet) tickLine(name, remark, amount string) {
	const gap = 3.0
	amountWidth := l.measure(family, "B", amountSize, amount)
	lines := l.split(family, "", textSize, remark, l.right-textLeft-amountWidth-gap)
	if remark == "" {
		lines = nil
	}
	nameLines := l.split(family, "B", textSize, name, l.right-textLeft-amountWidth-gap)
	height := max(float64(len(nameLines)+len(lines))*lineHeight, tickSide) + 1.5
	l.room(height)
	l.tick(marginLeft, l.y)
	l.putRight(family, "B", amountSize, l.right, l.y-0.8, amount)
	y := l.y
	for _, line := range nameLines {
		l.put(family, "B", textSize, textLeft, y, line)
		y += lineHeight
	}
	for _, line := range lines {
		l.put(family, "", textSize, textLeft, y, line)
		y += lineHeight
	}
	l.y += height
}

// glassware lists each vessel once, with the step that fills it most.
func (l *pickList) glassware() {
	type ware struct {
		name  string
		steps []string
		size  chem.Volume
		none  bool // the lab owns none that fits
	}
	var wares []ware
	index := map[string]int{}
	for _, st := range l.plan.Steps {
		v := st.Vessel
		name := v.Ware
		if name == "" {
			name = v.Kind
		}
		if name == "" {
			continue
		}
		key := name + "\x00" + v.Name
		i, ok := index[key]
		if !ok {
			i = len(wares)
			index[key] = i
			wares = append(wares, ware{name: name, size: v.Size})
		}
		wares[i].steps = append(wares[i].steps, fmt.Sprint(st.N))
		wares[i].size = max(wares[i].size, v.Size)
		wares[i].none = wares[i].none || v.Ware == "" && !v.Fits
	}
	if len(wares) == 0 && len(l.used) == 0 {
		return
	}
	l.heading("Glassware and tools", 14)
	for _, w := range wares {
		size := ""
		if w.size > 0 {
			size = volumePlain(w.size)
		}
		remark := "for " + stepsWord(w.steps)
		if w.none {
			remark += "; NONE OF THE LAB'S FITS: see the run page"
		}
		l.tickLine(w.name, remark, size)
	}
	for _, t := range l.used {
		l.tickPlain(t + ", to whose division amounts are rounded")
	}
}

func stepsWord(steps []string) string {
	if len(steps) == 1 {
		return "step " + steps[0]
	}
	return "steps " + strings.Join(steps, ", ")
}

func (l *pickList) wasteContainers() {
	if len(l.plan.Waste) == 0 {
		return
	}
	l.heading("Waste containers to bring", 22)
	for _, w := range l.plan.Waste {
		remark := w.Stream
		if w.Note != "" {
			remark += "; " + w.Note
		}
		name := w.Carboy
		switch {
		case name == "":
			name = "NO CARBOY: set one up first"
		case !w.Fits:
			name += ": NOT ENOUGH ROOM or not compatible"
		}
		l.tickLine(name, remark, volumeText(w.Volume))
	}
}

// beforeStart is the gate before a run: unticked means not started (common
// practice).
func (l *pickList) beforeStart() {
	checks := []string{
		"This sheet is current: the code shows revision " + l.plan.Revision,
		"The hazard sheet is read, filled in and signed",
		"Hood: flow shown, sash moves, no alarm, nothing else runs in it",
		"Eyewash and shower are free; someone nearby knows about the run",
		"Spill absorbent that suits these substances is at hand",
		"Cooling is ready" + iceWord(l.plan),
		"What destroys the left-over reagent is made up before the reagent",
		"Glassware is free of stars and cracks and of the sizes listed",
		"Waste containers are labelled and have room",
		"Every bottle's name, strength and code agree with this list",
	}
	if len(l.plan.Budget.Stretches) > 0 {
		checks = append(checks, startText(l.plan.Budget))
	}
	l.heading("Before the start", float64(len(checks))*(tickSide+1.5)+24)
	l.put(family, "", textSize, textLeft, l.y, "An empty box means that the run does not start.")
	l.y += lineHeight + 1.5
	for _, c := range checks {
		l.tickPlain(c)
	}
	l.room(12)
	l.y += 4
	x := l.blank(textLeft, l.y, 55, "checked by")
	x = l.blank(x, l.y, 25, "date")
	l.blank(x, l.y, 20, "time")
	l.y += 8
}

// tickPlain is a box to tick with a sentence.
func (l *sheet) tickPlain(text string) {
	lines := l.split(family, "", textSize, text, l.right-textLeft)
	height := max(float64(len(lines))*lineHeight, tickSide) + 1.5
	l.room(height)
	l.tick(marginLeft, l.y)
	for i, line := range lines {
		l.put(family, "", textSize, textLeft, l.y+1+float64(i)*lineHeight, line)
	}
	l.y += height
}

func iceWord(p *planner.Plan) string {
	most := chem.Mass(0)
	for _, s := range p.Steps {
		most = max(most, s.Ice)
	}
	if most <= 0 {
		return ""
	}
	return ", with " + massText(most) + " of ice"
}

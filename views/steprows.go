package views

import (
	"cmp"
	"fmt"
	"html/template"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// stepRow is one vessel of the walk-through strip.
type stepRow struct {
	planner.StepReport
	Picture template.HTML
	Ware    string
	Into    []string
	Inside  string   // how much of each phase at the fullest moment
	Holds   []string // the same with the largest parts of each phase
	Lines   []string // what everybody has to know
	More    []string // the rest
	Explain string   // address of how its numbers came about, or ""
	At      string   // address of the step by itself, or ""
	Held    chem.Mass
}

// stepRows makes the strip. Where gives the address of something about a step:
// "explain" or "step"; it may be "" where there is nothing.
func stepRows(steps []planner.StepReport, where func(about string, n int) string) []stepRow {
	largest := largestVessel(steps)
	rows := make([]stepRow, len(steps))
	for i, s := range steps {
		rows[i] = stepRow{StepReport: s, Picture: drawStep(s, largest), Ware: wareText(s.Vessel), Into: intoLines(s.Adds), Inside: insideText(s.Contents), Holds: phaseLines(s.Contents)}
		told, more := tellingSays(s)
		rows[i].Lines, rows[i].More = append(told, stepLines(s)...), more
		rows[i].At = where("step", s.N)
		for _, c := range s.Contents {
			rows[i].Held += c.Mass
		}
		if len(s.Derivations) > 0 || len(s.Adds) > 0 {
			rows[i].Explain = where("explain", s.N)
		}
	}
	return rows
}

func largestVessel(steps []planner.StepReport) chem.Volume {
	var v chem.Volume
	for _, s := range steps {
		v = max(v, s.Vessel.Size)
	}
	return v
}

// wareText names the vessel of a step with its size and fill.
func wareText(v planner.VesselReport) string {
	kind := v.Kind
	if kind == "" {
		kind = v.Name
	}
	switch {
	case v.Size > 0 && v.Fits:
		return volumePlain(v.Size) + " " + kind + ", " + fillText(v.Fill) + " full"
	case v.Size > 0:
		return volumePlain(v.Size) + " " + kind + " is too small: " + fillText(v.Fill) + " full, at most " + percentText(v.Limit)
	}
	return kind + ", size not chosen"
}

// intoLines says what goes into a vessel; several portions of the same are one
// line.
func intoLines(adds []planner.Add) []string {
	var lines []string
	for i, a := range adds {
		portions := 1
		if slices.ContainsFunc(adds[:i], func(b planner.Add) bool { return b.Substance == a.Substance }) {
			continue
		}
		for _, b := range adds[i+1:] {
			if b.Substance == a.Substance {
				a.Mass, a.Volume, a.Pieces = a.Mass+b.Mass, a.Volume+b.Volume, a.Pieces+b.Pieces
				a.HasVolume = a.HasVolume && b.HasVolume
				portions++
			}
		}
		line := addedText(a) + " " + a.Substance
		if portions > 1 {
			line += fmt.Sprintf(" in %d portions", portions)
		}
		lines = append(lines, line)
	}
	return lines
}

func addedText(a planner.Add) string {
	switch {
	case a.Pieces > 0:
		return piecesText(a.Pieces)
	case a.HasVolume && a.Volume > 0:
		return volumeText(a.Volume)
	}
	return massText(a.Mass)
}

// mostSays is how many of a step's own remarks stand under its vessel at once.
const mostSays = 2

// tellingSays parts what a step says into what stands under its vessel and what
// is opened on demand. What the lines below say anyway is left out; what is not
// assessed is never hidden.
func tellingSays(s planner.StepReport) (told, more []string) {
	for _, say := range s.Says {
		say = bound(say)
		switch {
		case repeats(say, s):
		case strings.Contains(say, "not assessed") || strings.Contains(say, "no data") || len(told) < mostSays:
			told = append(told, say)
		default:
			more = append(more, say)
		}
	}
	return told, more
}

// repeats reports whether a remark gives a number that stepLines gives too.
func repeats(say string, s planner.StepReport) bool {
	return s.Heat != 0 && (strings.HasPrefix(say, "gives off ") || strings.HasPrefix(say, "takes up ")) ||
		s.Shortest > 0 && strings.HasPrefix(say, "not faster than ") ||
		s.Gas > 0 && strings.HasPrefix(say, with(trimmed(s.Gas.Litres(), 3), "L")+" of "+s.GasOf)
}

// stepLines are the numbers of a step in words.
func stepLines(s planner.StepReport) []string {
	var lines []string
	if s.Shortest > 0 {
		lines = append(lines, "no faster than "+timeText(s.Shortest))
	}
	if q := s.Heat.Kilojoules(); q >= 0.5 {
		lines = append(lines, heatText(s.Heat)+" given off"+iceText(s.Ice))
	} else if q <= -0.5 {
		lines = append(lines, heatText(-s.Heat)+" taken up"+iceText(s.Ice))
	}
	if s.Gas > chem.Millilitre {
		lines = append(lines, volumeText(s.Gas)+" of "+cmp.Or(s.GasOf, "gas")+" given off")
	}
	if s.IfCoolingLost > 0 {
		lines = append(lines, "if cooling stops: "+celsiusText(s.IfCoolingLost))
	}
	if when := whenText(s); when != "" {
		lines = append(lines, when)
	}
	if s.HoldPoint {
		lines = append(lines, strings.TrimSpace("may stand here "+bound(s.HoldNote)))
	}
	return lines
}

func iceText(ice chem.Mass) string {
	if ice <= 0 {
		return ""
	}
	return ", ice " + massText(ice)
}

// whenText is the temperature of a step and how long it takes.
func whenText(s planner.StepReport) string {
	var parts []string
	if s.Temperature > 0 {
		parts = append(parts, "at "+celsiusText(s.Temperature))
	}
	switch {
	case s.TimeNotAssessed:
		parts = append(parts, "time not assessed")
	case s.Time > 0:
		parts = append(parts, "takes "+timeText(s.Time))
	}
	return strings.Join(parts, ", ")
}

// contentRow is a component of a vessel at the fullest moment of a step.
type contentRow struct {
	First bool // of its step
	Rows  int  // of its step
	N     int
	Name  string
	planner.Content
}

func contentRows(steps []planner.StepReport) []contentRow {
	var rows []contentRow
	for _, s := range steps {
		for i, c := range s.Contents {
			rows = append(rows, contentRow{First: i == 0, Rows: len(s.Contents), N: s.N, Name: s.Name, Content: c})
		}
	}
	return rows
}

// insideText is how much of each phase a vessel holds: liquids by volume, solids
// and gases by mass.
func insideText(contents []planner.Content) string {
	var parts []string
	for _, phase := range []string{"aqueous", "organic", "solid", "gas"} {
		var volume chem.Volume
		var mass chem.Mass
		for _, c := range contents {
			if c.Phase == phase {
				volume, mass = volume+c.Volume, mass+c.Mass
			}
		}
		switch {
		case mass <= 0:
		case volume > 0 && (phase == "aqueous" || phase == "organic"):
			parts = append(parts, volumeText(volume)+" "+phase)
		default:
			parts = append(parts, massText(mass)+" "+phase)
		}
	}
	return strings.Join(parts, ", ")
}

// WarmText is how warm a step is, or "–".
func (r stepRow) WarmText() string {
	if r.Temperature <= 0 {
		return "–"
	}
	return celsiusText(r.Temperature)
}

// LongText is how long a step takes; what isn't known is said to be.
func (r stepRow) LongText() string {
	if r.TimeNotAssessed {
		return "not assessed"
	}
	return timeText(r.Time)
}

// FullText is how full the vessel of a step is and may be.
func (r stepRow) FullText() string {
	if r.Vessel.Size <= 0 {
		return "not assessed"
	}
	text := fillText(r.Vessel.Fill)
	if r.Vessel.Limit > 0 {
		text += " of at most " + fillText(r.Vessel.Limit)
	}
	return text
}

// LostText is how warm the step gets without cooling; it is only asked of a
// step that gives heat off.
func (r stepRow) LostText() string {
	switch {
	case r.IfCoolingLost > 0:
		return celsiusText(r.IfCoolingLost)
	case r.Heat.Kilojoules() >= 0.5 && r.Do != "cool":
		return "not assessed"
	}
	return "–"
}

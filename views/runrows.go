package views

import (
	"cmp"
	"fmt"
	"html/template"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// needRow is a line of the needs table.
type needRow struct {
	planner.Need
	N       int
	Word    string
	Amount  string // pure, or pieces
	Draws   []drawRow
	Lack    string // what is short, in words
	Chance  string
	Note    string
	Explain string // address part of the derivation
}

// drawRow is a bottle in a line of the needs table.
type drawRow struct {
	Code, Place string
	Picture     template.HTML
	Amount      string
	Why         string
	Explain     string
}

func (p *runPage) needRows() []needRow {
	rows := make([]needRow, len(p.Plan.Needs))
	for i, n := range p.Plan.Needs {
		rows[i] = needRow{
			Need: n, N: i + 1, Word: n.State.String(), Amount: neededText(n), Lack: lackText(n),
			Chance: chanceOf(n), Note: noteOf(n), Explain: fmt.Sprintf("need-%d", i+1),
		}
		for j, d := range n.Draws {
			rows[i].Draws = append(rows[i].Draws, drawRow{
				Code: d.Bottle.Code, Place: d.Place.String(), Picture: drawBottle(d.Bottle, d.Form, 27),
				Amount: drawnText(d), Why: d.Why, Explain: fmt.Sprintf("draw-%d-%d", i+1, j+1),
			})
		}
	}
	return rows
}

func neededText(n planner.Need) string {
	if n.Count {
		return piecesText(n.Pieces)
	}
	return massText(n.Mass)
}

// drawnText gives a draw as it is measured out: by volume where the bottle is
// measured by volume and the density is known, else by mass or by count.
func drawnText(d planner.Draw) string {
	switch {
	case d.Form.Measure == inventory.ByCount:
		return piecesText(d.Pieces)
	case d.Form.Measure == inventory.ByVolume && d.HasVolume:
		return volumeText(d.Volume)
	}
	return massText(d.Mass)
}

// lackText says what no fit bottle covers.
func lackText(n planner.Need) string {
	switch {
	case n.Count && n.ShortPieces > 0:
		return piecesText(n.ShortPieces) + " short"
	case n.Short > 0:
		return massText(n.Short) + " short"
	}
	return ""
}

// chanceOf is the chance of running short in words; what nothing covers has
// none to speak of.
func chanceOf(n planner.Need) string {
	if n.State == planner.Short || n.State == planner.Unfit {
		return "–"
	}
	return chanceText(n.ChanceShort)
}

// noteOf is the small print beside a substance: why it is needed where the
// recipe doesn't say, and why its state isn't "covered".
func noteOf(n planner.Need) string {
	var parts []string
	if n.Hidden && n.Why != "" {
		parts = append(parts, n.Why)
	}
	if n.Because != "" && n.State != planner.Covered {
		parts = append(parts, n.Because)
	}
	return strings.Join(parts, " · ")
}

// stepRow is one vessel of the walk-through strip.
type stepRow struct {
	planner.StepReport
	Picture template.HTML
	Ware    string
	Into    []string
	Lines   []string // what everybody has to know
	More    []string // the rest
	Explain string   // address of how its numbers came about, or ""
	At      string   // address of the step by itself, or ""
}

// stepRows makes the strip. Where gives the address of something about a step:
// "explain" or "step"; it may be "" where there is nothing.
func stepRows(steps []planner.StepReport, where func(about string, n int) string) []stepRow {
	largest := largestVessel(steps)
	rows := make([]stepRow, len(steps))
	for i, s := range steps {
		rows[i] = stepRow{StepReport: s, Picture: drawStep(s, largest), Ware: wareText(s.Vessel), Into: intoLines(s.Adds)}
		told, more := tellingSays(s)
		rows[i].Lines, rows[i].More = append(told, stepLines(s)...), more
		rows[i].At = where("step", s.N)
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
	return s.Heat != 0 && strings.HasPrefix(say, "gives off ") ||
		s.Shortest > 0 && strings.HasPrefix(say, "not faster than ") ||
		s.Gas > 0 && strings.HasPrefix(say, trimmed(s.Gas.Litres(), 3)+" L of "+s.GasOf)
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
		lines = append(lines, strings.TrimSpace("may stand here "+s.HoldNote))
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

// wasteRow is a waste lot with the carboy that takes it, drawn as it would
// stand afterwards.
type wasteRow struct {
	planner.WasteLot
	Picture template.HTML
	After   string
}

func wasteRows(lots []planner.WasteLot, carboys []inventory.Carboy) []wasteRow {
	rows := make([]wasteRow, len(lots))
	for i, lot := range lots {
		rows[i].WasteLot = lot
		for _, c := range carboys {
			if c.Code == lot.Carboy && c.SizeUL > 0 {
				c.ContentUL += int64(lot.Volume / chem.Microlitre)
				rows[i].Picture = drawCarboy(c, 40)
				rows[i].After = fillText(chem.Fraction(float64(c.ContentUL)/float64(c.SizeUL))) + " full after this run"
			}
		}
	}
	return rows
}

// riskWords says what the draws of the whole run say. Nothing is said of what
// was not assessed but that.
func riskWords(r planner.Risk) []string {
	if r.Draws == 0 {
		return []string{"The chance of running short is not assessed."}
	}
	words := []string{fmt.Sprintf("Drawn %d times with seed %d: the product comes to %s, in nine runs of ten between %s and %s.",
		r.Draws, r.Seed, massText(r.MassMedian), massText(r.MassLow), massText(r.MassHigh))}
	if r.TargetMet >= 0 {
		words = append(words, "What is wanted is reached in "+chanceText(r.TargetMet)+" of runs.")
	}
	if r.RunEnough >= 0 {
		words = append(words, "Everything suffices in "+chanceText(r.RunEnough)+" of runs"+decides(r)+".")
	}
	if r.WeighFirst != "" {
		words = append(words, "Weighing bottle "+r.WeighFirst+" first takes the chance of running short from "+
			chanceText(r.WeighBefore)+" to "+chanceText(r.WeighAfter)+".")
	}
	if r.ScaleFor90 > 0 {
		words = append(words, "With the same charge "+massText(r.ScaleFor90)+" can be promised with "+with("90", "%")+" certainty.")
	}
	return words
}

func decides(r planner.Risk) string {
	if r.Decides == "" {
		return ""
	}
	return "; what decides it is " + r.Decides
}

// paperCheck says whether a printed sheet still holds.
type paperCheck struct {
	Printed string
	Current bool
}

func checkPaper(printed string, plan *planner.Plan) *paperCheck {
	if printed == "" || plan == nil {
		return nil
	}
	return &paperCheck{printed, printed == plan.Revision}
}

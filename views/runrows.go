package views

import (
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
	Parts   []partRow
	Explain string // address part of the derivation
}

// partRow is what one key of hidden charges adds to a need.
type partRow struct {
	Key, Amount, Why string
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
			Chance: chanceOf(n), Note: noteOf(n), Parts: partRows(n), Explain: fmt.Sprintf("need-%d", i+1),
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

// partRows sums the hidden charges of a need by their keys, with the reason of
// each charge.
func partRows(n planner.Need) []partRow {
	sums := map[string]planner.Need{}
	reasons := map[string][]planner.HiddenPart{}
	var keys []string
	for _, part := range n.Parts {
		sum, met := sums[part.Key]
		if !met {
			keys = append(keys, part.Key)
			sum.Count = n.Count
		}
		sum.Mass += part.Mass
		sum.Pieces += part.Pieces
		sums[part.Key] = sum
		reasons[part.Key] = append(reasons[part.Key], part)
	}
	rows := make([]partRow, len(keys))
	for i, key := range keys {
		rows[i] = partRow{key, neededText(sums[key]), bound(reasonText(reasons[key]))}
	}
	return rows
}

// reasonText says why each of some charges is made; what is the same for all of
// them is said once.
func reasonText(parts []planner.HiddenPart) string {
	same := !slices.ContainsFunc(parts, func(p planner.HiddenPart) bool { return p.Why != parts[0].Why })
	if same {
		return parts[0].Why
	}
	texts := make([]string, len(parts))
	for i, p := range parts {
		texts[i] = fmt.Sprintf("step %d: %s", p.Step, p.Why)
	}
	return strings.Join(texts, "; ")
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

// noteOf is the small print beside a substance: why its state isn't "covered".
func noteOf(n planner.Need) string {
	if n.State == planner.Covered {
		return ""
	}
	return bound(n.Because)
}

// wasteRow is a waste lot with the carboy that takes it, drawn as it would
// stand afterwards.
type wasteRow struct {
	planner.WasteLot
	Picture template.HTML
	After   string
	Explain string // address part of the derivation
}

func wasteRows(lots []planner.WasteLot, carboys []inventory.Carboy) []wasteRow {
	rows := make([]wasteRow, len(lots))
	for i, lot := range lots {
		rows[i].WasteLot = lot
		rows[i].Explain = fmt.Sprintf("waste-%d", i+1)
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

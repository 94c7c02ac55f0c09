package views

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// PickList prints what to fetch for a run: the bottles in walking order by
// carrier, each with its code, place, amount to the tool's division and room to
// write, then consumables, glassware, waste containers and the ticks before the
// start. What the shelf doesn't cover comes first.
func PickList(p *planner.Plan, o PaperOptions) ([]byte, error) {
	s, err := newSheet(p, o, "Pick list")
	if err != nil {
		return nil, err
	}
	l := &pickList{sheet: s, tools: toolsOf(p, o)}
	l.missing()
	if err := l.bottles(); err != nil {
		return nil, err
	}
	l.consumables()
	l.glassware()
	l.wasteContainers()
	l.beforeStart()
	return s.finish()
}

func toolsOf(p *planner.Plan, o PaperOptions) []inventory.Equipment {
	if len(o.Tools) > 0 {
		return o.Tools
	}
	return p.Tools
}

type pickList struct {
	*sheet
	tools []inventory.Equipment
	used  []string // tools that amounts were rounded to, in order
}

// Columns of the list, from the right edge.
const (
	codeWidth    = 52.0
	amountColumn = 58.0 // right edge of amounts, from the right edge of the page
	nameSize     = 13.0
)

// missing lists what no fit bottle covers, so that nobody starts without it.
func (l *pickList) missing() {
	var short []planner.Need
	for _, n := range l.plan.Needs {
		if n.State > planner.Tight {
			short = append(short, n)
		}
	}
	if len(short) == 0 {
		return
	}
	l.heading("Not ready: do not start", 12)
	for _, n := range short {
		lines := l.split(family, "", textSize, shortText(n), l.right-textLeft)
		l.room(float64(len(lines)+1) * lineHeight)
		l.put(family, "B", textSize, textLeft, l.y, n.Substance+": "+n.State.String())
		l.y += lineHeight
		for _, line := range lines {
			l.put(family, "", textSize, textLeft, l.y, line)
			l.y += lineHeight
		}
		l.y++
	}
}

func shortText(n planner.Need) string {
	var words []string
	switch {
	case n.Count && n.ShortPieces > 0:
		words = append(words, piecesText(n.ShortPieces)+" missing")
	case n.Short > 0:
		words = append(words, massText(n.Short)+" missing of "+massText(n.Mass)+" (pure substance)")
	}
	if n.Because != "" {
		words = append(words, n.Because)
	}
	if n.CoveredOn.Set() {
		words = append(words, "covered from "+n.CoveredOn.Short())
	}
	if len(words) == 0 {
		return "see the run page"
	}
	return strings.Join(words, "; ")
}

// fetch is one bottle to fetch, with the need it is for.
type fetch struct {
	need planner.Need
	draw planner.Draw
}

func (l *pickList) bottles() error {
	fetches := fetchesByCode(l.plan)
	carriers := l.plan.Carriers
	if rest := notCarried(l.plan); len(rest) > 0 {
		carriers = append(slices.Clone(carriers), planner.Carrier{Bottles: rest, Note: "not grouped: carry these one by one"})
	}
	for i, c := range carriers {
		title := fmt.Sprintf("Carrier %d of %d", i+1, len(carriers))
		if c.N == 0 {
			title = "One by one"
		}
		l.heading(title, 58)
		l.carrierNote(c)
		for _, code := range c.Bottles {
			f, ok := fetches[code]
			if !ok {
				continue // a carrier names only bottles that are drawn from
			}
			if err := l.bottle(f); err != nil {
				return err
			}
		}
	}
	return nil
}

func (l *pickList) carrierNote(c planner.Carrier) {
	words := []string{fmt.Sprintf("%d bottles", len(c.Bottles))}
	if len(c.Bottles) == 1 {
		words[0] = "1 bottle"
	}
	if c.Mass > 0 {
		words = append(words, massText(c.Mass)+" with the glass")
	}
	if c.Note != "" {
		words = append(words, c.Note)
	}
	l.put(family, "", textSize, textLeft, l.y, strings.Join(words, "; "))
	l.y += lineHeight + 2
}

// fetchesByCode gathers what is drawn from each bottle: several needs may draw
// from one, and it is fetched once.
func fetchesByCode(p *planner.Plan) map[string]fetch {
	byCode := map[string]fetch{}
	for _, n := range p.Needs {
		if n.Count {
			continue
		}
		for _, d := range n.Draws {
			f, ok := byCode[d.Bottle.Code]
			if !ok {
				byCode[d.Bottle.Code] = fetch{n, d}
				continue
			}
			f.need.Exact = f.need.Exact || n.Exact
			f.draw.Mass += d.Mass
			f.draw.Volume += d.Volume
			f.draw.Leaves = min(f.draw.Leaves, d.Leaves)
			f.draw.LeavesVolume = min(f.draw.LeavesVolume, d.LeavesVolume)
			f.draw.Opens = f.draw.Opens || d.Opens
			f.draw.Steps = slices.Concat(f.draw.Steps, d.Steps)
			byCode[d.Bottle.Code] = f
		}
	}
	return byCode
}

// notCarried lists bottles drawn from that no carrier holds, in walking order.
func notCarried(p *planner.Plan) []string {
	carried := map[string]bool{}
	for _, c := range p.Carriers {
		for _, code := range c.Bottles {
			carried[code] = true
		}
	}
	var draws []planner.Draw
	for _, n := range p.Needs {
		for _, d := range n.Draws {
			if !n.Count && !carried[d.Bottle.Code] {
				carried[d.Bottle.Code] = true
				draws = append(draws, d)
			}
		}
	}
	slices.SortStableFunc(draws, func(a, b planner.Draw) int {
		if a.Place.Walk != b.Place.Walk {
			return a.Place.Walk - b.Place.Walk
		}
		return strings.Compare(a.Bottle.Code, b.Bottle.Code)
	})
	var codes []string
	for _, d := range draws {
		codes = append(codes, d.Bottle.Code)
	}
	return codes
}

// bottle writes one bottle and keeps it on one page.
func (l *pickList) bottle(f fetch) error {
	bars, err := code128Bars(f.draw.Bottle.Code)
	if err != nil {
		return err
	}
	exact := l.exact(f)
	amounts := l.amounts(f.draw.Mass, f.draw.Volume, f.draw.HasVolume, exact, true)
	edge := l.right - amountColumn // right edge of the amounts
	const amountWidth, nameHeight, amountHeight = 34.0, 6.0, 6.5
	names := l.split(family, "B", nameSize, f.draw.Form.Name, edge-amountWidth-textLeft)
	beside := float64(len(amounts))*amountHeight + 0.5 // so far down the amounts reach
	below := float64(len(names)) * nameHeight
	var lines []string
	for _, d := range l.details(f) {
		for d != "" {
			limit := edge - textLeft
			if below+float64(len(lines))*lineHeight < beside {
				limit -= amountWidth
			}
			var first string
			first, d = l.firstLine(family, "", textSize, d, limit)
			lines = append(lines, first)
		}
	}
	height := max(below+float64(len(lines))*lineHeight, 20) + 9
	l.room(height + 2)

	l.tick(marginLeft, l.y)
	for i, line := range names {
		l.put(family, "B", nameSize, textLeft, l.y+float64(i)*nameHeight, line)
	}
	for i, a := range amounts {
		l.putRight(family, "B", amountSize, edge, l.y-0.8+float64(i)*amountHeight, a)
	}
	if !exact {
		l.putRight(family, "", textSize, edge-l.measure(family, "B", amountSize, amounts[0])-1.5, l.y+0.3, "about")
	}
	x := l.right - codeWidth
	l.drawBars(bars, x, l.y, codeWidth, 11)
	l.put(family, "B", amountSize, x+4, l.y+12, f.draw.Bottle.Code)
	for i, line := range lines {
		style := ""
		if i == 0 && exact {
			style = "B"
		}
		l.put(family, style, textSize, textLeft, l.y+below+float64(i)*lineHeight, line)
	}
	l.blanks(f, l.y+height-7.5)
	l.y += height
	l.rule(hairline)
	l.y += 3
	return nil
}

// blanks are for what was really done.
func (l *pickList) blanks(f fetch, y float64) {
	x := l.blank(textLeft, y, 24, "actual")
	x = l.blank(x, y, 22, "lot")
	if f.draw.Opens {
		const label = "open new bottle: write date"
		l.put(family, "", textSize, x, y, label)
		x += l.measure(family, "", textSize, label) + 1.5
		const width = 20.0
		l.pdf.Rect(x, y-0.8, width, tickSide, "D")
		x += width + 4
	}
	l.blank(x, y, l.right-x-l.measure(family, "", textSize, "initials")-1.5, "initials")
}

// amounts writes mass and volume, rounded to the tool.
func (l *pickList) amounts(m chem.Mass, v chem.Volume, hasVolume, exact, note bool) []string {
	mass := measuredMass(m, exact, l.tools)
	lines := []string{mass.text}
	tools := []string{mass.tool}
	if hasVolume && v > 0 {
		volume := measuredVolume(v, l.tools)
		lines = append(lines, volume.text)
		tools = append(tools, volume.tool)
	}
	if note {
		for _, t := range tools {
			l.use(t)
		}
	}
	return lines
}

func (l *pickList) use(tool string) {
	if tool != "" && !slices.Contains(l.used, tool) {
		l.used = append(l.used, tool)
	}
}

// exact reports whether a charge must be weighed exactly; the rest are "about".
func (l *pickList) exact(f fetch) bool {
	return f.need.Substance == l.plan.Scale.Limiting || f.need.Exact
}

// details are the lines under the name of a bottle.
func (l *pickList) details(f fetch) []string {
	d := f.draw
	var lines []string
	switch {
	case f.need.Substance == l.plan.Scale.Limiting:
		lines = append(lines, "EXACT: limiting reagent")
	case f.need.Exact:
		lines = append(lines, "EXACT")
	}
	lines = append(lines, d.Place.String())
	if len(d.Steps) > 0 {
		lines = append(lines, l.forSteps(f))
	}
	heel := "leaves " + massText(d.Leaves)
	if d.HasVolume && d.LeavesVolume > 0 {
		heel += " (" + volumeText(d.LeavesVolume) + ")"
	}
	heel += "; return to this place"
	if d.Leaves <= 0 {
		heel = "empties the bottle, which does not go back"
	}
	lines = append(lines, heel+"; "+expiryText(d.Bottle)+"; "+contentText(d.Bottle))
	return append(lines, spareText(f.need), l.hazardWords(f))
}

// spareText names the bottle to take if this one turns out not to serve.
func spareText(n planner.Need) string {
	if n.Next == nil {
		return "spare: none"
	}
	text := "spare: " + n.Next.Bottle.Code + ", " + n.Next.Place.String()
	if len(n.Draws) > 0 && n.Next.Form.Name != n.Draws[0].Form.Name {
		text += ", " + n.Next.Form.Name
	}
	return text + "; plan again first"
}

func expiryText(b inventory.Bottle) string {
	if !b.Expiry.Set() {
		return "no expiry date on record"
	}
	return "use by " + dateText(b.Expiry)
}

// contentText says how the content of a bottle was found out.
func contentText(b inventory.Bottle) string {
	how, ok := map[inventory.MeasuredBy]string{inventory.ByUnopened: "unopened", inventory.ByWeighing: "weighed", inventory.ByLedger: "content by the ledger",
		inventory.ByLevel: "level read", inventory.ByGuess: "content guessed"}[b.MeasuredBy]
	if !ok {
		return "content not measured"
	}
	if b.MeasuredOn.Set() {
		how += " on " + dateText(b.MeasuredOn)
	}
	return how
}

// dateText is a date that isn't broken over two lines.
func dateText(d inventory.Date) string { return strings.ReplaceAll(d.Short(), " ", "\u00a0") }

// forSteps says what part goes into which step.
func (l *pickList) forSteps(f fetch) string {
	var words []string
	for _, part := range f.draw.Steps {
		amount := strings.Join(l.amounts(part.Mass, part.Volume, f.draw.HasVolume, l.exact(f), false), " or ")
		words = append(words, fmt.Sprintf("for step\u00a0%d: %s", part.Step, amount))
	}
	return strings.Join(words, "; ")
}

// hazardWords names the pictograms in words, for a copy on which they would be
// unreadable.
func (l *pickList) hazardWords(f fetch) string {
	for _, h := range l.plan.Hazards {
		if h.At != planner.AsStored || h.What != f.draw.Form.Name && h.What != f.need.Substance {
			continue
		}
		var words []string
		for _, code := range h.Pictograms {
			words = append(words, pictogramName(code))
		}
		switch {
		case strings.HasPrefix(h.Basis, "no data"):
			return "hazards: no data"
		case h.Signal == "" && len(words) == 0:
			return "hazards: no pictogram; see the hazard sheet"
		}
		return strings.TrimPrefix(h.Signal+": "+strings.Join(words, ", "), ": ")
	}
	return "hazards: no data"
}

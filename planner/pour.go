package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// dose is a charge with its names looked up.
type dose struct {
	charge
	component int
	ask       int
	waterAsk  int // of a charge made up in water; -1 otherwise
	phase     int // for byPhaseVolume; -1 for all contents
}

// dose enters a charge and its asks.
func (c *compiler) dose(ch charge) (dose, error) {
	if ch.dimension == inPieces {
		return dose{charge: ch, component: noComponent, ask: c.pieces(ch.substance, ch.hiddenKey, ch.hiddenWhy), waterAsk: -1}, nil
	}
	i, err := c.component(ch.substance)
	if err != nil {
		return dose{}, err
	}
	d := dose{charge: ch, component: i, waterAsk: -1}
	if ch.rule == byPhaseVolume {
		d.phase = map[string]int{"aqueous": aqueous, "organic": organic, "contents": -1}[ch.of]
	}
	d.ask = c.ask(i, ch.accept, ch.rule, ch.hiddenKey, ch.exact)
	c.p.asks[d.ask].Why = ch.hiddenWhy
	if ch.madeUp > 0 {
		d.waterAsk = c.ask(c.p.water, Accept{}, ch.rule, ch.hiddenKey, false)
		c.p.asks[d.waterAsk].Why = ch.hiddenWhy
	}
	return d, nil
}

// noComponent stands for a consumable that is counted and isn't part of the balance.
const noComponent = -1

// piecesOf returns how many pieces of a consumable go into a batch.
func (w *Workspace) piecesOf(d *dose) float64 {
	if d.rule == fixedRule {
		return d.size / w.batches
	}
	return d.size
}

// doses enters several charges.
func (c *compiler) doses(list []charge) ([]dose, error) {
	var doses []dose
	for _, ch := range list {
		d, err := c.dose(ch)
		if err != nil {
			return nil, err
		}
		doses = append(doses, d)
	}
	return doses, nil
}

// ask enters what the step asks of the shelf, without the amount.
func (c *compiler) ask(component int, accept Accept, rule scaleRule, key string, exact bool) int {
	m := &c.p.matter[component]
	c.p.asks = append(c.p.asks, Ask{
		Substance: m.name, CAS: m.cas, Formula: m.written, Step: c.step.N, StepName: c.step.Name,
		Accept: accept, Rule: ruleWords[rule], Hidden: key != "", Key: key, Exact: exact,
	})
	return len(c.p.asks) - 1
}

// pieces enters a consumable that is counted.
func (c *compiler) pieces(name, key, why string) int {
	c.p.asks = append(c.p.asks, Ask{
		Substance: name, Step: c.step.N, StepName: c.step.Name, Rule: ruleWords[perBatch], Hidden: key != "", Key: key, Why: why,
	})
	return len(c.p.asks) - 1
}

// stockFor says what is drawn for an ask: the bottle's composition if one is
// given, else what the recipe asks for at the middle of its window.
func (p *Program) stockFor(a *Ask, stocks map[string]Stock) stockOf {
	nominal := stockOf{pure: 1, form: a.Substance}
	if a.Accept.Most > 0 {
		nominal.pure = float64(float64(a.Accept.Least+a.Accept.Most) / 2)
		nominal.water = 1 - nominal.pure
		nominal.planned = nominal.water / nominal.pure
	}
	if s, ok := stocks[a.Substance]; ok && s.Pure > 0 {
		return stockOf{float64(s.Pure), float64(s.Water), nominal.planned, float64(s.Density), s.Form, true}
	}
	return nominal
}

// amountOf returns the amount in mol that a dose puts into place v at this scale.
func (w *Workspace) amountOf(d *dose, v int) float64 {
	m := &w.p.matter[d.component]
	factor := 1.0
	switch d.rule {
	case byMole:
		factor = w.limiting
	case bySurface:
		factor = chem.Raised(w.limiting/float64(d.at), 2.0/3)
	case fixedRule:
		factor = 1 / w.batches
	case byPhaseVolume:
		return w.amountIn(d, d.size*w.phaseVolume(v, d.phase))
	}
	switch size := d.size * factor; d.dimension {
	case inMass:
		return size * w.strengthOf(d) / m.molar
	case inVolume:
		return w.amountIn(d, size)
	default:
		return size
	}
}

func (w *Workspace) phaseVolume(v, phase int) float64 {
	if phase < 0 {
		return w.filled(v)
	}
	return w.volume(v, phase)
}

// strengthOf returns the mass fraction that a mass or volume in the recipe
// refers to: that of the solution made up, else that of the stock asked for.
func (w *Workspace) strengthOf(d *dose) float64 {
	switch {
	case d.madeUp > 0:
		return float64(d.madeUp)
	case d.strength.most > 0:
		return float64(d.strength.least+d.strength.most) / 2
	}
	return 1
}

// amountIn returns the amount of pure substance in a volume of what the recipe
// names: the liquid, or the solution at its strength.
func (w *Workspace) amountIn(d *dose, volume float64) float64 {
	m := &w.p.matter[d.component]
	s := w.strengthOf(d)
	if d.component == w.p.water {
		return volume * waterDensity / m.molar
	}
	perKilogram := m.volumeOf(s, 1-s) + (1-s)/waterDensity
	return volume / perKilogram * s / m.molar
}

// pour puts n mol of a dose into its home phase in place v, with the water its
// stock brings, and books it. It returns the mass of the stock drawn.
func (w *Workspace) pour(d *dose, v int, n float64) float64 {
	if d.hiddenKey != "" && w.off[d.ask] {
		return 0
	}
	if d.waterAsk < 0 {
		return w.draw(d.ask, d.component, v, n)
	}
	before := w.brought[v]
	total := w.draw(d.ask, d.component, v, n)
	pure := float64(n * w.p.matter[d.component].molar)
	water := pure/float64(d.madeUp) - pure - float64(total*w.stocks[d.ask].water)
	w.draw(d.waterAsk, w.p.water, v, water/w.p.matter[w.p.water].molar)
	w.brought[v] = before - math.Min(water, 0)
	return total
}

// draw takes n mol of a component off the shelf for an ask and puts it into
// place v; it returns the mass of the stock. Water in the stock goes in too and
// is noted, to be taken off a water charge.
func (w *Workspace) draw(ask, component, v int, n float64) float64 {
	if !(n > 0) {
		return 0
	}
	m := &w.p.matter[component]
	s := &w.stocks[ask]
	pure := float64(n * m.molar)
	stock := pure / s.pure
	water := stock * s.water / w.p.matter[w.p.water].molar
	w.amounts[w.at(v, m.home, component)] += n
	w.amounts[w.at(v, aqueous, w.p.water)] += water
	w.came[component] += n
	w.came[w.p.water] += water
	w.brought[v] += float64(stock*s.water) - float64(pure*s.planned)
	w.used[ask] += float64(pure)
	w.dirty[v] = true
	if w.report != nil {
		w.report.drawn(w, ask, component, v, n, stock, water)
	}
	return stock
}

// countPieces books consumables; pH is what strips are there to read, 0 for
// anything else.
func (w *Workspace) countPieces(ask int, pieces, pH float64) {
	if w.off[ask] {
		return
	}
	w.used[ask] += pieces
	if w.report != nil {
		w.report.counted(w, ask, pieces, pH)
	}
}

// water puts the water a step plans into place v, less what the stocks have
// brought there, and returns what was taken off.
func (w *Workspace) waterCharge(d *dose, v int, n float64) (takenOff float64) {
	planned := float64(n * w.p.matter[w.p.water].molar)
	takenOff = math.Min(planned, w.brought[v])
	if takenOff < 0 {
		takenOff = math.Max(takenOff, -planned)
	}
	w.brought[v] -= takenOff
	w.pour(d, v, (planned-takenOff)/w.p.matter[w.p.water].molar)
	switch {
	case takenOff > 1e-9*planned:
		w.say("%.3g g of the water charge of %.3g g comes with the stocks", takenOff*1e3, planned*1e3)
	case takenOff < -1e-9*planned:
		w.say("%.3g g goes in beside the water charge of %.3g g, because the stocks bring less water than the recipe counts on", -takenOff*1e3, planned*1e3)
	}
	return takenOff
}

// pourAll puts several doses into place v, water last, so that what the other
// stocks bring can be taken off it. It returns the mass of what went in.
func (w *Workspace) pourAll(doses []dose, v int) {
	for i := range doses {
		switch d := &doses[i]; d.component {
		case w.p.water:
		case noComponent:
			w.countPieces(d.ask, w.piecesOf(d), 0)
		default:
			w.pour(d, v, w.amountOf(d, v))
		}
	}
	for i := range doses {
		if d := &doses[i]; d.component == w.p.water {
			w.waterCharge(d, v, w.amountOf(d, v))
		}
	}
}

// say adds numbers in words to the report of the step.
func (w *Workspace) say(format string, a ...any) {
	if w.report != nil {
		w.report.step.Says = append(w.report.step.Says, plainf(format, a...))
	}
}

// caution adds a caution to the report of the step.
func (w *Workspace) caution(format string, a ...any) {
	if w.report != nil {
		w.report.step.Cautions = append(w.report.step.Cautions, plainf(format, a...))
	}
}

// derive adds a derivation to the report of the step.
func (w *Workspace) derive(make func() chem.Derivation) {
	if w.report != nil {
		w.report.step.Derivations = append(w.report.step.Derivations, make())
	}
}

// counted says a number of things, "1 wash" or "3 washes".
func counted(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, many)
}

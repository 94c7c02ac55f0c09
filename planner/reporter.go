package planner

import (
	"cmp"
	"fmt"
	"slices"

	"stillroom/chem"
)

// reporter writes down what a walk-through finds: it is there only when
// somebody wants to read it.
type reporter struct {
	p     *Program
	walk  *Walk
	step  *StepReport
	asks  []Ask // by ask, of one batch
	flows map[flowKey]float64
	// most is the largest volume a vessel has held in this step.
	most  float64
	peaks []peak
	gases map[int]float64
	// dosing lists the steps that add something slowly.
	dosing []int
}

type flowKey struct{ from, to, component int }

// peak is how full a vessel gets in a step, for choosing the ware.
type peak struct {
	step, vessel int
	volume       float64
	limit        string // policy row of the fill limit that holds
}

const fromShelf = -1

func newReporter(p *Program) *reporter {
	r := &reporter{p: p, walk: &Walk{}, flows: map[flowKey]float64{}, asks: make([]Ask, len(p.asks))}
	copy(r.asks, p.asks)
	return r
}

// begin opens the report of a step.
func (r *reporter) begin(s *compiledStep) {
	r.walk.Steps = append(r.walk.Steps, StepReport{
		N: s.N, Do: s.Do, Name: s.Name, HoldPoint: s.Hold != "", HoldNote: s.Hold, Time: s.Time,
		TimeNotAssessed: s.Time == 0, Cautions: slices.Concat(s.Cautions, s.Controls),
	})
	r.step = &r.walk.Steps[len(r.walk.Steps)-1]
	r.most, r.gases = 0, map[int]float64{}
}

// flow notes n mol of component c going from one place to another.
func (r *reporter) flow(from, to, c int, n float64) { r.flows[flowKey{from, to, c}] += n }

// drawn notes what an ask took off the shelf.
func (r *reporter) drawn(w *Workspace, ask, c, v int, n, stock, water float64) {
	m := &r.p.matter[c]
	r.flow(fromShelf, v, c, n*w.batches)
	if water > 0 {
		r.flow(fromShelf, v, r.p.water, water*w.batches)
	}
	a := &r.asks[ask]
	pure := n * m.molar
	a.Amount += chem.Amount(n)
	a.Pure += chem.Mass(pure)
	a.Derivation = deriveCharge(w, a, c, ask, n, stock)
	add := Add{Substance: m.name, Form: w.stocks[ask].form, Mass: chem.Mass(stock), Amount: chem.Amount(n), Rule: a.Rule, Derivation: a.Derivation}
	if rho := w.stockDensity(ask, c); rho > 0 {
		add.Volume, add.HasVolume = chem.Volume(stock/rho), true
	}
	r.step.Adds = append(r.step.Adds, add)
}

// stockDensity is that of the bottle, else of the liquid or its solution; 0 for
// solids and where there is no data.
func (w *Workspace) stockDensity(ask, c int) float64 {
	s, m := &w.stocks[ask], &w.p.matter[c]
	if s.density > 0 {
		return s.density
	}
	if s.water > 0.01 && m.inWater != nil {
		return 1 / (m.volumeOf(s.pure, s.water) + s.water/waterDensity)
	}
	if m.cas == waterNumber {
		return waterDensity
	}
	if m.liquid {
		return m.density
	}
	return 0
}

// deriveCharge explains an amount that goes into a vessel.
func deriveCharge(w *Workspace, a *Ask, c, ask int, n, stock float64) chem.Derivation {
	m, s := &w.p.matter[c], &w.stocks[ask]
	source := "nominal stock of the recipe"
	if s.drawn {
		source = "stock drawn: " + s.form
	}
	return chem.Derivation{
		Of: m.name, Formula: "m = n · M / w",
		Inserted: plainf("%.6g mol · %.6g g/mol / %.6g = %.6g g", n, m.molar*1e3, s.pure, stock*1e3),
		Inputs: []chem.Input{
			{Symbol: "n", Name: "amount, " + a.Rule, Value: n, Unit: "mol", Source: fmt.Sprintf("step %d of the recipe at this scale", a.Step)},
			{Symbol: "M", Name: "molar mass of " + m.written, Value: m.molar * 1e3, Unit: "g/mol", Source: "standard atomic weights, IUPAC"},
			{Symbol: "w", Name: "mass fraction of pure, anhydrous substance in the stock", Value: s.pure, Source: source},
		},
		Value: stock * 1e3, Unit: "g", Source: "OpenStax Chemistry 2e, 4.3 and 4.4",
	}
}

// counted notes consumables.
func (r *reporter) counted(w *Workspace, ask int, pieces, pH float64) {
	a := &r.asks[ask]
	a.Pieces += pieces
	a.Why = plainf("%.3g for each batch", pieces)
	if pH != 0 {
		a.Why += plainf(", to read pH %.3g", pH)
	}
	r.step.Adds = append(r.step.Adds, Add{Substance: a.Substance, Pieces: pieces, Rule: a.Rule})
}

// sameFill is the relative difference of two volumes that counts as none: what
// rounding makes of it must not decide which contents are shown.
const sameFill = 1e-9

// fullest notes the contents of a vessel if it has never been so full in this
// step.
func (w *Workspace) fullest(v int) {
	r := w.report
	if r == nil || v >= w.p.vessels {
		return
	}
	volume := w.filled(v)
	r.peaks = append(r.peaks, peak{w.step.N, v, volume, r.limitKey(w.step, v)})
	if r.most > 0 && (v != w.step.vessel || volume <= r.most*(1+sameFill)) {
		return
	}
	r.most = volume
	r.step.Contents = w.contents(v)
	r.step.Temperature = chem.Celsius(w.celsius[v])
}

// unseen is the share of a vessel's mass below which a component isn't listed:
// no method of a bench lab would find it (a part in a thousand million).
const unseen = 1e-9

// contents lists what a place holds, phase by phase, the largest first.
func (w *Workspace) contents(v int) []Content {
	var list []Content
	all := w.massIn(v)
	for phase := range phaseCount {
		first := len(list)
		water := w.amounts[w.at(v, phase, w.p.water)] * w.p.matter[w.p.water].molar
		for c, n := range w.in(v, phase) {
			m := &w.p.matter[c]
			if n*m.molar <= unseen*all {
				continue
			}
			content := Content{Substance: m.name, Formula: m.written, Phase: phaseNames[phase], Amount: chem.Amount(n), Mass: chem.Mass(n * m.molar)}
			if phase != gas {
				content.Volume = chem.Volume(volumeBeside(m, n*m.molar, water, phase))
			}
			list = append(list, content)
		}
		slices.SortStableFunc(list[first:], func(a, b Content) int {
			return cmp.Or(-cmp.Compare(a.Mass, b.Mass), cmp.Compare(a.Substance, b.Substance))
		})
	}
	return list
}

func volumeBeside(m *matter, mass, water float64, phase int) float64 {
	if m.cas == waterNumber {
		return mass / waterDensity
	}
	if phase == aqueous {
		return m.volumeOf(mass, water)
	}
	return m.volumeOf(mass, 0)
}

// vent lets the gas of a place go and notes its volume at 20 °C.
func (w *Workspace) vent(v int) {
	for c, n := range w.in(v, gas) {
		if n <= 0 {
			continue
		}
		if w.report != nil {
			w.report.gases[c] += n
		}
		w.move(v, gas, w.p.air(), gas, c, n)
	}
}

// gasVolume is the molar volume of an ideal gas at 20 °C and 101.325 kPa, RT/p.
const gasVolume = chem.GasConstant * 293.15 / 101325

// end closes the report of a step.
func (r *reporter) end(w *Workspace) {
	r.step.Heat = chem.Energy(w.heat)
	var names []string
	for c := range r.p.matter {
		n := r.gases[c]
		if n <= 0 {
			continue
		}
		r.step.Gas += chem.Volume(n * gasVolume)
		names = append(names, r.p.matter[c].name)
	}
	for i, name := range names {
		if i > 0 {
			r.step.GasOf += ", "
		}
		r.step.GasOf += name
	}
	if r.step.Gas > 0 {
		r.step.Derivations = append(r.step.Derivations, deriveGas(r.step))
		w.say("%.3g L of %s at 20 °C: %.4g mol · R · T / p", r.step.Gas.Litres(), r.step.GasOf, float64(r.step.Gas)/gasVolume)
	}
}

// dosed notes that the step adds something at a rate that cooling limits.
func (r *reporter) dosed(w *Workspace) { r.dosing = append(r.dosing, w.step.N) }

func deriveGas(s *StepReport) chem.Derivation {
	n := float64(s.Gas) / gasVolume
	return chem.Derivation{
		Of: "gas given off", Formula: "V = n · R · T / p",
		Inserted: plainf("%.5g mol · 8.314 J/(mol K) · 293.15 K / 101.325 kPa = %.5g L", n, s.Gas.Litres()),
		Inputs: []chem.Input{
			{Symbol: "n", Name: s.GasOf, Value: n, Unit: "mol", Source: "balance of the step"},
		},
		Value: s.Gas.Litres(), Unit: "L", Range: "20 °C, 101.325 kPa, ideal; what stays dissolved isn't taken off", Source: "OpenStax Chemistry 2e, 14.4 to 14.7",
	}
}

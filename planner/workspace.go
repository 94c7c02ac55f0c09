package planner

import (
	"math"
	"slices"

	"stillroom/chem"
)

// Workspace holds the vessels of one walk-through in preallocated arrays. It
// belongs to one goroutine.
type Workspace struct {
	p *Program
	// limiting is the amount of limiting reagent in one batch, in mol.
	limiting float64
	batches  float64
	// amounts in mol by place, phase and component.
	amounts []float64
	celsius []float64 // temperature by place
	brought []float64 // water that stocks brought into a place, less what was taken off, in kg
	came    []float64 // by component: taken from the shelf, in mol
	used    []float64 // by ask: kg of pure substance, or pieces
	off     []bool    // by ask: switched off
	stocks  []stockOf // by ask
	factors []factorValue
	u       []float64 // nil: every factor at its mean
	dirty   []bool    // by place: changed since the last balance
	before  []float64 // elements, mass and charge: scratch of the balance
	held    []float64 // by place and component: at the last balance
	sums    []float64 // by component: over all places
	mix     []chem.Protolyte
	policy  policyFigures

	step       *compiledStep
	report     *reporter // nil in the fast walk
	heat       float64   // given off in this step, J
	balance    float64   // worst relative error so far
	spread     float64   // by how much partition coefficients differ from their values in this step
	arriving   float64   // product that arrives at its isolation, mol
	isolated   float64
	conditions Conditions
}

// stockOf is what is drawn for an ask.
type stockOf struct {
	pure, water float64
	// planned is the water in kg per kg of pure substance that the recipe counts
	// on with the strength it asks for.
	planned float64
	density float64 // kg/m3; 0 for no data
	form    string
	drawn   bool // from a real bottle, not as the recipe asks
}

// policyFigures are the rows of the policy that the walk reads on its way.
type policyFigures struct {
	heatU, heatGap, iceSpare, stillLeave     float64
	emulsionExtra, emulsionChance, scaleWarn float64
}

// Workspace makes a workspace for walking p under conditions.
func (p *Program) Workspace(in Conditions) *Workspace {
	n := len(p.matter)
	w := &Workspace{
		p: p, batches: float64(max(in.Batches, 1)), conditions: in,
		amounts: make([]float64, len(p.places)*phaseCount*n),
		celsius: make([]float64, len(p.places)),
		brought: make([]float64, len(p.places)),
		came:    make([]float64, n),
		used:    make([]float64, len(p.asks)),
		off:     make([]bool, len(p.asks)),
		stocks:  make([]stockOf, len(p.asks)),
		dirty:   make([]bool, len(p.places)),
		before:  make([]float64, 2*(len(p.elements)+2)),
		sums:    make([]float64, n),
		held:    make([]float64, len(p.places)*n),
		mix:     make([]chem.Protolyte, len(p.acids)),
	}
	w.limiting = float64(in.Limiting) / w.batches
	for i := range p.acids {
		w.mix[i] = chem.Protolyte{Name: p.acids[i].name, PKa: p.acids[i].pKa, Charge: p.acids[i].charge}
	}
	for i := range p.asks {
		w.stocks[i] = p.stockFor(&p.asks[i], in.Stocks)
		w.off[i] = p.asks[i].Hidden && slices.Contains(in.Off, p.asks[i].Key)
	}
	table := newPolicyTable(in.Policy)
	w.factors = p.valuesOf(table)
	w.policy = figuresOf(table)
	return w
}

func (w *Workspace) reset() {
	clear(w.amounts)
	clear(w.brought)
	clear(w.came)
	clear(w.used)
	clear(w.dirty)
	clear(w.held)
	clear(w.sums)
	clear(w.before)
	for i := range w.celsius {
		w.celsius[i] = roomCelsius
	}
	w.balance, w.arriving, w.isolated, w.spread = 0, 0, 0, 1
}

// roomCelsius is the temperature of the bench at which every vessel starts.
const roomCelsius = 20

// at returns the index of component c in a phase of place v.
func (w *Workspace) at(v, phase, c int) int { return (v*phaseCount+phase)*len(w.p.matter) + c }

// in returns the components of a phase.
func (w *Workspace) in(v, phase int) []float64 {
	n := len(w.p.matter)
	i := (v*phaseCount + phase) * n
	return w.amounts[i : i+n]
}

// total returns the amount of a component in all phases of place v.
func (w *Workspace) total(v, c int) float64 {
	sum := 0.0
	for phase := range phaseCount {
		sum += w.amounts[w.at(v, phase, c)]
	}
	return sum
}

// consume takes n mol of a component out of place v, from its home phase first.
func (w *Workspace) consume(v, c int, n float64) {
	home := w.p.matter[c].home
	n = w.drain(v, home, c, n)
	for phase := 0; phase < phaseCount && n > 0; phase++ {
		n = w.drain(v, phase, c, n)
	}
	if n > 0 {
		// What rounding asks for beyond the last trace: booked, so that the
		// balance shows it.
		w.amounts[w.at(v, home, c)] -= n
	}
}

func (w *Workspace) drain(v, phase, c int, n float64) float64 {
	i := w.at(v, phase, c)
	take := math.Min(n, math.Max(w.amounts[i], 0))
	w.amounts[i] -= take
	return n - take
}

// move carries n mol of a component from one place and phase to another.
func (w *Workspace) move(from, fromPhase, to, toPhase, c int, n float64) {
	if n == 0 {
		return
	}
	w.amounts[w.at(from, fromPhase, c)] -= n
	w.amounts[w.at(to, toPhase, c)] += n
	w.dirty[from], w.dirty[to] = true, true
	if w.report != nil && from != to {
		w.report.flow(from, to, c, n*w.batches)
	}
}

// movePhase carries a share of a phase from one place to the same phase of another.
func (w *Workspace) movePhase(from, to, phase int, share float64) {
	for c, n := range w.in(from, phase) {
		if n == 0 {
			continue
		}
		if share < 1 {
			n *= share
		}
		w.move(from, phase, to, phase, c, n)
	}
}

// moveAll carries everything in a place to another.
func (w *Workspace) moveAll(from, to int) {
	for phase := range phaseCount {
		w.movePhase(from, to, phase, 1)
	}
}

// mass returns the mass of a phase in kg.
func (w *Workspace) mass(v, phase int) float64 {
	sum := 0.0
	for c, n := range w.in(v, phase) {
		sum += float64(n * w.p.matter[c].molar)
	}
	return sum
}

// massOf returns the mass of everything in a place but gas, in kg.
func (w *Workspace) massIn(v int) float64 {
	return w.mass(v, aqueous) + w.mass(v, organic) + w.mass(v, solid)
}

// volume returns the volume of a liquid or solid phase in m3. An aqueous phase
// is water and what its solutes take up beside it, by the densities of their
// solutions; an organic one is the sum of its liquids.
func (w *Workspace) volume(v, phase int) float64 {
	list := w.in(v, phase)
	water := list[w.p.water] * w.p.matter[w.p.water].molar
	sum := water / waterDensity
	if phase == gas {
		return 0
	}
	for c, n := range list {
		if n <= 0 || c == w.p.water {
			continue
		}
		m := &w.p.matter[c]
		if phase == aqueous {
			sum += m.volumeOf(n*m.molar, water)
			continue
		}
		sum += m.volumeOf(n*m.molar, 0)
	}
	return sum
}

// filled returns the volume of everything but gas in a place, in m3.
func (w *Workspace) filled(v int) float64 {
	return w.volume(v, aqueous) + w.volume(v, organic) + w.volume(v, solid)
}

// value returns an uncertain quantity: its mean, or what the draw says.
func (w *Workspace) value(i int) float64 {
	f := &w.factors[i]
	if w.u == nil {
		return f.mean
	}
	return f.dist.Quantile(w.u[i])
}

// Uncertain returns the number of uncertain quantities: the length of the
// slice Sample takes.
func (p *Program) Uncertain() int { return len(p.factors) }

// UncertainName names uncertain quantity i, so that draws can be shared
// between plans.
func (p *Program) UncertainName(i int) string { return p.factors[i].name }

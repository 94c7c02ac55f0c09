package planner

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"stillroom/chem"
)

// Walk walks the recipe through once at the means of everything uncertain and
// reports what it finds. The error is a *StepError: a step that can't be done,
// with the number that decides and the nearest thing that works.
func (p *Program) Walk(in Conditions) (*Walk, error) {
	if !(in.Limiting > 0) || !chem.Finite(in.Limiting) {
		return nil, &StepError{Recipe: p.Recipe.Name, What: fmt.Sprintf("the amount of %s is %v mol", p.Recipe.Limiting, float64(in.Limiting)), Would: "give an amount above 0", Err: ErrScale}
	}
	w := p.Workspace(in)
	w.report = newReporter(p)
	if err := w.run(); err != nil {
		return nil, err
	}
	return w.report.finish(w), nil
}

// Sample walks the recipe through with the uncertain quantities at the
// quantiles u, one for each, and returns what came of it. The result belongs to
// the workspace.
func (p *Program) Sample(w *Workspace, u []float64) Outcome {
	w.u, w.report = u, nil
	err := w.run()
	for i := range w.used {
		w.used[i] *= w.batches
	}
	return Outcome{Product: chem.Mass(w.isolated * p.matter[p.product].molar * w.batches), Asks: w.used, Failed: err != nil}
}

// Run walks the recipe through at the means without a report, and returns the
// mass of product of all batches.
func (p *Program) Run(w *Workspace) (chem.Mass, error) {
	w.u, w.report = nil, nil
	err := w.run()
	return chem.Mass(w.isolated * p.matter[p.product].molar * w.batches), err
}

// run carries out every step and balances it.
func (w *Workspace) run() error {
	w.reset()
	for i := range w.p.steps {
		w.step = &w.p.steps[i]
		w.heat = 0
		if w.report != nil {
			w.report.begin(w.step)
		}
		if err := w.step.run.run(w); err != nil {
			return err
		}
		w.vent(w.step.vessel)
		if w.report != nil {
			w.report.end(w)
		}
		if err := w.balanceStep(); err != nil {
			return err
		}
	}
	return w.checkRun()
}

// balanceStep checks the step just done and keeps the worst error of the run in
// w.balance.
func (w *Workspace) balanceStep() error {
	worst := w.balance
	w.balance = 0
	err := w.checkStep()
	if w.report != nil {
		w.report.step.Balance = w.balance
	}
	w.balance = math.Max(worst, w.balance)
	return err
}

// finish puts the walk together.
func (r *reporter) finish(w *Workspace) *Walk {
	walk := r.walk
	walk.Batches = int(w.batches)
	walk.Balance = w.balance
	for i := range r.asks {
		a := r.asks[i]
		a.Pure *= chem.Mass(w.batches)
		a.Amount *= chem.Amount(w.batches)
		a.Pieces *= w.batches
		a.Index = i
		if a.Hidden && a.Pure > 0 && !hasNumber(a.Why) {
			a.Why = plainf("%s: %.3g g, %s", a.Why, a.Pure.Grams(), a.Rule)
		}
		if a.Pure == 0 && a.Pieces == 0 {
			continue
		}
		walk.Asks = append(walk.Asks, a)
	}
	for i := range walk.Waste {
		walk.Waste[i].times(w.batches)
	}
	walk.Product = r.product(w)
	walk.Flow = r.flowList()
	walk.Findings = append(walk.Findings, r.p.notes...)
	r.scaleFindings(w)
	r.chooseWare(w)
	for i := range walk.Steps {
		walk.Time += walk.Steps[i].Time
		if walk.Steps[i].TimeNotAssessed {
			walk.NotAssessed++
		}
	}
	return walk
}

func (d *Discard) times(x float64) {
	d.Mass *= chem.Mass(x)
	d.Volume *= chem.Volume(x)
	for i := range d.Contents {
		d.Contents[i].Amount *= chem.Amount(x)
		d.Contents[i].Mass *= chem.Mass(x)
		d.Contents[i].Volume *= chem.Volume(x)
	}
}

func (r *reporter) product(w *Workspace) Product {
	m := &r.p.matter[r.p.product]
	return Product{
		Substance: m.name, CAS: m.cas, Formula: m.written,
		Amount: chem.Amount(w.isolated * w.batches), Mass: chem.Mass(w.isolated * m.molar * w.batches),
		Arriving: chem.Amount(w.arriving * w.batches), Yield: r.p.Recipe.Yield, PerLimiting: r.p.perLimiting, yield: r.p.yield,
	}
}

// flowList returns the flows in the order of places and then of mass.
func (r *reporter) flowList() []Flow {
	keys := make([]flowKey, 0, len(r.flows))
	for k := range r.flows {
		keys = append(keys, k)
	}
	slices.SortFunc(keys, func(a, b flowKey) int {
		return cmp.Or(cmp.Compare(a.from, b.from), cmp.Compare(a.to, b.to), cmp.Compare(a.component, b.component))
	})
	var list []Flow
	for _, k := range keys {
		mass := r.flows[k] * r.p.matter[k.component].molar
		if mass == 0 {
			continue
		}
		from := "shelf"
		if k.from >= 0 {
			from = r.p.places[k.from]
		}
		list = append(list, Flow{From: from, To: r.p.places[k.to], Substance: r.p.matter[k.component].name, Mass: chem.Mass(mass)})
	}
	return list
}

// checkStep compares what all places hold, element by element, with what came
// from the shelf. Only the places that the step has changed are summed again.
func (w *Workspace) checkStep() error {
	n := len(w.p.matter)
	for v, changed := range w.dirty {
		if !changed {
			continue
		}
		w.dirty[v] = false
		held := w.held[v*n : v*n+n]
		for c := range held {
			now := w.total(v, c)
			w.sums[c] += now - held[c]
			held[c] = now
		}
	}
	return w.compare()
}

// checkRun sums every place once more, so that a change no step owned up to
// shows too.
func (w *Workspace) checkRun() error {
	n := len(w.p.matter)
	clear(w.sums)
	for at := 0; at < len(w.amounts); at += n {
		for c, x := range w.amounts[at : at+n] {
			w.sums[c] += x
		}
	}
	return w.compare()
}

// compare compares mass, charge and every element in w.sums with what came from
// the shelf. It allocates nothing.
func (w *Workspace) compare() error {
	off := w.before[:len(w.p.elements)+2]
	size := w.before[len(off) : 2*len(off)]
	clear(off)
	clear(size)
	mass, charge := len(w.p.elements), len(w.p.elements)+1
	for c := range w.p.matter {
		m := &w.p.matter[c]
		d := w.sums[c] - w.came[c]
		s := math.Abs(w.sums[c]) + math.Abs(w.came[c])
		if s == 0 {
			continue
		}
		for _, e := range m.elements {
			off[e.index] += float64(d * e.count)
			size[e.index] += float64(s * e.count)
		}
		off[mass] += float64(d * m.molar)
		size[mass] += float64(s * m.molar)
		off[charge] += float64(d * m.charge)
		size[charge] += float64(s * math.Abs(m.charge))
	}
	for k := range off {
		if size[k] == 0 {
			continue
		}
		share := math.Abs(off[k]) / size[k]
		w.balance = math.Max(w.balance, share)
		if !(share <= balanceTolerance) {
			return w.refuse(ErrUnbalanced, plainf("%s doesn't balance: off by %.3g of what went in", w.elementName(k), share), "mend the reactions of the step")
		}
	}
	return nil
}

func (w *Workspace) elementName(k int) string {
	switch {
	case k < len(w.p.elements):
		return w.p.elements[k]
	case k == len(w.p.elements):
		return "mass"
	}
	return "charge"
}

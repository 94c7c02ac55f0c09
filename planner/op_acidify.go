package planner

import (
	"stillroom/chem"
)

// acidifyOp brings a vessel to a pH with an acid.
type acidifyOp struct {
	acid   charge
	pH     float64
	strips float64

	dose     dose
	t        titration
	factor   int
	stripAsk int
}

func (o *acidifyOp) read(f *fields) {
	if g := f.inner("acid", true); g != nil {
		o.acid = readCharge(g, false)
		g.done()
	}
	o.pH, _ = take(f, "to-pH", true, readPH, "a pH such as 2")
	o.strips, _ = take(f, "strips", false, readNumber, "how many pH strips, such as 4")
}

func (o *acidifyOp) names(visit func(kind, name string, at place)) {
	visit("substance", o.acid.substance, o.acid.pos)
}

func (o acidifyOp) compile(c *compiler) (runner, error) {
	var err error
	if o.dose, err = c.dose(o.acid); err != nil {
		return nil, err
	}
	if o.t, err = c.titration(o.dose.component); err != nil {
		return nil, err
	}
	if o.t.acid < 0 || o.t.cations > 0 {
		return nil, c.refuse(ErrPH, o.acid.substance+" is no acid", "name an acid, such as sulfuric acid or hydrochloric acid")
	}
	o.factor, o.stripAsk = c.titrationFactor(), c.strips(o.strips)
	return &o, nil
}

// waterPerMole is the water in kg that comes with a mole of the acid.
func (o *acidifyOp) waterPerMole(w *Workspace) float64 {
	pure := w.p.matter[o.dose.component].molar
	if o.dose.madeUp > 0 {
		return pure * float64(1-o.dose.madeUp) / float64(o.dose.madeUp)
	}
	s := &w.stocks[o.dose.ask]
	return pure * s.water / s.pure
}

func (o *acidifyOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	w.settle(v)
	n := w.acidFor(o.t, v, o.pH, o.waterPerMole(w))
	if !(n > 0) {
		pH, known := w.pH(v)
		if known && pH <= o.pH {
			return w.refuse(ErrPH, plainf("%s is at pH %.1f already, below pH %.3g", w.p.places[v], pH, o.pH), "leave the step out or name a lower pH")
		}
		return w.refuse(ErrPH, plainf("%s at this strength doesn't bring %s to pH %.3g", w.p.matter[o.dose.component].name, w.p.places[v], o.pH), "take a stronger acid")
	}
	before := w.dilutionHeat(v) + w.stockDilution(o.dose.component, o.dose.ask, n)
	w.pour(&o.dose, v, n)
	w.used[o.dose.ask] += float64((w.value(o.factor) - 1) * n * w.p.matter[o.dose.component].molar)
	w.heat += w.dilutionHeat(v) - before
	w.settle(v)
	w.fullest(v)
	if o.stripAsk >= 0 {
		w.countPieces(o.stripAsk, o.strips, o.pH)
	}
	if w.report != nil {
		o.tell(w, v, n)
	}
	return nil
}

func (o *acidifyOp) tell(w *Workspace, v int, n float64) {
	m := &w.p.matter[o.dose.component]
	w.say("%.4g g of %s to pH %.3g", n*m.molar*1e3, m.name, o.pH)
	w.sayHeat()
	w.report.dosed(w)
	w.caution("add the acid in portions with cooling; gas may be given off from carbonate")
	w.derive(func() chem.Derivation {
		return chem.Derivation{
			Of: m.name + " to pH " + plainf("%.3g", o.pH), Formula: "n = (cations − Σ n(acid)·z(pH) − V·([OH] − [H])) / z(acid)",
			Inserted: plainf("n = %.5g mol", n),
			Inputs: []chem.Input{
				{Symbol: "V", Name: "aqueous volume", Value: w.volume(v, aqueous) * 1e3, Unit: "L", Source: "contents of the vessel"},
			},
			Value: n, Unit: "mol", Range: "25 °C, activities taken as one: pH to 0.2 above 0.1 mol/L", Source: "OpenStax Chemistry 2e, 14.4 to 14.7",
		}
	})
}

package planner

import (
	"slices"

	"stillroom/chem"
)

// washOp shakes a layer with fresh portions of another liquid, which leave for
// another vessel.
type washOp struct {
	layer   string // the layer that is washed and stays
	charges []charge
	times   int
	to      string

	doses         []dose
	target, leave int
	emulsion      int // ask of the spare charge; -1 for none
	chance        int
	solvent       int // index in doses of the organic one
}

func (o *washOp) read(f *fields) {
	o.layer = readLayer(f, "layer")
	o.charges = readCharges(f, true)
	o.times, _ = take(f, "times", true, readCount, "how often, such as 3")
	o.to = f.text("to", true)
}

func (o *washOp) names(visit func(kind, name string, at place)) {
	nameCharges(o.charges, visit)
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o washOp) compile(c *compiler) (runner, error) {
	var err error
	if o.doses, err = c.doses(o.charges); err != nil {
		return nil, err
	}
	o.target = c.place[o.to]
	o.leave = 1 - slices.Index(layerNames, o.layer)
	o.emulsion = -1
	for i, d := range o.doses {
		if d.component >= 0 && c.p.matter[d.component].home == organic {
			o.emulsion, o.solvent = c.ask(d.component, d.accept, byLoad, "emulsion", false), i
			o.chance = c.emulsion()
		}
	}
	return &o, nil
}

func (o *washOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	product := w.total(v, w.p.product)
	for range o.times {
		w.pourAll(o.doses, v)
		w.settle(v)
		w.fullest(v)
		if err := w.needLayers(v); err != nil {
			return err
		}
		w.parted(v, o.target, o.leave)
	}
	w.settle(o.target)
	w.fullest(o.target)
	w.vent(o.target)
	if o.emulsion >= 0 {
		d := &o.doses[o.solvent]
		w.spare(o.emulsion, d.component, o.chance, w.used[d.ask]/float64(o.times))
	}
	if w.report != nil && product > 0 {
		w.say("%s: %.3g %% of the %s leaves the layer with it", counted(o.times, "wash", "washes"), 100*(1-w.total(v, w.p.product)/product), w.p.matter[w.p.product].name)
	}
	return nil
}

// spare books one more portion of solvent against an emulsion. It isn't poured:
// it stands ready, and a draw uses it when its emulsion happens.
func (w *Workspace) spare(ask, component, chance int, portion float64) {
	if w.off[ask] || !(portion > 0) {
		return
	}
	if w.u != nil && w.value(chance) == 0 {
		return
	}
	portion = float64(portion * w.policy.emulsionExtra)
	w.used[ask] += portion
	if w.report == nil {
		return
	}
	a := &w.report.asks[ask]
	a.Pure += chem.Mass(portion)
	a.Amount += chem.Amount(portion / w.p.matter[component].molar)
	a.Why = plainf("%.3g times a portion, %.3g g, ready for an emulsion, which %.3g %% of work-ups have (policy prior.emulsion); not part of the balance", w.policy.emulsionExtra, portion*1e3, 100*w.policy.emulsionChance)
}

package planner

import (
	"fmt"
	"math"
)

// rinseOp rinses a vessel or a cake: what it holds is thinned with fresh liquid
// and as much as came in leaves for another vessel.
type rinseOp struct {
	charges []charge
	times   int
	to      string

	doses  []dose
	target int
}

func (o *rinseOp) read(f *fields) {
	o.charges = readCharges(f, true)
	o.times, _ = take(f, "times", false, readCount, "how often, such as 2")
	o.times = max(o.times, 1)
	o.to = f.text("to", true)
}

func (o *rinseOp) names(visit func(kind, name string, at place)) {
	nameCharges(o.charges, visit)
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o rinseOp) compile(c *compiler) (runner, error) {
	var err error
	o.doses, err = c.doses(o.charges)
	o.target = c.place[o.to]
	return &o, err
}

// run thins the liquid held, v, with each rinse, R: a share R/(v + R) leaves.
func (o *rinseOp) run(w *Workspace) error {
	v := w.step.vessel
	product := w.total(v, w.p.product)
	for range o.times {
		held := w.volume(v, aqueous) + w.volume(v, organic)
		w.pourAll(o.doses, v)
		w.fullest(v)
		all := w.volume(v, aqueous) + w.volume(v, organic)
		if !(all > 0) {
			return w.refuse(ErrEmptyVessel, "the rinse is empty", "give the rinse an amount")
		}
		share := math.Max(0, 1-held/all)
		w.movePhase(v, o.target, aqueous, share)
		w.movePhase(v, o.target, organic, share)
	}
	w.fullest(o.target)
	if w.report != nil && product > 0 {
		w.say("%.3g %% of the %s that was held is rinsed out", 100*(1-w.total(v, w.p.product)/product), w.p.matter[w.p.product].name)
	}
	if w.report != nil {
		for i := range o.doses {
			a := &w.report.asks[o.doses[i].ask]
			if a.Hidden && a.Why == "" {
				a.Why = fmt.Sprintf("%d rinses of %s", o.times, w.p.places[v])
			}
		}
	}
	return nil
}

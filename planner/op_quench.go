package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// quenchOp destroys left-over oxidant with a reductant in excess.
type quenchOp struct {
	reductant charge
	acid      charge // for a quench that uses up acid; substance "" for none
	reaction  string
	excess    float64
	pos       place

	dose, acidDose dose
	index          int
	oxidant        int
	factor         int
}

func (o *quenchOp) read(f *fields) {
	o.pos = f.place()
	if g := f.inner("reductant", true); g != nil {
		o.reductant = readCharge(g, false)
		g.done()
	}
	if g := f.inner("acid", false); g != nil {
		o.acid = readCharge(g, false)
		g.done()
	}
	o.reaction = f.text("reaction", true)
	excess, _ := take(f, "excess", true, chem.ParseFraction, "how much more than theory, such as 30 %")
	o.excess = float64(excess)
}

func (o *quenchOp) names(visit func(kind, name string, at place)) {
	visit("substance", o.reductant.substance, o.reductant.pos)
	if o.acid.substance != "" {
		visit("substance", o.acid.substance, o.acid.pos)
	}
	visit("reaction", o.reaction, o.pos)
}

func (o quenchOp) compile(c *compiler) (runner, error) {
	var err error
	if o.index, err = c.reactionIndex(o.reaction); err != nil {
		return nil, err
	}
	o.reductant.hiddenKey = "quench"
	if o.dose, err = c.dose(o.reductant); err != nil {
		return nil, err
	}
	if o.acid.substance != "" {
		o.acid.hiddenKey = "quench-acid"
		if o.acidDose, err = c.dose(o.acid); err != nil {
			return nil, err
		}
	}
	x := &c.p.reactions[o.index]
	o.oxidant = x.key
	if !(x.numberOf(o.dose.component) < 0) || o.oxidant == o.dose.component {
		return nil, c.refuse(ErrUnbalanced, fmt.Sprintf("reaction %s must list the oxidant first and consume %s", o.reaction, o.reductant.substance), "mend the reaction")
	}
	o.factor = c.quenchFactor(o.excess)
	return &o, nil
}

func (o *quenchOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	x := &w.p.reactions[o.index]
	left := w.total(v, o.oxidant)
	extent := left / -x.numberOf(o.oxidant)
	needed := extent * -x.numberOf(o.dose.component)
	if w.off[o.dose.ask] || left <= 0 {
		w.fullest(v)
		if w.report != nil {
			w.say("nothing to quench, or the quench is switched off: %.3g mol of %s left", left, w.p.matter[o.oxidant].name)
		}
		return nil
	}
	heat := w.dilutionHeat(v)
	acid := o.addAcid(w, x, v, extent)
	w.pour(&o.dose, v, needed*(1+o.excess))
	w.used[o.dose.ask] += float64((w.value(o.factor) - 1 - o.excess) * needed * w.p.matter[o.dose.component].molar)
	w.heat += w.dilutionHeat(v) - heat
	w.fullest(v)
	most, _ := w.mostExtent(x, v)
	w.heat += w.react(x, v, math.Min(extent, most))
	w.settle(v)
	w.fullest(v)
	if w.report != nil {
		o.tell(w, x, left, needed, acid, v)
	}
	return nil
}

// addAcid adds the acid the quench uses up beyond what is there, and returns it.
func (o *quenchOp) addAcid(w *Workspace, x *reactionOf, v int, extent float64) float64 {
	if o.acid.substance == "" {
		return 0
	}
	c := o.acidDose.component
	short := float64(extent*-x.numberOf(c)) - w.total(v, c)
	if short <= 0 {
		return 0
	}
	w.pour(&o.acidDose, v, short)
	return short
}

func (o *quenchOp) tell(w *Workspace, x *reactionOf, left, needed, acid float64, v int) {
	m, oxidant := &w.p.matter[o.dose.component], &w.p.matter[o.oxidant]
	why := plainf("%.4g mol of %s left takes %.4g mol of %s; with %.0f %% excess %.4g g", left, oxidant.name, needed, m.name, 100*o.excess, needed*(1+o.excess)*m.molar*1e3)
	w.report.asks[o.dose.ask].Why = why
	w.say("%s", why)
	if o.acid.substance != "" {
		acidName := w.p.matter[o.acidDose.component].name
		w.report.asks[o.acidDose.ask].Why = plainf("the quench uses up %.4g mol of %s; %.4g mol are short of it", left/-x.numberOf(o.oxidant)*-x.numberOf(o.acidDose.component), acidName, acid)
		if acid == 0 {
			w.say("the %s left over suffices for the quench", acidName)
		}
	}
	if still := w.total(v, o.oxidant); still > left*1e-9 {
		w.caution("%.3g mol of %s are still there: something the quench needs runs out", still, oxidant.name)
	}
	w.say("test that no oxidant is left before going on")
	w.report.dosed(w)
	w.sayHeat()
	w.derive(func() chem.Derivation {
		return chem.Derivation{
			Of: m.name + " of the quench", Formula: "m = n(oxidant) · ν · (1 + excess) · M", Inserted: why,
			Inputs: []chem.Input{
				{Symbol: "n(oxidant)", Name: oxidant.name + " left over", Value: left, Unit: "mol", Source: "walk-through"},
				{Symbol: "ν", Name: "moles of reductant for one of oxidant", Value: needed / left, Source: "reaction " + x.name},
				{Symbol: "excess", Name: "more than theory", Value: o.excess, Source: "recipe"},
			},
			Value: needed * (1 + o.excess) * m.molar * 1e3, Unit: "g", Source: "Beukes et al., Water SA 25 (1999) 363",
		}
	})
}

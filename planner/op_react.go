package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// progress is a reaction that goes as far as a conversion of the first
// substance it consumes.
type progress struct {
	reaction   string
	conversion Spread
	of         string // the substance the conversion refers to; "" for the first consumed
	pos        place

	index, key, factor int
}

func readProgress(f *fields, needed bool) []progress {
	var list []progress
	f.each("reactions", needed, "reaction", func(g *fields) {
		p := progress{reaction: g.text("reaction", true), of: g.text("of", false), pos: g.place()}
		p.conversion, _ = take(g, "conversion", true, readSpread, "a share such as 95 % or 95 % ± 2 %")
		list = append(list, p)
	})
	return list
}

func nameProgress(list []progress, visit func(kind, name string, at place)) {
	for _, p := range list {
		visit("reaction", p.reaction, p.pos)
		if p.of != "" {
			visit("substance", p.of, p.pos)
		}
	}
}

func (c *compiler) progress(list []progress) ([]progress, error) {
	var out []progress
	for _, p := range list {
		i, err := c.reactionIndex(p.reaction)
		if err != nil {
			return nil, err
		}
		p.index, p.key = i, c.p.reactions[i].key
		if p.of != "" {
			p.key = c.index[p.of]
		}
		if !(c.p.reactions[i].numberOf(p.key) < 0) {
			return nil, c.refuse(ErrUnbalanced, fmt.Sprintf("reaction %s doesn't consume %s", p.reaction, p.of), "name a substance it consumes")
		}
		p.factor = c.share("conversion of "+p.reaction, p.conversion)
		out = append(out, p)
	}
	return out, nil
}

// reactOp lets reactions run one after the other.
type reactOp struct {
	list   []progress
	at     chem.Temperature
	stated bool
}

func (o *reactOp) read(f *fields) {
	o.list = readProgress(f, true)
	o.at, o.stated = take(f, "at", false, chem.ParseTemperature, "a temperature such as 100 °C")
}

func (o *reactOp) names(visit func(kind, name string, at place)) { nameProgress(o.list, visit) }

func (o reactOp) compile(c *compiler) (runner, error) {
	var err error
	o.list, err = c.progress(o.list)
	return &o, err
}

func (o *reactOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	if o.stated {
		w.celsius[v] = o.at.Celsius()
	}
	w.fullest(v)
	for i := range o.list {
		if err := w.progress(&o.list[i], v); err != nil {
			return err
		}
	}
	w.settle(v)
	w.fullest(v)
	w.sayHeat()
	return nil
}

// progress runs a reaction to its conversion, or until something else it needs
// is used up, and says which.
func (w *Workspace) progress(p *progress, v int) error {
	x := &w.p.reactions[p.index]
	there := w.total(v, p.key)
	if there <= 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("there is no %s in %s for %s", w.p.matter[p.key].name, w.p.places[v], x.name), "charge it in an earlier step")
	}
	wanted := w.value(p.factor) * there / -x.numberOf(p.key)
	most, scarce := w.mostExtent(x, v)
	extent := math.Min(wanted, most)
	heat := w.react(x, v, extent)
	w.heat += heat
	if w.report == nil {
		return nil
	}
	w.say("%s: %.4g %% of the %s, %.4g mol", x.name, 100*extent*-x.numberOf(p.key)/there, w.p.matter[p.key].name, extent*-x.numberOf(p.key))
	if !x.known {
		w.say("heat of %s: not assessed, no enthalpy is stated", x.name)
	}
	if most < wanted*(1-1e-12) {
		w.report.walk.Findings = append(w.report.walk.Findings, Finding{
			Kind: "reagent-runs-out", Severity: Warning, Step: w.step.N,
			Text:  plainf("%s runs out: %s stops at %.3g %% instead of %.3g %%", w.p.matter[scarce].name, x.name, 100*most*-x.numberOf(p.key)/there, 100*w.value(p.factor)),
			Would: plainf("charge %.4g mol more of it", (wanted-most)*-x.numberOf(scarce)),
		})
	}
	w.tellReaction(x, extent, heat)
	return nil
}

func (w *Workspace) tellReaction(x *reactionOf, extent, heat float64) {
	if !x.known || extent == 0 {
		return
	}
	w.derive(func() chem.Derivation {
		n := extent * -x.numberOf(x.key)
		return chem.Derivation{
			Of: "heat of " + x.name, Formula: "q = −ΔH · n",
			Inserted: plainf("%.5g kJ/mol · %.5g mol = %.5g kJ", -x.enthalpy/1e3, n, heat/1e3),
			Inputs: []chem.Input{
				{Symbol: "ΔH", Name: "reaction enthalpy per mole of " + w.p.matter[x.key].name, Value: x.enthalpy / 1e3, Unit: "kJ/mol", Source: x.enthalpySource},
				{Symbol: "n", Name: "amount that reacts", Value: n, Unit: "mol", Source: "balance of the step"},
			},
			Value: heat / 1e3, Unit: "kJ", Source: "Stoessel, Thermal Safety of Chemical Processes; OpenStax Chemistry 2e, 5.2",
		}
	})
}

package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// distilOp distils the product: what boils below it goes to the forerun, what
// boils above stays in the pot.
type distilOp struct {
	pressure chem.Pressure
	forerun  string
	cut      chem.Fraction // share of the product that goes with the forerun

	target int
	boils  float64
	known  bool
}

func (o *distilOp) read(f *fields) {
	o.pressure = readPressureOr(f, chem.Atmosphere)
	o.forerun = f.text("forerun-to", true)
	o.cut, _ = take(f, "cut", false, chem.ParseFraction, "the share of the product that goes with the forerun, such as 2 %")
}

func (o *distilOp) names(visit func(kind, name string, at place)) {
	if o.forerun != "" {
		visit("vessel", o.forerun, place{})
	}
}

func (o distilOp) compile(c *compiler) (runner, error) {
	o.target = c.place[o.forerun]
	t, err := c.p.matter[c.p.product].boilsAt(o.pressure)
	o.known = err == nil
	o.boils = t.Celsius()
	if !o.known && !(c.p.matter[c.p.product].boiling > 0) {
		return nil, c.refuse(ErrNoData, "no boiling point of "+c.r.Product, "state boiling: under substances:")
	}
	return &o, nil
}

func (o *distilOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	n := w.total(v, w.p.product)
	if n <= 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("%s holds no %s", w.p.places[v], w.p.Recipe.Product), "make it in an earlier step")
	}
	w.fullest(v)
	before := w.filled(v)
	boiling := w.p.matter[w.p.product].boiling
	for c := range w.p.matter {
		m := &w.p.matter[c]
		if c == w.p.product || m.home == gas || !(m.boiling > 0 && m.boiling < boiling) || m.home == solid {
			continue
		}
		for phase := range solid {
			w.move(v, phase, o.target, organic, c, w.amounts[w.at(v, phase, c)])
		}
	}
	w.move(v, organic, o.target, organic, w.p.product, w.amounts[w.at(v, organic, w.p.product)]*float64(o.cut))
	if err := w.isolate(v, organic); err != nil {
		return err
	}
	if o.known {
		w.celsius[v] = o.boils
	}
	w.settle(o.target)
	w.fullest(o.target)
	if w.report != nil {
		o.tell(w, v, before)
	}
	return nil
}

func (o *distilOp) tell(w *Workspace, v int, before float64) {
	if o.known {
		w.report.step.Temperature = chem.Celsius(o.boils)
		w.say("%s boils at %.1f °C at %.4g kPa", w.p.Recipe.Product, o.boils, o.pressure.Kilopascals())
	} else {
		w.say("boiling point at %.4g kPa: no data", o.pressure.Kilopascals())
	}
	left := w.filled(v)
	w.say("%.3g mL stay in the pot, %.2g %% of what was in it", left*1e6, 100*left/before)
	if leave := w.policy.stillLeave; leave > 0 && left < leave*before {
		w.say("stop in time: %.0f %% of the liquid, %.3g mL, is the least that should stay in the pot", 100*leave, leave*before*1e6)
	}
	w.caution("never distil to dryness")
}

// isolate takes the product out of a phase of place v as the recipe's yield has
// it: the yield drawn, or as much as arrives if that is less. What arrives
// beyond it stays where it is, as the loss at isolation.
func (w *Workspace) isolate(v, phase int) error {
	arrives := w.amounts[w.at(v, phase, w.p.product)]
	theory := w.limiting * w.p.perLimiting
	yield := w.value(w.p.yieldFactor)
	n := math.Min(arrives, yield*theory)
	w.arriving += arrives
	n = math.Min(n, math.Max(0, float64(yield*theory)-w.isolated))
	w.isolated += n
	w.move(v, phase, w.p.productPlace(), phase, w.p.product, n)
	if w.report != nil {
		w.tellIsolation(arrives, n, theory, yield)
	}
	return nil
}

func (w *Workspace) tellIsolation(arrives, n, theory, yield float64) {
	m := &w.p.matter[w.p.product]
	w.say("%.4g g of %s arrive, %.4g %% of theory; %.4g g are isolated at the expected yield of %.3g %%", arrives*m.molar*1e3, m.name, 100*arrives/theory, n*m.molar*1e3, 100*yield)
	if arrives < yield*theory*(1-1e-9) {
		w.report.walk.Findings = append(w.report.walk.Findings, Finding{
			Kind: "yield-beyond-balance", Severity: Warning, Step: w.step.N,
			Text:  plainf("the recipe's yield of %.3g %% is more than the %.3g %% that the steps let through", 100*yield, 100*arrives/theory),
			Would: "lower the yield of the recipe, or mend the conversion or recovery that is too low",
		})
	}
	w.derive(func() chem.Derivation {
		return chem.Derivation{
			Of: m.name + ", isolated", Formula: "m = min(arriving, Y · n(theory)) · M",
			Inserted: plainf("min(%.5g mol, %.4g · %.5g mol) · %.6g g/mol = %.5g g", arrives, yield, theory, m.molar*1e3, n*m.molar*1e3),
			Inputs: []chem.Input{
				{Symbol: "Y", Name: "isolated yield", Value: yield, Source: "recipe, " + w.p.Recipe.Yield.Basis},
				{Symbol: "n(theory)", Name: "product of the limiting reagent in theory", Value: theory, Unit: "mol", Source: "balanced reactions"},
				{Symbol: "arriving", Name: "product that reaches this step", Value: arrives, Unit: "mol", Source: "walk-through"},
			},
			Value: n * m.molar * 1e3, Unit: "g", Source: "OpenStax Chemistry 2e, 4.3 and 4.4",
		}
	})
}

package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// neutraliseOp brings a vessel to a pH with a base.
type neutraliseOp struct {
	base   charge
	pH     float64
	stays  float64 // share of the carbon dioxide water can hold that is left
	strips float64

	dose     dose
	t        titration
	factor   int
	stripAsk int
}

func (o *neutraliseOp) read(f *fields) {
	if g := f.inner("base", true); g != nil {
		o.base = readCharge(g, false)
		g.done()
	}
	o.pH, _ = take(f, "to-pH", true, readPH, "a pH such as 8")
	o.strips, _ = take(f, "strips", false, readNumber, "how many pH strips, such as 4")
	stays, stated := take(f, "gas-left", false, chem.ParseFraction, "the share of the carbon dioxide water can hold that is left when the pH is read, such as 10 %")
	o.stays = 1
	if stated {
		o.stays = float64(stays)
	}
}

func (o *neutraliseOp) names(visit func(kind, name string, at place)) {
	visit("substance", o.base.substance, o.base.pos)
}

func (o neutraliseOp) compile(c *compiler) (runner, error) {
	var err error
	if o.dose, err = c.dose(o.base); err != nil {
		return nil, err
	}
	if o.t, err = c.titration(o.dose.component); err != nil {
		return nil, err
	}
	o.factor, o.stripAsk = c.titrationFactor(), c.strips(o.strips)
	return &o, nil
}

// strips enters the hidden need of pH strips.
func (c *compiler) strips(n float64) int {
	if n == 0 {
		return -1
	}
	return c.pieces("pH strip", "pH-strips", "the pH is read with strips")
}

func (o *neutraliseOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	w.settle(v)
	n := w.baseFor(o.t, v, o.pH, o.stays)
	if math.IsInf(n, 1) || math.IsNaN(n) {
		return w.refuse(ErrPH, plainf("%s doesn't bring a solution to pH %.3g", w.p.matter[o.dose.component].name, o.pH),
			fmt.Sprintf("it reaches pH %.1f at most; take a stronger base or a lower pH", o.highest(w)))
	}
	if n <= 0 {
		pH, _ := w.pH(v)
		return w.refuse(ErrPH, plainf("%s is at pH %.1f already, above pH %.3g", w.p.places[v], pH, o.pH), "leave the step out or name a higher pH")
	}
	return o.add(w, v, n)
}

func (o *neutraliseOp) add(w *Workspace, v int, n float64) error {
	taken := float64(n * w.value(o.factor))
	w.pour(&o.dose, v, n)
	w.used[o.dose.ask] += float64((taken - n) * w.p.matter[o.dose.component].molar)
	w.fullest(v)
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

func (o *neutraliseOp) tell(w *Workspace, v int, n float64) {
	m := &w.p.matter[o.dose.component]
	w.say("%.4g g of %s to pH %.3g", n*m.molar*1e3, m.name, o.pH)
	w.sayHeat()
	w.report.dosed(w)
	w.say("heats of dissolving and of precipitating are not counted")
	w.derive(func() chem.Derivation {
		cations, anions, _ := w.charges(v, o.pH)
		return chem.Derivation{
			Of: m.name + " to pH " + plainf("%.3g", o.pH), Formula: "n = (Σ n(acid)·z(pH) + V·([OH] − [H]) + HCO3 kept − cations) / z(base)",
			Inserted: plainf("n = %.5g mol", n),
			Inputs: []chem.Input{
				{Symbol: "Σ n·z", Name: "charge of the acids at this pH", Value: anions, Unit: "mol", Source: "contents of the vessel, pKa table"},
				{Symbol: "cations", Name: "charge of the cations when it is reached", Value: cations, Unit: "mol", Source: "contents of the vessel"},
				{Symbol: "V", Name: "aqueous volume", Value: w.volume(v, aqueous) * 1e3, Unit: "L", Source: "contents of the vessel"},
				{Symbol: "left", Name: "share of dissolved carbon dioxide left", Value: o.stays, Source: "recipe"},
			},
			Value: n, Unit: "mol", Range: "25 °C, activities taken as one: pH to 0.2 above 0.1 mol/L", Source: "OpenStax Chemistry 2e, 14.4 to 14.7",
		}
	})
	if w.report.gasFormed(w, v) {
		w.caution("gas is given off: add in portions, vent, keep the vessel open")
	}
}

// highest is the pH at which a carbonate brings as many charges as it carries
// away, found by halving; 14 for a hydroxide.
func (o *neutraliseOp) highest(w *Workspace) float64 {
	if o.t.acid < 0 {
		return 14
	}
	low, high := 0.0, 14.0
	for range 40 {
		mid := (low + high) / 2
		if o.t.acids*anionCharge(w.p.acids[o.t.acid].pKa, mid) < o.t.cations {
			low = mid
		} else {
			high = mid
		}
	}
	return low
}

// gasFormed reports whether a place holds gas that hasn't been let go.
func (r *reporter) gasFormed(w *Workspace, v int) bool {
	for _, n := range w.in(v, gas) {
		if n > 0 {
			return true
		}
	}
	return false
}

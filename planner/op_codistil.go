package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// coDistilOp carries a volatile substance over with water to a recovery.
type coDistilOp struct {
	carry    string
	recovery Spread
	to       string
	pos      place

	component, target int
	factor            int
	waterAsk          int
	perWater          float64 // kg carried by a kg of water while there are two layers
	alpha             float64
	soluble           float64 // kg in a kg of water
	start             float64 // °C; 0 for no data
	source            string
}

func (o *coDistilOp) read(f *fields) {
	o.carry, o.pos = f.text("carry", true), f.place()
	o.recovery, _ = take(f, "recovery", true, readSpread, "the share that is to go over, such as 97 %")
	if o.recovery.Mean >= 1 {
		f.faultAt(f.values["recovery"], "a recovery of "+nodeText(f.values["recovery"]), "less than 100 %: the last of it takes water without end")
	}
	o.to = f.text("to", true)
}

func (o *coDistilOp) names(visit func(kind, name string, at place)) {
	if o.carry != "" {
		visit("substance", o.carry, o.pos)
	}
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o coDistilOp) compile(c *compiler) (runner, error) {
	o.component, o.target = c.index[o.carry], c.place[o.to]
	o.factor = c.share("recovery of "+o.carry, o.recovery)
	m := &c.p.matter[o.component]
	if err := o.volatility(c, m); err != nil {
		return nil, err
	}
	o.waterAsk = c.ask(c.p.water, Accept{}, byLoad, "distillate-water", false)
	return &o, nil
}

// volatility takes what is known of the substance over water: from the recipe
// where it says so, else from the table of azeotropes.
func (o *coDistilOp) volatility(c *compiler, m *matter) error {
	pair := chem.CoDistilling{CAS: m.cas, Partner: 0.1, Water: 100, Recovery: 0.5, Level: true}
	note, noted := noteOn(c.r, o.carry)
	azeotrope, ok := chem.AzeotropeWithWater(m.cas)
	switch {
	case noted && note.Azeotrope > 0:
		pair.VapourFraction = note.Azeotrope
		o.perWater, o.start, o.source = overRest(note.Azeotrope), note.AzeotropeBoils.Celsius(), note.Source
		if m.soluble > 0 && !math.IsInf(m.soluble, 1) {
			pair.Solubility = chem.Fraction(m.soluble / (1 + m.soluble))
		}
	case ok && azeotrope.Forms && !azeotrope.MaximumBoiling:
		o.perWater, o.start, o.source = overRest(azeotrope.PartnerFraction), azeotrope.Temperature.Celsius(), azeotrope.Source
	default:
		return c.refuse(ErrNoData, "no azeotrope of "+o.carry+" with water is known", "state azeotrope: and azeotrope-boils: with their source under substances:, or take another way of isolating it")
	}
	trial, err := chem.CoDistillate(pair)
	if err != nil {
		return c.refuse(ErrNoData, err.Error(), "")
	}
	o.alpha = steady(trial.Alpha)
	o.soluble = o.perWater / o.alpha // at saturation vapour and solution are in balance
	if m.soluble >= 0 && !math.IsInf(m.soluble, 1) {
		o.soluble = m.soluble
	}
	return nil
}

// run distils with the water of the pot kept up. While there is a second layer
// the vapour has the azeotrope's composition, m(water) = m(carried)/r; the
// dissolved rest falls as exp(−α m(water)/m(pot)).
func (o *coDistilOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	m := &w.p.matter[o.component]
	there := w.total(v, o.component)
	if there <= 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("there is no %s in %s", o.carry, w.p.places[v]), "make it in an earlier step")
	}
	w.fullest(v)
	pot := w.amounts[w.at(v, aqueous, w.p.water)] * w.p.matter[w.p.water].molar
	recovery := w.value(o.factor)
	water := o.waterFor(there*m.molar, recovery, pot)
	over := water / w.p.matter[w.p.water].molar
	if w.off[o.waterAsk] {
		if water > pot {
			return w.refuse(ErrEmptyVessel, plainf("%s holds %.4g g of water, and %.4g g have to go over with the %s", w.p.places[v], pot*1e3, water*1e3, o.carry), "let the water of the distillate be put back")
		}
	} else {
		w.draw(o.waterAsk, w.p.water, v, over)
	}
	w.move(v, aqueous, o.target, aqueous, w.p.water, over)
	o.carryOver(w, v, recovery)
	if o.start > 0 {
		w.celsius[v] = o.start
	}
	w.settle(o.target)
	w.fullest(o.target)
	if w.report != nil {
		o.tell(w, there*m.molar, recovery, pot, water)
	}
	return nil
}

// waterFor is the mass of water that carries a share of mass over.
func (o *coDistilOp) waterFor(mass, recovery, pot float64) float64 {
	left := float64(mass * (1 - recovery))
	dissolved := math.Min(mass, o.soluble*pot)
	if left >= dissolved {
		return (mass - left) / o.perWater
	}
	return (mass-dissolved)/o.perWater + float64(pot/o.alpha*chem.Ln(dissolved/left))
}

// carryOver moves what is carried, and with it the other free organic liquids
// that boil no higher than the carried one by more than carriedMargin: they go
// over entirely.
func (o *coDistilOp) carryOver(w *Workspace, v int, recovery float64) {
	most := w.p.matter[o.component].boiling + carriedMargin
	for c := range w.p.matter {
		m := &w.p.matter[c]
		share := 1.0
		if c == o.component {
			share = recovery
		} else if m.home != organic || !(m.boiling > 0 && m.boiling <= most) {
			continue
		}
		for phase := range solid {
			w.move(v, phase, o.target, phase, c, w.amounts[w.at(v, phase, c)]*share)
		}
	}
}

// carriedMargin is how far above the carried substance another liquid of the
// pot may boil and still go over with it entirely: esters are carried better
// than acids that boil 20 K lower, because water dissolves less of them
// (common practice: the ester of the oxidation is the first of the distillate).
const carriedMargin = 25

func (o *coDistilOp) tell(w *Workspace, mass, recovery, pot, water float64) {
	w.report.step.Temperature = chem.Celsius(o.start)
	w.say("%.4g g of distillate water carry %.3g %% of the %s over; no oily drops follow when it is done", water*1e3, 100*recovery, o.carry)
	if !w.off[o.waterAsk] {
		w.say("the pot is kept up with the same amount of water")
	}
	if a := &w.report.asks[o.waterAsk]; a.Hidden {
		a.Why = plainf("%.4g g of water leave with the distillate and are put back", water*1e3)
	}
	w.derive(func() chem.Derivation {
		return chem.Derivation{
			Of: "water of the distillate", Formula: "m(water) = (m − m(dissolved))/r + m(pot)/α · ln(m(dissolved)/m(left))",
			Inserted: plainf("%.5g g", water*1e3),
			Inputs: []chem.Input{
				{Symbol: "m", Name: o.carry + " in the pot", Value: mass * 1e3, Unit: "g", Source: "contents of the vessel"},
				{Symbol: "r", Name: "mass carried by one mass of water over two layers", Value: o.perWater, Source: o.source},
				{Symbol: "α", Name: "relative volatility when dissolved", Value: o.alpha, Source: "azeotrope and solubility, or measured"},
				{Symbol: "m(pot)", Name: "water in the pot", Value: pot * 1e3, Unit: "g", Source: "contents of the vessel"},
				{Symbol: "recovery", Name: "share carried over", Value: recovery, Source: "recipe"},
			},
			Value: water * 1e3, Unit: "g", Range: "at 101.325 kPa; salt and acid in the pot lower it", Source: "OpenStax Chemistry 2e, 10.3 and 11.4; azeotropes of Lange and CRC",
		}
	})
}

package planner

import (
	"fmt"

	"stillroom/chem"
)

// boilDownOp boils water off; dissolved liquids that boil below water go first.
type boilDownOp struct {
	off chem.Fraction // share of the water that is boiled off
	to  string

	target int
}

func (o *boilDownOp) read(f *fields) {
	o.off, _ = take(f, "boil-off", true, chem.ParseFraction, "the share of the water that is boiled off, such as 60 %")
	o.to = f.text("to", true)
}

func (o *boilDownOp) names(visit func(kind, name string, at place)) {
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o boilDownOp) compile(c *compiler) (runner, error) {
	o.target = c.place[o.to]
	return &o, nil
}

// run boils off a share of the water. Free organic liquids that water carries
// over, and whatever boils below water, leave first and entirely (common
// practice: a few per cent of the water take them along); salts and salts of
// acids stay.
func (o *boilDownOp) run(w *Workspace) error {
	v := w.step.vessel
	water := w.amounts[w.at(v, aqueous, w.p.water)]
	if water <= 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("%s holds no water to boil off", w.p.places[v]), "leave the step out")
	}
	w.fullest(v)
	for c := range w.p.matter {
		m := &w.p.matter[c]
		if m.home != organic || !(m.boiling > 0) || m.boiling > carriedBelow {
			continue
		}
		for phase := range solid {
			w.move(v, phase, o.target, phase, c, w.amounts[w.at(v, phase, c)])
		}
	}
	w.move(v, aqueous, o.target, aqueous, w.p.water, water*float64(o.off))
	w.celsius[v] = 100
	w.settle(o.target)
	w.fullest(o.target)
	if w.report != nil {
		w.report.step.Temperature = chem.Celsius(100)
		m := &w.p.matter[w.p.water]
		w.say("%.3g g of water boil off, %.3g mL stay", water*float64(o.off)*m.molar*1e3, w.filled(v)*1e6)
		if m.latent > 0 {
			w.say("%.3g kJ to boil it off", water*float64(o.off)*m.latent/1e3)
		}
	}
	return nil
}

// carriedBelow is the boiling point in K up to which a free organic liquid is
// taken to go over with the first of the water: 1-octanol, 195 °C, still does
// (azeotrope table).
const carriedBelow = 468

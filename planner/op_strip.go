package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// stripOp boils a solvent off an organic liquid.
type stripOp struct {
	solvent  string
	pos      place
	leaves   chem.Fraction // share of the solvent that stays
	pressure chem.Pressure
	to       string

	component, target, caught int
	boils                     float64 // °C
}

func (o *stripOp) read(f *fields) {
	o.solvent, o.pos = f.text("solvent", true), f.place()
	o.leaves, _ = take(f, "leaves", true, chem.ParseFraction, "the share of the solvent that stays, such as 2 %")
	o.pressure = readPressureOr(f, chem.Atmosphere)
	o.to = f.text("to", true)
}

// readPressureOr reads the pressure of a step, by default that of the room.
func readPressureOr(f *fields, otherwise chem.Pressure) chem.Pressure {
	if p, ok := take(f, "pressure", false, chem.ParsePressure, "a pressure such as 200 mbar"); ok {
		return p
	}
	return otherwise
}

func (o *stripOp) names(visit func(kind, name string, at place)) {
	if o.solvent != "" {
		visit("substance", o.solvent, o.pos)
	}
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o stripOp) compile(c *compiler) (runner, error) {
	o.component, o.target = c.index[o.solvent], c.place[o.to]
	o.caught = c.caughtFactor()
	t, err := c.p.matter[o.component].boilsAt(o.pressure)
	if err != nil {
		return nil, c.refuse(ErrNoData, plainf("boiling point of %s at %.4g kPa: %v", o.solvent, o.pressure.Kilopascals(), err), "state boiling: under substances:")
	}
	o.boils = t.Celsius()
	return &o, nil
}

// boilsAt is the boiling point at a pressure, from vapour pressure data, or the
// normal boiling point at the pressure of the room.
func (m *matter) boilsAt(p chem.Pressure) (chem.Temperature, error) {
	t, err := chem.BoilingPoint(m.cas, p)
	if err == nil {
		return t, nil
	}
	if m.boiling > 0 && math.Abs(float64(p/chem.Atmosphere)-1) < 0.05 {
		return chem.Temperature(m.boiling), nil
	}
	return 0, err
}

// run boils off all but a share of the solvent; water and what boils below the
// solvent go with it. Part of the vapour is caught, the rest goes to the air.
func (o *stripOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	w.fullest(v)
	n := w.total(v, o.component)
	if n <= 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("%s holds no %s", w.p.places[v], o.solvent), "name the solvent that is there")
	}
	caught := w.value(o.caught)
	boiling := o.boils + float64(chem.ZeroCelsius)
	off := 1 - float64(o.leaves)
	for c := range w.p.matter {
		m := &w.p.matter[c]
		if c != o.component && c != w.p.water && !(m.boiling > 0 && m.boiling < boiling && m.home != gas) {
			continue
		}
		for phase := range solid {
			there := w.amounts[w.at(v, phase, c)] * off
			w.move(v, phase, o.target, phase, c, there*caught)
			w.move(v, phase, w.p.air(), gas, c, there*(1-caught))
		}
	}
	w.part(v)
	w.settle(o.target)
	w.celsius[v] = o.boils
	w.fullest(o.target)
	if w.report != nil {
		o.tell(w, n*off, caught)
	}
	return nil
}

func (o *stripOp) tell(w *Workspace, off, caught float64) {
	m := &w.p.matter[o.component]
	w.report.step.Temperature = chem.Celsius(o.boils)
	w.say("%s boils at %.1f °C at %.4g kPa; %.3g g come off, of which about %.0f %% are caught", m.name, o.boils, o.pressure.Kilopascals(), off*m.molar*1e3, 100*caught)
	if m.latent > 0 {
		w.say("%.3g kJ to boil it off", off*m.latent/1e3)
	}
}

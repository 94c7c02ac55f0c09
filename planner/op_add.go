package planner

import "stillroom/chem"

// addOp doses something into a vessel below a temperature, while reactions may
// run.
type addOp struct {
	charges []charge
	from    string // a vessel whose contents are added; "" for charges
	below   chem.Temperature
	limited bool
	list    []progress
	ice     bool

	doses  []dose
	source int
	iceAsk int
}

func (o *addOp) read(f *fields) {
	o.charges = readCharges(f, false)
	o.from = f.text("from", false)
	if o.from == "" && len(o.charges) == 0 && f.values["charges"] == nil {
		f.fault(f.at, f.what+" adds nothing", "charges: or from:")
	}
	o.below, o.limited = take(f, "below", false, chem.ParseTemperature, "the highest temperature allowed, such as 25 °C")
	o.list = readProgress(f, false)
	o.ice = f.text("with", false) == "ice"
}

func (o *addOp) names(visit func(kind, name string, at place)) {
	nameCharges(o.charges, visit)
	nameProgress(o.list, visit)
	if o.from != "" {
		visit("vessel", o.from, place{})
	}
}

func (o addOp) compile(c *compiler) (runner, error) {
	var err error
	if o.doses, err = c.doses(o.charges); err != nil {
		return nil, err
	}
	o.source, o.iceAsk = -1, -1
	if o.from != "" {
		o.source = c.place[o.from]
	}
	if o.ice {
		o.iceAsk = c.ice("ice")
	}
	o.list, err = c.progress(o.list)
	return &o, err
}

func (o *addOp) run(w *Workspace) error {
	v := w.step.vessel
	heat := w.dilutionHeat(v)
	if o.source >= 0 {
		if err := w.needContents(o.source); err != nil {
			return err
		}
		heat += w.dilutionHeat(o.source)
		w.mixTemperature(o.source, v)
		w.moveAll(o.source, v)
	}
	for i := range o.doses {
		d := &o.doses[i]
		if d.component == noComponent {
			w.countPieces(d.ask, w.piecesOf(d), 0)
			continue
		}
		n := w.amountOf(d, v)
		heat += w.stockDilution(d.component, d.ask, n)
		if d.component == w.p.water {
			w.waterCharge(d, v, n)
			continue
		}
		w.pour(d, v, n)
	}
	w.heat += w.dilutionHeat(v) - heat
	w.settle(v)
	w.fullest(v)
	for i := range o.list {
		if err := w.progress(&o.list[i], v); err != nil {
			return err
		}
	}
	w.settle(v)
	w.fullest(v)
	if o.limited && (w.heat > 0 || w.celsius[v] > o.below.Celsius()) {
		w.celsius[v] = o.below.Celsius() // what is given off warms it to the limit
	}
	if o.iceAsk >= 0 {
		w.useIce(o.iceAsk, w.heat)
	}
	if w.report != nil {
		o.tell(w)
	}
	return nil
}

func (o *addOp) tell(w *Workspace) {
	w.sayHeat()
	w.report.dosed(w)
	if o.limited {
		w.say("keep below %.3g °C", o.below.Celsius())
	}
	for i := range o.doses {
		if d := &o.doses[i]; d.component >= 0 && w.p.matter[d.component].cas == "7664-93-9" {
			w.caution("acid into water, never water into acid")
		}
	}
}

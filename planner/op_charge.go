package planner

// chargeOp puts substances into a vessel.
type chargeOp struct {
	charges []charge
	doses   []dose
}

func (o *chargeOp) read(f *fields) { o.charges = readCharges(f, true) }

func (o *chargeOp) names(visit func(kind, name string, at place)) { nameCharges(o.charges, visit) }

func (o chargeOp) compile(c *compiler) (runner, error) {
	var err error
	o.doses, err = c.doses(o.charges)
	return &o, err
}

func (o *chargeOp) run(w *Workspace) error {
	v := w.step.vessel
	before := w.dilutionHeat(v)
	w.pourAll(o.doses, v)
	w.heat += w.dilutionHeat(v) - before
	w.settle(v)
	w.fullest(v)
	return nil
}

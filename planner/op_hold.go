package planner

import "stillroom/chem"

// holdOp keeps a vessel at a temperature.
type holdOp struct {
	at     chem.Temperature
	stated bool
}

func (o *holdOp) read(f *fields) {
	o.at, o.stated = take(f, "at", false, chem.ParseTemperature, "a temperature such as 20 °C")
}

func (o *holdOp) names(func(kind, name string, at place)) {}

func (o holdOp) compile(*compiler) (runner, error) { return &o, nil }

func (o *holdOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	if o.stated {
		w.celsius[v] = o.at.Celsius()
	}
	w.settle(v)
	w.fullest(v)
	return nil
}

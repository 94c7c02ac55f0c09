package planner

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
)

// discardOp puts a vessel, or one phase of it, into a waste stream.
type discardOp struct {
	stream string
	phase  string // "" for everything

	target, index int
}

func (o *discardOp) read(f *fields) {
	o.stream = f.text("stream", true)
	o.phase = f.text("phase", false)
	if o.phase != "" && !slices.Contains(phaseNames, o.phase) {
		f.faultAt(f.values["phase"], fmt.Sprintf("phase %q", o.phase), "one of "+strings.Join(phaseNames, ", "))
	}
}

func (o *discardOp) names(func(kind, name string, at place)) {}

func (o discardOp) compile(c *compiler) (runner, error) {
	o.target = c.sink("waste: " + o.stream)
	o.index = slices.Index(phaseNames, o.phase)
	return &o, nil
}

func (o *discardOp) run(w *Workspace) error {
	v := w.step.vessel
	if w.report == nil {
		o.empty(w, v)
		return nil
	}
	w.report.step.Stream = o.stream
	w.fullest(v)
	d := Discard{Stream: o.stream, Step: w.step.N, StepName: w.step.Name}
	for _, content := range w.contents(v) {
		if o.phase != "" && content.Phase != o.phase {
			continue
		}
		d.Contents = append(d.Contents, content)
		d.Mass += content.Mass
		d.Volume += content.Volume
	}
	if o.phase == "" || o.phase == "aqueous" {
		d.PH, _ = w.pH(v)
	}
	if d.Mass > 0 {
		w.report.walk.Waste = append(w.report.walk.Waste, d)
	} else {
		w.say("nothing to discard")
	}
	w.sayLoss(v, o.index)
	o.empty(w, v)
	w.say("%.3g g, %.3g mL to %s", d.Mass.Grams(), d.Volume.Millilitres(), o.stream)
	return nil
}

func (o *discardOp) empty(w *Workspace, v int) {
	if o.index >= 0 {
		w.movePhase(v, o.target, o.index, 1)
		return
	}
	w.moveAll(v, o.target)
}

// sayLoss notes the product that is thrown away.
func (w *Workspace) sayLoss(v, phase int) {
	n := w.total(v, w.p.product)
	if phase >= 0 {
		n = w.amounts[w.at(v, phase, w.p.product)]
	}
	theory := w.limiting * w.p.perLimiting
	if !(n > theory*1e-9) {
		return
	}
	w.report.walk.Losses = append(w.report.walk.Losses, Loss{
		Step: w.step.N, StepName: w.step.Name, Substance: w.p.matter[w.p.product].name,
		Where: "in " + w.p.places[v], Mass: chem.Mass(n * w.p.matter[w.p.product].molar * w.batches),
		Share: chem.Fraction(n / theory),
	})
}

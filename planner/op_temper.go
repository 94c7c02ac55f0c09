package planner

import (
	"math"

	"stillroom/chem"
)

// temperOp cools or heats a vessel to a temperature.
type temperOp struct {
	kind string
	to   chem.Temperature
	ice  string // key of the hidden need of ice; "" without
	ask  int
}

func (o *temperOp) read(f *fields) {
	o.to, _ = take(f, "to", true, chem.ParseTemperature, "a temperature such as 10 °C")
	if f.text("with", false) == "ice" {
		o.ice = "ice"
	}
}

func (o *temperOp) names(func(kind, name string, at place)) {}

func (o temperOp) compile(c *compiler) (runner, error) {
	o.ask = -1
	if o.ice != "" {
		o.ask = c.ice(o.ice)
	}
	return &o, nil
}

// ice enters the hidden need of ice.
func (c *compiler) ice(key string) int {
	c.p.asks = append(c.p.asks, Ask{
		Substance: "ice", Formula: "H2O", Step: c.step.N, StepName: c.step.Name,
		Rule: ruleWords[byLoad], Hidden: true, Key: key,
	})
	return len(c.p.asks) - 1
}

func (o *temperOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	gap := w.celsius[v] - o.to.Celsius()
	if o.kind == "heat" && gap > 0 || o.kind == "cool" && gap < 0 {
		other := map[string]string{"heat": "cool", "cool": "heat"}[o.kind]
		return w.refuse(ErrScale, plainf("%s is at %.3g °C already", w.p.places[v], w.celsius[v]), plainf("use %s, or leave the step out", other))
	}
	q := gap * w.heatCapacity(v)
	w.celsius[v] = o.to.Celsius()
	w.heat = q
	w.fullest(v)
	if w.report != nil {
		w.say("%.3g kJ to %s from %.3g to %.3g °C", math.Abs(q)/1e3, o.kind, o.to.Celsius()+gap, o.to.Celsius())
	}
	if o.ask >= 0 && q > 0 {
		w.useIce(o.ask, q)
	}
	return nil
}

// useIce books the ice that takes up a heat, with the policy's spare.
func (w *Workspace) useIce(ask int, heat float64) {
	if w.off[ask] || heat <= 0 {
		return
	}
	melted := float64(chem.IceFor(chem.Energy(heat)))
	spare := math.Max(w.policy.iceSpare, 1)
	w.used[ask] += float64(melted * spare)
	if w.report == nil {
		return
	}
	a := &w.report.asks[ask]
	a.Pure += chem.Mass(melted * spare)
	a.Amount = chem.Amount(float64(a.Pure) / w.p.matter[w.p.water].molar)
	a.Why = plainf("%.3g kJ melt %.3g g of ice at 334 J/g; with %.3g times as much to spare %.3g g", heat/1e3, melted*1e3, spare, melted*spare*1e3)
	a.Derivation = chem.Derivation{
		Of: "ice", Formula: "m = q / ΔH(fusion) · spare", Inserted: a.Why,
		Inputs: []chem.Input{
			{Symbol: "q", Name: "heat to be taken up", Value: heat / 1e3, Unit: "kJ", Source: "heat balance of the step"},
			{Symbol: "spare", Name: "ice taken against ice melted", Value: spare, Source: "policy heat.ice-spare"},
		},
		Value: float64(a.Pure) * 1e3, Unit: "g", Source: "Stoessel, Thermal Safety of Chemical Processes; OpenStax Chemistry 2e, 5.2",
	}
	w.report.step.Ice += chem.Mass(melted * spare)
}

package planner

import (
	"fmt"

	"stillroom/chem"
)

// dryOp takes the water out of an organic liquid with a drying agent.
type dryOp struct {
	agent charge

	dose   dose
	data   chem.DryingAgent
	factor int
}

func (o *dryOp) read(f *fields) {
	if g := f.inner("agent", true); g != nil {
		o.agent = readCharge(g, false)
		g.done()
	}
}

func (o *dryOp) names(visit func(kind, name string, at place)) {
	visit("substance", o.agent.substance, o.agent.pos)
}

func (o dryOp) compile(c *compiler) (runner, error) {
	var err error
	if o.data, err = chem.DryingAgentOf(o.agent.substance); err != nil {
		return nil, c.refuse(ErrNoData, err.Error(), "")
	}
	for _, class := range chem.DryingClasses(c.p.matter[c.p.product].groups) {
		if reason, bad := o.data.Unsuitable(class); bad {
			return nil, c.refuse(ErrUnsuitable, fmt.Sprintf("%s is of the %s: %s", c.r.Product, class, reason), "take "+otherAgent(class))
		}
	}
	if o.agent.hiddenKey == "" {
		o.agent.hiddenKey = "drying-agent"
	}
	if o.dose, err = c.dose(o.agent); err != nil {
		return nil, err
	}
	o.factor = c.agentFactor()
	return &o, nil
}

// otherAgent names the first agent of the table that isn't unsuitable for a class.
func otherAgent(class string) string {
	for _, a := range chem.DryingAgents() {
		if _, bad := a.Unsuitable(class); !bad && a.High > 0 {
			return a.Name
		}
	}
	return "no agent of the table"
}

// typical is the capacity in practice, in kg water per kg agent: the middle of
// the range where there is one, half the theoretical capacity otherwise
// (Robertson, Laboratory Practice of Organic Chemistry, pp. 147 to 152).
func (o *dryOp) typical() float64 {
	if o.data.High > 0 {
		return (o.data.Low + o.data.High) / 2
	}
	return o.data.Theoretical / 2
}

// run takes the water of the organic phase up into the agent. The agent and its
// water are a solid from then on.
func (o *dryOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	w.settle(v)
	if aq := w.volume(v, aqueous); aq > w.volume(v, organic)/10 {
		return w.refuse(ErrOnePhase, plainf("%s still holds %.3g mL of an aqueous layer", w.p.places[v], aq*1e6), "separate the layers before drying")
	}
	molar := w.p.matter[w.p.water].molar
	water := w.total(v, w.p.water)
	agent := &w.p.matter[o.dose.component]
	planned := water * molar / o.typical()
	if planned <= 0 || w.off[o.dose.ask] {
		return nil
	}
	w.pour(&o.dose, v, planned/agent.molar)
	w.used[o.dose.ask] += float64((w.value(o.factor) - 1) * planned)
	w.shift(v, organic, solid, w.p.water, w.amounts[w.at(v, organic, w.p.water)])
	for c := range w.p.matter {
		if !w.p.matter[c].distributes() { // the agent, the water and the salts of its droplets
			w.shift(v, aqueous, solid, c, w.amounts[w.at(v, aqueous, c)])
		}
	}
	w.part(v)
	w.fullest(v)
	if w.report != nil {
		o.tell(w, water*molar, planned)
	}
	return nil
}

func (o *dryOp) tell(w *Workspace, water, planned float64) {
	a := &w.report.asks[o.dose.ask]
	a.Why = plainf("%.3g g of water to bind at %.3g g/g (practice %.3g to %.3g): %.3g g, then more until it flows freely", water*1e3, o.typical(), o.data.Low, o.data.High, planned*1e3)
	w.say("%.3g g of water to bind takes %.3g g of %s; it is enough when it flows freely", water*1e3, planned*1e3, o.data.Name)
	a.Derivation = chem.Derivation{
		Of: o.data.Name, Formula: "m = m(water) / capacity", Inserted: a.Why,
		Inputs: []chem.Input{
			{Symbol: "m(water)", Name: "water in the organic liquid", Value: water * 1e3, Unit: "g", Source: "mutual solubility, contents of the vessel"},
			{Symbol: "capacity", Name: "capacity in practice", Value: o.typical(), Unit: "g/g", Source: o.data.Source},
		},
		Value: planned * 1e3, Unit: "g", Source: "Robertson, Laboratory Practice of Organic Chemistry, 3rd ed., pp. 147 to 152", Notes: []string{o.data.Notes},
	}
}

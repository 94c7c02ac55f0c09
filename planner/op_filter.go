package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// filterOp parts a liquid from a solid: the liquid goes to another vessel but
// for what the cake holds.
type filterOp struct {
	holds   float64 // liquid held by the cake in m3 per kg
	to      string
	papers  float64
	isolate bool

	target   int
	paperAsk int
}

func (o *filterOp) read(f *fields) {
	holds, _ := take(f, "cake-holds", true, readNumber, "the liquid a gram of cake holds in mL, such as 0.5")
	o.holds = holds * 1e-3
	o.to = f.text("to", true)
	o.papers, _ = take(f, "papers", false, readNumber, "how many filter papers, such as 1")
	o.isolate = f.flag("isolate")
}

func (o *filterOp) names(visit func(kind, name string, at place)) {
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o filterOp) compile(c *compiler) (runner, error) {
	o.target, o.paperAsk = c.place[o.to], -1
	if o.papers > 0 {
		o.paperAsk = c.pieces("filter paper", "filter-papers", "the solid is filtered off")
	}
	return &o, nil
}

func (o *filterOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	cake := w.mass(v, solid)
	if cake <= 0 {
		return w.refuse(ErrOnePhase, fmt.Sprintf("%s holds no solid to filter off", w.p.places[v]), "leave the step out, or precipitate the solid first")
	}
	w.fullest(v)
	liquid := w.volume(v, aqueous) + w.volume(v, organic)
	held := math.Min(o.holds*cake, liquid)
	share := 1.0
	if liquid > 0 {
		share = 1 - held/liquid
	}
	product := w.total(v, w.p.product)
	w.movePhase(v, o.target, aqueous, share)
	w.movePhase(v, o.target, organic, share)
	w.fullest(o.target)
	if o.paperAsk >= 0 {
		w.countPieces(o.paperAsk, o.papers, 0)
	}
	if w.report != nil {
		o.tell(w, cake, held, share, product)
	}
	if o.isolate {
		return w.isolate(v, solid)
	}
	return nil
}

func (o *filterOp) tell(w *Workspace, cake, held, share, product float64) {
	w.say("%.3g g of solid hold %.3g mL of liquid", cake*1e3, held*1e6)
	if product > 0 {
		left := w.total(w.step.vessel, w.p.product)
		w.say("%.2g %% of the %s stays with the solid before rinsing", 100*left/product, w.p.matter[w.p.product].name)
	}
	w.derive(func() chem.Derivation {
		return chem.Derivation{
			Of: "liquid held by the cake", Formula: "V = m(cake) · h", Inserted: plainf("%.5g g · %.4g mL/g = %.5g mL", cake*1e3, o.holds*1e3, held*1e6),
			Inputs: []chem.Input{
				{Symbol: "m(cake)", Name: "solid", Value: cake * 1e3, Unit: "g", Source: "contents of the vessel"},
				{Symbol: "h", Name: "liquid held", Value: o.holds * 1e3, Unit: "mL/g", Source: "recipe"},
			},
			Value: held * 1e6, Unit: "mL", Source: "common practice",
		}
	})
}

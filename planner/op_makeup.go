package planner

import (
	"stillroom/chem"
)

// makeUpOp dissolves or dilutes: solutes go in, then water up to a mass
// fraction, less the water the stocks bring.
type makeUpOp struct {
	charges  []charge
	to       chem.Fraction
	doses    []dose
	waterAsk int
}

func (o *makeUpOp) read(f *fields) {
	o.charges = readCharges(f, true)
	o.to, _ = take(f, "to", true, chem.ParseFraction, "the strength of the solution as a mass fraction, such as 30 %")
	if f.values["to"] != nil && !(o.to > 0 && o.to < 1) {
		f.faultAt(f.values["to"], "a strength of "+nodeText(f.values["to"]), "more than 0 and less than 100 %")
	}
}

func (o *makeUpOp) names(visit func(kind, name string, at place)) { nameCharges(o.charges, visit) }

func (o makeUpOp) compile(c *compiler) (runner, error) {
	var err error
	if o.doses, err = c.doses(o.charges); err != nil {
		return nil, err
	}
	o.waterAsk = c.ask(c.p.water, Accept{}, byMole, "", false)
	return &o, nil
}

// run adds water until the solutes poured in have the strength asked for:
//
//	m(water) = m(solutes) (1 − w)/w − m(water of the stocks)
func (o *makeUpOp) run(w *Workspace) error {
	v := w.step.vessel
	heat := w.dilutionHeat(v)
	solutes, stocks := 0.0, 0.0
	for i := range o.doses {
		d := &o.doses[i]
		if d.component == noComponent {
			w.countPieces(d.ask, w.piecesOf(d), 0)
			continue
		}
		n := w.amountOf(d, v)
		stock := w.pour(d, v, n)
		solutes += float64(n * w.p.matter[d.component].molar)
		stocks += float64(stock * w.stocks[d.ask].water)
	}
	planned := float64(solutes * float64((1-o.to)/o.to))
	water := planned - stocks
	w.brought[v] = 0
	if water < 0 {
		return w.refuse(ErrScale, plainf("the stocks bring %.4g g of water, more than the %.4g g of a %.3g %% solution", stocks*1e3, planned*1e3, o.to.Percent()),
			plainf("use a stronger stock, or make up to %.3g %%", 100*solutes/(solutes+stocks)))
	}
	w.draw(o.waterAsk, w.p.water, v, water/w.p.matter[w.p.water].molar)
	w.heat += w.dilutionHeat(v) - heat
	w.settle(v)
	w.fullest(v)
	if w.report != nil {
		o.tell(w, planned, stocks, water)
	}
	return nil
}

func (o *makeUpOp) tell(w *Workspace, planned, stocks, water float64) {
	w.say("%.3g mL of a %.3g %% w/w solution", w.filled(w.step.vessel)*1e6, o.to.Percent())
	if stocks > 1e-9*planned {
		w.say("%.4g g of water comes with the stocks and is taken off the %.4g g of the recipe", stocks*1e3, planned*1e3)
	}
	w.derive(func() chem.Derivation {
		return chem.Derivation{
			Of: "water of the make-up", Formula: "m(water) = m(solutes) · (1 − w)/w − m(water of the stocks)",
			Inserted: plainf("%.6g g − %.6g g = %.6g g", planned*1e3, stocks*1e3, water*1e3),
			Inputs: []chem.Input{
				{Symbol: "w", Name: "strength", Value: float64(o.to), Source: "recipe"},
				{Symbol: "m(water of the stocks)", Name: "water of hydration and solution", Value: stocks * 1e3, Unit: "g", Source: "stocks drawn"},
			},
			Value: water * 1e3, Unit: "g", Source: "OpenStax Chemistry 2e, 3.3, 3.4 and 11.4",
		}
	})
	w.sayHeat()
}

package planner

import (
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// A make-up dilutes a stock that is stronger than the recipe allows, in a step
// of its own that the recipe's text doesn't have.
type makeUp struct {
	substance string
	cas       string
	formula   string
	form      *inventory.StockForm
	bottle    string
	step      int // the first step that uses it
	stepName  string
	from, to  chem.Fraction
	stock     chem.Mass
	pure      chem.Mass
	molar     chem.MolarMass
	density   chem.Density
	water     chem.Mass
}

// makeUpsOf lists the dilutions that the draws call for. A stock whose strength
// is a range is diluted as if it were at the high end, so that the result is
// within the window.
func makeUpsOf(covers []coverage) []makeUp {
	var list []makeUp
	for i := range covers {
		c := &covers[i]
		for k, t := range c.alloc.taken {
			x := &c.found.fits[t.line]
			if !x.dilute {
				continue
			}
			d := &c.need.Draws[k]
			to := c.demand.accept.Most
			list = append(list, makeUp{
				substance: c.demand.name, cas: c.demand.cas, formula: c.demand.formula, form: x.form, bottle: x.bottle.Code,
				step: d.Steps[0].Step, stepName: c.need.For[0], from: x.strength, to: to,
				stock: d.Mass, pure: d.Pure, molar: c.demand.molar, density: chem.Density(x.form.DensityGML) * chem.GramPerMillilitre,
				water: max(0, chem.Mass(float64(d.Pure)/float64(to))-d.Mass),
			})
		}
	}
	return list
}

// makeUpAsks are the asks for the water of make-ups.
func makeUpAsks(made []makeUp) []Ask {
	var asks []Ask
	for _, u := range made {
		water, _ := chem.ParseFormula("H2O")
		asks = append(asks, Ask{
			Substance: "water", CAS: "7732-18-5", Formula: "H2O", Step: u.step, StepName: "dilute " + u.substance,
			Pure: u.water, Amount: water.MolarMass().Of(u.water), Rule: "by mole", Hidden: true, Key: "make-up of " + u.substance,
			Why: plainf("%s is stronger (%.3g %%) than the recipe allows (%.3g %%): %.4g g of it take %.4g g of water",
				u.form.Name, u.from.Percent(), u.to.Percent(), u.stock.Grams(), u.water.Grams()),
		})
	}
	return asks
}

// insertMakeUps puts the make-ups before the steps that use them and numbers
// everything anew.
func (p *planning) insertMakeUps(plan *Plan) {
	if len(p.made) == 0 {
		return
	}
	steps := make([]StepReport, 0, len(plan.Steps)+len(p.made))
	number := make(map[int]int, len(plan.Steps))
	for _, s := range plan.Steps {
		for i := range p.made {
			if p.made[i].step == s.N {
				steps = append(steps, p.made[i].report(len(steps)+1, p.batches))
			}
		}
		number[s.N] = len(steps) + 1
		s.N = len(steps) + 1
		steps = append(steps, s)
	}
	plan.Steps = steps
	p.renumber(plan, number)
}

func (p *planning) renumber(plan *Plan, number map[int]int) {
	for i := range p.covers {
		n := &p.covers[i].need
		n.Parts = slices.Clone(n.Parts)
		for k := range n.Parts {
			n.Parts[k].Step = number[n.Parts[k].Step]
		}
		for d := range n.Draws {
			for k := range n.Draws[d].Steps {
				n.Draws[d].Steps[k].Step = number[n.Draws[d].Steps[k].Step]
			}
		}
	}
	plan.Findings = slices.Clone(plan.Findings)
	for i := range plan.Findings {
		if to, ok := number[plan.Findings[i].Step]; ok {
			plan.Findings[i].Step = to
		}
	}
}

// report is the make-up as a step of one batch, with its heat and the caution.
func (u *makeUp) report(n, batches int) StepReport {
	share := 1 / float64(max(1, batches))
	stock, water, pure := u.stock*chem.Mass(share), u.water*chem.Mass(share), u.pure*chem.Mass(share)
	s := StepReport{
		N: n, Do: "make-up", Name: plainf("dilute %s to %.3g %%", u.substance, u.to.Percent()),
		Vessel: VesselReport{Name: "made-up " + u.substance, Kind: "beaker"},
		Adds: []Add{
			{Substance: "water", Form: "water", Mass: water, Volume: waterVolume(water), HasVolume: true, Rule: "by mole"},
			{Substance: u.substance, Form: u.form.Name, Mass: stock, Rule: "by mole"},
		},
		Contents: []Content{
			{Substance: u.substance, Formula: u.formula, Phase: "aqueous", Mass: pure},
			{Substance: "water", Formula: "H2O", Phase: "aqueous", Mass: stock + water - pure},
		},
		TimeNotAssessed: true,
		Cautions: []string{
			"Put the water in first and pour " + u.substance + " into it slowly, with stirring; never pour water into it.",
			"Cool from outside and let it come back to room temperature before use.",
		},
		Says: []string{plainf("%.4g g of %s into %.4g g of water", stock.Grams(), u.form.Name, water.Grams())},
	}
	if u.density > 0 {
		s.Adds[1].Volume, s.Adds[1].HasVolume = u.density.Volume(stock), true
	}
	if u.molar > 0 {
		s.Adds[1].Amount, s.Contents[0].Amount = u.molar.Of(pure), u.molar.Of(pure)
		if q, err := chem.DilutionHeat(u.cas, u.molar.Of(pure), u.from, u.to); err == nil {
			s.Heat = q
			s.Says = append(s.Says, plainf("gives off %.3g kJ", q.Kilojoules()))
		} else {
			s.Says = append(s.Says, "heat of dilution: no data, not assessed")
			s.Cautions = append(s.Cautions, "The heat of dilution is not known here: treat it as large.")
		}
	}
	return s
}

// waterVolume is at 20 °C, 0.99821 g/mL (IAPWS-95 at 101.325 kPa; from memory).
func waterVolume(m chem.Mass) chem.Volume {
	return chem.Density(0.99821 * chem.GramPerMillilitre).Volume(m)
}

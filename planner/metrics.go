package planner

import (
	"stillroom/chem"
)

// metrics counts everything that is drawn or short, water included, but not
// what is counted in pieces.
func (p *planning) metrics(plan *Plan) Metrics {
	var inputs []chem.Mass
	for i := range plan.Needs {
		n := &plan.Needs[i]
		if n.Count {
			continue
		}
		for _, d := range n.Draws {
			inputs = append(inputs, d.Mass)
		}
		inputs = append(inputs, n.Short)
	}
	m := Metrics{}
	product := p.walk.Product.Mass
	if pmi, err := chem.ProcessMassIntensity(inputs, product); err == nil {
		m.ProcessMassIntensity = pmi
	}
	if e, err := chem.EFactor(inputs, product); err == nil {
		m.EFactor = e
	}
	if program, ok := p.program.(interface{ atomEconomy() (chem.Fraction, bool) }); ok {
		m.AtomEconomy, _ = program.atomEconomy()
	}
	return m
}

// atomEconomy is the share of the mass of the reactants that the reactions
// from the limiting reagent to the product put into it, without excess and
// solvents (B. M. Trost, Science 254 (1991) 1471). What one reaction forms and
// a later one consumes cancels out.
func (p *Program) atomEconomy() (chem.Fraction, bool) {
	net := make([]float64, len(p.matter))
	if !p.addAlong(p.limiting, 1, net, map[int]bool{}) {
		return 0, false
	}
	in := 0.0
	for i, n := range net {
		if n < 0 {
			in -= n * p.matter[i].molar
		}
	}
	out := net[p.product] * p.matter[p.product].molar
	if !(in > 0) || !(out > 0) {
		return 0, false
	}
	return chem.Fraction(out / in), true
}

// addAlong adds, for n moles of component i, the reactions along the best way
// to the product; it reports whether there is one.
func (p *Program) addAlong(i int, n float64, net []float64, seen map[int]bool) bool {
	if i == p.product {
		return true
	}
	seen[i] = true
	best, bestYield, next, number := -1, 0.0, 0, 0.0
	for k := range p.reactions {
		x := &p.reactions[k]
		from := x.numberOf(i)
		if from >= 0 {
			continue
		}
		for _, t := range x.terms {
			if t.number <= 0 || seen[t.component] || t.component == p.water {
				continue
			}
			if y := p.yieldAlong(t.component, seen) * t.number / -from; y > bestYield {
				best, bestYield, next, number = k, y, t.component, t.number/-from
			}
		}
	}
	if best < 0 {
		return false
	}
	x := &p.reactions[best]
	for _, t := range x.terms {
		net[t.component] += n * t.number / -x.numberOf(i)
	}
	return p.addAlong(next, n*number, net, seen)
}

package planner

import (
	"stillroom/chem"
)

// PairsOf returns what must never meet out of everything a run brings together:
// what it needs, adds, forms and throws away.
func PairsOf(needs []Need, steps []StepReport) []chem.Incompatibility {
	var rs []chem.Reactant
	seen := map[string]bool{}
	add := func(name, formula string) {
		if name == "" || seen[name] {
			return
		}
		r := reactant(name, formula)
		before := seen[r.Name]
		seen[name], seen[r.Name] = true, true
		if before {
			return
		}
		rs = append(rs, r)
	}
	for _, n := range needs {
		if !n.Count {
			add(n.Substance, n.Formula)
		}
	}
	for _, s := range steps {
		for _, c := range s.Contents {
			add(c.Substance, c.Formula)
		}
	}
	return chem.IncompatibleReactants(rs)
}

// CarriersFor groups the bottles that a plan draws from: bottles that must not
// meet travel apart, within the limits.
func CarriersFor(needs []Need, limits CarrierLimits) ([]Carrier, error) {
	var items []CarrierItem
	var rs []chem.Reactant
	seen := map[string]bool{}
	for _, n := range needs {
		for _, d := range n.Draws {
			if n.Count || seen[d.Bottle.Code] {
				continue
			}
			seen[d.Bottle.Code] = true
			gross := d.Mass + d.Leaves + chem.Mass(d.Bottle.TareUG)*chem.Microgram
			items = append(items, CarrierItem{Code: d.Bottle.Code, Mass: gross, Walk: d.Place.Walk})
			rs = append(rs, reactant(n.Substance, n.Formula))
		}
	}
	return GroupCarriers(items, chem.CarriedApart(rs), limits)
}

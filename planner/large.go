package planner

import (
	"stillroom/chem"
	"stillroom/inventory"
)

// largeFindings notes what counts as large (practice §1, scale facts). How the
// scale stands to what is proven comes from the walk-through.
func (p *planning) largeFindings(plan *Plan) []Finding {
	var found []Finding
	limiting := p.limitingMass()
	if most := p.policy.value("scale.large-substrate"); limiting.Grams() > most {
		found = append(found, Finding{Kind: "large-substrate", Severity: Note,
			Text: plainf("%s of %s a batch: above %.3g g a run counts as large", massText(limiting), p.scale.Limiting, most)})
	}
	solvent := p.solventVolume(plan)
	if most := p.policy.value("scale.large-solvent"); solvent.Millilitres() > most {
		found = append(found, Finding{Kind: "large-solvent", Severity: Note,
			Text: plainf("%.2g L of organic solvents a batch: above %.3g mL a run counts as large", solvent.Litres(), most)})
	}
	return found
}

// limitingMass is the pure mass of limiting reagent in one batch.
func (p *planning) limitingMass() chem.Mass {
	sum := chem.Mass(0)
	for i := range p.asks {
		if p.asks[i].Substance == p.scale.Limiting {
			sum += p.asks[i].Pure
		}
	}
	return sum / chem.Mass(p.batches)
}

// solventVolume is what one batch draws of flammable liquids beside the
// limiting reagent.
func (p *planning) solventVolume(plan *Plan) chem.Volume {
	sum := chem.Volume(0)
	for i := range plan.Needs {
		if plan.Needs[i].Substance == p.scale.Limiting {
			continue
		}
		for _, d := range plan.Needs[i].Draws {
			if d.Form.StorageClass == flammable && d.Form.Measure == inventory.ByVolume {
				sum += d.Volume
			}
		}
	}
	return sum / chem.Volume(p.batches)
}

// flammable is the storage class of flammable liquids.
const flammable = "flammable liquid"

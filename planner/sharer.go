package planner

import (
	"stillroom/chem"
	"stillroom/inventory"
)

// sharer hands draws to the charges in the order of the steps.
type sharer struct {
	steps []int
	left  []float64
	at    int
}

func newSharer(c *coverage, asks []Ask) *sharer {
	s := &sharer{}
	for _, i := range c.demand.asks {
		s.steps = append(s.steps, asks[i].Step)
		s.left = append(s.left, amountOf(&asks[i]))
	}
	return s
}

// share gives an amount of a bottle to the next charges that still lack some.
func (s *sharer) share(amount float64, x *fit) []StepDraw {
	var out []StepDraw
	for amount > 0 && s.at < len(s.steps) {
		part := min(amount, s.left[s.at])
		if part > 0 {
			out = addStepDraw(out, s.steps[s.at], part, x)
		}
		amount -= part
		s.left[s.at] -= part
		if s.left[s.at] > 0 {
			break
		}
		s.at++
	}
	return out
}

func addStepDraw(out []StepDraw, step int, part float64, x *fit) []StepDraw {
	if len(out) == 0 || out[len(out)-1].Step != step {
		out = append(out, StepDraw{Step: step})
	}
	d := &out[len(out)-1]
	units := part / x.pure
	if x.form.Measure == inventory.ByCount {
		d.Pieces += part
		return out
	}
	d.Mass += chem.Mass(units * x.content)
	if x.form.Measure == inventory.ByVolume {
		d.Volume += chem.Volume(units) * chem.Microlitre
	}
	return out
}

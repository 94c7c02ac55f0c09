package planner

import (
	"fmt"

	"stillroom/chem"
)

// The priors of the uncertain quantities below are common practice, as the
// policy table states them; Compile knows no site, so that a site that sets
// them otherwise changes the walk's figures through Conditions.Policy only
// where a step reads them there.

// emulsion enters whether a work-up has an emulsion: 5 to 15 % have one.
func (c *compiler) emulsion() int {
	d, err := chem.NewBernoulli(0.10)
	if err != nil {
		return c.factor("", chem.Exactly(0))
	}
	return c.factor(fmt.Sprintf("step %d emulsion", c.step.N), d)
}

// needFactor enters by how much the real use of something goes beyond what the
// balance asks, with mean 1: lognormal for drying agents (sd 40 %), normal for
// acid and base (10 to 20 % either way, taken as two standard deviations).
func (c *compiler) agentFactor() int {
	d, err := chem.NewLogNormal(1, 0.40)
	if err != nil {
		return c.factor("", chem.Exactly(1))
	}
	return c.factor(fmt.Sprintf("step %d drying agent", c.step.N), d)
}

func (c *compiler) titrationFactor() int {
	d, err := chem.NewNormal(1, 0.075)
	if err != nil {
		return c.factor("", chem.Exactly(1))
	}
	return c.factor(fmt.Sprintf("step %d acid or base", c.step.N), d)
}

// quenchFactor enters the reductant used against theory: 1.1 to 1.5 times.
func (c *compiler) quenchFactor(excess float64) int {
	d, err := chem.NewUniform(1.1, 1.5)
	if err != nil {
		return c.factor("", chem.Exactly(1+excess))
	}
	i := c.factor(fmt.Sprintf("step %d reductant", c.step.N), d)
	c.p.factors[i].mean = 1 + excess
	return i
}

// solventLoss enters the share of a solvent lost in an extraction by
// evaporation and wetting: lognormal, mean 5 %, sd 3 %.
func (c *compiler) solventLoss() int {
	d, err := chem.NewLogNormal(0.05, 0.03)
	if err != nil {
		return c.factor("", chem.Exactly(0.05))
	}
	return c.factor(fmt.Sprintf("step %d solvent lost", c.step.N), d)
}

// recoveredFactor enters the share of a stripped solvent that is caught: 80 to 95 %.
func (c *compiler) recoveredFactor() int {
	d, err := chem.NewUniform(0.80, 0.95)
	if err != nil {
		return c.factor("", chem.Exactly(0.875))
	}
	return c.factor(fmt.Sprintf("step %d solvent caught", c.step.N), d)
}

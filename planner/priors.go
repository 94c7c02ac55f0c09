package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// factor is an uncertain quantity of a program. Its distribution is made from
// the policy when a workspace is: the priors are the site's.
type factor struct {
	name string
	make func(*policyTable) (chem.Dist, error)
	// mean is what the deterministic walk takes; NaN means the distribution's.
	mean float64
}

// factorValue is a factor under one policy.
type factorValue struct {
	dist chem.Dist
	mean float64
}

// valuesOf makes the factors of a program under a policy. A prior that the
// policy states out of range is taken as exactly its mean.
func (p *Program) valuesOf(policy *policyTable) []factorValue {
	values := make([]factorValue, len(p.factors))
	for i, f := range p.factors {
		d, err := f.make(policy)
		if err != nil {
			d = chem.Exactly(f.mean)
		}
		values[i] = factorValue{d, f.mean}
		if math.IsNaN(f.mean) {
			values[i].mean = d.Mean()
		}
	}
	return values
}

// factor enters a quantity and returns its index.
func (c *compiler) factor(what string, mean float64, make func(*policyTable) (chem.Dist, error)) int {
	name := what
	if c.step != nil {
		name = fmt.Sprintf("step %d %s", c.step.N, what)
	}
	c.p.factors = append(c.p.factors, factor{name, make, mean})
	return len(c.p.factors) - 1
}

// share enters a fraction with the spread the recipe states, cut at 0 and 1.
func (c *compiler) share(what string, s Spread) int {
	d, err := s.dist()
	return c.factor(what, s.Mean, func(*policyTable) (chem.Dist, error) { return d, err })
}

func (s Spread) dist() (chem.Dist, error) {
	if s.SD == 0 {
		return chem.Exactly(s.Mean), nil
	}
	normal, err := chem.NewNormal(s.Mean, s.SD)
	if err != nil {
		return nil, err
	}
	return chem.NewClipped(normal, 0, 1)
}

// emulsion enters whether a work-up has an emulsion.
func (c *compiler) emulsion() int {
	return c.factor("emulsion", 0, func(p *policyTable) (chem.Dist, error) {
		return chem.NewBernoulli(p.value("prior.emulsion.chance"))
	})
}

// agentFactor enters how much drying agent is used against what the water asks.
func (c *compiler) agentFactor() int {
	return c.factor("drying agent", 1, func(p *policyTable) (chem.Dist, error) {
		return chem.NewLogNormal(1, p.value("prior.drying-agent.sd"))
	})
}

// titrationFactor enters how much acid or base is used against the balance.
func (c *compiler) titrationFactor() int {
	return c.factor("acid or base", 1, func(p *policyTable) (chem.Dist, error) {
		return chem.NewNormal(1, p.value("prior.acid-base.sd"))
	})
}

// quenchFactor enters the reductant used against theory.
func (c *compiler) quenchFactor(excess float64) int {
	return c.factor("reductant", 1+excess, func(p *policyTable) (chem.Dist, error) {
		return chem.NewUniform(p.value("prior.quench.low"), p.value("prior.quench.high"))
	})
}

// solventLoss enters the share of a solvent lost in an extraction by
// evaporation and wetting.
func (c *compiler) solventLoss() int {
	return c.factor("solvent lost", nan, func(p *policyTable) (chem.Dist, error) {
		return chem.NewLogNormal(p.value("prior.solvent-loss.mean"), p.value("prior.solvent-loss.sd"))
	})
}

// Relative spreads of partition coefficients, common practice: measured ones
// differ from paper to paper by a tenth, computed or estimated ones by a third.
const (
	spreadMeasured  = 0.10
	spreadEstimated = 0.33
)

// partitionFactor enters by how much the partition coefficients of an
// extraction differ from their values.
func (c *compiler) partitionFactor(solute, solvent int) int {
	spread := spreadEstimated
	if p, err := chem.PartitionOf(c.p.matter[solute].cas, c.p.matter[solvent].cas); err == nil && p.Measured {
		spread = spreadMeasured
	}
	return c.factor("partition", 1, func(*policyTable) (chem.Dist, error) { return chem.NewLogNormal(1, spread) })
}

// caughtFactor enters the share of a stripped solvent that is caught: 80 to
// 95 % (common practice; for the waste only).
func (c *compiler) caughtFactor() int {
	return c.factor("solvent caught", nan, func(*policyTable) (chem.Dist, error) { return chem.NewUniform(0.80, 0.95) })
}

// addYield enters the isolated yield.
func (c *compiler) addYield() {
	c.step = nil
	d, err := c.r.Yield.Dist()
	c.p.yield, c.p.yieldErr = d, err
	c.p.yieldFactor = c.factor("isolated yield", float64(c.r.Yield.Mean), func(*policyTable) (chem.Dist, error) { return d, err })
}

// nan marks a factor whose mean is that of its distribution.
var nan = math.NaN()

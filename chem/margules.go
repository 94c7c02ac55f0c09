package chem

import (
	"fmt"
	"math"
)

// towardsAzeotrope distils a partner that mixes with water and boils over with
// it as a homogeneous azeotrope of lowest boiling point. Below the azeotrope's
// composition the partner is the more volatile one; above it no distillation
// carries it over to a high recovery, and the error says how much water would.
func (c CoDistilling) towardsAzeotrope(d CoDistillation, a Azeotrope) (CoDistillation, error) {
	molar, ok := tableMolarMass(c.CAS)
	if !ok {
		return c.dissolved(d, c.Partner, c.Water, c.Partner*Mass(1-c.Recovery))
	}
	// amount of water per amount of partner, times mass of partner per mass of
	// water, is a constant
	weight := float64(molar) / waterMolarMass
	ratio := perWater(a.PartnerFraction)
	xAzeotrope := ratio / (ratio + weight)
	start := float64(c.Partner / c.Water)
	if start >= ratio {
		return CoDistillation{}, &DataError{
			Of: c.String(), Err: ErrImpossible,
			Limit:  fmt.Sprintf("the pot has %.3g g per g of water, the azeotrope %.3g", start, ratio),
			Remedy: fmt.Sprintf("add at least %.4g g of water", (c.Partner/Mass(ratio) - c.Water).Grams()),
		}
	}
	log := math.Log(d.Alpha)
	alpha := func(partner, water float64) float64 {
		x := partner / (partner + water*weight)
		return math.Exp(log * (1 - x/xAzeotrope))
	}
	partner, over := float64(c.Partner), 0.0
	left := float64(c.Partner) * (1 - float64(c.Recovery))
	water := float64(c.Water)
	// Runge-Kutta in s = ln(partner), d(water distilled)/ds = −water/α; the
	// pot's water falls with it unless it is kept up
	const steps = 400
	h := (math.Log(left) - math.Log(partner)) / steps
	slope := func(s, gone float64) float64 {
		pot := water
		if !c.Level {
			pot -= gone
		}
		return -pot / alpha(math.Exp(s), pot)
	}
	s := math.Log(partner)
	for range steps {
		k1 := slope(s, over)
		k2 := slope(s+h/2, over+h/2*k1)
		k3 := slope(s+h/2, over+h/2*k2)
		k4 := slope(s+h, over+h*k3)
		over += h / 6 * (k1 + 2*k2 + 2*k3 + k4)
		s += h
	}
	d.Water, d.Partner, d.PotWater = Mass(over), c.Partner-Mass(left), c.Water
	if !c.Level {
		d.PotWater -= Mass(over)
	}
	return d.unlessDry(c.dry(d, d.Water))
}

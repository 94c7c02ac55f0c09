package planner

import (
	"math"
	"slices"

	"stillroom/chem"
)

// stockSum adds up what is drawn under one name.
type stockSum struct {
	mass, pure, water, volume float64
	form                      string
	noVolume                  bool
}

// dilute adds a draw that is made up before it is used: the walk-through sees
// the made-up solution, whose density isn't known.
func (s *stockSum) dilute(c *coverage, x *fit, mass float64) {
	pure := mass * float64(x.share)
	made := pure / float64(c.demand.accept.Most)
	s.mass += made
	s.pure += pure
	s.water += made - pure
	s.noVolume = true
}

// stocksOf is the composition of what is drawn, by the recipe's name of each
// substance, for the next pass of the walk-through.
func stocksOf(covers []coverage, asks []Ask) map[string]Stock {
	sums := map[string]*stockSum{}
	for i := range covers {
		c := &covers[i]
		if c.demand.count {
			continue
		}
		for _, d := range c.alloc.taken {
			x := &c.found.fits[d.line]
			if x.standsIn != "" {
				continue
			}
			for _, name := range namesOf(c, asks) {
				s := sums[name]
				if s == nil {
					s = &stockSum{form: x.form.Name}
					sums[name] = s
				}
				mass := d.amount / x.pure * x.content
				if x.dilute {
					s.dilute(c, x, mass)
					continue
				}
				s.mass += mass
				s.pure += mass * float64(x.share)
				s.water += mass * float64(x.water)
				if x.form.DensityGML > 0 {
					s.volume += mass / (x.form.DensityGML * 1e3)
				} else {
					s.noVolume = true
				}
			}
		}
	}
	stocks := make(map[string]Stock, len(sums))
	for name, s := range sums {
		stock := Stock{Form: s.form, Pure: chem.Fraction(s.pure / s.mass), Water: chem.Fraction(s.water / s.mass)}
		if !s.noVolume && s.volume > 0 {
			stock.Density = chem.Density(s.mass / s.volume)
		}
		stocks[name] = stock
	}
	return stocks
}

// namesOf are the names the recipe uses for a demand's substance.
func namesOf(c *coverage, asks []Ask) []string {
	var names []string
	for _, i := range c.demand.asks {
		if !slices.Contains(names, asks[i].Substance) {
			names = append(names, asks[i].Substance)
		}
	}
	return names
}

// sameStocks reports whether two passes drew the same composition, to 1e-9.
func sameStocks(a, b map[string]Stock) bool {
	if len(a) != len(b) {
		return false
	}
	for name, x := range a {
		y, ok := b[name]
		if !ok || x.Form != y.Form || math.Abs(float64(x.Pure-y.Pure)) > 1e-9 || math.Abs(float64(x.Water-y.Water)) > 1e-9 {
			return false
		}
	}
	return true
}

package chem

import (
	"fmt"
	"math"
	"sync"
)

// A CoDistilling is a pot with water and a volatile substance that is to go
// over with the water.
type CoDistilling struct {
	CAS      string
	Partner  Mass     // of the substance in the pot, both layers together
	Water    Mass     // in the pot at the start
	Recovery Fraction // of the partner, wanted in the distillate
	// Level says that the water in the pot is kept up, by steam or by water
	// dropped in. Otherwise the pot boils down.
	Level bool

	// The rest overrides the tables; leave zero to use them.
	VapourFraction Fraction // mass fraction of the partner in the vapour while a second layer is there
	Solubility     Fraction // mass fraction of the partner in saturated water
	Alpha          float64  // relative volatility of the dissolved partner over water
}

// A CoDistillation is the distillate that carries a substance over.
type CoDistillation struct {
	Water    Mass        // of the distillate
	Partner  Mass        // of the distillate
	Layered  Mass        // the part of Water that went over while the pot had two layers
	PotWater Mass        // water left in the pot
	Start    Temperature // vapour temperature at the start
	Alpha    float64     // relative volatility used for the dissolved part; 0 if not needed
	Two      bool        // the distillate parts into two layers at the start
	Source   string
	Notes    []string
}

var diluteVolatilities = sync.OnceValue(func() map[string]row {
	table := make(map[string]row)
	for _, row := range readTable("relative_volatility.csv") {
		table[row.text("cas")] = row
	}
	return table
})

// waterSolubilities are mass fractions of organic liquids in water at 25 °C,
// from grams per 100 mL of solution, its density taken as that of water.
var waterSolubilities = sync.OnceValue(func() map[string]Fraction {
	table := make(map[string]Fraction)
	for _, row := range readTable("substances.csv") {
		if s, ok := row.number("water_solubility_g_100mL_25C"); ok {
			table[row.text("cas")] = Fraction(s) * Percent
		}
	}
	return table
})

// CoDistillate returns the distillate that carries a volatile substance over
// with water at 101.325 kPa. While the pot has a second layer the vapour has the
// composition of the heteroazeotrope w, and the water needed is
//
//	m(water) = m(partner) · (1 − w)/w
//
// Once all is dissolved the rest follows Rayleigh with the relative volatility
// α of the dilute solution, (a/a0) = (W/W0)^α, or (a/a0) = exp(−α·m/W) where the
// water is kept up. Where water and the partner boil over as a homogeneous
// azeotrope, ln α falls in a straight line from its dilute value to 0 at the
// azeotrope's amount fraction (two-suffix Margules form), and the distillation
// is integrated step by step.
//
// α comes from relative_volatility.csv, else from the heteroazeotrope and the
// solubility at 25 °C: at saturation vapour and solution are in balance. Salt
// and acid in the pot raise α, so that less water is needed in practice. The
// error wraps ErrNoData where nothing is known of the pair and ErrImpossible
// where the pot would boil dry, with what would do.
func CoDistillate(c CoDistilling) (CoDistillation, error) {
	const of = "co-distillation with water"
	if err := firstError(
		mustBePositive(of, "mass of the substance", c.Partner),
		mustBePositive(of, "mass of water", c.Water),
		mustBeShare(of, "recovery", c.Recovery, false),
	); err != nil {
		return CoDistillation{}, err
	}
	azeotrope, known := AzeotropeWithWater(c.CAS)
	if c.VapourFraction > 0 {
		azeotrope.PartnerFraction, azeotrope.Heterogeneous, azeotrope.Forms, known = c.VapourFraction, true, true, true
	}
	alpha, err := c.alpha(azeotrope)
	if err != nil {
		return CoDistillation{}, err
	}
	d := CoDistillation{Alpha: alpha, Source: azeotrope.Source, Start: azeotrope.Temperature}
	if row, ok := diluteVolatilities()[c.CAS]; ok && c.Alpha == 0 {
		d.cite(row.text("source"))
	}
	switch {
	case known && azeotrope.Forms && azeotrope.Heterogeneous:
		return c.overTwoLayers(d, azeotrope)
	case known && azeotrope.Forms && !azeotrope.MaximumBoiling:
		return c.towardsAzeotrope(d, azeotrope)
	}
	return c.dissolved(d, c.Partner, c.Water, c.Partner*Mass(1-c.Recovery))
}

// String names the distillation for a message.
func (c CoDistilling) String() string {
	return fmt.Sprintf("carrying %s over with water", nameOfCAS(c.CAS))
}

// cite adds a source once.
func (d *CoDistillation) cite(source string) {
	if d.Source == "" {
		d.Source = source
		return
	}
	d.Source += " | " + source
}

// alpha returns the relative volatility of the dilute solution.
func (c CoDistilling) alpha(a Azeotrope) (float64, error) {
	if c.Alpha > 0 {
		return c.Alpha, nil
	}
	if row, ok := diluteVolatilities()[c.CAS]; ok {
		return row.must("alpha_dilute"), nil
	}
	s := c.saturation()
	if a.Forms && a.Heterogeneous && s > 0 {
		return perWater(a.PartnerFraction) / s, nil
	}
	return 0, &DataError{Of: c.String(), Err: ErrNoData, Limit: "no azeotrope with a solubility and no relative volatility", Remedy: "give the relative volatility over water of the dilute solution"}
}

// saturation returns the partner dissolved per mass of water at saturation, 0
// where it isn't known.
func (c CoDistilling) saturation() float64 {
	if c.Solubility > 0 && c.Solubility < 1 {
		return perWater(c.Solubility)
	}
	return perWater(waterSolubilities()[c.CAS])
}

// perWater turns a mass fraction into a mass per mass of water.
func perWater(w Fraction) float64 { return float64(w / (1 - w)) }

// overTwoLayers distils at the heteroazeotrope until the layer is used up or
// the recovery is met, then goes on with the dissolved part.
func (c CoDistilling) overTwoLayers(d CoDistillation, a Azeotrope) (CoDistillation, error) {
	ratio := perWater(a.PartnerFraction)
	saturated := c.saturation()
	if saturated == 0 {
		saturated = ratio / d.Alpha
	}
	wanted := c.Partner * Mass(c.Recovery)
	left := c.Partner * Mass(1-c.Recovery)
	layer := c.Partner - c.Water*Mass(saturated)
	if layer <= 0 {
		d.Notes = append(d.Notes, "all is dissolved from the start: there is no second layer in the pot")
		return c.dissolved(d, c.Partner, c.Water, left)
	}
	d.Two = true
	gone := layer / Mass(ratio) // water over when the layer is used up, pot kept up
	if !c.Level {
		gone = layer / Mass(ratio-saturated)
	}
	if ratio <= saturated && !c.Level {
		gone = Mass(math.Inf(1)) // the layer never goes before the recovery is met
	}
	if need := wanted / Mass(ratio); need <= gone {
		d.Water, d.Partner, d.Layered, d.PotWater = need, wanted, need, c.Water
		if !c.Level {
			d.PotWater -= need
		}
		d.Alpha = 0
		return d.unlessDry(c.dry(d, need))
	}
	d.Layered = gone
	pot := c.Water
	if !c.Level {
		pot -= gone
	}
	if pot <= 0 {
		return CoDistillation{}, c.dry(CoDistillation{}, gone)
	}
	return c.dissolved(d, c.Partner-gone*Mass(ratio), pot, left)
}

// unlessDry returns the distillation, or only the error where there is one.
func (d CoDistillation) unlessDry(err error) (CoDistillation, error) {
	if err != nil {
		return CoDistillation{}, err
	}
	return d, nil
}

// dry refuses a distillation for which the pot hasn't the water.
func (c CoDistilling) dry(d CoDistillation, need Mass) error {
	if c.Level || d.PotWater > 0 {
		return nil
	}
	return &DataError{Of: c.String(), Err: ErrImpossible,
		Limit:  fmt.Sprintf("needs %.4g g of water over, the pot has %.4g g", need.Grams(), c.Water.Grams()),
		Remedy: "add water or keep the level up"}
}

// dissolved carries a dissolved partner over from a pot until a mass is left.
func (c CoDistilling) dissolved(d CoDistillation, partner, water, left Mass) (CoDistillation, error) {
	if d.Start == 0 {
		d.Start, _ = BoilingPoint(waterCAS, Atmosphere)
	}
	share := left / partner
	d.Partner = c.Partner - left
	if share >= 1 {
		d.Water, d.PotWater = d.Layered, water
		return d, nil
	}
	if c.Level {
		d.Water = d.Layered + water*Mass(-math.Log(float64(share))/d.Alpha)
		d.PotWater = water
		return d, nil
	}
	kept := water * Mass(math.Pow(float64(share), 1/d.Alpha))
	d.Water, d.PotWater = d.Layered+water-kept, kept
	return d, nil
}

package chem

import (
	"fmt"
	"strings"
	"sync"
)

// An Azeotrope is what water and a partner boil over as together.
type Azeotrope struct {
	Partner, CAS string
	Forms        bool // false: the pair is known to form none
	Temperature  Temperature
	Pressure     Pressure
	// PartnerFraction is the mass fraction of the partner in the condensed
	// vapour, both layers taken together.
	PartnerFraction Fraction
	Heterogeneous   bool // the distillate parts into two layers
	MaximumBoiling  bool
	Source          string
}

var azeotropes = sync.OnceValue(func() map[string]Azeotrope {
	table := make(map[string]Azeotrope)
	for _, row := range withMore("azeotropes") {
		if _, kept := table[row.text("cas_2")]; kept {
			continue // the first row of a pair is the better sourced one
		}
		a := Azeotrope{
			Partner: row.text("component_2"), CAS: row.text("cas_2"), Forms: row.text("azeotrope") == "yes",
			Pressure: Pressure(row.must("pressure_kPa")) * Kilopascal,
			Source:   row.text("source"),
		}
		if a.Forms {
			a.Temperature = Celsius(row.must("temperature_C"))
			a.PartnerFraction = Fraction(row.must("component_2_w_w_percent")) * Percent
			a.Heterogeneous = strings.HasPrefix(row.text("kind"), "heterogeneous")
			a.MaximumBoiling = strings.Contains(row.text("kind"), "maximum boiling")
		}
		table[a.CAS] = a
	}
	return table
})

// AzeotropeWithWater returns what is known of a partner's azeotrope with water
// by CAS number; false where the table has no row. A row with Forms unset says
// that the pair forms none.
func AzeotropeWithWater(cas string) (Azeotrope, bool) {
	a, ok := azeotropes()[cas]
	return a, ok
}

// PartnerCarried returns the mass of partner that goes over with a mass of
// water at the azeotrope, w/(1 − w) of it.
func (a Azeotrope) PartnerCarried(water Mass) Mass {
	return water * Mass(a.PartnerFraction/(1-a.PartnerFraction))
}

// WaterCarried returns the mass of water that takes a mass of partner over at
// the azeotrope, (1 − w)/w of it.
func (a Azeotrope) WaterCarried(partner Mass) Mass {
	return partner * Mass((1-a.PartnerFraction)/a.PartnerFraction)
}

// UpperLayer returns the mass share of the upper layer of a mixture that parts
// into two, by the lever rule,
//
//	share = (w − w_lower) / (w_upper − w_lower)
//
// where w are mass fractions of the same substance. The error wraps
// ErrImpossible where the mixture lies outside the two layers and doesn't part.
func UpperLayer(mixture, lower, upper Fraction) (Fraction, error) {
	share := (mixture - lower) / (upper - lower)
	if !Finite(share) || share < 0 || share > 1 {
		return 0, &DataError{
			Of: "two layers", Err: ErrImpossible,
			Limit: fmt.Sprintf("the mixture has %.3g %%, the layers %.3g and %.3g %%", mixture.Percent(), lower.Percent(), upper.Percent()),
		}
	}
	return share, nil
}

package chem

import "fmt"

// AirContaminant is a substance in the air at a concentration, with its
// exposure limit in the same unit.
type AirContaminant struct {
	Name                 string
	Concentration, Limit float64
}

// ExposureSum returns the sum of concentrations over limits for contaminants
// with a common effect; above 1 the mixture exceeds the limit (29 CFR
// 1910.1000(d)(2)(i)). It refuses a contaminant without a limit, because its
// share would be left out.
func ExposureSum(air []AirContaminant) (float64, error) {
	sum := 0.0
	for _, a := range air {
		if !(a.Limit > 0) {
			return 0, fmt.Errorf("exposure: %s has no limit; no data is not zero", a.Name)
		}
		if !(a.Concentration >= 0) {
			return 0, fmt.Errorf("exposure: %s has a concentration of %g; want 0 or more", a.Name, a.Concentration)
		}
		sum += a.Concentration / a.Limit
	}
	return sum, nil
}

package chem

import "fmt"

// FractionsOfDensity returns the mass fractions whose aqueous solution has a density
// at temperature t, in rising order: what a hydrometer says. There are two near a
// maximum of density, as of sulfuric acid above 94 %. A density that no covered
// strength has is refused with a *DataError, an unknown solute with a *DataError.
func FractionsOfDensity(cas string, rho Density, t Temperature) ([]Fraction, error) {
	low, high, ok := DensityRange(cas, t)
	if !ok {
		_, err := SolutionDensity(cas, 0.1, t)
		if err == nil {
			err = noData("density", "solutions of "+cas, "give the strength")
		}
		return nil, err
	}
	const steps = 2000
	at := func(w Fraction) float64 {
		x, err := SolutionDensity(cas, w, t)
		if err != nil {
			return float64(rho)
		}
		return float64(x - rho)
	}
	var found []Fraction
	least, most := float64(rho)+at(low), float64(rho)+at(low)
	for i := range steps {
		a := low + (high-low)*Fraction(i)/steps
		b := low + (high-low)*Fraction(i+1)/steps
		below, above := at(a), at(b)
		least, most = min(least, above+float64(rho)), max(most, above+float64(rho))
		if i == 0 && below == 0 {
			found = append(found, a)
		}
		if above == 0 || below*above < 0 {
			found = append(found, crossing(at, a, b))
		}
	}
	if len(found) == 0 {
		return nil, outOfRange(fmt.Sprintf("strength of %s by its density", densityTables()[cas].name), "density", rho.GramsPerMillilitre(), least/1e3, most/1e3, "g/mL", "measure the strength otherwise")
	}
	return found, nil
}

// crossing halves an interval in which a function changes its sign.
func crossing(f func(Fraction) float64, a, b Fraction) Fraction {
	rising := f(b) > f(a)
	for range 60 {
		middle := (a + b) / 2
		if (f(middle) < 0) == rising {
			a = middle
		} else {
			b = middle
		}
	}
	return (a + b) / 2
}

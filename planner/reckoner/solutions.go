package reckoner

import (
	"errors"
	"fmt"

	"stillroom/chem"
)

// solutionGroup is the heading of the sums in the solution files.
const solutionGroup = "Solutions, acids and bases"

// solutionSums are the sums on strengths, dilution, acids and bases, and green
// metrics.
func solutionSums() []Sum {
	return []Sum{strengthSum(), diluteSum(), blendSum(), neutraliseSum(), phSum(), metricsSum()}
}

var (
	temperatureKey = Key{"temperature", "Temperature; 20 °C if none is given", "25 °C", true}
	makeKey        = Key{"make", "Mass or volume to make", "500 g", false}
)

// acidIntoWater is the caution that goes with every dilution.
const acidIntoWater = "run the stronger into the weaker, slowly, with stirring and cooling; never water into acid or onto alkali"

// temperatureOr20 reads the key temperature; without it 20 °C and a note that says so.
func temperatureOr20(args Args) (chem.Temperature, []string, error) {
	if !args.Has("temperature") {
		return chem.Celsius(20), []string{"no temperature given: volumes and densities are at 20 °C"}, nil
	}
	t, err := args.Temperature("temperature")
	return t, nil, err
}

// namedSubstance reads a substance like Args.Substance, but lets one the table lacks
// through by its name, for sums that can do without it.
func namedSubstance(args Args, key string) (chem.Substance, error) {
	if !args.Has(key) {
		return chem.Substance{Name: "solute", Sources: map[string]string{}}, nil
	}
	s, err := args.Substance(key)
	if errors.Is(err, ErrUnknownSubstance) {
		return chem.Substance{Name: args[key], Sources: map[string]string{}}, nil
	}
	return s, err
}

// peroxideCAS is hydrogen peroxide, of which one mole sets half a mole of oxygen free.
const peroxideCAS = "7722-84-1"

// soluteOf says what is known of a substance in solution.
func soluteOf(s chem.Substance, t chem.Temperature) chem.Solute {
	solute := chem.Solute{Name: s.Name, CAS: s.CAS, MolarMass: s.MolarMass, Temperature: t}
	if _, err := chem.SolutionDensity(s.CAS, 1, t); err != nil && s.State == "liquid" && s.Sources["density"] != given {
		solute.PureDensity = s.Density
	}
	if s.CAS == peroxideCAS {
		solute.Oxygen = 0.5
	}
	f, err := chem.ParseFormula(s.Formula)
	if err != nil {
		return solute
	}
	if e, err := chem.ElectrolyteOf(s.Name, s.CAS, f); err == nil {
		for _, a := range e.Acids {
			if a.Acid.Name == "hypochlorous acid" {
				solute.Chlorine = a.Count
			}
		}
	}
	return solute
}

// strengthAt reads a key as a strength and turns it into a mass fraction. density is
// the key under which the density of this solution may be given.
// The word density in place of a strength asks for the strength that has the density.
func strengthAt(args Args, key, density string, solute chem.Solute) (chem.Fraction, error) {
	if args[key] == "density" {
		return strengthByDensity(args, key, density, solute)
	}
	from, err := get(args, key, chem.ParseStrength)
	if err != nil {
		return 0, err
	}
	if args.Has(density) {
		if solute.Density, err = args.Density(density); err != nil {
			return 0, err
		}
	}
	w, err := solute.MassFraction(from)
	if err != nil {
		return 0, &KeyError{Key: key, Text: args[key], Cause: err}
	}
	return w, nil
}

// strengthByDensity reads the strength off the density, where just one has it.
func strengthByDensity(args Args, key, density string, solute chem.Solute) (chem.Fraction, error) {
	rho, err := args.Density(density)
	if err != nil {
		return 0, err
	}
	found, err := chem.FractionsOfDensity(solute.CAS, rho, solute.Temperature)
	switch {
	case err != nil:
		return 0, &KeyError{Key: density, Text: args[density], Cause: err}
	case len(found) > 1:
		return 0, &KeyError{Key: key, Text: args[key],
			What:   fmt.Sprintf("%s %% w/w and %s %% w/w have this density", figures(found[0].Percent()), figures(found[len(found)-1].Percent())),
			Wanted: "titrate it, or give the strength", Cause: chem.ErrAmbiguous}
	}
	return found[0], nil
}

// densityAt returns the density of a solution: the one given under the key, or else
// the table's.
func densityAt(args Args, key string, solute chem.Solute, w chem.Fraction) (chem.Density, string, error) {
	if args.Has(key) {
		d, err := args.Density(key)
		return d, given, err
	}
	d, err := chem.SolutionDensity(solute.CAS, w, solute.Temperature)
	return d, chem.SolutionDensitySource(solute.CAS, w, solute.Temperature), err
}

// massToMake reads the key make, a mass, or a volume of the solution in question.
func massToMake(args Args, density func() (chem.Density, string, error)) (chem.Mass, error) {
	m, err := args.Mass("make")
	if err == nil {
		return m, nil
	}
	v, volumeErr := args.Volume("make")
	if volumeErr != nil {
		return 0, err
	}
	rho, _, err := density()
	if err != nil {
		return 0, &KeyError{Key: "make", Text: args["make"], Cause: err, Wanted: "or give the mass to make"}
	}
	return rho.Mass(v), nil
}

// figures writes a number for a formula with its numbers put in.
func figures(x float64) string { return fmt.Sprintf("%.5g", x) }

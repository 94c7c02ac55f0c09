package chem

import (
	"fmt"
	"math"
)

// StrengthKind is a way to state how much of a solute is in a solution.
type StrengthKind int

// The ways, with the coherent unit in which a Strength holds each.
const (
	ByMassFraction            StrengthKind = iota // share of one
	ByMassConcentration                           // kg/m³ of solution
	ByMolarity                                    // mol/m³ of solution
	ByMolality                                    // mol/kg of solvent
	ByMoleFraction                                // share of one
	ByVolumeFraction                              // volume of pure solute per volume of solution, share of one
	ByNormality                                   // equivalents in mol/m³ of solution
	ByAvailableChlorine                           // mass of chlorine with the same oxidising power, share of one
	ByAvailableChlorineVolume                     // the same in kg/m³ of solution
	ByPeroxideVolume                              // volume of oxygen, at 0 °C and 1 atm, per volume of solution
)

// A Strength is how much of a solute is in a solution.
type Strength struct {
	Kind  StrengthKind
	Value float64 // in the unit of Kind
}

// PerVolume reports whether the strength counts per volume of solution, so that it
// falls in proportion when the volume grows.
func (s Strength) PerVolume() bool {
	switch s.Kind {
	case ByMassConcentration, ByMolarity, ByVolumeFraction, ByNormality, ByAvailableChlorineVolume, ByPeroxideVolume:
		return true
	}
	return false
}

// chlorineMolarMass is that of Cl2 in kg/mol (abridged atomic weights, IUPAC 2021).
const chlorineMolarMass = 70.90e-3

// normalGasVolume is the volume of one mole of an ideal gas at 0 °C and one
// standard atmosphere in m³, to which the volume strength of peroxide refers
// (common practice).
const normalGasVolume = GasConstant * float64(ZeroCelsius) / float64(Atmosphere)

// A Solute is what the conversion between strengths has to know. Fields that a
// conversion doesn't use may stay zero.
type Solute struct {
	Name      string
	CAS       string
	MolarMass MolarMass
	// Temperature at which volumes are measured.
	Temperature Temperature
	// Density of the solution, where it was measured or no table has it; zero
	// takes it from the tables.
	Density Density
	// PureDensity is that of the pure liquid solute, for volume fractions; zero
	// takes it from the tables.
	PureDensity Density
	// Solvent is the molar mass of the solvent; zero means water.
	Solvent MolarMass
	// Equivalents are the acid protons or electrons that one mole of solute
	// gives in the reaction at hand, for normality.
	Equivalents float64
	// Chlorine is the amount of Cl2 with the oxidising power of one mole of
	// solute: 1 for sodium hypochlorite.
	Chlorine float64
	// Oxygen is the amount of O2 that one mole of solute sets free: 0.5 for
	// hydrogen peroxide.
	Oxygen float64
}

// Strengths is one solution stated in every way that its Solute allows; what it
// doesn't allow is zero.
type Strengths struct {
	MassFraction            Fraction
	MassConcentration       MassConcentration
	Molarity                Concentration
	Molality                Molality // zero for the pure solute, which has no solvent
	MoleFraction            Fraction
	VolumeFraction          Fraction
	Normality               Concentration
	AvailableChlorine       Fraction
	AvailableChlorineVolume MassConcentration
	PeroxideVolume          float64
	Density                 Density // of the solution
}

// MassFraction returns the mass fraction of a solution of this strength. It
// fails with a *DataError where there can be no such solution or the density
// tables don't reach it, and with a *DataError where a property is missing.
func (s Solute) MassFraction(from Strength) (Fraction, error) {
	if !Finite(from.Value) || from.Value < 0 {
		return 0, outOfRange("strength of "+s.Name, "value", from.Value, 0, math.MaxFloat64, "", "give 0 or more")
	}
	w, err := s.massFraction(from)
	if err != nil {
		return 0, err
	}
	if w > 1 {
		return 0, outOfRange("strength of "+s.Name, "mass fraction", w*100, 0, 100, "%", "no solution holds more than itself")
	}
	return Fraction(w), nil
}

// massFraction turns each kind into a mass fraction or a mass concentration.
func (s Solute) massFraction(from Strength) (float64, error) {
	v := from.Value
	if err := s.needs(from.Kind); err != nil {
		return 0, err
	}
	m := float64(s.MolarMass)
	switch from.Kind {
	case ByMassFraction:
		return v, nil
	case ByMoleFraction:
		if v > 1 {
			return 0, outOfRange("strength of "+s.Name, "amount fraction", v*100, 0, 100, "%", "")
		}
		return v * m / (v*m + (1-v)*s.solvent()), nil
	case ByMolality:
		return v * m / (1 + v*m), nil
	case ByAvailableChlorine:
		return v * m / (s.Chlorine * chlorineMolarMass), nil
	case ByMassConcentration:
		return s.fromVolume(v)
	case ByMolarity:
		return s.fromVolume(v * m)
	case ByNormality:
		return s.fromVolume(v / s.Equivalents * m)
	case ByAvailableChlorineVolume:
		return s.fromVolume(v * m / (s.Chlorine * chlorineMolarMass))
	case ByPeroxideVolume:
		return s.fromVolume(v / normalGasVolume / s.Oxygen * m)
	case ByVolumeFraction:
		if v > 1 {
			return 0, outOfRange("strength of "+s.Name, "volume fraction", v*100, 0, 100, "%", "")
		}
		pure, err := s.pureDensity()
		if err != nil {
			return 0, err
		}
		return s.fromVolume(v * float64(pure))
	}
	return 0, fmt.Errorf("strength of %s: kind %d is none", s.Name, from.Kind)
}

// needs refuses a kind of strength whose property is missing.
func (s Solute) needs(kind StrengthKind) error {
	missing := func(what, advice string) error { return noData(what, s.Name, advice) }
	switch kind {
	case ByMolarity, ByMolality, ByMoleFraction, ByNormality, ByAvailableChlorine, ByAvailableChlorineVolume, ByPeroxideVolume:
		if !(s.MolarMass > 0) {
			return missing("molar mass", "give molar_mass=")
		}
	}
	switch {
	case kind == ByNormality && !(s.Equivalents > 0):
		return missing("number of equivalents", "give equivalents= as protons or electrons per formula")
	case (kind == ByAvailableChlorine || kind == ByAvailableChlorineVolume) && !(s.Chlorine > 0):
		return missing("available chlorine", "it belongs to hypochlorites; give % w/w")
	case kind == ByPeroxideVolume && !(s.Oxygen > 0):
		return missing("volume strength", "it belongs to hydrogen peroxide; give % w/w")
	}
	return nil
}

// fromVolume finds the mass fraction whose mass concentration is gamma, in
// kg/m³: by division where the density was given, else by halving w·ρ(w), which
// rises with w for every solution in the tables.
func (s Solute) fromVolume(gamma float64) (float64, error) {
	if s.Density > 0 {
		return gamma / float64(s.Density), nil
	}
	low, high, ok := DensityRange(s.CAS, s.Temperature)
	if !ok {
		_, err := SolutionDensity(s.CAS, 0.1, s.Temperature)
		if err == nil {
			err = noData("density", s.Name, "give density=")
		}
		return 0, err
	}
	at := func(w Fraction) float64 {
		rho, err := SolutionDensity(s.CAS, w, s.Temperature)
		if err != nil {
			return math.NaN()
		}
		return float64(w) * float64(rho)
	}
	if most := at(high); !(gamma <= most*(1+1e-12)) {
		return 0, outOfRange("strength of "+s.Name, "mass concentration", gamma, 0, most, "g/L", fmt.Sprintf("the density table ends at %.4g %% w/w; give density=", high.Percent()))
	}
	for range 60 {
		middle := (low + high) / 2
		if at(middle) < gamma {
			low = middle
		} else {
			high = middle
		}
	}
	return float64(low+high) / 2, nil
}

// At returns every strength of the solution with mass fraction w.
func (s Solute) At(w Fraction) (Strengths, error) {
	if err := checkFraction("strength of "+s.Name, w); err != nil {
		return Strengths{}, err
	}
	all := Strengths{MassFraction: w, Density: s.Density}
	if all.Density == 0 {
		rho, err := SolutionDensity(s.CAS, w, s.Temperature)
		if err != nil {
			return Strengths{}, err
		}
		all.Density = rho
	}
	all.MassConcentration = MassConcentration(float64(w) * float64(all.Density))
	if pure, err := s.pureDensity(); err == nil {
		all.VolumeFraction = Fraction(float64(all.MassConcentration) / float64(pure))
	}
	if !(s.MolarMass > 0) {
		return all, nil
	}
	m, share := float64(s.MolarMass), float64(w)
	all.Molarity = Concentration(float64(all.MassConcentration) / m)
	if share < 1 {
		all.Molality = Molality(share / m / (1 - share))
	}
	all.MoleFraction = Fraction(share / m / (share/m + (1-share)/s.solvent()))
	all.Normality = all.Molarity * Concentration(s.Equivalents)
	perMass := s.Chlorine * chlorineMolarMass / m
	all.AvailableChlorine = w * Fraction(perMass)
	all.AvailableChlorineVolume = all.MassConcentration * MassConcentration(perMass)
	all.PeroxideVolume = float64(all.Molarity) * s.Oxygen * normalGasVolume
	return all, nil
}

// solvent is the molar mass of the solvent in kg/mol.
func (s Solute) solvent() float64 {
	if s.Solvent > 0 {
		return float64(s.Solvent)
	}
	return waterMolarMass
}

// pureDensity is the density of the pure liquid solute.
func (s Solute) pureDensity() (Density, error) {
	if s.PureDensity > 0 {
		return s.PureDensity, nil
	}
	rho, err := SolutionDensity(s.CAS, 1, s.Temperature)
	if err != nil {
		return 0, noData("density of the pure liquid", s.Name, "give pure_density=")
	}
	return rho, nil
}

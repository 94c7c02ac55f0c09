package chem

import (
	"errors"
	"fmt"
	"math"
)

// A Solution is a volume of water with weak acids and bases and strong ions in it, to
// which something is added.
type Solution struct {
	Mix    []Protolyte
	Strong Concentration // net charge of the strong ions, as in PH
	Volume Volume
	At     Temperature
}

// PH returns the pH of the solution.
func (s Solution) PH() (float64, error) { return PH(s.Mix, s.Strong, s.At) }

// A Titrant is what is added: a strong acid or base, or a protolyte with its
// counter-ions.
type Titrant struct {
	Name string
	// Strong is the charge of the strong ions of one formula: +1 for NaOH and
	// NaHCO3 (Na⁺), -1 for HCl (Cl⁻), +2 for Na2CO3.
	Strong float64
	// PKa and Charge describe the protolyte of one formula, as in Protolyte; both
	// stay zero for a strong acid or base.
	PKa    []float64
	Charge int
	// C is its concentration in mol of formula per volume; zero adds it without
	// volume, as a solid or a gas.
	C Concentration
}

// SodiumHydroxide and HydrogenChloride are a strong base and a strong acid
// without volume.
var (
	SodiumHydroxide  = Titrant{Name: "sodium hydroxide", Strong: 1}
	HydrogenChloride = Titrant{Name: "hydrogen chloride", Strong: -1}
)

// ErrWrongWay is the cause where an acid would have to raise a pH or a base to
// lower it, or where a weak one can't reach it at any amount.
var ErrWrongWay = errors.New("the addition can't bring this pH about")

// AmountToPH returns the amount of titrant that brings the solution to a pH, solved
// straight from the charge balance at that pH,
//
//	n·z + n/c·(h − oh) = −V·(strong + h − oh + Σ C·z(pH))
//
// where z is the charge that one mole of titrant brings along at the pH. The
// protolytes stay in the solution: carbonic acid that leaves as gas has to be left
// out of the mix. The error wraps ErrWrongWay where no amount does it.
func (s Solution) AmountToPH(add Titrant, pH float64) (Amount, error) {
	pKw, err := PKw(s.At)
	if err != nil {
		return 0, err
	}
	if err := checkMix(s.Mix, s.Strong); err != nil {
		return 0, err
	}
	if !(pH >= lowestPH && pH <= highestPH) {
		return 0, outOfRange("amount to a pH", "pH", pH, lowestPH, highestPH, "", "")
	}
	b := balance{mix: s.Mix, strong: float64(s.Strong), pKw: pKw}
	lack := -float64(s.Volume) * b.at(pH)
	brings := add.Strong + meanCharge(add.PKa, add.Charge, pH, 0)
	if add.C > 0 {
		brings += 1e3 * (pow10(-pH) - pow10(pH-pKw)) / float64(add.C)
	}
	n := lack / brings
	if math.Abs(lack) <= 1e-12*float64(s.Volume) {
		return 0, nil
	}
	if !(n >= 0) || math.IsInf(n, 0) {
		return 0, fmt.Errorf("%s to pH %.4g: %w", add.Name, pH, ErrWrongWay)
	}
	return Amount(n), nil
}

// BaseToPH returns the amount of strong base (of OH⁻) that brings a volume of the
// mixture up to a pH, without counting the base's own volume.
func BaseToPH(mix []Protolyte, strong Concentration, v Volume, pH float64, t Temperature) (Amount, error) {
	return Solution{mix, strong, v, t}.AmountToPH(SodiumHydroxide, pH)
}

// AcidToPH returns the amount of strong acid (of H⁺) that brings a volume of the
// mixture down to a pH, without counting the acid's own volume.
func AcidToPH(mix []Protolyte, strong Concentration, v Volume, pH float64, t Temperature) (Amount, error) {
	return Solution{mix, strong, v, t}.AmountToPH(HydrogenChloride, pH)
}

// BufferCapacity returns how much strong base, in mol/m³, a mixture takes up for
// each unit of pH, at a pH:
//
//	β = ln 10 · (h + Kw/h + Σ C·σ²(z))
//
// where σ²(z) is the variance of the charge of a protolyte's forms (D. D. Van
// Slyke, J. Biol. Chem. 52 (1922) 525, in its general form).
func BufferCapacity(mix []Protolyte, pH float64, t Temperature) (Concentration, error) {
	pKw, err := PKw(t)
	if err != nil {
		return 0, err
	}
	if err := checkMix(mix, 0); err != nil {
		return 0, err
	}
	if !(pH >= lowestPH && pH <= highestPH) {
		return 0, outOfRange("buffer capacity", "pH", pH, lowestPH, highestPH, "", "")
	}
	sum := 1e3 * (pow10(-pH) + pow10(pH-pKw))
	for _, p := range mix {
		mean := meanCharge(p.PKa, p.Charge, pH, 0)
		sum += float64(p.C) * (meanSquareCharge(p.PKa, p.Charge, pH, 0) - mean*mean)
	}
	return Concentration(math.Ln10 * sum), nil
}

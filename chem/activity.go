package chem

import (
	"errors"
	"math"
)

// highestIonicStrength is how far Davies' equation reaches, in mol/L: C. W.
// Davies, Ion Association (Butterworths, 1962), 0.5 mol/L at the most.
const highestIonicStrength = 0.5

// An ActivePH is a pH corrected for the activities of ions.
type ActivePH struct {
	PH            float64
	IonicStrength Concentration // ½ Σ c·z²
	// Gamma is the activity coefficient of a singly charged ion.
	Gamma float64
}

// PHDavies returns the pH, as −log10 of the activity of H⁺, of the mixture that
// PH takes, with activity coefficients by Davies' equation
//
//	log γ = −A·z²·(√I/(1 + √I) − 0.3·I)
//
// where I is the ionic strength and A = 0.509 at 25 °C. ions is the
// concentration of strong ions counted as ½ Σ c·z² (for a salt of singly charged
// ions, its concentration); strong is their net charge, as in PH. It holds to
// I = 0.5 mol/L; beyond, it is refused with a *DataError. pKa are those at
// infinite dilution.
func PHDavies(mix []Protolyte, strong, ions Concentration, t Temperature) (ActivePH, error) {
	pKw, err := PKw(t)
	if err != nil {
		return ActivePH{}, err
	}
	if err := checkMix(mix, strong); err != nil {
		return ActivePH{}, err
	}
	if !(ions >= 0) || !Finite(ions) {
		return ActivePH{}, errors.New("pH: the ionic strength of the strong ions must be 0 or more")
	}
	b := balance{mix: mix, strong: float64(strong), pKw: pKw}
	a := debyeHueckelA(t)
	// The ionic strength that an assumed one leads to, less the assumed one,
	// falls from 0 or more to below 0 where there is an answer in range.
	excess := func(i float64) (over, pH float64, err error) {
		b.davies = a * daviesTerm(i)
		if pH, err = b.solve(); err != nil {
			return 0, 0, err
		}
		return b.ionicStrength(pH) + ions.MolesPerLitre() - i, pH, nil
	}
	over, _, err := excess(highestIonicStrength)
	if err != nil {
		return ActivePH{}, err
	}
	if over > 0 {
		return ActivePH{}, outOfRange("activity correction of a pH", "ionic strength", over+highestIonicStrength, 0, highestIonicStrength, "mol/L", "take the uncorrected pH; it may be 0.2 off")
	}
	low, high := 0.0, highestIonicStrength
	var pH float64
	for range 50 {
		middle := (low + high) / 2
		if over, pH, err = excess(middle); err != nil {
			return ActivePH{}, err
		}
		if over > 0 {
			low = middle
		} else {
			high = middle
		}
	}
	return ActivePH{pH, Concentration((low+high)/2) * MolePerLitre, pow10(-b.davies)}, nil
}

// daviesTerm is √I/(1+√I) − 0.3·I, I in mol/L.
func daviesTerm(i float64) float64 {
	root := math.Sqrt(i)
	return root/(1+root) - 0.3*i
}

// debyeHueckelA is the constant of Debye and Hückel in (L/mol)^½,
//
//	A = 1.8246·10⁶ · √ρ / (ε·T)^1.5
//
// with the density ρ of water in g/cm³ and its permittivity ε = 87.740 −
// 0.40008·t + 9.398·10⁻⁴·t² − 1.410·10⁻⁶·t³ at t °C (C. G. Malmberg and A. A.
// Maryott, J. Res. NBS 56 (1956) 1). Both from memory; 0.509 at 25 °C.
func debyeHueckelA(t Temperature) float64 {
	c := t.Celsius()
	permittivity := 87.740 - 0.40008*c + 9.398e-4*c*c - 1.410e-6*c*c*c
	return 1.8246e6 * math.Sqrt(kell(c)/1e3) / math.Pow(permittivity*float64(t), 1.5)
}

// ionicStrength returns ½ Σ c·z² of all but the strong ions, in mol/L.
func (b *balance) ionicStrength(pH float64) float64 {
	sum := pow10(b.davies-pH) + pow10(pH-b.pKw+b.davies)
	for i := range b.mix {
		p := &b.mix[i]
		sum += p.C.MolesPerLitre() * meanSquareCharge(p.PKa, p.Charge, pH, b.davies)
	}
	if b.carbonDioxide > 0 {
		one, two := b.carbonIons(pH)
		sum += (one + 4*two) / 1e3
	}
	return sum / 2
}

// meanSquareCharge is the mean of z² over a protolyte's forms.
func meanSquareCharge(pKa []float64, charge int, pH, davies float64) float64 {
	weight, sum := 1.0, 1.0
	square := float64(charge * charge)
	for i, k := range pKa {
		weight *= pow10(pH - k + daviesShift(charge-i, davies))
		z := float64(charge - i - 1)
		sum += weight
		square += weight * z * z
		if sum > 1e100 {
			weight, square, sum = weight/sum, square/sum, 1
		}
	}
	return square / sum
}

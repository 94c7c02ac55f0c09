package chem

import "math"

// DistributionRatio returns the ratio of the total concentrations of a weak
// monoprotic acid in solvent and water,
//
//	D = P / (1 + 10^(pH − pKa))
//
// where P is the partition of the neutral acid. The ionised share stays in the
// water. pH is that of the water after the acid has moved.
// Source: Nichols, Organic Chemistry Lab Techniques, 4.5; Harvey, Analytical
// Chemistry, 7.7.
func DistributionRatio(p, pKa, pH float64) float64 {
	return p * float64(NeutralFraction(pH, pKa))
}

// BaseDistributionRatio returns the ratio for a weak base, pKa being that of
// its protonated form,
//
//	D = P / (1 + 10^(pKa − pH))
func BaseDistributionRatio(p, pKa, pH float64) float64 {
	return p * float64(NeutralFraction(pKa, pH))
}

// IonPairDistributionRatio returns the ratio for a weak acid whose anion goes
// over as an ion pair with partition pIon,
//
//	D = (P + Pion · 10^(pH − pKa)) / (1 + 10^(pH − pKa))
//
// With pIon = 0 it is DistributionRatio.
func IonPairDistributionRatio(p, pIon, pKa, pH float64) float64 {
	neutral := float64(NeutralFraction(pH, pKa))
	return p*neutral + pIon*(1-neutral)
}

// NeutralFraction returns the share of an acid that is not ionised at a pH.
// With several pKa, in order, it is the share of the form that has lost no
// proton,
//
//	1 / (1 + 10^(pH − pKa1) + 10^(2 pH − pKa1 − pKa2) + …)
//
// It is between 0 and 1 for any pH.
func NeutralFraction(pH float64, pKa ...float64) Fraction {
	sum, exponent := 1.0, 0.0
	for _, pK := range pKa {
		exponent += pH - pK
		sum += math.Pow(10, exponent)
	}
	if math.IsInf(sum, 1) {
		return 0
	}
	return Fraction(1 / sum)
}

package chem

import "math"

// PKw returns −log10 of the ion product of water, in (mol/kg)², from 0 to
// 100 °C at the density of the liquid:
//
//	log Kw = −4.098 − 3245.2/T + 2.2362·10⁵/T² − 3.984·10⁷/T³
//	         + (13.957 − 1262.3/T + 8.5641·10⁵/T²)·log ρ
//
// where T is in K and ρ in g/cm³: W. L. Marshall and E. U. Franck, J. Phys.
// Chem. Ref. Data 10 (1981) 295, the formulation of the International
// Association for the Properties of Steam of 1980; coefficients from memory,
// tested against the value at 25 °C.
func PKw(t Temperature) (float64, error) {
	const hottest = ZeroCelsius + 100
	if !(t >= ZeroCelsius && t <= hottest) {
		return 0, outOfRange("ion product of water", "temperature", t.Celsius(), 0, 100, "°C", "give a temperature inside it")
	}
	k := float64(t)
	log := -4.098 - 3245.2/k + 2.2362e5/(k*k) - 3.984e7/(k*k*k) +
		(13.957-1262.3/k+8.5641e5/(k*k))*math.Log10(kell(t.Celsius())/1e3)
	return -log, nil
}

// WaterIons returns the concentrations of H⁺ and OH⁻ at a pH, activities taken as
// concentrations. Outside the range of PKw both are what they would be at its end.
func WaterIons(pH float64, t Temperature) (hydrogen, hydroxide Concentration) {
	pKw, err := PKw(min(max(t, ZeroCelsius), ZeroCelsius+100))
	if err != nil {
		return 0, 0
	}
	return Concentration(pow10(-pH)) * MolePerLitre, Concentration(pow10(pH-pKw)) * MolePerLitre
}

package chem

import (
	"fmt"
	"math"
)

// A SteamDistillation is the boiling of a liquid together with water that
// doesn't mix with it.
type SteamDistillation struct {
	Temperature      Temperature
	Substance, Water Pressure // partial pressures; their sum is the total
	MassPerMassWater float64  // substance per water in the distillate
	AmountPerAmount  float64  // the same in moles
	Immiscible       bool     // false where the pair is known to mix
	Notes            []string
}

// SteamDistilling returns the temperature and the distillate of a steam
// distillation at a total pressure, for a substance that doesn't mix with water,
//
//	p(substance) + p(water) = p
//	m(substance)/m(water) = p(substance) · M / (p(water) · M(water))
//
// by CAS number. The error wraps ErrOutOfRange where the vapour-pressure
// equation doesn't reach the temperature.
func SteamDistilling(cas string, p Pressure) (SteamDistillation, error) {
	of := fmt.Sprintf("steam distillation of %s at %.4g kPa", nameOfCAS(cas), p.Kilopascals())
	equations := vapourEquations()[cas]
	if len(equations) == 0 {
		return SteamDistillation{}, noVapourEquation(cas, of)
	}
	molar, ok := tableMolarMass(cas)
	if !ok {
		return SteamDistillation{}, &DataError{Of: of, Err: ErrNoData, Remedy: "give molar_mass="}
	}
	var err error
	for _, e := range equations {
		var s SteamDistillation
		if s, err = e.SteamDistilling(molar, p); err == nil {
			s.warn(cas)
			return s, nil
		}
	}
	return SteamDistillation{}, err
}

// warn notes that a pair mixes, so that the immiscible model doesn't hold.
func (s *SteamDistillation) warn(cas string) {
	s.Immiscible = true
	a, ok := AzeotropeWithWater(cas)
	if ok && (!a.Forms || !a.Heterogeneous) {
		s.Immiscible = false
		s.Notes = append(s.Notes, "mixes with water: the figures for two separate liquids don't hold; use the azeotrope or the relative volatility")
	}
}

// SteamRatio returns the mass of a substance per mass of water in the distillate
// from their partial pressures, p · M / (p(water) · M(water)).
func SteamRatio(substance, water Pressure, m MolarMass) (float64, error) {
	of := "ratio of a steam distillate"
	if err := firstError(mustBePositive(of, "partial pressure", substance), mustBePositive(of, "partial pressure of water", water), mustBePositive(of, "molar mass", m)); err != nil {
		return 0, err
	}
	return float64(substance/water) * float64(m) / waterMolarMass, nil
}

// SteamDistilling is the steam distillation of a substance with a molar mass and
// this vapour-pressure equation.
func (e VapourEquation) SteamDistilling(m MolarMass, p Pressure) (SteamDistillation, error) {
	of := fmt.Sprintf("steam distillation at %.4g kPa", p.Kilopascals())
	if err := firstError(mustBePositive(of, "molar mass", m), mustBePositive(of, "pressure", p)); err != nil {
		return SteamDistillation{}, err
	}
	water := vapourEquations()[waterCAS][0]
	high, err := water.Boiling(p)
	if err != nil {
		return SteamDistillation{}, err
	}
	low := water.From
	if e.rangeStated() {
		low, high = max(low, e.From), min(high, e.To)
	}
	sum := func(t Temperature) (organic, steam Pressure) {
		lnOrganic, _ := e.log(t)
		lnWater, _ := water.log(t)
		return Pressure(math.Exp(lnOrganic)), Pressure(math.Exp(lnWater))
	}
	total := func(t Temperature) Pressure { a, b := sum(t); return a + b }
	if !(low < high) || !(total(low) <= p && total(high) >= p) {
		return SteamDistillation{}, &DataError{Of: of, Err: ErrOutOfRange, Limit: "the vapour-pressure equation holds from " + e.Range(), Remedy: "give antoine=A;B;C that reaches lower"}
	}
	for range 200 {
		middle := (low + high) / 2
		if middle <= low || middle >= high {
			break // the bracket is down to neighbouring numbers
		}
		if total(middle) > p {
			high = middle
		} else {
			low = middle
		}
	}
	organic, steam := sum(low)
	return SteamDistillation{
		Temperature: low, Substance: organic, Water: steam,
		AmountPerAmount:  float64(organic / steam),
		MassPerMassWater: float64(organic/steam) * float64(m) / waterMolarMass,
		Immiscible:       true,
	}, nil
}

package chem

import (
	"fmt"
	"math"
)

// A BoilingPair is two measured boiling points of one liquid. Between them, and
// a little beyond, the logarithm of the pressure is a straight line in 1/T,
//
//	ln(p2/p1) = (ΔH/R) · (1/T1 − 1/T2)
//
// Source: OpenStax Chemistry 2e, 10.3 (Clausius-Clapeyron equation).
type BoilingPair struct {
	T1, T2 Temperature
	P1, P2 Pressure
}

// VaporisationHeat returns the effective heat of vaporisation between the two
// points. It refuses points that coincide.
func (b BoilingPair) VaporisationHeat() (MolarEnergy, error) {
	of := "heat of vaporisation from two boiling points"
	if err := firstError(
		mustBePositive(of, "temperature", b.T1), mustBePositive(of, "temperature", b.T2),
		mustBePositive(of, "pressure", b.P1), mustBePositive(of, "pressure", b.P2),
	); err != nil {
		return 0, err
	}
	heat := GasConstant * math.Log(float64(b.P2/b.P1)) / float64(1/b.T1-1/b.T2)
	if !Finite(heat) || heat <= 0 {
		return 0, &DataError{Of: of, Err: ErrImpossible, Limit: "the pressure must be higher at the higher temperature", Remedy: "give two different boiling points"}
	}
	return MolarEnergy(heat), nil
}

// Boiling returns the boiling point at a pressure on the line through the two
// points.
func (b BoilingPair) Boiling(p Pressure) (Temperature, error) {
	heat, err := b.VaporisationHeat()
	if err := firstError(err, mustBePositive("boiling point", "pressure", p)); err != nil {
		return 0, err
	}
	return clausiusBoiling(b.T1, b.P1, heat, p)
}

// EstimateBoiling returns a boiling point at a pressure from the normal boiling
// point and the heat of vaporisation there, taken as constant. It is an
// estimate: a few kelvins off at a fifth of the pressure, 10 to 20 K at a
// fortieth, low rather than high, because the heat grows as it gets colder.
func EstimateBoiling(normal Temperature, heat MolarEnergy, p Pressure) (Temperature, error) {
	of := "estimate of a boiling point"
	if err := firstError(mustBePositive(of, "normal boiling point", normal), mustBePositive(of, "heat of vaporisation", heat), mustBePositive(of, "pressure", p)); err != nil {
		return 0, err
	}
	return clausiusBoiling(normal, Atmosphere, heat, p)
}

// TroutonHeat estimates the heat of vaporisation at the normal boiling point as
// 88 J/(mol K) times that temperature (Trouton's rule). Alcohols and water lie
// above it, acids that pair in the vapour below.
func TroutonHeat(normal Temperature) MolarEnergy { return MolarEnergy(88 * float64(normal)) }

func clausiusBoiling(t Temperature, p0 Pressure, heat MolarEnergy, p Pressure) (Temperature, error) {
	inverse := 1/float64(t) - GasConstant*math.Log(float64(p/p0))/float64(heat)
	if !(inverse > 0) {
		return 0, &DataError{Of: fmt.Sprintf("boiling point at %.4g kPa", p.Kilopascals()), Err: ErrOutOfRange, Limit: "the line in 1/T ends there", Remedy: "give antoine=A;B;C"}
	}
	return Temperature(1 / inverse), nil
}

// VaporisationHeat returns the heat of vaporisation at a temperature from the
// slope of the equation,
//
//	ΔH = R · T² · d(ln p)/dT
//
// which takes the vapour as an ideal gas: right for most liquids to a few per
// cent below their boiling point. For an acid that pairs in the vapour it is the
// heat per mole of vapour molecules, larger than that per mole of the acid.
func (e VapourEquation) VaporisationHeat(t Temperature) (MolarEnergy, error) {
	if _, err := e.Pressure(t); err != nil {
		return 0, err
	}
	_, slope := e.log(t)
	return MolarEnergy(GasConstant * float64(t) * float64(t) * slope), nil
}

// Millimetre of mercury, 133.322387415 Pa (ISO 80000-4), the unit of most handbook
// coefficients.
const MillimetreMercury Pressure = 133.322387415

// Antoine turns coefficients of log(p/unit) = A − B/(T + C) into an equation; form
// says whether the logarithm is decadic or natural. zero is the zero of the
// temperature scale that they were fitted in: ZeroCelsius for °C, 0 for K. From
// and to are their range; pass equal temperatures where none is stated. It
// refuses coefficients that are no numbers and a B that isn't above zero.
func Antoine(form VapourForm, a, b, c float64, unit Pressure, zero, from, to Temperature) (VapourEquation, error) {
	const of = "Antoine equation"
	if err := mustBePositive(of, "unit of pressure", unit); err != nil {
		return VapourEquation{}, err
	}
	if !Finite(a) || !Finite(c) || !Finite(from) || !Finite(to) || !(b > 0) || !Finite(b) {
		return VapourEquation{}, &DataError{Of: of, Err: ErrOutOfRange, Limit: "A, B and C must be numbers, B above zero", Remedy: "give antoine=A;B;C for p in mmHg and t in °C"}
	}
	e := VapourEquation{Form: form, B: b, C: c - float64(zero), Source: "coefficients given"}
	switch form {
	case AntoineLog10:
		e.A = a + math.Log10(float64(unit))
	case AntoineLn:
		e.A = a + math.Log(float64(unit))
	default:
		return VapourEquation{}, &DataError{Of: of, Err: ErrOutOfRange, Limit: "three coefficients belong to an Antoine equation"}
	}
	if to > from {
		e.From, e.To = from, to
	}
	return e, nil
}

// AntoineMillimetres turns the usual handbook triple, log10(p/mmHg) =
// A − B/(t/°C + C), into an equation without a stated range.
func AntoineMillimetres(a, b, c float64) (VapourEquation, error) {
	return Antoine(AntoineLog10, a, b, c, MillimetreMercury, ZeroCelsius, 0, 0)
}

// BoilingRise returns how much a solute raises the boiling point,
//
//	ΔT = Kb · b · i
//
// where Kb is the constant of the solvent in K kg/mol, b the molality of the
// solute and i the particles each formula unit gives. It holds for dilute
// solutions. Source: OpenStax Chemistry 2e, 11.4.
func BoilingRise(kb float64, b Molality, i float64) (Temperature, error) {
	of := "rise of the boiling point"
	if err := firstError(mustBePositive(of, "constant of the solvent", kb), mustBePositive(of, "particles per formula unit", i)); err != nil {
		return 0, err
	}
	if !(b >= 0) || !Finite(b) {
		return 0, mustBePositive(of, "molality", b)
	}
	return Temperature(kb * float64(b) * i), nil
}

// SensibleHeat returns the heat that warms a mass by a rise, m · cp · ΔT.
func SensibleHeat(mass Mass, cp SpecificHeat, rise Temperature) Energy {
	return Energy(float64(mass) * float64(cp) * float64(rise))
}

package chem

import "fmt"

// AdiabaticRise returns the rise in temperature if heat given off stays in the
// contents,
//
//	ΔTad = Q / (m · cp)
//
// Source: Stoessel, Thermal Safety of Chemical Processes.
func AdiabaticRise(heat Energy, mass Mass, cp SpecificHeat) (Temperature, error) {
	of := "adiabatic temperature rise"
	if err := firstError(mustBePositive(of, "mass", mass), mustBePositive(of, "heat capacity", cp)); err != nil {
		return 0, err
	}
	if !Finite(heat) {
		return 0, &DataError{Of: of, Err: ErrOutOfRange, Limit: "heat must be a number"}
	}
	return Temperature(float64(heat) / (float64(mass) * float64(cp))), nil
}

// MTSR returns the maximum temperature of the synthesis reaction, which the
// contents reach after loss of cooling,
//
//	MTSR = Tp + X · ΔTad · m(end)/m(now)
//
// where Tp is the process temperature, X the share of what was dosed that has
// not yet reacted and ΔTad the rise of the whole reaction in the final mass.
// massRatio is m(end)/m(now), at least one.
func MTSR(process Temperature, accumulated Fraction, rise Temperature, massRatio float64) (Temperature, error) {
	of := "maximum temperature of the synthesis reaction"
	if err := firstError(
		mustBePositive(of, "process temperature", process),
		mustBeShare(of, "accumulated share", accumulated, true),
	); err != nil {
		return 0, err
	}
	if !(massRatio >= 1) || !Finite(massRatio) || !(rise >= 0) || !Finite(rise) {
		return 0, &DataError{Of: of, Err: ErrOutOfRange, Limit: "the rise must not be below zero and the mass ratio not below one", Remedy: "give the final mass over the mass at the moment"}
	}
	return process + Temperature(float64(accumulated)*float64(rise)*massRatio), nil
}

// CriticalityClass returns the class 1 to 5 of a cooling failure from the order
// of MTSR, MTT (the highest temperature for technical reasons, such as the
// boiling point in an open vessel) and TD24 (where decomposition takes 24 hours
// to its maximum rate),
//
//	1  MTSR < MTT < TD24     2  MTSR < TD24 < MTT    3  MTT < MTSR < TD24
//	4  MTT < TD24 < MTSR     5  TD24 below both
//
// Equal temperatures count to the graver side. TD24 has to be measured. Source:
// Stoessel, Thermal Safety of Chemical Processes (class definitions).
func CriticalityClass(process, mtsr, mtt, td24 Temperature) (int, error) {
	of := "criticality class"
	if err := firstError(
		mustBePositive(of, "process temperature", process), mustBePositive(of, "MTSR", mtsr),
		mustBePositive(of, "MTT", mtt), mustBePositive(of, "TD24", td24),
	); err != nil {
		return 0, err
	}
	if mtsr < process {
		return 0, &DataError{
			Of: of, Err: ErrOutOfRange,
			Limit:  fmt.Sprintf("MTSR %.1f °C lies below the process temperature %.1f °C", mtsr.Celsius(), process.Celsius()),
			Remedy: "MTSR is the process temperature plus the rise of what has accumulated",
		}
	}
	switch {
	case td24 <= mtsr && td24 <= mtt:
		return 5, nil
	case td24 <= mtsr:
		return 4, nil
	case mtt <= mtsr:
		return 3, nil
	case td24 <= mtt:
		return 2, nil
	}
	return 1, nil
}

// A Severity is a grade of the damage a runaway of a size does.
type Severity int

// Severities by the adiabatic rise: below 50 K, to 200 K, to 400 K, above.
const (
	SeverityNegligible Severity = iota
	SeverityMedium
	SeverityCritical
	SeverityCatastrophic
)

// String returns the word of the four-level scale.
func (s Severity) String() string {
	return [...]string{"negligible", "medium", "critical", "catastrophic"}[s]
}

// SeverityOf grades an adiabatic rise: below 50 K negligible (if no gas forms),
// to 200 K medium, to 400 K critical, above catastrophic. Source: Stoessel,
// four-level scale; some editions print 50 to 100 K for medium and leave the gap
// open.
func SeverityOf(rise Temperature) Severity {
	switch {
	case rise > 400:
		return SeverityCatastrophic
	case rise > 200:
		return SeverityCritical
	case rise >= 50:
		return SeverityMedium
	}
	return SeverityNegligible
}

// ShortestDose returns the shortest time over which a reaction may be dosed so
// that cooling keeps up with its heat,
//
//	t = Q / q
//
// It holds while the reaction keeps up with the dosing; what accumulates goes on
// reacting afterwards. Zero heat needs no time.
func ShortestDose(heat Energy, cooling Power) (Duration, error) {
	of := "shortest dosing time"
	if err := mustBePositive(of, "cooling power", cooling); err != nil {
		return 0, err
	}
	if !(heat >= 0) || !Finite(heat) {
		return 0, &DataError{Of: of, Err: ErrOutOfRange, Limit: "heat must not be below zero", Remedy: "give the heat given off"}
	}
	return Duration(float64(heat) / float64(cooling)), nil
}

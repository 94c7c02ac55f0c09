package chem

import (
	"fmt"
	"math"
)

// Boiling returns the temperature at which the vapour pressure equals p. The
// error wraps ErrOutOfRange where that lies outside the equation's range.
func (e VapourEquation) Boiling(p Pressure) (Temperature, error) {
	if err := mustBePositive("boiling point", "pressure", p); err != nil {
		return 0, err
	}
	want := math.Log(float64(p))
	low, high, ok := e.boilingRange(want)
	if !ok {
		lowLn, _ := e.log(low)
		highLn, _ := e.log(high)
		return 0, &DataError{
			Of: fmt.Sprintf("boiling point at %.4g kPa", p.Kilopascals()), Err: ErrOutOfRange,
			Limit:  fmt.Sprintf("%s, that is %.4g to %.4g kPa", e.Range(), math.Exp(lowLn)/1e3, math.Exp(highLn)/1e3),
			Remedy: "give a pressure inside it or antoine=A;B;C",
		}
	}
	return e.solveBoiling(want, low, high), nil
}

// boilingRange returns the range of temperature in which to look for a
// ln p; false where the equation doesn't reach it.
func (e *VapourEquation) boilingRange(want float64) (low, high Temperature, ok bool) {
	low, high = e.From, e.To
	if !e.rangeStated() {
		low, high = e.openRange()
	}
	lowLn, _ := e.log(low)
	highLn, _ := e.log(high)
	const slack = 1e-9 // in ln p: the ends of the range belong to it
	return low, high, want >= lowLn-slack && want <= highLn+slack
}

// openRange brackets the temperatures a bench could meet, for an equation
// without a stated range: from just above the pole of the equation, or 150 K,
// to 800 K.
func (e *VapourEquation) openRange() (low, high Temperature) {
	low, high = 150, 800
	if e.Form != DIPPR101 {
		low = max(low, Temperature(-e.C)+1)
	}
	return low, max(high, low+1)
}

// solveBoiling finds the temperature by Newton steps on ln p, kept inside a
// bracket that shrinks with every step, so that it always arrives. ln p rises
// with temperature in every equation of the table.
func (e *VapourEquation) solveBoiling(want float64, low, high Temperature) Temperature {
	t := (low + high) / 2
	for range 100 {
		ln, slope := e.log(t)
		if ln > want {
			high = t
		} else {
			low = t
		}
		next := t - Temperature((ln-want)/slope)
		if !(next > low && next < high) {
			next = (low + high) / 2
		}
		if math.Abs(float64(next-t)) < 1e-10*float64(t) {
			return next
		}
		t = next
	}
	return t
}

// BoilingPoint returns the boiling point of a pure liquid by CAS number at a
// pressure, from the first equation that reaches there. The error wraps
// ErrNoData or ErrOutOfRange.
func BoilingPoint(cas string, p Pressure) (Temperature, error) {
	if err := mustBePositive("boiling point", "pressure", p); err != nil {
		return 0, err
	}
	equations := vapourEquations()[cas]
	for i := range equations {
		if low, high, ok := equations[i].boilingRange(math.Log(float64(p))); ok {
			return equations[i].solveBoiling(math.Log(float64(p)), low, high), nil
		}
	}
	return 0, noVapourEquation(cas, fmt.Sprintf("boiling point of %s at %.4g kPa", nameOfCAS(cas), p.Kilopascals()))
}

// The standard atmosphere below 11 km (ISO 2533:1975, 2.1 to 2.8).
const (
	seaLevelTemperature = 288.15  // K
	lapseRate           = 0.0065  // K/m
	standardGravity     = 9.80665 // m/s²
	airGasConstant      = 287.05287
)

// PressureAtAltitude returns the air pressure of the standard atmosphere at a
// height above the sea in metres,
//
//	p = 101325 Pa · (1 − 0.0065 h / 288.15)^(g/(R · 0.0065))
//
// from −2000 m to 11 000 m (ISO 2533, the same as ICAO Doc 7488). Weather moves
// the true pressure by a few kilopascals: read the barometer where it matters.
func PressureAtAltitude(metres float64) (Pressure, error) {
	if !(metres >= -2000 && metres <= 11000) {
		return 0, &DataError{
			Of: fmt.Sprintf("air pressure at %.0f m", metres), Err: ErrOutOfRange,
			Limit: "-2000 to 11000 m", Remedy: "give the height of the lab above the sea or the barometer's reading",
		}
	}
	base := 1 - lapseRate*metres/seaLevelTemperature
	return Atmosphere * Pressure(math.Pow(base, standardGravity/(airGasConstant*lapseRate))), nil
}

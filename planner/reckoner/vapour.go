package reckoner

import (
	"context"
	"fmt"
	"math"
	"strings"

	"stillroom/chem"
)

const vapourGroup = "Vapour"

var (
	rangeKey    = Key{"antoine_range", "Range of the Antoine coefficients", "1 °C; 100 °C", true}
	altitudeKey = Key{"altitude", "Height of the lab above the sea in metres, in place of the pressure", "1600", true}
)

func boilSum() Sum {
	return Sum{
		Name: "boil", Title: "Boiling point", Group: vapourGroup,
		About: "Gives the boiling point of a pure liquid at a pressure or at a height above the sea.",
		Keys: []Key{
			{"substance", "Substance", "ethyl acetate", false}, {"pressure", "Pressure", "101.325 kPa", true}, altitudeKey,
			vapourAntoineKey(), rangeKey,
		},
		Gives:   []string{"temperature"},
		Example: []string{"substance=ethyl acetate", "pressure=20 kPa"},
		Range:   "inside the range of the vapour-pressure equation, which the answer states",
		Source:  "vapour-pressure equations in antoine.csv, each with its source; air pressure at a height: ISO 2533",
		Run:     runBoil,
	}
}

func runBoil(_ context.Context, args Args) (Answer, error) {
	p, notes, err := boilingPressure(args)
	if err != nil {
		return Answer{}, err
	}
	l, err := liquidOf(args)
	if err != nil {
		return Answer{}, err
	}
	t, e, err := l.boiling(p)
	if err != nil && len(l.equations) == 0 && l.substance.Boiling != nil {
		return l.normalBoiling(p, notes, err)
	}
	if err != nil {
		return Answer{}, err
	}
	notes = append(append(notes, l.notes...), l.otherBoiling(p, t, e)...)
	s := boilSum()
	return Answer{
		Results: []Result{Number("temperature", t.Celsius(), "°C")},
		Notes:   append(notes, e.Range()),
		Derivation: chem.Derivation{
			Of: "boiling point of " + l.name, Formula: "solve " + e.Form.String() + " for T",
			Inserted: fmt.Sprintf("p(%.6g K) = %.6g kPa with %s; T = %.6g °C", float64(t), p.Kilopascals(), coefficients(e), t.Celsius()),
			Inputs:   []chem.Input{{Symbol: "p", Name: "pressure", Value: p.Kilopascals(), Unit: "kPa", Source: given}},
			Value:    t.Celsius(), Unit: "°C", Range: e.Range(), Source: e.Source + "; " + s.Source,
		},
	}, nil
}

// boilingPressure reads pressure or altitude.
func boilingPressure(args Args) (chem.Pressure, []string, error) {
	switch {
	case args.Has("pressure") && args.Has("altitude"):
		return 0, nil, &KeyError{Key: "altitude", Text: args["altitude"], What: "given together with pressure", Wanted: "give one of them", Cause: ErrUnknownKey}
	case args.Has("pressure"):
		p, err := positive(args, "pressure", args.Pressure)
		return p, nil, err
	case !args.Has("altitude"):
		return 0, nil, &KeyError{Key: "pressure", What: "missing", Wanted: `give pressure="101.325 kPa" or altitude="1600"`, Cause: ErrMissingKey}
	}
	metres, err := args.metres("altitude")
	if err != nil {
		return 0, nil, err
	}
	p, err := chem.PressureAtAltitude(metres)
	return p, []string{fmt.Sprintf("air pressure of the standard atmosphere at %g m: %.4g kPa; the weather moves it by a few kPa", metres, p.Kilopascals())}, err
}

// metres reads a height with or without its unit.
func (a Args) metres(key string) (float64, error) {
	text := strings.TrimSpace(strings.TrimSuffix(strings.TrimSpace(a[key]), "m"))
	x, err := chem.ParseNumber(text)
	if err != nil {
		return 0, &KeyError{Key: key, Text: a[key], Cause: err}
	}
	return x, nil
}

// A liquid is a substance with its vapour-pressure equations.
type liquid struct {
	name      string
	cas       string
	substance chem.Substance
	equations []chem.VapourEquation
	notes     []string
}

// liquidOf reads the substance and, where given, its own Antoine coefficients.
func liquidOf(args Args) (liquid, error) {
	s, err := args.Substance("substance")
	if err != nil {
		return liquid{}, err
	}
	l := liquid{name: s.Name, cas: s.CAS, substance: s, equations: chem.VapourEquations(s.CAS)}
	if args.Has("antoine") {
		e, note, err := antoineEquation(args, s.Boiling)
		if err != nil {
			return liquid{}, err
		}
		l.equations, l.notes = []chem.VapourEquation{e}, []string{note}
	}
	return l, nil
}

// boiling returns the boiling point and the equation that gave it.
func (l liquid) boiling(p chem.Pressure) (chem.Temperature, chem.VapourEquation, error) {
	var err error
	for _, e := range l.equations {
		var t chem.Temperature
		if t, err = e.Boiling(p); err == nil {
			return t, e, nil
		}
	}
	if err == nil || len(l.equations) > 1 {
		_, err = chem.BoilingPoint(l.cas, p)
	}
	return 0, chem.VapourEquation{}, err
}

// otherBoiling notes where another published equation, or the tabulated normal
// boiling point, says something else.
func (l liquid) otherBoiling(p chem.Pressure, t chem.Temperature, used chem.VapourEquation) []string {
	var notes []string
	for _, e := range l.equations {
		if other, err := e.Boiling(p); err == nil && e != used && math.Abs(float64(other-t)) > 0.5 {
			notes = append(notes, fmt.Sprintf("another published equation gives %.1f °C (%s)", other.Celsius(), e.Source))
		}
	}
	if b := l.substance.Boiling; b != nil && math.Abs(float64(p/chem.Atmosphere-1)) < 1e-3 && math.Abs(float64(*b-t)) > 0.5 {
		notes = append(notes, fmt.Sprintf("the tabulated normal boiling point is %.1f °C", b.Celsius()))
	}
	return notes
}

// Without a vapour-pressure equation the normal boiling point serves near
// atmospheric pressure, and with the heat of vaporisation an estimate reaches
// down to leastEstimate: below that the heat changes too much.
const (
	nearAtmospheric               = 0.01 // of the pressure
	leastEstimate   chem.Pressure = 10 * chem.Kilopascal
)

// normalBoiling answers from the tabulated normal boiling point, or refuses with
// err and says what is known.
func (l liquid) normalBoiling(p chem.Pressure, notes []string, err error) (Answer, error) {
	t, d := *l.substance.Boiling, chem.Derivation{
		Of: "boiling point of " + l.name, Formula: "tabulated normal boiling point", Unit: "°C",
		Inserted: fmt.Sprintf("%.6g °C at 101.325 kPa", l.substance.Boiling.Celsius()),
		Range:    "at 101.325 kPa", Source: l.substance.Sources["boiling"],
	}
	switch heat := l.substance.HeatOfVaporisation; {
	case math.Abs(float64(p/chem.Atmosphere)-1) <= nearAtmospheric:
		notes = append(notes, "no vapour-pressure equation: the tabulated normal boiling point")
	case heat != nil && p >= leastEstimate && p < chem.Atmosphere:
		estimate, refused := chem.EstimateBoiling(t, *heat, p)
		if refused != nil {
			return Answer{}, refused
		}
		d.Formula = "1/T = 1/Tb − R · ln(p/101.325 kPa)/ΔH"
		d.Inserted = fmt.Sprintf("Tb = %.6g K, ΔH = %.6g kJ/mol, p = %.6g kPa: T = %.6g °C", float64(t), float64(*heat)/1e3, p.Kilopascals(), estimate.Celsius())
		d.Range, t = "10 to 101.325 kPa, a few kelvins", estimate
		notes = append(notes, "an estimate from the normal boiling point and the heat of vaporisation there, a few kelvins off, low rather than high")
	default:
		return Answer{}, fmt.Errorf("%w (the table has the normal boiling point only, %.1f °C)", err, t.Celsius())
	}
	d.Value, d.Notes = t.Celsius(), notes
	if d.Source == "" {
		d.Source = "substance table"
	}
	return Answer{Results: []Result{Number("temperature", t.Celsius(), "°C")}, Notes: notes, Derivation: d}, nil
}

func coefficients(e chem.VapourEquation) string {
	text := fmt.Sprintf("A = %.6g, B = %.6g, C = %.6g", e.A, e.B, e.C)
	if e.Form == chem.DIPPR101 {
		text += fmt.Sprintf(", D = %.6g, E = %.6g", e.D, e.E)
	}
	return text
}

func vapourSum() Sum {
	return Sum{
		Name: "vapour", Title: "Vapour pressure", Group: vapourGroup,
		About:   "Gives the vapour pressure of a pure liquid at a temperature.",
		Keys:    []Key{{"substance", "Substance", "water", false}, {"temperature", "Temperature", "25 °C", false}, vapourAntoineKey(), rangeKey},
		Gives:   []string{"pressure"},
		Example: []string{"substance=water", "temperature=25 °C"},
		Range:   "inside the range of the vapour-pressure equation, which the answer states",
		Source:  "vapour-pressure equations in antoine.csv, each with its source",
		Run:     runVapour,
	}
}

func runVapour(_ context.Context, args Args) (Answer, error) {
	t, err := args.Temperature("temperature")
	if err != nil {
		return Answer{}, err
	}
	l, err := liquidOf(args)
	if err != nil {
		return Answer{}, err
	}
	p, e, err := l.pressure(t)
	if b := l.substance.Boiling; err != nil && len(l.equations) == 0 && b != nil && math.Abs(float64(t-*b)) <= nearBoiling {
		return l.pressureAtBoiling(), nil
	}
	if err != nil {
		return Answer{}, err
	}
	return Answer{
		Results: []Result{Number("pressure", p.Kilopascals(), "kPa")},
		Notes:   append(l.notes, e.Range()),
		Derivation: chem.Derivation{
			Of: "vapour pressure of " + l.name, Formula: e.Form.String(),
			Inserted: fmt.Sprintf("T = %.6g K with %s: p = %.6g kPa", float64(t), coefficients(e), p.Kilopascals()),
			Inputs:   []chem.Input{{Symbol: "T", Name: "temperature", Value: t.Celsius(), Unit: "°C", Source: given}},
			Value:    p.Kilopascals(), Unit: "kPa", Range: e.Range(), Source: e.Source,
		},
	}, nil
}

// nearBoiling is how near the normal boiling point the pressure is the atmosphere's to
// within some 2 %.
const nearBoiling = 0.5 // K

// pressureAtBoiling answers for a liquid without an equation at its normal boiling point.
func (l liquid) pressureAtBoiling() Answer {
	note := "no vapour-pressure equation: the pressure at the tabulated normal boiling point, " + figures(l.substance.Boiling.Celsius()) + " °C"
	return Answer{
		Results: []Result{Number("pressure", chem.Atmosphere.Kilopascals(), "kPa")},
		Notes:   []string{note},
		Derivation: chem.Derivation{
			Of: "vapour pressure of " + l.name, Formula: "tabulated normal boiling point", Unit: "kPa",
			Inserted: fmt.Sprintf("101.325 kPa at %.6g °C", l.substance.Boiling.Celsius()), Value: chem.Atmosphere.Kilopascals(),
			Range: "within 0.5 K of it", Source: l.substance.Sources["boiling"],
		},
	}
}

// pressure returns the vapour pressure and the equation that gave it.
func (l liquid) pressure(t chem.Temperature) (chem.Pressure, chem.VapourEquation, error) {
	var err error
	for _, e := range l.equations {
		var p chem.Pressure
		if p, err = e.Pressure(t); err == nil {
			return p, e, nil
		}
	}
	if err == nil || len(l.equations) > 1 {
		_, err = chem.VapourPressure(l.cas, t)
	}
	return 0, chem.VapourEquation{}, err
}

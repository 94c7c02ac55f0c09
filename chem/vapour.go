package chem

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"sync"
)

// A VapourEquation gives the vapour pressure of a liquid over a range of
// temperature. Form says how the coefficients are used.
type VapourEquation struct {
	Form          VapourForm
	A, B, C, D, E float64     // for p in Pa and T in K
	From, To      Temperature // range of validity; both 0 where none is stated
	Source        string
}

// VapourForm is the shape of a vapour-pressure equation, p in Pa and T in K.
type VapourForm int

// Forms, written as in the column of the table.
const (
	AntoineLog10 VapourForm = iota // log10(p) = A − B/(T + C)
	AntoineLn                      // ln(p) = A − B/(T + C)
	DIPPR101                       // ln(p) = A + B/T + C·ln(T) + D·T^E
)

var vapourForms = map[string]VapourForm{
	"log10(P_Pa)=A-B/(T_K+C)":            AntoineLog10,
	"ln(P_Pa)=A-B/(T_K+C)":               AntoineLn,
	"ln(P_Pa)=A+B/T_K+C*ln(T_K)+D*T_K^E": DIPPR101,
}

// String writes the form as an equation.
func (f VapourForm) String() string {
	switch f {
	case AntoineLog10:
		return "log10(p/Pa) = A − B/(T/K + C)"
	case AntoineLn:
		return "ln(p/Pa) = A − B/(T/K + C)"
	case DIPPR101:
		return "ln(p/Pa) = A + B/(T/K) + C·ln(T/K) + D·(T/K)^E"
	}
	return fmt.Sprintf("VapourForm(%d)", int(f))
}

var vapourEquations = sync.OnceValue(func() map[string][]VapourEquation {
	equations := make(map[string][]VapourEquation)
	for _, row := range withMore("antoine") {
		form, ok := vapourForms[row.text("form")]
		if !ok {
			panic("chem: antoine.csv has an unknown form " + row.text("form"))
		}
		e := VapourEquation{
			Form: form, A: row.must("A"), B: row.must("B"), C: row.must("C"),
			From: Temperature(row.must("T_min_K")), To: Temperature(row.must("T_max_K")), Source: row.text("source"),
		}
		e.D, _ = row.number("D")
		e.E, _ = row.number("E")
		equations[row.text("cas")] = append(equations[row.text("cas")], e)
	}
	for _, list := range equations {
		// the widest range first: one equation then serves a whole run, and
		// boiling point and vapour pressure are the inverse of each other
		slices.SortStableFunc(list, func(a, b VapourEquation) int {
			return cmp.Compare(b.To-b.From, a.To-a.From)
		})
	}
	return equations
})

// VapourEquations returns the equations of a substance by CAS number, the one
// that VapourPressure prefers first.
func VapourEquations(cas string) []VapourEquation {
	return slices.Clone(vapourEquations()[cas])
}

// log returns ln(p/Pa) and its slope over temperature.
func (e *VapourEquation) log(t Temperature) (ln, slope float64) {
	x := float64(t)
	switch e.Form {
	case AntoineLog10:
		return math.Ln10 * (e.A - e.B/(x+e.C)), math.Ln10 * e.B / ((x + e.C) * (x + e.C))
	case AntoineLn:
		return e.A - e.B/(x+e.C), e.B / ((x + e.C) * (x + e.C))
	}
	power := e.D * math.Pow(x, e.E)
	return e.A + e.B/x + e.C*math.Log(x) + power, -e.B/(x*x) + e.C/x + e.E*power/x
}

// rangeStated says whether the equation has a range.
func (e *VapourEquation) rangeStated() bool { return e.To > e.From }

// rangeSlack is how far beyond its range an equation is still used: ends are often
// given to a tenth of a kelvin, or by the triple point of water for its melting point.
const rangeSlack = 0.05

// holds says whether a temperature lies in the equation's range.
func (e *VapourEquation) holds(t Temperature) bool {
	return !e.rangeStated() || (t >= e.From-rangeSlack && t <= e.To+rangeSlack)
}

// Range returns the validity range in words.
func (e VapourEquation) Range() string {
	if !e.rangeStated() {
		return "no range stated"
	}
	return fmt.Sprintf("%.1f to %.1f °C", e.From.Celsius(), e.To.Celsius())
}

// Pressure returns the vapour pressure at a temperature. Outside the stated
// range, or where the equation has no finite value, the error wraps
// ErrOutOfRange.
func (e VapourEquation) Pressure(t Temperature) (Pressure, error) {
	if e.holds(t) && t > 0 {
		ln, slope := e.log(t)
		if p := Pressure(math.Exp(ln)); slope > 0 && p > 0 && Finite(p) {
			return p, nil
		}
	}
	return 0, &DataError{Of: fmt.Sprintf("vapour pressure at %.1f °C", t.Celsius()), Err: ErrOutOfRange, Limit: e.Range(), Remedy: "give a temperature inside it"}
}

// VapourPressure returns the vapour pressure of a pure liquid by CAS number,
// from the equation with the widest range that holds at the temperature. The
// error wraps ErrNoData where the table has no equation, ErrOutOfRange where
// none holds at this temperature.
func VapourPressure(cas string, t Temperature) (Pressure, error) {
	equations := vapourEquations()[cas]
	for i := range equations {
		if equations[i].holds(t) {
			return equations[i].Pressure(t)
		}
	}
	return 0, noVapourEquation(cas, fmt.Sprintf("vapour pressure of %s at %.1f °C", nameOfCAS(cas), t.Celsius()))
}

// noVapourEquation is the refusal for a substance without an equation, or
// without one that reaches far enough.
func noVapourEquation(cas, of string) error {
	remedy := "give antoine=A;B;C for p in mmHg and t in °C"
	equations := vapourEquations()[cas]
	if len(equations) == 0 {
		return &DataError{Of: of, Err: ErrNoData, Remedy: remedy}
	}
	low, high := equations[0].From, equations[0].To
	for _, e := range equations {
		low, high = min(low, e.From), max(high, e.To)
	}
	return &DataError{
		Of: of, Err: ErrOutOfRange,
		Limit:  fmt.Sprintf("the table reaches from %.1f to %.1f °C", low.Celsius(), high.Celsius()),
		Remedy: remedy,
	}
}

package chem

import "math"

// The model of M. Laliberté, J. Chem. Eng. Data 54 (2009) 1725, for the
// density and the heat capacity of an aqueous solution over strength and
// temperature:
//
//	1/ρ  = (1 − w)/ρ(water) + w/ρ(app)
//	ρ(app) = (c0·w + c1)·exp(10⁻⁶·(t + c4)²) / (w + c2 + c3·t)
//	cp   = (1 − w)·cp(water) + w·cp(app)
//	cp(app) = a1·exp(a2·t + a3·exp(0.01·t) + a4·w) + a5·w^a6
//
// where w is the mass fraction of the solute, t the temperature in °C, ρ in
// kg/m³ and cp in kJ/(kg K). The coefficients of each solute hold up to the
// strength and between the temperatures that stand beside them.

// waterCAS is water.
const waterCAS = "7732-18-5"

// densityModel is the density part of one solute.
type densityModel struct {
	c         [5]float64
	most      float64     // highest mass fraction
	low, high Temperature // range of temperature
}

func newDensityModel(r row) *densityModel {
	m := &densityModel{}
	for i := range m.c {
		m.c[i], _ = r.number("c" + string(rune('0'+i)))
	}
	low, _ := r.number("density_T_min_C")
	high, _ := r.number("density_T_max_C")
	m.low, m.high = Celsius(low), Celsius(high)
	m.most, _ = r.number("density_w_max")
	return m
}

// covers reports whether the model holds at this strength and temperature, and
// the solvent's own density is known there too.
func (m *densityModel) covers(w float64, t Temperature) bool {
	return m != nil && w <= m.most && t >= max(m.low, ZeroCelsius) && t <= min(m.high, waterDensityHigh)
}

// at returns the density in kg/m³.
func (m *densityModel) at(w float64, t Temperature) float64 {
	c := t.Celsius()
	apparent := (m.c[0]*w + m.c[1]) * math.Exp(1e-6*(c+m.c[4])*(c+m.c[4])) / (w + m.c[2] + m.c[3]*c)
	return 1 / ((1-w)/kell(c) + w/apparent)
}

// waterDensityHigh is the upper end of Kell's equation.
const waterDensityHigh = ZeroCelsius + 150

// WaterDensity returns the density of liquid water, free of air, at one
// atmosphere, from 0 to 150 °C (above 100 °C at saturation): G. S. Kell,
// J. Chem. Eng. Data 20 (1975) 97, to 0.001 %.
func WaterDensity(t Temperature) (Density, error) {
	if !(t >= ZeroCelsius && t <= waterDensityHigh) {
		return 0, outOfRange("density of water", "temperature", t.Celsius(), 0, waterDensityHigh.Celsius(), "°C", "")
	}
	return Density(kell(t.Celsius())), nil
}

// kell is Kell's equation, in °C and kg/m³.
func kell(t float64) float64 {
	top := ((((-2.8054253e-10*t+1.0556302e-7)*t-4.6170461e-5)*t-0.0079870401)*t+16.945176)*t + 999.83952
	return top / (1 + 0.01687985*t)
}

// heatModel is the heat capacity part of one solute.
type heatModel struct {
	a         [6]float64
	most      float64
	low, high Temperature
}

// newHeatModel returns nil where the row has no heat capacity.
func newHeatModel(r row) *heatModel {
	m := &heatModel{}
	for i := range m.a {
		x, ok := r.number("a" + string(rune('1'+i)))
		if !ok {
			return nil
		}
		m.a[i] = x
	}
	low, _ := r.number("cp_T_min_C")
	high, _ := r.number("cp_T_max_C")
	m.low, m.high = Celsius(low), Celsius(high)
	m.most, _ = r.number("cp_w_max")
	return m
}

// at returns the heat capacity in J/(kg K).
func (m *heatModel) at(w float64, t Temperature) float64 {
	c := t.Celsius()
	apparent := m.a[0]*math.Exp(m.a[1]*c+m.a[2]*math.Exp(0.01*c)+m.a[3]*w) + m.a[4]*math.Pow(w, m.a[5])
	return (1-w)*waterHeatCapacity + w*apparent*1e3
}

package chem

import (
	"errors"
	"math"
	"strings"
	"testing"
)

// TestDensityLeaveOneOut takes every inner row out of its series in turn and reads
// it off the others: the table has to predict its own rows. The rows' sources
// disagree by up to 0.0015 g/mL (README of the tables); wide steps, as 60 to 80 %
// of an alcohol, are worth less.
func TestDensityLeaveOneOut(t *testing.T) {
	var worst float64
	for cas, d := range densityTables() {
		if cas == hypochloriteCAS {
			continue // five products, not a series
		}
		for _, c := range d.curves {
			for i := 1; i < len(c.xs)-1; i++ {
				xs := append(append([]float64{}, c.xs[:i]...), c.xs[i+1:]...)
				ys := append(append([]float64{}, c.ys[:i]...), c.ys[i+1:]...)
				off := math.Abs(newCurve(xs, ys).at(c.xs[i])-c.ys[i]) / 1e3
				limit := 0.0016
				if c.xs[i+1]-c.xs[i-1] > 0.08 {
					limit = 0.008
				}
				if off > limit {
					t.Errorf("%s at %v °C, %v %%: %.4f g/mL off", d.name, c.at.Celsius(), 100*c.xs[i], off)
				}
				worst = max(worst, off)
			}
		}
	}
	t.Logf("worst row: %.4f g/mL", worst)
}

// TestDensityPublished checks the model, which carries no row of these, against
// handbook densities at 20 °C (from memory, Perry's tables), and the tables away
// from their own temperature.
func TestDensityPublished(t *testing.T) {
	tests := []struct {
		cas     string
		percent float64
		celsius float64
		want    float64 // g/mL
		within  float64
		source  string
	}{
		{"1310-73-2", 10.71, 25, 1.11402, 0.001, "3 mol/kg sodium hydroxide, published table of estimates at 25 °C (read)"},
		{"1310-73-2", 19.36, 40, 1.20013, 0.0025, "6 mol/kg sodium hydroxide, the same at 40 °C (read)"},
		{"1310-73-2", 19.36, 70, 1.18192, 0.003, "6 mol/kg sodium hydroxide, the same at 70 °C (read)"},
		{"1310-73-2", 50, 40, 1.5109, 0.004, "sodium hydroxide, Perry at 40 °C, from memory"},
		{"7697-37-2", 15.90, 25, 1.08718, 0.001, "3 mol/kg nitric acid, the same at 25 °C (read)"},
		{"7697-37-2", 27.44, 55, 1.13654, 0.002, "6 mol/kg nitric acid, the same at 55 °C (read)"},
		{"7697-37-2", 14, 50, 1.0624, 0.001, "nitric acid, Perry at 50 °C (read)"},
		{"7697-37-2", 14, 5, 1.0845, 0.0015, "nitric acid, Perry at 5 °C (read)"},
		{"64-19-7", 50, 20, 1.0575, 0.001, "acetic acid, Perry, from memory"},
		{"64-19-7", 100, 20, 1.0498, 0.001, "acetic acid, Perry, from memory"},
		{"7664-41-7", 24, 20, 0.9101, 0.002, "ammonia, Perry, from memory"},
		{"7722-84-1", 30, 20, 1.112, 0.002, "hydrogen peroxide, maker's table, from memory"},
		{"7664-93-9", 50, 40, 1.3795, 0.002, "sulfuric acid, Perry at 40 °C, from memory"},
		{"7647-14-5", 26, 80, 1.1660, 0.003, "sodium chloride, Perry at 80 °C, from memory"},
		{"7732-18-5", 0, 4, 0.99997, 0.0001, "water at 4 °C, OpenStax Chemistry 2e table E1"},
		{"7732-18-5", 0, 25, 0.99705, 0.0001, "water at 25 °C, OpenStax Chemistry 2e table E1"},
	}
	for _, c := range tests {
		got, err := SolutionDensity(c.cas, Fraction(c.percent/100), Celsius(c.celsius))
		if err != nil || math.Abs(got.GramsPerMillilitre()-c.want) > c.within {
			t.Errorf("%s, %v %% at %v °C: %.4f g/mL, %v; want %v", c.source, c.percent, c.celsius, got.GramsPerMillilitre(), err, c.want)
		}
	}
}

// TestModelArithmetic checks the published test value of the model's formulas
// (sodium chloride, w = 0.0037838838 at 0 °C: 1002.625 kg/m³, the
// check value in the source of the coefficients).
func TestModelArithmetic(t *testing.T) {
	m := densityTables()["7647-14-5"].model
	if got := m.at(0.0037838838, ZeroCelsius); math.Abs(got-1002.6250120185854) > 1e-6 {
		t.Errorf("density of 0.378 %% NaCl at 0 °C = %v, want 1002.62501", got)
	}
	h := heatTables()["7647-14-5"].model
	const w, apparent = 0.00398447, -2930.7353945880477
	want := (1-w)*waterHeatCapacity + w*apparent
	if got := h.at(w, Celsius(1.5)); math.Abs(got-want) > 1e-6 {
		t.Errorf("heat capacity of 0.398 %% NaCl at 1.5 °C = %v, want %v", got, want)
	}
}

// TestDensityIsMonotone checks that no series turns back between its rows: all rise
// with strength except those that fall throughout (alcohols, acetone), and sulfuric
// acid has its one maximum at 97 to 98 %.
func TestDensityIsMonotone(t *testing.T) {
	falling := map[string]bool{"71-23-8": true, "67-63-0": true, "67-64-1": true, "64-17-5": true, "67-56-1": true}
	for cas, d := range densityTables() {
		for _, c := range d.curves {
			last := c.rho(c.low())
			for w := c.low(); w <= c.high(); w += 0.0005 {
				rho := c.rho(w)
				rise := rho - last
				if falling[cas] {
					rise = -rise
				}
				if rise < -1e-9 && !(cas == sulfuricCAS && w > 0.97) {
					t.Fatalf("%s turns back at %.2f %%", d.name, 100*w)
				}
				last = rho
			}
		}
	}
	best, at := 0.0, 0.0
	for w := 0.9; w <= 1; w += 0.0005 {
		if rho, _ := SolutionDensity(sulfuricCAS, Fraction(w), Celsius(20)); float64(rho) > best {
			best, at = float64(rho), w
		}
	}
	if at < 0.965 || at > 0.985 {
		t.Errorf("sulfuric acid is densest at %.1f %%, want 97 to 98 %% (README of the tables)", 100*at)
	}
}

func TestDensityRefuses(t *testing.T) {
	tests := []struct {
		name string
		cas  string
		w    Fraction
		at   Temperature
		want error
	}{
		{"120 %", sulfuricCAS, 1.2, Celsius(20), ErrOutOfRange},
		{"-1 %", sulfuricCAS, -0.01, Celsius(20), ErrOutOfRange},
		{"no number", sulfuricCAS, Fraction(math.NaN()), Celsius(20), ErrOutOfRange},
		{"no temperature", sulfuricCAS, 0.5, Temperature(math.NaN()), nil},
		{"96 % at 60 °C", sulfuricCAS, 0.96, Celsius(60), ErrOutOfRange},
		{"saturated brine at 30 %", "7647-14-5", 0.3, Celsius(20), ErrOutOfRange},
		{"unknown", "1-2-3", 0.3, Celsius(20), ErrNoData},
	}
	for _, c := range tests {
		rho, err := SolutionDensity(c.cas, c.w, c.at)
		if err == nil || rho != 0 || (c.want != nil && !errors.Is(err, c.want)) {
			t.Errorf("%s: SolutionDensity = %v, %v; want an error of kind %v", c.name, rho, err, c.want)
		}
	}
	_, err := SolutionDensity(sulfuricCAS, 0.96, Celsius(60))
	if want := "20 to 25 °C"; err == nil || !strings.Contains(err.Error(), want) {
		t.Errorf("error %q doesn't name the range %q", err, want)
	}
}

// TestDensityJoins checks that the temperature correction leaves no step where
// table and model meet.
func TestDensityJoins(t *testing.T) {
	for _, cas := range []string{sulfuricCAS, "7647-01-0", "7664-38-2", "7647-14-5", "584-08-7"} {
		for _, w := range []Fraction{0.05, 0.1, 0.2} {
			var last Density
			for c := 16.0; c < 40; c += 0.05 {
				rho, err := SolutionDensity(cas, w, Celsius(c))
				if err != nil {
					t.Fatal(err)
				}
				if last != 0 && math.Abs(float64(rho-last)) > 0.35 {
					t.Errorf("%s %v at %.2f °C: step of %v kg/m³", cas, w, c, rho-last)
				}
				last = rho
			}
		}
	}
}

// TestHeatCapacityPublished checks against METHODS c' (about 1.4 J/g/K for 98 %
// sulfuric acid, 4.2 for water) and handbook values from memory.
func TestHeatCapacityPublished(t *testing.T) {
	tests := []struct {
		cas        string
		w, want, d float64
	}{
		{sulfuricCAS, 0.98, 1.41, 0.03},
		{sulfuricCAS, 0, 4.18, 0.01},
		{sulfuricCAS, 0.10, 3.83, 0.1},  // Perry, from memory
		{sulfuricCAS, 0.50, 2.51, 0.1},  // Perry, from memory
		{"1310-73-2", 0.10, 3.77, 0.1},  // Perry, from memory
		{"7647-14-5", 0.20, 3.41, 0.05}, // handbook, from memory
		{"7664-38-2", 0.85, 1.9, 0.15},  // handbook, from memory
		{"7697-37-2", 0.68, 2.60, 0.05}, // Perry's table itself
		{"7647-01-0", 0.12, 3.4, 0.12},  // between model and table
	}
	for _, c := range tests {
		got, err := SolutionHeatCapacity(c.cas, Fraction(c.w))
		if err != nil || math.Abs(float64(got)/1e3-c.want) > c.d {
			t.Errorf("%s at %v: %v J/(g K), %v; want %v", c.cas, c.w, float64(got)/1e3, err, c.want)
		}
	}
}

// TestExpansion checks that every model has a thermal expansion that water and its
// solutions can have between 20 and 30 °C: 0.01 to
// 0.16 % a kelvin, the most of it in strong ammonia.
func TestExpansion(t *testing.T) {
	for cas, d := range densityTables() {
		m := d.model
		if m == nil || !m.covers(0, Celsius(20)) || !m.covers(0, Celsius(30)) {
			continue
		}
		for _, share := range []float64{0.25, 0.5, 0.75, 1} {
			w := m.most * share
			per := (m.at(w, Celsius(20)) - m.at(w, Celsius(30))) / m.at(w, Celsius(25)) / 10
			if per < 0.0001 || per > 0.0016 {
				t.Errorf("%s %s at %.3g: %.5f a kelvin", cas, d.name, w, per)
			}
		}
	}
}

package chem

import (
	"math"
	"testing"
)

func litre(c float64) Concentration { return Concentration(c) * MolePerLitre }

// TestPHPublished checks against the worked examples of OpenStax Chemistry 2e
// that METHODS d quotes (rows D04, D17, D18 of worked_examples.csv), and the
// middle of a water sample.
func TestPHPublished(t *testing.T) {
	tests := []struct {
		name   string
		mix    []Protolyte
		strong Concentration
		want   float64
		within float64
	}{
		{"pure water, pKw 13.995 (from memory, handbook)", nil, 0, 6.9975, 0.003},
		{"0.083 mol/L NaCN, OpenStax 14.4", []Protolyte{{"HCN", []float64{-math.Log10(4.9e-10)}, 0, litre(0.083)}}, litre(0.083), 11.11, 0.01},
		{"0.10 mol/L Al(H2O)6, OpenStax 14.4", []Protolyte{{"Al", []float64{-math.Log10(1.4e-5)}, 3, litre(0.1)}}, litre(-0.3), 2.92, 0.02},
		{"100 mL 1.8e-5 HCl and 1 mL 0.10 NaOH, OpenStax 14.6", nil, litre((0.1*1 - 1.8e-5*100) / 101), 10.99, 0.01},
	}
	for _, c := range tests {
		got, err := PH(c.mix, c.strong, Celsius(25))
		if err != nil || math.Abs(got-c.want) > c.within {
			t.Errorf("%s: PH = %v, %v; want %v", c.name, got, err, c.want)
		}
	}
}

// TestPKw checks the ion product of water against the values of the International
// Association for the Properties of Water and Steam at saturation, from memory.
func TestPKw(t *testing.T) {
	for celsius, want := range map[float64]float64{0: 14.945, 25: 13.995, 50: 13.275, 100: 12.265} {
		got, err := PKw(Celsius(celsius))
		if err != nil || math.Abs(got-want) > 0.02 {
			t.Errorf("PKw(%v °C) = %v, %v; want %v (from memory)", celsius, got, err, want)
		}
	}
}

// eight is a mixture of eight components with seventeen dissociation steps.
func eight() []Protolyte {
	return []Protolyte{
		{"phosphoric acid", []float64{2.16, 7.21, 12.32}, 0, litre(0.1)},
		{"carbonic acid", []float64{6.35, 10.33}, 0, litre(0.05)},
		{"acetic acid", []float64{4.76}, 0, litre(0.2)},
		{"ammonium ion", []float64{9.25}, 1, litre(0.1)},
		{"citric acid", []float64{3.13, 4.76, 6.40}, 0, litre(0.02)},
		{"boric acid", []float64{9.24}, 0, litre(0.01)},
		{"sulfurous acid", []float64{1.85, 7.2}, 0, litre(0.03)},
		{"EDTA", []float64{2.0, 2.7, 6.2, 10.3}, 0, litre(0.01)},
	}
}

func BenchmarkPHEight(b *testing.B) {
	mix := eight()
	b.ReportAllocs()
	for b.Loop() {
		if _, err := PH(mix, litre(0.25), Celsius(25)); err != nil {
			b.Fatal(err)
		}
	}
}

// TestPHAllocatesNothing keeps the solver fit for ten thousand draws.
func TestPHAllocatesNothing(t *testing.T) {
	mix := eight()
	if n := testing.AllocsPerRun(100, func() { PH(mix, litre(0.25), Celsius(25)) }); n != 0 {
		t.Errorf("PH allocates %v times", n)
	}
}

// TestLongMixtures checks that a mixture with more steps than are kept ready gives the
// same pH as one with its acids counted together.
func TestLongMixtures(t *testing.T) {
	var long []Protolyte
	for range 20 {
		long = append(long, Protolyte{"citric acid", []float64{3.13, 4.76, 6.40}, 0, litre(0.005)})
	}
	short := []Protolyte{{"citric acid", []float64{3.13, 4.76, 6.40}, 0, litre(0.1)}}
	a, err1 := PH(long, litre(0.15), Celsius(25))
	b, err2 := PH(short, litre(0.15), Celsius(25))
	if err1 != nil || err2 != nil || math.Abs(a-b) > 1e-9 {
		t.Errorf("pH %v, %v in twenty parts, %v, %v in one", a, err1, b, err2)
	}
}

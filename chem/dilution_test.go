package chem

import (
	"errors"
	"math"
	"testing"
)

// fractionAt is the mass fraction with r mol water per mol of molar mass m.
func fractionAt(r, m float64) Fraction { return Fraction(1 / (1 + r*18.015/m)) }

// TestSulfuricDilution checks between the rows of the table against integral
// heats of solution that aren't in it (from memory, the textbook table after
// NBS Circular 500, kJ/mol) and against Thomsen's fit of METHODS c', which is
// said there to be 5 % low.
func TestSulfuricDilution(t *testing.T) {
	for r, want := range map[float64]float64{3: 48.99, 4: 54.06, 25: 72.30, 500: 76.73, 2000: 80.88} {
		q, err := DilutionHeat(sulfuricCAS, 1, 1, fractionAt(r, 98.072))
		if err != nil || math.Abs(q.Kilojoules()-want) > 0.9 {
			t.Errorf("1 mol H2SO4 in %v mol water: %v kJ, %v; want %v (from memory)", r, q.Kilojoules(), err, want)
		}
		if thomsen := 74.73 * r / (r + 1.798); r < 10 && math.Abs(q.Kilojoules()-thomsen) > 0.08*thomsen {
			t.Errorf("1 mol H2SO4 in %v mol water: %v kJ, Thomsen's fit gives %v", r, q.Kilojoules(), thomsen)
		}
	}
}

// TestDilutionHeatPublished checks row CH04 of worked_examples.csv (CRC Handbook,
// heat of dilution of acids: HCl from 15 to 2 mol/kg gives 12.777 kJ/mol).
func TestDilutionHeatPublished(t *testing.T) {
	at := func(b float64) Fraction { return Fraction(b * 0.036458 / (1 + b*0.036458)) }
	q, err := DilutionHeat("7647-01-0", 1, at(15), at(2))
	if err != nil || math.Abs(q.Kilojoules()-12.777) > 0.01 {
		t.Errorf("HCl from 15 to 2 mol/kg: %v kJ/mol, %v; want 12.777", q.Kilojoules(), err)
	}
}

// TestDilutionAddsUp checks that two dilutions one after the other give the heat
// of both in one, as Hess's law wants.
func TestDilutionAddsUp(t *testing.T) {
	for cas := range dilutionTables() {
		whole, err1 := DilutionHeat(cas, 2, 0.40, 0.05)
		first, err2 := DilutionHeat(cas, 2, 0.40, 0.17)
		second, err3 := DilutionHeat(cas, 2, 0.17, 0.05)
		if err := errors.Join(err1, err2, err3); err != nil {
			t.Fatal(err)
		}
		if math.Abs(float64(whole-first-second)) > 1e-6 {
			t.Errorf("%s: %v J in one step, %v in two", cas, whole, first+second)
		}
	}
}

func TestDilutionHeatRefuses(t *testing.T) {
	tests := []struct {
		name     string
		cas      string
		n        Amount
		from, to Fraction
		want     error
	}{
		{"stronger", sulfuricCAS, 1, 0.1, 0.5, nil},
		{"120 %", sulfuricCAS, 1, 1.2, 0.5, ErrOutOfRange},
		{"no number", sulfuricCAS, Amount(math.NaN()), 0.9, 0.5, nil},
		{"pure hydrogen chloride", "7647-01-0", 1, 1, 0.1, ErrOutOfRange},
		{"down to nothing", sulfuricCAS, 1, 0.5, 0, ErrOutOfRange},
		{"unknown", "1-2-3", 1, 0.5, 0.1, ErrNoData},
	}
	for _, c := range tests {
		q, err := DilutionHeat(c.cas, c.n, c.from, c.to)
		if err == nil || q != 0 || (c.want != nil && !errors.Is(err, c.want)) {
			t.Errorf("%s: DilutionHeat = %v, %v; want an error of kind %v", c.name, q, err, c.want)
		}
	}
}

package chem

import (
	"errors"
	"math"
	"testing"
)

// TestElectrolyteOf checks how salts, acids and bases are taken apart (their ions are
// common practice).
func TestElectrolyteOf(t *testing.T) {
	tests := []struct {
		formula string
		acid    string
		count   float64
		strong  float64
	}{
		{"NaOH", "", 0, 1},
		{"Ca(OH)2", "", 0, 2},
		{"CaO", "", 0, 2},
		{"Na2CO3·10H2O", "carbonic acid", 1, 2},
		{"NaHCO3", "carbonic acid", 1, 1},
		{"CaCl2·2H2O", "hydrogen chloride", 2, 2},
		{"NaC2H3O2", "acetic acid", 1, 1},
		{"Ca(C2H3O2)2", "acetic acid", 2, 2},
		{"KH2PO4", "phosphoric acid", 1, 1},
		{"Na2HPO4", "phosphoric acid", 1, 2},
		{"H2SO4", "sulfuric acid", 1, 0},
		{"K2Cr2O7", "chromic acid", 2, 2},
		{"CrO3", "chromic acid", 1, 0},
		{"Na2S2O5", "sulfurous acid", 2, 2},
		{"CH3COOH", "acetic acid", 1, 0},
		{"CH3COONa", "acetic acid", 1, 1},
		{"Cl^-", "hydrogen chloride", 1, 0},
		{"Na^+", "", 0, 1},
	}
	for _, c := range tests {
		f, err := ParseFormula(c.formula)
		if err != nil {
			t.Fatal(err)
		}
		got, err := ElectrolyteOf(c.formula, "", f)
		if err != nil || got.Strong != c.strong || (c.acid == "") != (len(got.Acids) == 0) {
			t.Errorf("%s: %+v, %v", c.formula, got, err)
			continue
		}
		if c.acid != "" && (got.Acids[0].Acid.Name != c.acid || got.Acids[0].Count != c.count) {
			t.Errorf("%s: %v of %s, want %v of %s", c.formula, got.Acids[0].Count, got.Acids[0].Acid.Name, c.count, c.acid)
		}
	}
	for _, text := range []string{"FeCl3", "C2H6O", "C2H4O2", "C4H6O3"} {
		f, _ := ParseFormula(text)
		if got, err := ElectrolyteOf(text, "", f); !errors.Is(err, ErrNoData) {
			t.Errorf("%s: %+v, %v; want a refusal", text, got, err)
		}
	}
	hydrate, _ := ParseFormula("C2H2O4·2H2O")
	if got, err := ElectrolyteOf("oxalic acid dihydrate", "6153-56-6", hydrate); err != nil || len(got.Acids[0].Acid.PKa) != 2 {
		t.Errorf("oxalic acid dihydrate: %+v, %v", got, err)
	}
	if got, ok := ElectrolyteOfSalt("Sodium pentanoate"); !ok || got.Strong != 1 || got.Acids[0].Acid.Name != "pentanoic acid" {
		t.Errorf("sodium pentanoate: %+v, %v", got, ok)
	}
	for _, name := range []string{"sodium carbonate", "sodium", "iron pentanoate", "sodium citrate", "pentanoate"} {
		if got, ok := ElectrolyteOfSalt(name); ok {
			t.Errorf("%s: %+v", name, got)
		}
	}
	ammonium, _ := ParseFormula("(NH4)2SO4")
	got, err := ElectrolyteOf("ammonium sulfate", "", ammonium)
	if err != nil || len(got.Acids) != 2 || got.Acids[0].Count != 2 || got.Acids[1].Acid.Name != "sulfuric acid" {
		t.Errorf("(NH4)2SO4: %+v, %v", got, err)
	}
}

// TestPKaOf checks the choice among sources: the handbook's butanoic acid, 4.83,
// before the computed 4.809, and the chromic acid whose first step is a handbook's
// only; and every acid against itself: one pKa for each proton or fewer.
func TestPKaOf(t *testing.T) {
	for cas, want := range map[string][]float64{
		"107-92-6": {4.83}, "7738-94-5": {0.74, 6.49}, "7664-38-2": {2.16, 7.21, 12.32}, "64-19-7": {4.756},
	} {
		got, source, err := PKaOf(cas)
		if err != nil || source == "" || len(got) != len(want) {
			t.Fatalf("PKaOf(%s) = %v, %q, %v", cas, got, source, err)
		}
		for i := range want {
			if math.Abs(got[i]-want[i]) > 1e-12 {
				t.Errorf("PKaOf(%s) = %v, want %v", cas, got, want)
			}
		}
	}
	for cas, a := range acids().byCAS {
		if len(a.PKa) == 0 {
			t.Errorf("%s %s has no constant", cas, a.Name)
		}
		for i := 1; i < len(a.PKa); i++ {
			if a.PKa[i] <= a.PKa[i-1] {
				t.Errorf("%s: pKa %v don't rise", a.Name, a.PKa)
			}
		}
	}
	if _, _, err := PKaOf("1-2-3"); !errors.Is(err, ErrNoData) {
		t.Errorf("PKaOf(nothing): %v", err)
	}
}

// TestPKaAt checks constants away from 25 °C: ammonium 8.80 at 40 °C and 9.73 at 10 °C,
// acetic acid unmoved, carbonic acid 6.30 at 40 °C (handbooks, from memory).
func TestPKaAt(t *testing.T) {
	for _, c := range []struct {
		cas     string
		step    int
		celsius float64
		want    float64
	}{{"7664-41-7", 0, 40, 8.80}, {"7664-41-7", 0, 10, 9.73}, {"64-19-7", 0, 50, 4.79}, {"463-79-6", 0, 40, 6.30}, {"77-86-1", 0, 37, 7.74}} {
		a, _ := AcidByCAS(c.cas)
		pKa, moved := a.PKaAt(Celsius(c.celsius))
		if !moved || math.Abs(pKa[c.step]-c.want) > 0.05 {
			t.Errorf("%s at %v °C: %v, %v; want %v", a.Name, c.celsius, pKa, moved, c.want)
		}
	}
	for _, a := range acids().byCAS {
		if a.Enthalpy != nil && len(a.Enthalpy) != len(a.PKa) {
			t.Errorf("%s has %d constants and %d enthalpies", a.Name, len(a.PKa), len(a.Enthalpy))
		}
	}
}

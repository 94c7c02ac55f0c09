package chem

import (
	"math"
	"testing"
)

// TestNeutralise checks the salts and gases of equations that are common knowledge;
// 88.1 g of butanoic acid with bicarbonate give 24.05 L (row D45 of
// worked_examples.csv), with lime 1/2 Ca(OH)2 (row D43: 10.51 g for 25.0 g).
func TestNeutralise(t *testing.T) {
	tests := []struct {
		acid, cas, formula string
		base               string
		grams, excess      float64
		baseGrams          float64
		gasMoles           float64
		salt               string // whose molar mass the salt has, per mole of acid
	}{
		{"butanoic acid", "107-92-6", "C4H8O2", "NaHCO3", 88.106, 0, 84.006, 1, "NaC4H7O2"},
		{"butanoic acid", "107-92-6", "C4H8O2", "Ca(OH)2", 25.0, 0, 10.51, 0, ""},
		{"sulfuric acid", "7664-93-9", "H2SO4", "NaOH", 98.072, 0, 79.994, 0, "Na2SO4"},
		{"sulfuric acid", "7664-93-9", "H2SO4", "Na2CO3·10H2O", 98.072, 0, 286.138, 1, "Na2SO4"},
		{"sulfuric acid", "7664-93-9", "H2SO4", "CaO", 98.072, 0, 56.077, 0, "CaSO4"},
		{"hydrogen chloride", "7647-01-0", "HCl", "NH3", 36.458, 0, 17.031, 0, "NH4Cl"},
		{"hydrogen chloride", "7647-01-0", "HCl", "Na2CO3", 36.458, 0.5, 79.49, 0.25, "NaCl"},
		{"hydrogen chloride", "7647-01-0", "HCl", "NaHCO3", 36.458, 0.5, 126.01, 1, "NaCl"},
		{"phosphoric acid", "7664-38-2", "H3PO4", "NaOH", 97.994, 0, 79.994, 0, "Na2HPO4"},
	}
	for _, c := range tests {
		f, _ := ParseFormula(c.formula)
		bf, _ := ParseFormula(c.base)
		protons, _, err := AcidProtons(c.acid, c.cas, f)
		if err != nil {
			t.Fatal(err)
		}
		base, err := BaseOf(c.base, "", bf)
		if err != nil {
			t.Fatal(err)
		}
		n := f.MolarMass().Of(Mass(c.grams) * Gram)
		got, err := Neutralise(n, f.MolarMass(), protons, base, bf.MolarMass(), bf.Anhydrous().MolarMass(), Fraction(c.excess))
		if err != nil || math.Abs(got.Base.Grams()-c.baseGrams) > 0.02 || math.Abs(float64(got.CarbonDioxide)-c.gasMoles) > 1e-3 {
			t.Errorf("%s with %s: %v g, %v mol gas, %v; want %v g, %v mol", c.acid, c.base, got.Base.Grams(), got.CarbonDioxide, err, c.baseGrams, c.gasMoles)
		}
		if c.salt == "" {
			continue
		}
		sf, _ := ParseFormula(c.salt)
		if want := sf.MolarMass().Mass(n).Grams(); math.Abs(got.Salt.Grams()-want) > 0.01 {
			t.Errorf("%s with %s: %v g of salt, want %v", c.acid, c.base, got.Salt.Grams(), want)
		}
	}
	for _, bad := range []string{"NaCl", "H2SO4", "NaC2H3O2", "C2H6O"} {
		f, _ := ParseFormula(bad)
		if b, err := BaseOf(bad, "", f); err == nil {
			t.Errorf("%s is a base: %+v", bad, b)
		}
	}
}

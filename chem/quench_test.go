package chem

import (
	"errors"
	"math"
	"strings"
	"testing"
)

// TestHalfEquations balances every half-reaction of the table by element and
// charge and compares its electrons and protons with the table's columns.
func TestHalfEquations(t *testing.T) {
	agents := append(append([]RedoxAgent(nil), redoxAgents().oxidants...), redoxAgents().reductants...)
	for _, a := range agents {
		e, err := ParseEquation(a.Half)
		if err != nil {
			t.Errorf("%s: %v", a.Name, err)
			continue
		}
		if err := e.Balanced(); err != nil {
			t.Errorf("%s: %v", a.Name, err)
		}
		units := float64(e.Left[0].Coefficient)
		if a.Name == "chromium(VI)" {
			units = 2 // one dichromate holds two chromium atoms
		}
		var electrons, protons float64
		for i, side := range [2][]Term{e.Left, e.Right} {
			sign := float64(1 - 2*i)
			for _, term := range side {
				switch {
				case term.Formula.Electron():
					electrons += sign * float64(term.Coefficient)
				case term.Formula.Hill() == "H^+":
					protons += sign * float64(term.Coefficient)
				}
			}
		}
		if math.Abs(electrons)/units != float64(a.Electrons) || protons/units != float64(a.Protons) {
			t.Errorf("%s: %v electrons and %v protons per unit, table %d and %d", a.Name, electrons/units, protons/units, a.Electrons, a.Protons)
		}
		if a.Source == "" {
			t.Errorf("%s has no source", a.Name)
		}
	}
}

// doseAgents are the formulas of cr6_doses.csv.
var doseAgents = map[string]string{"C2H5OH": "ethanol", "(CH3)2CHOH": "2-propanol", "FeSO4.7H2O": "FeSO4·7H2O", "Na2S2O3.5H2O": "Na2S2O3·5H2O"}

// TestChromiumDoses compares with the stoichiometric doses of cr6_doses.csv,
// worked out elsewhere from standard atomic weights.
func TestChromiumDoses(t *testing.T) {
	compared := 0
	for _, row := range testRows(t, "cr6_doses.csv") {
		name, of, byMass := strings.Cut(row["stream_or_item"], " for ")
		if name == "acid" {
			continue // TestQuenchAcid
		}
		if agent, ok := doseAgents[name]; ok {
			name = agent
		}
		oxidant := "chromium(VI)"
		if byMass && of != "Cr" {
			oxidant = strings.Replace(of, ".", "·", 1)
		}
		found, err := OxidantOf(oxidant)
		if err != nil {
			t.Fatal(err)
		}
		amount := Amount(1)
		if byMass {
			amount = found.Formula.MolarMass().Of(Gram)
		}
		w, err := Quench{Oxidant: oxidant, Amount: amount, Reductant: name}.Quenching()
		if err != nil {
			t.Fatal(err)
		}
		got := float64(w.Reductants)
		if byMass {
			got = w.ReductantMass.Grams()
		}
		if want := testNumber(t, row, "value"); math.Abs(got-want) > 2e-4*want {
			t.Errorf("%s: %v, want %v", row["stream_or_item"], got, want)
		}
		compared++
	}
	if compared < 30 {
		t.Errorf("compared %d doses", compared)
	}
}

// TestQuenchAcid checks the acid of the reduction (2.5 mol H2SO4 per dichromate
// for bisulfite, cr6_doses.csv) and the balance of acid and base.
func TestQuenchAcid(t *testing.T) {
	w, err := Quench{Oxidant: "dichromate", Amount: 1, Reductant: "sodium bisulfite"}.Quenching()
	if err != nil || !near(w.SulfuricAcid.Grams(), 2.5*98.072, 1e-4) || !near(float64(w.Hydroxide), 6, 1e-12) {
		t.Errorf("without acid: %v of acid, %v mol OH⁻, %v", w.SulfuricAcid, w.Hydroxide, err)
	}
	w, err = Quench{Oxidant: "dichromate", Amount: 1, Reductant: "sodium bisulfite", FreeAcid: 8, Reduced: 0.5}.Quenching()
	if err != nil || w.Acid != 0 || !near(float64(w.Hydroxide), 3+6+1.5, 1e-12) || !near(w.SludgeMass.Grams(), 2.5*103.02, 1e-3) {
		t.Errorf("with acid: %+v, %v", w, err)
	}
	for _, gas := range []string{"sodium hypochlorite", "sodium chlorite"} {
		w, err := Quench{Oxidant: gas, Amount: 1, Reductant: "ascorbic acid"}.Quenching()
		if err != nil || w.Acid != 0 || w.SulfuricAcid != 0 {
			t.Errorf("%s must never be told to take acid: %+v, %v", gas, w, err)
		}
	}
}

// TestQuenchEquations compares with the balanced equations that waste rules and
// textbooks print.
func TestQuenchEquations(t *testing.T) {
	for _, c := range []struct{ oxidant, reductant, want string }{
		{"dichromate", "NaHSO3", "Cr2O7^2- + 3 HSO3^- + 5 H^+ -> 2 Cr^3+ + 3 SO4^2- + 4 H2O"},
		{"dichromate", "Na2S2O5", "2 Cr2O7^2- + 3 S2O5^2- + 10 H^+ -> 4 Cr^3+ + 6 SO4^2- + 5 H2O"},
		{"dichromate", "iron(II)", "Cr2O7^2- + 6 Fe^2+ + 14 H^+ -> 2 Cr^3+ + 6 Fe^3+ + 7 H2O"},
		{"dichromate", "thiosulfate", "4 Cr2O7^2- + 3 S2O3^2- + 26 H^+ -> 8 Cr^3+ + 6 SO4^2- + 13 H2O"},
	} {
		w, err := Quench{Oxidant: c.oxidant, Amount: 1, Reductant: c.reductant}.Quenching()
		if err != nil || w.Equation != c.want {
			t.Errorf("%s with %s: %q, %v, want %q", c.oxidant, c.reductant, w.Equation, err, c.want)
		}
	}
	for _, o := range redoxAgents().oxidants {
		for _, r := range redoxAgents().reductants {
			w, err := Quench{Oxidant: o.Name, Amount: 1, Reductant: r.Name}.Quenching()
			if err != nil || w.Equation == "" {
				t.Errorf("%s with %s: no equation, %v", o.Name, r.Name, err)
			}
		}
	}
}

func TestQuenchRefuses(t *testing.T) {
	for name, c := range map[string]struct {
		quench Quench
		want   error
	}{
		"unknown oxidant":   {Quench{Oxidant: "ozone", Amount: 1, Reductant: "NaHSO3"}, ErrNoData},
		"unknown reductant": {Quench{Oxidant: "CrO3", Amount: 1, Reductant: "zinc"}, ErrNoData},
		"no amount":         {Quench{Oxidant: "CrO3", Reductant: "NaHSO3"}, ErrOutOfRange},
		"negative excess":   {Quench{Oxidant: "CrO3", Amount: 1, Reductant: "NaHSO3", Excess: -0.1}, ErrOutOfRange},
		"excess NaN":        {Quench{Oxidant: "CrO3", Amount: 1, Reductant: "NaHSO3", Excess: Fraction(math.NaN())}, ErrOutOfRange},
	} {
		if _, err := c.quench.Quenching(); !errors.Is(err, c.want) {
			t.Errorf("%s: %v, want %v", name, err, c.want)
		}
	}
	if _, err := OxidantLeft(1, 6, OxidantUse{2, 4}); !errors.Is(err, ErrImpossible) {
		t.Errorf("more used than charged: %v", err)
	}
	if left, err := OxidantLeft(2, 6, OxidantUse{3, 4}); err != nil || left != 0 {
		t.Errorf("an exact fit: %v, %v", left, err)
	}
}

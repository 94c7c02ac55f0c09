package chem

import (
	"errors"
	"math"
	"strings"
	"testing"
)

func TestParseEquation(t *testing.T) {
	for text, want := range map[string]string{
		"H2+O2->H2O":                             "H2 + O2 -> H2O",
		"2H2 + O2 → 2H2O":                        "2 H2 + O2 -> 2 H2O",
		"H2 + 1/2 O2 = H2O":                      "2 H2 + O2 -> 2 H2O",
		"H2 + 0.5 O2 <=> H2O":                    "2 H2 + O2 -> 2 H2O",
		"H2 + ½O2 ⇌ H2O":                         "2 H2 + O2 -> 2 H2O",
		"H^++OH^-->H2O":                          "H^+ + OH^- -> H2O",
		"Na++Cl-->NaCl":                          "Na+ + Cl- -> NaCl",
		"Fe3+ + 3OH- -> Fe(OH)3":                 "Fe3+ + 3 OH- -> Fe(OH)3",
		"Fe 3+ + e^- -> Fe 2+":                   "Fe 3+ + e^- -> Fe 2+",
		"[Fe(CN)6]4- + Fe3+ --> [Fe(CN)6]":       "[Fe(CN)6]4- + Fe3+ -> [Fe(CN)6]",
		"2 H2O(l) -> 2 H2(g) + O2(g)":            "2 H2O(l) -> 2 H2(g) + O2(g)",
		"Fe2+(aq) + Ag+(aq) -> Fe3+(aq) + Ag(s)": "Fe2+(aq) + Ag+(aq) -> Fe3+(aq) + Ag(s)",
		"Na2CO3 + 2 HCl -> 2 NaCl + H2O + CO2↑":  "Na2CO3 + 2 HCl -> 2 NaCl + H2O + CO2",
		"CuSO4·5H2O -> CuSO4 + 5 H2O":            "CuSO4·5H2O -> CuSO4 + 5 H2O",
	} {
		got, err := ParseEquation(text)
		if err != nil || got.String() != want {
			t.Errorf("ParseEquation(%q) = %q, %v; want %q", text, got, err, want)
		}
	}
}

func TestParseEquationRefuses(t *testing.T) {
	for text, hint := range map[string]string{
		"":                    "arrow",
		"H2 + O2":             "arrow",
		"H2 + + O2 -> H2O":    "missing",
		"-> H2O":              "missing",
		"H2 + O2 -> H2O -> C": "second arrow",
		"H2 + Qq -> H2Qq":     "unknown element",
		"0 H2 + O2 -> H2O":    "nought",
		strings.Repeat("H2 + ", 2000) + "O2 -> H2O": "4000",
	} {
		_, err := ParseEquation(text)
		var refused *EquationError
		if !errors.As(err, &refused) || !strings.Contains(err.Error(), hint) {
			t.Errorf("ParseEquation(%.40q) = %v, want a refusal with %q", text, err, hint)
		}
	}
}

// Published balances beside those of worked_examples.csv: the hydrate, the half-water
// and the large coefficients are checked by hand through the element counts.
func TestBalance(t *testing.T) {
	for text, want := range map[string]string{
		"CaSO4·0.5H2O + H2O -> CaSO4·2H2O": "2 CaSO4·0.5H2O + 3 H2O -> 2 CaSO4·2H2O",
		"CdSO4·8/3H2O -> CdSO4 + H2O":      "3 CdSO4·8/3H2O -> 3 CdSO4 + 8 H2O",
		// OpenStax Chemistry 2e, 4.1, exercise on ethane.
		"C2H6 + O2 -> H2O + CO2": "2 C2H6 + 7 O2 -> 6 H2O + 4 CO2",
		// A well-known large one (R. Stout, J. Chem. Educ. 72 (1995) 1125), from memory.
		"[Cr(N2H4CO)6]4[Cr(CN)6]3 + KMnO4 + H2SO4 -> K2Cr2O7 + MnSO4 + CO2 + KNO3 + K2SO4 + H2O": "10 [Cr(N2H4CO)6]4[Cr(CN)6]3 + 1176 KMnO4 + 1399 H2SO4 -> 35 K2Cr2O7 + 1176 MnSO4 + 420 CO2 + 660 KNO3 + 223 K2SO4 + 1879 H2O",
	} {
		got, err := Balance(sure(ParseEquation(text))(t))
		if err != nil || got.String() != want {
			t.Errorf("Balance(%s) = %s, %v; want %s", text, got, err, want)
			continue
		}
		if err := got.Balanced(); err != nil {
			t.Error(err)
		}
	}
}

func TestBalanceRefuses(t *testing.T) {
	for _, test := range []struct {
		text  string
		cause error
		hint  string
	}{
		{"H2 -> O2", ErrNoBalance, "H stands on one side"},
		{"Fe^2+ -> Fe^3+", ErrNoBalance, "electrons"},
		{"H2O + O2 -> H2", ErrWrongSide, "O2 would have to change sides"},
		{"H2 + O2 -> H2O + C", ErrWrongSide, "C takes no part"},
		{"KMnO4 + H2O2 + H2SO4 -> MnSO4 + K2SO4 + O2 + H2O", ErrSeveralBalances, "2 independent"},
		{"KMnO4 + H2O2 + H2SO4 -> MnSO4 + K2SO4 + O2 + H2O", ErrSeveralBalances, "2 H2O2 -> O2 + 2 H2O"},
		{"C + O2 -> CO + CO2", ErrSeveralBalances, "2 C + O2 -> 2 CO"},
		{"C + O2 + H2 -> CO + CO2 + H2O", ErrSeveralBalances, "3 independent"},
		{"C + O2 -> CO + CO2", ErrSeveralBalances, "2 independent"},
	} {
		_, err := Balance(sure(ParseEquation(test.text))(t))
		var refused *BalanceError
		if !errors.As(err, &refused) || !errors.Is(err, test.cause) || !strings.Contains(err.Error(), test.hint) {
			t.Errorf("Balance(%s) = %v, want %v with %q", test.text, err, test.cause, test.hint)
			continue
		}
		for _, way := range refused.Ways {
			if err := way.Balanced(); err != nil {
				t.Errorf("a way of %s: %v", test.text, err)
			}
		}
	}
}

// Numbers too large for int64 in between go through the big arithmetic; both ways of
// computing have to agree where both can.
func TestNullSpaceBothWays(t *testing.T) {
	for _, text := range []string{
		"Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O", "C + O2 -> CO + CO2",
		"CuSCN + KIO3 + HCl -> CuSO4 + KCl + HCN + ICl + H2O", "H2 -> O2",
	} {
		e := sure(ParseEquation(text))(t)
		matrix, _ := e.matrix()
		width := len(e.Left) + len(e.Right)
		small, big := nullSpace(matrix, width), nullSpaceBig(matrix, width)
		if len(small) != len(big) {
			t.Errorf("%s: %v and %v", text, small, big)
			continue
		}
		for i := range small {
			for k := range small[i] {
				if small[i][k] != big[i][k] {
					t.Errorf("%s: %v and %v", text, small, big)
				}
			}
		}
	}
	huge := int64(math.MaxInt64 / 3)
	got := nullSpace([][]int64{{huge, -huge + 1, 0}, {0, huge - 4, -huge + 2}}, 3)
	if got != nil {
		t.Errorf("a vector beyond int64 came out as %v", got)
	}
}

// TestElectrons checks oxidation numbers by counts of METHODS b: dichromate takes 6,
// permanganate 5 in acid and 3 to MnO2, hypochlorite 2, a primary alcohol gives 4 to
// the acid and 2 to the aldehyde.
func TestElectrons(t *testing.T) {
	for text, want := range map[string]float64{
		"Cr2O7^2- + 14 H^+ + 6 e^- -> 2 Cr^3+ + 7 H2O":                                                  6,
		"MnO4^- + 8 H^+ + 5 e^- -> Mn^2+ + 4 H2O":                                                       5,
		"MnO4^- + 4 H^+ + 3 e^- -> MnO2 + 2 H2O":                                                        3,
		"ClO^- + H2O + 2 e^- -> Cl^- + 2 OH^-":                                                          2,
		"C5H12O + 2 NaOCl -> C5H10O2 + 2 NaCl + H2O":                                                    4,
		"C5H12O + NaOCl -> C5H10O + NaCl + H2O":                                                         2,
		"NaCl + AgNO3 -> AgCl + NaNO3":                                                                  0,
		"2 H2O2 -> 2 H2O + O2":                                                                          2,
		"5 H2O2 + 2 MnO4^- + 6 H^+ -> 2 Mn^2+ + 5 O2 + 8 H2O":                                           10,
		"3 Cl2 + 6 OH^- -> 5 Cl^- + ClO3^- + 3 H2O":                                                     5,
		"IO3^- + 5 I^- + 6 H^+ -> 3 I2 + 3 H2O":                                                         5,
		"(NH4)2Cr2O7 -> N2 + Cr2O3 + 4 H2O":                                                             6,
		"2 Na2S2O3 + I2 -> 2 NaI + Na2S4O6":                                                             2,
		"Zn + CuSO4·5H2O -> ZnSO4 + Cu + 5 H2O":                                                         2,
		"10 Fe^2+ + 2 MnO4^- + 16 H^+ -> 10 Fe^3+ + 2 Mn^2+ + 8 H2O":                                    10,
		"6 (NH4)2Fe(SO4)2 + K2Cr2O7 + 7 H2SO4 -> 3 Fe2(SO4)3 + Cr2(SO4)3 + K2SO4 + 6 (NH4)2SO4 + 7 H2O": 6,
	} {
		got, err := sure(ParseEquation(text))(t).Electrons()
		if err != nil || got != want {
			t.Errorf("Electrons(%s) = %v, %v; want %v", text, got, err, want)
		}
	}
	if _, err := sure(ParseEquation("H2 + O2 -> H2O"))(t).Electrons(); !errors.Is(err, ErrUnbalanced) {
		t.Errorf("Electrons of an unbalanced reaction: %v", err)
	}
	if _, err := sure(ParseFormula("CuFe2O4"))(t).OxidationNumbers(); !errors.Is(err, ErrUnsettled) {
		t.Errorf("two metals: %v, want ErrUnsettled", err)
	}
}

// Oxidation numbers from the rules of OpenStax Chemistry 2e, 4.2 and IUPAC (Karen et
// al., Pure Appl. Chem. 86 (2014) 1017).
func TestOxidationNumbers(t *testing.T) {
	for _, test := range []struct {
		text, symbol string
		want         float64
	}{
		{"H2S", "S", -2}, {"SO3^2-", "S", 4}, {"Na2SO4", "S", 6}, {"K2Cr2O7", "Cr", 6}, {"KMnO4", "Mn", 7}, {"H2O2", "O", -1},
		{"NaH", "H", -1}, {"LiAlH4", "H", -1}, {"OF2", "O", 2}, {"KO2", "O", -0.5}, {"K3[Fe(CN)6]", "Fe", 3}, {"Ni(CO)4", "Ni", 0},
		{"CuSCN", "Cu", 1}, {"Cu(NO3)2", "Cu", 2}, {"Fe2(SO4)3", "Fe", 3}, {"FeTiO3", "Fe", 2}, {"CrO2Cl2", "Cr", 6}, {"K2S2O8", "S", 6},
		{"C2H6O", "C", -2}, {"CH4", "C", -4}, {"CCl4", "C", 4}, {"ICl", "I", 1}, {"NaClO", "Cl", 1}, {"Na2S2O3", "S", 2}, {"O2", "O", 0},
		{"Mn(CH3COO)3", "Mn", 3}, {"Cu2CO3(OH)2", "Cu", 2}, {"(NH4)3Fe(C2O4)3", "Fe", 3}, {"C3H9ClSi", "Si", 4},
	} {
		numbers, err := sure(ParseFormula(test.text))(t).OxidationNumbers()
		if err != nil {
			t.Error(err)
			continue
		}
		for _, n := range numbers {
			if n.Symbol == test.symbol && math.Abs(n.Number-test.want) > 1e-9 {
				t.Errorf("%s in %s: %v, want %v", test.symbol, test.text, n.Number, test.want)
			}
		}
	}
}

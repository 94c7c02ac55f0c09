package chem

import (
	"errors"
	"math"
	"reflect"
	"strings"
	"testing"
)

// TestParseFormula checks composition, charge and state. The compositions follow from
// the formulas as written (IUPAC Red Book 2005, IR-4).
func TestParseFormula(t *testing.T) {
	for _, test := range []struct {
		text   string
		hill   string
		charge int
		state  string
		waters float64
	}{
		{"H2O", "H2O", 0, "", 0},
		{"Na2Cr2O7·2H2O", "Cr2Na2O7·2H2O", 0, "", 2},
		{"Na2Cr2O7.2H2O", "Cr2Na2O7·2H2O", 0, "", 2},
		{"Na2Cr2O7 * 2 H2O", "Cr2Na2O7·2H2O", 0, "", 2},
		{"CaSO4·½H2O", "CaO4S·0.5H2O", 0, "", 0.5},
		{"CaSO4.0.5H2O", "CaO4S·0.5H2O", 0, "", 0.5},
		{"CdSO4·8/3H2O", "CdO4S·8/3H2O", 0, "", 8.0 / 3},
		{"RuCl3·xH2O", "Cl3Ru·xH2O", 0, "", 0},
		{"CaCl2.2H2O", "CaCl2·2H2O", 0, "", 2},
		{"Al2Si2O5(OH)4", "Al2H4O9Si2", 0, "", 0},
		{"(NH4)2Fe(SO4)2·6H2O", "FeH8N2O8S2·6H2O", 0, "", 6},
		{"[Co(NH3)6]Cl3", "Cl3CoH18N6", 0, "", 0},
		{"K4[Fe(CN)6]", "C6FeK4N6", 0, "", 0},
		{"{[Ca(OH)]2}2", "Ca4H4O4", 0, "", 0},
		{"CH3(CH2)3COOH", "C5H10O2", 0, "", 0},
		{"Na₂CO₃·10H₂O", "CNa2O3·10H2O", 0, "", 10},
		{"Fe0.95O", "Fe_{0.95}O", 0, "", 0},
		{"YBa2Cu3O6.5", "Ba2Cu3O_{6.5}Y", 0, "", 0},
		{"Cr2O7^2-", "Cr2O7^2-", -2, "", 0},
		{"Cr2O7^{2-}", "Cr2O7^2-", -2, "", 0},
		{"Cr2O7²⁻", "Cr2O7^2-", -2, "", 0},
		{"SO4 2-", "O4S^2-", -2, "", 0},
		{"SO4-2", "O4S^2-", -2, "", 0},
		{"SO4--", "O4S^2-", -2, "", 0},
		{"NO3-", "NO3^-", -1, "", 0},
		{"NH4+", "H4N^+", 1, "", 0},
		{"Fe3+", "Fe^3+", 3, "", 0},
		{"[Fe(CN)6]4-", "C6FeN6^4-", -4, "", 0},
		{"Hg2^2+", "Hg2^2+", 2, "", 0},
		{"e^-", "e^-", -1, "", 0},
		{"D2O", "D2O", 0, "", 0},
		{"[2H]2O", "D2O", 0, "", 0},
		{"[13C]O2", "[13C]O2", 0, "", 0},
		{"¹³CO2", "[13C]O2", 0, "", 0},
		{"^{13}CO2", "[13C]O2", 0, "", 0},
		{"NaCl(aq)", "ClNa", 0, "aq", 0},
		{"Fe^2+(aq)", "Fe^2+", 2, "aq", 0},
		{"H2O (l)", "H2O", 0, "l", 0},
	} {
		f, err := ParseFormula(test.text)
		if err != nil {
			t.Errorf("ParseFormula(%q): %v", test.text, err)
			continue
		}
		if f.Hill() != test.hill || f.Charge() != test.charge || f.State() != test.state || math.Abs(f.Waters()-test.waters) > 1e-12 {
			t.Errorf("ParseFormula(%q) = %s, charge %d, state %q, %v waters; want %s, %d, %q, %v",
				test.text, f.Hill(), f.Charge(), f.State(), f.Waters(), test.hill, test.charge, test.state, test.waters)
		}
	}
}

func TestParseFormulaRefuses(t *testing.T) {
	for _, test := range []struct {
		text  string
		cause error
		at    int // character
	}{
		{"", ErrSyntax, 0},
		{"Xx", ErrUnknownElement, 1},
		{"Na2Xx", ErrUnknownElement, 4},
		{"NaCl₂Q", ErrUnknownElement, 6},
		{"nacl", ErrUnknownElement, 1},
		{"Ca(OH", ErrBracket, 3},
		{"Ca(OH]2", ErrBracket, 6},
		{"CaOH)2", ErrBracket, 5},
		{"I3-", ErrAmbiguous, 2},
		{"SO42-", ErrAmbiguous, 3},
		{"(NH4)2+", ErrAmbiguous, 6},
		{"2H2O", ErrSyntax, 1},
		{"H0", ErrSyntax, 2},
		{"(CH2O)n", ErrSyntax, 7},
		{"CuSO4·", ErrSyntax, 6},
		{"Fe^", ErrSyntax, 3},
		{"Fe^2-3", ErrSyntax, 3},
		{"Na+-", ErrSyntax, 4},
		{"Na\x80", ErrSyntax, 0},
		{"C99999999999", ErrSyntax, 2},
		{strings.Repeat("(", 40) + "H" + strings.Repeat(")", 40), ErrSyntax, 17},
		{strings.Repeat("C", 600), ErrSyntax, 0},
	} {
		f, err := ParseFormula(test.text)
		var refused *FormulaError
		if !errors.As(err, &refused) || !errors.Is(err, test.cause) {
			t.Errorf("ParseFormula(%q) = %v, %v; want %v", test.text, f, err, test.cause)
			continue
		}
		if refused.Position != test.at || refused.Wanted == "" {
			t.Errorf("ParseFormula(%q): %v: position %d, want %d, and what would do", test.text, err, refused.Position, test.at)
		}
	}
}

// Molar masses of all rows of the table of finer properties, which were computed
// apart from this program from the same abridged atomic weights.
func TestMolarMassesOfTable(t *testing.T) {
	for _, r := range readTable("substances.csv") {
		want, ok := r.number("molar_mass_g_mol")
		if !ok {
			t.Errorf("%s has no molar mass", r.text("name"))
			continue
		}
		f, err := ParseFormula(r.text("formula"))
		if err != nil {
			t.Errorf("%s: %v", r.text("name"), err)
			continue
		}
		if got := f.MolarMass().GramsPerMole(); math.Abs(got-want) > 0.00051 {
			t.Errorf("M(%s) = %.4f g/mol, want %.3f", f, got, want)
		}
	}
}

// Published molar masses: OpenStax Chemistry 2e, 3.1 and 3.2 (examples on aspirin,
// aluminium sulfate, calcium phosphate, ammonia, vitamin C), from memory, to two
// decimals with older atomic weights.
func TestMolarMassPublished(t *testing.T) {
	for text, want := range map[string]float64{
		"C9H8O4": 180.15, "Al2(SO4)3": 342.14, "Ca3(PO4)2": 310.18, "NH3": 17.03, "C6H8O6": 176.12, "CHCl3": 119.37,
	} {
		f := sure(ParseFormula(text))(t)
		if got := f.MolarMass().GramsPerMole(); math.Abs(got-want) > 0.02 {
			t.Errorf("M(%s) = %.3f g/mol, want %.2f", text, got, want)
		}
	}
}

// The bounds of the abridged atomic weights, IUPAC/CIAAW 2021, propagate as full
// correlation within an element and none between elements.
func TestUncertainty(t *testing.T) {
	water := sure(ParseFormula("H2O"))(t)
	// ± 0.0002 on H, twice, and ± 0.001 on O (table row), as rectangular bounds.
	want := math.Sqrt((2*0.0002)*(2*0.0002)+0.001*0.001) / math.Sqrt(3)
	if got := water.Uncertainty().GramsPerMole(); math.Abs(got-want) > 1e-12 {
		t.Errorf("u(H2O) = %v g/mol, want %v", got, want)
	}
}

func TestWithoutMolarMass(t *testing.T) {
	for _, text := range []string{"Tc", "RuCl3·xH2O", "[99Tc]", "e^-"} {
		f := sure(ParseFormula(text))(t)
		if f.MolarMass() != 0 || f.Uncertainty() != 0 || !errors.Is(f.Weighable(), ErrNoMolarMass) {
			t.Errorf("%s: molar mass %v, Weighable %v; want none and ErrNoMolarMass", text, f.MolarMass(), f.Weighable())
		}
	}
}

func TestAnhydrous(t *testing.T) {
	for text, want := range map[string]string{
		"Na2Cr2O7·2H2O": "Na2Cr2O7", "CuSO4.5H2O(s)": "CuSO4(s)", "NaCl": "NaCl", "RuCl3·xH2O": "RuCl3",
	} {
		dry := sure(ParseFormula(text))(t).Anhydrous()
		if dry.String() != want || dry.Waters() != 0 || dry.MolarMass() <= 0 {
			t.Errorf("%s dry = %s with M = %v, want %s", text, dry, dry.MolarMass(), want)
		}
	}
}

func TestRich(t *testing.T) {
	for text, want := range map[string][]Span{
		"CuSO4·5H2O":   {{"CuSO", 0}, {"4", -1}, {"·5H", 0}, {"2", -1}, {"O", 0}},
		"Cr2O7^2-":     {{"Cr", 0}, {"2", -1}, {"O", 0}, {"7", -1}, {"2−", 1}},
		"[13C]H4":      {{"13", 1}, {"CH", 0}, {"4", -1}},
		"Fe^3+(aq)":    {{"Fe", 0}, {"3+", 1}, {"\u2009(aq)", 0}},
		"(NH4)2SO4":    {{"(NH", 0}, {"4", -1}, {")", 0}, {"2", -1}, {"SO", 0}, {"4", -1}},
		"e^-":          {{"e", 0}, {"−", 1}},
		"CaSO4.0.5H2O": {{"CaSO", 0}, {"4", -1}, {"·0.5H", 0}, {"2", -1}, {"O", 0}},
	} {
		if got := sure(ParseFormula(text))(t).Rich(); !reflect.DeepEqual(got, want) {
			t.Errorf("Rich(%s) = %v, want %v", text, got, want)
		}
	}
}

// Atomic weights have to be the rows of the table, element by element, and a molar
// mass of one atom the atomic weight.
func TestElements(t *testing.T) {
	rows := readTable("atomic_weights.csv")
	if len(rows) != 118 {
		t.Fatalf("%d elements, want 118 (IUPAC)", len(rows))
	}
	for _, r := range rows {
		symbol := r.text("symbol")
		e, ok := ElementBySymbol(symbol)
		if !ok || e.Symbol != symbol || e.Name != r.text("name") {
			t.Errorf("ElementBySymbol(%q) = %v, %v", symbol, e, ok)
		}
		f := sure(ParseFormula(symbol))(t)
		want, has := r.number("abridged_value")
		if got := f.MolarMass().GramsPerMole(); has && math.Abs(got-want) > 1e-9 || !has && got != 0 {
			t.Errorf("M(%s) = %v, want %v", symbol, got, want)
		}
	}
}

func TestComposition(t *testing.T) {
	// OpenStax Chemistry 2e, 3.2: aspirin is 60.00 % C, 4.476 % H, 35.52 % O.
	want := map[string]float64{"C": 60.00, "H": 4.476, "O": 35.52}
	var sum float64
	for _, share := range sure(ParseFormula("C9H8O4"))(t).Composition() {
		if math.Abs(share.Fraction.Percent()-want[share.Symbol]) > 0.01 {
			t.Errorf("%s: %v %%, want %v", share.Symbol, share.Fraction.Percent(), want[share.Symbol])
		}
		sum += share.Fraction.Percent()
	}
	if math.Abs(sum-100) > 1e-9 {
		t.Errorf("shares sum to %v %%", sum)
	}
}

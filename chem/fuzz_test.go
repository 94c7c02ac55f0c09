package chem

import (
	"math"
	"testing"
	"unicode/utf8"
)

// FuzzParseFormula checks that no text panics, that what parses prints to a text that
// parses as the same formula, and that no number is out of bounds.
func FuzzParseFormula(f *testing.F) {
	for _, text := range []string{
		"Na2Cr2O7·2H2O", "CaSO4.0.5H2O", "[Fe(CN)6]^4-", "Cr2O7²⁻", "NH4+", "[2H]2O", "NaCl(aq)", "e^-", "Fe3+", "I3-", "SO42-",
		"RuCl3·xH2O", "CdSO4·8/3H2O", "^{13}CH4", "Na(", "C_{1.5}H2", "((((H))))", "(CH2O)n", "Fe0.95O", "H2O (l)", "D2O", "·", "½",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		formula, err := ParseFormula(text)
		if err != nil {
			if err.Error() == "" {
				t.Errorf("ParseFormula(%q): an error without words", text)
			}
			return
		}
		again, err := ParseFormula(formula.String())
		if err != nil {
			t.Fatalf("ParseFormula(%q) prints as %q: %v", text, formula, err)
		}
		if again.Hill() != formula.Hill() || again.Charge() != formula.Charge() || again.State() != formula.State() ||
			again.MolarMass() != formula.MolarMass() || again.Waters() != formula.Waters() {
			t.Errorf("ParseFormula(%q) = %s, printed and parsed %s", text, formula.Hill(), again.Hill())
		}
		if m := float64(formula.MolarMass()); math.IsNaN(m) || math.IsInf(m, 0) || m < 0 || (m == 0) != (formula.Weighable() != nil) {
			t.Errorf("ParseFormula(%q): molar mass %v, %v", text, m, formula.Weighable())
		}
		formula.Rich()
		_ = formula.Anhydrous().String()
		if numbers, err := formula.OxidationNumbers(); err == nil {
			for _, n := range numbers {
				if math.IsNaN(n.Number) || math.IsInf(n.Number, 0) {
					t.Errorf("oxidation number of %s in %q: %v", n.Symbol, text, n.Number)
				}
			}
		}
	})
}

// FuzzParseEquation checks that no text panics, that what parses prints and parses as
// the same equation, and that a balanced equation balances.
func FuzzParseEquation(f *testing.F) {
	for _, text := range []string{
		"Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O", "H2+O2->H2O", "Na++Cl-->NaCl", "H2 + 1/2 O2 = H2O", "-> H2O", "C + O2 -> CO + CO2",
		"CaSO4·½H2O + H2O -> CaSO4·2H2O", "Cl^- + OH^- -> ClO3^- + H2O + e^-", "H2 -> O2", "999999999 H2 -> H2", "+->+",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		e, err := ParseEquation(text)
		if err != nil {
			return
		}
		again, err := ParseEquation(e.String())
		if err != nil || again.String() != e.String() {
			t.Fatalf("ParseEquation(%q) prints as %q, which parses as %q, %v", text, e, again, err)
		}
		balanced, err := Balance(e)
		if err != nil {
			return
		}
		if err := balanced.Balanced(); err != nil {
			t.Errorf("Balance(%q) = %q: %v", text, balanced, err)
		}
		if n, err := balanced.Electrons(); err == nil && (math.IsNaN(n) || n < 0) {
			t.Errorf("Electrons(%q) = %v", balanced, n)
		}
	})
}

// FuzzParseQuantity checks all quantities and their units: no text panics, and what
// parses is a number.
func FuzzParseQuantity(f *testing.F) {
	for _, text := range []string{
		"50 g", "1,5 kg", "1,234 g", "1.234,5 g", "98 % w/w", "25 °C", "-459.67 °F", "1 h 30 min", "0.5 mol/L", "1e999 g", "NaN", "1×10^3 g",
		"2\u202f000 mL", "4.18 J/(g K)", "1.2 equiv", "−5 K", ",", "1..2",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		fuzzOne(t, text, ParseMass)
		fuzzOne(t, text, ParseVolume)
		fuzzOne(t, text, ParseAmount)
		fuzzOne(t, text, ParseTemperature)
		fuzzOne(t, text, ParseTemperatureStep)
		fuzzOne(t, text, ParsePressure)
		fuzzOne(t, text, ParseDensity)
		fuzzOne(t, text, ParseConcentration)
		fuzzOne(t, text, ParseMassConcentration)
		fuzzOne(t, text, ParseMolality)
		fuzzOne(t, text, ParseFraction)
		fuzzOne(t, text, ParseExcess)
		fuzzOne(t, text, ParseDuration)
		fuzzOne(t, text, ParseEnergy)
		fuzzOne(t, text, ParseMolarEnergy)
		fuzzOne(t, text, ParseSpecificHeat)
		fuzzOne(t, text, ParsePower)
		fuzzOne(t, text, ParseMolarMass)
		fuzzOne(t, text, ParseArea)
		fuzzOne(t, text, ParseNumber)
	})
}

func fuzzOne[Q ~float64](t *testing.T, text string, parse func(string) (Q, error)) {
	t.Helper()
	q, err := parse(text)
	if !Finite(q) || err != nil && (q != 0 || err.Error() == "") {
		t.Errorf("parsing %q: %v, %v", text, q, err)
	}
}

// FuzzUnit checks that a unit is taken the same however its number is written, and
// that a number without its unit is refused.
func FuzzUnit(f *testing.F) {
	for _, u := range []string{"g", "kg", "µg", "μg", "mL", "cm³", "°C", "mol/L", "%", " w/w %", "g /mL", "", "lb", "K"} {
		f.Add(u)
	}
	f.Fuzz(func(t *testing.T, unit string) {
		if r := readNumber("2 " + unit); r.err != nil || r.value != 2 {
			return // the unit itself goes on with the number
		}
		one, err1 := ParseMass("2 " + unit)
		two, err2 := ParseMass("2.0 " + unit)
		if one != two || (err1 == nil) != (err2 == nil) {
			t.Errorf("2 and 2.0 %q: %v, %v and %v, %v", unit, one, err1, two, err2)
		}
		if plain := plainUnit(unit); utf8.ValidString(unit) && plain != plainUnit(plain) {
			t.Errorf("plainUnit(%q) = %q, again %q", unit, plain, plainUnit(plain))
		}
	})
}

// FuzzLookupSubstance checks that no key panics and that a found one is found again by
// its own name.
func FuzzLookupSubstance(f *testing.F) {
	for _, key := range []string{"sodium sulfate, anhydrous", "CuSO4·5H2O", "7732-18-5", "borax", "", "ß", "anhydrous", "\xff"} {
		f.Add(key)
	}
	f.Fuzz(func(t *testing.T, key string) {
		s, ok := LookupSubstance(key)
		if ok != (s != nil) {
			t.Fatalf("LookupSubstance(%q) = %v, %v", key, s, ok)
		}
		if !ok {
			return
		}
		if again, ok := LookupSubstance(s.Name); !ok || again != s {
			t.Errorf("%q finds %s, which doesn't find itself", key, s.Name)
		}
	})
}

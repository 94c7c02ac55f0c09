package chem

import (
	"math"
	"strings"
	"testing"
)

func TestLookupSubstance(t *testing.T) {
	for key, cas := range map[string]string{
		"sodium dichromate":              "10588-01-9",
		"Sodium Dichromate Dihydrate":    "7789-12-0",
		"Na2Cr2O7·2H2O":                  "7789-12-0",
		"Na2Cr2O7.2H2O":                  "7789-12-0",
		"sodium dichromate, anhydrous":   "10588-01-9",
		"sodium dichromate (anhydrous)":  "10588-01-9",
		"anhydrous sodium sulphate":      "7757-82-6",
		"7664-93-9":                      "7664-93-9",
		"H2SO4":                          "7664-93-9",
		"pentan-1-ol":                    "71-41-0",
		"1 pentanol":                     "71-41-0",
		"1‑Pentanol":                     "71-41-0",
		"copper(II) sulfate 5-hydrate":   "7758-99-8",
		"copper(II) sulphate·5H2O":       "7758-99-8",
		"magnesium sulfate heptahydrate": "10034-99-8",
		"aluminum chloride":              "7446-70-0",
		"sodium hypochlorite":            "7681-52-9",
		"NaOCl":                          "7681-52-9",
		"valeric acid":                   "109-52-4",
		"EtOAc":                          "141-78-6",
		"MgSO4 anhydrous":                "7487-88-9",
		"Anhydrous MgSO4":                "7487-88-9",
	} {
		s, ok := LookupSubstance(key)
		if !ok || s.CAS != cas {
			t.Errorf("LookupSubstance(%q) = %v, %v; want CAS %s", key, s, ok, cas)
		}
	}
}

// What is unknown, or means several substances, is not found; Candidates says what
// may be meant.
func TestLookupAmbiguous(t *testing.T) {
	for key, candidate := range map[string]string{
		"borax":        "disodium tetraborate decahydrate",
		"washing soda": "sodium carbonate decahydrate",
		"C5H10O2":      "pentanoic acid",
		"sulfuric acd": "sulfuric acid",
		"1-pentanl":    "1-pentanol",
	} {
		if s, ok := LookupSubstance(key); ok {
			t.Errorf("LookupSubstance(%q) = %s, want none", key, s.Name)
		}
		found := false
		for _, c := range Candidates(key) {
			found = found || c.Name == candidate
		}
		if !found {
			t.Errorf("Candidates(%q) lacks %q", key, candidate)
		}
	}
	if list := Candidates(""); list != nil {
		t.Errorf("Candidates of nothing: %v", list)
	}
}

// The finer tables win over the wide one, field by field, with their source.
func TestMergedSubstances(t *testing.T) {
	s, ok := SubstanceByCAS("141-78-6")
	if !ok {
		t.Fatal("no ethyl acetate")
	}
	// Row of substances.csv: 0.8995 g/mL at 20 °C, Perry 8th ed. table 2-32.
	if math.Abs(s.Density.GramsPerMillilitre()-0.8995) > 1e-9 || s.DensityAt != Celsius(20) || !strings.Contains(s.Sources["density"], "Perry") {
		t.Errorf("density %v at %v from %q", s.Density, s.DensityAt, s.Sources["density"])
	}
	// Row of substance_hazards.csv, read in CLP Annex VI.
	if got := strings.Join(s.Hazard.HCodes, " "); got != "H225 H336 H319" || s.Hazard.Unverified || !s.Hazard.Assessed || s.Hazard.Signal != "Danger" {
		t.Errorf("hazard %+v", s.Hazard)
	}
	if s.HeatOfVaporisation == nil || math.Abs(float64(*s.HeatOfVaporisation)-31940) > 1e-6 || s.HeatCapacity == nil {
		t.Errorf("heat of vaporisation %v, heat capacity %v", s.HeatOfVaporisation, s.HeatCapacity)
	}
	if w, ok := LookupSubstance("water"); !ok || !w.Hazard.Assessed || len(w.Hazard.Classes) != 0 {
		t.Errorf("water: %+v; want assessed as not classified", w.Hazard)
	}
}

// Every row of the wide table is there, has a CAS number with a right check digit
// (CAS registry rule: digits weighted 1, 2, 3 … from the right, modulo 10), and no
// gap is filled: a blank stays no data.
func TestAllSubstances(t *testing.T) {
	all := Substances()
	if rows := readTable("lab_substances.csv"); len(all) != len(rows) {
		t.Fatalf("%d substances of %d rows", len(all), len(rows))
	}
	for i, s := range all {
		if i > 0 && all[i-1].Name > s.Name {
			t.Errorf("%q comes after %q", s.Name, all[i-1].Name)
		}
		if !rightCheckDigit(s.CAS) {
			t.Errorf("%s: CAS %q has a wrong check digit", s.Name, s.CAS)
		}
		if got, ok := SubstanceByCAS(s.CAS); !ok || got != s {
			t.Errorf("SubstanceByCAS(%s) isn't %s", s.CAS, s.Name)
		}
		if got, ok := LookupSubstance(s.Name); !ok || got != s {
			t.Errorf("LookupSubstance(%q) isn't itself", s.Name)
		}
		if !s.Hazard.Assessed && (len(s.Hazard.Classes) > 0 || !s.Hazard.Unverified) {
			t.Errorf("%s: no classification, but not marked unverified", s.Name)
		}
		if strings.Contains(s.Hazard.Basis, "memory") && !s.Hazard.Unverified {
			t.Errorf("%s: classification from memory not marked", s.Name)
		}
		if s.Density < 0 || s.MolarMass < 0 || len(s.Sources) == 0 {
			t.Errorf("%s: density %v, molar mass %v, sources %v", s.Name, s.Density, s.MolarMass, s.Sources)
		}
	}
}

// The formulas give the molar masses that stand in the table, which were computed apart
// from this program. Formulas that don't parse are counted: polymers.
func TestSubstanceFormulas(t *testing.T) {
	polymers := 0
	for _, s := range Substances() {
		if s.Formula == "" {
			continue
		}
		f, err := ParseFormula(s.Formula)
		if err != nil {
			polymers++
			continue
		}
		if d := f.MolarMass().GramsPerMole() - s.MolarMass.GramsPerMole(); math.Abs(d) > 0.00051 {
			t.Errorf("M(%s, %s) is off by %.5f g/mol", s.Name, s.Formula, d)
		}
	}
	if polymers > 1 {
		t.Errorf("%d formulas don't parse, want 1 (paraformaldehyde)", polymers)
	}
}

func rightCheckDigit(cas string) bool {
	digits := strings.ReplaceAll(cas, "-", "")
	sum := 0
	for i := range len(digits) - 1 {
		sum += (len(digits) - 1 - i) * int(digits[i]-'0')
	}
	return len(digits) > 4 && sum%10 == int(digits[len(digits)-1]-'0')
}

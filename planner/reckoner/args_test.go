package reckoner

import (
	"errors"
	"reflect"
	"strings"
	"testing"

	"stillroom/chem"
)

func TestParseArgs(t *testing.T) {
	got, err := ParseArgs([]string{"mass=50 g", "equation=A = B", " formula = NaCl "})
	want := Args{"mass": "50 g", "equation": "A = B", "formula": "NaCl"}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("ParseArgs = %v, %v; want %v", got, err, want)
	}
	for _, pairs := range [][]string{{"mass"}, {"=5 g"}, {"mass=1 g", "mass=2 g"}} {
		if _, err := ParseArgs(pairs); !errors.Is(err, ErrUnknownKey) {
			t.Errorf("ParseArgs(%q) = %v, want ErrUnknownKey", pairs, err)
		}
	}
}

func TestLists(t *testing.T) {
	args := Args{
		"mix": "acetic acid: 12 % w/w; water: 88 % w/w", "items": "a; b; c: 1.2 kg", "antoine": "8.07131;1730.63;233.426",
		"empty": " ; ", "twice": "a; A", "nameless": ": 5 g", "bare": "a: 5 g; b", "two": "1;2", "words": "1;x",
	}
	pairs, err := args.Pairs("mix")
	if want := []Pair{{"acetic acid", "12 % w/w"}, {"water", "88 % w/w"}}; err != nil || !reflect.DeepEqual(pairs, want) {
		t.Errorf("Pairs = %v, %v; want %v", pairs, err, want)
	}
	items, err := args.Items("items")
	if want := []Pair{{"a", ""}, {"b", ""}, {"c", "1.2 kg"}}; err != nil || !reflect.DeepEqual(items, want) {
		t.Errorf("Items = %v, %v; want %v", items, err, want)
	}
	if got, err := args.Antoine(); err != nil || got != [3]float64{8.07131, 1730.63, 233.426} {
		t.Errorf("Antoine = %v, %v", got, err)
	}
	for key, call := range map[string]func(string) error{
		"empty":    func(k string) error { _, err := args.List(k); return err },
		"twice":    func(k string) error { _, err := args.Items(k); return err },
		"nameless": func(k string) error { _, err := args.Items(k); return err },
		"bare":     func(k string) error { _, err := args.Pairs(k); return err },
		"words":    func(k string) error { _, err := args.Numbers(k); return err },
		"absent":   func(k string) error { _, err := args.Pairs(k); return err },
	} {
		var refused *KeyError
		if err := call(key); !errors.As(err, &refused) || refused.Key != key {
			t.Errorf("%s: %v, want a KeyError that names it", key, err)
		}
	}
}

func TestWhole(t *testing.T) {
	for text, want := range map[string]int{"3": 3, "1": 1, "1e3": 1000} {
		if got, err := (Args{"n": text}).Whole("n"); err != nil || got != want {
			t.Errorf("Whole(%q) = %d, %v; want %d", text, got, err, want)
		}
	}
	for _, text := range []string{"0", "-1", "2.5", "1e9", "1e300", "three"} {
		if got, err := (Args{"n": text}).Whole("n"); err == nil {
			t.Errorf("Whole(%q) = %d, want a refusal", text, got)
		}
	}
}

// The person's own numbers lie over the table's, the key's own before the general one.
func TestSubstanceOwnNumbers(t *testing.T) {
	args := Args{"acid": "acetic acid", "acid_molar_mass": "60.1", "molar_mass": "50", "density": "1.1 g/mL"}
	s, err := args.Substance("acid")
	if err != nil || s.CAS != "64-19-7" {
		t.Fatalf("Substance = %v, %v", s, err)
	}
	if s.MolarMass != 60.1*chem.GramPerMole || s.Density != 1.1*chem.GramPerMillilitre || s.Sources["density"] != given {
		t.Errorf("own numbers: M %v, density %v from %q", s.MolarMass, s.Density, s.Sources["density"])
	}
	table, _ := chem.LookupSubstance("acetic acid")
	if table.Sources["density"] == given || table.MolarMass == s.MolarMass {
		t.Error("the table itself was changed")
	}
	_, err = Args{"acid": "acetik acid"}.Substance("acid")
	if !errors.Is(err, ErrUnknownSubstance) || !strings.Contains(err.Error(), "acetic acid") {
		t.Errorf("a misspelt name: %v, want a suggestion", err)
	}
	if s, err := (Args{"acid": "C10H20O2"}).Substance("acid"); err != nil || s.MolarMass == 0 {
		t.Errorf("a formula as a substance: %+v, %v", s, err)
	}
}

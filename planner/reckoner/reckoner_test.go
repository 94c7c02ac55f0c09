package reckoner

import (
	"context"
	"encoding/json"
	"errors"
	"strings"
	"testing"

	"stillroom/chem"
)

// TestExamples runs the example of every sum and checks that it gives what the sum
// says it gives.
func TestExamples(t *testing.T) {
	seen := map[string]bool{}
	for _, s := range Sums() {
		t.Run(s.Name, func(t *testing.T) {
			if seen[s.Name] {
				t.Errorf("sum %q is listed twice", s.Name)
			}
			seen[s.Name] = true
			args, err := ParseArgs(s.Example)
			if err != nil {
				t.Fatalf("ParseArgs(%q): %v", s.Example, err)
			}
			answer, err := Reckon(context.Background(), s.Name, args)
			if err != nil {
				t.Fatalf("Reckon(%s): %v", s.Name, err)
			}
			if len(answer.Results) == 0 {
				t.Fatal("no results")
			}
			for _, field := range []string{s.Title, s.Group, s.About, s.Range, s.Source, answer.Derivation.Formula, answer.Derivation.Source} {
				if field == "" {
					t.Errorf("title, group, about, range, source or derivation is missing")
				}
			}
			for _, name := range s.Gives {
				if _, ok := answer.Result(name); !ok && !strings.Contains(name, " ") {
					t.Errorf("result %q is missing from %v", name, answer.Results)
				}
			}
		})
	}
}

// Every sum refuses a key it hasn't got and the lack of one it needs.
func TestKeysAreChecked(t *testing.T) {
	for _, s := range Sums() {
		args, _ := ParseArgs(s.Example)
		args["no_such_key"] = "1"
		if _, err := s.Reckon(context.Background(), args); !errors.Is(err, ErrUnknownKey) {
			t.Errorf("%s with an unknown key: error %v, want ErrUnknownKey", s.Name, err)
		} else if !strings.Contains(err.Error(), s.Keys[0].Name) {
			t.Errorf("%s: error %q doesn't list the keys", s.Name, err)
		}
		for _, k := range s.Keys {
			if k.Optional {
				continue
			}
			args, _ := ParseArgs(s.Example)
			delete(args, k.Name)
			if _, err := s.Reckon(context.Background(), args); !errors.Is(err, ErrMissingKey) {
				t.Errorf("%s without %s: error %v, want ErrMissingKey", s.Name, k.Name, err)
			}
		}
	}
}

func TestUnknownSum(t *testing.T) {
	_, err := Reckon(context.Background(), "molarmass", nil)
	if !errors.Is(err, ErrUnknownSum) || !strings.Contains(err.Error(), "molar-mass") {
		t.Errorf("Reckon(molarmass) = %v, want ErrUnknownSum with the list", err)
	}
}

// The JSON of an answer is the contract of scripts, to the letter.
func TestMarshalJSON(t *testing.T) {
	answer := Answer{Sum: "x", Results: []Result{Number("m", 0.1, "g"), Text("t", "a -> b")}}
	got, err := json.Marshal(answer)
	want := `{"sum":"x","results":[{"name":"m","value":0.1,"unit":"g"},{"name":"t","value":"a -\u003e b","unit":""}],"notes":[]}`
	if err != nil || string(got) != want {
		t.Errorf("Marshal = %s, %v\nwant %s", got, err, want)
	}
}

func number(t *testing.T, sum, result string, pairs ...string) float64 {
	t.Helper()
	args, err := ParseArgs(pairs)
	if err != nil {
		t.Fatal(err)
	}
	answer, err := Reckon(context.Background(), sum, args)
	if err != nil {
		t.Fatalf("Reckon(%s, %v): %v", sum, pairs, err)
	}
	r, ok := answer.Result(result)
	if !ok {
		t.Fatalf("Reckon(%s, %v) gives no %s: %v", sum, pairs, result, answer.Results)
	}
	return r.Value
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if d := got - want; d > tolerance || d < -tolerance {
		t.Errorf("%s = %v, want %v ± %v", what, got, want, tolerance)
	}
}

func TestFormulaSums(t *testing.T) {
	// OpenStax Chemistry 2e, 3.1 and table of common formulas: molar masses to the
	// second decimal; the coefficients are those of OpenStax Chemistry 2e, 17.1.
	near(t, "M(C9H8O4)", number(t, "molar-mass", "molar_mass", "formula=C9H8O4"), 180.16, 0.005)
	near(t, "electrons", number(t, "balance", "electrons", "equation=Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O"), 6, 0)
	near(t, "H^+", number(t, "balance", "H^+", "equation=Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O"), 14, 0)
	// OpenStax Chemistry 2e, example 3.5: 4.7 g of K is 0.12 mol.
	near(t, "n(K)", number(t, "amount", "amount", "formula=K", "mass=4.7 g"), 0.12, 0.001)
	// The person's own numbers win over the table's.
	near(t, "own M", number(t, "amount", "amount", "substance=unheard of", "mass=10 g", "molar_mass=50"), 0.2, 1e-12)
	near(t, "V and density", number(t, "amount", "mass", "substance=unheard of", "volume=10 mL", "molar_mass=50", "density=1.2 g/mL"), 12, 1e-9)
	// Org. Synth. 1929, 9, 52: 54.3 mL of sulfuric acid are 100 g and, at 95 %, 0.97 mol.
	near(t, "acid", number(t, "amount", "amount", "substance=sulfuric acid", "volume=54.3 mL", "purity=95 %"), 0.97, 0.01)
	// 37 % hydrochloric acid is 12.0 mol/L (reagent tables, from memory).
	near(t, "HCl", number(t, "amount", "amount", "substance=HCl", "volume=1 L", "purity=37 %"), 12.0, 0.1)
	near(t, "purity", number(t, "amount", "pure_mass", "substance=NaOH", "mass=10 g", "purity=97 %"), 9.7, 1e-9)
}

func TestFormulaSumsRefuse(t *testing.T) {
	for _, test := range []struct {
		sum   string
		pairs []string
		cause error
		hint  string // must stand in the message
	}{
		{"molar-mass", []string{"formula=Na2Xx"}, chem.ErrUnknownElement, "character 4"},
		{"molar-mass", []string{"formula=Tc"}, chem.ErrNoMolarMass, "technetium"},
		{"molar-mass", []string{"formula=RuCl3·xH2O"}, chem.ErrNoMolarMass, "waters"},
		{"molar-mass", []string{"formula=Ca(OH"}, chem.ErrBracket, "character 3"},
		{"balance", []string{"equation=H2 -> O2"}, chem.ErrNoBalance, "one side"},
		{"balance", []string{"equation=H2O2 + KMnO4 + H2SO4 -> K2SO4 + MnSO4 + O2 + H2O"}, chem.ErrSeveralBalances, "2 independent"},
		{"amount", []string{"substance=sulfuric acd", "mass=5 g"}, ErrUnknownSubstance, "sulfuric acid"},
		{"amount", []string{"substance=NaOH", "mass=5"}, chem.ErrNoUnit, "50 g"},
		{"amount", []string{"substance=NaOH", "mass=1,234 g"}, chem.ErrAmbiguous, "1234"},
		{"amount", []string{"substance=NaOH", "mass=5 g", "purity=120 %"}, chem.ErrOutOfRange, "100 %"},
		{"amount", []string{"substance=hydrochloric acid", "volume=5 mL"}, ErrMissingKey, "37 %"},
		{"amount", []string{"substance=hydrochloric acid", "mass=5 g"}, ErrMissingKey, "37 %"},
		{"amount", []string{"substance=1-pentanol", "volume=5 mL", "purity=50 %"}, chem.ErrNoData, "density="},
		{"amount", []string{"substance=NaOH"}, ErrMissingKey, "mass"},
	} {
		args, err := ParseArgs(test.pairs)
		if err != nil {
			t.Fatal(err)
		}
		_, err = Reckon(context.Background(), test.sum, args)
		if !errors.Is(err, test.cause) || !strings.Contains(err.Error(), test.hint) {
			t.Errorf("Reckon(%s, %q) = %v, want %v with %q", test.sum, test.pairs, err, test.cause, test.hint)
		}
	}
}

package reckoner

import (
	"context"
	"errors"
	"strings"
	"testing"

	"stillroom/chem"
)

// The expected figures are published where a source stands beside them; those with
// "definition" follow from the numbers put in.
func TestSolutionSums(t *testing.T) {
	for _, test := range []struct {
		source, sum, result string
		pairs               []string
		want, tolerance     float64
	}{
		{"OpenStax 3.3, row C26", "strength", "molality", []string{"substance=nitric acid", "from=68.0 % w/w"}, 33.7, 0.1},
		{"OpenStax 11.4, row C27", "strength", "mole_fraction", []string{"substance=nitric acid", "from=68.0 % w/w"}, 37.8, 0.1},
		{"row C48", "strength", "molarity", []string{"substance=sulfuric acid", "from=40.0 %", "density=1.3057 g/mL"}, 5.325, 0.01},
		{"row C45", "strength", "normality", []string{"substance=sulfuric acid", "from=18.0 mol/L", "equivalents=2"}, 36.0, 0.05},
		{"supplier's table, from memory", "strength", "molarity", []string{"substance=sulfuric acid", "from=98 % w/w"}, 18.4, 0.1},
		{"supplier's table, from memory", "strength", "mass_fraction", []string{"substance=hydrochloric acid", "from=12.0 mol/L"}, 37, 0.2},
		{"OIML table: 40 % v/v is 33.3 % w/w, from memory", "strength", "mass_fraction", []string{"substance=ethanol", "from=40 % v/v"}, 33.3, 0.15},
		{"definition", "strength", "molarity", []string{"substance=unheard of", "from=50 %", "molar_mass=100 g/mol", "density=1.2 g/mL"}, 6, 1e-9},
		{"density table, row of 35 %: 1.2599 g/mL", "strength", "mass_fraction", []string{"substance=sulfuric acid", "from=density", "density=1.2599 g/mL"}, 35, 0.01},
		{"row C19", "dilute", "stock_mass", []string{"substance=sodium hydroxide", "from=97.0 %", "to=10.0 %", "make=1.00 L", "to_density=1.109 g/mL"}, 114.33, 0.5},
		{"row C10", "dilute", "stock_volume", []string{"substance=unheard of", "from=0.45 mol/L", "to=0.12 mol/L", "make=41.25 mL"}, 11, 1e-6},
		{"practice, 640 kJ for 1 kg of 96 % into much water", "dilute", "heat", []string{"substance=sulfuric acid", "from=96 %", "to=4.8 %", "make=20 kg"}, 640, 20},
		{"row C39", "blend", "weak_mass", []string{"substance=unheard of", "strong=5 %", "weak=1 %", "to=3 %", "make=100 g"}, 50, 1e-9},
		{"row D45", "neutralise", "gas_volume", []string{"acid=butanoic acid", "mass=88.1 g", "base=NaHCO3"}, 24.05, 0.05},
		{"row D43", "neutralise", "base_mass", []string{"acid=butanoic acid", "mass=25.0 g", "base=Ca(OH)2"}, 10.51, 0.02},
		{"definition", "neutralise", "base_mass", []string{"acid=unheard of", "protons=2", "acid_molar_mass=100", "amount=1 mol", "base=NaOH", "excess=10 %"}, 87.99, 0.01},
		{"row D17", "ph", "pH", []string{"mix=NaCN: 0.083 mol/L", "pka=9.3098"}, 11.11, 0.01},
		{"row D17", "ph", "pH", []string{"mix=HCN: 0.083 mol/L; NaOH: 0.083 mol/L", "pka=HCN: 9.3098"}, 11.11, 0.01},
		{"OpenStax 14.6: equal parts of acetic acid and acetate, pKa 4.756", "ph", "pH", []string{"mix=acetic acid: 0.10 M; sodium acetate: 0.10 M"}, 4.756, 0.002},
		{"row D35 with pKa 4.83 in place of 4.82", "ph", "pH", []string{"mix=butanoic acid: 0.02611 M; sodium butanoate: 0.13641 M"}, 5.55, 0.01},
		{"OpenStax 14.6, the same by formulas", "ph", "pH", []string{"mix=CH3COOH: 0.10 M; CH3COONa: 0.10 M"}, 4.756, 0.002},
		{"half neutralised: pH is the pKa, 4.83", "ph", "pH", []string{"mix=pentanoic acid: 0.1 M; sodium pentanoate: 0.1 M"}, 4.83, 0.002},
		{"definition: two protons of 126.07 g/mol", "neutralise", "base_mass", []string{"acid=oxalic acid dihydrate", "mass=12.607 g", "base=NaOH"}, 8.00, 0.01},
		{"1 mol/L bicarbonate acidified, less 0.034 mol/L that stays (METHODS d)", "ph", "carbon_dioxide_given_off", []string{"mix=NaHCO3: 1 M; HCl: 1 M", "carbon_dioxide=101.325 kPa"}, 0.966, 0.003},
		{"OpenStax 14.6: β of equal parts is 2.303·C/4", "ph", "buffer_capacity", []string{"mix=acetic acid: 0.10 M; sodium acetate: 0.10 M"}, 0.1151, 0.0002},
		{"ammonia, pKa 8.80 at 40 °C (handbook, from memory)", "ph", "pH", []string{"mix=ammonia: 0.1 M; ammonium chloride: 0.1 M", "temperature=40 °C"}, 8.80, 0.05},
		{"row I16", "metrics", "atom_economy", []string{"equation=C4H10O + 2 NaOCl -> C4H8O2 + 2 NaCl + H2O", "product=C4H8O2"}, 39.5, 0.1},
		{"row I12", "metrics", "process_mass_intensity", []string{"inputs=10.81 g; 21.9 g; 500 g; 15 g", "product=23.6 g"}, 23.2, 0.05},
		{"row I12", "metrics", "e_factor", []string{"inputs=10.81 g; 21.9 g; 500 g; 15 g", "product=23.6 g"}, 22.2, 0.05},
	} {
		near(t, test.source+": "+strings.Join(test.pairs, " "), number(t, test.sum, test.result, test.pairs...), test.want, test.tolerance)
	}
}

func TestSolutionSumsRefuse(t *testing.T) {
	for _, test := range []struct {
		sum   string
		pairs []string
		cause error
		hint  string // must stand in the message
	}{
		{"strength", []string{"substance=sulfuric acid", "from=120 % w/w"}, chem.ErrOutOfRange, "100 %"},
		{"strength", []string{"substance=sulfuric acid", "from=96 %", "temperature=60 °C"}, chem.ErrOutOfRange, "20 to 25 °C"},
		{"strength", []string{"substance=sulfuric acid", "from=30 mol/L"}, chem.ErrOutOfRange, "g/L"},
		{"strength", []string{"substance=potassium iodide", "from=1 mol/L"}, chem.ErrNoData, "density="},
		{"strength", []string{"substance=unheard of", "from=1 mol/L", "density=1 g/mL"}, chem.ErrNoData, "molar_mass="},
		{"strength", []string{"substance=nitric acid", "from=2 N"}, chem.ErrNoData, "equivalents="},
		{"strength", []string{"substance=nitric acid", "from=65 furlongs"}, chem.ErrUnknownUnit, "furlongs"},
		{"strength", []string{"substance=nitric acid", "from=65"}, chem.ErrNoUnit, "% w/w"},
		{"strength", []string{"substance=nitric acid", "from=1,234 mol/L"}, chem.ErrAmbiguous, "thousands"},
		{"strength", []string{"substance=sulfuric acid", "from=density", "density=1.8355 g/mL"}, chem.ErrAmbiguous, "96"},
		{"strength", []string{"substance=sulfuric acid", "from=density"}, ErrMissingKey, "density"},
		{"dilute", []string{"substance=nitric acid", "from=10 %", "to=20 %", "make=1 kg"}, chem.ErrOutOfRange, "0 to 10 %"},
		{"dilute", []string{"substance=nitric acid", "from=60 %", "to=20 %", "make=1 mol"}, chem.ErrUnknownUnit, "make"},
		{"blend", []string{"substance=nitric acid", "strong=60 %", "weak=30 %", "to=20 %", "make=1 kg"}, chem.ErrOutOfRange, "30 to 60 %"},
		{"neutralise", []string{"acid=butanoic acid", "mass=5 g", "base=NaCl"}, chem.ErrNoData, "hydroxides"},
		{"neutralise", []string{"acid=butanoic acid", "base=NaOH"}, ErrMissingKey, "amount"},
		{"neutralise", []string{"acid=ethanol", "mass=5 g", "base=NaOH"}, chem.ErrNoData, "protons="},
		{"ph", []string{"mix=unheard of: 0.1 mol/L"}, chem.ErrNoData, "pka="},
		{"ph", []string{"mix=acetic acid: 0.1 g"}, chem.ErrUnknownUnit, "mass"},
		{"ph", []string{"mix=acetic acid"}, chem.ErrNoNumber, "value"},
		{"ph", []string{"mix=acetic acid: 0.1 M", "temperature=150 °C"}, chem.ErrOutOfRange, "0 to 100 °C"},
		{"metrics", []string{"product=C4H8O2", "equation=C4H10O + NaOCl -> C4H8O2 + NaCl + H2O"}, nil, "balance"},
		{"metrics", []string{"product=C9H8O2", "equation=C4H10O + 2 NaOCl -> C4H8O2 + 2 NaCl + H2O"}, nil, "right side"},
		{"metrics", []string{"product=20 g", "inputs=5 g; 6 g"}, nil, "input is missing"},
	} {
		args, err := ParseArgs(test.pairs)
		if err != nil {
			t.Fatal(err)
		}
		answer, err := Reckon(context.Background(), test.sum, args)
		if err == nil || (test.cause != nil && !errors.Is(err, test.cause)) || !strings.Contains(err.Error(), test.hint) {
			t.Errorf("Reckon(%s, %q) = %v, %v, want %v with %q", test.sum, test.pairs, answer.Results, err, test.cause, test.hint)
		}
	}
}

// Heat that isn't known is said to be so and never given as nought.
func TestUnknownHeatIsSaid(t *testing.T) {
	args, _ := ParseArgs([]string{"substance=potassium carbonate", "from=50 %", "to=10 %", "make=1 kg"})
	answer, err := Reckon(context.Background(), "dilute", args)
	if err != nil {
		t.Fatal(err)
	}
	if _, ok := answer.Result("heat"); ok {
		t.Error("a heat is given that no table holds")
	}
	if !strings.Contains(strings.Join(answer.Notes, "\n"), "heat not known") {
		t.Errorf("notes %q don't say that the heat isn't known", answer.Notes)
	}
}

// FuzzSolutionSums wants an answer in numbers or a refusal, never a panic, whatever is
// typed.
func FuzzSolutionSums(f *testing.F) {
	for i, s := range solutionSums() {
		args, _ := ParseArgs(s.Example)
		var values [4]string
		for k, key := range s.Keys[:4] {
			values[k] = args[key.Name]
		}
		f.Add(uint8(i), values[0], values[1], values[2], values[3], "")
	}
	f.Add(uint8(4), "acetic acid: 1e300 mol/L", "-273.15 °C", "4.76;", "", "")
	f.Add(uint8(0), "HCl", "density", "1e-9 g/mL", "25 °C", "1e-300 g/mol")
	f.Fuzz(func(t *testing.T, which uint8, a, b, c, d, last string) {
		sums := solutionSums()
		s := sums[int(which)%len(sums)]
		values := []string{a, b, c, d}
		args := Args{}
		for i, key := range s.Keys {
			if i < len(values) && values[i] != "" {
				args[key.Name] = values[i]
			}
		}
		if last != "" {
			args[s.Keys[len(s.Keys)-1].Name] = last
		}
		answer, err := s.Reckon(context.Background(), args)
		if err != nil && err.Error() == "" {
			t.Fatal("an empty error")
		}
		for _, r := range answer.Results {
			if !r.IsText && !chem.Finite(r.Value) {
				t.Fatalf("%s is %v", r.Name, r.Value)
			}
		}
	})
}

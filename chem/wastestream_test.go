package chem

import "testing"

func waste(name string, grams float64, solid bool) WasteShare {
	r := ReactantNamed(name, "")
	r.Assessed = true
	return WasteShare{Reactant: r, Mass: Mass(grams) * Gram, Solid: solid}
}

// Streams as the rows WA-084 to WA-093 of waste_rules.csv say (their "applies
// when" column).
func TestWasteStreamOf(t *testing.T) {
	for _, tc := range []struct {
		name   string
		shares []WasteShare
		want   string
	}{
		{"spent oxidant", []WasteShare{waste("water", 800, false), waste("sulfuric acid", 150, false), waste("sodium dichromate", 3, false)}, "chromium(VI) aqueous, acidic"},
		{"a trace of it in solvent", []WasteShare{waste("ethyl acetate", 100, false), waste("sodium dichromate", 0.01, false)}, "chromium(VI) aqueous, acidic"},
		{"after reduction", []WasteShare{waste("water", 900, false), waste("chromium(III) sulfate", 50, false)}, "chromium(III) aqueous after reduction"},
		{"filter cake", []WasteShare{waste("water", 70, false), waste("chromium(III) hydroxide", 30, true)}, "chromium hydroxide sludge"},
		{"dichloromethane in solvent", []WasteShare{waste("dichloromethane", 2, false), waste("ethyl acetate", 98, false)}, "halogenated organic"},
		{"solvent", []WasteShare{waste("ethyl acetate", 98, false), waste("water", 2, false)}, "non-halogenated organic"},
		{"still residue", []WasteShare{waste("pentanoic acid", 60, false), waste("1-pentanol", 40, false)}, "organic acid residue"},
		{"wash", []WasteShare{waste("water", 900, false), waste("sodium chloride", 90, false), waste("ethyl acetate", 10, false)}, "aqueous bicarbonate or brine wash"},
		{"drying agent", []WasteShare{waste("magnesium sulfate", 90, true), waste("ethyl acetate", 10, false)}, "spent drying agent"},
	} {
		got, why, ok := WasteStreamOf(tc.shares)
		if !ok || got.Name != tc.want {
			t.Errorf("%s goes to %q (%s), want %q", tc.name, got.Name, why, tc.want)
		}
	}
}

func TestWasteStreamOfUnknown(t *testing.T) {
	got, why, ok := WasteStreamOf([]WasteShare{{Reactant: Reactant{Name: "mystery"}, Mass: 1}})
	if ok || why == "" {
		t.Errorf("an unassessed substance goes to %q (%s), want no stream and a reason", got.Name, why)
	}
}

// Thresholds of Reg. (EU) 2019/1148 Annex I: sulfuric acid 15 %, nitric acid 3 %
// (rows RP-001 and RP-003, with their sources).
func TestPurchaseNotes(t *testing.T) {
	for _, tc := range []struct {
		name       string
		w          Fraction
		instrument string
		want       bool
	}{
		{"sulfuric acid", 0.96, "Reg. (EU) 2019/1148", true},
		{"sulfuric acid", 0.10, "Reg. (EU) 2019/1148", false},
		{"sulfuric acid", 0, "Reg. (EU) 2019/1148", true}, // strength unknown
		{"nitric acid", 0.65, "Reg. (EU) 2019/1148", true},
		{"nitric acid", 0.02, "Reg. (EU) 2019/1148", false},
		{"sodium dichromate dihydrate", 0.995, "REACH (EC) 1907/2006 Annex XIV", true},
		{"sodium chloride", 1, "Reg. (EU) 2019/1148", false},
	} {
		got := false
		for _, n := range PurchaseNotes(tc.name, tc.w) {
			got = got || n.Instrument == tc.instrument
		}
		if got != tc.want {
			t.Errorf("PurchaseNotes(%s, %v) names %s: %v, want %v", tc.name, tc.w, tc.instrument, got, tc.want)
		}
	}
}

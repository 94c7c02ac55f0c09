package chem

import (
	"slices"
	"strings"
	"testing"
)

func groupsFor(names ...string) []Reactant {
	var rs []Reactant
	for _, n := range names {
		rs = append(rs, ReactantNamed(n, ""))
	}
	return rs
}

// Pairs that must be found, from EPA-600/2-80-076 and the supplementary rows of
// incompatibility.csv (row sources there).
func TestIncompatibleReactants(t *testing.T) {
	for _, tc := range []struct {
		a, b string
		code string // must be among the codes; empty: no pair listed
	}{
		{"sodium dichromate", "1-pentanol", "F"},
		{"sodium dichromate", "hydrochloric acid", "GT"},
		{"sodium metabisulfite", "sulfuric acid", "GT"},
		{"sodium hydrogencarbonate", "sulfuric acid", "G"},
		{"sodium hypochlorite solution", "hydrochloric acid", "GT"},
		{"sodium hypochlorite solution", "cyclohexanol", "E"},
		{"sodium chlorite", "sodium hypochlorite solution", "GT"},
		{"potassium permanganate", "sulfuric acid", "E"},
		{"potassium permanganate", "1-hexanol", "F"},
		{"sulfuric acid", "water", "H"},
		{"nitric acid", "acetone", "E"},
		{"dichloromethane", "nitric acid", "E"},
		{"sodium metabisulfite", "water", ""},
		{"sodium sulfate", "ethyl acetate", ""},
		{"ethyl acetate", "1-pentanol", ""},
	} {
		rs := []Reactant{ReactantNamed(tc.a, ""), ReactantNamed(tc.b, "")}
		for i := range rs {
			rs[i].Assessed = true
			if rs[i].Name == "sodium hydrogencarbonate" {
				rs[i].Groups = []int{10}
			}
		}
		pairs := IncompatibleReactants(rs)
		switch {
		case tc.code == "" && len(pairs) > 0:
			t.Errorf("%s and %s: %v, want no pair", tc.a, tc.b, pairs)
		case tc.code != "" && (len(pairs) != 1 || !slices.Contains(pairs[0].Codes, tc.code)):
			t.Errorf("%s and %s: %v, want code %s", tc.a, tc.b, pairs, tc.code)
		}
	}
}

func TestIncompatibleReactantsUnknown(t *testing.T) {
	pairs := IncompatibleReactants(groupsFor("mystery powder", "water"))
	if len(pairs) != 1 || pairs[0].A != "mystery powder" || pairs[0].Codes[0] != "U" {
		t.Errorf("an unassessed substance gives %v, want it flagged U", pairs)
	}
}

// Every wording of the supplementary rows has its predicate.
func TestSupplementSides(t *testing.T) {
	all := allSides()
	for _, file := range []string{"incompatibility.csv", "incompatibility_more.csv", "incompatibility_acids.csv"} {
		for _, row := range readTable(file) {
			if row.text("chart") != "SUP" {
				continue
			}
			for _, name := range []string{row.text("group_a_name"), row.text("group_b_name")} {
				if all[name] == nil {
					t.Errorf("no predicate for %q", name)
				}
			}
			for code := range strings.FieldsSeq(row.text("codes")) {
				if codeMeanings()[code] == "" {
					t.Errorf("no meaning for code %q", code)
				}
			}
		}
	}
}

func TestCarryApart(t *testing.T) {
	for _, tc := range []struct {
		a, b string
		want bool
	}{
		{"sodium dichromate", "1-pentanol", true},
		{"sulfuric acid", "sodium hydroxide", true},
		{"ethyl acetate", "1-pentanol", false},
		{"sodium dichromate", "water", false}, // only dissolves
		{"mystery powder", "water", true},     // not assessed is not harmless
		{"mystery powder", "sodium sulfate", false},
	} {
		if why, got := CarryApart(ReactantNamed(tc.a, ""), ReactantNamed(tc.b, "")); got != tc.want {
			t.Errorf("CarryApart(%s, %s) = %v (%s), want %v", tc.a, tc.b, got, why, tc.want)
		}
	}
}

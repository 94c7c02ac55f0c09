package chem

import (
	"slices"
	"strings"
	"testing"
)

// TestSaltsAndAcidsAreFlagged checks pairs that every laboratory keeps apart. The
// consequences are common practice (Prudent Practices in the Laboratory; Bretherick's
// Handbook of Reactive Chemical Hazards, both from memory).
func TestSaltsAndAcidsAreFlagged(t *testing.T) {
	for _, c := range []struct{ a, b, code string }{
		{"sulfuric acid", "sodium chloride", "GT"},
		{"sulfuric acid", "potassium bromide", "GT"},
		{"sulfuric acid", "sodium nitrate", "GT"},
		{"sodium cyanide", "hydrochloric acid", "GT"},
		{"potassium cyanide", "acetic acid", "GT"},
		{"sodium sulfide", "hydrochloric acid", "GT"},
		{"iron(II) sulfide", "sulfuric acid", "GT"},
		{"sodium azide", "hydrochloric acid", "E"},
		{"potassium chlorate", "sulfuric acid", "E"},
		{"sodium fluoride", "sulfuric acid", "GT"},
		{"sodium sulfite", "hydrochloric acid", "GT"},
		{"sodium metabisulfite", "acetic acid", "GT"},
		{"sodium thiosulfate", "hydrochloric acid", "GT"},
		{"sodium chlorite", "acetic acid", "E"},
		{"sodium hypochlorite", "acetic acid", "GT"},
		{"sodium hypochlorite", "hydrochloric acid", "GT"},
		{"sodium hypochlorite", "ammonia", "E"},
		{"sodium hypochlorite", "ammonium chloride", "E"},
		{"potassium permanganate", "glycerol", "F"},
		{"potassium permanganate", "1-hexanol", "F"},
		{"potassium permanganate", "sulfuric acid", "E"},
		{"bromine", "ammonia", "E"},
		{"sodium nitrite", "ammonium chloride", "E"},
		{"silver nitrate", "ammonia", "E"},
		{"hydrogen peroxide", "iron(II) sulfate", "H"},
	} {
		a, okA := LookupSubstance(c.a)
		b, okB := LookupSubstance(c.b)
		if !okA || !okB {
			t.Fatalf("%s or %s isn't in the table", c.a, c.b)
		}
		for _, pair := range [][]*Substance{{a, b}, {b, a}} {
			if found := IncompatiblePairs(pair); len(found) == 0 || !slices.ContainsFunc(found, func(i Incompatibility) bool { return slices.Contains(i.Codes, c.code) }) {
				t.Errorf("%s with %s: %v, want %s", pair[0].Name, pair[1].Name, found, c.code)
			}
		}
	}
}

// TestHarmlessSaltsAreNotFlagged checks that the new rows leave brine, a dilution and a
// drying agent alone.
func TestHarmlessSaltsAreNotFlagged(t *testing.T) {
	for _, c := range [][2]string{{"sodium chloride", "acetic acid"}, {"sodium chloride", "ethyl acetate"}, {"sodium sulfate", "ethyl acetate"}, {"benzyl cyanide", "ethyl acetate"}} {
		a, okA := LookupSubstance(c[0])
		b, okB := LookupSubstance(c[1])
		if !okA || !okB {
			continue
		}
		for _, i := range IncompatiblePairs([]*Substance{a, b}) {
			if strings.Contains(i.Note, "hydrogen") {
				t.Errorf("%v: flagged: %s", c, i.Note)
			}
		}
	}
}

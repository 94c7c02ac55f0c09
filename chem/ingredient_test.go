package chem

import (
	"slices"
	"testing"
)

// Every classification, statement and specific limit of the merged table can be
// read. The label derived from the classes is compared with the pictograms that
// the table of data/lab_substances.csv states (Annex VI, CLP Art. 26).
func TestSubstanceTableHazards(t *testing.T) {
	for _, s := range Substances() {
		classes := s.Hazard.HazardClasses()
		for _, c := range classes {
			if _, ok := LabelElementsOf(c); !ok {
				t.Errorf("%s: no label elements for %q", s.Name, c)
			}
			if _, ok := Statement(c.Code); !ok {
				t.Errorf("%s: no words for %q", s.Name, c.Code)
			}
		}
		if _, _, bad := parseSpecificLimits(s.Hazard.SCL); len(bad) > 0 {
			t.Errorf("%s: limits %q can't be read", s.Name, bad)
		}
		label := LabelOf(classes)
		want := slices.Clone(s.Hazard.Pictograms)
		slices.Sort(want)
		if label.Signal != s.Hazard.Signal || !slices.Equal(label.Pictograms, want) {
			t.Errorf("%s: %s %v, table has %s %v (%v)", s.Name, label.Signal, label.Pictograms, s.Hazard.Signal, want, classes)
		}
	}
}

// Only entries with note 3 count chromate ion; that of chromium(VI) oxide and of
// lead chromate have other notes (CLP Annex VI Table 3).
func TestChromateShareOnlyByNote3(t *testing.T) {
	for name, want := range map[string]bool{"chromium(VI) oxide": false, "lead(II) chromate": false, "ammonium dichromate": true, "sodium dichromate": true, "water": false} {
		s, ok := LookupSubstance(name)
		if !ok {
			t.Fatalf("no %s", name)
		}
		if got := IngredientOf(name, s, .1).LimitShare > 0; got != want {
			t.Errorf("%s counts chromate ion: %v, want %v", name, got, want)
		}
	}
}

// The chromate share of sodium dichromate dihydrate: 2 CrO4 in one formula
// unit, 2 × 115.99 / 298.00 (row MX-13 of mixture_examples.csv).
func TestChromateShare(t *testing.T) {
	s, ok := LookupSubstance("sodium dichromate dihydrate")
	if !ok {
		t.Fatal("no sodium dichromate dihydrate")
	}
	in := IngredientOf(s.Name, s, 0.05)
	if got, want := float64(in.LimitShare), 2*115.99/298.00; got < want-1e-4 || got > want+1e-4 {
		t.Errorf("chromate share %.5f, want %.5f", got, want)
	}
}

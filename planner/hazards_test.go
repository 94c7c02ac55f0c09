package planner

import (
	"slices"
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
)

func storedNeed(substance, form, diluent string, low, high float64) Need {
	return Need{Substance: substance, Draws: []Draw{{
		Bottle: inventory.Bottle{Code: "B1"},
		Form:   inventory.StockForm{Name: form, Diluent: diluent, AssayLow: low, AssayHigh: high},
	}}}
}

func noteAt(t *testing.T, notes []HazardNote, at, what string) HazardNote {
	t.Helper()
	for _, n := range notes {
		if n.At == at && strings.HasPrefix(n.What, what) {
			return n
		}
	}
	t.Fatalf("no note at %q on %q in %+v", at, what, notes)
	return HazardNote{}
}

// Limits of CLP Annex VI (entries 016-020-00-8, 017-002-01-X): sulfuric acid
// from 15 % is Skin Corr. 1A, hydrochloric acid at 12 % irritates.
func TestNoteHazardsStored(t *testing.T) {
	notes := NoteHazards([]Need{
		storedNeed("sulfuric acid", "sulfuric acid 96 %", "water", .95, .98),
		storedNeed("hydrochloric acid", "hydrochloric acid 12 %", "water", .12, .12),
		storedNeed("ethyl acetate", "ethyl acetate 99.5 %", "", .995, 1),
		storedNeed("an invented powder", "an invented powder", "", 1, 1),
		{Substance: "filter paper", Count: true},
	}, nil, nil)
	if len(notes) != 4 {
		t.Fatalf("%d notes, want 4: consumables have none", len(notes))
	}
	for what, class := range map[string]string{"sulfuric acid 96 %": "Skin Corr. 1A H314", "hydrochloric acid 12 %": "Skin Irrit. 2 H315",
		"ethyl acetate": "Flam. Liq. 2 H225"} {
		if n := noteAt(t, notes, AsStored, what); !slices.Contains(n.Classes, class) {
			t.Errorf("%s: classes %v, want %s", what, n.Classes, class)
		}
	}
	unknown := noteAt(t, notes, AsStored, "an invented powder")
	if !strings.HasPrefix(unknown.Basis, "no data") || !slices.Equal(unknown.Limits, []string{"no data"}) {
		t.Errorf("a substance without a record: %+v, want it said", unknown)
	}
}

func TestNoteHazardsVesselAndFormed(t *testing.T) {
	steps := []StepReport{{N: 1, Name: "oxidise", Adds: []Add{{Substance: "sodium dichromate"}, {Substance: "sulfuric acid"}, {Substance: "water"}},
		GasOf: "carbon dioxide",
		Contents: []Content{
			{Substance: "water", Phase: "aqueous", Mass: .83}, {Substance: "sulfuric acid", Phase: "aqueous", Mass: .12},
			{Substance: "sodium dichromate", Phase: "aqueous", Mass: .05}, {Substance: "pentanal", Phase: "organic", Mass: .01}}}}
	notes := NoteHazards(nil, steps, nil)
	aqueous := noteAt(t, notes, "oxidise", "aqueous layer")
	if !slices.Contains(aqueous.Classes, "Carc. 1B H350") || aqueous.Signal != "Danger" || !slices.Contains(aqueous.Pictograms, "GHS08") {
		t.Errorf("spent oxidant: %+v, want Carc. 1B, Danger, GHS08", aqueous)
	}
	if n := noteAt(t, notes, "oxidise", "pentanal"); !n.Formed {
		t.Errorf("pentanal: %+v, want it formed", n)
	}
	if n := noteAt(t, notes, "oxidise", "carbon dioxide"); !n.Formed {
		t.Errorf("carbon dioxide: %+v, want it formed", n)
	}
}

func TestPairsOf(t *testing.T) {
	pairs := PairsOf([]Need{{Substance: "sodium dichromate"}, {Substance: "1-pentanol"}, {Substance: "sodium sulfate"}}, nil)
	if len(pairs) == 0 || pairs[0].A != "sodium dichromate" || pairs[0].B != "1-pentanol" {
		t.Errorf("pairs %+v, want dichromate and pentanol first", pairs)
	}
}

func demoCarboys() []inventory.Carboy {
	return []inventory.Carboy{
		{Code: "W1", Stream: "non-halogenated organic", SizeUL: 20e6, ContentUL: 6e6, FillLimit: .75, Contains: "ethyl acetate: 90 %; acetone: 10 %"},
		{Code: "W2", Stream: "non-halogenated organic", SizeUL: 20e6, ContentUL: 13e6, FillLimit: .75, Contains: "ethyl acetate: 100 %"},
		{Code: "W3", Stream: "chromium(VI) aqueous, acidic", SizeUL: 5e6, ContentUL: 3.5e6, FillLimit: .75, Contains: "water: 82 %; sulfuric acid: 15 %; sodium dichromate: 3 %"},
		{Code: "W4", Stream: "halogenated organic", SizeUL: 5e6, FillLimit: 0, Contains: ""},
	}
}

func TestSortWaste(t *testing.T) {
	solvent := func(litres chem.Volume) Discard {
		v := litres * chem.Litre
		return Discard{Stream: "non-halogenated organic", Mass: .9 * chem.GramPerMillilitre.Mass(v), Volume: v,
			Contents: []Content{{Substance: "ethyl acetate", Phase: "organic", Mass: .9 * chem.GramPerMillilitre.Mass(v), Volume: v}}}
	}
	chromium := Discard{Stream: "chromium(VI) aqueous, acidic", Mass: 1, Volume: chem.Litre,
		Contents: []Content{{Substance: "water", Phase: "aqueous", Mass: .9}, {Substance: "sodium dichromate", Phase: "aqueous", Mass: .1}}}
	wrong := solvent(1)
	wrong.Stream = "halogenated organic"
	for _, tc := range []struct {
		name     string
		discards []Discard
		carboy   string
		fits     bool
		note     string
	}{
		{"the fuller one that still has room", []Discard{solvent(1), solvent(.5)}, "W2", true, ""},
		{"the other one when it has none", []Discard{solvent(3)}, "W1", true, ""},
		{"none has room", []Discard{solvent(10)}, "W1", false, "ask for a pick-up"},
		{"over the fill limit", []Discard{chromium}, "W3", false, "needs 1 L"},
		{"wrong stream", []Discard{wrong}, "W4", false, `belongs to "non-halogenated organic"`},
		{"no carboy", []Discard{{Stream: "spent drying agent", Mass: 1}}, "", false, "no carboy for this stream"},
	} {
		t.Run(tc.name, func(t *testing.T) {
			lots := SortWaste(tc.discards, demoCarboys(), 0)
			if len(lots) != 1 {
				t.Fatalf("%d lots, want 1", len(lots))
			}
			if got := lots[0]; got.Carboy != tc.carboy || got.Fits != tc.fits || !strings.Contains(got.Note, tc.note) {
				t.Errorf("lot %+v, want carboy %q, fits %v, note with %q", got, tc.carboy, tc.fits, tc.note)
			}
		})
	}
}

// A stricter stream than the contents ask for is no fault; a pH of 1.5 makes any
// aqueous waste corrosive (CLP Annex I 3.2.3.1.2).
func TestSortWasteStricterStreamAndPH(t *testing.T) {
	carboys := []inventory.Carboy{{Code: "W1", Stream: "chromium(III) aqueous after reduction", SizeUL: 5e6, FillLimit: .75}}
	lots := SortWaste([]Discard{{Stream: "chromium(III) aqueous after reduction", Mass: 1, Volume: chem.Litre, PH: 1.5,
		Contents: []Content{{Substance: "water", Phase: "aqueous", Mass: .9}, {Substance: "sodium sulfate", Phase: "aqueous", Mass: .1}}}}, carboys, 0)
	if !lots[0].Fits || lots[0].Note != "" {
		t.Errorf("lot %+v, want it to fit without a note", lots[0])
	}
	note := noteAt(t, NoteHazards(nil, nil, lots), InWaste, "chromium(III)")
	if !slices.Contains(note.Classes, "Skin Corr. 1 H314") {
		t.Errorf("waste of pH 1.5: %v, want Skin Corr. 1", note.Classes)
	}
}

func TestSortWasteClash(t *testing.T) {
	carboys := []inventory.Carboy{{Code: "W9", Stream: "non-halogenated organic", SizeUL: 5e6, FillLimit: .75, Contains: "nitric acid: 10 %; acetone: 90 %"}}
	lots := SortWaste([]Discard{{Stream: "non-halogenated organic", Mass: 1, Volume: chem.Litre,
		Contents: []Content{{Substance: "ethanol", Phase: "organic", Mass: 1}}}}, carboys, 0)
	if lots[0].Fits || !strings.Contains(lots[0].Note, "must not meet nitric acid") {
		t.Errorf("lot %+v, want it kept out of the carboy with nitric acid", lots[0])
	}
}

// BenchmarkNoteHazards is the hazard notes of the longest recipe's plan.
func BenchmarkNoteHazards(b *testing.B) {
	plan := demoPlan(b, "pentanoic-acid-dichromate", 50, 44)
	b.ReportAllocs()
	for b.Loop() {
		NoteHazards(plan.Needs, plan.Steps, plan.Waste)
	}
}

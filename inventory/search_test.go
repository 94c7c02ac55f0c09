package inventory

import (
	"context"
	"strings"
	"testing"
)

// Both engines find the same.
func TestSearch(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		filled(t, s)
		ctx := context.Background()
		for _, c := range []struct{ query, substance, place, note string }{
			{"ethyl acetate", "ethyl acetate", "", ""},
			{"ETHYL ACET", "ethyl acetate", "", ""},
			{"ethylacetate", "ethyl acetate", "", ""},
			{"141-78-6", "ethyl acetate", "", ""},
			{"141786", "ethyl acetate", "", ""},
			{"TEMPO", "2,2,6,6-tetramethylpiperidine-1-oxyl", "", ""},
			{"1 pentanol", "1-pentanol", "", ""},
			{"pentan-1-ol", "1-pentanol", "", ""},
			{"dichromate", "sodium dichromate", "", ""},
			{"dichormate", "", "", ""}, // a slip in the middle of a name isn't forgiven
			{"sodium dichormate", "sodium dichromate", "", ""},
			{"sodum dichromate", "sodium dichromate", "", ""},
			{"sodiuum dich", "sodium dichromate", "", ""},
			{"7789-12-0", "sodium dichromate", "", ""},
			{"Na2Cr2O7", "sodium dichromate", "", ""},
			{"KMnO₄", "potassium permanganate", "", ""},
			{"sulfate anhydrous", "sodium sulfate", "", ""},
			{"refrigerator", "", "Refrigerator", ""},
			{"annex flamm", "", "Flammables", ""},
			{"titrate", "", "", "titrate before use"},
			{"TITRAT befor", "", "", "titrate before use"},
			{"no such thing", "", "", ""},
			{"'; DROP TABLE bottles; --", "", "", ""},
			{`"*`, "", "", ""},
			{"100 %", "", "", ""},
		} {
			found, err := s.Search(ctx, c.query)
			if err != nil {
				t.Errorf("Search(%q): %v", c.query, err)
				continue
			}
			if c.substance != "" && (len(found.Substances) == 0 || found.Substances[0].Name != c.substance) {
				t.Errorf("Search(%q) finds %+v, want %s first", c.query, found.Substances, c.substance)
			}
			if c.place != "" && (len(found.Places) == 0 || found.Places[0].Cabinet != c.place) {
				t.Errorf("Search(%q) finds %+v, want %s first", c.query, found.Places, c.place)
			}
			if c.note != "" && (len(found.Bottles) == 0 || !strings.Contains(found.Bottles[0].Note, c.note)) {
				t.Errorf("Search(%q) finds %+v, want a note with %q", c.query, found.Bottles, c.note)
			}
			if c.substance+c.place+c.note == "" && len(found.Substances)+len(found.Places)+len(found.Bottles) > 0 {
				t.Errorf("Search(%q) finds %+v, want nothing", c.query, found)
			}
		}
	})
}

func TestSearchCodesAndLots(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		filled(t, s)
		ctx := context.Background()
		b := open1(t, s, "dichromate open")
		for _, query := range []string{b.Code, strings.ToLower(b.Code), b.Code[:1] + "-" + b.Code[1:]} {
			found, err := s.Search(ctx, query)
			if err != nil || found.Bottle == nil || found.Bottle.ID != b.ID {
				t.Errorf("Search(%q): %+v, %v", query, found.Bottle, err)
			}
		}
		for _, query := range []string{b.Lot, strings.ToLower(b.Lot), strings.ReplaceAll(b.Lot, "-", ""), b.Lot[:6]} {
			found, err := s.Search(ctx, query)
			ok := false
			for _, hit := range found.Bottles {
				ok = ok || hit.ID == b.ID
			}
			if err != nil || !ok {
				t.Errorf("Search(%q) misses bottle %s, %v", query, b.Code, err)
			}
		}
		// What is new is found at once.
		table, err := ReadTable("n.csv", strings.NewReader("name,amount,own number,note\nFrangipane oil,1 L,XY-77,smells of almonds\n"))
		if err != nil {
			t.Fatal(err)
		}
		if _, err := s.Import(ctx, table, Match(table), ImportOptions{Act: clerk}); err != nil {
			t.Fatal(err)
		}
		for _, query := range []string{"frangipan", "xy7", "almonds"} {
			if found, err := s.Search(ctx, query); err != nil || len(found.Bottles) != 1 {
				t.Errorf("Search(%q): %+v, %v", query, found, err)
			}
		}
	})
}

package views

import (
	"bytes"
	"encoding/json"
	"slices"
	"strings"
	"testing"

	"stillroom/inventory"
	"stillroom/planner"
)

// keysOf lists the keys of an object in the order they are written.
func keysOf(t *testing.T, object json.RawMessage) []string {
	t.Helper()
	d := json.NewDecoder(bytes.NewReader(object))
	if _, err := d.Token(); err != nil {
		t.Fatal(err)
	}
	var keys []string
	for d.More() {
		key, err := d.Token()
		if err != nil {
			t.Fatal(err)
		}
		keys = append(keys, key.(string))
		var value json.RawMessage
		if err := d.Decode(&value); err != nil {
			t.Fatal(err)
		}
	}
	return keys
}

// at follows keys and takes the first of every list on the way.
func at(t *testing.T, text json.RawMessage, path string) json.RawMessage {
	t.Helper()
	for _, key := range strings.Fields(path) {
		var object map[string]json.RawMessage
		if err := json.Unmarshal(text, &object); err != nil {
			t.Fatalf("%s: %v", path, err)
		}
		text = object[key]
		var list []json.RawMessage
		if string(text) != "null" && json.Unmarshal(text, &list) == nil {
			if len(list) == 0 {
				t.Fatalf("%s: the list %s is empty", path, key)
			}
			text = list[0]
		}
	}
	return text
}

// The fields and their order are those of the command line's contract, design
// 5.2; metrics and a chance that wasn't assessed are left out.
func TestPlanJSONKeepsItsContract(t *testing.T) {
	r, _ := planner.RecipeByName("pentanoic-acid-dichromate")
	shelf := inventory.NewShelf(inventory.DemoLab(sampleToday))
	plan, err := samplePlan(planner.Request{Recipe: r, Target: 0.05, On: sampleToday, Today: sampleToday}, shelf)
	if err != nil {
		t.Fatal(err)
	}
	plan.Metrics = planner.Metrics{AtomEconomy: 0.4, EFactor: 30, ProcessMassIntensity: 31}
	text, err := PlanJSON(plan)
	if err != nil {
		t.Fatal(err)
	}
	for path, want := range map[string]string{
		"":               "recipe on verdict target scale needs steps carriers buy waste hazards metrics",
		"target":         "substance mass_g",
		"scale":          "limiting amount_mol expected_yield expected_mass_g",
		"needs":          "substance cas pure_mass_g amount_mol for on_shelf_g earmarked_g short_g chance_short state draws",
		"needs draws":    "bottle form place mass_g volume_mL leaves_g expires",
		"steps":          "n do vessel adds contents temperature_C heat_kJ gas_L minutes cautions",
		"steps vessel":   "name size_mL fill",
		"steps adds":     "substance form mass_g volume_mL amount_mol",
		"steps contents": "substance phase amount_mol mass_g",
		"carriers":       "n bottles",
		"buy":            "substance offer packs cost_minor currency order_by",
		"waste":          "stream mass_g volume_mL contains carboy fits",
		"waste contains": "substance mass_g",
		"hazards":        "at what classes statements pictograms signal",
		"metrics":        "atom_economy e_factor process_mass_intensity",
	} {
		if got := keysOf(t, at(t, text, path)); !slices.Equal(got, strings.Fields(want)) {
			t.Errorf("%q has the fields %v, want %s", path, got, want)
		}
	}
	if again, _ := PlanJSON(plan); !bytes.Equal(text, again) {
		t.Error("the same plan gave other bytes")
	}
}

// What isn't known is null, what wasn't assessed or worked out is absent, and
// lists are never null.
func TestPlanJSONOfWhatIsNotKnown(t *testing.T) {
	text, err := PlanJSON(&planner.Plan{
		Recipe: &planner.Recipe{Name: "x"},
		Needs:  []planner.Need{{Substance: "filter paper", Count: true, Pieces: 3, ChanceShort: -1, Draws: []planner.Draw{{}}}},
		Steps:  []planner.StepReport{{TimeNotAssessed: true}},
		Waste:  []planner.WasteLot{{}},
	})
	if err != nil {
		t.Fatal(err)
	}
	for path, want := range map[string]string{
		"needs pure_mass_g": "null", "needs draws volume_mL": "null", "needs draws expires": "null",
		"steps minutes": "null", "steps temperature_C": "null", "steps vessel size_mL": "null",
		"waste carboy": "null", "waste volume_mL": "null",
	} {
		if got := string(at(t, text, path)); got != want {
			t.Errorf("%s is %s, want %s", path, got, want)
		}
	}
	for _, absent := range []string{"chance_short", "metrics"} {
		if strings.Contains(string(text), absent) {
			t.Errorf("%s is there although it wasn't worked out", absent)
		}
	}
	for _, list := range []string{`"carriers": []`, `"buy": []`, `"hazards": []`, `"for": []`, `"cautions": []`} {
		if !strings.Contains(string(text), list) {
			t.Errorf("no %s", list)
		}
	}
}

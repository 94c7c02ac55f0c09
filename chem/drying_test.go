package chem

import (
	"errors"
	"math"
	"testing"
)

// TestDryingAgentTable checks that each agent's ceiling is that of the hydrate it
// names (stoichiometry) and that every row has a source.
func TestDryingAgentTable(t *testing.T) {
	for _, a := range DryingAgents() {
		if a.Source == "" {
			t.Errorf("%s has no source", a.Name)
		}
		if a.Theoretical == 0 || a.CAS == "1314-56-3" {
			continue // adsorbents, brine; phosphorus pentoxide forms an acid
		}
		capacity, err := HydrateCapacity(mustFormula(a.Formula), mustFormula(a.Hydrate))
		if err != nil || math.Abs(capacity-a.Theoretical) > 0.001 {
			t.Errorf("%s: capacity %v, table %v, %v", a.Name, capacity, a.Theoretical, err)
		}
	}
}

func TestDryingAgentNeed(t *testing.T) {
	a, err := DryingAgentOf("anhydrous magnesium sulfate")
	if err != nil {
		t.Fatal(err)
	}
	need, err := a.For(6 * Gram)
	if err != nil || !near(need.Low.Grams(), 8, 1e-12) || !near(need.Typical.Grams(), 6/0.45, 1e-12) || !near(need.High.Grams(), 40, 1e-12) {
		t.Errorf("6 g of water: %+v, %v", need, err)
	}
	if need, err := a.For(0); err != nil || need.High != 0 {
		t.Errorf("no water: %+v, %v", need, err)
	}
	if _, err := a.For(Mass(math.NaN())); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("water NaN: %v", err)
	}
	lye, err := DryingAgentOf("1310-73-2")
	if err != nil {
		t.Fatal(err)
	}
	if _, err := lye.For(Gram); !errors.Is(err, ErrNoData) {
		t.Errorf("no practical capacity: %v", err)
	}
	for _, name := range []string{"MgSO4", "Magnesium sulfate, anhydrous", "7487-88-9"} {
		if got, err := DryingAgentOf(name); err != nil || got.CAS != a.CAS {
			t.Errorf("DryingAgentOf(%q) = %v, %v", name, got.Name, err)
		}
	}
	if _, err := DryingAgentOf("sugar"); !errors.Is(err, ErrNoData) {
		t.Errorf("no such agent: %v", err)
	}
}

// TestUnsuitable checks pairs that textbooks warn of (Robertson; Nichols,
// common practice).
func TestUnsuitable(t *testing.T) {
	for _, c := range []struct {
		agent, class string
		bad          bool
	}{
		{"calcium chloride", "carboxylic acid", true},
		{"calcium chloride", "alcohol", true},
		{"calcium chloride", "amines", true},
		{"calcium chloride", "ether", false},
		{"calcium chloride", "ketone", true},
		{"potassium carbonate", "carboxylic acid", true},
		{"potassium carbonate", "ketone", false},
		{"sodium hydroxide", "carboxylic acid", true},
		{"sodium hydroxide", "ester", true},
		{"magnesium sulfate", "carboxylic acid", false},
		{"magnesium sulfate", "acetal", true},
		{"sodium sulfate", "carboxylic acid", false},
		{"phosphorus pentoxide", "alcohol", true},
		{"molecular sieve 4A", "carboxylic acid", false},
		{"molecular sieve 4A", "strong acid", true},
		{"calcium chloride", "fatty acid", true},
		{"molecular sieves 3 Å", "ketone", false},
	} {
		a, err := DryingAgentOf(c.agent)
		if err != nil {
			t.Fatal(err)
		}
		reason, bad := a.Unsuitable(c.class)
		if bad != c.bad || (bad && reason == "") {
			t.Errorf("%s with %s: %v %q, want %v", c.agent, c.class, bad, reason, c.bad)
		}
	}
}

func TestHeldBack(t *testing.T) {
	// 20 g of agent that hold 1 mL/g, out of 200 mL; two rinses of 20 mL halve it twice
	got, err := HeldBack(20*Gram, 1e-3, 200*Millilitre, 20*Millilitre, 2)
	if err != nil || !near(float64(got), 0.1*0.5*0.5, 1e-12) {
		t.Errorf("%v, %v", got, err)
	}
	if got, err := HeldBack(20*Gram, 1e-3, 10*Millilitre, 0, 0); err != nil || got != 1 {
		t.Errorf("cake that holds all: %v, %v", got, err)
	}
	if _, err := HeldBack(-Gram, 1e-3, Litre, 0, 0); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("negative agent: %v", err)
	}
	water, err := WaterLoad(300*Gram, 0.03, 0.01)
	if err != nil || !near(water.Grams(), 300*0.03/0.97+3, 1e-12) {
		t.Errorf("water load %v, %v", water, err)
	}
}

// TestAddedEquations checks the vapour-pressure equations added to those of the
// reference table against the normal boiling points of the substance table (CRC
// Handbook), from which other handbooks differ by up to 1.3 K.
func TestAddedEquations(t *testing.T) {
	compared := 0
	for _, r := range readTable("antoine_more.csv") {
		s, ok := SubstanceByCAS(r.text("cas"))
		if !ok || s.Boiling == nil {
			t.Errorf("%s: no boiling point to check against", r.text("name"))
			continue
		}
		got, err := BoilingPoint(s.CAS, Atmosphere)
		if err != nil || math.Abs(float64(got-*s.Boiling)) > 1.3 {
			t.Errorf("%s boils at %.2f °C, want %.2f ± 1.3, %v", s.Name, got.Celsius(), s.Boiling.Celsius(), err)
		}
		compared++
	}
	if compared < 100 {
		t.Errorf("compared %d", compared)
	}
}

// TestRowsHaveSources checks that every row of the tables behind phases, vapour
// and heat names its source.
func TestRowsHaveSources(t *testing.T) {
	for _, name := range []string{
		"partition", "mutual_solubility", "mutual_solubility_more", "drying_agents", "drying_agents_more", "antoine", "antoine_more",
		"azeotropes", "azeotropes_more", "formation_enthalpy", "formation_enthalpy_more", "relative_volatility", "redox_agents",
	} {
		rows := readTable(name + ".csv")
		if len(rows) == 0 {
			t.Errorf("%s is empty", name)
		}
		for i, r := range rows {
			if r.text("source") == "" {
				t.Errorf("%s, row %d has no source", name, i+2)
			}
		}
	}
}

package chem

import (
	"errors"
	"math"
	"testing"
)

// TestReactionEnthalpyPublished compares with published enthalpies of reaction.
func TestReactionEnthalpyPublished(t *testing.T) {
	for _, c := range []struct {
		equation        string
		want, tolerance float64 // kJ/mol of the equation
		source          string
	}{
		{"H^+(aq) + OH^-(aq) -> H2O(l)", -55.8, 0.1, "OpenStax Chemistry 2e, 5.2: heat of neutralisation near 57 kJ/mol; CRC ions"},
		{"CH4(g) + 2 O2(g) -> CO2(g) + 2 H2O(l)", -890.5, 0.6, "OpenStax Chemistry 2e, table 5.2: combustion of methane -890.8"},
		{"C2H5OH(l) + 3 O2(g) -> 2 CO2(g) + 3 H2O(l)", -1366.8, 0.5, "OpenStax Chemistry 2e, table 5.2: combustion of ethanol -1366.8"},
		{"CH3OH(l) + 3/2 O2(g) -> CO2(g) + 2 H2O(l)", -726.1, 1, "OpenStax Chemistry 2e, table 5.2: combustion of methanol"},
		{"CaCl2(s) -> CaCl2(aq)", -81.3, 1, "heat of solution of calcium chloride, handbook value, from memory"},
		{"NH4NO3(s) -> NH4NO3(aq)", 25.7, 0.5, "heat of solution of ammonium nitrate, handbook value, from memory"},
		{"NaOH(s) -> NaOH(aq)", -44.5, 0.5, "heat of solution of sodium hydroxide, handbook value, from memory"},
	} {
		e, err := ParseEquation(c.equation)
		if err != nil {
			t.Fatal(err)
		}
		r, err := ReactionEnthalpy(e, nil)
		if got := float64(r.Enthalpy) / 1e3; err != nil || math.Abs(got-c.want) > c.tolerance {
			t.Errorf("%s: %v kJ/mol, want %v ± %v, %v (%s)", c.equation, got, c.want, c.tolerance, err, c.source)
		}
	}
}

func TestReactionEnthalpyRefuses(t *testing.T) {
	for _, c := range []struct {
		equation string
		want     error
	}{
		{"C5H12O + O2 -> C5H10O2 + H2O", ErrNoData},   // isomers
		{"XeF6 + 3 H2O -> XeO3 + 6 HF(g)", ErrNoData}, // no row
		{"NaCl(g) -> Na(s) + Cl2(g)", ErrNoData},      // no such state
	} {
		e, err := ParseEquation(c.equation)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := ReactionEnthalpy(e, nil); !errors.Is(err, c.want) {
			t.Errorf("%s: %v, want %v", c.equation, err, c.want)
		}
	}
	e, err := ParseEquation("C5H12O + O2 -> C5H10O2 + H2O")
	if err != nil {
		t.Fatal(err)
	}
	r, err := ReactionEnthalpy(e, map[string]FormationGiven{"C5H12O": {Name: "1-pentanol"}, "C5H10O2": {Enthalpy: -559.4 * KilojoulePerMole}})
	if err != nil || !near(float64(r.Enthalpy), -493.6e3, 1e-9) { // CRC Handbook rows: −559.4 − 285.8 + 351.6
		t.Errorf("with the isomers named: %v, %v", r.Enthalpy, err)
	}
	if _, err := ReactionEnthalpy(e, map[string]FormationGiven{"C5H12O": {Name: "1-hexanol"}, "C5H10O2": {Name: "pentanoic acid"}}); !errors.Is(err, ErrNoData) {
		t.Errorf("a name of another formula: %v", err)
	}
}

// TestWettedArea compares with the wall found by adding up rings of a sphere
// until they hold the liquid.
func TestWettedArea(t *testing.T) {
	for _, fill := range []float64{0, 0.01, 0.3, 0.5, 0.66, 0.99, 1} {
		got, err := WettedArea(Litre, Fraction(fill))
		if err != nil {
			t.Fatal(err)
		}
		radius := math.Cbrt(3 * 1e-3 / (4 * math.Pi))
		volume, area := 0.0, 0.0
		const rings = 200000
		dh := 2 * radius / rings
		for i := 0; i < rings && volume < fill*1e-3; i++ {
			h := (float64(i) + 0.5) * dh
			volume += math.Pi * h * (2*radius - h) * dh
			area += 2 * math.Pi * radius * dh
		}
		if math.Abs(float64(got)-area) > 2e-5*4*math.Pi*radius*radius {
			t.Errorf("fill %v: %v m², want %v", fill, got, area)
		}
	}
	if full, _ := WettedArea(Litre, 1); !near(float64(full), 4.835976e-2, 1e-6) { // (36π)^(1/3) V^(2/3), geometry of the sphere
		t.Errorf("a full litre flask has %v m²", full)
	}
	if _, err := WettedArea(Litre, 1.1); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("overfull: %v", err)
	}
}

func TestCooling(t *testing.T) {
	small, err := CoolingPower(Litre, 0.5, 25, HeatTransferIceBath)
	if err != nil {
		t.Fatal(err)
	}
	large, err := CoolingPower(10*Litre, 0.5, 25, HeatTransferIceBath)
	if err != nil {
		t.Fatal(err)
	}
	perVolume, err := CoolingAfterScaling(Litre, 10*Litre)
	if err != nil || !near(float64(large/small)/10, perVolume, 1e-9) || !near(perVolume, 0.4642, 1e-3) { // 10^(−1/3)
		t.Errorf("cooling per volume falls to %v, want %v, %v", large/small/10, perVolume, err)
	}
	if _, err := CoolingPower(Litre, 0.5, 0, 200); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("no gap: %v", err)
	}
	if got := IceTo(360*Kilojoule, Celsius(0)); !near(float64(got), float64(IceFor(360*Kilojoule)), 1e-12) {
		t.Errorf("ice to 0 °C %v", got)
	}
	if got := IceTo(360*Kilojoule, Celsius(20)).Grams(); !near(got, 360e3/(334+20*4.184), 1e-9) {
		t.Errorf("ice to 20 °C %v", got)
	}
	if IceFor(-1) != 0 || IceFor(Energy(math.NaN())) != 0 {
		t.Error("ice for no heat")
	}
}

// TestCriticalityClasses goes through all orders of the three temperatures
// (Stoessel's five classes) and the ties.
func TestCriticalityClasses(t *testing.T) {
	for _, c := range []struct {
		mtsr, mtt, td24 float64
		want            int
	}{
		{60, 90, 120, 1}, {60, 120, 90, 2}, {90, 60, 120, 3}, {120, 60, 90, 4}, {90, 120, 60, 5}, {120, 90, 60, 5},
		{60, 60, 120, 3}, {90, 120, 90, 5}, {60, 90, 90, 2}, {90, 60, 90, 4},
	} {
		got, err := CriticalityClass(Celsius(30), Celsius(c.mtsr), Celsius(c.mtt), Celsius(c.td24))
		if err != nil || got != c.want {
			t.Errorf("MTSR %v, MTT %v, TD24 %v: class %d, %v, want %d", c.mtsr, c.mtt, c.td24, got, err, c.want)
		}
	}
	if _, err := CriticalityClass(Celsius(30), Celsius(20), Celsius(90), Celsius(120)); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("MTSR below the process: %v", err)
	}
}

func TestHeatRefuses(t *testing.T) {
	nan := math.NaN()
	for name, call := range map[string]func() error{
		"no mass":       func() error { _, err := AdiabaticRise(Kilojoule, 0, 4000); return err },
		"no cp":         func() error { _, err := AdiabaticRise(Kilojoule, Kilogram, 0); return err },
		"heat NaN":      func() error { _, err := AdiabaticRise(Energy(nan), Kilogram, 4000); return err },
		"no cooling":    func() error { _, err := ShortestDose(Kilojoule, 0); return err },
		"endothermic":   func() error { _, err := ShortestDose(-Kilojoule, 10); return err },
		"accumulation":  func() error { _, err := MTSR(300, 1.2, 50, 1); return err },
		"mass ratio":    func() error { _, err := MTSR(300, 0.2, 50, 0.5); return err },
		"mixture cp":    func() error { _, err := MixtureHeatCapacity(HeatPart{Kilogram, 0}); return err },
		"empty mixture": func() error { _, err := MixtureHeatCapacity(); return err },
		"coolant":       func() error { _, err := CoolantFlow(100, 4184, 0); return err },
		"scale":         func() error { _, err := CoolingAfterScaling(0, Litre); return err },
		"two boilings":  func() error { _, err := (BoilingPair{300, 300, 1000, 2000}).VaporisationHeat(); return err },
		"boiling rise":  func() error { _, err := BoilingRise(0.512, Molality(nan), 1); return err },
		"hydrate of two": func() error {
			_, err := HydrateCapacity(mustFormula("MgSO4"), mustFormula("Na2SO4·10H2O"))
			return err
		},
	} {
		if err := call(); !errors.Is(err, ErrOutOfRange) && !errors.Is(err, ErrImpossible) {
			t.Errorf("%s: %v, want a refusal", name, err)
		}
	}
}

func TestMixtureHeatCapacity(t *testing.T) {
	got, err := MixtureHeatCapacity(HeatPart{200 * Gram, 2.4 * JoulePerGramKelvin}, HeatPart{600 * Gram, 4.0 * JoulePerGramKelvin})
	if err != nil || !near(float64(got), 3600, 1e-12) { // (0.2·2.4 + 0.6·4.0)/0.8
		t.Errorf("%v, %v", got, err)
	}
}

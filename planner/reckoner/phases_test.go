package reckoner

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"

	"stillroom/chem"
)

// reckonLine runs a sum written as on the command line, its pairs parted by "|".
func reckonLine(t *testing.T, line string) (Answer, error) {
	t.Helper()
	fields := strings.Split(line, "|")
	args, err := ParseArgs(fields[1:])
	if err != nil {
		t.Fatal(err)
	}
	return Reckon(context.Background(), fields[0], args)
}

// TestPhaseSums compares the sums on two phases, vapour and heat with published
// figures; the source of each stands beside it.
func TestPhaseSums(t *testing.T) {
	for _, c := range []struct {
		line, result    string
		want, tolerance float64
	}{
		// Nichols, Organic Chemistry Lab Techniques, extraction theory: 92 %
		{"extract|partition=4.07|aqueous=150 mL|organic=50 mL|portions=3", "recovered", 0.92, 0.005},
		// Harvey, Analytical Chemistry, extraction of a weak acid: 74.8 and 2.9 %
		{"extract|partition=3.00|pka=5.00|ph=3.00|aqueous=50.00 mL|organic=50.00 mL|portions=1", "recovered", 0.748, 0.001},
		{"extract|partition=3.00|pka=5.00|ph=7.00|aqueous=50.00 mL|organic=50.00 mL|portions=1", "recovered", 0.029, 0.001},
		// D = 4, ten millilitres from fifty: six portions for 95 %
		{"extract|partition=4|aqueous=50 mL|organic=10 mL|recovery=95 %", "portions", 6, 0},
		{"distribution|partition=3.00|pka=5.00|ph=5.00", "distribution_ratio", 1.5, 1e-12},
		// log P of pentanoic acid in ether 1.36 (Collander, partition.csv), wholly neutral at pH 0
		{"distribution|solute=pentanoic acid|solvent=diethyl ether|ph=0", "distribution_ratio", math.Pow(10, 1.36), 0.01},
		{"extract|solute=pentanoic acid|solvent=diethyl ether|aqueous=100 mL|organic=100 mL|portions=1", "left", 1 / (1 + math.Pow(10, 1.36)), 1e-9},
		{"distribution|partition=3.00|pka=5.00|ph=5.00|kind=base", "neutral_fraction", 0.5, 1e-12},
		// capacity 0.5 to 0.75 g/g, common practice
		{"dry|water=6 g|agent=sodium sulfate", "agent_mass_low", 8, 1e-9},
		{"dry|water=6 g|agent=sodium sulfate", "agent_mass_high", 12, 1e-9},
		{"dry|water=6 g|agent=a new one|capacity=0.3", "agent_mass_typical", 20, 1e-9},
		// CRC Handbook normal boiling points
		{"boil|substance=ethyl acetate|pressure=101.325 kPa", "temperature", 77.1, 0.3},
		{"boil|substance=butyl butanoate|pressure=101.325 kPa", "temperature", 164.95, 0.1},
		{"boil|substance=water|pressure=1 atm", "temperature", 99.97, 0.1},
		// common handbook coefficients of ethanol, boiling point 78.32 °C at 760 mmHg
		{"boil|substance=something|pressure=760 mmHg|antoine=8.20417;1642.89;230.300", "temperature", 78.32, 0.02},
		{"vapour|substance=something|temperature=78.32 °C|antoine=8.20417;1642.89;230.300|antoine_range=-57 °C; 80 °C", "pressure", 101.33, 0.07},
		// OpenStax Chemistry 2e, Appendix E: 23.8 torr at 25 °C
		{"vapour|substance=water|temperature=25 °C", "pressure", 3.1731, 0.01},
		// the same coefficients in other units, stated or told from the numbers
		{"vapour|substance=something|temperature=78.32 °C|antoine=10.32907;1642.89;-42.85", "pressure", 101.33, 0.1},
		{"vapour|substance=something|temperature=78.32 °C|antoine=5.32907;1642.89;-42.85", "pressure", 101.33, 0.1},
		{"vapour|substance=something|temperature=78.32 °C|antoine=23.78356;3782.894;-42.85", "pressure", 101.33, 0.1},
		{"vapour|substance=ethanol|temperature=78.32 °C|antoine=7.32907;1642.89;-42.85", "pressure", 101.33, 0.1},
		{"vapour|substance=ethanol|temperature=78.32 °C|antoine=23.78356;3782.894;-42.85;Pa;K;ln", "pressure", 101.33, 0.1},
		{"vapour|substance=something|temperature=78.32 °C|antoine=5.32907;1642.89;-42.85;bar;K", "pressure", 101.33, 0.1},
		// benzene and water: 10.1 g per g at 69.4 °C, laboratory text problem
		{"steam|substance=benzene|pressure=760 mmHg", "mass_ratio", 10.1, 0.3},
		{"steam|substance=benzene|pressure=760 mmHg", "temperature", 69.4, 0.5},
		// OpenStax Chemistry 2e, table 5.2: combustion of methane
		{"heat|equation=CH4(g) + 2 O2(g) -> CO2(g) + 2 H2O(l)|amount=2 mol", "enthalpy", -890.8, 0.8},
		{"heat|equation=CH4(g) + 2 O2(g) -> CO2(g) + 2 H2O(l)|amount=2 mol", "heat", 1781.6, 1.6},
		// definitions: 2.0 mol · 180 kJ/mol in 1.50 kg of 3.0 kJ/(kg K) rise by 80 K
		{"heat|equation=H2 + Cl2 -> 2 HCl(g)|formation=HCl: -90 kJ/mol|amount=2.0 mol|mass=1.50 kg|heat_capacity=3.0 kJ/(kg K)", "adiabatic_rise", 80, 0.1},
		{"dose|heat=360 kJ|cooling=75 W|rise=5 K", "shortest_time", 80, 0.1},
		{"dose|heat=216 kJ|cooling=2.5 W/K|rise=25 K", "shortest_time", 57.6, 0.1},
		// Organic Syntheses 1929, 9 (52), left-over chromium of the menthone oxidation
		{"quench|oxidant=chromium(VI)|amount=0.421 mol|reductant=NaHSO3|excess=1.10", "reductant_mass", 72.3, 0.3},
		{"quench|oxidant=chromium(VI)|amount=0.421 mol|reductant=NaHSO3|excess=10 %", "reductant_mass", 72.3, 0.3},
		{"quench|oxidant=chromium(VI)|amount=0.805 mol|reductant=NaHSO3|excess=10 %", "sludge_mass", 82.9, 0.2},
		{"quench|oxidant=sodium dichromate|amount=100 g|reductant=sodium metabisulfite|excess=0 %", "reductant_mass", 108.85, 0.02},
	} {
		answer, err := reckonLine(t, c.line)
		if err != nil {
			t.Errorf("%s: %v", c.line, err)
			continue
		}
		got, ok := answer.Result(c.result)
		if !ok || !(math.Abs(got.Value-c.want) <= c.tolerance) {
			t.Errorf("%s: %s = %v, want %v ± %v", c.line, c.result, got.Value, c.want, c.tolerance)
		}
		if answer.Derivation.Inserted == "" || answer.Derivation.Source == "" {
			t.Errorf("%s: no numbers put in, or no source", c.line)
		}
	}
}

// TestPhaseSumsRefuse checks that a bad input is refused with its cause and a
// word on what would do.
func TestPhaseSumsRefuse(t *testing.T) {
	for _, c := range []struct {
		line   string
		want   error
		saying string
	}{
		{"extract|partition=4|aqueous=50 mL|organic=10 mL", ErrMissingKey, "recovery="},
		{"extract|partition=4|aqueous=50 mL|organic=10 mL|portions=2|recovery=95 %", ErrUnknownKey, "one of them"},
		{"extract|partition=4|aqueous=50 mL|organic=10 mL|recovery=100 %", chem.ErrOutOfRange, "below 100 %"},
		{"extract|partition=0.000001|aqueous=50 mL|organic=10 mL|recovery=99 %", chem.ErrImpossible, "1000 portions"},
		{"extract|partition=4|aqueous=50 mL|organic=10 mL|portions=2.5", chem.ErrOutOfRange, "whole"},
		{"extract|partition=4|aqueous=1,234 mL|organic=10 mL|portions=2", chem.ErrAmbiguous, "1234"},
		{"extract|aqueous=50 mL|organic=10 mL|portions=2", ErrMissingKey, "solute="},
		{"extract|solute=D-glucose|solvent=heptane|aqueous=50 mL|organic=10 mL|portions=2", chem.ErrNoData, "partition="},
		{"distribution|partition=4|pka=five|ph=7", chem.ErrNoNumber, "pka"},
		{"dry|water=5 g|agent=sugar", chem.ErrNoData, "sodium sulfate"},
		{"dry|water=5 g|agent=sodium hydroxide", chem.ErrNoData, "capacity="},
		{"boil|substance=water|pressure=0 kPa", chem.ErrOutOfRange, "positive"},
		{"boil|substance=water|pressure=90 MPa", chem.ErrOutOfRange, "the table reaches"},
		{"boil|substance=butyl butanoate|pressure=2 kPa", chem.ErrNoData, "antoine=A;B;C"},
		{"boil|substance=water|altitude=20000", chem.ErrOutOfRange, "11000"},
		{"boil|substance=water|pressure=10 kPa|antoine=8;1700", chem.ErrSyntax, "A;B;C"},
		{"vapour|substance=x|temperature=50 °C|antoine=7.3;1642.89;-42.85", chem.ErrSyntax, "units"},
		{"vapour|substance=water|temperature=500 °C", chem.ErrOutOfRange, "°C"},
		{"vapour|substance=x|temperature=90 °C|antoine=8.20417;1642.89;230.3|antoine_range=-57 °C; 80 °C", chem.ErrOutOfRange, "80.0 °C"},
		{"steam|substance=something|pressure=101 kPa|antoine=6.86064;1438.817;205.441", chem.ErrNoData, "molar_mass="},
		{"heat|equation=C5H12O + O2 -> C5H10O2 + H2O|amount=1 mol", chem.ErrNoData, "1-pentanol"},
		{"heat|equation=H^+ + OH^- -> H2O|amount=1 mol|mass=1 kg", ErrMissingKey, "heat_capacity"},
		{"dose|heat=360 kJ|cooling=0 W", chem.ErrOutOfRange, "positive"},
		{"dose|heat=360 kJ|cooling=2.5 W/K", ErrMissingKey, "rise"},
		{"quench|oxidant=ozone|amount=1 mol|reductant=NaHSO3|excess=10 %", chem.ErrNoData, "chromium(VI)"},
		{"quench|oxidant=CrO3|amount=0 mol|reductant=NaHSO3|excess=10 %", chem.ErrOutOfRange, "above zero"},
	} {
		answer, err := reckonLine(t, c.line)
		if !errors.Is(err, c.want) || !strings.Contains(err.Error(), c.saying) {
			t.Errorf("%s: %v, %v; want %v that says %q", c.line, answer.Results, err, c.want, c.saying)
		}
	}
}

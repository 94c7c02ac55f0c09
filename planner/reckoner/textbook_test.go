package reckoner

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"

	"stillroom/chem"
)

// TestTextbookExamples asks the sums what textbooks ask. The source stands in each row;
// "from memory" means that it was not read again.
func TestTextbookExamples(t *testing.T) {
	const (
		openstax = "OpenStax Chemistry 2e, from memory: "
		gas      = "OpenStax Chemistry 2e, 9.3: ideal gas at 20 °C, 24.06 L/mol"
		organic  = "steam distillation as quoted in organic laboratory texts, from memory"
		stoich   = "by the formula"
	)
	for _, c := range []struct {
		sum, args, name string
		want, tolerance float64
		source          string
	}{
		{"molar-mass", "formula=CuSO4·5H2O", "molar_mass", 249.68, 0.01, openstax + "3.1"},
		{"molar-mass", "formula=CaSO4*0.5H2O", "molar_mass", 145.15, 0.02, openstax + "hydrates"},
		{"molar-mass", "formula=(NH4)2Fe(SO4)2.6H2O", "molar_mass", 392.14, 0.02, "Mohr's salt, handbook value, from memory"},
		{"molar-mass", "formula=aspirin", "molar_mass", 180.15, 0.02, openstax + "example 3.1"},
		{"molar-mass", "formula=AcOH", "molar_mass", 60.05, 0.01, "acetic acid, not actinium"},
		{"balance", "equation=KMnO4 + HCl -> KCl + MnCl2 + H2O + Cl2", "HCl", 16, 0, "standard textbook result, from memory"},
		{"balance", "equation=P4 + OH^- + H2O -> PH3 + H2PO2^-", "electrons", 3, 0, "standard textbook result, from memory"},
		{"balance", "equation=As2S3 + HNO3 + H2O -> H3AsO4 + H2SO4 + NO", "HNO3", 28, 0, "standard textbook result, from memory"},
		{"amount", "substance=n-pentanol|mass=88.15 g", "amount", 1, 1e-3, stoich},
		{"amount", "substance=amyl alcohol|mass=88150 mg", "amount", 1, 1e-3, stoich},
		{"amount", "substance=caustic soda|mass=0.04 kg", "amount", 1, 1e-3, stoich},
		{"amount", "substance=conc. nitric acid|volume=100 mL|purity=68 %", "amount", 1.516, 0.01, "15.2 mol/L, standard reagent table, from memory"},
		{"amount", "substance=copper sulfate|mass=159.6 g", "amount", 1, 1e-3, stoich},
		{"amount", "substance=copper sulphate pentahydrate|mass=249.7 g", "amount", 1, 1e-3, stoich},
		{"strength", "substance=sulfuric acid|from=98 % w/w", "molarity", 18.4, 0.1, "standard reagent table, from memory"},
		{"strength", "substance=hydrochloric acid|from=37 %", "molarity", 12.0, 0.1, "standard reagent table, from memory"},
		{"strength", "substance=ammonia|from=28 %", "molarity", 14.8, 0.2, "standard reagent table, from memory"},
		{"strength", "substance=glacial acetic acid|from=99.7 %", "molarity", 17.4, 0.1, "standard reagent table, from memory"},
		{"strength", "substance=phosphoric acid|from=85 %", "molarity", 14.7, 0.15, "standard reagent table, from memory"},
		{"strength", "substance=hydrogen peroxide|from=30 %", "volume_strength", 110, 2, "30 % w/w is sold as 100 to 110 volumes, from memory"},
		{"strength", "substance=glucose|from=5.0 %|density=1.029 g/mL", "molarity", 0.2856, 5e-4, openstax + "3.4"},
		{"ph", "mix=hydrogen cyanide: 0.1 mol/L", "pH", 5.15, 0.05, openstax + "14.3, Ka 4.9e-10"},
		{"ph", "mix=ammonium acetate: 0.1 mol/L", "pH", 7.0, 0.02, openstax + "14.4"},
		{"ph", "mix=anilinium chloride: 0.233 mol/L", "pH", 2.65, 0.1, openstax + "14.4, Kb 4.3e-10"},
		{"ph", "mix=carbonic acid: 0.033 mol/L", "pH", 3.92, 0.05, openstax + "14.5"},
		{"ph", "mix=lactic acid: 0.1 mol/L", "pH", 2.43, 0.05, "Ka 1.38e-4, from memory"},
		{"ph", "mix=potassium hydrogen phthalate: 0.05 mol/L", "pH_activity", 4.005, 0.03, "standard buffer of the National Bureau of Standards, from memory"},
		{"ph", "mix=sodium valerate: 0.1 mol/L", "pH", 8.92, 0.05, "pKa 4.84: 7 + (pKa + lg c)/2"},
		{"neutralise", "acid=oxalic acid dihydrate|amount=1 mol|base=KOH", "salt_mass", 166.21, 0.02, "K2C2O4"},
		{"neutralise", "acid=sulfur dioxide|amount=1 mol|base=NaOH", "salt_mass", 126.04, 0.02, "Na2SO3"},
		{"neutralise", "acid=HCl|amount=1 mol|base=NH4OH", "salt_mass", 53.49, 0.01, "NH4Cl"},
		{"neutralise", "acid=HCl|amount=3 mol|base=aluminium hydroxide", "base_mass", 78.00, 0.01, openstax + "antacids"},
		{"neutralise", "acid=HCl|amount=3 mol|base=aluminium hydroxide", "salt_mass", 133.33, 0.02, "AlCl3"},
		{"neutralise", "acid=hydrochloric acid|mass=100 g|purity=37 %|base=NaOH", "base_mass", 40.6, 0.1, stoich},
		{"neutralise", "acid=acetic acid|amount=1 mol|base=NaOH|excess=1.1", "base_mass", 44.0, 0.01, "1.1 times theory"},
		{"neutralise", "acid=pentanoic acid|mass=102.13 g|base=NaHCO3", "gas_volume", 24.06, 0.02, gas},
		{"vapour", "substance=water|temperature=0 °C", "pressure", 0.611, 0.002, "steam tables"},
		{"vapour", "substance=acetonitrile|temperature=25 °C", "pressure", 11.9, 0.3, "CRC Handbook, from memory"},
		{"vapour", "substance=bromobenzene|temperature=25 °C", "pressure", 0.556, 0.02, "CRC Handbook, from memory"},
		{"boil", "substance=DMF|pressure=760 torr", "temperature", 152.8, 1.3, "CRC Handbook"},
		{"boil", "substance=cyclohexanone|pressure=14.696 psi", "temperature", 155.4, 0.5, "CRC Handbook"},
		{"steam", "substance=bromobenzene|pressure=760 mmHg", "temperature", 95.3, 0.3, organic},
		{"steam", "substance=bromobenzene|pressure=760 mmHg", "mass_ratio", 1.6, 0.06, organic + ": 10 g of water bring about 16 g"},
		{"steam", "substance=aniline|pressure=101.325 kPa", "temperature", 98.4, 0.3, organic},
		{"heat", "equation=H2(g) + 1/2 O2(g) -> H2O(l)|amount=1 mol", "enthalpy", -285.8, 0.1, openstax + "5.3"},
		{"heat", "equation=2 H2(g) + O2(g) -> 2 H2O(l)|amount=1 mol", "enthalpy", -571.6, 0.2, openstax + "5.3"},
		{"heat", "equation=N2(g) + 3 H2(g) -> 2 NH3(g)|amount=500 mmol", "heat", 45.9, 0.3, openstax + "appendix G"},
		{"dose", "heat=216 kJ|cooling=2.5 W/°C|rise=25 K", "shortest_time", 57.6, 1e-9, stoich},
		{"quench", "oxidant=KMnO4|amount=158.03 g|reductant=sodium thiosulfate|excess=0 %", "reductant_mass", 98.8, 0.1, "5/8 mol Na2S2O3 for each permanganate"},
		{"quench", "oxidant=KMnO4|amount=158.03 g|reductant=sodium thiosulfate pentahydrate|excess=0 %", "reductant_mass", 155.1, 0.1, "5/8 mol for each permanganate"},
		{"quench", "oxidant=K2Cr2O7|amount=294.18 g|reductant=FeSO4|excess=0 %", "reductant_mass", 911.4, 0.3, "6 mol FeSO4 for each dichromate"},
		{"quench", "oxidant=bromine|amount=1 mol|reductant=sodium sulfite|excess=0 %", "reductant_mass", 126.04, 0.02, "1 mol for each bromine"},
		{"dry", "water=5 g|agent=3A sieve", "agent_mass_low", 25, 0.1, "20 % at best, common practice"},
	} {
		answer, err := reckonText(c.sum, c.args)
		if err != nil {
			t.Errorf("%s %s: %v (%s)", c.sum, c.args, err, c.source)
			continue
		}
		r, ok := answer.Result(c.name)
		if !ok || math.Abs(r.Value-c.want) > c.tolerance {
			t.Errorf("%s %s: %s = %v, want %v ± %v (%s)", c.sum, c.args, c.name, r.Value, c.want, c.tolerance, c.source)
		}
	}
}

// TestWrongChemistryIsRefused checks inputs that have no answer: the error must say
// what would do.
func TestWrongChemistryIsRefused(t *testing.T) {
	for _, c := range []struct {
		sum, args, says string
		cause           error
	}{
		{"steam", "substance=water|pressure=1 atm", "other liquid", chem.ErrImpossible},
		{"steam", "substance=ethanol|pressure=1 atm", "95.5 % w/w", chem.ErrImpossible},
		{"steam", "substance=DMF|pressure=1 atm", "mixes with water", chem.ErrImpossible},
		{"dry", "water=5 g|agent=MgSO4·7H2O", "anhydrous magnesium sulfate", chem.ErrImpossible},
		{"neutralise", "acid=ammonium chloride|amount=1 mol|base=NaOH", "protons=", chem.ErrNoData},
		{"neutralise", "acid=HCl|amount=1 mol|base=Fe2O3", "hydroxides", chem.ErrNoData},
		{"ph", "mix=acetic acid: 1000 mol/L", "60 mol/L", chem.ErrOutOfRange},
		{"strength", "substance=ethylene glycol|from=2 mol/L", "density=", chem.ErrNoData},
		{"amount", "substance=iron chloride|mass=1 g", "iron(III) chloride", ErrUnknownSubstance},
		{"extract", "partition=3|pka=5|aqueous=50 mL|organic=10 mL|portions=1", `ph="2"`, ErrMissingKey},
	} {
		answer, err := reckonText(c.sum, c.args)
		if !errors.Is(err, c.cause) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s %s: %v, %v; want %v that says %q", c.sum, c.args, answer.Results, err, c.cause, c.says)
		}
	}
}

// TestDryingChecksTheProduct checks that a product is known by its classes too
// (calcium chloride binds alcohols, acids and amines: METHODS of the drying agents).
func TestDryingChecksTheProduct(t *testing.T) {
	for _, product := range []string{"1-pentanol", "alcohol", "pentanoic acid", "triethylamine", "acetamide"} {
		answer, err := reckonText("dry", "water=5 g|agent=calcium chloride|product="+product)
		if err != nil || !strings.HasPrefix(strings.Join(answer.Notes, "\n"), "don't use it") {
			t.Errorf("%s: %v, %v; want a warning", product, answer.Notes, err)
		}
	}
}

// reckonText runs a sum on inputs parted by bars.
func reckonText(sum, inputs string) (Answer, error) {
	args, err := ParseArgs(strings.Split(inputs, "|"))
	if err != nil {
		return Answer{}, err
	}
	return Reckon(context.Background(), sum, args)
}

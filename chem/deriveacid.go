package chem

import (
	"fmt"
	"strings"
)

// DeriveNeutralisation says how the mass of base came about.
func DeriveNeutralisation(acid, base string, n Amount, protons float64, b Base, baseMass MolarMass, excess Fraction, out Neutralised) Derivation {
	return Derivation{
		Of:      base + " for " + acid,
		Formula: "m(base) = n(acid) · z(acid) / z(base) · (1 + excess) · M(base)",
		Inserted: fmt.Sprintf("m(base) = %.6g mol · %.4g / %.4g · (1 + %.4g) · %.6g g/mol = %.5g g",
			float64(n), protons, b.Protons, float64(excess), baseMass.GramsPerMole(), out.Base.Grams()),
		Inputs: []Input{
			{"n(acid)", "amount of " + acid, float64(n), "mol", "given, or mass over molar mass"},
			{"z(acid)", "protons that one molecule gives", protons, "", "steps with a pKa up to 8, or given"},
			{"z(base)", "protons that one formula of base takes", b.Protons, "", "formula of the base"},
			{"excess", "excess of base", float64(excess), "", "given"},
			{"M(base)", "molar mass of " + base, baseMass.GramsPerMole(), "g/mol", "table or given"},
		},
		Value: out.Base.Grams(), Unit: "g",
		Range:  "by amount; gas as an ideal gas, none of it staying dissolved",
		Source: "OpenStax Chemistry 2e, 4.5; V = n R T / p",
	}
}

// DerivePH says how a pH came about: the charge balance with its parts at that pH.
func DerivePH(mix []Protolyte, strong Concentration, t Temperature, pH float64) Derivation {
	pKw, err := PKw(t)
	if err != nil {
		return Derivation{}
	}
	d := Derivation{
		Of:      "solution",
		Formula: "strong + [H⁺] − Kw/[H⁺] + Σ C·z(pH) = 0",
		Inputs: []Input{
			{"strong", "charge of the strong ions", strong.MolesPerLitre(), "mol/L", "given mixture"},
			{"pKw", "ion product of water", pKw, "", "Marshall and Franck 1981"},
		},
		Value:  pH,
		Range:  "concentrations in place of activities: 0.1 to 0.2 off above 0.1 mol/L; pKa at 25 °C",
		Source: "charge balance, solved in a bracket (OpenStax Chemistry 2e, 14.4 to 14.6)",
	}
	var sum strings.Builder
	fmt.Fprintf(&sum, "%.4g + %.4g − %.4g", strong.MolesPerLitre(), pow10(-pH), pow10(pH-pKw))
	for _, p := range mix {
		z := meanCharge(p.PKa, p.Charge, pH, 0)
		fmt.Fprintf(&sum, " + %.4g·(%.4g)", p.C.MolesPerLitre(), z)
		for i, k := range p.PKa {
			d.Inputs = append(d.Inputs, Input{fmt.Sprintf("pKa%d", i+1), p.Name, k, "", "table or given"})
		}
	}
	d.Inserted = sum.String() + " = 0 mol/L at pH " + fmt.Sprintf("%.4f", pH)
	return d
}

// DeriveAtomEconomy says how an atom economy came about.
func DeriveAtomEconomy(e Equation, product string, economy Fraction) Derivation {
	var in MolarMass
	for _, t := range e.Left {
		in += t.Formula.MolarMass() * MolarMass(t.Coefficient)
	}
	return Derivation{
		Of:       product,
		Formula:  "atom economy = ν(product)·M(product) / Σ ν·M(reactants)",
		Inserted: fmt.Sprintf("%.6g g/mol / %.6g g/mol = %.4g", in.GramsPerMole()*float64(economy), in.GramsPerMole(), float64(economy)),
		Inputs:   []Input{{"M", "reactants, coefficients counted", in.GramsPerMole(), "g/mol", "equation"}},
		Value:    float64(economy),
		Range:    "a balanced equation; no solvent, no excess",
		Source:   "B. M. Trost, Science 254 (1991) 1471; OpenStax Chemistry 2e, 4.4",
	}
}

// DeriveMassIntensity says how E-factor and process mass intensity came about.
func DeriveMassIntensity(sum, product Mass) Derivation {
	return Derivation{
		Of:      "inputs per product",
		Formula: "PMI = Σ m(inputs) / m(product), E = PMI − 1",
		Inserted: fmt.Sprintf("PMI = %.6g g / %.6g g = %.5g, E = %.5g", sum.Grams(), product.Grams(),
			float64(sum/product), float64(sum/product)-1),
		Inputs: []Input{{"m", "all inputs", sum.Grams(), "g", "given"}, {"m(product)", "product", product.Grams(), "g", "given"}},
		Value:  float64(sum / product),
		Range:  "the inputs that were listed; say whether water is among them",
		Source: "Constable, Curzons and Cunningham, Green Chem. 4 (2002) 521; Sheldon",
	}
}

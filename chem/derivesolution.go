package chem

import "fmt"

// DeriveMolarity says how the molarity of a solution came about; the sources of the
// molar mass and the density are the caller's to know.
func (s Solute) DeriveMolarity(all Strengths, molarMassSource, densitySource string) Derivation {
	return Derivation{
		Of:      s.Name + " in solution",
		Formula: "c = w · ρ / M",
		Inserted: fmt.Sprintf("c = %.6g · %.6g g/L / %.6g g/mol = %.5g mol/L",
			float64(all.MassFraction), float64(all.Density), s.MolarMass.GramsPerMole(), all.Molarity.MolesPerLitre()),
		Inputs: []Input{
			{"w", "mass fraction", float64(all.MassFraction), "", "given, or worked out of the strength given"},
			{"ρ", "density of the solution", all.Density.GramsPerMillilitre(), "g/mL", densitySource},
			{"M", "molar mass of " + s.Name, s.MolarMass.GramsPerMole(), "g/mol", molarMassSource},
		},
		Value: all.Molarity.MolesPerLitre(), Unit: "mol/L",
		Range:  "aqueous solutions; the temperature is that of the density",
		Source: "OpenStax Chemistry 2e, 3.3 and 3.4",
	}
}

// DeriveDilution says how the mass of stock of a dilution came about.
func DeriveDilution(name string, from, to Fraction, make Mass, d Dilution) Derivation {
	return Derivation{
		Of:      name + ", stock to dilute",
		Formula: "m(stock) = m · w / w(stock), m(water) = m − m(stock)",
		Inserted: fmt.Sprintf("m(stock) = %.6g g · %.5g / %.5g = %.5g g, m(water) = %.5g g",
			make.Grams(), float64(to), float64(from), d.Stock.Grams(), d.Water.Grams()),
		Inputs: []Input{
			{"m", "mass to make", make.Grams(), "g", "given"},
			{"w", "mass fraction wanted", float64(to), "", "given"},
			{"w(stock)", "mass fraction of the stock", float64(from), "", "given"},
		},
		Value: d.Stock.Grams(), Unit: "g",
		Range:  "by mass always; volumes don't add up",
		Source: "OpenStax Chemistry 2e, 3.4",
	}
}

// DeriveBlend says how the mass of the stronger part of a blend came about.
func DeriveBlend(name string, strong, weak, target Fraction, make Mass, b Blend) Derivation {
	return Derivation{
		Of:      name + ", the stronger of two",
		Formula: "m(strong) = m · (w − w(weak)) / (w(strong) − w(weak)), m(weak) = m − m(strong)",
		Inserted: fmt.Sprintf("m(strong) = %.6g g · (%.5g − %.5g) / (%.5g − %.5g) = %.5g g, m(weak) = %.5g g",
			make.Grams(), float64(target), float64(weak), float64(strong), float64(weak), b.Strong.Grams(), b.Weak.Grams()),
		Inputs: []Input{
			{"m", "mass to make", make.Grams(), "g", "given"},
			{"w", "mass fraction wanted", float64(target), "", "given"},
			{"w(strong)", "mass fraction of the stronger", float64(strong), "", "given"},
			{"w(weak)", "mass fraction of the weaker", float64(weak), "", "given"},
		},
		Value: b.Strong.Grams(), Unit: "g",
		Range:  "a target between the two strengths",
		Source: "cross rule, OpenStax Chemistry 2e, 3.4",
	}
}

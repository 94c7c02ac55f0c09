package chem

import (
	"fmt"
	"strings"
)

// ElementShare is the share of one element in the mass of a formula.
type ElementShare struct {
	Symbol   string
	Fraction Fraction
}

// Composition returns the share of each element in the molar mass, in the order of
// Elements; nil if the formula has no molar mass.
func (f Formula) Composition() []ElementShare {
	if f.lacks != "" {
		return nil
	}
	shares := make([]ElementShare, len(f.atoms))
	for i, a := range f.atoms {
		shares[i] = ElementShare{a.symbol(), Fraction(a.count.float() * a.weight() / f.mass)}
	}
	return shares
}

// weight returns the atomic weight or, for a nuclide, the atomic mass.
func (a atom) weight() float64 {
	t := elements()
	if a.a != 0 {
		return t.nuclides[[2]uint16{uint16(a.z), a.a}].mass
	}
	return t.byNumber[a.z].AtomicWeight
}

// Derive says how the molar mass comes about, in g/mol.
func (f Formula) Derive() Derivation {
	d := Derivation{
		Of: "molar mass of " + f.String(), Formula: "M = Σ n(E) · Aᵣ(E)", Value: f.mass, Unit: "g/mol",
		Range:  "material of normal terrestrial composition",
		Source: "IUPAC/CIAAW 2021 abridged standard atomic weights, revisions of 2024 added",
	}
	var terms []string
	for _, a := range f.atoms {
		terms = append(terms, fmt.Sprintf("%s · %.7g", a.count.text(), a.weight()))
		source := "nuclides, AME2020"
		if a.a == 0 {
			source = elements().byNumber[a.z].Source
		}
		d.Inputs = append(d.Inputs, Input{"Aᵣ(" + a.symbol() + ")", "atomic weight of " + a.symbol(), a.weight(), "", source})
	}
	d.Inserted = fmt.Sprintf("%s = %.6g g/mol", strings.Join(terms, " + "), f.mass)
	return d
}

// AmountIn returns the amount of a substance in a mass of a material that holds the
// share purity of it by mass, and how it comes about:
//
//	n = m w / M
//
// It panics if the molar mass isn't positive.
func AmountIn(of string, m Mass, purity Fraction, molarMass MolarMass) (Amount, Derivation) {
	n := molarMass.Of(m * Mass(purity))
	return n, Derivation{
		Of: "amount of " + of, Formula: "n = m · w / M", Value: float64(n), Unit: "mol",
		Inserted: fmt.Sprintf("%.6g g · %.6g / %.6g g/mol = %.6g mol", m.Grams(), float64(purity), molarMass.GramsPerMole(), float64(n)),
		Inputs: []Input{
			{"m", "mass of the material", m.Grams(), "g", "given"},
			{"w", "purity by mass", float64(purity), "", "given"},
			{"M", "molar mass of " + of, molarMass.GramsPerMole(), "g/mol", "given"},
		},
		Source: "definition of amount and molar mass; OpenStax Chemistry 2e, 3.1",
	}
}

// Derive says how a balanced reaction comes about.
func (e Equation) Derive() Derivation {
	return Derivation{
		Of: "balanced reaction", Formula: "A ν = 0, smallest whole ν > 0", Inserted: e.String(),
		Range:  "one independent way to balance",
		Source: "null space of the matrix of atom counts and charges; OpenStax Chemistry 2e, 4.2",
		Notes:  []string{"balanced on paper isn't the same as running that way in the flask"},
	}
}

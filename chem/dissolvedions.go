package chem

import (
	"fmt"
	"slices"
)

// strongAnions are the anions whose acids are strong, so that the acid in dilute
// solution is its ions. Every metal salt in the tables counts as its ions.
var strongAnions = []string{"Cl-", "Br-", "I-", "NO3-", "ClO4-", "ClO3-", "SO4^2-", "MnO4-"}

// dissolvedFormation returns the enthalpy of formation of a strong electrolyte
// in water as the sum over its ions, at infinite dilution,
//
//	ΔfH(MaXb, aq) = a · ΔfH(M) + b · ΔfH(X)
//
// for a salt of a tabulated cation and anion, a hydroxide, or a strong acid. At
// a mole per litre the true figure differs by a few kJ/mol, for sulfuric acid by
// up to 20. It is false where no pair of ions makes up the formula.
func dissolvedFormation(species string) (Formation, bool) {
	formula, err := ParseFormula(species)
	if err != nil || formula.Charge() != 0 {
		return Formation{}, false
	}
	for _, cation := range formations() {
		for _, anion := range formations() {
			if n, m, ok := ionPair(formula, cation, anion); ok {
				return Formation{
					Species: fmt.Sprintf("%d %s and %d %s", n, cation.Species, m, anion.Species), Formula: species, State: "aq",
					Enthalpy: MolarEnergy(n)*cation.Enthalpy + MolarEnergy(m)*anion.Enthalpy,
					Source:   fmt.Sprintf("sum of the ions at infinite dilution: %s; %s", cation.Source, anion.Source),
				}, true
			}
		}
	}
	return Formation{}, false
}

// ionPair says how many cations and anions make up a neutral formula.
func ionPair(formula Formula, cation, anion Formation) (n, m int, ok bool) {
	if cation.charge <= 0 || anion.charge >= 0 {
		return 0, 0, false
	}
	if cation.hill == "H^+" && !slices.Contains(strongAnions, anion.Formula) {
		return 0, 0, false // a weak acid is mostly not its ions
	}
	shared := int(gcd(int64(cation.charge), int64(-anion.charge)))
	n, m = -anion.charge/shared, cation.charge/shared
	// NH4NO3 and the like: counts must agree element by element
	a, b := mustFormula(cation.Formula), mustFormula(anion.Formula)
	elements := map[string]bool{}
	for _, f := range []Formula{formula, a, b} {
		for _, e := range f.Elements() {
			elements[e.Symbol] = true
		}
	}
	for symbol := range elements {
		if formula.Count(symbol) != float64(n)*a.Count(symbol)+float64(m)*b.Count(symbol) {
			return 0, 0, false
		}
	}
	return n, m, true
}

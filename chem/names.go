package chem

import "strings"

// nameOfCAS returns the name of a substance for a message, or the number itself.
func nameOfCAS(cas string) string {
	if s, ok := SubstanceByCAS(cas); ok {
		return s.Name
	}
	return "CAS " + cas
}

// tableMolarMass returns a molar mass of the substance table.
func tableMolarMass(cas string) (MolarMass, bool) {
	s, ok := SubstanceByCAS(cas)
	if !ok || s.MolarMass <= 0 {
		return 0, false
	}
	return s.MolarMass, true
}

// casOf returns the CAS number that a name, synonym, formula or number stands
// for, or the text itself where the substance table can't tell.
func casOf(text string) string {
	if s, ok := LookupSubstance(strings.TrimSpace(text)); ok && s.CAS != "" {
		return s.CAS
	}
	return strings.TrimSpace(text)
}

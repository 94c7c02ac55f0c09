package chem

import (
	"fmt"
	"slices"
	"strings"
	"sync"
)

// A Formation is the standard enthalpy of formation of a species at 25 °C.
type Formation struct {
	Species, Formula, CAS string
	State                 string // s, l, g or aq
	Enthalpy              MolarEnergy
	Source                string
}

var formations = sync.OnceValue(func() []Formation {
	var list []Formation
	for _, row := range readTable("formation_enthalpy.csv") {
		h, ok := row.number("delta_f_H_kJ_mol")
		if !ok || strings.Contains(row.text("formula"), "·nH2O") {
			continue // entropy only, or a strength of acid that HeatOfDilution reads
		}
		list = append(list, Formation{
			Species: row.text("species"), Formula: row.text("formula"), CAS: row.text("cas"), State: row.text("state"),
			Enthalpy: MolarEnergy(h) * KilojoulePerMole, Source: row.text("source"),
		})
	}
	return list
})

// elementStates are the reference states of the elements that turn up in bench
// reactions; their enthalpy of formation is zero by definition.
var elementStates = map[string]string{
	"H2": "g", "N2": "g", "O2": "g", "F2": "g", "Cl2": "g", "Br2": "l", "I2": "s",
	"C": "s", "S": "s", "P4": "s", "Na": "s", "K": "s", "Mg": "s", "Ca": "s", "Al": "s",
	"Fe": "s", "Cu": "s", "Zn": "s", "Mn": "s", "Cr": "s", "Ag": "s", "Sn": "s", "Ni": "s",
	"Pb": "s", "Li": "s", "Hg": "l", "Pd": "s", "Pt": "s", "Si": "s", "Ti": "s", "Ba": "s",
	"He": "g", "Ar": "g",
}

// FormationEnthalpy returns the standard enthalpy of formation at 25 °C of a
// species by name, CAS number or formula ("SO4^2-"), in a state (s, l, g, aq).
// With an empty state the species must be tabulated in one state only, except
// that an ion is taken in water. Ions stand on the scale on which H+(aq) is
// zero. Where isomers share a formula the error names them; it wraps ErrNoData.
func FormationEnthalpy(species, state string) (MolarEnergy, error) {
	f, err := FormationOf(species, state)
	return f.Enthalpy, err
}

// FormationOf is FormationEnthalpy with the row it came from.
func FormationOf(species, state string) (Formation, error) {
	of := fmt.Sprintf("enthalpy of formation of %s", species)
	if state != "" {
		of += " (" + state + ")"
	}
	want := formulaKey(species)
	if f, ok := elementFormation(want, state); ok {
		return f, nil
	}
	if state == "" && strings.ContainsAny(want, "+-") {
		state = "aq"
	}
	var found []Formation
	for _, f := range formations() {
		if f.named(species, want) && (state == "" || f.State == state) {
			found = append(found, f)
		}
	}
	switch {
	case len(found) == 1:
		return found[0], nil
	case len(found) == 0:
		return Formation{}, &DataError{Of: of, Err: ErrNoData, Limit: statesOf(species, want), Remedy: "give its enthalpy of formation in kJ/mol"}
	}
	return Formation{}, &DataError{Of: of, Err: ErrNoData, Limit: "it may be " + formationNames(found), Remedy: "name the substance and its state"}
}

// named says whether a species is this one by name, number or formula.
func (f Formation) named(species, formula string) bool {
	return strings.EqualFold(f.Species, strings.TrimSpace(species)) || (f.CAS != "" && f.CAS == species) || formulaKey(f.Formula) == formula
}

// elementFormation is zero for an element in its reference state.
func elementFormation(formula, state string) (Formation, bool) {
	reference, ok := elementStates[formula]
	if !ok || (state != "" && state != reference) {
		return Formation{}, false
	}
	return Formation{Species: formula, Formula: formula, State: reference, Source: "zero by definition: element in its reference state"}, true
}

// formulaKey brings ways to write a formula together: carets, dots for water
// and superscript signs.
func formulaKey(formula string) string {
	key := strings.NewReplacer("^", "", " ", "", "*", "·", "−", "-", "–", "-").Replace(strings.TrimSpace(formula))
	return strings.ReplaceAll(key, ".", "·")
}

// statesOf lists the states in which a species is tabulated.
func statesOf(species, formula string) string {
	var states []string
	for _, f := range formations() {
		if f.named(species, formula) && !slices.Contains(states, f.State) {
			states = append(states, f.State)
		}
	}
	if len(states) == 0 {
		return ""
	}
	return "tabulated as " + strings.Join(states, ", ")
}

func formationNames(list []Formation) string {
	names := make([]string, len(list))
	for i, f := range list {
		names[i] = fmt.Sprintf("%s (%s)", f.Species, f.State)
	}
	return strings.Join(names, ", ")
}

// A HeatPart is one ingredient of a mixture whose heat capacity is wanted.
type HeatPart struct {
	Mass         Mass
	SpecificHeat SpecificHeat
}

// MixtureHeatCapacity returns the heat capacity per mass of a mixture, the mean
// of its parts weighed by mass. Heats of mixing that change with temperature are
// left out, which costs a few per cent in strong acids and none in dilute
// solutions.
func MixtureHeatCapacity(parts ...HeatPart) (SpecificHeat, error) {
	of := "heat capacity of a mixture"
	var mass, heat float64
	for _, part := range parts {
		if !(part.Mass >= 0) || !Finite(part.Mass) {
			return 0, mustBePositive(of, "mass", part.Mass)
		}
		if err := mustBePositive(of, "heat capacity", part.SpecificHeat); err != nil {
			return 0, err
		}
		mass += float64(part.Mass)
		heat += float64(part.Mass) * float64(part.SpecificHeat)
	}
	if mass == 0 {
		return 0, mustBePositive(of, "mass", Mass(0))
	}
	return SpecificHeat(heat / mass), nil
}

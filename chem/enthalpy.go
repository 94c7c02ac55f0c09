package chem

import (
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
	hill                  string // formula in Hill order, for comparison
	charge                int
}

var formations = sync.OnceValue(func() []Formation {
	var list []Formation
	for _, row := range withMore("formation_enthalpy") {
		h, ok := row.number("delta_f_H_kJ_mol")
		if !ok || strings.Contains(row.text("formula"), "·nH2O") {
			continue // entropy only, or a strength of acid that HeatOfDilution reads
		}
		list = append(list, Formation{
			Species: row.text("species"), Formula: row.text("formula"), CAS: row.text("cas"), State: row.text("state"),
			Enthalpy: MolarEnergy(h) * KilojoulePerMole, Source: row.text("source"),
			hill: mustFormula(row.text("formula")).Hill(), charge: mustFormula(row.text("formula")).Charge(),
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
// With an empty state an ion is taken in water and anything else in the first of
// s, l, g, aq that is tabulated, which is its normal state at 25 °C. A salt, a
// hydroxide or a strong acid in water is the sum of its ions. Ions stand
// on the scale on which H⁺(aq) is zero. Where isomers share a formula the error
// names them; it wraps ErrNoData.
func FormationEnthalpy(species, state string) (MolarEnergy, error) {
	f, err := FormationOf(species, state)
	return f.Enthalpy, err
}

// FormationOf is FormationEnthalpy with the row it came from.
func FormationOf(species, state string) (Formation, error) {
	of := "enthalpy of formation of " + species
	if state != "" {
		of += " (" + state + ")"
	}
	found := formationsOf(species)
	if len(found) == 0 {
		found = formationsOf(casOf(species)) // a synonym
	}
	if state == "aq" && !slices.ContainsFunc(found, func(f Formation) bool { return f.State == "aq" }) {
		if f, ok := dissolvedFormation(species); ok {
			return f, nil
		}
	}
	if len(found) == 0 {
		return Formation{}, &DataError{Of: of, Err: ErrNoData, Remedy: "give its enthalpy of formation in kJ/mol"}
	}
	if names := speciesNames(found); len(names) > 1 {
		return Formation{}, &DataError{Of: of, Err: ErrNoData, Limit: "it may be " + strings.Join(names, " or "), Remedy: "name the substance"}
	}
	for _, wanted := range []string{state, "s", "l", "g", "aq"} {
		for _, f := range found {
			if f.State == wanted {
				return f, nil
			}
		}
		if state != "" {
			break
		}
	}
	return Formation{}, &DataError{Of: of, Err: ErrNoData, Limit: "tabulated as " + statesOf(found), Remedy: "take that state or give its enthalpy of formation in kJ/mol"}
}

// formationsOf returns all rows of a species, in every state.
func formationsOf(species string) []Formation {
	key, hill := formulaKey(species), ""
	if formula, err := ParseFormula(species); err == nil {
		hill = formula.Hill()
		key = hill
	}
	var found []Formation
	if reference, ok := elementStates[key]; ok {
		found = append(found, Formation{Species: key, Formula: key, State: reference, Source: "zero by definition: element in its reference state"})
	}
	for _, f := range formations() {
		if f.named(species) || (hill != "" && f.hill == hill && !isElement(found, f)) {
			found = append(found, f)
		}
	}
	return found
}

// isElement says whether an element's reference row of that state is listed
// already.
func isElement(found []Formation, f Formation) bool {
	return len(found) > 0 && found[0].Species == f.hill && found[0].State == f.State
}

// named says whether a word is the name or number of this species.
func (f Formation) named(word string) bool {
	word = strings.TrimSpace(word)
	return strings.EqualFold(f.Species, word) || (f.CAS != "" && f.CAS == word)
}

// speciesNames lists the different species among rows; an element counts as
// its own name.
func speciesNames(list []Formation) []string {
	var names []string
	for _, f := range list {
		if f.Formula != f.Species && !slices.Contains(names, f.Species) {
			names = append(names, f.Species)
		}
	}
	return names
}

// statesOf lists the states of rows.
func statesOf(list []Formation) string {
	var states []string
	for _, f := range list {
		if !slices.Contains(states, f.State) {
			states = append(states, f.State)
		}
	}
	return strings.Join(states, ", ")
}

// formulaKey brings ways to write a formula together: carets, dots for water
// and superscript signs.
func formulaKey(formula string) string {
	key := strings.NewReplacer("^", "", " ", "", "*", "·", "−", "-", "–", "-").Replace(strings.TrimSpace(formula))
	return strings.ReplaceAll(key, ".", "·")
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

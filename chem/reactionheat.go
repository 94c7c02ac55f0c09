package chem

import (
	"fmt"
	"strings"
)

// A ReactionHeat is the standard enthalpy of a reaction at 25 °C and where each
// part of it came from.
type ReactionHeat struct {
	Equation Equation // its coefficients AsWritten are those the enthalpy belongs to
	Enthalpy MolarEnergy
	Parts    []HeatTerm
}

// A HeatTerm is the share of one species.
type HeatTerm struct {
	Coefficient float64 // below zero on the left
	Species     string
	Formation   Formation
}

// ReactionEnthalpy returns the enthalpy of a reaction per mole of it as written,
// or, where it doesn't balance as written, with the smallest whole coefficients,
//
//	ΔH = Σ ν · ΔfH(products) − Σ ν · ΔfH(reactants)
//
// A state in brackets behind a species counts;
// without one FormationEnthalpy says which is taken. Given holds, by the formula
// as written, an enthalpy the user gives or the name of the isomer that is
// meant; it may be nil. Source: OpenStax Chemistry 2e, 5.3 (Hess's law).
func ReactionEnthalpy(e Equation, given map[string]FormationGiven) (ReactionHeat, error) {
	balanced := e
	if e.Balanced() != nil {
		var err error
		if balanced, err = Balance(e); err != nil {
			return ReactionHeat{}, err
		}
	}
	heat := ReactionHeat{Equation: balanced}
	for i, side := range [2][]Term{balanced.Left, balanced.Right} {
		for _, term := range side {
			f, err := formationIn(term, given)
			if err != nil {
				return ReactionHeat{}, err
			}
			coefficient := float64(term.Coefficient) / float64(max(balanced.Written, 1))
			if i == 0 {
				coefficient = -coefficient
			}
			heat.Parts = append(heat.Parts, HeatTerm{coefficient, term.Species, f})
			heat.Enthalpy += MolarEnergy(coefficient) * f.Enthalpy
		}
	}
	return heat, nil
}

// A FormationGiven is what a user says about a species: its enthalpy of
// formation, or which substance it is.
type FormationGiven struct {
	Enthalpy MolarEnergy
	Name     string // empty where Enthalpy counts
}

// formationIn finds the enthalpy of formation of a term.
func formationIn(term Term, given map[string]FormationGiven) (Formation, error) {
	bare := strings.TrimSuffix(term.Species, "("+term.Formula.State()+")")
	for _, key := range []string{term.Species, bare} {
		user, ok := given[key]
		switch {
		case ok && user.Name == "":
			return Formation{Species: bare, Formula: bare, State: term.Formula.State(), Enthalpy: user.Enthalpy, Source: "given"}, nil
		case ok:
			f, err := FormationOf(user.Name, term.Formula.State())
			if err == nil && f.hill != term.Formula.Hill() {
				return Formation{}, &DataError{Of: "enthalpy of formation of " + bare, Err: ErrNoData, Limit: fmt.Sprintf("%s is %s", user.Name, f.Formula), Remedy: "name a substance of that formula"}
			}
			return f, err
		}
	}
	return FormationOf(bare, term.Formula.State())
}

// Of returns the heat that an extent of the reaction gives off: above zero where
// it warms its surroundings.
func (r ReactionHeat) Of(extent Amount) Energy {
	return Energy(-float64(r.Enthalpy) * float64(extent))
}

// Inserted writes the sum with its numbers, in kJ/mol.
func (r ReactionHeat) Inserted() string {
	var sides [2][]string
	for _, part := range r.Parts {
		i, n := 0, part.Coefficient
		if n < 0 {
			i, n = 1, -n
		}
		sides[i] = append(sides[i], fmt.Sprintf("%g·(%.5g)", n, float64(part.Formation.Enthalpy)/1e3))
	}
	return fmt.Sprintf("[%s] − [%s] = %.5g kJ/mol", strings.Join(sides[0], " + "), strings.Join(sides[1], " + "), float64(r.Enthalpy)/1e3)
}

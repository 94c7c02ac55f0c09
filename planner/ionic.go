package planner

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"stillroom/chem"
)

// ionicEnthalpy returns the enthalpy of a reaction written in ions, per mole of
// its first species, in J/mol, from enthalpies of formation at 25 °C. A species
// is a name, a CAS number or a formula and may name its state in brackets,
// "carbon dioxide(g)"; ions are taken in water. A reaction that doesn't balance
// is refused.
func ionicEnthalpy(consumes, forms []Term) (perMole float64, source string, err error) {
	var names []string
	sums := map[string]float64{}
	heat := 0.0
	add := func(t Term, sign float64) error {
		species, state := splitState(t.Substance)
		f, err := chem.FormationOf(species, state)
		if err != nil {
			return err
		}
		formula, err := chem.ParseFormula(f.Formula)
		if err != nil {
			return err
		}
		for _, e := range formula.Elements() {
			sums[e.Symbol] += sign * t.Number * e.Count
		}
		sums["charge"] += sign * t.Number * float64(formula.Charge())
		heat += sign * t.Number * float64(f.Enthalpy)
		names = append(names, species)
		return nil
	}
	for _, t := range forms {
		if err := add(t, 1); err != nil {
			return 0, "", err
		}
	}
	for _, t := range consumes {
		if err := add(t, -1); err != nil {
			return 0, "", err
		}
	}
	if name, off := worstOff(sums); off > balanceTolerance {
		return 0, "", fmt.Errorf("%s differs by %.6g between the sides", name, off)
	}
	return heat / consumes[0].Number, "enthalpies of formation at 25 °C of " + strings.Join(names, ", "), nil
}

func worstOff(sums map[string]float64) (name string, off float64) {
	var names []string
	for n := range sums {
		names = append(names, n)
	}
	slices.Sort(names)
	for _, n := range names {
		if x := math.Abs(sums[n]); x > off {
			name, off = n, x
		}
	}
	return name, off
}

func splitState(species string) (name, state string) {
	for _, state := range []string{"s", "l", "g", "aq"} {
		if name, ok := strings.CutSuffix(species, "("+state+")"); ok {
			return name, state
		}
	}
	return species, ""
}

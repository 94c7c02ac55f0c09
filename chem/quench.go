package chem

import (
	"fmt"
	"strings"
)

// A Quench asks how left-over oxidant is destroyed and its metal brought down.
type Quench struct {
	Oxidant   string   // name, formula or CAS number, "chromium(VI)" to count atoms
	Amount    Amount   // of the oxidant as named, still unreduced
	Reductant string   // name, formula or CAS number
	Excess    Fraction // of reductant beyond theory: 0.1 is 10 %
	// Reduced is the amount of the metal that is in the waste already reduced, by
	// the reaction: it needs base and gives sludge, but no reductant.
	Reduced Amount
	// FreeAcid is the H⁺ in the waste before the reduction.
	FreeAcid Amount
}

// A Quenching is what it takes to destroy an oxidant.
type Quenching struct {
	Oxidant, Reductant RedoxAgent
	Reductants         Amount // of reductant, excess included
	ReductantMass      Mass
	// Protons is the H⁺ that the reduction uses; below zero where it sets acid
	// free. Acid is the H⁺ to add because the waste has too little of it; none
	// where the oxidant must not be reduced in acid.
	Protons, Acid Amount
	SulfuricAcid  Mass   // that gives Acid, as pure H2SO4 with both protons
	Hydroxide     Amount // OH⁻ for the hydroxides and what acid is left
	BaseMass      Mass   // of sodium hydroxide that gives it
	SludgeMass    Mass   // dry, as hydroxide or oxide
	// SulfurDioxide is the gas that the excess of a sulfite could give off in
	// acid, at worst.
	SulfurDioxide Amount
	Equation      string // balanced, as ions
	Cautions      []string
	Source        string
}

// Quenching works out the reductant, acid, base and sludge,
//
//	n(reductant) = n(oxidant) · e(oxidant)/e(reductant) · (1 + excess)
//	n(OH⁻)       = z · n(metal) + acid left over
//
// where e are the electrons per formula unit and z the hydroxide ions per metal
// ion. The theoretical amount of reductant uses up or sets free acid as the
// half-reactions say. Sources: half-reactions and windows in redox_agents.csv;
// Beukes et al., Water SA 25 (1999) 363.
func (q Quench) Quenching() (Quenching, error) {
	oxidant, err := OxidantOf(q.Oxidant)
	if err != nil {
		return Quenching{}, err
	}
	reductant, err := ReductantOf(q.Reductant)
	if err != nil {
		return Quenching{}, err
	}
	if err := q.check(); err != nil {
		return Quenching{}, err
	}
	theory := q.Amount * Amount(oxidant.Electrons) / Amount(reductant.Electrons)
	w := Quenching{Oxidant: oxidant, Reductant: reductant, Reductants: theory * Amount(1+q.Excess), Source: oxidant.Source}
	w.ReductantMass = reductant.Formula.MolarMass().Mass(w.Reductants)
	w.Protons = q.Amount*Amount(oxidant.Protons) + theory*Amount(reductant.Protons)
	left := q.FreeAcid - w.Protons
	if left < 0 {
		left = 0
		if oxidant.ReduceIn == "acid" { // acid on hypochlorite or chlorite would set gas free
			w.Acid = w.Protons - q.FreeAcid
		}
	}
	w.SulfuricAcid = mustFormula("H2SO4").MolarMass().Mass(w.Acid / 2)
	w.Hydroxide = left
	w.bringDown(oxidant, q.Amount*Amount(oxidant.MetalAtoms)+q.Reduced)
	w.bringDown(reductant, w.Reductants*Amount(reductant.MetalAtoms))
	w.BaseMass = mustFormula("NaOH").MolarMass().Mass(w.Hydroxide)
	if sulfur := reductant.Formula.Count("S"); sulfur > 0 && reductant.Metal == "" {
		w.SulfurDioxide = (w.Reductants - theory) * Amount(sulfur)
	}
	w.Equation = quenchEquation(oxidant, reductant)
	w.Cautions = q.cautions(w)
	return w, nil
}

// check refuses amounts that no waste has.
func (q Quench) check() error {
	of := "destroying " + q.Oxidant
	if err := mustBePositive(of, "amount of oxidant", q.Amount); err != nil {
		return err
	}
	if !(q.Excess >= 0) || !(q.Reduced >= 0) || !(q.FreeAcid >= 0) || !Finite(float64(q.Excess)+float64(q.Reduced)+float64(q.FreeAcid)) {
		return &DataError{Of: of, Err: ErrOutOfRange, Limit: "excess, reduced metal and free acid must not be below zero", Remedy: "give excess as 10 %"}
	}
	return nil
}

// bringDown adds the base for a metal and its dry sludge.
func (w *Quenching) bringDown(a RedoxAgent, metal Amount) {
	if a.Metal == "" {
		return
	}
	w.Hydroxide += metal * Amount(a.HydroxidePerMetal)
	w.SludgeMass += a.Sludge.MolarMass().Mass(metal)
}

// quenchEquation adds the two half-reactions and balances them.
func quenchEquation(oxidant, reductant RedoxAgent) string {
	taken, _ := ParseEquation(oxidant.Half)
	given, _ := ParseEquation(reductant.Half)
	var sum Equation
	for i, side := range [2][]Term{append(taken.Left, given.Left...), append(taken.Right, given.Right...)} {
		for _, term := range side {
			if term.Formula.Electron() || term.Formula.Hill() == "H2O" || term.Formula.Hill() == "H^+" {
				continue
			}
			if i == 0 {
				sum.Left = append(sum.Left, term)
			} else if !hasSpecies(sum.Right, term.Species) {
				sum.Right = append(sum.Right, term)
			}
		}
	}
	return withWaterAndProtons(sum)
}

func hasSpecies(terms []Term, species string) bool {
	for _, term := range terms {
		if term.Species == species {
			return true
		}
	}
	return false
}

// withWaterAndProtons balances a redox reaction in water: protons and water go
// to the sides on which they come out positive.
func withWaterAndProtons(e Equation) string {
	proton := Term{Coefficient: 1, Species: "H^+", Formula: mustFormula("H^+")}
	water := Term{Coefficient: 1, Species: "H2O", Formula: mustFormula("H2O")}
	for way := range 9 {
		try := Equation{Left: append([]Term(nil), e.Left...), Right: append([]Term(nil), e.Right...)}
		for i, term := range [2]Term{proton, water} {
			switch (way / [2]int{1, 3}[i]) % 3 {
			case 0:
				try.Right = append(try.Right, term)
			case 1:
				try.Left = append(try.Left, term)
			}
		}
		if balanced, err := Balance(try); err == nil {
			return balanced.String()
		}
	}
	return ""
}

// cautions are what belongs beside the figures.
func (q Quench) cautions(w Quenching) []string {
	cautions := []string{
		fmt.Sprintf("Reduce at pH %g to %g, in portions, stirred and cooled; prove by test that no oxidant is left.", w.Oxidant.ReduceLow, w.Oxidant.ReduceHigh),
	}
	for _, text := range []string{w.Oxidant.Caution, w.Reductant.Caution} {
		if text != "" {
			cautions = append(cautions, strings.ToUpper(text[:1])+text[1:]+".")
		}
	}
	if w.Oxidant.ReduceIn != "acid" && w.Protons > 0 {
		cautions = append(cautions, "The half-reactions use up acid, so the pH rises by itself; don't add acid.")
	}
	if w.Oxidant.SludgeHigh > 0 {
		cautions = append(cautions, fmt.Sprintf("Bring the metal down at pH %g to %g.", w.Oxidant.SludgeLow, w.Oxidant.SludgeHigh))
	}
	if w.Oxidant.Metal == "Cr" {
		cautions = append(cautions,
			"Chromium hydroxide comes down best at pH 8 to 9 and dissolves again above about 11.",
			"Acetate, citrate, oxalate and other carboxylates hold chromium(III) in solution, the product's own acid among them: check that the filtrate is colourless and test it.")
	}
	return append(cautions, "Treating waste may need a permit: local rules and the safety officer decide.")
}

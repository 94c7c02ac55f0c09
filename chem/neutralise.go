package chem

import (
	"fmt"
	"math"
	"slices"
	"strings"
)

// neutralised is the pKa up to which a proton counts as neutralised by a base that
// is worth adding: the second step of phosphoric acid does, the third doesn't.
const neutralised = 8

// AcidProtons returns how many protons one molecule of an acid gives off when it is
// neutralised: the steps with a pKa up to 8. Without constants a name ending in
// "dioic acid" or "oic acid" counts two or one, as the nomenclature has it, and
// assumed says so. The error wraps ErrNoData where neither helps.
func AcidProtons(name, cas string, f Formula) (protons float64, assumed string, err error) {
	e, err := ElectrolyteOf(name, cas, f)
	if err == nil {
		for _, a := range e.Acids {
			for _, pKa := range a.Acid.PKa {
				if pKa <= neutralised {
					protons += a.Count
				}
			}
			protons -= a.Count * float64(a.Acid.Charge) // a base brings none of its own
		}
		if protons -= e.Strong; protons > 0 {
			return protons, "", nil
		}
		return 0, "", noData("acid proton", name, "it is no acid that a base neutralises; give protons= if it is")
	}
	switch {
	case strings.HasSuffix(name, "dioic acid"):
		return 2, "two acid protons taken from the name", nil
	case strings.HasSuffix(name, "oic acid"):
		return 1, "one acid proton taken from the name", nil
	}
	return 0, "", noData("number of acid protons", name, "give protons=")
}

// A Base is what one formula of a base does to an acid.
type Base struct {
	Protons   float64 // taken up
	Carbonate float64 // as CO3²⁻: takes a proton before any gas leaves
	Hydrogen  float64 // as HCO3⁻
	Water     float64 // formed on neutralisation with just enough acid
}

// BaseOf says what one formula of a base takes up: hydroxides, oxides, carbonates and
// hydrogencarbonates of the metals of groups 1 and 2, ammonia and amines. Others are
// refused with an error that wraps ErrNoData.
func BaseOf(name, cas string, f Formula) (Base, error) {
	if f.Hill() == mustFormula("NH4OH").Hill() {
		return Base{Protons: 1, Water: 1}, nil // ammonia in water, written as the hydroxide
	}
	e, err := ElectrolyteOf(name, cas, f)
	if err != nil {
		return hydroxideBase(name, f)
	}
	b := Base{Protons: e.Strong, Water: e.Strong}
	if f.Count("O") > 0 && e.Strong > 0 && f.Anhydrous().Count("H") == 0 && f.Count("C") == 0 {
		b.Water = e.Strong / 2 // an oxide: two protons make one water
	}
	for _, a := range e.Acids {
		switch {
		case a.Acid.Charge == 1 && e.Strong == 0:
			b.Protons += a.Count
		case a.Acid.CAS == "463-79-6":
			b.Hydrogen = 2*a.Count - e.Strong
			b.Carbonate = a.Count - b.Hydrogen
			b.Water = a.Count
		default:
			return Base{}, noData("base", name, "known are hydroxides, oxides, carbonates, hydrogencarbonates, ammonia and amines")
		}
	}
	if !(b.Protons > 0) || b.Hydrogen < 0 || b.Carbonate < 0 {
		return Base{}, noData("base", name, "it takes up no protons; known are hydroxides, oxides, carbonates, hydrogencarbonates, ammonia and amines")
	}
	return b, nil
}

// amphoteric are metals whose hydroxides and oxides take up acid, with their charge;
// alkali dissolves most of them again.
var amphoteric = map[string]float64{"Al": 3, "Zn": 2}

// hydroxideBase is BaseOf for the hydroxides and oxides of aluminium and zinc.
func hydroxideBase(name string, f Formula) (Base, error) {
	dry := f.Anhydrous()
	for symbol, charge := range amphoteric {
		protons := charge * dry.Count(symbol)
		oxygen, hydrogen := dry.Count("O"), dry.Count("H")
		if protons > 0 && 2*oxygen-hydrogen == protons && nothingElse(dry, symbol, "O", "H") {
			return Base{Protons: protons, Water: (protons + hydrogen) / 2}, nil
		}
	}
	return Base{}, noData("base", name, "known are hydroxides, oxides, carbonates, hydrogencarbonates, ammonia and amines")
}

// nothingElse reports whether a formula holds no other elements.
func nothingElse(f Formula, symbols ...string) bool {
	return !slices.ContainsFunc(f.Elements(), func(e ElementCount) bool { return !slices.Contains(symbols, e.Symbol) })
}

// AcidWaters returns the waters that one formula of an acid brings along and that its
// salt hasn't: those of hydration, less those that an anhydride such as sulfur dioxide
// takes up first.
func AcidWaters(name, cas string, f Formula) float64 {
	e, err := ElectrolyteOf(name, cas, f)
	if err != nil {
		return f.Waters()
	}
	return f.Waters() - e.Water
}

// Neutralised is the outcome of neutralising an acid.
type Neutralised struct {
	Base          Mass   // to weigh in, excess included
	BaseAmount    Amount // excess included
	CarbonDioxide Amount
	Salt          Mass // anhydrous, without the excess of base
}

// Neutralise returns what it takes to neutralise an amount of acid with so many
// protons:
//
//	n(base) = n(acid) · protons(acid) / protons(base) · (1 + excess)
//
// and what comes of it. acidMass is that of the acid without water (AcidWaters). The salt is the acid and the base (anhydrous) less the water
// and the carbon dioxide. Excess carbonate keeps carbon dioxide back as
// hydrogencarbonate; excess hydrogencarbonate doesn't.
func Neutralise(acid Amount, acidMass MolarMass, protons float64, base Base, baseMass, anhydrous MolarMass, excess Fraction) (Neutralised, error) {
	if !(acid >= 0) || !Finite(acid) || !(excess >= 0) || !Finite(excess) {
		return Neutralised{}, fmt.Errorf("neutralise: amount %v mol and excess %v must be 0 or more", float64(acid), float64(excess))
	}
	if !(protons > 0) || math.IsInf(protons, 0) {
		return Neutralised{}, fmt.Errorf("neutralise: %v acid protons; want a number above 0", protons)
	}
	toGive := acid * Amount(protons)
	just := toGive / Amount(base.Protons)
	taken := just * Amount(1+excess)
	gas := CarbonDioxideFrom(taken*Amount(base.Carbonate), taken*Amount(base.Hydrogen), toGive)
	whole := just * Amount(base.Carbonate+base.Hydrogen)
	salt := acidMass.Mass(acid) + anhydrous.Mass(just) -
		MolarMass(waterMolarMass).Mass(just*Amount(base.Water)) - carbonDioxideMass.Mass(whole)
	return Neutralised{baseMass.Mass(taken), taken, gas, salt}, nil
}

// carbonDioxideMass is the molar mass of CO2 (abridged atomic weights, IUPAC 2021).
const carbonDioxideMass = MolarMass(44.009e-3)

package chem

import (
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"
)

// An Electrolyte is what one formula of a substance becomes in water: a weak acid
// or base with its forms, and strong ions.
type Electrolyte struct {
	Acids []AcidCount
	// Strong is the charge of the metal ions of one formula: 2 for Na2CO3.
	Strong float64
	// Ions is half the sum of the squares of their charges.
	Ions float64
	// Water is what one formula of an anhydride takes up: 1 for sulfur dioxide.
	Water float64
}

// AcidCount is how often an acid is in one formula, in whatever form.
type AcidCount struct {
	Acid  *Acid
	Count float64
}

// strongCations are metals whose ions stay as they are in water up to pH 10 or
// more, with their charge.
var strongCations = map[string]float64{
	"Li": 1, "Na": 1, "K": 1, "Rb": 1, "Cs": 1, "Mg": 2, "Ca": 2, "Sr": 2, "Ba": 2,
}

// ElectrolyteOf takes a substance apart for a charge balance. A CAS number that the
// acid table knows decides; otherwise the formula does: metal ions of groups 1 and
// 2 are taken off as strong ions, ammonia for each NH4, protons put on until the
// rest is a neutral molecule, and that is looked up, whole or as several of one
// acid, an anhydride as dichromate or metabisulfite with the water that it takes up;
// isomers of an organic anion are taken for the one in the table. So Na2CO3 is two Na⁺ and carbonic acid, NaOH one Na⁺ and water, CaCl2 one
// Ca²⁺ and two hydrochloric acids, and an ion written by itself is what it brings.
// A *DataError says what couldn't be found; metals that take part in acid–base
// equilibria themselves, such as iron, are refused so too.
func ElectrolyteOf(name, cas string, f Formula) (Electrolyte, error) {
	if a, ok := AcidByCAS(cas); ok {
		whole := Electrolyte{Acids: []AcidCount{{a, 1}}}
		if dry := f.Anhydrous(); len(dry.Elements()) > 0 && dry.Count("H") == 0 {
			whole.Water = a.Formula.Count("H") / 2
		}
		return whole, nil
	}
	counts := make(map[string]float64)
	for _, e := range f.Anhydrous().Elements() {
		counts[e.Symbol] += e.Count
	}
	if len(counts) == 0 {
		return Electrolyte{}, noAcid(name, "its formula isn't known")
	}
	var parts Electrolyte
	protons := -float64(f.Charge())
	parts.Strong, parts.Ions = StrongIonsOf(f)
	protons += parts.Strong
	for symbol := range strongCations {
		delete(counts, symbol)
	}
	if ammonium := ammoniumIn(f.String()); ammonium > 0 && counts["N"] >= ammonium {
		counts["N"] -= ammonium
		counts["H"] -= 3 * ammonium
		ammonia, _ := AcidByCAS("7664-41-7")
		parts.Acids = append(parts.Acids, AcidCount{ammonia, ammonium})
	}
	counts["H"] += protons
	for symbol, n := range counts {
		if n == 0 {
			delete(counts, symbol)
		}
	}
	if len(counts) == 0 || isWaters(counts) {
		return parts, nil
	}
	acid, n := acidIn(counts)
	for waters := 1; acid == nil && waters <= 3; waters++ { // an anhydride takes up water
		counts["H"], counts["O"] = counts["H"]+2, counts["O"]+1
		acid, n = acidIn(counts)
		parts.Water = float64(waters)
	}
	isSalt := parts.Strong > 0 || len(parts.Acids) > 0 || f.Charge() != 0
	if acid == nil || (!isSalt && acid.isOrganic() && !acid.toldApart(name, f.String())) {
		return Electrolyte{}, noAcid(name, "it is no acid or base of the table")
	}
	parts.Acids = append(parts.Acids, AcidCount{acid, n})
	return parts, nil
}

// StrongIonsOf returns the charge of the metal ions of groups 1 and 2 in one formula,
// and half the sum of the squares of their charges.
func StrongIonsOf(f Formula) (charge, ions float64) {
	for symbol, z := range strongCations {
		n := f.Count(symbol)
		charge += n * z
		ions += n * z * z / 2
	}
	return charge, ions
}

// noAcid refuses a substance for want of constants.
func noAcid(name, why string) error {
	return noData("acid dissociation", name, why+"; give pka=, or leave out what neither gives nor takes protons")
}

// isOrganic reports whether other molecules than this acid may have its
// composition, as methyl formate has that of acetic acid.
func (a *Acid) isOrganic() bool { return a.Formula.Count("C") > 1 }

// toldApart reports whether an organic acid is told from its isomers by the name, as that
// of its hydrate, or by a formula written with its carboxyl group.
func (a *Acid) toldApart(name, formula string) bool {
	return strings.HasPrefix(strings.ToLower(name), a.Name) ||
		strings.Contains(formula, "COOH") || strings.Contains(formula, "CO2H")
}

// saltCations are the ions that the name of a salt may begin with.
var saltCations = map[string]string{"lithium": "Li", "sodium": "Na", "potassium": "K", "rubidium": "Rb", "caesium": "Cs", "ammonium": "NH4"}

// ElectrolyteOfSalt takes a salt apart by its name: "sodium pentanoate" into one
// cation of charge one and the anion of an acid with one proton that the table has,
// "aniline hydrochloride", "anilinium chloride" and "methylammonium chloride" into
// the amine and hydrogen chloride.
func ElectrolyteOfSalt(name string) (Electrolyte, bool) {
	name = strings.ToLower(strings.TrimSpace(name))
	if salt, ok := amineSalt(name); ok {
		return salt, true
	}
	first, rest, _ := strings.Cut(name, " ")
	cation := saltCations[first]
	stem, isAnion := strings.CutSuffix(rest, "ate")
	if cation == "" || !isAnion {
		return Electrolyte{}, false
	}
	a, ok := AcidByName(stem + "ic acid")
	if !ok || a.Charge != 0 || len(a.PKa) != 1 {
		return Electrolyte{}, false
	}
	salt := Electrolyte{Acids: []AcidCount{{a, 1}}}
	if ammonia, _ := AcidByCAS("7664-41-7"); cation == "NH4" {
		salt.Acids = append(salt.Acids, AcidCount{ammonia, 1})
	} else {
		salt.Strong, salt.Ions = 1, 0.5
	}
	return salt, true
}

// amineSalt takes the salt of an amine and hydrogen chloride apart.
func amineSalt(name string) (Electrolyte, bool) {
	var amine string
	if stem, ok := strings.CutSuffix(name, " hydrochloride"); ok {
		amine = stem
	} else if stem, ok := strings.CutSuffix(name, "ammonium chloride"); ok && stem != "" {
		amine = stem + "amine"
	} else if stem, ok := strings.CutSuffix(name, "ium chloride"); ok {
		amine = stem + "e"
	}
	base, ok := AcidByName(amine)
	if amine == "" || !ok || base.Charge != 1 || len(base.PKa) != 1 {
		return Electrolyte{}, false
	}
	hydrogenChloride, ok := AcidByCAS("7647-01-0")
	return Electrolyte{Acids: []AcidCount{{base, 1}, {hydrogenChloride, 1}}}, ok
}

// ammoniumIn counts the ammonium ions that a formula is written with.
func ammoniumIn(text string) float64 {
	var n float64
	for i := strings.Index(text, "NH4"); i >= 0; {
		count := 1.0
		rest := text[i+3:]
		if strings.HasPrefix(rest, ")") {
			if _, err := fmt.Sscanf(rest[1:], "%g", &count); err != nil {
				count = 1
			}
		}
		n += count
		next := strings.Index(rest, "NH4")
		if next < 0 {
			break
		}
		i += 3 + next
	}
	return n
}

// isWaters reports whether what is left is water, as of a hydroxide or an oxide.
func isWaters(counts map[string]float64) bool {
	return len(counts) == 2 && counts["O"] > 0 && counts["H"] == 2*counts["O"]
}

// acidIn finds the acid that a composition is one, two or more molecules of.
func acidIn(counts map[string]float64) (*Acid, float64) {
	for n := 1.0; n <= 6; n++ {
		part := make(map[string]float64, len(counts))
		whole := true
		for symbol, count := range counts {
			part[symbol] = count / n
			whole = whole && count > 0 && math.Abs(count/n-math.Round(count/n)) < 1e-9
		}
		if !whole {
			continue
		}
		if a := acids().byComposition[hillOf(part)]; a != nil {
			return a, n
		}
	}
	return nil, 0
}

// hillOf writes a composition in Hill order.
func hillOf(counts map[string]float64) string {
	var b strings.Builder
	write := func(symbol string) {
		n := int(math.Round(counts[symbol]))
		if n == 0 {
			return
		}
		b.WriteString(symbol)
		if n > 1 {
			fmt.Fprint(&b, n)
		}
		delete(counts, symbol)
	}
	if counts["C"] > 0 {
		write("C")
		write("H")
	}
	for _, symbol := range slices.Sorted(maps.Keys(counts)) {
		write(symbol)
	}
	return b.String()
}

package chem

import (
	"cmp"
	"math"
	"slices"
	"strconv"
	"strings"
)

// Formula is a parsed chemical formula: the atoms, the charge, the state and
// the waters of hydration. Its zero value is an empty formula. A Formula may be
// copied and is never changed after parsing.
type Formula struct {
	text   string
	parts  []part // what the dots separate, in the order written
	atoms  []atom // all parts together, in order of first appearance
	charge int
	state  string
	mass   float64 // g/mol; 0 if it has none
	spread float64 // standard uncertainty of mass, g/mol
	lacks  string  // why it has no molar mass; empty if it has one
}

// part is what stands between two dots: "5H2O" of CuSO4·5H2O.
type part struct {
	count    ratio
	variable bool   // the count is written x
	atoms    []atom // of one such part
	from, to int    // where it stands in the text, its dot included
}

// atom is a number of atoms of one element or nuclide.
type atom struct {
	z     uint8
	a     uint16 // mass number; 0 for the natural mixture
	count ratio
}

// ElementCount is the number of atoms of one element in a formula. Symbol is
// the element's symbol, D or T for the heavy hydrogens, or a nuclide in
// brackets such as "[13C]".
type ElementCount struct {
	Symbol string
	Count  float64
}

// MolarMass returns the molar mass by the abridged standard atomic weights of
// IUPAC. It is 0 if the formula has none; Weighable says why.
func (f Formula) MolarMass() MolarMass { return MolarMass(f.mass) * GramPerMole }

// Uncertainty returns the standard uncertainty of the molar mass:
//
//	u² = Σ (n u(Aᵣ))²
//
// with n the number of atoms of an element, whose atoms all share one error,
// and independent errors of different elements.
func (f Formula) Uncertainty() MolarMass { return MolarMass(f.spread) * GramPerMole }

// Weighable returns nil if the formula has a molar mass, otherwise an error
// that says what it lacks: an element without a standard atomic weight, a
// nuclide without a tabulated mass, or a variable number of waters.
func (f Formula) Weighable() error {
	if f.lacks == "" {
		return nil
	}
	return &FormulaError{Text: f.text, What: f.lacks, Cause: ErrNoMolarMass}
}

// Charge returns the charge number: -2 for sulfate.
func (f Formula) Charge() int { return f.charge }

// State returns "s", "l", "g" or "aq", or "" if the formula states none.
func (f Formula) State() string { return f.state }

// Elements returns the atoms of the whole formula, waters included, in the order
// in which the elements first appear.
func (f Formula) Elements() []ElementCount {
	counts := make([]ElementCount, len(f.atoms))
	for i, a := range f.atoms {
		counts[i] = ElementCount{a.symbol(), a.count.float()}
	}
	return counts
}

// Count returns the number of atoms of an element, 0 if there are none.
func (f Formula) Count(symbol string) float64 {
	for _, a := range f.atoms {
		if a.symbol() == symbol {
			return a.count.float()
		}
	}
	return 0
}

// Waters returns the number of waters of hydration: 2 for Na2Cr2O7·2H2O. A
// variable number counts as 0; Variable tells the two apart.
func (f Formula) Waters() float64 {
	var sum float64
	for i, p := range f.parts {
		if i > 0 && p.isWater() && !p.variable {
			sum += p.count.float()
		}
	}
	return sum
}

// Variable reports whether a part has an unknown number, as in RuCl3·xH2O.
func (f Formula) Variable() bool {
	return slices.ContainsFunc(f.parts, func(p part) bool { return p.variable })
}

// Electron reports whether the formula is the electron, e^-.
func (f Formula) Electron() bool { return f.charge == -1 && len(f.atoms) == 0 && f.text != "" }

// Anhydrous returns the formula without its waters of hydration; a formula
// without any comes back as it is.
func (f Formula) Anhydrous() Formula {
	var kept []part
	var text strings.Builder
	end := 0
	for i, p := range f.parts {
		if i == 0 || !p.isWater() {
			kept = append(kept, p)
			continue
		}
		text.WriteString(f.text[end:p.from])
		end = p.to
	}
	if len(kept) == len(f.parts) {
		return f
	}
	dry := f
	dry.parts = kept
	dry.text = text.String() + f.text[end:]
	dry.total()
	return dry
}

// Hill returns the formula in the order of Hill: carbon, hydrogen, then the
// others by their symbols, or all by their symbols if there is no carbon. Parts
// separated by dots stay apart, and the charge follows: "Cr2Na2O7·2H2O".
func (f Formula) Hill() string {
	if f.Electron() {
		return "e^-"
	}
	var b strings.Builder
	for i, p := range f.parts {
		if i > 0 {
			b.WriteString("·")
			b.WriteString(p.factor())
		}
		if p.isWater() && i > 0 {
			b.WriteString("H2O")
			continue
		}
		for _, a := range hillOrder(p.atoms) {
			b.WriteString(a.symbol())
			if a.count != one {
				b.WriteString(subscriptText(a.count))
			}
		}
	}
	b.WriteString(chargeText(f.charge))
	return b.String()
}

// factor returns the number in front of a part, empty for one.
func (p part) factor() string {
	switch {
	case p.variable:
		return "x"
	case p.count == one:
		return ""
	}
	return p.count.text()
}

func (p part) isWater() bool {
	if len(p.atoms) != 2 {
		return false
	}
	h, o := p.atoms[0], p.atoms[1]
	if h.z == 8 {
		h, o = o, h
	}
	return h == atom{1, 0, ratio{2, 1}} && o == atom{8, 0, one}
}

func hillOrder(atoms []atom) []atom {
	carbon := slices.ContainsFunc(atoms, func(a atom) bool { return a.z == 6 })
	rank := func(a atom) int {
		switch {
		case carbon && a.z == 6:
			return 0
		case carbon && a.z == 1:
			return 1
		}
		return 2
	}
	ordered := slices.Clone(atoms)
	slices.SortStableFunc(ordered, func(x, y atom) int {
		return cmp.Or(cmp.Compare(rank(x), rank(y)), cmp.Compare(elementSymbol(x.z), elementSymbol(y.z)),
			cmp.Compare(x.a, y.a))
	})
	return ordered
}

func elementSymbol(z uint8) string { return elements().byNumber[z].Symbol }

func (a atom) symbol() string {
	switch {
	case a.a == 0:
		return elementSymbol(a.z)
	case a.z == 1 && a.a == 2:
		return "D"
	case a.z == 1 && a.a == 3:
		return "T"
	}
	return "[" + strconv.Itoa(int(a.a)) + elementSymbol(a.z) + "]"
}

// total fills in the atoms of all parts together and the molar mass. It returns
// false if a count leaves the bounds of a formula.
func (f *Formula) total() bool {
	f.mass, f.spread, f.lacks = 0, 0, ""
	f.atoms = f.parts[0].atoms
	if len(f.parts) > 1 || f.parts[0].count != one {
		var all []atom
		for _, p := range f.parts {
			if p.variable {
				f.lacks = "the number of waters is not fixed"
				continue
			}
			for _, a := range p.atoms {
				var ok bool
				if a.count, ok = a.count.times(p.count); !ok {
					return false
				}
				all = append(all, a)
			}
		}
		var ok bool
		if f.atoms, ok = merge(all); !ok {
			return false
		}
	}
	f.weigh()
	return true
}

// weigh sums the molar mass, unless something has no weight.
func (f *Formula) weigh() {
	t := elements()
	var mass, variance float64
	for _, a := range f.atoms {
		weight, u := t.byNumber[a.z].AtomicWeight, t.byNumber[a.z].StandardUncertainty()
		if a.a != 0 {
			n := t.nuclides[[2]uint16{uint16(a.z), a.a}]
			weight, u = n.mass, n.uncertainty
		}
		if weight == 0 {
			f.lacks = lacksWeight(a, t)
		}
		n := a.count.float()
		mass += n * weight
		variance += (n * u) * (n * u)
	}
	if len(f.atoms) == 0 {
		f.lacks = "it holds no atoms"
	}
	if f.lacks == "" {
		f.mass, f.spread = mass, math.Sqrt(variance)
	}
}

func lacksWeight(a atom, t *elementTable) string {
	if a.a != 0 {
		return "the table of nuclides has no mass for " + a.symbol() + "; give molar_mass"
	}
	return "IUPAC assigns " + t.byNumber[a.z].Name + " no standard atomic weight; give molar_mass"
}

// merge adds up the atoms of one kind, keeping the order of first appearance.
func merge(atoms []atom) ([]atom, bool) {
	merged := make([]atom, 0, len(atoms))
next:
	for _, a := range atoms {
		for i := range merged {
			if merged[i].z == a.z && merged[i].a == a.a {
				var ok bool
				if merged[i].count, ok = merged[i].count.plus(a.count); !ok {
					return nil, false
				}
				continue next
			}
		}
		merged = append(merged, a)
	}
	return merged, true
}

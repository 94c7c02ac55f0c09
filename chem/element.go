package chem

import (
	"math"
	"strconv"
	"sync"
)

// Element is one row of the periodic table with its abridged standard atomic
// weight.
type Element struct {
	Number int    // atomic number
	Symbol string // "Na"
	Name   string // "sodium"
	// AtomicWeight is the abridged standard atomic weight; 0 where IUPAC
	// assigns none, as to technetium.
	AtomicWeight float64
	// Bound is the figure printed with ± after the abridged value: the value in
	// any normal material lies within it.
	Bound  float64
	Source string
}

// StandardUncertainty returns the standard uncertainty of the atomic weight.
// The ± bound is read as the half width of a rectangular distribution, as the
// IUPAC report on the standard atomic weights recommends (Possolo et al., Pure
// Appl. Chem. 90 (2018) 395; title and rule from memory).
func (e *Element) StandardUncertainty() float64 { return e.Bound / math.Sqrt(3) }

// nuclide is one isotope with its atomic mass.
type nuclide struct{ mass, uncertainty float64 }

type elementTable struct {
	byNumber [119]Element
	// bySymbol holds the atomic number under the letters of the symbol, 0 where
	// there is no such element.
	bySymbol [26 * 27]uint8
	nuclides map[[2]uint16]nuclide // by atomic number and mass number
}

var elements = sync.OnceValue(loadElements)

func loadElements() *elementTable {
	t := &elementTable{nuclides: map[[2]uint16]nuclide{}}
	for _, r := range readTable("atomic_weights.csv") {
		z, err := strconv.Atoi(r.text("z"))
		if err != nil {
			panic("chem: atomic_weights.csv: " + err.Error())
		}
		weight, _ := r.number("abridged_value") // blank means none, kept as 0
		bound, _ := r.number("abridged_uncertainty")
		t.byNumber[z] = Element{z, r.text("symbol"), r.text("name"), weight, bound, r.text("source")}
		t.bySymbol[symbolKey(r.text("symbol"))] = uint8(z)
	}
	for _, r := range readTable("nuclides.csv") {
		z, _ := r.number("z")
		a, _ := r.number("mass_number")
		mass, ok := r.number("mass")
		if !ok {
			panic("chem: nuclides.csv: a mass is missing")
		}
		u, _ := r.number("uncertainty")
		t.nuclides[[2]uint16{uint16(z), uint16(a)}] = nuclide{mass, u}
	}
	return t
}

// symbolKey maps a symbol of one capital and at most one small letter to a
// place in the table.
func symbolKey(symbol string) int {
	key := int(symbol[0]-'A') * 27
	if len(symbol) > 1 {
		key += int(symbol[1]-'a') + 1
	}
	return key
}

// ElementBySymbol returns the element of a symbol such as "Na".
func ElementBySymbol(symbol string) (Element, bool) {
	if !isSymbol(symbol) {
		return Element{}, false
	}
	t := elements()
	z := t.bySymbol[symbolKey(symbol)]
	return t.byNumber[z], z != 0
}

func isSymbol(s string) bool {
	switch len(s) {
	case 1:
		return isCapital(s[0])
	case 2:
		return isCapital(s[0]) && isSmall(s[1])
	}
	return false
}

func isCapital(c byte) bool { return c >= 'A' && c <= 'Z' }
func isSmall(c byte) bool   { return c >= 'a' && c <= 'z' }
func isDigit(c byte) bool   { return c >= '0' && c <= '9' }

// nonmetal reports whether the element of atomic number z is a non-metal or a
// half-metal; all others are metals.
func nonmetal(z uint8) bool {
	switch z {
	case 1, 2, 5, 6, 7, 8, 9, 10, 14, 15, 16, 17, 18, 33, 34, 35, 36, 52, 53, 54, 85, 86:
		return true
	}
	return false
}

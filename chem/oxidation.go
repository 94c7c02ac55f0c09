package chem

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
)

// ErrUnsettled is the cause where the rules don't settle an oxidation number.
var ErrUnsettled = errors.New("oxidation number not settled")

// OxidationNumber is the mean oxidation number of atoms of one element.
type OxidationNumber struct {
	Symbol string
	Count  float64 // atoms in one formula
	Number float64
}

// OxidationError says in which formula which elements are unsettled.
type OxidationError struct {
	Formula string
	What    string
}

func (e *OxidationError) Error() string {
	return fmt.Sprintf("oxidation numbers of %s: %s; the rules don't settle them", e.Formula, e.What)
}

// Unwrap returns ErrUnsettled.
func (e *OxidationError) Unwrap() error { return ErrUnsettled }

// OxidationNumbers assigns oxidation numbers by the usual rules (IUPAC Gold Book,
// oxidation number; OpenStax Chemistry 2e, 4.2): elements 0, fluorine -1, groups 1
// and 2 and some metals their one number, hydrogen +1 or as hydride -1, oxygen -2 or
// what is left in peroxides, halides -1, the rest from the charge. Of known anions
// (sulfates, nitrates, cyanides and the like) and of ammonium the inner numbers are
// used, so that the metal comes out. In organic compounds nitrogen and sulfur count
// -3 and -2 and carbon takes what is left: its number is a mean, right for counting
// electrons and not for single atoms. What two metals share stays unsettled: an
// *OxidationError.
func (f Formula) OxidationNumbers() ([]OxidationNumber, error) {
	dry := f.Anhydrous()
	w := oxidation{f: dry, left: float64(dry.charge)}
	for _, a := range dry.atoms {
		w.add(a.z, a.count.float())
	}
	if err := w.settle(); err != nil {
		return nil, err
	}
	if waters := f.Waters(); waters > 0 {
		w.entries = append(w.entries, oxidationEntry{1, 2 * waters, 1, true}, oxidationEntry{8, waters, -2, true})
	}
	numbers := make([]OxidationNumber, 0, len(w.entries))
	for _, e := range w.entries {
		numbers = append(numbers, OxidationNumber{elementSymbol(e.z), e.count, e.number})
	}
	return numbers, nil
}

// oxidation is the work on one formula.
type oxidation struct {
	f       Formula
	entries []oxidationEntry
	left    float64 // charge not yet given to atoms
}

type oxidationEntry struct {
	z       uint8
	count   float64
	number  float64
	settled bool
}

// add joins nuclides of one element.
func (w *oxidation) add(z uint8, count float64) {
	if e := w.entry(z); e != nil {
		e.count += count
		return
	}
	w.entries = append(w.entries, oxidationEntry{z: z, count: count})
}

func (w *oxidation) entry(z uint8) *oxidationEntry {
	for i := range w.entries {
		if w.entries[i].z == z && !w.entries[i].settled {
			return &w.entries[i]
		}
	}
	return nil
}

// set gives all unsettled atoms of an element a number.
func (w *oxidation) set(z uint8, number float64) {
	if e := w.entry(z); e != nil {
		e.number, e.settled = number, true
		w.left -= number * e.count
	}
}

func (w *oxidation) open() []*oxidationEntry {
	var open []*oxidationEntry
	for i := range w.entries {
		if !w.entries[i].settled {
			open = append(open, &w.entries[i])
		}
	}
	return open
}

// settle goes through the rules until one unknown is left, which takes the rest.
func (w *oxidation) settle() error {
	if len(w.entries) == 0 {
		return nil
	}
	if len(w.entries) == 1 {
		return w.rest()
	}
	w.ammonium()
	w.ligands()
	for i := range w.entries {
		if n, ok := fixedNumber(w.entries[i].z); ok {
			w.set(w.entries[i].z, n)
		}
	}
	w.set(1, w.hydrogen())
	if open := w.open(); len(open) == 1 && open[0].z == 8 {
		return w.rest() // peroxides and superoxides
	}
	w.set(8, -2)
	for _, rule := range []func(){w.halides, w.oxoAnion, w.heteroatoms, w.titanium} {
		if len(w.open()) > 1 {
			rule()
		}
	}
	return w.rest()
}

// rest gives the one open element what is left of the charge.
func (w *oxidation) rest() error {
	open := w.open()
	switch {
	case len(open) == 0 && math.Abs(w.left) < 1e-9:
		return nil
	case len(open) == 0:
		return &OxidationError{w.f.String(), "they don't add up to the charge"}
	case len(open) > 1:
		var names []string
		for _, e := range open {
			names = append(names, elementSymbol(e.z))
		}
		return &OxidationError{w.f.String(), "more than one element may vary: " + strings.Join(names, ", ")}
	}
	number := w.left / open[0].count
	if highest, ok := highestNumber(open[0].z); ok && number > highest {
		return w.peroxo(open[0], highest)
	}
	w.set(open[0].z, number)
	return nil
}

// peroxo settles a compound whose central atom would pass its highest number:
// some of the oxygen is peroxide, and oxygen takes the mean.
func (w *oxidation) peroxo(e *oxidationEntry, highest float64) error {
	w.set(e.z, highest)
	for i := range w.entries {
		if o := &w.entries[i]; o.z == 8 {
			o.number += w.left / o.count
			w.left = 0
			return nil
		}
	}
	return &OxidationError{w.f.String(), elementSymbol(e.z) + " would pass its highest number"}
}

// ammonium splits off the nitrogen and hydrogen of NH4.
func (w *oxidation) ammonium() {
	n, h := w.entry(7), w.entry(1)
	if n == nil || h == nil || !strings.Contains(w.f.text, "NH4") || len(w.entries) < 3 {
		return
	}
	count := math.Floor(h.count / 4)
	if count < 1 || count > n.count || w.entry(6) != nil && h.count != 4*count {
		return
	}
	w.left -= count
	h.count -= 4 * count
	n.count -= count
	w.entries = append(w.entries, oxidationEntry{7, count, -3, true}, oxidationEntry{1, 4 * count, 1, true})
	w.entries = slices.DeleteFunc(w.entries, func(e oxidationEntry) bool { return e.count == 0 })
}

// ligands settles cyanide, thiocyanate, carbonyl, carbonate and, by its mean, acetate.
func (w *oxidation) ligands() {
	c := w.entry(6)
	if c == nil {
		return
	}
	n, s, o, h := w.entry(7), w.entry(16), w.entry(8), w.entry(1)
	cyanide := n != nil && n.count == c.count && strings.Contains(w.f.text, "CN")
	switch {
	case cyanide && s != nil && s.count == c.count:
		w.set(6, 4)
		w.set(7, -3)
		w.set(16, -2)
	case n != nil && s != nil && n.count == c.count && s.count == c.count && strings.Contains(w.f.text, "NCS"):
		w.set(6, 4)
		w.set(7, -3)
		w.set(16, -2)
	case cyanide:
		w.set(6, 2)
		w.set(7, -3)
	case o != nil && o.count == c.count && strings.Contains(w.f.text, "(CO)"):
		w.set(6, 2)
		w.set(8, -2)
	case strings.Contains(w.f.text, "CO3"):
		w.set(6, 4)
	case h != nil && 2*h.count == 3*c.count && strings.Contains(w.f.text, "CH3COO"):
		w.set(6, 0)
	}
}

// hydrogen returns -1 in hydrides of metals and boron, otherwise +1.
func (w *oxidation) hydrogen() float64 {
	for _, e := range w.entries {
		if e.z != 1 && e.z != 5 && nonmetal(e.z) {
			return 1
		}
	}
	return -1
}

// halides settles chlorine, bromine and iodine as -1 next to a less
// electronegative element, unless they carry the oxygen of a chlorate or the like.
func (w *oxidation) halides() {
	oxygen := slices.ContainsFunc(w.entries, func(e oxidationEntry) bool { return e.z == 8 })
	for _, z := range []uint8{17, 35, 53} {
		if w.entry(z) == nil || len(w.open()) == 1 {
			continue
		}
		if oxygen && w.entry(6) == nil && strings.Contains(w.f.text, elementSymbol(z)+"O") {
			continue
		}
		w.set(z, -1)
	}
}

// oxoAnion settles the central atom of a known anion by its share of oxygen, next
// to one metal.
func (w *oxidation) oxoAnion() {
	oxygen := 0.0
	for _, e := range w.entries {
		if e.z == 8 {
			oxygen = e.count
		}
	}
	open := w.open()
	metals := slices.DeleteFunc(slices.Clone(open), func(e *oxidationEntry) bool { return nonmetal(e.z) })
	if oxygen == 0 || len(open) != 2 || len(metals) == 0 {
		return
	}
	for _, e := range open {
		if e == metals[0] && len(metals) == 1 {
			continue
		}
		if number, ok := oxoNumber(e.z, oxygen/e.count); ok {
			w.set(e.z, number)
			return
		}
	}
}

// heteroatoms settles boron and silicon of an organic compound at their highest number
// and nitrogen, sulfur, selenium and phosphorus, there and in a compound without oxygen,
// at their lowest.
func (w *oxidation) heteroatoms() {
	hydrogen := slices.ContainsFunc(w.entries, func(e oxidationEntry) bool { return e.z == 1 })
	if w.entry(6) != nil && hydrogen {
		w.set(5, 3)
		w.set(14, 4)
	}
	for _, e := range []struct {
		z      uint8
		number float64
	}{{7, -3}, {16, -2}, {34, -2}, {15, -3}} {
		if len(w.open()) > 1 {
			w.set(e.z, e.number)
		}
	}
}

// titanium settles titanium and zirconium at +4 where another metal is open.
func (w *oxidation) titanium() {
	for _, z := range []uint8{22, 40} {
		if len(w.open()) > 1 {
			w.set(z, 4)
		}
	}
}

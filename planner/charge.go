package planner

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
)

// scaleRule says how a charge follows the size of the run.
type scaleRule int

const (
	byMole        scaleRule = iota // with the limiting reagent
	byPhaseVolume                  // with the volume of a phase in the vessel
	byLoad                         // with what the step finds in the vessel
	bySurface                      // with the surface of the ware, as scale to the two thirds
	perBatch                       // the same in every batch
	fixedRule                      // the same in every run
)

var ruleWords = [...]string{"by mole", "by phase volume", "by load", "by surface", "per batch", "fixed"}

// charge is a substance that a step puts into a vessel, as the file has it.
type charge struct {
	substance string
	rule      scaleRule
	// size is in the base unit of its dimension: equivalents, or kg, m3, mol;
	// for byMole with kg or m3 it is per mole of limiting reagent.
	size      float64
	dimension dimension
	of        string      // for byPhaseVolume: the phase
	at        chem.Amount // for bySurface: the scale at which size holds
	strength  window      // of the stock; most 0 means the pure substance
	madeUp    chem.Fraction
	accept    Accept
	exact     bool
	hiddenKey string
	hiddenWhy string
	pos       place
}

type dimension int

const (
	inEquivalents dimension = iota
	inMass
	inVolume
	inAmount
	inVolumes // parts by volume of a phase
	inPieces
)

// readCharge reads one charge. withAmount is false where the step itself
// computes how much it takes.
func readCharge(f *fields, withAmount bool) charge {
	c := charge{substance: f.text("substance", true), pos: f.place(), rule: byLoad}
	readAcceptance(f, &c)
	c.madeUp, _ = take(f, "made-up", false, chem.ParseFraction, "a mass fraction such as 10 %")
	c.exact = f.flag("exact")
	if h := f.inner("hidden", false); h != nil {
		c.hiddenKey, c.hiddenWhy = h.text("key", true), h.text("why", true)
		h.done()
	}
	if withAmount {
		readChargeSize(f, &c)
	}
	return c
}

func readAcceptance(f *fields, c *charge) {
	var stated bool
	c.strength, stated = take(f, "strength", false, readWindow, "a mass fraction or a window, such as 95 % to 98 %")
	if stated {
		c.accept.Least, c.accept.Most = c.strength.least, c.strength.most
	}
	if least, ok := take(f, "at-least", false, chem.ParseFraction, "a mass fraction such as 98 %"); ok {
		c.accept.Least = least
	}
	c.accept.Hydrate = f.flag("hydrate")
	c.accept.Solution = f.flag("solution")
	c.accept.WithAdditive = f.flag("additive")
	c.accept.Grades = f.texts("grades")
	f.each("instead", false, "substitute", func(g *fields) {
		factor, ok := take(g, "factor", true, readNumber, "the mass of the substitute for one mass of the substance")
		if ok && factor == 0 {
			g.fault(g.at, "factor 0", "a positive number")
		}
		c.accept.Substitutes = append(c.accept.Substitutes, Substitute{g.text("substance", true), factor, g.text("note", false)})
	})
}

// sizeKeys are the keys that say how much; a charge has exactly one.
var sizeKeys = []string{"equivalents", "per-mole", "volumes", "surface", "each-batch", "fixed"}

func readChargeSize(f *fields, c *charge) {
	var present []string
	for _, key := range sizeKeys {
		if f.values[key] != nil {
			present = append(present, key)
		}
		f.known = append(f.known, key)
	}
	f.known = append(f.known, "of", "at")
	if len(present) != 1 {
		f.fault(f.at, fmt.Sprintf("the charge of %s says its amount %d times", c.substance, len(present)), "one of "+strings.Join(sizeKeys, ", "))
		return
	}
	switch key := present[0]; key {
	case "equivalents":
		c.rule = byMole
		c.size, _ = take(f, key, true, readNumber, "equivalents of the limiting reagent, such as 1.2")
	case "per-mole":
		c.rule = byMole
		readSize(f, key, c)
	case "volumes":
		c.rule, c.dimension = byPhaseVolume, inVolumes
		c.size, _ = take(f, key, true, readNumber, "parts by volume, such as 1/5")
		c.of = f.text("of", true)
		if !slices.Contains([]string{"aqueous", "organic", "contents"}, c.of) && c.of != "" {
			f.faultAt(f.values["of"], fmt.Sprintf("of %q", c.of), "aqueous, organic or contents")
		}
	case "surface":
		c.rule = bySurface
		readSize(f, key, c)
		c.at, _ = take(f, "at", true, chem.ParseAmount, "the scale at which that holds, such as 0.5 mol")
	case "each-batch":
		c.rule = perBatch
		readSize(f, key, c)
	case "fixed":
		c.rule = fixedRule
		readSize(f, key, c)
	}
}

// readSize reads a mass, a volume or an amount.
func readSize(f *fields, key string, c *charge) {
	n := f.values[key]
	text := nodeText(n)
	if m, err := chem.ParseMass(text); err == nil {
		c.size, c.dimension = float64(m), inMass
		return
	}
	if v, err := chem.ParseVolume(text); err == nil {
		c.size, c.dimension = float64(v), inVolume
		return
	}
	if n, err := readPieces(text); err == nil {
		c.size, c.dimension = n, inPieces
		return
	}
	a, err := chem.ParseAmount(text)
	if err != nil {
		f.faultAt(n, fmt.Sprintf("%s %q: %s", key, text, reason(err)), "a mass, a volume, an amount or pieces, such as 20 g, 150 mL, 0.5 mol, 3 pieces")
		return
	}
	c.size, c.dimension = float64(a), inAmount
}

// readCharges reads the list under "charges".
func readCharges(f *fields, needed bool) []charge {
	var list []charge
	f.each("charges", needed, "charge", func(g *fields) { list = append(list, readCharge(g, true)) })
	return list
}

func nameCharges(list []charge, visit func(kind, name string, at place)) {
	for _, c := range list {
		if c.dimension != inPieces {
			visit("substance", c.substance, c.pos)
		}
	}
}

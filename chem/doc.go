// Package chem is the chemistry behind a run: formulas and reactions,
// strengths, acids and bases, two liquid phases, drying, vapour, heat,
// hazards and waste, as pure functions over small named types.
//
// A quantity has a type named for the quantity and is held in the coherent SI
// unit; units are constants to multiply by, as with time.Duration:
//
//	m := 2.5 * chem.Gram
//	n := molarMass.Of(m)
//
// Text becomes a quantity once, at the edge, with the Parse functions, and is
// rounded only for people's eyes, by whoever shows it. The package reads no
// clock, no file and no database; its tables are embedded from data/, one
// source per row. Where a table has no value the functions say so with an
// error; an estimate says that it is one.
package chem

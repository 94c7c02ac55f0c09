package chem

// A Derivation says how a number came about: the formula in words and symbols,
// the inputs with where each came from, and the source of the method. It is
// made by the function that computed the number, so that it can't drift from
// it.
type Derivation struct {
	// Of names the quantity, such as "sodium dichromate, anhydrous".
	Of string
	// Formula is the relation in symbols, such as "m = n · M / w".
	Formula string
	// Inserted is the same relation with the numbers put in.
	Inserted string
	// Inputs are the numbers that went in, in the order of the formula.
	Inputs []Input
	// Value is the result in Unit, unrounded.
	Value float64
	// Unit is the unit of Value in plain text, such as "g"; empty for a pure number.
	Unit string
	// Range is the validity range of the method in words; empty if it has none.
	Range string
	// Source is where the method comes from.
	Source string
	// Notes are cautions that belong to this number.
	Notes []string
}

// An Input is one number that went into a Derivation.
type Input struct {
	Symbol string  // as in the formula, such as "M"
	Name   string  // what it is, such as "molar mass of Na2Cr2O7"
	Value  float64 // in Unit
	Unit   string
	Source string // where it came from: a table row, a bottle, the recipe, the policy
}

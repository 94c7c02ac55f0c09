package planner

import "stillroom/chem"

// Recipe is a written procedure, read from a YAML file. ParseRecipe makes it;
// it is never changed afterwards.
type Recipe struct {
	// Name is the recipe's name on the command line, such as
	// "pentanoic-acid-dichromate".
	Name    string
	Title   string
	Version string
	About   string
	// Text is the file as it was read.
	Text string
	// Product names the substance the run makes.
	Product string
	// Limiting names the limiting reagent.
	Limiting string
	// Sources are publications and remarks the recipe rests on.
	Sources []string
	// Yield is the isolated yield as a distribution.
	Yield Yield
	// ProvenScale is the largest amount of limiting reagent run so far, in
	// ProvenRuns runs; 0 if nothing is proven.
	ProvenScale chem.Amount
	ProvenRuns  int
	// Controls are what keeps people from harm in every step.
	Controls   []string
	Substances []SubstanceNote
	Vessels    []VesselNote
	Reactions  []Reaction
	Steps      []Step

	once *compiledOnce // nil for a recipe that wasn't read from a file
}

// SubstanceNote is what a recipe says of a substance itself, because the
// table of substances doesn't hold it or because the run treats it specially.
type SubstanceNote struct {
	Name, Formula, CAS string
	// Phase is the phase it belongs to; "" means as its record says.
	Phase   string
	Density chem.Density
	Boiling chem.Temperature
	// Azeotrope is the mass fraction in the vapour over two layers with water, at
	// AzeotropeBoils; 0 means as the table has it.
	Azeotrope      chem.Fraction
	AzeotropeBoils chem.Temperature
	// Source says where the formula and figures come from.
	Source string
	at     place
}

// VesselNote is a vessel of a recipe: one piece of ware used over several steps.
type VesselNote struct {
	Name string
	Ware string // kind of ware, as in inventory.Equipment
	For  string
	at   place
}

// Reaction is a balanced reaction between substances of the recipe.
type Reaction struct {
	Name     string
	Consumes []Term
	Forms    []Term
	// IonsConsumed and IonsFormed are the same reaction in ions, for the
	// enthalpy; they may be empty.
	IonsConsumed, IonsFormed []Term
	// Enthalpy is per mole of the first substance consumed; EnthalpySource is
	// "" if nothing is stated.
	Enthalpy       chem.MolarEnergy
	EnthalpySource string
	at             place
}

// Term is a substance with its stoichiometric number.
type Term struct {
	Substance string
	Number    float64
	at        place
}

// Step is one operation of a recipe.
type Step struct {
	N      int
	Do     string // the step kind
	Name   string
	Vessel string
	// Time the step takes; 0 with ForScale means that it is set for this scale.
	Time     chem.Duration
	ForScale bool
	Hold     string // where one may stop: for how long and how; "" for nowhere
	Cautions []string
	Controls []string
	at       place
	spec     operation
}

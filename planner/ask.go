package planner

import "stillroom/chem"

// An Ask is what one charge of one step asks of the shelf, before any bottle
// has been looked at. The walk-through makes asks; needs are their sums by
// substance and acceptance.
type Ask struct {
	Substance string // the recipe's name for it, resolved to the shelf by name, synonym or CAS
	CAS       string
	Formula   string
	Step      int // number of the step, from 1
	StepName  string
	// Pure is the mass of pure, anhydrous substance; Amount the same in moles.
	Pure   chem.Mass
	Amount chem.Amount
	// Pieces is set for consumables and then the only amount.
	Pieces float64
	Accept Accept
	Rule   string // how it scales
	Hidden bool
	Key    string // of a hidden need, for switching it off
	Why    string // reason with its arithmetic, for a hidden need
	// Index is the ask's place in the Asks of an Outcome.
	Index int
	// Exact marks charges that must be weighed exactly; the rest are "about".
	Exact      bool
	Derivation chem.Derivation
}

// Accept says which stock may stand for a substance in a charge.
type Accept struct {
	// Least and Most bound the strength of the stock as its name has it, so that
	// of a hydrate the share of hydrate counts; 0 means no bound.
	Least, Most chem.Fraction
	// Hydrate allows a hydrate of the substance, its water counted.
	Hydrate bool
	// Solution allows the substance dissolved in water.
	Solution bool
	// Grades allowed; empty means any.
	Grades []string
	// WithAdditive allows an inhibitor or stabiliser.
	WithAdditive bool
	// Substitutes are other substances the recipe allows, with the mass of the
	// substitute that does the work of one mass of the substance.
	Substitutes []Substitute
}

// Substitute is another substance that the recipe allows for a charge.
type Substitute struct {
	Substance string
	Factor    float64
	Note      string
}

// Stock is the composition of what is really drawn for a substance: the
// walk-through is repeated with it, so that water that comes with a hydrate or
// a weaker acid is taken off the water charge.
type Stock struct {
	Form  string
	Pure  chem.Fraction // mass fraction of pure, anhydrous substance
	Water chem.Fraction // mass fraction of water, of hydration or solution
	// Density of the stock; 0 means no data.
	Density chem.Density
}

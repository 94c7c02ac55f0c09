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
}

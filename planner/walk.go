package planner

// The walk-through, as the rest of the planner calls it:
//
//	recipes := Recipes()                       // embedded, sorted by name
//	r, ok := RecipeByName("pentanoic-acid-dichromate")
//	r, err := ParseRecipe("my.yaml", text)     // *RecipeErrors: every fault, file:line:column
//	program, err := Compile(r)                 // *StepError: the step and what doesn't hold
//	scale, err := program.ScaleFor(target, certainty, policy)   // limiting amount from the target
//	walk, err := program.Walk(Conditions{Limiting: scale.Amount, Stocks: stocks, …})
//	walk.Asks, walk.Steps, walk.Flow, walk.Waste, walk.Product, walk.Findings
//
// and, for the chance of running short, without allocation in steady state:
//
//	ws := program.Workspace(conditions)        // one for each goroutine
//	u := make([]float64, program.Uncertain())  // uniform on (0, 1), one for each uncertain quantity
//	outcome := program.Sample(ws, u)           // outcome.Product, outcome.Asks[ask.Index]

import (
	"stillroom/chem"
	"stillroom/inventory"
)

// Conditions are what a walk-through depends on besides the recipe.
type Conditions struct {
	// Limiting is the amount of the limiting reagent over all batches.
	Limiting chem.Amount
	// Batches is the number of equal batches; 0 means one.
	Batches int
	// Stocks says, by the recipe's name of a substance, what is really drawn;
	// a substance that is absent is taken as the recipe asks for it.
	Stocks map[string]Stock
	// Off lists hidden needs switched off, by their key.
	Off []string
	// Equipment is the ware the lab owns; with none it isn't known, and then no
	// vessel is picked. A lab that has entered none is told so; nil says nothing.
	Equipment []inventory.Equipment
	// Policy holds the fill limits, heat figures and priors.
	Policy inventory.Policy
}

// Walk is the material balance of a run: what every step asks, holds, gives
// off and leaves. The same recipe and conditions give the same walk.
type Walk struct {
	Batches int
	// Asks are those of all batches together, in the order of the steps.
	Asks     []Ask
	Steps    []StepReport // of one batch
	Flow     []Flow       // of the whole run
	Waste    []Discard    // of the whole run, in the order of the steps
	Product  Product
	Losses   []Loss // where the product went that isn't isolated, of the whole run
	Findings []Finding
	// Balance is the worst relative error of mass, elements and charge over
	// the steps and the run.
	Balance float64
	// Minutes of one batch; NotAssessed counts the steps whose time isn't known.
	Time        chem.Duration
	NotAssessed int
}

// Discard is what one step puts into one waste stream.
type Discard struct {
	Stream   string
	Step     int
	StepName string
	Mass     chem.Mass
	Volume   chem.Volume
	PH       float64 // of its aqueous part; 0 where there is none
	Contents []Content
}

// Product is what a run gives.
type Product struct {
	Substance string
	CAS       string
	Formula   string
	Amount    chem.Amount // isolated, at the expected yield
	Mass      chem.Mass
	// Arriving is what the steps let through to the last isolation; the rest
	// of it up to Amount is the loss named "isolation".
	Arriving chem.Amount
	Yield    Yield
	// PerLimiting is the amount of product in theory per amount of limiting reagent.
	PerLimiting float64

	yield chem.Dist // of Yield; nil if it hasn't been worked out
}

// yieldDist returns the yield as a distribution.
func (p *Product) yieldDist() (chem.Dist, error) {
	if p.yield != nil {
		return p.yield, nil
	}
	return p.Yield.Dist()
}

// Loss is product that isn't isolated, by the step that loses it.
type Loss struct {
	Step      int
	StepName  string
	Substance string
	Where     string // "left in the aqueous layer", "held by the drying agent", …
	Mass      chem.Mass
	Share     chem.Fraction // of the product formed
}

// Yield is the isolated yield of a recipe as a distribution: a normal one cut
// at 0 and at Cap.
type Yield struct {
	Mean, SD chem.Fraction
	Cap      chem.Fraction // 0 means 1
	Basis    string        // "prior" or "own runs"
	Runs     int           // own runs behind it
}

// Outcome is one draw of a sampled walk. Its slices belong to the workspace
// and are overwritten by the next draw.
type Outcome struct {
	Product chem.Mass
	// Asks holds by Ask.Index what was used up: the pure mass in kilograms, or
	// the pieces.
	Asks []float64
	// Failed is set when a step could not be done with these values.
	Failed bool
}

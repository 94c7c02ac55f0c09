package planner

import (
	"stillroom/chem"
	"stillroom/inventory"
)

// Request is what somebody asks for: a recipe, a mass of product, a day.
type Request struct {
	Recipe *Recipe
	Target chem.Mass
	On     inventory.Date
	// Today is passed in, because the planner reads no clock.
	Today inventory.Date
	// Run is the run being planned, so that its own earmarks don't count as
	// somebody else's; 0 for a run that isn't on the slate yet.
	Run int64
	// Certainty with which the target is to be met; 0 means the policy's.
	Certainty chem.Fraction
	// Off lists hidden needs switched off, by their key.
	Off []string
	// Store is the store whose bottles may be used; 0 means the run's, or the
	// first. Leave lists further stores from which there is leave to take.
	Store int64
	Leave []int64
	// Free lists earmarks, by ID, that are taken as freed.
	Free []int64
	// Drawn asks for the chances from draws of the whole walk-through, not from
	// the spread of each charge by itself; that takes some tenths of a second.
	Drawn bool
	// Batches splits the run into equal batches; 0 means as few as the ware allows.
	Batches int
}

// Plan is the answer to a Request against a shelf: everything that is shown,
// printed or exported comes out of it. The same request against the same shelf
// gives the same plan, byte for byte.
type Plan struct {
	Recipe   *Recipe
	On       inventory.Date
	Today    inventory.Date
	Verdict  State  // the worst need state
	Sentence string // the verdict in words: how likely, the chief doubt, what one act would change
	Revision string // fingerprint of the plan, eight hexadecimal digits

	Target Target
	Scale  Scale
	Needs  []Need
	Steps  []StepReport
	// Carriers group the bottles that may travel together, in walking order.
	Carriers []Carrier
	Buy      []Purchase
	Waste    []WasteLot
	Hazards  []HazardNote
	// Pairs are what must never meet, out of everything the run brings together.
	Pairs   []chem.Incompatibility
	Metrics Metrics
	Risk    Risk
	// Budget is how the steps fall on working days; it has no stretches where the
	// policy's working day can't be, which a finding then says.
	Budget TimeBudget
	// Flow is the material flow of the run: what went where.
	Flow     []Flow
	Findings []Finding
	// Tools are the lab's balances and cylinders, to whose divisions papers round
	// the amounts.
	Tools []inventory.Equipment
}

// Target is what was asked for.
type Target struct {
	Substance string
	CAS       string
	Formula   string
	Mass      chem.Mass
}

// Scale is how large the run is and why.
type Scale struct {
	Limiting      string
	Amount        chem.Amount   // of the limiting reagent
	ExpectedYield chem.Fraction // mean, of the limiting reagent
	PlannedYield  chem.Fraction // the cautious percentile the run is scaled on
	ExpectedMass  chem.Mass     // of product, at the expected yield
	Percentile    chem.Fraction // chance that the yield is at least PlannedYield
	Factor        float64       // against the largest proven scale; 0 if nothing is proven
	Batches       int
	Derivation    chem.Derivation
}

// State is a need state. The order of the constants is from best to worst.
type State int

// The need states of the design.
const (
	Covered State = iota
	Tight
	Late
	Unfit
	Short
)

// String returns the state's word.
func (s State) String() string {
	if s < Covered || s > Short {
		return "unknown"
	}
	return [...]string{"covered", "tight", "late", "unfit", "short"}[s]
}

// Need is what a run asks of one substance, summed over its charges.
type Need struct {
	Substance string
	CAS       string
	Formula   string
	// Count is true for consumables, whose amounts are pieces.
	Count bool
	// Mass is of the pure, anhydrous substance; Amount the same in moles.
	Mass   chem.Mass
	Amount chem.Amount
	Pieces float64
	For    []string // step names
	// Exact says that a charge of it must be weighed exactly.
	Exact bool
	// Hidden says that the recipe's text doesn't list it: it follows from the
	// walk-through. Key names it for switching it off.
	Hidden bool
	Key    string
	Why    string // reason of a hidden need, in words with its arithmetic
	// Parts are the hidden charges in it, also where others are listed.
	Parts []HiddenPart

	OnShelf     chem.Mass // pure, in fit bottles, before anybody's earmarks
	Earmarked   chem.Mass // pure, promised to other runs
	Short       chem.Mass // pure, covered by nothing
	ShortPieces float64
	// OnShelfPieces and EarmarkedPieces are for consumables.
	OnShelfPieces, EarmarkedPieces float64
	// ChanceShort is the chance that what was drawn doesn't suffice; negative means not assessed.
	ChanceShort float64
	ChanceError float64   // its standard error
	CoverWith   chem.Mass // further pure mass, found for sure, that brings the chance under the lab's limit; 0 if it is
	State       State
	Because     string         // why this state, in words
	CoveredOn   inventory.Date // for Late: when cover arrives
	Draws       []Draw
	Barred      []Barred
	BarredMore  int // barred bottles beyond those listed
	// Spares are bottles to have at hand, because without them the chance of
	// running short would exceed the lab's limit. ChanceShort counts them.
	Spares []Spare
	// Next is the fit bottle to fetch if one drawn on turns out not to serve: the
	// least trouble of those that nothing in the run is drawn from, at a strength
	// that needs no making up; nil for none. Revision doesn't depend on it.
	Next       *Spare
	Derivation chem.Derivation

	buys []int // into the plan's purchases
}

// HiddenPart is a charge the recipe's text doesn't list, within a need.
type HiddenPart struct {
	Key, Why string
	Step     int
	Mass     chem.Mass
	Pieces   float64
}

// Spare is a bottle that isn't drawn on but should be at hand.
type Spare struct {
	Bottle inventory.Bottle
	Form   inventory.StockForm
	Place  inventory.Place
	Why    string
}

// Draw is an amount to be taken out of one bottle.
type Draw struct {
	Bottle    inventory.Bottle
	Form      inventory.StockForm
	Place     inventory.Place
	Mass      chem.Mass   // of what is in the bottle
	Volume    chem.Volume // of the same; 0 if the density is not known
	HasVolume bool
	Pieces    float64
	Pure      chem.Mass // pure, anhydrous substance in it; of a substitute what it stands in for
	// Leaves is the heel; LeavesVolume and LeavesPieces likewise.
	Leaves       chem.Mass
	LeavesVolume chem.Volume
	LeavesPieces float64
	Opens        bool // the bottle has to be opened for it
	Steps        []StepDraw
	Why          string // why this bottle and this much
	Derivation   chem.Derivation
}

// StepDraw is the part of a draw that goes into one step.
type StepDraw struct {
	Step   int
	Mass   chem.Mass
	Volume chem.Volume
	Pieces float64
}

// Barred is a bottle that could not be used, and why.
type Barred struct {
	Bottle inventory.Bottle
	Form   inventory.StockForm
	Kind   string // "expired", "too weak", "hydrate", "promised", …
	Why    string
}

// StepReport is one step of the walk-through.
type StepReport struct {
	N      int
	Do     string // the step kind
	Name   string
	Vessel VesselReport
	Adds   []Add
	// Contents are those at the worst (fullest) moment of the step.
	Contents    []Content
	Temperature chem.Temperature
	Heat        chem.Energy
	Gas         chem.Volume // at 20 °C and 101.325 kPa
	GasOf       string
	// Time is how long the step takes; NotAssessed is set where nothing is known.
	Time            chem.Duration
	TimeNotAssessed bool
	// Shortest is the shortest safe time of a dosed addition; 0 where it doesn't apply.
	Shortest chem.Duration
	Ice      chem.Mass
	// IfCoolingLost is the temperature reached if cooling fails; 0 for not assessed.
	IfCoolingLost chem.Temperature
	HoldPoint     bool
	HoldNote      string
	// Stream is where a step that discards puts what is in its vessel; "" for others.
	Stream   string
	Cautions []string
	// Balance is the worst relative error of mass, elements and charge after the step.
	Balance float64
	// Says are the numbers the step is about, in words: "98.2 % of the acid".
	Says        []string
	Derivations []chem.Derivation
}

// VesselReport is the vessel of a step.
type VesselReport struct {
	Name  string // the recipe's name for it
	Kind  string // "round flask", "separating funnel", …
	Ware  string // the lab's own piece, "" if none fits
	Size  chem.Volume
	Fill  chem.Fraction // of the nominal volume, at the fullest moment
	Limit chem.Fraction
	Fits  bool
}

// Add is what goes into a vessel in a step.
type Add struct {
	Substance string
	Form      string
	Mass      chem.Mass // of the stock form that is drawn
	Volume    chem.Volume
	HasVolume bool
	Amount    chem.Amount // of pure substance
	Pieces    float64
	// Rule says how the charge scales: "by mole", "by phase volume", "by load", "fixed", …
	Rule       string
	Derivation chem.Derivation
}

// Content is a component in a phase.
type Content struct {
	Substance string
	Formula   string
	Phase     string // "aqueous", "organic", "solid", "gas"
	Amount    chem.Amount
	Mass      chem.Mass
	Volume    chem.Volume
}

// Carrier is a tray or bucket of bottles that may travel together.
type Carrier struct {
	N       int
	Bottles []string // codes in walking order
	Mass    chem.Mass
	Note    string // such as that a bottle is over the weight by itself
}

// Purchase is a pack to buy against a shortfall.
type Purchase struct {
	Substance string
	Offer     inventory.Offer
	Form      inventory.StockForm
	Packs     int64
	Cost      int64 // minor units, with fees
	Currency  string
	OrderBy   inventory.Date
	Arrives   inventory.Date // at the 90 % lead time if ordered today
	InTime    bool
	Leftover  chem.Mass
	// LeftoverPieces is for consumables.
	LeftoverPieces float64
	Why            string
}

// WasteLot is what goes into one waste stream.
type WasteLot struct {
	Stream   string
	Mass     chem.Mass
	Volume   chem.Volume
	PH       float64 // the one furthest from 7 of its aqueous parts; 0 where none is known
	Contains []Content
	Carboy   string // code, "" if none takes it
	Fits     bool
	Note     string
	// Derivation sums what each step puts into the stream.
	Derivation chem.Derivation
}

// HazardNote is one hazard of the hazard sheet.
type HazardNote struct {
	At         string // a step name, "as stored" or "waste"
	Step       int    // number of the step; 0 for what is not of a step
	What       string // substance or mixture
	Classes    []string
	Statements []string // "H314 Causes severe skin burns and eye damage"
	Pictograms []string // "GHS05"
	Signal     string
	// Basis says where the classification came from: "harmonised", "from memory, unverified: read the supplier's sheet", "calculated", "no data".
	Basis  string
	Limits []string // exposure limits, or "no data"
	Formed bool     // arises in the run
	// P are the codes of the precautionary statements.
	P []string
	// Notes are cautions that belong to the classification: what is unknown,
	// what was assumed, what suppliers add.
	Notes []string
}

// Metrics are the green metrics of the run.
type Metrics struct {
	AtomEconomy          chem.Fraction
	EFactor              float64
	ProcessMassIntensity float64
}

// Risk is what the draws of the whole run say.
type Risk struct {
	Draws int
	Seed  uint64
	// Drawn says that the walk-through itself was drawn; Failed is the share of
	// draws in which a step could not be done.
	Drawn  bool
	Failed float64
	// Derivation lists the chance of each need behind RunEnough.
	Derivation chem.Derivation
	RunEnough  float64 // chance that every need is met; negative means not assessed
	TargetMet  float64
	MassLow    chem.Mass // 5th percentile of product
	MassMedian chem.Mass
	MassHigh   chem.Mass // 95th
	Decides    string    // the need that decides
	// WeighFirst is the bottle whose weighing lowers the risk most.
	WeighFirst string
	// LookOnly says that the doubt is whether it is found, not what it holds.
	LookOnly    bool
	WeighBefore float64
	WeighAfter  float64
	ScaleFor90  chem.Mass // target at which this much charge gives 90 %
}

// Flow is one edge of the material flow.
type Flow struct {
	From, To  string
	Substance string
	Mass      chem.Mass
}

package inventory

import "stillroom/chem"

// The records below are gorm models and, at the same time, the plain values
// the planner works on. Keys that people type are codes and names; the numeric
// identities never leave this package and the address line.

// Measure says how the content of a bottle is counted.
type Measure string

// The three measures. Ledger amounts are whole numbers of the unit named.
const (
	ByMass   Measure = "mass"   // micrograms
	ByVolume Measure = "volume" // microlitres
	ByCount  Measure = "count"  // pieces
)

// Substance is a chemical identity.
type Substance struct {
	ID       int64  `gorm:"primaryKey"`
	Name     string // the name shown and used in recipes; unique
	Synonyms string // separated by "; "
	CAS      string // registry number with its check digit, or "" for mixtures and consumables
	Formula  string // of the pure, anhydrous substance; "" for consumables
	// Own marks a substance the user added, as against one filled from chem's table.
	Own    bool
	Source string // where the record came from
}

// StockForm is a substance as it is bought and stored.
type StockForm struct {
	ID          int64 `gorm:"primaryKey"`
	SubstanceID int64
	Name        string // "sodium dichromate dihydrate 99.5 %"
	// CAS is the registry number of the form as stored where it has one of its
	// own, as a hydrate does; "" where the substance's holds.
	CAS string
	// HydrateWaters is the water of hydration in moles per mole; 0 for anhydrous.
	HydrateWaters float64
	// AssayLow and AssayHigh bound the mass fraction of the form as named (the
	// hydrate, or the solute of a solution) in the bottle's content.
	AssayLow, AssayHigh float64
	// Diluent is the substance name of the rest: "water" for an aqueous
	// solution, "" for an impurity nobody named.
	Diluent string
	Grade   string // "ACS", "technical", "denatured", …
	// Additive is an inhibitor or stabiliser, "" for none.
	Additive string
	Measure  Measure
	// DensityGML is the density of the content at 20 °C in g/mL; 0 means no data.
	DensityGML    float64
	DensitySource string
	// StorageClass groups what may stand together: "oxidiser", "flammable liquid", …
	StorageClass string
	// Ageing names the law by which strength falls: "", "hypochlorite", "peroxide".
	Ageing string
	// ShelfLifeDays after receipt, and OpenLifeDays after opening; 0 means no limit known.
	ShelfLifeDays, OpenLifeDays int
	// PeroxideTestDays is the interval between peroxide tests once opened; 0 for none.
	PeroxideTestDays int
}

// Assay returns the middle of the labelled range.
func (f StockForm) Assay() chem.Fraction {
	return chem.Fraction((f.AssayLow + f.AssayHigh) / 2)
}

// Place is a shelf in a cabinet of a store.
type Place struct {
	ID      int64 `gorm:"primaryKey"`
	StoreID int64
	Store   string // "Main store"
	Room    string
	Cabinet string
	Shelf   string
	// Walk is the position in the order in which people walk past the places.
	Walk int
	// StorageClass the cabinet is meant for; "" for any.
	StorageClass string
	// LimitUL is the most liquid the cabinet may hold in µL; 0 for no limit known.
	LimitUL int64
}

// String returns the place as people say it: store, cabinet, shelf.
func (p Place) String() string { return p.Store + " › " + p.Cabinet + " › " + p.Shelf }

// BottleState is where a bottle is in its life.
type BottleState string

// The states of a bottle.
const (
	Sealed      BottleState = "sealed"
	Opened      BottleState = "open"
	Quarantined BottleState = "quarantined"
	Missing     BottleState = "missing"
	OnLoan      BottleState = "on loan"
	Empty       BottleState = "empty"
	Discarded   BottleState = "discarded"
)

// MeasuredBy says how the content was last found out.
type MeasuredBy string

// The ways, from the surest to the least sure.
const (
	ByUnopened MeasuredBy = "unopened"
	ByWeighing MeasuredBy = "weighed"
	ByLedger   MeasuredBy = "ledger"
	ByLevel    MeasuredBy = "level"
	ByGuess    MeasuredBy = "guessed"
)

// Bottle is one physical container of a stock form.
type Bottle struct {
	ID      int64  `gorm:"primaryKey"`
	StoreID int64  // every hot table carries its store
	Code    string // with its check character; unique
	Mark    string // another number on its label, such as one from before; "" for none
	FormID  int64
	PlaceID int64
	State   BottleState
	Lot     string
	// LotAssay is the assay on the lot's certificate; 0 means the label's range holds.
	LotAssay float64
	// Content is the sum of the bottle's ledger, in the unit of its form's
	// measure (µg, µL, pieces). It is kept beside the ledger for speed and is
	// changed only in the transaction that adds the ledger row.
	Content int64
	// Promised is the sum of the bottle's earmarks, lapsed ones included, and
	// never more than Content.
	Promised int64
	// Size is what the bottle holds when full, in the same unit.
	Size                     int64
	TareUG                   int64 // mass of the empty bottle with its cap in µg; 0 for not known
	Received, Opened, Expiry Date
	PeroxideTested           Date
	PeroxidePPM              float64
	MeasuredBy               MeasuredBy
	MeasuredOn               Date
	Supplier, Note           string
	// MergedInto is the ID of the bottle this record was merged into; 0 for none.
	MergedInto int64
	Version    int64 // counts changes, for edit clashes
}

// Earmark is an amount of a bottle promised to a run.
type Earmark struct {
	ID       int64 `gorm:"primaryKey"`
	StoreID  int64
	BottleID int64
	RunID    int64
	Amount   int64 // in the unit of the bottle
	Owner    string
	ForDate  Date // the run's date
	Ends     Date // lapses after this day unless reconfirmed
	Made     Stamp
}

// Offer is a pack a supplier sells.
type Offer struct {
	ID            int64 `gorm:"primaryKey"`
	FormID        int64
	Supplier      string
	Item          string // the supplier's item number
	PackSize      int64  // in the unit of the form's measure
	PriceMinor    int64  // whole minor units of Currency
	Currency      string // ISO 4217
	OrderFee      int64  // per order at this supplier, minor units
	Surcharge     int64  // hazardous goods, per order, minor units
	LeadDays      int    // working habit: median days from order to shelf
	LeadDays90    int    // nine orders in ten have come by then
	ShelfLifeDays int    // on arrival; 0 for no limit known
	MinOrder      int64  // least value of an order at this supplier, minor units; 0 for none
	// Breaks are the prices a pack from a number of packs on, rising by number.
	Breaks PriceBreaks
}

// Order is an offer that was ordered and has not been put on the shelf yet.
type Order struct {
	ID      int64 `gorm:"primaryKey"`
	OfferID int64
	FormID  int64
	Packs   int64
	Ordered Date
	Due     Date
	State   string // "under way", "received", "cancelled"
	RunID   int64  // 0 for stock
}

// Carboy is a waste container.
type Carboy struct {
	ID        int64 `gorm:"primaryKey"`
	StoreID   int64
	Code      string
	Stream    string // the waste stream it takes
	PlaceID   int64
	SizeUL    int64
	ContentUL int64
	FillLimit float64 // fraction of the size
	Contains  string  // what went in, "name: share %; …"
	Opened    Date
}

// Equipment is a piece of ware the lab owns.
type Equipment struct {
	ID      int64 `gorm:"primaryKey"`
	StoreID int64
	Kind    string // "round flask", "separating funnel", "beaker", "conical flask", "bath", "balance", "condenser", "hood"
	Name    string
	// Size is the nominal volume in µL for vessels, the largest load in µg for balances.
	Size  int64
	Count int
	// CoolingW is the cooling power in W of a bath or chiller, UA in W/K of a
	// vessel's wall is derived from its size.
	CoolingW float64
	// Step is the smallest division: µg for balances, µL for cylinders.
	Step int64
}

// RunState is how far a run has come.
type RunState string

// The run states.
const (
	Pencilled RunState = "pencilled"
	Cleared   RunState = "cleared"
	Picked    RunState = "picked"
	Closed    RunState = "closed"
	Dropped   RunState = "dropped"
)

// Run is one execution of a recipe at a scale on a date.
type Run struct {
	ID         int64 `gorm:"primaryKey"`
	StoreID    int64
	Recipe     string // the recipe's name
	RecipeText string // the text planned with, so that a later version changes nothing here
	TargetUG   int64  // mass of product wanted, µg
	On         Date   `gorm:"column:on_date"`
	State      RunState
	Owner      string
	Made       Stamp
	Version    int64
}

// PolicyRow is one limit, fraction, interval or prior that law or a site may
// set differently.
type PolicyRow struct {
	Key     string `gorm:"primaryKey"` // "risk.limit", "fill.separating-funnel", …
	Value   float64
	Unit    string
	Meaning string
	Source  string // "common practice", a law, a page
	SetBy   string
	SetOn   Date
}

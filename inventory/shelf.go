package inventory

// Shelf is a consistent picture of everything the planner needs to know about
// stock, as plain values. It is made in one read transaction and never changes
// afterwards.
type Shelf struct {
	Substances []Substance
	Forms      []StockForm
	Places     []Place
	Bottles    []Bottle
	Earmarks   []Earmark
	Offers     []Offer
	Orders     []Order
	Carboys    []Carboy
	Equipment  []Equipment
	Policy     Policy

	substances map[int64]int
	byName     map[string]int64 // lower-case name or synonym, and CAS
	forms      map[int64]int
	formsOf    map[int64][]int // substance → forms
	places     map[int64]int
	bottlesOf  map[int64][]int // form → bottles
	earmarksOf map[int64][]int // bottle → earmarks
	offersOf   map[int64][]int // form → offers
	ordersOf   map[int64][]int // form → orders
}

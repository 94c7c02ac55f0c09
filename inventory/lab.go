package inventory

// Lab is everything a lab has, as plain values: what DemoLab returns, what
// Fill writes into a store and what a Shelf is made from.
type Lab struct {
	Substances []Substance
	Forms      []StockForm
	Places     []Place
	Bottles    []Bottle
	Earmarks   []Earmark
	Offers     []Offer
	Orders     []Order
	Carboys    []Carboy
	Equipment  []Equipment
	Runs       []Run
	Policy     Policy
}

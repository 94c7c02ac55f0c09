package inventory

func (d *demo) addOffers() {
	for i, o := range demoOffers {
		s := demoSuppliers[o.supplier]
		offer := Offer{
			ID: int64(i + 1), FormID: d.form(o.form), Supplier: s.name, Item: o.item, PackSize: o.pack,
			PriceMinor: o.price, Currency: "EUR", OrderFee: s.fee, MinOrder: s.least,
			LeadDays: s.days, LeadDays90: s.days90, ShelfLifeDays: o.keeps, Breaks: o.breaks,
		}
		if o.hazard {
			offer.Surcharge = s.surcharge
			offer.LeadDays += 1
			offer.LeadDays90 += 2
		}
		d.lab.Offers = append(d.lab.Offers, offer)
	}
}

// demoSuppliers: fees and least orders in cents, lead times in days.
var demoSuppliers = map[string]struct {
	name                  string
	fee, surcharge, least int64
	days, days90          int
}{
	"B": {"Brackwater Reagents", 950, 1850, 3000, 3, 8},
	"F": {"Fennimore Laboratory Supply", 1400, 2400, 0, 2, 5},
	"Q": {"Quillhaven Chemicals", 600, 3200, 10000, 15, 35},
}

type demoOffer struct {
	form, supplier, item string
	pack, price          int64
	hazard               bool
	keeps                int // days on arrival
	breaks               PriceBreaks
}

var demoOffers = []demoOffer{
	{"1-pentanol", "B", "PN-0105", mL(500), 2890, true, 1500, nil},
	{"1-pentanol", "B", "PN-0110", mL(1000), 4350, true, 1500, PriceBreaks{{4, 3990}}},
	{"1-pentanol", "Q", "18-2240", mL(2500), 7400, true, 1500, nil},
	{"1-hexanol", "B", "HX-0105", mL(500), 3120, true, 1500, nil},
	{"1-hexanol", "F", "4410-1", mL(1000), 5680, true, 1500, nil},
	{"cyclohexanol", "B", "CY-0205", mL(500), 2640, false, 900, nil},
	{"acetic acid", "F", "1015-1", mL(1000), 1980, true, 1500, nil},
	{"tosic acid", "B", "TS-0302", g(250), 3460, true, 1500, nil},
	{"TEMPO", "Q", "33-0071", g(5), 2950, false, 900, nil},
	{"TEMPO", "Q", "33-0073", g(25), 9800, false, 900, nil},
	{"dichromate dihydrate", "B", "SD-1102", g(250), 3850, true, 1500, nil},
	{"dichromate dihydrate", "B", "SD-1105", g(500), 6210, true, 1500, nil},
	{"permanganate", "B", "PP-1005", g(500), 4120, true, 1500, nil},
	{"permanganate", "F", "2208-1", g(1000), 7650, true, 1500, nil},
	{"chlorite", "Q", "41-1180", g(250), 3380, true, 600, nil},
	{"chlorite", "Q", "41-1182", g(1000), 7920, true, 600, nil},
	{"hypochlorite", "F", "3302-1", mL(1000), 890, true, 150, PriceBreaks{{6, 760}}},
	{"hypochlorite", "F", "3302-5", mL(5000), 2480, true, 150, nil},
	{"sulfuric acid", "F", "1201-1", mL(1000), 2150, true, 1500, nil},
	{"sulfuric acid", "F", "1201-2", mL(2500), 3890, true, 1500, nil},
	{"hydrochloric acid", "F", "1202-1", mL(1000), 1760, true, 1500, nil},
	{"hydrochloric acid", "F", "1202-2", mL(2500), 3150, true, 1500, nil},
	{"sodium hydroxide", "F", "1301-1", g(1000), 1890, true, 1000, nil},
	{"hydrogencarbonate", "F", "1305-1", g(1000), 1120, false, 1500, PriceBreaks{{3, 990}}},
	{"sodium carbonate", "F", "1306-5", g(500), 960, false, 1500, nil},
	{"sodium sulfate", "B", "SS-2005", g(500), 1240, false, 1500, nil},
	{"sodium sulfate", "B", "SS-2010", g(1000), 1890, false, 1500, PriceBreaks{{5, 1590}}},
	{"sodium sulfate", "F", "1410-5", g(500), 1390, false, 1500, nil},
	{"magnesium sulfate", "B", "MS-2105", g(500), 1680, false, 1500, nil},
	{"magnesium sulfate", "F", "1415-1", g(1000), 2750, false, 1500, nil},
	{"sodium chloride", "F", "1420-1", g(1000), 840, false, 3000, nil},
	{"metabisulfite", "B", "SM-2205", g(500), 1310, false, 600, nil},
	{"metabisulfite", "B", "SM-2210", g(1000), 1980, false, 600, nil},
	{"sulfite", "B", "SF-2305", g(500), 1520, false, 900, nil},
	{"phosphate acid", "B", "PH-2405", g(500), 2260, false, 1500, nil},
	{"phosphate", "B", "PH-2415", g(500), 2480, false, 1500, nil},
	{"ethyl acetate", "F", "1510-1", mL(1000), 1650, true, 1500, nil},
	{"ethyl acetate", "F", "1510-2", mL(2500), 2980, true, 1500, PriceBreaks{{4, 2590}}},
	{"ether", "B", "DE-3010", mL(1000), 2750, true, 700, nil},
	{"MTBE", "B", "MT-3025", mL(2500), 4480, true, 1500, nil},
	{"toluene", "F", "1530-1", mL(1000), 1890, true, 1500, nil},
	{"cyclohexane", "F", "1535-1", mL(1000), 2340, true, 1500, nil},
	{"acetonitrile", "F", "1540-2", mL(2500), 8650, true, 1500, nil},
	{"acetone", "F", "1545-5", mL(5000), 2650, true, 1500, nil},
	{"filter aid", "Q", "60-0110", g(1000), 2150, false, 0, nil},
	{"filter paper", "F", "8001-110", 100, 1180, false, 0, nil},
	{"pH strip", "F", "8102", 100, 990, false, 900, nil},
	{"iodide paper", "F", "8110", 100, 1240, false, 700, nil},
	{"peroxide strip", "F", "8115", 25, 3860, false, 600, nil},
	{"boiling stone", "F", "8201", 500, 1450, false, 0, nil},
	{"anti-bumping", "F", "8203", 1000, 1620, false, 0, nil},
	{"phase paper", "F", "8005-150", 100, 4980, false, 0, nil},
}

// addOrders: sodium chlorite is under way, and once the chlorite run has been
// moved it may come too late.
func (d *demo) addOrders() {
	for i, o := range []struct {
		item         string
		packs        int64
		ordered, due int // days from today
		state        string
		run          int64
	}{
		{"41-1180", 1, -6, 12, OrderUnderWay, 5},
		{"3302-1", 2, -2, 4, OrderUnderWay, 0},
		{"MT-3025", 1, -40, -31, OrderReceived, 0},
		{"DE-3010", 1, -25, -17, OrderCancelled, 0},
	} {
		offer := d.offer(o.item)
		d.lab.Orders = append(d.lab.Orders, Order{
			ID: int64(i + 1), OfferID: offer.ID, FormID: offer.FormID, Packs: o.packs,
			Ordered: d.day(o.ordered), Due: d.day(o.due), State: o.state, RunID: o.run,
		})
	}
}

func (d *demo) offer(item string) Offer {
	for _, o := range d.lab.Offers {
		if o.Item == item {
			return o
		}
	}
	panic("inventory: demonstration lab has no offer " + item)
}

package inventory

import "fmt"

// demoBottle is a row of the bottle table. Days count from today: those of
// receipt, opening, the last measurement and the peroxide test back, that of
// expiry ahead; 0 is no date.
type demoBottle struct {
	key         string // for earmarks; "" where nothing refers to it
	form, place string
	size, holds int64
	state       BottleState
	by          MeasuredBy
	in          int
	opened      int
	measured    int
	expires     int
	extra       Bottle // lot assay, tare, peroxide test, note
}

func (d *demo) addBottles() {
	for i, row := range demoBottles {
		b := row.extra
		b.ID, b.Code = int64(i+1), MakeCode(BottleCode, int64(i+1))
		b.FormID, b.PlaceID = d.form(row.form), d.place(row.place)
		b.StoreID = d.lab.Places[b.PlaceID-1].StoreID
		b.State, b.Size, b.Content, b.MeasuredBy = row.state, row.size, row.holds, row.by
		b.Received, b.Opened = d.day(-row.in), d.day(-row.opened)
		b.MeasuredOn, b.Expiry = d.day(-row.measured), d.day(row.expires)
		if b.PeroxidePPM > 0 || row.key == "ether good" {
			b.PeroxideTested = d.day(-row.measured)
		}
		b.Lot = fmt.Sprintf("L%02d-%03d", 10+row.in/90, 100+(37*i)%900)
		b.Version = 1
		if row.key != "" {
			d.bottles[row.key] = b.ID
		}
		d.lab.Bottles = append(d.lab.Bottles, b)
	}
}

var demoBottles = []demoBottle{
	// The alcohols. Two runs want the open 1-pentanol.
	{"1-pentanol open", "1-pentanol", "solvents-1", mL(1000), mL(310), Opened, ByLedger, 210, 190, 34, 900, Bottle{LotAssay: .992}},
	{"", "1-pentanol", "annex-solvents", mL(1000), mL(1000), Sealed, ByUnopened, 120, 0, 120, 1100, Bottle{}},
	{"1-hexanol open", "1-hexanol", "solvents-1", mL(500), mL(390), Opened, ByWeighing, 160, 40, 12, 700, Bottle{TareUG: g(412.6), LotAssay: .991}},
	{"", "1-hexanol", "solvents-1", mL(500), mL(500), Sealed, ByUnopened, 160, 0, 160, 700, Bottle{}},
	{"cyclohexanol open", "cyclohexanol", "solvents-2", mL(500), mL(260), Opened, ByLevel, 300, 150, 45, 400, Bottle{PeroxidePPM: 5, Note: "melts at 25 °C: warm the bottle in the water bath first"}},
	{"", "cyclohexanol", "solvents-2", mL(500), mL(500), Sealed, ByUnopened, 90, 0, 90, 900, Bottle{}},
	{"", "cyclohexanone", "solvents-2", mL(250), mL(120), Opened, ByLevel, 400, 350, 200, 300, Bottle{}},

	// Earlier products and references.
	{"pentanoic acid product", "pentanoic acid", "products", mL(250), mL(140), Opened, ByWeighing, 60, 58, 20, 600, Bottle{TareUG: g(248.1), LotAssay: .991, Note: "own product, fraction 184–186 °C"}},
	{"", "pentanoic acid", "products", mL(100), mL(22), Opened, ByLevel, 410, 400, 120, 250, Bottle{LotAssay: .984}},
	{"", "hexanoic acid", "products", mL(250), mL(85), Opened, ByWeighing, 90, 88, 25, 600, Bottle{TareUG: g(250.4), LotAssay: .989}},
	{"", "butanoic acid", "products", mL(100), mL(75), Opened, ByLedger, 300, 200, 60, 500, Bottle{}},
	{"", "propanoic acid", "organic-acids", mL(250), mL(190), Opened, ByLedger, 280, 220, 60, 500, Bottle{}},
	{"", "pentyl pentanoate", "products", mL(100), mL(35), Opened, ByLevel, 150, 148, 90, 500, Bottle{LotAssay: .986}},

	// Catalysts.
	{"", "tosic acid", "organic-acids", g(250), g(210), Opened, ByWeighing, 320, 200, 50, 900, Bottle{TareUG: g(118.9)}},
	{"", "TEMPO", "cold", g(10), g(6.4), Opened, ByWeighing, 250, 120, 50, 500, Bottle{TareUG: g(31.2)}},
	{"", "sodium bromide", "salts-2", g(250), g(230), Opened, ByLedger, 500, 400, 300, 900, Bottle{}},

	// Oxidants. The dichromate is all dihydrate; the hypochlorite has aged.
	{"dichromate open", "dichromate dihydrate", "oxidisers", g(500), g(285), Opened, ByWeighing, 240, 200, 30, 1200, Bottle{TareUG: g(163.4), LotAssay: .998}},
	{"", "dichromate dihydrate", "oxidisers", g(250), g(250), Sealed, ByUnopened, 100, 0, 100, 1500, Bottle{LotAssay: .997}},
	{"", "dichromate technical", "annex-oxidisers", g(1000), g(640), Opened, ByLevel, 900, 860, 310, 500, Bottle{}},
	{"permanganate open", "permanganate", "oxidisers", g(500), g(330), Opened, ByWeighing, 260, 210, 40, 1200, Bottle{TareUG: g(161.8)}},
	{"", "permanganate", "oxidisers", g(250), g(250), Sealed, ByUnopened, 60, 0, 60, 1600, Bottle{}},
	{"", "chlorite", "oxidisers-low", g(100), g(24), Opened, ByWeighing, 380, 300, 80, 200, Bottle{TareUG: g(58.3)}},
	{"hypochlorite aged", "hypochlorite", "cold", mL(1000), mL(760), Opened, ByLevel, 150, 120, 30, 215, Bottle{LotAssay: .118, Note: "vented cap; titrate before use"}},
	{"", "hypochlorite", "cold", mL(1000), mL(1000), Sealed, ByUnopened, 40, 0, 40, 325, Bottle{LotAssay: .119}},
	{"", "peroxide", "cold", mL(500), mL(210), Opened, ByLevel, 200, 170, 60, 165, Bottle{Note: "vented cap"}},

	// Mineral acids, strong and weaker.
	{"", "sulfuric acid", "acids", mL(2500), mL(1150), Opened, ByLevel, 300, 280, 60, 1500, Bottle{LotAssay: .962}},
	{"", "sulfuric acid", "annex-acids", mL(1000), mL(1000), Sealed, ByUnopened, 90, 0, 90, 1700, Bottle{}},
	{"", "sulfuric acid weak", "acids", mL(1000), mL(820), Opened, ByLedger, 220, 210, 40, 1600, Bottle{}},
	{"", "hydrochloric acid", "acids", mL(2500), mL(1700), Opened, ByLevel, 200, 180, 45, 1600, Bottle{LotAssay: .371}},
	{"", "hydrochloric acid weak", "acids", mL(1000), mL(550), Opened, ByLedger, 120, 120, 30, 245, Bottle{}},
	{"", "phosphoric acid", "acids", mL(1000), mL(900), Opened, ByLedger, 400, 390, 100, 1400, Bottle{}},
	{"", "acetic acid", "organic-acids", mL(1000), mL(640), Opened, ByLevel, 250, 230, 40, 1500, Bottle{}},
	{"", "acetic acid", "organic-acids", mL(1000), mL(1000), Sealed, ByUnopened, 80, 0, 80, 1700, Bottle{}},
	{"", "citric acid", "organic-acids", g(500), g(470), Opened, ByLedger, 500, 450, 150, 1300, Bottle{}},

	// Bases.
	{"", "sodium hydroxide", "bases", g(1000), g(560), Opened, ByWeighing, 220, 200, 30, 800, Bottle{TareUG: g(104.5)}},
	{"", "sodium hydroxide", "bases", g(1000), g(1000), Sealed, ByUnopened, 70, 0, 70, 1000, Bottle{}},
	{"", "hydrogencarbonate", "bases", g(1000), g(420), Opened, ByLevel, 330, 310, 70, 1500, Bottle{}},
	{"", "hydrogencarbonate", "bases", g(1000), g(1000), Sealed, ByUnopened, 110, 0, 110, 1700, Bottle{}},
	{"", "sodium carbonate", "bases", g(500), g(390), Opened, ByLedger, 350, 300, 90, 1400, Bottle{}},
	{"", "calcium hydroxide", "bases", g(500), g(440), Opened, ByLevel, 300, 250, 120, 700, Bottle{}},

	// Drying agents. Of anhydrous sodium sulfate there is too little, and its
	// decahydrate dries nothing.
	{"", "sodium sulfate", "salts-1", g(500), g(18), Opened, ByWeighing, 400, 390, 15, 1300, Bottle{TareUG: g(96.2)}},
	{"", "Glauber salt", "salts-1", g(1000), g(870), Opened, ByLevel, 500, 450, 200, 1200, Bottle{}},
	{"", "magnesium sulfate", "salts-1", g(500), g(340), Opened, ByLevel, 260, 220, 40, 1500, Bottle{}},
	{"", "magnesium sulfate", "annex-dry", g(500), g(500), Sealed, ByUnopened, 60, 0, 60, 1700, Bottle{}},
	{"", "Epsom salt", "salts-1", g(500), g(480), Opened, ByLevel, 700, 600, 380, 1100, Bottle{}},
	{"", "calcium chloride", "salts-1", g(500), g(260), Opened, ByLevel, 280, 260, 100, 800, Bottle{}},

	// Salts and reductants.
	{"", "sodium chloride", "salts-2", g(1000), g(730), Opened, ByLevel, 350, 330, 60, 3000, Bottle{}},
	{"", "sodium chloride", "salts-2", g(5000), g(5000), Sealed, ByUnopened, 90, 0, 90, 3400, Bottle{}},
	{"", "metabisulfite", "salts-2", g(500), g(310), Opened, ByWeighing, 180, 160, 35, 550, Bottle{TareUG: g(97.0)}},
	{"", "metabisulfite", "annex-dry", g(1000), g(1000), Sealed, ByUnopened, 50, 0, 50, 680, Bottle{}},
	{"", "sulfite", "salts-2", g(500), g(410), Opened, ByLedger, 300, 260, 80, 700, Bottle{}},
	{"", "thiosulfate", "salts-2", g(500), g(380), Opened, ByLedger, 420, 380, 90, 1300, Bottle{}},
	{"", "phosphate acid", "salts-3", g(500), g(430), Opened, ByLedger, 330, 300, 75, 1400, Bottle{}},
	{"", "phosphate", "salts-3", g(500), g(390), Opened, ByLedger, 330, 300, 75, 1400, Bottle{}},
	{"", "potassium iodide", "salts-3", g(250), g(160), Opened, ByWeighing, 300, 280, 60, 1400, Bottle{TareUG: g(61.5)}},
	{"", "iron sulfate", "salts-3", g(500), g(350), Opened, ByLevel, 600, 560, 250, 450, Bottle{Note: "brown crust on top"}},

	// Solvents: two half bottles of ethyl acetate, an ether that has expired
	// with its peroxide test overdue, and one that is good.
	{"", "ethyl acetate", "solvents-1", mL(2500), mL(1200), Opened, ByLevel, 260, 240, 70, 1400, Bottle{}},
	{"ethyl acetate litre", "ethyl acetate", "solvents-1", mL(1000), mL(480), Opened, ByLevel, 320, 300, 85, 1300, Bottle{}},
	{"", "ether", "solvents-2", mL(1000), mL(620), Opened, ByLevel, 770, 520, 400, -40, Bottle{Note: "do not move if crystals show at the cap"}},
	{"ether good", "ether", "solvents-2", mL(1000), mL(700), Opened, ByLevel, 120, 60, 20, 600, Bottle{}},
	{"", "MTBE", "solvents-1", mL(2500), mL(2100), Opened, ByLevel, 200, 150, 40, 1500, Bottle{}},
	{"", "MTBE", "annex-solvents", mL(2500), mL(2500), Sealed, ByUnopened, 100, 0, 100, 1700, Bottle{}},
	{"", "toluene", "solvents-2", mL(1000), mL(830), Opened, ByLevel, 240, 200, 60, 1500, Bottle{}},
	{"", "cyclohexane", "solvents-2", mL(1000), mL(460), Opened, ByLevel, 310, 290, 90, 1400, Bottle{}},
	{"", "acetonitrile", "solvents-2", mL(2500), mL(1600), Opened, ByLevel, 230, 210, 60, 1500, Bottle{}},
	{"", "acetone", "solvents-1", mL(5000), mL(3100), Opened, ByLevel, 60, 55, 10, 1700, Bottle{}},
	{"", "acetone", "annex-solvents", mL(5000), mL(5000), Sealed, ByUnopened, 60, 0, 60, 1700, Bottle{}},
	{"", "2-propanol", "solvents-1", mL(2500), mL(900), Opened, ByLevel, 260, 240, 110, 1500, Bottle{PeroxidePPM: 2}},
	{"", "ethanol", "solvents-1", mL(2500), mL(2200), Opened, ByLevel, 100, 80, 30, 1700, Bottle{}},
	{"", "heptane", "solvents-2", mL(1000), mL(560), Opened, ByLevel, 400, 380, 150, 1400, Bottle{}},

	// What nobody lists and every run needs.
	{"", "water", "water", mL(50000), mL(38000), Opened, ByLevel, 7, 7, 1, 0, Bottle{Note: "storage tank of the deioniser, filled up daily"}},
	{"", "ice", "ice", g(40000), g(26000), Opened, ByLevel, 1, 1, 1, 0, Bottle{Note: "made anew every day"}},
	{"", "filter aid", "salts-3", g(1000), g(640), Opened, ByLevel, 500, 450, 160, 3000, Bottle{}},
	{"", "carbon", "salts-3", g(250), g(180), Opened, ByLevel, 500, 450, 160, 3000, Bottle{}},
	{"", "filter paper", "paper", 100, 64, Opened, ByLedger, 120, 110, 30, 3000, Bottle{}},
	{"", "filter paper", "paper", 100, 100, Sealed, ByUnopened, 120, 0, 120, 3000, Bottle{}},
	{"", "pH strip", "paper", 100, 71, Opened, ByLedger, 90, 85, 20, 900, Bottle{}},
	{"", "iodide paper", "paper", 100, 38, Opened, ByLedger, 300, 280, 45, 400, Bottle{}},
	{"", "peroxide strip", "cold", 25, 11, Opened, ByLedger, 200, 180, 45, 300, Bottle{}},
	{"", "boiling stone", "drawers", 500, 320, Opened, ByGuess, 600, 580, 200, 3000, Bottle{}},
	{"", "anti-bumping", "drawers", 1000, 600, Opened, ByGuess, 500, 480, 200, 3000, Bottle{}},
	{"", "phase paper", "paper", 100, 82, Opened, ByLedger, 250, 240, 70, 3000, Bottle{}},
	{"", "vial", "drawers", 100, 57, Opened, ByLedger, 150, 140, 40, 3000, Bottle{}},

	// Bottles no run can have.
	{"", "sodium sulfate", "annex-dry", g(500), g(310), Quarantined, ByLevel, 450, 430, 200, 1200, Bottle{Note: "label damaged, contents to be confirmed"}},
	{"", "1-hexanol", "solvents-2", mL(250), mL(90), Missing, ByLedger, 600, 560, 420, 300, Bottle{Note: "not found at the last stock-take"}},
	{"", "toluene", "annex-solvents", mL(1000), mL(400), OnLoan, ByLevel, 300, 270, 100, 1400, Bottle{Note: "lent to the water laboratory"}},
	{"", "acetonitrile", "solvents-2", mL(1000), 0, Empty, ByLevel, 700, 690, 50, 1000, Bottle{}},
	{"", "iodide paper", "paper", 100, 60, Opened, ByLedger, 1100, 1000, 500, -120, Bottle{}},
}

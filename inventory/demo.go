package inventory

import "time"

// DemoLab returns the demonstration lab: the Marrow Lane standards bench, which
// prepares volatile-fatty-acid reference standards. All of it is invented:
// people, suppliers, prices, lots. Dates lie around today, so that the same day
// always gives the same lab.
//
// Its faults are the ones a stockroom has: a dihydrate where recipes ask for
// the anhydrous salt, a weaker acid beside the strong one, an ether that has
// expired with its peroxide test overdue, two half bottles, too little drying
// agent with its decahydrate beside it, a waste carboy that is nearly full, a
// bottle that two runs want, an earmark that has lapsed, an order under way.
//
// The runs' RecipeText is empty, which stands for the recipe of that name as
// it is now.
func DemoLab(today Date) Lab {
	d := demo{today: today, forms: map[string]int64{}, places: map[string]int64{}, bottles: map[string]int64{}}
	d.addPlaces()
	d.addSubstances()
	d.addForms()
	d.addBottles()
	d.addRuns()
	d.addEarmarks()
	d.addOffers()
	d.addOrders()
	d.addCarboys()
	d.addEquipment()
	d.lab.Policy = PolicyOf(PolicyDefaults(today))
	return d.lab
}

// The stores of the demonstration lab.
const (
	demoMain  = 1
	demoAnnex = 2
)

// demo gathers the demonstration lab; the maps lead from the short keys of the
// tables to IDs.
type demo struct {
	today   Date
	lab     Lab
	forms   map[string]int64
	places  map[string]int64
	bottles map[string]int64
}

// form returns the ID of a form's key. It panics if the tables don't fit each
// other, which is a programmer's mistake.
func (d *demo) form(key string) int64 { return mustHave(d.forms, key) }

func (d *demo) place(key string) int64 { return mustHave(d.places, key) }

func (d *demo) bottle(key string) int64 { return mustHave(d.bottles, key) }

func mustHave(m map[string]int64, key string) int64 {
	id, ok := m[key]
	if !ok {
		panic("inventory: demonstration lab has no " + key)
	}
	return id
}

// day returns the date n days from today, or no date for 0.
func (d *demo) day(n int) Date {
	if n == 0 {
		return 0
	}
	return d.today.AddDays(n)
}

func (d *demo) addPlaces() {
	for i, p := range demoPlaces {
		id := int64(i + 1)
		store := "Marrow Lane"
		if p.store == demoAnnex {
			store = "Quay annex"
		}
		d.places[p.key] = id
		d.lab.Places = append(d.lab.Places, Place{
			ID: id, StoreID: p.store, Store: store, Room: p.room, Cabinet: p.cabinet, Shelf: p.shelf,
			Walk: 10 * (i + 1), StorageClass: p.class, LimitUL: p.litres * 1e6,
		})
	}
}

var demoPlaces = []struct {
	key                  string
	store                int64
	room, cabinet, shelf string
	class                string
	litres               int64 // most liquid in the cabinet; 0 for no limit known
}{
	{"drawers", demoMain, "Bench room", "Drawer unit", "drawer 1", "", 0},
	{"paper", demoMain, "Bench room", "Drawer unit", "drawer 2", "", 0},
	{"water", demoMain, "Bench room", "Water station", "tap", "", 0},
	{"ice", demoMain, "Bench room", "Ice machine", "bin", "", 0},
	{"salts-1", demoMain, "Store room", "Salts", "shelf 1", "general", 0},
	{"salts-2", demoMain, "Store room", "Salts", "shelf 2", "general", 0},
	{"salts-3", demoMain, "Store room", "Salts", "shelf 3", "general", 0},
	{"bases", demoMain, "Store room", "Bases", "shelf 1", "base", 0},
	{"oxidisers", demoMain, "Store room", "Oxidisers", "shelf 1", "oxidiser", 0},
	{"oxidisers-low", demoMain, "Store room", "Oxidisers", "tray", "oxidiser", 0},
	{"acids", demoMain, "Store room", "Mineral acids", "tray 1", "acid inorganic", 40},
	{"organic-acids", demoMain, "Store room", "Organic acids", "tray 1", "acid organic", 40},
	{"solvents-1", demoMain, "Store room", "Flammables", "shelf 1", "flammable liquid", 90},
	{"solvents-2", demoMain, "Store room", "Flammables", "shelf 2", "flammable liquid", 90},
	{"cold", demoMain, "Store room", "Refrigerator", "shelf 1", "", 0},
	{"products", demoMain, "Store room", "Products", "shelf 1", "acid organic", 20},
	{"waste", demoMain, "Store room", "Waste bay", "floor", "", 0},
	{"annex-dry", demoAnnex, "Annex store", "Dry goods", "shelf 1", "general", 0},
	{"annex-oxidisers", demoAnnex, "Annex store", "Oxidisers", "shelf 1", "oxidiser", 0},
	{"annex-solvents", demoAnnex, "Annex store", "Flammables", "shelf 1", "flammable liquid", 60},
	{"annex-acids", demoAnnex, "Annex store", "Acids", "tray 1", "acid inorganic", 20},
}

func (d *demo) addRuns() {
	for i, r := range demoRuns {
		d.lab.Runs = append(d.lab.Runs, Run{
			ID: int64(i + 1), StoreID: demoMain, Recipe: r.recipe, TargetUG: r.grams * 1e6,
			On: d.today.AddDays(r.days), State: r.state, Owner: r.owner,
			Made: StampOf(d.today.AddDays(r.days - 21).Time().Add(9 * time.Hour)), Version: 1,
		})
	}
}

var demoRuns = []struct {
	recipe string
	grams  int64
	days   int // from today
	state  RunState
	owner  string
}{
	{"pentanoic-acid-dichromate", 50, 9, Pencilled, "Ines Mbeki-Larsen"},
	{"hexanoic-acid-permanganate", 30, 5, Cleared, "Tobias Quayle"},
	{"pentyl-pentanoate", 60, 16, Cleared, "Ines Mbeki-Larsen"},
	{"cyclohexanone-hypochlorite", 40, 2, Picked, "Rut Halvard"},
	{"pentanoic-acid-chlorite", 20, 23, Pencilled, "Tobias Quayle"},
	{"pentanoic-acid-dichromate", 25, -12, Closed, "Rut Halvard"},
	{"hexanoic-acid-permanganate", 10, -5, Dropped, "Tobias Quayle"},
	{"pentanoic-acid-dichromate", 120, 30, Pencilled, "Ines Mbeki-Larsen"},
}

func (d *demo) addEarmarks() {
	for i, e := range demoEarmarks {
		run := d.lab.Runs[e.run-1]
		d.lab.Earmarks = append(d.lab.Earmarks, Earmark{
			ID: int64(i + 1), StoreID: demoMain, BottleID: d.bottle(e.bottle), RunID: e.run,
			Amount: e.amount, Owner: run.Owner, ForDate: run.On, Ends: d.today.AddDays(e.ends), Made: run.Made,
		})
		d.lab.Bottles[d.bottle(e.bottle)-1].Promised += e.amount
	}
}

var demoEarmarks = []struct {
	bottle string
	run    int64
	amount int64
	ends   int // days from today
}{
	{"1-pentanol open", 3, mL(60), 30},
	{"pentanoic acid product", 3, mL(48), 30},
	{"1-hexanol open", 2, mL(60), 19},
	{"permanganate open", 2, g(130), 19},
	{"cyclohexanol open", 4, mL(62), 16},
	{"hypochlorite aged", 4, mL(620), 16},
	// Lapsed, and nobody has reconfirmed it.
	{"ethyl acetate litre", 5, mL(300), -3},
}

// g and mL write amounts of the tables in ledger units.
func g(x float64) int64  { return int64(x * 1e6) }
func mL(x float64) int64 { return int64(x * 1e3) }

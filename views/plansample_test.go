package views

import (
	"testing"
	"time"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// paperTime is when the test papers are printed.
var paperTime = time.Date(2026, 12, 1, 14, 5, 0, 0, time.UTC)

func paperOptions() PaperOptions {
	return PaperOptions{RunURL: "http://127.0.0.1:8087/runs/12", RunName: "Run 12", PrintedBy: "L. Marten", PrintedAt: paperTime}
}

// paperBottle is a made-up bottle of a made-up form.
type paperBottle struct {
	substance, cas, formula string
	form, diluent           string
	low, high               float64
	n                       int64 // number of the bottle
	cabinet, shelf          string
	walk                    int
	grams, density          float64 // drawn; density 0 for a solid
	leaves                  float64
	expiry                  inventory.Date
	opens                   bool
	by                      inventory.MeasuredBy
	step                    int
}

func (b paperBottle) need() planner.Need {
	d := planner.Draw{
		Bottle: inventory.Bottle{Code: inventory.MakeCode(inventory.BottleCode, b.n), Lot: "L0" + string(rune('0'+b.n%10)),
			Expiry: b.expiry, MeasuredBy: b.by, MeasuredOn: inventory.NewDate(2026, 11, 12), TareUG: 500e6},
		Form:  inventory.StockForm{Name: b.form, Diluent: b.diluent, AssayLow: b.low, AssayHigh: b.high, Measure: inventory.ByMass},
		Place: inventory.Place{Store: "Main store", Cabinet: b.cabinet, Shelf: b.shelf, Walk: b.walk},
		Mass:  chem.Mass(b.grams) * chem.Gram, Leaves: chem.Mass(b.leaves) * chem.Gram, Opens: b.opens,
	}
	part := planner.StepDraw{Step: b.step, Mass: d.Mass}
	if b.density > 0 {
		d.HasVolume = true
		d.Volume = (chem.Density(b.density) * chem.GramPerMillilitre).Volume(d.Mass)
		d.LeavesVolume = (chem.Density(b.density) * chem.GramPerMillilitre).Volume(d.Leaves)
		part.Volume = d.Volume
	}
	d.Steps = []planner.StepDraw{part}
	return planner.Need{Substance: b.substance, CAS: b.cas, Formula: b.formula, Mass: d.Mass, ChanceShort: .01, Draws: []planner.Draw{d}}
}

var paperBottles = []paperBottle{
	{"1-pentanol", "71-41-0", "C5H12O", "1-pentanol 99 %", "", .99, 1, 11, "flammables 1", "shelf 2", 3, 63.52, .8144, 412, inventory.NewDate(2028, 3, 31), false, inventory.ByWeighing, 3},
	{"sodium dichromate", "10588-01-9", "Na2Cr2O7", "sodium dichromate dihydrate 99.5 %", "", .99, .995, 12, "oxidisers", "shelf 1", 6, 158.4, 0, 341.6, inventory.NewDate(2029, 1, 31), false, inventory.ByLevel, 1},
	{"sulfuric acid", "7664-93-9", "H2SO4", "sulfuric acid 95–98 %", "water", .95, .98, 13, "acids", "floor", 8, 212.7, 1.836, 1623, inventory.NewDate(2030, 6, 30), true, inventory.ByUnopened, 1},
	{"sodium hydrogencarbonate", "144-55-8", "NaHCO3", "sodium hydrogencarbonate 99 %", "", .99, 1, 14, "general salts", "shelf 3", 12, 96.2, 0, 903, 0, false, inventory.ByLedger, 5},
	{"ethyl acetate", "141-78-6", "C4H8O2", "ethyl acetate 99.5 %", "", .995, 1, 15, "flammables 1", "shelf 1", 2, 834, .9003, 66, inventory.NewDate(2027, 2, 28), false, inventory.ByGuess, 7},
	{"hydrochloric acid", "7647-01-0", "HCl", "hydrochloric acid 36.5–38 %", "water", .365, .38, 16, "acids", "shelf 1", 7, 121.4, 1.18, 0, inventory.NewDate(2028, 9, 30), false, inventory.ByWeighing, 6},
	{"sodium metabisulfite", "7681-57-4", "Na2S2O5", "sodium metabisulfite 97 %", "", .97, 1, 17, "general salts", "shelf 4", 13, 41.3, 0, 458.7, inventory.NewDate(2027, 11, 30), false, inventory.ByLedger, 9},
	{"magnesium sulfate", "7487-88-9", "MgSO4", "magnesium sulfate, dried", "", .98, 1, 18, "general salts", "shelf 2", 11, 38, 0, 212, 0, false, inventory.ByLevel, 8},
	{"an additive without a record", "", "", "an additive without a record", "", 1, 1, 19, "general salts", "shelf 2", 11, 0.42, 0, 9.58, 0, false, inventory.ByGuess, 8},
}

// paperPlan is a made-up plan with everything that papers print; nothing in it
// was ever run. Hazards, pairs, carriers and waste lots are computed from it.
func paperPlan(t testing.TB) *planner.Plan {
	t.Helper()
	p := &planner.Plan{
		Recipe: &planner.Recipe{Name: "pentanoic-acid-dichromate", Title: "Pentanoic acid from 1-pentanol by acid dichromate", Version: "3", Product: "pentanoic acid", Limiting: "1-pentanol"},
		On:     inventory.NewDate(2027, 1, 14), Today: inventory.NewDate(2026, 12, 1), Revision: "7f3a12bc", Verdict: planner.Short,
		Target:   planner.Target{Substance: "pentanoic acid", CAS: "109-52-4", Formula: "C5H10O2", Mass: 50 * chem.Gram},
		Scale:    planner.Scale{Limiting: "1-pentanol", Amount: .7206, ExpectedYield: .75, PlannedYield: .68, ExpectedMass: 55 * chem.Gram, Percentile: .9, Factor: 3.4, Batches: 1},
		Tools:    inventory.DemoLab(inventory.NewDate(2026, 12, 1)).Equipment,
		Steps:    paperSteps(),
		Findings: []planner.Finding{{Kind: "scale-beyond-proven", Severity: planner.Warning, Text: "This is 3.4 times the largest proven scale.", Would: "Make a third of it first."}},
	}
	for _, b := range paperBottles {
		p.Needs = append(p.Needs, b.need())
	}
	p.Needs = append(p.Needs,
		planner.Need{Substance: "sodium sulfate", CAS: "7757-82-6", Formula: "Na2SO4", Mass: 60 * chem.Gram, Short: 38 * chem.Gram, State: planner.Short,
			Because: "the one bottle is the decahydrate, which doesn't dry", ChanceShort: -1, For: []string{"dry the extract"}},
		planner.Need{Substance: "filter paper 110 mm", Count: true, Pieces: 4, Draws: []planner.Draw{{Bottle: inventory.Bottle{Code: inventory.MakeCode(inventory.BottleCode, 31)},
			Place: inventory.Place{Store: "Main store", Cabinet: "drawer 2", Shelf: "front", Walk: 20}, Pieces: 4}}},
		planner.Need{Substance: "pH strip 0–14", Count: true, Pieces: 12},
	)
	carriers, err := planner.CarriersFor(p.Needs, planner.CarrierLimits{MostMass: 10, MostCount: 6})
	if err != nil {
		t.Fatal(err)
	}
	p.Carriers = carriers
	p.Waste = planner.SortWaste(paperDiscards(), inventory.DemoLab(p.Today).Carboys, .75)
	p.Hazards = planner.NoteHazards(p.Needs, p.Steps, p.Waste)
	p.Pairs = planner.PairsOf(p.Needs, p.Steps)
	p.Buy = []planner.Purchase{{Substance: "sodium sulfate",
		Offer: inventory.Offer{Supplier: "Brackwater Supplies", Item: "BS-4411", PackSize: 500e6, PriceMinor: 1850, Currency: "EUR", OrderFee: 900, LeadDays: 4, LeadDays90: 9},
		Form:  inventory.StockForm{Name: "sodium sulfate, anhydrous 99 %", AssayLow: .99, AssayHigh: 1, Grade: "ACS", Measure: inventory.ByMass, StorageClass: "general"},
		Packs: 1, Cost: 2750, Currency: "EUR", OrderBy: inventory.NewDate(2027, 1, 4), Arrives: inventory.NewDate(2026, 12, 10), InTime: true,
		Leftover: 462 * chem.Gram, Why: "the smallest pack that covers 38 g; two of 100 g cost more"}}
	return p
}

func content(substance, phase string, grams float64) planner.Content {
	return planner.Content{Substance: substance, Phase: phase, Mass: chem.Mass(grams) * chem.Gram}
}

func paperSteps() []planner.StepReport {
	flask := planner.VesselReport{Name: "oxidant flask", Kind: "round flask", Ware: "round flask 2 L", Size: 2 * chem.Litre, Fill: .38, Limit: .6, Fits: true}
	funnel := planner.VesselReport{Name: "funnel", Kind: "separating funnel", Ware: "separating funnel 1 L", Size: chem.Litre, Fill: .61, Limit: .75, Fits: true}
	add := func(name string, grams float64) planner.Add {
		return planner.Add{Substance: name, Mass: chem.Mass(grams) * chem.Gram}
	}
	return []planner.StepReport{
		{N: 1, Do: "make-up", Name: "make up the oxidant", Vessel: flask, Temperature: chem.Celsius(15), Heat: 96 * chem.Kilojoule, Time: 40 * 60, Ice: .3,
			Adds:     []planner.Add{add("water", 420), add("sodium dichromate dihydrate", 158.4), add("sulfuric acid", 212.7)},
			Contents: []planner.Content{content("water", "aqueous", 446), content("sulfuric acid", "aqueous", 206), content("sodium dichromate", "aqueous", 139)},
			Cautions: []string{"Acid into water, in portions, below 15 °C; never the other way.", "Weigh the dichromate in the hood; the dust causes cancer."}},
		{N: 2, Do: "cool", Name: "chill the oxidant", Vessel: flask, Temperature: chem.Celsius(8), Heat: -24 * chem.Kilojoule, TimeNotAssessed: true, HoldPoint: true, HoldNote: "may stand overnight, closed and labelled",
			Contents: []planner.Content{content("water", "aqueous", 446), content("sulfuric acid", "aqueous", 206), content("sodium dichromate", "aqueous", 139)}},
		{N: 3, Do: "add", Name: "add 1-pentanol", Vessel: flask, Temperature: chem.Celsius(25), Heat: 412 * chem.Kilojoule, Shortest: 48 * 60, Time: 60 * 60, IfCoolingLost: chem.Celsius(96),
			Adds: []planner.Add{add("1-pentanol", 63.5)},
			Contents: []planner.Content{content("water", "aqueous", 470), content("sulfuric acid", "aqueous", 140), content("sodium dichromate", "aqueous", 40), content("chromium(III) sulfate", "aqueous", 145),
				content("1-pentanol", "organic", 12), content("pentanal", "organic", 9), content("pentanoic acid", "organic", 44), content("pentyl pentanoate", "organic", 6)},
			Cautions: []string{"Dose by the thermometer; stop at 30 °C."}},
		{N: 4, Do: "co-distil", Name: "carry the acid over with water", Vessel: flask, Temperature: chem.Celsius(100), Heat: -900 * chem.Kilojoule, Time: 120 * 60, Says: []string{"560 mL of distillate carry 98 % of the acid over"},
			Contents: []planner.Content{content("water", "aqueous", 470), content("sulfuric acid", "aqueous", 140), content("sodium dichromate", "aqueous", 12), content("chromium(III) sulfate", "aqueous", 180), content("pentanoic acid", "organic", 50)}},
		{N: 5, Do: "neutralise", Name: "take the acid into bicarbonate", Vessel: funnel, Temperature: chem.Celsius(20), Gas: 12.1 * chem.Litre, GasOf: "carbon dioxide", Heat: 12 * chem.Kilojoule, Time: 30 * 60,
			Adds:     []planner.Add{add("sodium hydrogencarbonate", 96.2)},
			Contents: []planner.Content{content("water", "aqueous", 560), content("sodium pentanoate", "aqueous", 60), content("sodium hydrogencarbonate", "aqueous", 46), content("pentyl pentanoate", "organic", 6)},
			Cautions: []string{"Gives 12 L of gas: open vessel, in portions; vent the funnel often."}},
		{N: 6, Do: "acidify", Name: "free the acid", Vessel: funnel, Temperature: chem.Celsius(20), Gas: 13.2 * chem.Litre, GasOf: "carbon dioxide", Time: 30 * 60, Adds: []planner.Add{add("hydrochloric acid", 121.4)},
			Contents: []planner.Content{content("water", "aqueous", 640), content("sodium chloride", "aqueous", 70), content("pentanoic acid", "organic", 50)}},
		{N: 7, Do: "extract", Name: "extract", Vessel: funnel, Temperature: chem.Celsius(20), Time: 45 * 60, Adds: []planner.Add{add("ethyl acetate", 834)},
			Contents: []planner.Content{content("water", "aqueous", 640), content("sodium chloride", "aqueous", 70), content("ethyl acetate", "organic", 170), content("pentanoic acid", "organic", 49)}},
		{N: 8, Do: "dry", Name: "dry the extract", Vessel: planner.VesselReport{Name: "extract", Kind: "conical flask", Ware: "conical flask 2 L", Size: 2 * chem.Litre, Fill: .5, Limit: .75, Fits: true}, Temperature: chem.Celsius(20), TimeNotAssessed: true,
			Adds: []planner.Add{add("magnesium sulfate", 38)}, HoldPoint: true, HoldNote: "stoppered, away from sparks",
			Contents: []planner.Content{content("ethyl acetate", "organic", 790), content("pentanoic acid", "organic", 49), content("magnesium sulfate", "solid", 38)}},
		{N: 9, Do: "quench", Name: "destroy the left-over oxidant", Vessel: planner.VesselReport{Name: "residue", Kind: "beaker", Ware: "", Size: 3 * chem.Litre, Fill: .55, Limit: .6}, Temperature: chem.Celsius(30), TimeNotAssessed: true, GasOf: "sulfur dioxide",
			Adds:     []planner.Add{add("sodium metabisulfite", 41.3)},
			Contents: []planner.Content{content("water", "aqueous", 900), content("sulfuric acid", "aqueous", 120), content("sodium dichromate", "aqueous", 12), content("chromium(III) sulfate", "aqueous", 190), content("sodium metabisulfite", "aqueous", 20)},
			Cautions: []string{"Sulfur dioxide: hood, in portions, below 40 °C.", "Carboxylic acids hold chromium in solution: test the filtrate for colour."}},
	}
}

func paperDiscards() []planner.Discard {
	litres := func(v float64) chem.Volume { return chem.Volume(v) * chem.Litre }
	return []planner.Discard{
		{Stream: "chromium(III) aqueous after reduction", Mass: 1.5, Volume: litres(1.3), Contents: []planner.Content{content("water", "aqueous", 1200), content("chromium(III) sulfate", "aqueous", 190), content("sodium sulfate", "aqueous", 110)}},
		{Stream: "aqueous bicarbonate or brine wash", Mass: .71, Volume: litres(.68), Contents: []planner.Content{content("water", "aqueous", 640), content("sodium chloride", "aqueous", 70)}},
		{Stream: "non-halogenated organic", Mass: .79, Volume: litres(.88), Contents: []planner.Content{content("ethyl acetate", "organic", 780), content("water", "organic", 10)}},
		{Stream: "spent drying agent", Mass: .062, Volume: litres(.08), Contents: []planner.Content{content("magnesium sulfate heptahydrate", "solid", 58), content("ethyl acetate", "organic", 4)}},
	}
}

package inventory

func (d *demo) addCarboys() {
	for i, c := range demoCarboys {
		d.lab.Carboys = append(d.lab.Carboys, Carboy{
			ID: int64(i + 1), StoreID: demoMain, Code: MakeCode(CarboyCode, int64(i+1)),
			Stream: c.stream, PlaceID: d.place("waste"), SizeUL: mL(c.litres * 1e3), ContentUL: mL(c.holds * 1e3),
			FillLimit: .75, Contains: c.contains, Opened: d.day(-c.opened),
		})
	}
}

// demoCarboys: one for each stream; the chromium(III) one is nearly full.
var demoCarboys = []struct {
	stream        string
	litres, holds float64
	contains      string
	opened        int
}{
	{"chromium(VI) aqueous, acidic", 5, .4, "water: 82 %; sulfuric acid: 15 %; sodium dichromate: 3 %", 40},
	{"chromium(III) aqueous after reduction", 10, 7.2, "water: 88 %; sodium sulfate: 7 %; chromium(III) sulfate: 5 %", 75},
	{"chromium hydroxide sludge", 5, 1.1, "water: 70 %; chromium(III) hydroxide: 30 %", 75},
	{"halogenated organic", 5, .8, "dichloromethane: 90 %; ethyl acetate: 10 %", 120},
	{"non-halogenated organic", 20, 6.5, "ethyl acetate: 55 %; methyl tert-butyl ether: 25 %; acetone: 20 %", 30},
	{"organic acid residue", 5, .9, "pentanoic acid: 60 %; hexanoic acid: 40 %", 60},
	{"aqueous bicarbonate or brine wash", 20, 8.2, "water: 90 %; sodium chloride: 7 %; sodium hydrogencarbonate: 3 %", 25},
	{"spent drying agent", 10, 2.5, "magnesium sulfate heptahydrate: 75 %; sodium sulfate decahydrate: 20 %; ethyl acetate: 5 %", 50},
	{"solid oxidiser waste", 5, .6, "manganese dioxide: 85 %; water: 15 %", 90},
	{"contaminated wipes, gloves, filters with Cr(VI)", 10, 1.5, "cellulose: 99 %; sodium dichromate: 1 %", 90},
}

func (d *demo) addEquipment() {
	for i, e := range demoEquipment {
		e.ID, e.StoreID = int64(i+1), demoMain
		d.lab.Equipment = append(d.lab.Equipment, e)
	}
}

// demoEquipment: sizes in µL for vessels, largest loads in µg for balances.
var demoEquipment = []Equipment{
	{Kind: "round flask", Name: "round flask 100 mL", Size: mL(100), Count: 4},
	{Kind: "round flask", Name: "round flask 250 mL", Size: mL(250), Count: 4},
	{Kind: "round flask", Name: "round flask 500 mL", Size: mL(500), Count: 3},
	{Kind: "round flask", Name: "round flask 1 L", Size: mL(1000), Count: 3},
	{Kind: "round flask", Name: "round flask 2 L", Size: mL(2000), Count: 2},
	{Kind: "round flask", Name: "round flask 3 L", Size: mL(3000), Count: 1},
	{Kind: "round flask", Name: "round flask 5 L", Size: mL(5000), Count: 1},
	{Kind: "round flask", Name: "round flask 10 L", Size: mL(10000), Count: 1},
	{Kind: "dropping funnel", Name: "dropping funnel 100 mL", Size: mL(100), Count: 2},
	{Kind: "dropping funnel", Name: "dropping funnel 250 mL", Size: mL(250), Count: 2},
	{Kind: "dropping funnel", Name: "dropping funnel 500 mL", Size: mL(500), Count: 1},
	{Kind: "dropping funnel", Name: "dropping funnel 1 L", Size: mL(1000), Count: 1},
	{Kind: "separating funnel", Name: "separating funnel 250 mL", Size: mL(250), Count: 2},
	{Kind: "separating funnel", Name: "separating funnel 500 mL", Size: mL(500), Count: 2},
	{Kind: "separating funnel", Name: "separating funnel 1 L", Size: mL(1000), Count: 2},
	{Kind: "separating funnel", Name: "separating funnel 2 L", Size: mL(2000), Count: 1},
	{Kind: "separating funnel", Name: "separating funnel 5 L", Size: mL(5000), Count: 1},
	{Kind: "beaker", Name: "beaker 100 mL", Size: mL(100), Count: 6},
	{Kind: "beaker", Name: "beaker 250 mL", Size: mL(250), Count: 6},
	{Kind: "beaker", Name: "beaker 600 mL", Size: mL(600), Count: 4},
	{Kind: "beaker", Name: "beaker 1 L", Size: mL(1000), Count: 3},
	{Kind: "beaker", Name: "beaker 2 L", Size: mL(2000), Count: 2},
	{Kind: "beaker", Name: "beaker 5 L", Size: mL(5000), Count: 1},
	{Kind: "conical flask", Name: "conical flask 100 mL", Size: mL(100), Count: 4},
	{Kind: "conical flask", Name: "conical flask 250 mL", Size: mL(250), Count: 6},
	{Kind: "conical flask", Name: "conical flask 500 mL", Size: mL(500), Count: 4},
	{Kind: "conical flask", Name: "conical flask 1 L", Size: mL(1000), Count: 3},
	{Kind: "conical flask", Name: "conical flask 2 L", Size: mL(2000), Count: 2},
	{Kind: "conical flask", Name: "conical flask 5 L", Size: mL(5000), Count: 1},
	{Kind: "filter flask", Name: "filter flask 500 mL", Size: mL(500), Count: 2},
	{Kind: "filter flask", Name: "filter flask 2 L", Size: mL(2000), Count: 1},
	{Kind: "filter funnel", Name: "porcelain filter funnel 110 mm", Size: mL(400), Count: 2},
	{Kind: "cylinder", Name: "measuring cylinder 10 mL", Size: mL(10), Step: mL(.2), Count: 2},
	{Kind: "cylinder", Name: "measuring cylinder 50 mL", Size: mL(50), Step: mL(1), Count: 2},
	{Kind: "cylinder", Name: "measuring cylinder 100 mL", Size: mL(100), Step: mL(1), Count: 2},
	{Kind: "cylinder", Name: "measuring cylinder 250 mL", Size: mL(250), Step: mL(2), Count: 2},
	{Kind: "cylinder", Name: "measuring cylinder 500 mL", Size: mL(500), Step: mL(5), Count: 1},
	{Kind: "cylinder", Name: "measuring cylinder 1 L", Size: mL(1000), Step: mL(10), Count: 1},
	{Kind: "cylinder", Name: "measuring cylinder 2 L", Size: mL(2000), Step: mL(20), Count: 1},
	{Kind: "condenser", Name: "reflux condenser 300 mm", Count: 3},
	{Kind: "condenser", Name: "distillation condenser 300 mm", Count: 2},
	{Kind: "water separator", Name: "water separator 20 mL", Size: mL(20), Count: 1},
	{Kind: "bath", Name: "ice-salt bath 10 L", Size: mL(10000), CoolingW: 250, Count: 2},
	{Kind: "bath", Name: "circulating chiller", CoolingW: 400, Count: 1},
	{Kind: "bath", Name: "oil bath 3 L", Size: mL(3000), Count: 2},
	{Kind: "balance", Name: "analytical balance 220 g", Size: g(220), Step: 100, Count: 1},
	{Kind: "balance", Name: "bench balance 2 kg", Size: g(2000), Step: 10000, Count: 1},
	{Kind: "balance", Name: "platform balance 15 kg", Size: g(15000), Step: 1000000, Count: 1},
	{Kind: "evaporator", Name: "rotary evaporator, flasks to 3 L", Size: mL(3000), Count: 1},
	{Kind: "hood", Name: "hood 1", Count: 1},
	{Kind: "hood", Name: "hood 2", Count: 1},
}

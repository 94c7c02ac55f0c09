package inventory

// Where the densities of the demonstration lab's forms come from. The solution
// densities are those of the embedded table at 20 °C and the middle strength.
const (
	fromTable   = "embedded substance table"
	fromTable25 = "embedded substance table, at 25 °C"
	fromSeries  = "embedded solution table, 20 °C, at the middle of the label's range"
	fromDIPPR20 = "embedded substance table, correlation at 20 °C"
)

// demoForm is a stock form with a key for the other tables, the substance it
// is a form of, and what its name adds to that; name replaces both.
type demoForm struct {
	key, of, rest, name string
	StockForm
}

var demoForms = []demoForm{
	{"1-pentanol", "1-pentanol", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "synthesis", DensityGML: .8144, DensitySource: fromTable, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"1-hexanol", "1-hexanol", " ≥ 98 %", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "synthesis", DensityGML: .8136, DensitySource: fromTable, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"cyclohexanol", "cyclohexanol", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "synthesis", DensityGML: .9624, DensitySource: fromTable, StorageClass: "general", ShelfLifeDays: 1095, PeroxideTestDays: 180}},
	{"cyclohexanone", "cyclohexanone", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "synthesis", DensityGML: .9478, DensitySource: fromTable, StorageClass: "flammable liquid", ShelfLifeDays: 1095}},
	{"pentanoic acid", "pentanoic acid", " ≥ 98 % (own product)", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "own product", DensityGML: .9371, DensitySource: fromDIPPR20, StorageClass: "acid organic", ShelfLifeDays: 730}},
	{"hexanoic acid", "hexanoic acid", " ≥ 98 % (own product)", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "own product", DensityGML: .9229, DensitySource: fromDIPPR20, StorageClass: "acid organic", ShelfLifeDays: 730}},
	{"butanoic acid", "butanoic acid", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "reference", DensityGML: .9559, DensitySource: fromDIPPR20, StorageClass: "acid organic", ShelfLifeDays: 1095}},
	{"propanoic acid", "propanoic acid", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "reference", DensityGML: .9882, DensitySource: fromTable25, StorageClass: "acid organic", ShelfLifeDays: 1095}},
	{"acetic acid", "acetic acid", " ≥ 99.7 %", "", StockForm{AssayLow: .997, AssayHigh: 1, Grade: "analysis", DensityGML: 1.0446, DensitySource: fromTable25, StorageClass: "acid organic", ShelfLifeDays: 1825}},
	{"tosic acid", "4-toluenesulfonic acid", "", "4-toluenesulfonic acid monohydrate ≥ 98 %", StockForm{CAS: "6192-52-5", HydrateWaters: 1, AssayLow: .98, AssayHigh: 1, Grade: "synthesis", StorageClass: "acid organic", ShelfLifeDays: 1825}},
	{"TEMPO", "2,2,6,6-tetramethylpiperidine-1-oxyl", " ≥ 98 %", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "synthesis", StorageClass: "general", ShelfLifeDays: 1095}},
	{"pentyl pentanoate", "pentyl pentanoate", " ≥ 98 % (own product)", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "own product", DensityGML: .8638, DensitySource: fromTable, StorageClass: "general", ShelfLifeDays: 730}},

	{"dichromate dihydrate", "sodium dichromate", "", "sodium dichromate dihydrate ≥ 99.5 %", StockForm{CAS: "7789-12-0", HydrateWaters: 2, AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "oxidiser", ShelfLifeDays: 1825}},
	{"dichromate technical", "sodium dichromate", "", "sodium dichromate dihydrate technical", StockForm{CAS: "7789-12-0", HydrateWaters: 2, AssayLow: .96, AssayHigh: .99, Grade: "technical", StorageClass: "oxidiser", ShelfLifeDays: 1825}},
	{"permanganate", "potassium permanganate", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "analysis", StorageClass: "oxidiser", ShelfLifeDays: 1825}},
	{"chlorite", "sodium chlorite", " 80 %", "", StockForm{AssayLow: .79, AssayHigh: .81, Grade: "technical", StorageClass: "oxidiser", ShelfLifeDays: 730}},
	{"hypochlorite", "sodium hypochlorite", " solution 10–12 %", "", StockForm{AssayLow: .10, AssayHigh: .12, Diluent: "water", Grade: "technical", DensityGML: 1.16, DensitySource: "embedded solution table, 20 °C, 10.86 %", StorageClass: "oxidiser", Ageing: "hypochlorite", ShelfLifeDays: 365}},
	{"peroxide", "hydrogen peroxide", " solution 30 %", "", StockForm{AssayLow: .29, AssayHigh: .32, Diluent: "water", Grade: "analysis", Additive: "stabiliser", Measure: ByVolume, StorageClass: "oxidiser", Ageing: "peroxide", ShelfLifeDays: 365, OpenLifeDays: 180}},

	{"sulfuric acid", "sulfuric acid", " 95–98 %", "", StockForm{AssayLow: .95, AssayHigh: .98, Diluent: "water", Grade: "analysis", DensityGML: 1.8361, DensitySource: fromSeries, StorageClass: "acid inorganic", ShelfLifeDays: 1825}},
	{"sulfuric acid weak", "sulfuric acid", " 50 %", "", StockForm{AssayLow: .49, AssayHigh: .51, Diluent: "water", Grade: "technical", DensityGML: 1.3952, DensitySource: fromSeries, StorageClass: "acid inorganic", ShelfLifeDays: 1825}},
	{"hydrochloric acid", "hydrochloric acid", " 36.5–38 %", "", StockForm{AssayLow: .365, AssayHigh: .38, Diluent: "water", Grade: "analysis", DensityGML: 1.185, DensitySource: fromSeries, StorageClass: "acid inorganic", ShelfLifeDays: 1825}},
	{"hydrochloric acid weak", "hydrochloric acid", " 10 %", "", StockForm{AssayLow: .098, AssayHigh: .102, Diluent: "water", Grade: "made up here", DensityGML: 1.0476, DensitySource: fromSeries, StorageClass: "acid inorganic", ShelfLifeDays: 365}},
	{"phosphoric acid", "phosphoric acid", " 85 %", "", StockForm{AssayLow: .85, AssayHigh: .86, Diluent: "water", Grade: "analysis", DensityGML: 1.6891, DensitySource: "embedded solution table, 20 °C, 85 %", StorageClass: "acid inorganic", ShelfLifeDays: 1825}},
	{"sodium hydroxide", "sodium hydroxide", " pellets ≥ 98 %", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "analysis", StorageClass: "base", ShelfLifeDays: 1095}},
	{"hydrogencarbonate", "sodium hydrogencarbonate", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "base", ShelfLifeDays: 1825}},
	{"sodium carbonate", "sodium carbonate", " anhydrous ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "base", ShelfLifeDays: 1825}},

	{"sodium sulfate", "sodium sulfate", " anhydrous ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"Glauber salt", "sodium sulfate", "", "sodium sulfate decahydrate ≥ 99 %", StockForm{CAS: "7727-73-3", HydrateWaters: 10, AssayLow: .99, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"magnesium sulfate", "magnesium sulfate", " anhydrous ≥ 98 %", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "synthesis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"Epsom salt", "magnesium sulfate", "", "magnesium sulfate heptahydrate ≥ 99 %", StockForm{CAS: "10034-99-8", HydrateWaters: 7, AssayLow: .99, AssayHigh: 1, Grade: "technical", StorageClass: "general", ShelfLifeDays: 1825}},
	{"calcium chloride", "calcium chloride", " anhydrous granules ≥ 93 %", "", StockForm{AssayLow: .93, AssayHigh: .97, Grade: "technical", StorageClass: "general", ShelfLifeDays: 1095}},
	{"sodium chloride", "sodium chloride", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 3650}},
	{"metabisulfite", "sodium metabisulfite", " ≥ 97 %", "", StockForm{AssayLow: .97, AssayHigh: 1, Grade: "synthesis", StorageClass: "general", ShelfLifeDays: 730}},
	{"sulfite", "sodium sulfite", " anhydrous ≥ 98 %", "", StockForm{AssayLow: .98, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1095}},
	{"thiosulfate", "sodium thiosulfate", "", "sodium thiosulfate pentahydrate ≥ 99.5 %", StockForm{CAS: "10102-17-7", HydrateWaters: 5, AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"phosphate acid", "sodium dihydrogen phosphate", "", "sodium dihydrogen phosphate monohydrate ≥ 98 %", StockForm{CAS: "10049-21-5", HydrateWaters: 1, AssayLow: .98, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"phosphate", "disodium hydrogen phosphate", " anhydrous ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"potassium iodide", "potassium iodide", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"sodium bromide", "sodium bromide", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "synthesis", StorageClass: "general", ShelfLifeDays: 1825}},
	{"iron sulfate", "iron(II) sulfate", "", "iron(II) sulfate heptahydrate ≥ 99 %", StockForm{CAS: "7782-63-0", HydrateWaters: 7, AssayLow: .99, AssayHigh: 1, Grade: "analysis", StorageClass: "general", ShelfLifeDays: 1095}},
	{"calcium hydroxide", "calcium hydroxide", " ≥ 96 %", "", StockForm{AssayLow: .96, AssayHigh: 1, Grade: "technical", StorageClass: "base", ShelfLifeDays: 1095}},
	{"citric acid", "citric acid", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", StorageClass: "acid organic", ShelfLifeDays: 1825}},

	{"ethyl acetate", "ethyl acetate", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", DensityGML: .9003, DensitySource: fromTable, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"ether", "diethyl ether", " ≥ 99.5 %, inhibited", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", Additive: "2,6-di-tert-butyl-4-methylphenol", DensityGML: .7138, DensitySource: fromTable, StorageClass: "flammable liquid", ShelfLifeDays: 730, OpenLifeDays: 365, PeroxideTestDays: 180}},
	{"MTBE", "methyl tert-butyl ether", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "synthesis", DensityGML: .7353, DensitySource: fromTable25, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"toluene", "toluene", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", DensityGML: .8623, DensitySource: fromTable25, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"cyclohexane", "cyclohexane", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", DensityGML: .7739, DensitySource: fromTable25, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"acetonitrile", "acetonitrile", " ≥ 99.9 %", "", StockForm{AssayLow: .999, AssayHigh: 1, Grade: "chromatography", DensityGML: .7857, DensitySource: fromTable, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"acetone", "acetone", " technical", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "technical", DensityGML: .7923, DensitySource: fromDIPPR20, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"2-propanol", "2-propanol", " ≥ 99.5 %", "", StockForm{AssayLow: .995, AssayHigh: 1, Grade: "analysis", DensityGML: .7867, DensitySource: fromDIPPR20, StorageClass: "flammable liquid", ShelfLifeDays: 1825, PeroxideTestDays: 365}},
	{"ethanol", "ethanol", " 96 % denatured", "", StockForm{AssayLow: .935, AssayHigh: .945, Diluent: "water", Grade: "denatured", Additive: "2-butanone", DensityGML: .807, DensitySource: "embedded solution table, 20 °C, 94 % by mass; the label's 96 % is by volume", StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"heptane", "heptane", " ≥ 99 %", "", StockForm{AssayLow: .99, AssayHigh: 1, Grade: "synthesis", DensityGML: .6858, DensitySource: fromDIPPR20, StorageClass: "flammable liquid", ShelfLifeDays: 1825}},
	{"water", "water", "", "water, deionised", StockForm{AssayLow: 1, AssayHigh: 1, Grade: "deionised", DensityGML: .9982, DensitySource: "OpenStax Chemistry 2e, appendix E, 20 °C", StorageClass: "general"}},

	{"filter aid", "diatomaceous earth", " filter aid", "", StockForm{AssayLow: 1, AssayHigh: 1, Grade: "filtration", StorageClass: "general"}},
	{"carbon", "carbon", "", "activated carbon, powder", StockForm{AssayLow: 1, AssayHigh: 1, Grade: "filtration", StorageClass: "general"}},
	{"ice", "ice", "", "ice, crushed", StockForm{AssayLow: 1, AssayHigh: 1, Measure: ByMass, StorageClass: "general"}},
	{"filter paper", "filter paper", "", "filter paper, 110 mm", StockForm{Measure: ByCount, StorageClass: "general"}},
	{"pH strip", "pH strip", "", "pH strip, pH 0–14", StockForm{Measure: ByCount, StorageClass: "general"}},
	{"iodide paper", "potassium iodide-starch paper", "", "potassium iodide-starch paper, strips", StockForm{Measure: ByCount, StorageClass: "general", OpenLifeDays: 730}},
	{"peroxide strip", "peroxide test strip", "", "peroxide test strip, 0.5–100 ppm", StockForm{Measure: ByCount, StorageClass: "general", ShelfLifeDays: 730}},
	{"boiling stone", "boiling stone", "", "boiling stone, alumina", StockForm{Measure: ByCount, StorageClass: "general"}},
	{"anti-bumping", "anti-bumping granules", "", "anti-bumping granules", StockForm{Measure: ByCount, StorageClass: "general"}},
	{"phase paper", "phase-separation paper", "", "phase-separation paper, 150 mm", StockForm{Measure: ByCount, StorageClass: "general"}},
	{"vial", "sample vial", "", "sample vial, 4 mL", StockForm{Measure: ByCount, StorageClass: "general"}},
}

package inventory

import "strings"

func (d *demo) addSubstances() {
	for i, s := range demoSubstances {
		source := "embedded substance table"
		if s.cas == "" {
			source = "entered by the lab"
		}
		d.lab.Substances = append(d.lab.Substances, Substance{
			ID: int64(i + 1), Name: s.name, Synonyms: s.synonyms, CAS: s.cas, Formula: s.formula,
			Own: s.cas == "", Source: source,
		})
	}
}

// demoSubstances are the pure, anhydrous substances; hydrates are forms of them.
var demoSubstances = []struct{ name, synonyms, cas, formula string }{
	{"1-pentanol", "pentan-1-ol; amyl alcohol", "71-41-0", "C5H12O"},
	{"1-hexanol", "hexan-1-ol", "111-27-3", "C6H14O"},
	{"cyclohexanol", "", "108-93-0", "C6H12O"},
	{"cyclohexanone", "", "108-94-1", "C6H10O"},
	{"pentanoic acid", "valeric acid", "109-52-4", "C5H10O2"},
	{"hexanoic acid", "caproic acid", "142-62-1", "C6H12O2"},
	{"butanoic acid", "butyric acid", "107-92-6", "C4H8O2"},
	{"propanoic acid", "propionic acid", "79-09-4", "C3H6O2"},
	{"acetic acid", "glacial acetic acid; ethanoic acid", "64-19-7", "C2H4O2"},
	{"4-toluenesulfonic acid", "p-toluenesulfonic acid; 4-toluenesulfonic acid monohydrate; p-toluenesulfonic acid monohydrate", "104-15-4", "C7H8O3S"},
	{"2,2,6,6-tetramethylpiperidine-1-oxyl", "TEMPO", "2564-83-2", "C9H18NO"},
	{"pentyl pentanoate", "amyl valerate", "2173-56-0", "C10H20O2"},

	{"sodium dichromate", "sodium dichromate dihydrate", "10588-01-9", "Na2Cr2O7"},
	{"potassium permanganate", "", "7722-64-7", "KMnO4"},
	{"sodium chlorite", "", "7758-19-2", "NaClO2"},
	{"sodium hypochlorite", "sodium hypochlorite solution; bleach", "7681-52-9", "NaClO"},
	{"hydrogen peroxide", "", "7722-84-1", "H2O2"},

	{"sulfuric acid", "", "7664-93-9", "H2SO4"},
	{"hydrochloric acid", "hydrogen chloride", "7647-01-0", "HCl"},
	{"phosphoric acid", "orthophosphoric acid", "7664-38-2", "H3PO4"},
	{"sodium hydroxide", "caustic soda", "1310-73-2", "NaOH"},
	{"sodium hydrogencarbonate", "sodium bicarbonate", "144-55-8", "NaHCO3"},
	{"sodium carbonate", "soda ash", "497-19-8", "Na2CO3"},

	{"sodium sulfate", "sodium sulfate decahydrate", "7757-82-6", "Na2SO4"},
	{"magnesium sulfate", "magnesium sulfate heptahydrate", "7487-88-9", "MgSO4"},
	{"calcium chloride", "calcium chloride dihydrate", "10043-52-4", "CaCl2"},
	{"sodium chloride", "salt", "7647-14-5", "NaCl"},
	{"sodium metabisulfite", "sodium disulfite", "7681-57-4", "Na2S2O5"},
	{"sodium sulfite", "", "7757-83-7", "Na2SO3"},
	{"sodium thiosulfate", "sodium thiosulfate pentahydrate", "7772-98-7", "Na2S2O3"},
	{"sodium dihydrogen phosphate", "sodium dihydrogen phosphate monohydrate", "7558-80-7", "NaH2PO4"},
	{"disodium hydrogen phosphate", "", "7558-79-4", "Na2HPO4"},
	{"potassium iodide", "", "7681-11-0", "KI"},
	{"sodium bromide", "", "7647-15-6", "NaBr"},
	{"iron(II) sulfate", "iron(II) sulfate heptahydrate", "7720-78-7", "FeSO4"},
	{"calcium hydroxide", "slaked lime", "1305-62-0", "Ca(OH)2"},
	{"citric acid", "", "77-92-9", "C6H8O7"},

	{"ethyl acetate", "", "141-78-6", "C4H8O2"},
	{"diethyl ether", "ether", "60-29-7", "C4H10O"},
	{"methyl tert-butyl ether", "MTBE; tert-butyl methyl ether", "1634-04-4", "C5H12O"},
	{"toluene", "", "108-88-3", "C7H8"},
	{"cyclohexane", "", "110-82-7", "C6H12"},
	{"acetonitrile", "", "75-05-8", "C2H3N"},
	{"acetone", "propanone", "67-64-1", "C3H6O"},
	{"2-propanol", "isopropyl alcohol", "67-63-0", "C3H8O"},
	{"ethanol", "", "64-17-5", "C2H6O"},
	{"heptane", "", "142-82-5", "C7H16"},
	{"water", "deionised water", "7732-18-5", "H2O"},

	{"diatomaceous earth", "filter aid; kieselguhr", "61790-53-2", ""},
	{"carbon", "activated carbon", "7440-44-0", "C"},
	{"ice", "crushed ice", "", "H2O"},
	{"filter paper", "filter papers", "", ""},
	{"pH strip", "pH strips; pH paper", "", ""},
	{"potassium iodide-starch paper", "potassium iodide-starch papers; iodide-starch paper", "", ""},
	{"peroxide test strip", "peroxide test strips; peroxide strips", "", ""},
	{"boiling stone", "boiling stones", "", ""},
	{"anti-bumping granules", "anti-bumping granule", "", ""},
	{"phase-separation paper", "phase-separation papers", "", ""},
	{"sample vial", "sample vials", "", ""},
}

func (d *demo) addForms() {
	ids := make(map[string]int64, len(d.lab.Substances))
	for _, s := range d.lab.Substances {
		ids[s.Name] = s.ID
	}
	for i, f := range demoForms {
		form := f.StockForm
		form.ID, form.SubstanceID = int64(i+1), mustHave(ids, f.of)
		form.Name = strings.TrimSpace(f.of + f.rest)
		if f.name != "" {
			form.Name = f.name
		}
		if form.Measure == "" {
			form.Measure = ByMass
			if form.DensityGML > 0 {
				form.Measure = ByVolume
			}
		}
		d.forms[f.key] = form.ID
		d.lab.Forms = append(d.lab.Forms, form)
	}
}

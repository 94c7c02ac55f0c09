package chem

import "maps"

// Sides of the supplementary rows in data/incompatibility_acids.csv: salts that set a
// toxic gas free with acids, and mixtures that explode or decompose.

// allSides are the sides of all supplementary rows.
func allSides() map[string]side {
	all := maps.Clone(sides)
	maps.Copy(all, map[string]side{
		"cyanide salt":              alone(isCyanide),
		"sulfide salt":              alone(func(r Reactant) bool { return named(r, "sulfide") && inGroup(r, 33) }),
		"azide salt":                alone(func(r Reactant) bool { return named(r, "azide") }),
		"chlorate, bromate":         alone(func(r Reactant) bool { return named(r, "chlorate", "bromate") && !named(r, "perchlorate") }),
		"fluoride salt":             alone(func(r Reactant) bool { return named(r, "fluoride") && inGroup(r, 15) }),
		"halide salt":               alone(isHalideSalt),
		"nitrate salt":              alone(func(r Reactant) bool { return named(r, "nitrate") && inGroup(r, 104) }),
		"chlorine, bromine, iodine": alone(isHalogen),
		"nitrite salt":              alone(func(r Reactant) bool { return named(r, "nitrite") && inGroup(r, 104) }),
		"hydrogen peroxide":         alone(func(r Reactant) bool { return named(r, "hydrogen peroxide") }),
		"iron, copper, manganese, silver compounds": alone(func(r Reactant) bool { return named(r, "iron", "copper", "mangan", "silver") }),
		"silver salt": alone(func(r Reactant) bool { return named(r, "silver") }),
	})
	return all
}

// isCyanide takes the salts, complex ones among them; nitriles are in a group of their own.
func isCyanide(r Reactant) bool { return named(r, "cyanide") && !inGroup(r, 26) }

// isHalideSalt takes chlorides, bromides and iodides of the metals of groups 1 and 2 and
// of ammonium.
func isHalideSalt(r Reactant) bool {
	for _, metal := range []string{"sodium", "potassium", "lithium", "calcium", "magnesium", "ammonium", "barium"} {
		if named(r, metal+" chloride", metal+" bromide", metal+" iodide") {
			return true
		}
	}
	return false
}

func isHalogen(r Reactant) bool {
	switch r.Name {
	case "chlorine", "bromine", "iodine":
		return true
	}
	return false
}

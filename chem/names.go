package chem

import "sync"

// tableNames are the names that the embedded tables give to CAS numbers.
var tableNames = sync.OnceValue(func() map[string]string {
	names := map[string]string{}
	for name, cas := range solventCAS {
		names[cas] = name
	}
	for table, columns := range map[string][2]string{
		"antoine.csv":           {"cas", "name"},
		"mutual_solubility.csv": {"cas", "solvent"},
		"partition.csv":         {"cas", "solute"},
		"azeotropes.csv":        {"cas_2", "component_2"},
	} {
		for _, row := range readTable(table) {
			names[row.text(columns[0])] = row.text(columns[1])
		}
	}
	return names
})

// nameOfCAS returns the name of a substance for a message, or the number itself.
func nameOfCAS(cas string) string {
	if name, ok := tableNames()[cas]; ok {
		return name
	}
	return "CAS " + cas
}

// tableMolarMasses are the molar masses of substances.csv by CAS number.
var tableMolarMasses = sync.OnceValue(func() map[string]MolarMass {
	table := make(map[string]MolarMass)
	for _, row := range readTable("substances.csv") {
		if m, ok := row.number("molar_mass_g_mol"); ok {
			table[row.text("cas")] = MolarMass(m) * GramPerMole
		}
	}
	return table
})

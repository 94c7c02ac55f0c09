package planner

import (
	_ "embed"
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"
	"sync"
)

//go:embed data/constitution.csv
var constitutionText string

// constitution says of an electrolyte which acid and which cation it is made
// of: sodium pentanoate is one sodium and one pentanoic acid.
type constitution struct {
	name, cas, formula string
	cation             string
	cationCharge       float64 // positive charges brought by the cations
	acid               string  // CAS number of the acid for chem.PKaOf; "" for a hydroxide
	acids              float64
}

// constitutions is the table, by CAS number and by name. It panics on a
// malformed table, which is part of the program.
var constitutions = sync.OnceValue(func() map[string]constitution {
	records, err := csv.NewReader(strings.NewReader(constitutionText)).ReadAll()
	if err != nil {
		panic(fmt.Sprintf("planner: constitution.csv: %v", err))
	}
	table := make(map[string]constitution, 2*len(records))
	for _, r := range records[1:] {
		c := constitution{name: r[0], cas: r[1], formula: r[2], cation: r[3], acid: r[5]}
		c.cationCharge, _ = strconv.ParseFloat(r[4], 64)
		c.acids, _ = strconv.ParseFloat(r[6], 64)
		table[c.cas], table[c.name] = c, c
	}
	return table
})

// saltOf finds the salt of an acid with a cation that carries charge positive charges.
func saltOf(acid, cation string, charge float64) (constitution, bool) {
	for key, c := range constitutions() {
		if key == c.cas && c.acid == acid && c.cation == cation && c.cationCharge == charge && c.acids == 1 {
			return c, true
		}
	}
	return constitution{}, false
}

package chem

import "sync"

// dissociation is what is known of one acid: its steps in order and where they
// come from.
type dissociation struct {
	name    string
	pKa     []float64
	grades  []string
	sources []string
}

// gradeRank orders the grades of data/pka.csv, best first: a handbook value,
// which is a critical choice among measurements; a value computed from Gibbs
// energies, which carries their errors; an approximate value for a strong
// acid, good only to say that it is strong.
var gradeRank = map[string]int{
	"handbook":                 1,
	"computed from dataset dG": 2,
	"approximate, strong acid": 3,
}

var dissociations = sync.OnceValue(loadDissociations)

// loadDissociations keeps the best row of every step. Rows of the same grade
// keep the first. An acid whose first steps are missing gets none: a second
// constant alone would make a diprotic acid look monoprotic.
func loadDissociations() map[string]*dissociation {
	type key struct {
		cas  string
		step int
	}
	best := make(map[key]row)
	names := make(map[string]string)
	var order []string
	for _, r := range readTable("pka.csv") {
		cas := r.text("cas")
		step, _ := r.number("step")
		k := key{cas, int(step)}
		if names[cas] == "" {
			names[cas] = r.text("acid")
			order = append(order, cas)
		}
		kept, ok := best[k]
		if !ok || gradeRank[r.text("grade")] < gradeRank[kept.text("grade")] {
			best[k] = r
		}
	}
	table := make(map[string]*dissociation)
	for _, cas := range order {
		d := &dissociation{name: names[cas]}
		for step := 1; ; step++ {
			r, ok := best[key{cas, step}]
			if !ok {
				break
			}
			pKa, _ := r.number("pKa")
			d.pKa = append(d.pKa, pKa)
			d.grades = append(d.grades, r.text("grade"))
			d.sources = append(d.sources, r.text("source"))
		}
		if len(d.pKa) > 0 {
			table[cas] = d
		}
	}
	return table
}

// PKaOf returns the acid dissociation constants of an acid in water at 25 °C
// by step, as pKa, with the source of the first. Where the table has several
// values of a step a handbook value goes before one computed from Gibbs
// energies, and that before an approximate one. An acid that isn't in the
// table is refused with a *NoDataError. The slice must not be changed.
func PKaOf(cas string) (pKa []float64, source string, err error) {
	d := dissociations()[cas]
	if d == nil {
		return nil, "", &NoDataError{"pKa", cas, "give pka="}
	}
	return d.pKa, d.sources[0], nil
}

package chem

import (
	"strconv"
	"strings"
	"sync"
)

// An Acid is an acid, or the acid that a base becomes, with its dissociation
// constants in water at 25 °C.
type Acid struct {
	Name    string
	CAS     string
	Formula Formula   // of the neutral molecule
	Charge  int       // of the form with most protons on: 0 for an acid, 1 for an amine
	PKa     []float64 // by step
	Sources []string  // by step
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

// acidTable finds acids by CAS number and by the composition of the molecule.
type acidTable struct {
	byCAS         map[string]*Acid
	byComposition map[string]*Acid // the first of a composition
}

var acids = sync.OnceValue(loadAcids)

// loadAcids joins data/acids.csv, which says what an acid is, with the constants
// of data/pka.csv, which go first where they give every step.
func loadAcids() *acidTable {
	best := bestConstants()
	table := &acidTable{make(map[string]*Acid), make(map[string]*Acid)}
	for _, r := range readTable("acids.csv") {
		formula, err := ParseFormula(r.text("formula"))
		if err != nil {
			panic("chem: acids.csv: " + err.Error())
		}
		charge, _ := r.number("charge")
		a := &Acid{Name: r.text("acid"), CAS: r.text("cas"), Formula: formula, Charge: int(charge)}
		a.PKa, a.Sources = steps(best, a.CAS)
		if len(a.PKa) == 0 {
			for _, item := range r.list("pKa") {
				pKa, err := strconv.ParseFloat(item, 64)
				if err != nil {
					panic("chem: acids.csv: " + err.Error())
				}
				a.PKa, a.Sources = append(a.PKa, pKa), append(a.Sources, r.text("source"))
			}
		}
		table.byCAS[a.CAS] = a
		if key := formula.Hill(); table.byComposition[key] == nil {
			table.byComposition[key] = a
		}
	}
	// Carbon dioxide and sulfur dioxide in water are the acids.
	table.byCAS["124-38-9"] = table.byCAS["463-79-6"]
	table.byCAS["7446-09-5"] = table.byCAS["7782-99-2"]
	return table
}

// acidStep is one dissociation step of one acid.
type acidStep struct {
	cas  string
	step int
}

// bestConstants keeps the best row of every step; rows of the same grade keep the
// first.
func bestConstants() map[acidStep]row {
	best := make(map[acidStep]row)
	for _, r := range readTable("pka.csv") {
		step, _ := r.number("step")
		k := acidStep{r.text("cas"), int(step)}
		kept, ok := best[k]
		if !ok || gradeRank[r.text("grade")] < gradeRank[kept.text("grade")] {
			best[k] = r
		}
	}
	return best
}

// steps returns the constants of an acid from its first step on, up to the first
// that is missing: a second constant alone would make a diprotic acid look
// monoprotic.
func steps(best map[acidStep]row, cas string) (pKa []float64, sources []string) {
	for step := 1; ; step++ {
		r, ok := best[acidStep{cas, step}]
		if !ok {
			return pKa, sources
		}
		x, _ := r.number("pKa")
		pKa, sources = append(pKa, x), append(sources, r.text("source"))
	}
}

// AcidByCAS returns an acid, or the acid of a base, by CAS number.
func AcidByCAS(cas string) (*Acid, bool) {
	a, ok := acids().byCAS[cas]
	return a, ok
}

// PKaOf returns the acid dissociation constants in water at 25 °C by step, as pKa,
// with their source; for a base those of its acid. Where the table has several
// values of a step a handbook value goes before one computed from Gibbs energies,
// and that before an approximate one. What isn't in the tables is refused with a
// *NoDataError. The slice must not be changed.
func PKaOf(cas string) (pKa []float64, source string, err error) {
	a, ok := AcidByCAS(cas)
	if !ok {
		return nil, "", &NoDataError{"pKa", cas, "give pka="}
	}
	return a.PKa, strings.Join(unique(a.Sources), "; "), nil
}

// unique drops repeated texts, in order.
func unique(texts []string) []string {
	var kept []string
	seen := make(map[string]bool)
	for _, s := range texts {
		if !seen[s] {
			seen[s] = true
			kept = append(kept, s)
		}
	}
	return kept
}

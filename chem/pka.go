package chem

import (
	"math"
	"slices"
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
	// Enthalpy of dissociation by step in J/mol; nil where it isn't known.
	Enthalpy []float64
}

// PKaAt returns the constants at temperature t from those at 25 °C by the equation of
// van 't Hoff with a constant enthalpy,
//
//	pKa(T) = pKa + ΔH/(R·ln 10)·(1/T − 1/298.15 K)
//
// good to 0.05 from 0 to 60 °C; moved is false, and the constants are those at 25 °C,
// where the enthalpies aren't known. The enthalpies are from memory.
func (a *Acid) PKaAt(t Temperature) (pKa []float64, moved bool) {
	if len(a.Enthalpy) != len(a.PKa) {
		return a.PKa, false
	}
	pKa = make([]float64, len(a.PKa))
	for i, k := range a.PKa {
		pKa[i] = k + a.Enthalpy[i]/(GasConstant*math.Ln10)*(1/float64(t)-1/298.15)
	}
	return pKa, true
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
	byName        map[string]*Acid
	byComposition map[string]*Acid // the first of a composition
}

var acids = sync.OnceValue(loadAcids)

// loadAcids joins data/acids.csv, which says what an acid is, with the constants
// of data/pka.csv, which go first where they give every step.
func loadAcids() *acidTable {
	best := bestConstants()
	table := &acidTable{make(map[string]*Acid), make(map[string]*Acid), make(map[string]*Acid)}
	for _, r := range readTable("acids.csv") {
		formula, err := ParseFormula(r.text("formula"))
		if err != nil {
			panic("chem: acids.csv: " + err.Error())
		}
		charge, _ := r.number("charge")
		a := &Acid{Name: r.text("acid"), CAS: r.text("cas"), Formula: formula, Charge: int(charge)}
		a.PKa, a.Sources = steps(best, a.CAS)
		if len(a.PKa) == 0 {
			a.PKa = r.numbers("pKa")
			a.Sources = slices.Repeat([]string{r.text("source")}, len(a.PKa))
		}
		for _, enthalpy := range r.numbers("dissociation_enthalpy_kJ_mol") {
			a.Enthalpy = append(a.Enthalpy, enthalpy*1e3)
		}
		table.byCAS[a.CAS], table.byName[a.Name] = a, a
		if key := formula.Hill(); table.byComposition[key] == nil {
			table.byComposition[key] = a
		}
	}
	// Carbon dioxide and sulfur dioxide in water are the acids.
	table.byCAS["124-38-9"] = table.byCAS["463-79-6"]
	table.byCAS["7446-09-5"] = table.byCAS["7782-99-2"]
	return table
}

// numbers reads a field that lists numbers; it panics on any other text, which a test
// that reads the table finds.
func (r row) numbers(column string) []float64 {
	var xs []float64
	for _, item := range r.list(column) {
		x, err := strconv.ParseFloat(item, 64)
		if err != nil {
			panic("chem: column " + column + ": " + err.Error())
		}
		xs = append(xs, x)
	}
	return xs
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

// AcidByName returns an acid, or the acid of a base, by its name or a synonym, also
// one that is only met in water, such as carbonic acid.
func AcidByName(name string) (*Acid, bool) {
	name = strings.ToLower(strings.TrimSpace(name))
	if a, ok := acids().byName[name]; ok {
		return a, true
	}
	s, ok := LookupSubstance(name)
	if !ok {
		return nil, false
	}
	return AcidByCAS(s.CAS)
}

// PKaOf returns the acid dissociation constants in water at 25 °C by step, as pKa,
// with their source; for a base those of its acid. Where the table has several
// values of a step a handbook value goes before one computed from Gibbs energies,
// and that before an approximate one. What isn't in the tables is refused with a
// *DataError. The slice must not be changed.
func PKaOf(cas string) (pKa []float64, source string, err error) {
	a, ok := AcidByCAS(cas)
	if !ok {
		return nil, "", noData("pKa", cas, "give pka=")
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

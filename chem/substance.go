package chem

import (
	"cmp"
	"slices"
	"strings"
	"sync"
)

// Substance is a chemical identity with what the tables know about it. A pointer
// that is nil, a number that is 0 and a text that is empty mean "no data", never
// "none" or "harmless". A Substance is shared and must not be changed.
type Substance struct {
	Name     string
	Synonyms []string
	CAS      string
	EC       string
	Formula  string // as a chemist writes it; empty for mixtures and polymers
	SMILES   string
	// MolarMass includes the water of hydration; 0 is no data.
	MolarMass MolarMass
	State     string // at 20 °C: "solid", "liquid", "gas" or "liquid (solution)"
	// Density is 0 where there is none. DensityAt is 0 where the source states no
	// temperature.
	Density   Density
	DensityAt Temperature
	// Melting, Boiling and Flash are at 101.325 kPa; a decomposition point may
	// stand for a melting point.
	Melting, Boiling, Flash, Autoignition *Temperature
	HeatCapacity                          *SpecificHeat // of the liquid at 25 °C
	HeatOfVaporisation                    *MolarEnergy  // at the boiling point
	// WaterSolubility is in WaterSolubilityUnit, which is "miscible" without a
	// number for what mixes in any ratio.
	WaterSolubility     *float64
	WaterSolubilityUnit string
	Hazard              HazardRecord
	StorageClass        string // leading class of the storage hint, by rule
	StorageClasses      []string
	PeroxideClass       string // "A", "B", "C", "none"; empty is not assessed
	ReactiveGroups      []int  // groups of the compatibility chart, by rule
	UNNumber            string
	UNClass             string
	UNSubsidiary        string // only where the finer table has it
	PackingGroup        string
	Notes               string
	// Sources says where a field came from, by the field's name in small letters:
	// "density", "boiling", "classification".
	Sources map[string]string
}

// HazardRecord is the classification of a substance as stored.
type HazardRecord struct {
	Classes    []string // with their statements, "Skin Corr. 1B H314"
	HCodes     []string // "H314", each once
	EUH        []string
	Pictograms []string // "GHS05"
	Signal     string
	Basis      string // where the classification comes from, in words
	SCL        string // specific concentration limits as listed, parted by " | "
	MFactor    string
	MAcute     float64 // 0 where none is listed
	MChronic   float64
	Limits     string // exposure limits with their jurisdiction
	Index      string // Annex VI index number
	Notes      string // notes and asterisks of the Annex VI entry, later changes, doubts
	Acute      AcuteEstimates
	// SupplierAdditions are classes that suppliers add to the legal minimum.
	SupplierAdditions string
	// Assessed is set where a classification stands, "not classified" included.
	// Without it nothing is known.
	Assessed bool
	// Unverified is set where the classification is a recollection, or there is
	// none: whatever shows it says so and sends the reader to the supplier's sheet.
	Unverified bool
}

// AcuteEstimates are acute toxicity estimates as listed; 0 is no data.
type AcuteEstimates struct {
	Oral, Dermal float64 // mg per kg body weight
	Inhalation   float64 // in InhalationUnit
	// InhalationUnit is "mg/L" or "ppm", InhalationForm "vapour", "dust/mist", "gas".
	InhalationUnit, InhalationForm string
	Basis                          string
}

// Miscible reports whether the substance mixes with water in any ratio.
func (s *Substance) Miscible() bool { return s.WaterSolubilityUnit == "miscible" }

// Hydrate returns the number of waters of hydration in the formula; 0 without.
func (s *Substance) Hydrate() float64 {
	f, err := ParseFormula(s.Formula)
	if err != nil {
		return 0
	}
	return f.Waters()
}

type substanceIndex struct {
	all     []*Substance          // by name
	exact   map[string]*Substance // names, synonyms and CAS as they stand
	plain   map[string]*Substance // names and synonyms by plainName; nil if ambiguous
	formula map[string]*Substance // nil if several substances have it
}

var substances = sync.OnceValue(func() *substanceIndex { return indexSubstances(loadSubstances()) })

// Substances returns all substances of the table in the order of their names. The
// slice is shared and must not be changed.
func Substances() []*Substance { return substances().all }

// LookupSubstance finds a substance by CAS number, name or synonym, whatever the
// case, hyphens and blanks, with or without the word anhydrous, or by formula if
// only one substance has it. False means unknown or ambiguous; Candidates then
// lists what may be meant.
func LookupSubstance(key string) (*Substance, bool) {
	index := substances()
	if s := index.exact[key]; s != nil {
		return s, true
	}
	var room [96]byte
	if s, ok := index.plain[string(plainName(room[:0], key))]; ok {
		return s, s != nil
	}
	if s := index.formula[key]; s != nil {
		return s, true
	}
	if rest, ok := cutStrength(key); ok {
		return LookupSubstance(rest)
	}
	f, err := ParseFormula(cutAnhydrous(key))
	if err != nil {
		return nil, false
	}
	s := index.formula[f.Hill()]
	return s, s != nil
}

// SubstanceByCAS finds a substance by its CAS number.
func SubstanceByCAS(cas string) (*Substance, bool) {
	s := substances().exact[strings.TrimSpace(cas)]
	if s == nil || s.CAS != strings.TrimSpace(cas) {
		return nil, false
	}
	return s, true
}

// maxCandidates bounds a list of suggestions to what a reader takes in at once.
const maxCandidates = 8

// Candidates returns the substances that a key may mean when it names none: those
// that share it as a synonym or formula first, then names that begin with it,
// hold it, or are at most two letters away; at most eight, by name within each.
func Candidates(key string) []*Substance {
	plain := string(plainName(nil, key))
	if plain == "" {
		return nil
	}
	hill := ""
	if f, err := ParseFormula(key); err == nil {
		hill = f.Hill()
	}
	type ranked struct {
		s    *Substance
		rank int
	}
	var found []ranked
	for _, s := range substances().all {
		if rank := s.nearness(plain, hill); rank > 0 {
			found = append(found, ranked{s, rank})
		}
	}
	slices.SortStableFunc(found, func(a, b ranked) int { return cmp.Compare(a.rank, b.rank) })
	var list []*Substance
	for _, f := range found[:min(len(found), maxCandidates)] {
		list = append(list, f.s)
	}
	return list
}

// nearness ranks how well a plain key fits, 1 best; 0 if it doesn't.
func (s *Substance) nearness(plain, hill string) int {
	best := 0
	better := func(rank int) {
		if best == 0 || rank < best {
			best = rank
		}
	}
	for i := range len(s.Synonyms) + 1 {
		name := s.Name
		if i > 0 {
			name = s.Synonyms[i-1]
		}
		var room [96]byte
		own := string(plainName(room[:0], name))
		switch {
		case own == plain, i == 0 && string(plainName(nil, withoutCharges(name))) == plain:
			better(1)
		case strings.HasPrefix(own, plain):
			better(3)
		case len(plain) > 3 && strings.Contains(own, plain):
			better(4)
		case len(plain) > 4 && closeBy(own, plain):
			better(2)
		}
	}
	if hill != "" && s.Formula != "" {
		if f, err := ParseFormula(s.Formula); err == nil && f.Hill() == hill {
			better(1)
		}
	}
	return best
}

// closeBy reports whether two words are at most two letters apart (Levenshtein
// distance).
func closeBy(a, b string) bool {
	const limit = 2
	if len(a)-len(b) > limit || len(b)-len(a) > limit {
		return false
	}
	previous, current := make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range previous {
		previous[j] = j
	}
	for i := range len(a) {
		current[0] = i + 1
		least := current[0]
		for j := range len(b) {
			change := previous[j]
			if a[i] != b[j] {
				change++
			}
			current[j+1] = min(change, previous[j+1]+1, current[j]+1)
			least = min(least, current[j+1])
		}
		if least > limit {
			return false
		}
		previous, current = current, previous
	}
	return previous[len(b)] <= limit
}

func indexSubstances(all []*Substance) *substanceIndex {
	index := &substanceIndex{all: all, exact: map[string]*Substance{}, plain: map[string]*Substance{},
		formula: map[string]*Substance{}}
	own := make(map[string]bool, len(all))
	for _, s := range all {
		index.exact[s.CAS] = s
		index.exact[s.Name] = s
		plain := string(plainName(nil, s.Name))
		index.add(index.plain, plain, s)
		own[plain] = true
	}
	for _, s := range all {
		for _, synonym := range s.Synonyms {
			if plain := string(plainName(nil, synonym)); !own[plain] {
				index.add(index.plain, plain, s)
				own[plain+"\n"] = true
			}
		}
		index.addFormula(s)
	}
	for _, s := range all {
		// "copper sulfate" is copper(II) sulfate as long as no other charge has it
		if short := withoutCharges(s.Name); short != s.Name {
			if plain := string(plainName(nil, short)); !own[plain] && !own[plain+"\n"] {
				index.add(index.plain, plain, s)
			}
		}
	}
	return index
}

// add enters a key, or marks it as ambiguous by nil if another substance has it.
func (index *substanceIndex) add(to map[string]*Substance, key string, s *Substance) {
	if before, ok := to[key]; ok && before != s {
		to[key] = nil
		return
	}
	to[key] = s
}

func (index *substanceIndex) addFormula(s *Substance) {
	if s.Formula == "" {
		return
	}
	f, err := ParseFormula(s.Formula)
	if err != nil {
		return // not a formula, such as (CH2O)n; a test lists these
	}
	hill := f.Hill()
	index.add(index.formula, hill, s)
	if s.Formula != hill {
		index.add(index.formula, s.Formula, s)
	}
}

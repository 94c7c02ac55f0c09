package reckoner

import (
	"fmt"
	"maps"
	"strings"

	"stillroom/chem"
)

// given is the source of a number that the person typed.
const given = "given"

// Numbers that a person may give for a substance, in place of the table's.
var (
	molarMassKey = Key{"molar_mass", "Molar mass, in place of the table's", "98.072 g/mol", true}
	densityKey   = Key{"density", "Density, in place of the table's", "1.83 g/mL", true}
)

// Substance reads a key as a substance of the table, by name, synonym, CAS number or
// formula, or else as a formula, and lays the person's own numbers over it: the keys
// molar_mass and density, or, before them, those with the key's name in front, such
// as acid_molar_mass. The copy's Sources say "given" for them.
//
// A substance the table lacks is let through, by its name alone, if any own number
// is given; otherwise the *KeyError lists what may be meant.
func (a Args) Substance(key string) (chem.Substance, error) {
	text, err := a.Text(key)
	if err != nil {
		return chem.Substance{}, err
	}
	s, known := a.lookup(text)
	own := false
	for _, name := range a.ownKeys(key, "molar_mass") {
		if s.MolarMass, err = a.MolarMass(name); err != nil {
			return chem.Substance{}, err
		}
		s.Sources["molar_mass"], own = given, true
	}
	for _, name := range a.ownKeys(key, "density") {
		if s.Density, err = a.Density(name); err != nil {
			return chem.Substance{}, err
		}
		s.Sources["density"], s.DensityAt, own = given, 0, true
	}
	if known || own || a.Has("pka") || a.Has("antoine") {
		return s, nil
	}
	return chem.Substance{}, unknownSubstance(key, text)
}

// ownKeys returns the key under which an own number was given, if any.
func (a Args) ownKeys(key, number string) []string {
	for _, name := range []string{key + "_" + number, number} {
		if a.Has(name) {
			return []string{name}
		}
	}
	return nil
}

// lookup finds a substance in the table, or makes one of a formula.
func (a Args) lookup(text string) (chem.Substance, bool) {
	if found, ok := chem.LookupSubstance(text); ok {
		s := *found
		s.Sources = maps.Clone(found.Sources)
		return s, true
	}
	s := chem.Substance{Name: text, Sources: map[string]string{}}
	f, err := chem.ParseFormula(text)
	if err != nil {
		return s, false
	}
	s.Formula, s.MolarMass = f.String(), f.MolarMass()
	s.Sources["molar_mass"] = "computed from the abridged standard atomic weights"
	return s, true
}

func unknownSubstance(key, text string) error {
	wanted := "check the spelling, give a CAS number or a formula, or give molar_mass= and density= yourself"
	if meant := candidates(text); meant != "" {
		wanted = "is it one of " + meant + "? Or " + wanted
	}
	return &KeyError{Key: key, Text: text, What: "no such substance in the table, or several", Wanted: wanted, Cause: ErrUnknownSubstance}
}

// candidates lists what a name may mean.
func candidates(text string) string {
	var names []string
	for _, c := range chem.Candidates(text) {
		names = append(names, c.Name)
	}
	return strings.Join(names, ", ")
}

// NeedMolarMass returns the molar mass of a substance, or an error that asks for it.
func NeedMolarMass(s chem.Substance) (chem.MolarMass, error) {
	if s.MolarMass > 0 {
		return s.MolarMass, nil
	}
	wanted := fmt.Sprintf("give molar_mass=%q", molarMassKey.Hint)
	if meant := candidates(s.Name); s.CAS == "" && meant != "" {
		wanted += ", or is it one of " + meant + "?"
	}
	return 0, &KeyError{Key: "molar_mass", What: "no molar mass of " + s.Name + " in the table", Wanted: wanted, Cause: chem.ErrNoData}
}

// NeedDensity returns the density of a substance, or an error that asks for it.
func NeedDensity(s chem.Substance) (chem.Density, error) {
	if s.Density > 0 {
		return s.Density, nil
	}
	return 0, &KeyError{Key: "density", What: "no density of " + s.Name + " in the table",
		Wanted: fmt.Sprintf("give density=%q", densityKey.Hint), Cause: chem.ErrNoData}
}

// Antoine reads the key antoine as the three coefficients of
//
//	log10(p/mmHg) = A − B/(C + t/°C)
func (a Args) Antoine() ([3]float64, error) {
	numbers, err := a.Numbers("antoine")
	if err != nil {
		return [3]float64{}, err
	}
	if len(numbers) != 3 {
		return [3]float64{}, &KeyError{Key: "antoine", Text: a["antoine"], What: "not three numbers", Wanted: "write A;B;C for log10(p/mmHg) and °C", Cause: chem.ErrSyntax}
	}
	return [3]float64(numbers), nil
}

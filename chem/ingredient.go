package chem

import (
	"slices"
	"strconv"
	"strings"
)

// IngredientOf returns a substance as an ingredient of a mixture, with what its
// record knows. A nil substance, or one without a classification, is unknown.
func IngredientOf(name string, s *Substance, w Fraction) Ingredient {
	if s == nil {
		return Ingredient{Name: name, Fraction: w}
	}
	in := Ingredient{Name: name, CAS: s.CAS, Fraction: w, Hazard: s.Hazard, Known: s.Hazard.Assessed || s.NotClassified(),
		State: s.State, LimitShare: chromateShare(s)}
	in.read = readHazard(s.Hazard)
	a := s.Hazard.Acute
	add := func(route string, value float64) {
		if value > 0 {
			in.Estimates = append(in.Estimates, AcuteEstimate{Route: route, Value: value})
		}
	}
	add(Oral, a.Oral)
	add(Dermal, a.Dermal)
	switch a.InhalationForm {
	case "gas":
		add(InhaledGas, a.Inhalation)
	case "vapour":
		add(InhaledVapour, a.Inhalation)
	case "dust/mist":
		add(InhaledDust, a.Inhalation)
	}
	return in
}

// hazardReading is a record with its classes and limits read.
type hazardReading struct {
	classes []HazardClass
	limits  []specificLimit
	acute   []AcuteEstimate
	bad     []string // what couldn't be read
}

func readHazard(h HazardRecord) *hazardReading {
	r := &hazardReading{classes: h.HazardClasses()}
	r.limits, r.acute, r.bad = parseSpecificLimits(h.SCL)
	for i, text := range r.bad {
		r.bad[i] = "specific limit " + strconv.Quote(text)
	}
	for _, c := range r.classes {
		if _, ok := LabelElementsOf(c); !ok {
			r.bad = append(r.bad, "classification "+strconv.Quote(c.String()))
		}
	}
	return r
}

// NotClassified reports a record that says, from memory, that common suppliers
// don't classify the substance. It is a statement, unlike a missing record, but
// an unverified one.
func (s *Substance) NotClassified() bool {
	return len(s.Hazard.Classes) == 0 && (s.Hazard.Basis == "none" || s.Hazard.Basis == "not classified")
}

// chromateShare is the part of a chromium(VI) compound's mass that note 3 of
// CLP Annex VI counts: chromate ion. 0 for everything else.
func chromateShare(s *Substance) Fraction {
	if !isChromateVI(Reactant{Name: s.Name}) || !hasNote3(s.Hazard.Notes) {
		return 0
	}
	f, err := ParseFormula(s.Formula)
	if err != nil || f.MolarMass() <= 0 {
		return 0
	}
	ion, err := ParseFormula("CrO4^2-")
	if err != nil {
		return 0
	}
	return Fraction(f.Count("Cr") * float64(ion.MolarMass()) / float64(f.MolarMass()))
}

// hasNote3 finds note 3 in the notes of a record, "Notes 3 G; …" or "Annex VI
// notes 3: …".
func hasNote3(text string) bool {
	_, after, ok := strings.Cut(strings.ToLower(text), "notes ")
	if !ok {
		return false
	}
	if end := strings.IndexAny(after, ";:"); end >= 0 {
		after = after[:end]
	}
	return slices.Contains(strings.Fields(after), "3")
}

// HazardClasses returns the classes of a record with category and code apart.
func (h HazardRecord) HazardClasses() []HazardClass {
	var classes []HazardClass
	for _, class := range h.Classes {
		c, ok := ParseHazardClass(class)
		if !ok {
			c = HazardClass{Name: class} // a mixture or a label says that it isn't understood
		}
		classes = append(classes, c)
	}
	return classes
}

// ReactantOf returns a substance as the compatibility chart sees it.
func ReactantOf(s *Substance) Reactant {
	groups := slices.Clone(s.ReactiveGroups)
	r := ReactantNamed(s.Name, s.Formula, groups...)
	for _, name := range s.Synonyms {
		if listed, ok := listedGroups(name); ok && !r.Assessed {
			r.Groups, r.Assessed = listed, true
		}
	}
	return r
}

// IncompatiblePairs returns the pairs of substances that must not meet: see
// IncompatibleReactants.
func IncompatiblePairs(subs []*Substance) []Incompatibility {
	var rs []Reactant
	for _, s := range subs {
		rs = append(rs, ReactantOf(s))
	}
	return IncompatibleReactants(rs)
}

package planner

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"stillroom/chem"
)

// Phases of a vessel.
const (
	aqueous = iota
	organic
	solid
	gas
	phaseCount
)

// matter is one component of the balance, with what the walk needs to know of
// it looked up once.
type matter struct {
	name, cas string
	formula   chem.Formula
	text      string  // the formula as its source has it
	written   string  // the formula in our own spelling
	molar     float64 // kg/mol
	home      int     // phase it belongs to
	miscible  bool    // with water in every proportion
	density   float64 // kg/m3, of the liquid or the crystal; 0 for no data
	boiling   float64 // K; 0 for no data
	cp        float64 // J/(kg K) of the liquid; 0 for no data
	latent    float64 // J/mol at the boiling point; 0 for no data
	soluble   float64 // kg in a kg of water; negative for no data
	inWater   []float64
	elements  []elementAmount
	charge    float64
	protons   constitution // empty for what is no electrolyte
	electro   bool
	groups    []int
	liquid    bool // at 20 °C, when pure
}

type elementAmount struct {
	index int
	count float64
}

const waterName, waterNumber = "water", "7732-18-5"

var errUnknownSubstance = errors.New("no such substance")

// findMatter looks a name up: first among the recipe's own substances, then in
// the table of substances, then among the electrolytes.
func findMatter(r *Recipe, name string) (matter, error) {
	m := matter{name: name, soluble: -1, home: -1}
	note, noted := noteOn(r, name)
	record, found := chem.LookupSubstance(name)
	if noted && note.CAS != "" && !found {
		record, found = chem.LookupSubstance(note.CAS)
	}
	if found {
		m.take(record)
	}
	salt, isSalt := constitutions()[name]
	if !isSalt && m.cas != "" {
		salt, isSalt = constitutions()[m.cas]
	}
	if !isSalt && noted {
		salt, isSalt = constitutions()[note.CAS]
	}
	if isSalt {
		m.electro, m.protons = true, salt
		if !found {
			m.cas, m.text = salt.cas, salt.formula
		}
	}
	if noted {
		m.note(note)
	}
	if !found && !noted && !isSalt {
		return m, fmt.Errorf("%w %q", errUnknownSubstance, name)
	}
	return m.finish()
}

func noteOn(r *Recipe, name string) (SubstanceNote, bool) {
	i := slices.IndexFunc(r.Substances, func(s SubstanceNote) bool { return s.Name == name })
	if i < 0 {
		return SubstanceNote{}, false
	}
	return r.Substances[i], true
}

// take copies what the table of substances knows.
func (m *matter) take(s *chem.Substance) {
	m.cas, m.text = s.CAS, s.Formula
	m.density = float64(s.Density)
	m.groups = s.ReactiveGroups
	if s.Boiling != nil {
		m.boiling = float64(*s.Boiling)
	}
	if s.HeatCapacity != nil {
		m.cp = float64(*s.HeatCapacity)
	}
	if s.HeatOfVaporisation != nil {
		m.latent = float64(*s.HeatOfVaporisation)
	}
	m.takeSolubility(s)
	switch s.State {
	case "gas":
		m.home = gas
	case "liquid":
		m.liquid = true
		m.home = organic
		if m.miscible || m.cas == waterNumber {
			m.home = aqueous
		}
	}
}

func (m *matter) note(n SubstanceNote) {
	if n.Formula != "" {
		m.text = n.Formula
	}
	if n.CAS != "" {
		m.cas = n.CAS
	}
	if n.Density != 0 {
		m.density = float64(n.Density)
	}
	if n.Boiling != 0 {
		m.boiling = float64(n.Boiling)
	}
	if n.Phase != "" {
		m.home = slices.Index(phaseNames, n.Phase)
	}
}

// finish reads the formula and settles the phase where the record left it open.
func (m matter) finish() (matter, error) {
	f, err := chem.ParseFormula(m.text)
	if err != nil {
		return m, fmt.Errorf("the formula of %s: %w", m.name, err)
	}
	m.formula = f.Anhydrous()
	m.written = m.formula.String()
	m.molar, m.charge = steady(float64(f.Anhydrous().MolarMass())), float64(f.Charge())
	if !(m.molar > 0) {
		return m, fmt.Errorf("%s has no molar mass", m.name)
	}
	if m.electro && m.home != gas && m.protons.cationCharge > 0 {
		m.home = aqueous
	}
	if m.home < 0 && m.electro && m.formula.Count("C") == 0 {
		m.home = aqueous
	}
	if m.home < 0 {
		m.home = m.guessPhase()
	}
	if m.cas == waterNumber {
		m.name, m.miscible, m.soluble = waterName, true, math.Inf(1)
	}
	if m.home < 0 {
		return m, fmt.Errorf("the phase of %s is not known: state it under substances", m.name)
	}
	m.inWater = apparentDensities(m)
	return m, nil
}

// guessPhase places a solid: organic solids with the organic phase, salts of
// known solubility in water.
func (m *matter) guessPhase() int {
	organicSolid, metal := false, false
	for _, e := range m.formula.Elements() {
		switch e.Symbol {
		case "C":
			organicSolid = true
		case "H", "O", "N", "S", "P", "F", "Cl", "Br", "I":
		default:
			metal = true
		}
	}
	switch {
	case organicSolid && !metal:
		return organic
	case m.soluble >= sparingly:
		return aqueous
	case m.soluble >= 0:
		return solid
	}
	return -1
}

// sparingly is the solubility in kg per kg water from which a salt counts as
// dissolved: the pharmacopoeias call less than 1 in 100 slightly soluble.
const sparingly = 0.01

// takeSolubility converts the record's solubility to kg per kg water.
func (m *matter) takeSolubility(s *chem.Substance) {
	unit := strings.ToLower(s.WaterSolubilityUnit)
	if strings.Contains(unit, "miscible") {
		m.miscible, m.soluble = true, math.Inf(1)
		return
	}
	if s.WaterSolubility == nil {
		return
	}
	x := *s.WaterSolubility
	switch {
	case strings.Contains(unit, "g/l"):
		m.soluble = x / 1000 // of a dilute solution, taken as water
	case strings.Contains(unit, "100 g water"):
		m.soluble = x / 100
	}
	if m.soluble >= freely && s.State == "liquid" {
		m.miscible = true
	}
}

// freely is the solubility in kg per kg water from which a liquid is taken as
// miscible: 1000 g/L stands for that in the table.
const freely = 0.999

// densitySteps is the number of steps between pure water and pure solute at
// which apparent densities are kept.
const densitySteps = 50

// apparentDensities returns the density that a dissolved substance seems to
// have in water at mass fractions 0, 1/50 … 1, from measured densities of its
// solutions at 20 °C:
//
//	1/ρ = w/ρₐ + (1 − w)/ρ_w
//
// where ρ is that of the solution and ρₐ the apparent one. It is nil where
// there are no data.
func apparentDensities(m matter) []float64 {
	if m.home != aqueous || m.cas == waterNumber || m.cas == "" {
		return nil
	}
	room := chem.Celsius(20)
	water, err := chem.SolutionDensity(waterNumber, 0, room)
	if err != nil {
		return nil
	}
	list := make([]float64, densitySteps+1)
	last := 0.0
	for i := 1; i <= densitySteps; i++ {
		w := float64(i) / densitySteps
		rho, err := chem.SolutionDensity(m.cas, chem.Fraction(w), room)
		if err == nil {
			v := 1/float64(rho) - (1-w)/float64(water)
			if v > 0 {
				last = steady(w / v)
			}
		}
		list[i] = last
	}
	if list[1] == 0 && last == 0 {
		return nil
	}
	for i := densitySteps - 1; i >= 0; i-- {
		if list[i] == 0 {
			list[i] = list[i+1]
		}
	}
	return list
}

// steady rounds a figure that was looked up to twelve digits, so that the last
// bit, which differs between processors, doesn't reach what is drawn with a
// stored seed.
func steady(x float64) float64 {
	y, err := strconv.ParseFloat(strconv.FormatFloat(x, 'e', 11, 64), 64)
	if err != nil {
		return x
	}
	return y
}

// volumeOf returns the volume in m3 that mass of the substance takes up beside
// water kg of water. Without any density it counts as that of as much water,
// which the program's notes say.
func (m *matter) volumeOf(mass, water float64) float64 {
	if mass == 0 {
		return 0
	}
	if m.inWater != nil {
		x := float64(float64(mass) / (float64(mass) + float64(water)) * densitySteps)
		i := min(int(x), densitySteps-1)
		a := m.inWater[i] + float64((x-float64(i))*(m.inWater[i+1]-m.inWater[i]))
		return mass / a
	}
	if m.density > 0 {
		return mass / m.density
	}
	return mass / waterDensity
}

// waterDensity is that of water at 20 °C in kg/m3 (OpenStax Chemistry 2e,
// appendix E, table E1: 0.9982 g/mL).
const waterDensity = 998.2

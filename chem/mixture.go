package chem

import (
	"fmt"
	"slices"
	"sort"
	"strings"
)

// MixtureSystem says by which set of categories a mixture was classified.
type MixtureSystem string

// The systems. Both use the UN GHS rules for mixtures; CLP leaves out the
// categories the European Union hasn't taken over, such as Acute Tox. 5 and
// Aquatic Acute 2 and 3. OSHA's lower limits are not applied.
const (
	CLP   MixtureSystem = "UN GHS rules with the categories of EU CLP 1272/2008"
	UNGHS MixtureSystem = "UN GHS Rev.10, all categories"
)

// Ingredient is one component of a mixture.
type Ingredient struct {
	Name, CAS string
	Fraction  Fraction // by mass
	Hazard    HazardRecord
	// Known says that there is a hazard record. An ingredient without one is
	// counted as unknown and named, never taken for harmless.
	Known bool
	// State at 20 °C, "solid", "liquid" or "gas": it decides whether an acute
	// toxicity by inhalation counts as dust or mist, vapour or gas.
	State string
	// Estimates are acute toxicity estimates from data; they win over those
	// that follow from the category.
	Estimates []AcuteEstimate
	// UnknownFor are exposure routes ("oral", "dermal", "inhalation") for which
	// nothing is known although there is a record.
	UnknownFor []string
	// PH of the ingredient by itself, if HasPH. At or below 2, or from 11.5 up,
	// its corrosion doesn't add to that of others but counts from 1 % on.
	PH    float64
	HasPH bool
	// LimitShare is the part of the ingredient's mass that its specific limits
	// count; 0 means all of it. Limits of chromates count chromate ion (CLP
	// Annex VI, note 3).
	LimitShare Fraction

	read *hazardReading // of Hazard; nil until somebody needs it
}

// MixtureOptions are what may be known of the whole mixture.
type MixtureOptions struct {
	System MixtureSystem // empty means CLP
	PH     float64       // of the mixture, if HasPH
	HasPH  bool
}

// Classification is the answer to ClassifyMixture.
type Classification struct {
	System     MixtureSystem
	Classes    []string // "Skin Corr. 1B H314", worst classes first in the order of the standard
	Statements []string // codes with words, repetitions left out as on a label
	Pictograms []string // "GHS05", by the precedence of the standard
	Signal     string   // "Danger", "Warning" or empty
	P          []string // precautionary statement codes of the classes, in order, none twice
	// Physical are the physical hazard classes of the ingredients from 1 % on.
	// Those of a mixture need a test or a validated model; none is made here, so
	// they stand apart and are to be treated as those of the worst ingredient,
	// which is this program's choice and not the standard's.
	Physical []string
	Unknown  Fraction // by mass, of ingredients without a record
	Notes    []string
	Reasons  []Reason
}

// Reason says why a class was or wasn't given: a sum or share against its limit.
type Reason struct {
	Class string // "Skin Corr. 1B", or "not Aquatic Acute 1"
	Rule  string // identity of the rule in the table of mixture rules
	Value float64
	Limit float64
	Unit  string // "% weighted", "sum C/L", "%", "pH", or that of an acute toxicity estimate
	Who   string // the ingredient, where a single one decides
}

// Text writes the reason as words with its numbers.
func (r Reason) Text() string {
	reached := "at least"
	if strings.HasPrefix(r.Class, "not ") {
		reached = "below"
	}
	switch {
	case r.Rule == "EY-011":
		return "implied by Skin Corr. 1"
	case r.Unit == "pH":
		return fmt.Sprintf("pH %.1f of the mixture; its acid or alkaline reserve was not looked at", r.Value)
	case r.Unit == "sum C/L":
		return fmt.Sprintf("sum of shares over limits %.3g, %s %g", r.Value, reached, r.Limit)
	case r.Unit == "% weighted":
		return fmt.Sprintf("weighted sum %.3g %%, %s %g", r.Value, reached, r.Limit)
	case r.Unit == "%" && r.Who == "":
		return fmt.Sprintf("sum %.3g %%, %s %g %%", r.Value, reached, r.Limit)
	case r.Unit == "%":
		return fmt.Sprintf("%s at %.3g %%, limit %g %%", r.Who, r.Value, r.Limit)
	case reached == "below":
		return fmt.Sprintf("ATE of the mixture %.4g %s, above the last category", r.Value, r.Unit)
	}
	return fmt.Sprintf("ATE of the mixture %.4g %s, at most %g", r.Value, r.Unit, r.Limit)
}

// ClassifyMixture classifies a mixture by the rules of UN GHS as the European
// Union adopted them (CLP 1272/2008, Annex I): cut-offs, acute toxicity
// estimates, additive and single limits, specific limits and M-factors. It
// needs mass fractions that are not negative and don't sum to more than one;
// what is missing to one is counted as unknown.
//
// The result is a calculation from the ingredients' records. Tests on the
// mixture, bridging and expert judgement, which come first in the standard, are
// not known to it, and physical hazards are not determined.
func ClassifyMixture(ingredients []Ingredient) (Classification, error) {
	return ClassifyMixtureWith(ingredients, MixtureOptions{})
}

// ClassifyMixtureWith is ClassifyMixture with what is known of the whole mixture.
func ClassifyMixtureWith(ingredients []Ingredient, o MixtureOptions) (Classification, error) {
	if o.System == "" {
		o.System = CLP
	}
	m := &mixture{options: o, out: Classification{System: o.System}}
	if err := m.read(ingredients); err != nil {
		return Classification{}, err
	}
	m.acute()
	m.skin()
	m.eye()
	m.singles()
	m.sumsOfEffects()
	m.aquatic()
	m.supplements()
	m.physical()
	m.label()
	return m.out, nil
}

// mixture is a classification under way.
type mixture struct {
	options MixtureOptions
	parts   []mixPart
	classes []HazardClass
	euh     []string
	unknown float64 // per cent
	out     Classification
}

// mixPart is an ingredient with its record read.
type mixPart struct {
	*Ingredient
	percent float64
	// limited is the per cent that specific limits count.
	limited float64
	classes []HazardClass
	limits  []specificLimit
	acute   []AcuteEstimate
}

func (m *mixture) read(ingredients []Ingredient) error {
	if len(ingredients) == 0 {
		return fmt.Errorf("classifying a mixture: no ingredients; give at least one with its mass fraction")
	}
	total := 0.0
	m.parts = make([]mixPart, 0, len(ingredients)+1)
	for i := range ingredients {
		in := &ingredients[i]
		if !(in.Fraction >= 0 && in.Fraction <= 1) {
			return fmt.Errorf("classifying a mixture: %s has a mass fraction of %g %%; want 0 to 100 %%", in.Name, in.Fraction.Percent())
		}
		total += in.Fraction.Percent()
		m.add(in)
	}
	// A tenth of a per cent covers compositions that were rounded for people.
	if total > 100.1 {
		return fmt.Errorf("classifying a mixture: the mass fractions sum to %.4g %%; want at most 100 %%", total)
	}
	if rest := 100 - total; rest > 0.1 {
		m.add(&Ingredient{Name: "rest, not named", Fraction: Fraction(rest / 100)})
	}
	m.noteUnknown()
	return nil
}

func (m *mixture) add(in *Ingredient) {
	p := mixPart{Ingredient: in, percent: in.Fraction.Percent()}
	p.limited = p.percent
	if in.LimitShare > 0 {
		p.limited *= float64(in.LimitShare)
	}
	read := in.read
	if read == nil {
		read = readHazard(in.Hazard)
	}
	for _, text := range read.bad {
		m.note("%s: %s not understood; read the supplier's sheet", in.Name, text)
	}
	p.classes, p.limits = read.classes, read.limits
	p.acute = slices.Concat(in.Estimates, read.acute)
	m.parts = append(m.parts, p)
}

func (m *mixture) noteUnknown() {
	var names []string
	for _, p := range m.parts {
		if !p.Known && p.percent > 0 {
			m.unknown += p.percent
			names = append(names, p.Name)
		}
	}
	m.out.Unknown = Fraction(m.unknown / 100)
	if m.unknown > 0 {
		m.note("%.3g %% of the mixture has no hazard data (%s): not assessed, not harmless", m.unknown, strings.Join(names, ", "))
	}
}

func (m *mixture) note(format string, args ...any) {
	m.out.Notes = append(m.out.Notes, fmt.Sprintf(format, args...))
}

func (m *mixture) reason(r Reason) { m.out.Reasons = append(m.out.Reasons, r) }

// give adds a class unless a worse category of the same class is there.
func (m *mixture) give(c HazardClass) {
	for i, old := range m.classes {
		if old.Name != c.Name || !sameKind(old, c) {
			continue
		}
		if c.Category < old.Category {
			m.classes[i] = c
			return
		}
		if c.Category > old.Category || c.Code == old.Code {
			return
		}
	}
	m.classes = append(m.classes, c)
}

// sameKind tells acute toxicity by its route and STOT SE 3 by its effect:
// within those, classes of one name stand side by side.
func sameKind(a, b HazardClass) bool {
	switch a.Name {
	case "Acute Tox.":
		return routeOf(a.Code) == routeOf(b.Code)
	case "STOT SE":
		return a.Category != "3" && b.Category != "3" || a.Code == b.Code
	}
	return true
}

func (m *mixture) has(name, category string) bool {
	for _, c := range m.classes {
		if c.Name == name && (category == "" || c.Category == category) {
			return true
		}
	}
	return false
}

func (p mixPart) class(name string) (HazardClass, bool) {
	var worst HazardClass
	for _, c := range p.classes {
		if c.Name == name && (worst.Name == "" || c.Category < worst.Category) {
			worst = c
		}
	}
	return worst, worst.Name != ""
}

// atLeast compares a sum with a limit. A billionth of slack keeps the rounding
// of a sum of decimal fractions from moving a mixture that is exactly at a
// limit, which the standard counts as reached.
func atLeast(value, limit float64) bool { return value >= limit*(1-1e-9) }

// classOrder is the order in which the standard treats the classes.
var classOrder = []string{"Expl.", "Unst. Expl.", "Flam. Gas", "Aerosol", "Ox. Gas", "Press. Gas", "Flam. Liq.", "Flam. Sol.",
	"Self-react.", "Pyr. Liq.", "Pyr. Sol.", "Self-heat.", "Water-react.", "Ox. Liq.", "Ox. Sol.", "Org. Perox.",
	"Met. Corr.", "Desen. Expl.", "Acute Tox.", "Skin Corr.", "Skin Irrit.", "Eye Dam.", "Eye Irrit.", "Resp. Sens.",
	"Skin Sens.", "Muta.", "Carc.", "Repr.", "Lact.", "STOT SE", "STOT RE", "Asp. Tox.", "ED HH", "Aquatic Acute",
	"Aquatic Chronic", "ED ENV", "PBT", "vPvB", "PMT", "vPvM", "Ozone"}

func classRank(name string) int {
	for i, n := range classOrder {
		if n == name {
			return i
		}
	}
	return len(classOrder)
}

func sortClasses(classes []HazardClass) {
	sort.SliceStable(classes, func(i, j int) bool {
		a, b := classes[i], classes[j]
		if ra, rb := classRank(a.Name), classRank(b.Name); ra != rb {
			return ra < rb
		}
		if a.Category != b.Category {
			return a.Category < b.Category
		}
		return a.Code < b.Code
	})
}

package planner

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
)

// Mixtures: what is in vessels and waste, classified from its ingredients.

// vesselNotes classify each liquid or solid phase of a step's contents. Layers
// are apart, because each is a mixture by itself.
func (m *mixtures) vesselNotes(s StepReport) []HazardNote {
	var phases []string
	for _, c := range s.Contents {
		if !slices.Contains(phases, c.Phase) {
			phases = append(phases, c.Phase)
		}
	}
	var notes []HazardNote
	for _, phase := range phases {
		if phase == "gas" {
			continue
		}
		if note, ok := m.note(s.Name, phaseName(phase, len(phases)), inPhase(s.Contents, phase), 0); ok {
			note.Step = s.N
			notes = append(notes, note)
		}
	}
	return notes
}

func inPhase(contents []Content, phase string) []Content {
	list := make([]Content, 0, len(contents))
	for _, c := range contents {
		if c.Phase == phase {
			list = append(list, c)
		}
	}
	return list
}

func phaseName(phase string, phases int) string {
	switch {
	case phase == "solid":
		return "solid"
	case phases == 1:
		return phase + " contents"
	}
	return phase + " layer"
}

// mixtures classifies contents and remembers what it has seen: the same
// substances, and often the same contents, come again step by step.
type mixtures struct {
	ingredients map[string]chem.Ingredient
	records     map[string]*chem.Substance // by the name used; nil for none
	seen        []seenMixture
	labels      map[string]chem.Label // by the classes
}

func newMixtures() *mixtures {
	return &mixtures{ingredients: map[string]chem.Ingredient{}, records: map[string]*chem.Substance{}, labels: map[string]chem.Label{}}
}

type seenMixture struct {
	contents []Content
	pH       float64
	note     HazardNote // without its place
}

// note classifies contents by mass, and by their pH unless that is 0 for not
// known; false where there is nothing.
func (m *mixtures) note(at, what string, contents []Content, pH float64) (HazardNote, bool) {
	total := chem.Mass(0)
	for _, c := range contents {
		total += max(c.Mass, 0)
	}
	if !(total > 0) {
		return HazardNote{}, false
	}
	note := m.classified(contents, total, pH)
	note.At, note.What = at, what+note.What
	return note, true
}

func (m *mixtures) classified(contents []Content, total chem.Mass, pH float64) HazardNote {
	for _, s := range m.seen {
		if s.pH == pH && slices.Equal(s.contents, contents) {
			return s.note
		}
	}
	ingredients := make([]chem.Ingredient, 0, len(contents))
	for _, c := range contents {
		if c.Mass > 0 {
			ingredients = append(ingredients, m.ingredient(c.Substance, chem.Fraction(c.Mass/total)))
		}
	}
	got, err := chem.ClassifyMixtureWith(ingredients, chem.MixtureOptions{PH: pH, HasPH: pH != 0})
	note := unknownNote("", "")
	if err == nil {
		note = m.noteOf("", ": "+shares(contents, total), got)
		if note.Signal == "" && got.Unknown.Percent() >= 1 { // below, it is in the notes; the standard counts from 1 % on
			note.Basis = basisNoData + plainf(" (%.3g %% of it)", got.Unknown.Percent())
		}
	}
	m.seen = append(m.seen, seenMixture{contents, pH, note})
	return note
}

// labelOf is the label of classes. Mixtures differ from step to step more often
// than their classes do.
func (m *mixtures) labelOf(texts []string) chem.Label {
	key := strings.Join(texts, "\x00")
	if label, ok := m.labels[key]; ok {
		return label
	}
	var classes []chem.HazardClass
	for _, text := range texts {
		if class, ok := chem.ParseHazardClass(text); ok {
			classes = append(classes, class)
		}
	}
	label := chem.LabelOf(classes)
	label.Statements = slices.Clip(label.Statements) // notes add to them
	m.labels[key] = label
	return label
}

func (m *mixtures) record(name string) *chem.Substance {
	s, ok := m.records[name]
	if !ok {
		s = substance(name, "")
		m.records[name] = s
	}
	return s
}

func (m *mixtures) ingredient(name string, w chem.Fraction) chem.Ingredient {
	in, ok := m.ingredients[name]
	if !ok {
		in = chem.IngredientOf(name, m.record(name), w)
		m.ingredients[name] = in
	}
	in.Fraction = w
	return in
}

// shares writes contents from the largest, down to one per cent.
func shares(contents []Content, total chem.Mass) string {
	sorted := slices.Clone(contents)
	slices.SortStableFunc(sorted, func(a, b Content) int {
		if a.Mass != b.Mass {
			if a.Mass > b.Mass {
				return -1
			}
			return 1
		}
		return strings.Compare(a.Substance, b.Substance)
	})
	var words []string
	for _, c := range sorted {
		if percent := 100 * float64(c.Mass/total); percent >= 1 {
			words = append(words, fmt.Sprintf("%s %.0f %%", c.Substance, percent))
		}
	}
	return strings.Join(words, ", ")
}

// noteOf turns a classified mixture into a note, with its physical hazards as
// those of the worst ingredient.
func (m *mixtures) noteOf(at, what string, c chem.Classification) HazardNote {
	note := HazardNote{At: at, What: what, Classes: c.Classes, Signal: c.Signal, Pictograms: c.Pictograms, P: c.P,
		Statements: c.Statements, Basis: basisCalculated, Limits: []string{noLimit}, Notes: c.Notes}
	if len(c.Physical) == 0 {
		return note
	}
	note.Classes = slices.Concat(c.Physical, c.Classes)
	label := m.labelOf(note.Classes)
	note.Signal, note.Pictograms, note.P, note.Statements = label.Signal, label.Pictograms, label.P, label.Statements
	for _, s := range c.Statements { // supplemental ones
		if strings.HasPrefix(s, "EUH") {
			note.Statements = append(note.Statements, s)
		}
	}
	return note
}

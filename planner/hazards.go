package planner

import (
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// The three places a hazard note speaks of besides steps.
const (
	AsStored = "as stored"
	InWaste  = "waste"
)

// Words for where a classification came from.
const (
	basisNoData     = "no data: not assessed, read the supplier's sheet"
	basisUnverified = "from memory, unverified: read the supplier's sheet"
	basisCalculated = "calculated by the UN GHS mixture rules from the ingredients; physical hazards not determined, taken from the worst ingredient"
	noLimit         = "no data"
)

// NoteHazards says what in a run can hurt, in the order of the papers: every
// stock form at its strength, what is in each vessel at the fullest moment of
// each step, layer by layer, what is formed on the way, and the waste lots.
// What has no record gets a note that says so.
func NoteHazards(needs []Need, steps []StepReport, waste []WasteLot) []HazardNote {
	m := newMixtures()
	notes := make([]HazardNote, 0, 2*(len(needs)+len(steps)+len(waste))) // two layers a step
	m.seen = make([]seenMixture, 0, 2*(len(steps)+len(waste)))
	stored := map[string]bool{}
	for _, n := range needs {
		if n.Count {
			continue
		}
		for _, note := range m.storedNotes(n) {
			if !slices.ContainsFunc(notes, func(had HazardNote) bool { return had.What == note.What }) {
				notes = append(notes, note)
			}
		}
		stored[n.Substance] = true
		for _, d := range n.Draws {
			stored[d.Form.Name] = true
		}
	}
	notes = append(notes, m.formedNotes(steps, stored)...)
	for _, s := range steps {
		notes = append(notes, m.vesselNotes(s)...)
	}
	for _, w := range waste {
		if note, ok := m.note(InWaste, w.Stream, w.Contains, w.PH); ok {
			notes = append(notes, note)
		}
	}
	return notes
}

// storedNotes speak of each stock form drawn; of the substance itself where
// nothing is drawn.
func (m *mixtures) storedNotes(n Need) []HazardNote {
	if len(n.Draws) == 0 {
		return []HazardNote{substanceNote(AsStored, n.Substance, n.CAS)}
	}
	var notes []HazardNote
	seen := map[string]bool{}
	for _, d := range n.Draws {
		if seen[d.Form.Name] {
			continue
		}
		seen[d.Form.Name] = true
		note := m.formNote(n, d)
		note.What = d.Form.Name
		notes = append(notes, note)
	}
	return notes
}

// HazardOf is the note of what is in a bottle, at the high end of its strength.
func HazardOf(s inventory.Substance, f inventory.StockForm, b inventory.Bottle) HazardNote {
	note := newMixtures().formNote(Need{Substance: s.Name, CAS: s.CAS}, Draw{Form: f, Bottle: b})
	note.What = f.Name
	return note
}

// formNote classifies a stock form at the high end of its strength, which is the
// end for hazards. A solution in water is a mixture; the impurity of a reagent
// that nobody named is not.
func (m *mixtures) formNote(n Need, d Draw) HazardNote {
	strength := chem.Fraction(max(d.Form.AssayHigh, d.Bottle.LotAssay))
	if !strings.EqualFold(d.Form.Diluent, "water") || strength <= 0 || strength >= 1 {
		return substanceNote(AsStored, hydrateName(n, d), n.CAS)
	}
	solute := substance(n.Substance, n.CAS)
	water := substance("water", "")
	got, err := chem.ClassifyMixture([]chem.Ingredient{
		chem.IngredientOf(n.Substance, solute, strength),
		chem.IngredientOf("water", water, 1-strength),
	})
	if err != nil || solute == nil {
		return unknownNote(AsStored, d.Form.Name)
	}
	note := m.noteOf(AsStored, d.Form.Name, got)
	note.Limits = limits(solute)
	if solute.Hazard.Unverified {
		note.Basis = basisUnverified
	}
	return note
}

// HydrateOf is the record of the hydrate that a form is, with the CAS number of
// its own; false where the form is no hydrate or the hydrate has no record.
func HydrateOf(s inventory.Substance, f inventory.StockForm) (*chem.Substance, bool) {
	name := hydrateName(Need{Substance: s.Name}, Draw{Form: f})
	record := substance(name, "")
	if name == s.Name || record == nil || record.CAS == "" || record.CAS == s.CAS {
		return nil, false
	}
	return record, true
}

// hydrateName finds the record of the hydrate that a form is, if there is one.
func hydrateName(n Need, d Draw) string {
	if d.Form.HydrateWaters == 0 {
		return n.Substance
	}
	for _, suffix := range hydrateSuffixes {
		if strings.Contains(d.Form.Name, suffix) {
			if name := n.Substance + " " + suffix; substance(name, "") != nil {
				return name
			}
		}
	}
	return n.Substance
}

var hydrateSuffixes = []string{"hemihydrate", "monohydrate", "dihydrate", "trihydrate", "tetrahydrate", "pentahydrate",
	"hexahydrate", "heptahydrate", "octahydrate", "nonahydrate", "decahydrate", "dodecahydrate"}

// formedNotes speak of what arises in the run: contents and gases that no need
// brings. Ions and the products of a run that have no record say "no data".
func (m *mixtures) formedNotes(steps []StepReport, stored map[string]bool) []HazardNote {
	seen := map[string]bool{}
	for name := range stored {
		if s := m.record(name); s != nil {
			seen[s.Name] = true
		}
		seen[name] = true
	}
	var notes []HazardNote
	add := func(step StepReport, name string) {
		key := name
		if s := m.record(name); s != nil {
			key = s.Name
		}
		if name == "" || seen[key] {
			return
		}
		seen[key] = true
		note := formedNote(step.Name, name)
		note.Step = step.N
		notes = append(notes, note)
	}
	for _, s := range steps {
		for _, a := range s.Adds {
			if r := m.record(a.Substance); r != nil {
				seen[r.Name] = true
			}
			seen[a.Substance] = true
		}
		for _, c := range s.Contents {
			add(s, c.Substance)
		}
		add(s, s.GasOf)
	}
	return notes
}

// formedNote is the note of a substance that forms. A gas forms at the pressure
// of the room, so what is said of cylinders is left out.
func formedNote(step, name string) HazardNote {
	note := substanceNote(step, name, "")
	note.Formed = true
	pressed := func(class string) bool { return strings.HasPrefix(class, "Press. Gas") }
	if !slices.ContainsFunc(note.Classes, pressed) {
		return note
	}
	var classes []chem.HazardClass
	for _, text := range slices.DeleteFunc(note.Classes, pressed) {
		if c, ok := chem.ParseHazardClass(text); ok {
			classes = append(classes, c)
		}
	}
	label := chem.LabelOf(classes)
	note.Classes = note.Classes[:len(classes)]
	note.Signal, note.Pictograms, note.Statements, note.P = label.Signal, label.Pictograms, label.Statements, label.P
	note.Notes = append(note.Notes, "not under pressure here; a gas displaces air and can suffocate in a small room")
	return note
}

// substanceNote is the note of a substance by itself.
func substanceNote(at, name, cas string) HazardNote {
	s := substance(name, cas)
	if s == nil || !s.Hazard.Assessed && !s.NotClassified() {
		return unknownNote(at, name)
	}
	classes := s.Hazard.HazardClasses()
	label := chem.LabelOf(classes)
	note := HazardNote{At: at, What: name, Signal: label.Signal, Pictograms: label.Pictograms, Statements: label.Statements,
		P: label.P, Limits: limits(s), Basis: basis(s)}
	for _, c := range classes {
		note.Classes = append(note.Classes, c.String())
	}
	for _, code := range s.Hazard.EUH {
		note.Statements = append(note.Statements, chem.StatementLine(code))
	}
	if class := s.PeroxideClass; class == "A" || class == "B" || class == "C" {
		note.Notes = append(note.Notes, "forms peroxides (class "+class+"): test before distilling or stripping, never to dryness")
	}
	if s.Hazard.SupplierAdditions != "" {
		note.Notes = append(note.Notes, "suppliers add: "+s.Hazard.SupplierAdditions)
	}
	return note
}

func basis(s *chem.Substance) string {
	switch {
	case s.NotClassified():
		return "not classified, " + basisUnverified
	case s.Hazard.Unverified:
		return basisUnverified
	}
	return s.Hazard.Basis
}

func limits(s *chem.Substance) []string {
	if s == nil || s.Hazard.Limits == "" {
		return []string{noLimit}
	}
	var list []string
	for l := range strings.SplitSeq(s.Hazard.Limits, ";") {
		list = append(list, strings.TrimSpace(l))
	}
	return list
}

func unknownNote(at, what string) HazardNote {
	return HazardNote{At: at, What: what, Basis: basisNoData, Limits: []string{noLimit}}
}

// substance finds the record of a substance, by CAS number first; nil without.
func substance(name, cas string) *chem.Substance {
	if cas != "" {
		if s, ok := chem.SubstanceByCAS(cas); ok {
			return s
		}
	}
	if name == "ice" || strings.HasPrefix(name, "ice,") {
		name = "water"
	}
	if s, ok := chem.LookupSubstance(name); ok {
		return s
	}
	return nil
}

// reactant is a substance as the compatibility chart sees it.
func reactant(name, formula string) chem.Reactant {
	if s := substance(name, ""); s != nil {
		return chem.ReactantOf(s)
	}
	return chem.ReactantNamed(name, formula)
}

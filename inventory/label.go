package inventory

import (
	"fmt"
	"strings"

	"stillroom/chem"
)

// Label is what stands on the label of a bottle made up or relabelled here. It
// is no supply label: where one is asked for, the supplier's stays on the bottle.
type Label struct {
	Code       string // with its check symbol; also as Code 128 and QR
	Name       string // full name of the form, no formula alone
	CAS        string
	Owner      string
	Received   Date
	Opened     Date
	Expiry     Date
	Pictograms []string // "GHS05"
	Signal     string
	Statements []string // H statements
	Precaution []string // P statement codes
	// Basis says where the classification comes from; "no data" if there is none.
	Basis string
	// Small is set where the bottle is so small that statements may be left out;
	// signal word and pictograms stay.
	Small bool
	Notes []string
}

// LabelOf gathers a bottle's label. A solution is classified as a mixture at the
// upper end of its strength. Without data the label says "no data", which is not
// "harmless".
func (s *Shelf) LabelOf(b Bottle) (Label, error) {
	form, ok := s.Form(b.FormID)
	if !ok {
		return Label{}, notFound("label", "the form of bottle "+b.Code, "")
	}
	substance, _ := s.SubstanceByID(form.SubstanceID)
	l := Label{Code: b.Code, Name: form.Name, CAS: substance.CAS, Received: b.Received, Opened: b.Opened, Expiry: b.Expiry, Basis: "no data"}
	if form.CAS != "" {
		l.CAS = form.CAS
	}
	if most, ok := s.Policy.Value("label.small"); ok && form.Measure != ByCount {
		l.Small = float64(b.Size) <= most*1e3*sizeFactor(form.Measure)
	}
	known, ok := chem.SubstanceByCAS(l.CAS)
	if !ok {
		return l, nil
	}
	l.Basis = known.Hazard.Basis
	if known.Hazard.Unverified {
		l.Notes = append(l.Notes, "classification unverified: read the supplier's safety data sheet")
	}
	if form.Diluent == "" {
		l.asListed(known)
		return l, nil
	}
	return l, l.asMixture(form, known)
}

// asListed takes over the record of a substance that isn't diluted.
func (l *Label) asListed(known *chem.Substance) {
	l.Pictograms, l.Signal = known.Hazard.Pictograms, known.Hazard.Signal
	for _, code := range known.Hazard.HCodes {
		words, ok := chem.Statement(code)
		if !ok {
			words = "no data"
		}
		l.Statements = append(l.Statements, code+" "+words)
	}
}

// asMixture classifies a solution at the upper end of its strength; without a
// strength as the undiluted substance, which errs on the side of caution.
func (l *Label) asMixture(form StockForm, known *chem.Substance) error {
	share := chem.Fraction(form.AssayHigh)
	if share == 0 {
		l.Notes = append(l.Notes, "strength: no data; classified as the undiluted substance")
		l.asListed(known)
		return nil
	}
	rest, _ := chem.LookupSubstance(form.Diluent)
	c, err := chem.ClassifyMixture([]chem.Ingredient{chem.IngredientOf(known.Name, known, share), chem.IngredientOf(form.Diluent, rest, 1-share)})
	if err != nil {
		return fmt.Errorf("label of bottle %s: %w", l.Code, err)
	}
	l.Basis += "; calculated for the solution"
	l.Pictograms, l.Signal, l.Statements, l.Precaution = c.Pictograms, c.Signal, c.Statements, c.P
	l.Notes = append(l.Notes, c.Notes...)
	if len(c.Physical) > 0 {
		l.Notes = append(l.Notes, "physical hazards of the solution aren't assessed; of its ingredients: "+strings.Join(c.Physical, ", "))
	}
	return nil
}

// sizeFactor lets a limit in mL stand for as many grams of a solid.
func sizeFactor(m Measure) float64 {
	if m == ByMass {
		return 1000
	}
	return 1
}

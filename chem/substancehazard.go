package chem

import (
	"cmp"
	"slices"
	"strings"
)

// wideHazard reads the classification of a row of the wide table.
func wideHazard(r row) HazardRecord {
	basis := r.text("classification_basis")
	h := HazardRecord{
		EUH: r.list("euh_codes"), Pictograms: r.list("pictograms"), Signal: r.text("signal_word"), Basis: basis,
		SCL: r.text("scl"), MFactor: r.text("m_factor"), Index: r.text("annex_vi_index"),
		Notes: r.text("annex_vi_notes"), SupplierAdditions: r.text("supplier_additions"),
	}
	h.Classes = r.list("classification")
	h.HCodes = statementsOf(h.Classes)
	h.Assessed = len(h.Classes) > 0
	h.Unverified = !strings.HasPrefix(basis, "harmonised")
	if twa := r.text("oel_twa"); twa != "" {
		h.Limits = twa + " " + r.text("oel_twa_unit") + " 8 h (" + r.text("oel_jurisdiction") + ")"
	}
	h.MAcute, h.MChronic = factorsOf(h.MFactor)
	return h
}

// statementsOf returns the statement codes that end the classes, each once.
func statementsOf(classes []string) []string {
	var codes []string
	for _, class := range classes {
		i := strings.LastIndex(class, " H")
		if i < 0 {
			continue
		}
		code, _, _ := strings.Cut(class[i+1:], " ")
		if !slices.Contains(codes, code) {
			codes = append(codes, code)
		}
	}
	return codes
}

// factorsOf reads "M=10; M=1" as the acute and the chronic factor. A single factor
// counts for both, as Annex VI means it.
func factorsOf(text string) (acute, chronic float64) {
	for item := range strings.SplitSeq(text, ";") {
		n := readNumber(strings.TrimPrefix(strings.TrimSpace(item), "M="))
		switch {
		case n.err != nil:
		case acute == 0:
			acute, chronic = n.value, n.value
		default:
			chronic = n.value
		}
	}
	return acute, chronic
}

// factorsText writes the M factors of the finer table as the wide one does.
func factorsText(r row) string {
	acute, chronic := r.text("m_acute"), r.text("m_chronic")
	switch {
	case acute == "":
		return ""
	case chronic == "":
		return "M=" + acute
	}
	return "M=" + acute + "; M=" + chronic
}

// refineHazard lays a row of the finer table of hazards over a substance.
func refineHazard(s *Substance, r row) {
	if s == nil {
		return
	}
	s.addSynonyms(r.text("name"))
	s.addSynonyms(r.list("other_names")...)
	wide := s.Hazard
	status := r.text("classification_status")
	found := fieldSources(r.text("source"))
	h := HazardRecord{
		EUH: r.list("euh"), Pictograms: r.list("pictograms"), Signal: r.text("signal_word"), Basis: status,
		SCL: r.text("scl"), Index: cmp.Or(r.text("annex_vi_index"), wide.Index), MFactor: factorsText(r),
		Notes:             hazardNotes(r),
		SupplierAdditions: r.text("supplier_additions"), Acute: acuteEstimates(r),
	}
	h.Classes = r.list("classification")
	h.HCodes = statementsOf(h.Classes)
	h.Assessed = len(h.Classes) > 0 || status == "not classified"
	h.Unverified = !strings.HasPrefix(status, "harmonised")
	h.Limits = cmp.Or(limitsOf(r), wide.Limits)
	h.MAcute, h.MChronic = factorsOf(h.MFactor)
	s.Hazard = h
	s.Sources["classification"] = found["classification"]
	s.refineTransport(r, found)
	overlay(&s.Flash, blankOr(s.Flash, r.celsius("flash_point_C")), func() { s.Sources["flash"] = "substance_hazards: from memory" })
	if class := peroxideClass(r.text("peroxide_former_class")); class != "" {
		s.PeroxideClass = class
		s.Sources["peroxide_class"] = "substance_hazards"
	}
}

// blankOr returns the second value only where the first is missing.
func blankOr[T any](have, other *T) *T {
	if have != nil {
		return nil
	}
	return other
}

// peroxideClass keeps the class letters; other words, such as "low tendency", are
// no class.
func peroxideClass(text string) string {
	switch text {
	case "A", "B", "C":
		return text
	}
	return ""
}

// refineTransport takes the UN entry of the finer table where it has one.
func (s *Substance) refineTransport(r row, found map[string]string) {
	if r.text("un_number") == "" {
		return
	}
	s.UNNumber, s.UNClass, s.PackingGroup = r.text("un_number"), r.text("un_class"), r.text("packing_group")
	s.UNSubsidiary = r.text("un_subsidiary")
	s.Sources["un"] = cmp.Or(found["UN"], "substance_hazards")
}

func hazardNotes(r row) string {
	var notes string
	for _, piece := range []struct{ prefix, text string }{
		{"Annex VI notes ", r.text("annexvi_notes")},
		{"minimum or route not excluded: ", r.text("annexvi_asterisks")},
		{"later law: ", r.text("later_changes")},
		{"doubt: ", r.text("doubt")},
	} {
		if piece.text != "" {
			notes = joinNotes(notes, piece.prefix+piece.text)
		}
	}
	return notes
}

func acuteEstimates(r row) AcuteEstimates {
	a := AcuteEstimates{InhalationUnit: r.text("ate_inh_unit"), InhalationForm: r.text("ate_inh_form"), Basis: r.text("ate_basis")}
	a.Oral, _ = r.number("ate_oral_mg_per_kg")
	a.Dermal, _ = r.number("ate_dermal_mg_per_kg")
	a.Inhalation, _ = r.number("ate_inh_value")
	return a
}

// limitsOf writes the exposure limits of a row with their jurisdiction.
func limitsOf(r row) string {
	var limits []string
	add := func(ppm, mass, what string) {
		var values []string
		if r.text(ppm) != "" {
			values = append(values, r.text(ppm)+" ppm")
		}
		if r.text(mass) != "" {
			values = append(values, r.text(mass)+" mg/m3")
		}
		if len(values) > 0 {
			limits = append(limits, strings.Join(values, ", ")+" "+what)
		}
	}
	add("eu_oel_twa_ppm", "eu_oel_twa_mg_m3", "8 h (EU)")
	add("eu_oel_stel_ppm", "eu_oel_stel_mg_m3", "15 min (EU)")
	add("osha_pel_twa_ppm", "osha_pel_twa_mg_m3", "8 h (US OSHA)")
	if other := r.text("osha_pel_other"); other != "" {
		limits = append(limits, other+" (US OSHA)")
	}
	if other := r.text("other_oel"); other != "" {
		limits = append(limits, other)
	}
	return strings.Join(limits, "; ")
}

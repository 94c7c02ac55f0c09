package chem

import (
	"cmp"
	"maps"
	"slices"
	"strconv"
	"strings"
)

// loadSubstances reads the wide table and lays the finer ones over it. Where two
// tables have a value the finer one stands, with its source.
func loadSubstances() []*Substance {
	rows := readTable("lab_substances.csv")
	all := make([]*Substance, 0, len(rows))
	byCAS := make(map[string]*Substance, len(rows))
	for _, r := range rows {
		s := wideSubstance(r)
		all = append(all, s)
		byCAS[s.CAS] = s
	}
	for _, r := range readTable("substances.csv") {
		refine(byCAS[r.text("cas")], r)
	}
	for _, r := range readTable("substance_hazards.csv") {
		refineHazard(byCAS[r.text("cas")], r)
	}
	for _, r := range readTable("synonyms.csv") {
		if s := byCAS[r.text("cas")]; s != nil {
			s.addSynonyms(r.text("name"))
		}
	}
	slices.SortFunc(all, func(a, b *Substance) int { return cmp.Or(cmp.Compare(a.Name, b.Name), cmp.Compare(a.CAS, b.CAS)) })
	return all
}

func wideSubstance(r row) *Substance {
	s := &Substance{
		Name: r.text("name"), Synonyms: r.list("synonyms"), CAS: r.text("cas"), EC: r.text("ec"),
		Formula: cmp.Or(r.text("formula_as_written"), r.text("formula")), SMILES: r.text("smiles"),
		State:   r.text("state_20C"),
		Melting: r.celsius("melting_C"), Boiling: r.celsius("boiling_C"),
		Flash: r.celsius("flash_C"), Autoignition: r.celsius("autoignition_C"),
		WaterSolubility: r.optional("water_solubility"), WaterSolubilityUnit: r.text("water_solubility_unit"),
		StorageClasses: r.list("storage_class_hint"), PeroxideClass: r.text("peroxide_class"),
		UNNumber: r.text("un_number"), UNClass: r.text("un_class"), PackingGroup: r.text("packing_group"),
		Notes: r.text("notes"), Sources: fieldSources(r.text("source")),
	}
	if m, ok := r.number("molar_mass_g_mol"); ok {
		s.MolarMass = MolarMass(m) * GramPerMole
		s.Sources["molar_mass"] = "computed from the abridged standard atomic weights"
	}
	if d, ok := r.number("density_g_mL"); ok {
		s.Density = Density(d) * GramPerMillilitre
	}
	if t := r.celsius("density_temperature_C"); t != nil {
		s.DensityAt = *t
	}
	if len(s.StorageClasses) > 0 {
		s.StorageClass = s.StorageClasses[0]
	}
	for _, g := range r.list("reactive_group") {
		if n, err := strconv.Atoi(g); err == nil {
			s.ReactiveGroups = append(s.ReactiveGroups, n)
		}
	}
	s.Hazard = wideHazard(r)
	return s
}

// celsius returns a temperature column; nil where it is blank.
func (r row) celsius(column string) *Temperature {
	t, ok := r.number(column)
	if !ok {
		return nil
	}
	k := Celsius(t)
	return &k
}

// optional returns a number column; nil where it is blank.
func (r row) optional(column string) *float64 {
	x, ok := r.number(column)
	if !ok {
		return nil
	}
	return &x
}

// fieldSources takes a source text of the form "melting, boiling: A | flash: B"
// apart by field.
func fieldSources(text string) map[string]string {
	sources := map[string]string{}
	for piece := range strings.SplitSeq(text, " | ") {
		fields, source, ok := strings.Cut(piece, ": ")
		if !ok {
			continue
		}
		for field := range strings.SplitSeq(strings.ReplaceAll(fields, "/", ","), ",") {
			sources[strings.TrimSpace(field)] = source
		}
	}
	return sources
}

// refine lays a row of the finer table of properties over a substance.
func refine(s *Substance, r row) {
	if s == nil {
		return
	}
	found := fieldSources(r.text("source"))
	source := func(field string, keys ...string) {
		for _, k := range keys {
			if found[k] != "" {
				s.Sources[field] = found[k]
				return
			}
		}
	}
	s.addSynonyms(r.text("name"))
	s.Formula = cmp.Or(s.Formula, r.text("formula"))
	s.SMILES = cmp.Or(s.SMILES, r.text("smiles"))
	if m, ok := r.number("molar_mass_g_mol"); ok {
		s.MolarMass = MolarMass(m) * GramPerMole
		source("molar_mass", "molar mass")
	}
	overlay(&s.Melting, r.celsius("melting_C"), func() { source("melting", "melting", "transition point 32.4 C") })
	overlay(&s.Boiling, r.celsius("boiling_C"), func() { source("boiling", "boiling") })
	overlay(&s.Flash, r.celsius("flash_C"), func() { source("flash", "flash") })
	s.refineDensity(r, source)
	if h, ok := r.number("heat_of_vaporisation_bp_kJ_mol"); ok {
		v := MolarEnergy(h) * KilojoulePerMole
		s.HeatOfVaporisation = &v
		source("heat_of_vaporisation", "heat of vaporisation at bp")
	}
	if c, ok := r.number("liquid_cp_25C_J_gK"); ok {
		v := SpecificHeat(c) * JoulePerGramKelvin
		s.HeatCapacity = &v
		source("heat_capacity", "liquid cp")
	}
	s.refineSolubility(r, found)
	s.Notes = joinNotes(s.Notes, r.text("notes"))
}

// overlay puts a finer value, if there is one, in place of the wide one.
func overlay[T any](to **T, finer *T, noteSource func()) {
	if finer != nil {
		*to = finer
		noteSource()
	}
}

// refineDensity prefers the density at 20 °C, then the one at its own temperature.
func (s *Substance) refineDensity(r row, source func(string, ...string)) {
	if d, ok := r.number("density_20C_g_mL"); ok {
		s.Density, s.DensityAt = Density(d)*GramPerMillilitre, Celsius(20)
		source("density", "density 20,25 C", "density 20")
		return
	}
	d, ok := r.number("density_g_mL")
	if !ok {
		return
	}
	s.Density, s.DensityAt = Density(d)*GramPerMillilitre, 0
	if t := r.celsius("density_temperature_C"); t != nil {
		s.DensityAt = *t
	}
	source("density", "density")
}

// refineSolubility takes the solubility of the finer table: "miscible" as a word,
// at 20 °C per water, and otherwise at 25 °C, where salts are per 100 g of water and
// organics per 100 mL of solution.
func (s *Substance) refineSolubility(r row, found map[string]string) {
	at20, has20 := r.number("water_solubility_g_100mL_20C")
	at25, has25 := r.number("water_solubility_g_100mL_25C")
	note := func(prefix string) {
		for _, key := range slices.Sorted(maps.Keys(found)) {
			if strings.HasPrefix(key, prefix) {
				s.Sources["water_solubility"] = found[key]
				return
			}
		}
	}
	switch {
	case r.text("water_miscible") == "yes":
		s.WaterSolubility, s.WaterSolubilityUnit = nil, "miscible"
	case has20:
		s.WaterSolubility, s.WaterSolubilityUnit = &at20, "g/100 g water at 20 C"
		note("water solubility")
	case has25:
		perLitre := 10 * at25 // g per 100 mL to g/L
		s.WaterSolubility, s.WaterSolubilityUnit = &perLitre, "g/L at 25 C"
		note("water solubility 25 C")
	}
}

// addSynonyms adds names the substance hasn't got yet, whatever their case.
func (s *Substance) addSynonyms(names ...string) {
	for _, name := range names {
		same := func(other string) bool { return strings.EqualFold(other, name) }
		if name != "" && !same(s.Name) && !slices.ContainsFunc(s.Synonyms, same) {
			s.Synonyms = append(s.Synonyms, name)
		}
	}
}

func joinNotes(a, b string) string {
	if a == "" || b == "" {
		return a + b
	}
	return a + "; " + b
}

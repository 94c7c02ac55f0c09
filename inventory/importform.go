package inventory

import (
	"fmt"
	"strings"

	"stillroom/chem"
)

// fillForm completes a form from the embedded table: what a list doesn't say
// and the table knows. What neither knows stays "no data".
func fillForm(d *draft) {
	f, id := &d.form, &d.id
	f.HydrateWaters, f.CAS = id.waters, id.formCAS
	strength := strengthCell{f.AssayLow, f.AssayHigh}
	if id.solution || aqueousAcid(id.known, strength) {
		f.Diluent = "water"
	}
	f.Name = formName(id.formName, strength, *f)
	if id.known == nil {
		return
	}
	f.StorageClass = id.known.StorageClass
	switch id.known.PeroxideClass {
	case "A", "B", "C":
		f.PeroxideTestDays = -1 // the policy's interval, put in by the import
	}
	switch id.known.CAS {
	case "7681-52-9":
		f.Ageing = "hypochlorite"
	case "7722-84-1":
		f.Ageing = "peroxide"
	}
	f.DensityGML, f.DensitySource = densityOf(id.known, *f)
}

// aqueousAcid: what a mineral acid lacks to 100 % is water (common practice).
func aqueousAcid(s *chem.Substance, strength strengthCell) bool {
	return s != nil && strength.high > 0 && strength.low < .995 && s.State == "liquid" && s.StorageClass == "acid inorganic"
}

// densityOf looks for the density at 20 °C of what is in the bottle: of the
// solution at the middle of its range, or of the substance if it is nearly pure.
func densityOf(s *chem.Substance, f StockForm) (gml float64, source string) {
	if f.Measure == ByCount {
		return 0, ""
	}
	if f.Diluent == "water" && f.AssayHigh > 0 {
		d, err := chem.SolutionDensity(s.CAS, f.Assay(), chem.Celsius(20))
		if err != nil {
			return 0, ""
		}
		return d.GramsPerMillilitre(), "embedded solution table, 20 °C, at the middle of the label's range"
	}
	if s.State != "liquid" || s.Density <= 0 || f.AssayHigh > 0 && f.AssayLow < .9 {
		return 0, ""
	}
	source = "embedded substance table"
	if at := s.DensityAt.Celsius(); s.DensityAt > 0 && (at < 19.5 || at > 20.5) {
		source += fmt.Sprintf(", at %.0f °C", at)
	}
	return s.Density.GramsPerMillilitre(), source
}

// formName says what distinguishes a form from others of its substance.
func formName(name string, strength strengthCell, f StockForm) string {
	var b strings.Builder
	b.WriteString(name)
	if f.Diluent == "water" && !strings.Contains(name, "solution") && !strings.Contains(name, "acid") {
		b.WriteString(" solution")
	}
	if strength != (strengthCell{}) {
		b.WriteString(" " + strength.String())
	}
	if f.Grade != "" {
		b.WriteString(", " + f.Grade)
	}
	if f.Additive != "" {
		b.WriteString(", with " + f.Additive)
	}
	switch f.Measure {
	case ByVolume:
		b.WriteString(", by volume")
	case ByCount:
		b.WriteString(", pieces")
	}
	return b.String()
}

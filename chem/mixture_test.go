package chem

import (
	"encoding/csv"
	"math"
	"os"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// exampleIngredient is an ingredient of an example: its per cent and classes,
// separated by "; ".
func exampleIngredient(name string, percent float64, classes string) Ingredient {
	in := Ingredient{Name: name, Fraction: Fraction(percent / 100), Known: true, State: "liquid"}
	if classes != "" {
		in.Hazard.Classes = strings.Split(classes, "; ")
	}
	return in
}

func withATE(in Ingredient, route string, value float64) Ingredient {
	in.Estimates = append(in.Estimates, AcuteEstimate{Route: route, Value: value})
	return in
}

// tableIngredient takes the classification from the embedded hazard table.
func tableIngredient(t *testing.T, id string, percent float64) Ingredient {
	t.Helper()
	for _, r := range readTable("substance_hazards.csv") {
		if r.text("id") == id {
			in := exampleIngredient(r.text("name"), percent, r.text("classification"))
			in.Hazard.SCL, in.State = r.text("scl"), r.text("state_20C")
			in.Hazard.MAcute, _ = r.number("m_acute")
			in.Hazard.MChronic, _ = r.number("m_chronic")
			if r.text("euh") != "" {
				in.Hazard.EUH = strings.Fields(r.text("euh"))
			}
			return in
		}
	}
	t.Fatalf("no row %s", id)
	return Ingredient{}
}

// mixtureExample is a row of testdata/mixture_examples.csv, whose source column
// says where each was published. Ingredients, classes and the value are put in
// by hand from its text.
type mixtureExample struct {
	ingredients []Ingredient
	options     MixtureOptions
	classes     []string // must be given
	not         []string // prefixes of classes that must not be given
	reason      string   // class of the reason that holds the expected value
	statement   string   // beginning of a statement that must be there
	note        string   // part of a note that must be there
}

func mixtureExamples(t *testing.T) map[string]mixtureExample {
	water := func(percent float64) Ingredient { return tableIngredient(t, "water", percent) }
	// Note 3: the limits of the dichromate count 2 CrO4 of the dihydrate.
	dichromate := tableIngredient(t, "sodium-dichromate-dihydrate", 5)
	dichromate.LimitShare = 2 * 115.99 / 298.00
	noDermalTox := withATE(withATE(exampleIngredient("Ingredient 4", 40, ""), Oral, 400), InhaledVapour, 4)
	unknown3 := exampleIngredient("Ingredient 3", 11, "")
	unknown3.UnknownFor = []string{"dermal", "inhalation"}
	acid := exampleIngredient("Ingredient 1", 4, "Skin Corr. 1 H314")
	acid.PH, acid.HasPH = 1.8, true
	return map[string]mixtureExample{
		"MX-01": {ingredients: []Ingredient{
			withATE(exampleIngredient("Ingredient 1", 16, ""), Oral, 1600),
			withATE(exampleIngredient("Ingredient 2", 4, ""), Oral, 200),
			withATE(exampleIngredient("Ingredient 3", 80, ""), Oral, 3450),
		}, options: MixtureOptions{System: UNGHS}, classes: []string{"Acute Tox. 4 H302"}, reason: "Acute Tox. 4 oral"},
		"MX-02": {ingredients: []Ingredient{
			withATE(exampleIngredient("Ingredient 1", 26, ""), InhaledVapour, 11),
			withATE(exampleIngredient("Ingredient 2", 23, ""), InhaledVapour, 19),
			unknown3, noDermalTox,
		}, classes: []string{"Acute Tox. 3 H331"}, reason: "Acute Tox. 3 inhalation vapour",
			note: "11 % of the mixture consists of ingredients of unknown acute toxicity (inhalation"},
		"MX-03": {ingredients: []Ingredient{acid, exampleIngredient("Ingredient 2", 5, "Skin Irrit. 2 H315"),
			exampleIngredient("Ingredient 3", 5, "Skin Irrit. 3 H316"), {Name: "Ingredient 4", Fraction: 0.86}},
			options: MixtureOptions{PH: 4, HasPH: true}, classes: []string{"Skin Corr. 1 H314"}},
		"MX-04": {ingredients: []Ingredient{exampleIngredient("anionic surfactant", 9.2, ""),
			exampleIngredient("thickening agent", 0.8, "Skin Irrit. 2 H315"), water(90)}, not: []string{"Skin"}},
		"MX-06": {ingredients: []Ingredient{
			withATE(exampleIngredient("Component 1", 16, ""), Oral, 1600),
			exampleIngredient("Component 2", 4, "Acute Tox. 4 H302"),
			withATE(exampleIngredient("Component 3", 80, ""), Oral, 1050),
		}, classes: []string{"Acute Tox. 4 H302"}, reason: "Acute Tox. 4 oral"},
		"MX-07": {ingredients: []Ingredient{exampleIngredient("A", 1.8, "Skin Irrit. 2 H315"),
			exampleIngredient("B", 0.5, "Skin Corr. 1B H314"), exampleIngredient("C", 5.4, "Skin Irrit. 2 H315"),
			exampleIngredient("D", 4, ""), exampleIngredient("E", 2, "Skin Corr. 1A H314"), water(86.3)},
			classes: []string{"Skin Irrit. 2 H315"}, not: []string{"Skin Corr."}, reason: "Skin Irrit. 2"},
		"MX-08": {ingredients: []Ingredient{tableIngredient(t, "acetic-acid", 30), water(70)},
			classes: []string{"Skin Corr. 1B H314", "Eye Dam. 1 H318"}, statement: "H314"},
		"MX-09": {ingredients: []Ingredient{tableIngredient(t, "acetic-acid", 12), water(88)},
			classes: []string{"Skin Irrit. 2 H315", "Eye Irrit. 2 H319"}, not: []string{"Skin Corr.", "Eye Dam."}},
		"MX-10": {ingredients: []Ingredient{tableIngredient(t, "sulfuric-acid", 15), water(85)}, classes: []string{"Skin Corr. 1A H314"}},
		"MX-11": {ingredients: []Ingredient{tableIngredient(t, "hydrochloric-acid", 12), water(88)},
			classes: []string{"Skin Irrit. 2 H315", "Eye Irrit. 2 H319", "STOT SE 3 H335"}, not: []string{"Skin Corr.", "Eye Dam."}},
		"MX-12": {ingredients: []Ingredient{tableIngredient(t, "sodium-hydroxide", 1), water(99)},
			classes: []string{"Skin Irrit. 2 H315", "Eye Irrit. 2 H319"}, not: []string{"Skin Corr."}},
		"MX-13": {ingredients: []Ingredient{dichromate, tableIngredient(t, "sulfuric-acid", 12), water(83)},
			classes: []string{"Acute Tox. 4 H302", "Acute Tox. 3 H331", "Skin Corr. 1B H314", "Eye Dam. 1 H318", "Resp. Sens. 1 H334",
				"Skin Sens. 1 H317", "Carc. 1B H350", "Muta. 1B H340", "Repr. 1B H360FD", "STOT RE 2 H373", "Aquatic Chronic 2 H411"},
			not:    []string{"STOT SE", "Aquatic Acute", "STOT RE 1", "Acute Tox. 4 H312"},
			reason: "Skin Corr. 1B", note: "no M-factor on record"},
		"MX-14": {ingredients: []Ingredient{tableIngredient(t, "hexane", 8), tableIngredient(t, "ethyl-acetate", 92)},
			classes: []string{"Repr. 2 H361f", "STOT RE 2 H373", "STOT SE 3 H336", "Eye Irrit. 2 H319", "Aquatic Chronic 3 H412"},
			not:     []string{"Skin Irrit.", "Asp. Tox."}, reason: "Aquatic Chronic 3", note: "a flash point or other test is needed"},
		"MX-15": {ingredients: []Ingredient{tableIngredient(t, "sodium-hypochlorite-solution", 3), water(97)},
			classes: []string{"Skin Irrit. 2 H315", "Eye Dam. 1 H318", "Aquatic Acute 1 H400", "Aquatic Chronic 2 H411"},
			not:     []string{"Skin Corr."}, reason: "Aquatic Acute 1"},
		"MX-16": {ingredients: []Ingredient{exampleIngredient("X", 3, "Skin Corr. 1B H314"), exampleIngredient("Y", 4, "Skin Irrit. 2 H315"),
			exampleIngredient("rest", 93, "")}, classes: []string{"Skin Irrit. 2 H315", "Eye Dam. 1 H318"},
			not: []string{"Skin Corr."}, reason: "Skin Irrit. 2"},
		"MX-17": {ingredients: []Ingredient{exampleIngredient("X", 0.99, "Skin Sens. 1 H317"), exampleIngredient("rest", 99.01, "")},
			not: []string{"Skin Sens."}, statement: "EUH208"},
		"MX-18": {ingredients: []Ingredient{exampleIngredient("X", 0.29, "Repr. 1B H360"), exampleIngredient("Y", 0.29, "Repr. 1B H360"),
			exampleIngredient("rest", 99.42, "")}, not: []string{"Repr."}},
	}
}

func exampleRows(t *testing.T) []map[string]string {
	t.Helper()
	f, err := os.Open("../testdata/mixture_examples.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var rows []map[string]string
	for _, rec := range records[1:] {
		row := map[string]string{}
		for i, column := range records[0] {
			row[column] = rec[i]
		}
		rows = append(rows, row)
	}
	return rows
}

func TestClassifyMixtureExamples(t *testing.T) {
	examples := mixtureExamples(t)
	for _, row := range exampleRows(t) {
		id := row["example_id"]
		if id == "MX-05" {
			continue // air concentrations: TestExposureSum
		}
		t.Run(id, func(t *testing.T) {
			ex, ok := examples[id]
			if !ok {
				t.Fatalf("row %s of %s isn't tried", id, row["source"])
			}
			got, err := ClassifyMixtureWith(ex.ingredients, ex.options)
			if err != nil {
				t.Fatal(err)
			}
			checkClasses(t, got, ex)
			checkValue(t, got, ex, row)
		})
	}
}

func checkClasses(t *testing.T, got Classification, ex mixtureExample) {
	t.Helper()
	for _, c := range ex.classes {
		if !slices.Contains(got.Classes, c) {
			t.Errorf("classes %v lack %s", got.Classes, c)
		}
	}
	for _, c := range got.Classes {
		for _, not := range ex.not {
			if strings.HasPrefix(c, not) {
				t.Errorf("classes %v hold %s", got.Classes, c)
			}
		}
	}
	if ex.statement != "" && !slices.ContainsFunc(got.Statements, func(s string) bool { return strings.HasPrefix(s, ex.statement) }) {
		t.Errorf("statements %q lack %s", got.Statements, ex.statement)
	}
	if ex.note != "" && !slices.ContainsFunc(got.Notes, func(s string) bool { return strings.Contains(s, ex.note) }) {
		t.Errorf("notes %q lack %q", got.Notes, ex.note)
	}
}

func checkValue(t *testing.T, got Classification, ex mixtureExample, row map[string]string) {
	t.Helper()
	if row["expected_value"] == "" {
		return
	}
	want, err := strconv.ParseFloat(row["expected_value"], 64)
	tolerance, err2 := strconv.ParseFloat(row["tolerance"], 64)
	if err != nil || err2 != nil {
		t.Fatalf("row %v: value or tolerance is no number", row)
	}
	for _, r := range got.Reasons {
		if r.Class == ex.reason {
			if math.Abs(r.Value-want) > tolerance {
				t.Errorf("%s = %g %s, want %g ± %g (%s)", r.Class, r.Value, r.Unit, want, tolerance, row["source"])
			}
			return
		}
	}
	t.Errorf("reasons %+v lack %q", got.Reasons, ex.reason)
}

// MX-05 of the examples: 29 CFR 1910.1000(d)(2)(ii).
func TestExposureSum(t *testing.T) {
	got, err := ExposureSum([]AirContaminant{{"B", 500, 1000}, {"C", 45, 200}, {"D", 40, 200}})
	if err != nil || math.Abs(got-0.925) > 0.0005 {
		t.Errorf("ExposureSum = %g, %v, want 0.925", got, err)
	}
	if _, err := ExposureSum([]AirContaminant{{"B", 1, 0}}); err == nil {
		t.Error("a contaminant without a limit: no error")
	}
}

func TestClassifyMixtureLabel(t *testing.T) {
	got, err := ClassifyMixture(mixtureExamples(t)["MX-13"].ingredients)
	if err != nil {
		t.Fatal(err)
	}
	// CLP Art. 26: skull leaves the exclamation mark out; H314 covers H318.
	if want := []string{"GHS05", "GHS06", "GHS08", "GHS09"}; !slices.Equal(got.Pictograms, want) {
		t.Errorf("pictograms %v, want %v", got.Pictograms, want)
	}
	if got.Signal != "Danger" {
		t.Errorf("signal word %q, want Danger", got.Signal)
	}
	for _, s := range got.Statements {
		if strings.HasPrefix(s, "H318") {
			t.Errorf("statements %q repeat eye damage", got.Statements)
		}
	}
}

func TestClassifyMixtureUnknownIsNotHarmless(t *testing.T) {
	got, err := ClassifyMixture([]Ingredient{{Name: "mystery", Fraction: 0.3}, tableIngredient(t, "water", 70)})
	if err != nil {
		t.Fatal(err)
	}
	if math.Abs(float64(got.Unknown)-0.3) > 1e-12 || !slices.ContainsFunc(got.Notes, func(s string) bool { return strings.Contains(s, "mystery") }) {
		t.Errorf("unknown %v, notes %q: want 0.3 and the ingredient named", got.Unknown, got.Notes)
	}
}

func TestClassifyMixtureBadInput(t *testing.T) {
	for name, in := range map[string][]Ingredient{
		"none":     nil,
		"negative": {{Name: "a", Fraction: -0.1}},
		"nan":      {{Name: "a", Fraction: Fraction(math.NaN())}},
		"over":     {{Name: "a", Fraction: 0.7}, {Name: "b", Fraction: 0.7}},
	} {
		if _, err := ClassifyMixture(in); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}

// Every classification and specific limit of the embedded table can be read,
// and every class but the gases under pressure has its label elements.
func TestHazardTableReads(t *testing.T) {
	for _, r := range readTable("substance_hazards.csv") {
		if r.text("classification") == "" {
			continue
		}
		for item := range strings.SplitSeq(r.text("classification"), "; ") {
			c, ok := ParseHazardClass(item)
			if !ok {
				t.Errorf("%s: %q can't be read", r.text("id"), item)
				continue
			}
			if _, ok := LabelElementsOf(c); !ok {
				t.Errorf("%s: no label elements for %v", r.text("id"), c)
			}
			if _, ok := Statement(c.Code); !ok {
				t.Errorf("%s: no words for %s", r.text("id"), c.Code)
			}
		}
		if _, _, bad := parseSpecificLimits(r.text("scl")); len(bad) > 0 {
			t.Errorf("%s: limits %q can't be read", r.text("id"), bad)
		}
	}
}

// The signal words and pictograms of the embedded table are those that Annex VI
// of CLP prints; LabelOf derives them from the classes.
func TestLabelOfTable(t *testing.T) {
	for _, r := range readTable("substance_hazards.csv") {
		var classes []HazardClass
		for item := range strings.SplitSeq(r.text("classification"), "; ") {
			if c, ok := ParseHazardClass(item); ok {
				classes = append(classes, c)
			}
		}
		want := strings.FieldsFunc(r.text("pictograms"), func(r rune) bool { return r == ';' || r == ' ' })
		slices.Sort(want)
		got := LabelOf(classes)
		if got.Signal != r.text("signal_word") || !slices.Equal(got.Pictograms, want) {
			t.Errorf("%s: %s %v, table has %s %v", r.text("id"), got.Signal, got.Pictograms, r.text("signal_word"), want)
		}
	}
}

// What is all but pure has the physical hazards of its substance: acetic acid
// is Flam. Liq. 3 H226 in CLP Annex VI (607-002-00-6), its solution isn't
// called so without a test.
func TestPureSubstanceKeepsPhysicalHazards(t *testing.T) {
	acid, _ := LookupSubstance("acetic acid")
	water, _ := LookupSubstance("water")
	for _, tt := range []struct {
		share Fraction
		want  bool
	}{{1, true}, {0.995, true}, {0.5, false}} {
		got, err := ClassifyMixture([]Ingredient{IngredientOf("acetic acid", acid, tt.share), IngredientOf("water", water, 1-tt.share)})
		if err != nil {
			t.Fatal(err)
		}
		if has := slices.Contains(got.Classes, "Flam. Liq. 3 H226"); has != tt.want {
			t.Errorf("acetic acid at %g %%: classes %v, want flammable: %v", tt.share.Percent(), got.Classes, tt.want)
		}
	}
}

package inventory

import (
	"fmt"
	"strings"

	"stillroom/chem"
)

// Field is what a column of a stock list can be about.
type Field string

// The fields.
const (
	FieldName     Field = "name"
	FieldCAS      Field = "CAS number"
	FieldFormula  Field = "formula"
	FieldStrength Field = "strength"
	FieldGrade    Field = "grade"
	FieldAdditive Field = "additive"
	FieldSize     Field = "size"
	FieldContent  Field = "content"
	FieldUnit     Field = "unit"
	FieldCount    Field = "number of bottles"
	FieldMark     Field = "own number"
	FieldLot      Field = "lot"
	FieldSupplier Field = "supplier"
	FieldPlace    Field = "place"
	FieldStore    Field = "store"
	FieldRoom     Field = "room"
	FieldCabinet  Field = "cabinet"
	FieldShelf    Field = "shelf"
	FieldReceived Field = "received"
	FieldOpened   Field = "opened"
	FieldExpiry   Field = "expiry"
	FieldNote     Field = "note"
)

// Fields lists all of them in the order of a form.
var Fields = []Field{FieldName, FieldCAS, FieldFormula, FieldStrength, FieldGrade, FieldAdditive, FieldSize, FieldContent,
	FieldUnit, FieldCount, FieldMark, FieldLot, FieldSupplier, FieldPlace, FieldStore, FieldRoom, FieldCabinet, FieldShelf,
	FieldReceived, FieldOpened, FieldExpiry, FieldNote}

// headings are what people write over their columns, in small letters without
// units, the surest first. A heading means the first field that lists it.
var headings = map[Field][]string{
	FieldName:     {"name", "substance", "chemical", "chemical name", "substance name", "product name", "compound", "reagent", "item name", "description", "product", "material", "item", "name of chemical", "name of substance", "bezeichnung", "stoff", "nom"},
	FieldCAS:      {"cas", "cas number", "cas no", "cas no.", "cas nr", "cas-nr", "cas-nr.", "cas#", "cas #", "cas-no", "cas-no.", "cas rn", "casrn", "cas registry number"},
	FieldFormula:  {"formula", "molecular formula", "chemical formula", "summenformel"},
	FieldStrength: {"strength", "purity", "assay", "concentration", "conc", "conc.", "content %", "purity %", "reinheit", "w/w"},
	FieldGrade:    {"grade", "quality", "qualität"},
	FieldAdditive: {"additive", "stabiliser", "stabilizer", "inhibitor", "stabilised with", "stabilized with"},
	FieldContent:  {"content", "remaining", "left", "current amount", "amount left", "remaining amount", "amount remaining", "quantity left", "remaining quantity", "fill", "fill level", "level", "in bottle", "rest", "current quantity"},
	FieldSize:     {"size", "pack size", "bottle size", "container size", "package size", "pack", "volume", "mass", "weight", "amount", "quantity", "qty", "qty.", "capacity", "gebindegröße", "menge", "quantité"},
	FieldUnit:     {"unit", "units", "uom", "einheit", "unité"},
	FieldCount:    {"number of bottles", "bottles", "no. of bottles", "containers", "no. of containers", "number of containers", "count", "number", "packs", "anzahl", "pieces"},
	FieldMark:     {"own number", "code", "barcode", "bar code", "bottle code", "bottle id", "container id", "inventory number", "inventory no", "inventory no.", "inv. no.", "id", "label", "bottle no", "bottle no.", "bottle number", "inventarnummer"},
	FieldLot:      {"lot", "lot number", "lot no", "lot no.", "batch", "batch number", "batch no", "batch no.", "charge", "lot/batch"},
	FieldSupplier: {"supplier", "vendor", "manufacturer", "maker", "source", "brand", "lieferant", "hersteller", "fournisseur"},
	FieldPlace:    {"place", "location", "storage location", "storage place", "stored in", "where", "position", "lagerort", "standort", "emplacement"},
	FieldStore:    {"store", "storeroom", "store room", "laboratory", "lab", "building", "site"},
	FieldRoom:     {"room", "raum", "salle"},
	FieldCabinet:  {"cabinet", "cupboard", "fridge", "refrigerator", "schrank"},
	FieldShelf:    {"shelf", "drawer", "tray", "box", "regal", "fach"},
	FieldReceived: {"received", "date received", "receipt date", "delivered", "delivery date", "arrival", "purchase date", "bought", "received on", "eingang"},
	FieldOpened:   {"opened", "date opened", "opening date", "opened on", "first opened", "geöffnet"},
	FieldExpiry:   {"expiry", "expires", "expiry date", "exp", "exp.", "exp date", "exp. date", "expiration", "expiration date", "best before", "use by", "use before", "shelf life", "haltbar bis"},
	FieldNote:     {"note", "notes", "remark", "remarks", "comment", "comments", "bemerkung", "bemerkungen"},
}

// Mapping says which column of a table holds which field.
type Mapping struct {
	// Columns are indexes into the table's header.
	Columns map[Field]int
	// Units are those in the headings, for cells that are bare numbers.
	Units map[Field]string
	// DayFirst answers the question in which order day and month stand in dates
	// such as 03/04/2026: "day" or "month"; "" for not answered.
	DayFirst string
	// Unused are the headings that no field was found for.
	Unused []string
	// Questions are what somebody has to answer before all rows can be taken.
	Questions []string
}

// Match finds out what the columns of a table are about, by their headings and
// for registry numbers by their cells. What it can't tell it asks in Questions.
func Match(t Table) Mapping {
	m := Mapping{Columns: map[Field]int{}, Units: map[Field]string{}}
	rank := map[Field]int{}
	for i, heading := range t.Header {
		words, unit := splitHeading(heading)
		field, place, ok := fieldOf(words)
		if !ok && mostlyCAS(t, i) {
			field, place, ok = FieldCAS, 99, true
		}
		if ok {
			if old, taken := rank[field]; taken && old <= place {
				ok = false
			}
		}
		if !ok {
			continue
		}
		m.Columns[field], rank[field] = i, place
		delete(m.Units, field)
		if unit != "" {
			m.Units[field] = unit
		}
	}
	m.settleAmounts()
	m.Unused = unusedHeadings(t, m)
	m.ask(t)
	return m
}

// settleAmounts: where there is only one amount, it is the size.
func (m *Mapping) settleAmounts() {
	_, size := m.Columns[FieldSize]
	content, has := m.Columns[FieldContent]
	if has && !size {
		m.Columns[FieldSize] = content
		m.Units[FieldSize] = m.Units[FieldContent]
		delete(m.Columns, FieldContent)
	}
}

func unusedHeadings(t Table, m Mapping) (unused []string) {
	used := map[int]bool{}
	for _, i := range m.Columns {
		used[i] = true
	}
	for i, heading := range t.Header {
		if !used[i] && strings.TrimSpace(heading) != "" {
			unused = append(unused, heading)
		}
	}
	return unused
}

func (m *Mapping) ask(t Table) {
	_, name := m.Columns[FieldName]
	_, cas := m.Columns[FieldCAS]
	if !name && !cas {
		m.Questions = append(m.Questions, "which column holds the names or the CAS numbers?")
	}
	if _, ok := m.Columns[FieldSize]; !ok {
		m.Questions = append(m.Questions, "which column holds the amounts?")
	}
	if m.DayFirst != "" {
		return
	}
	for _, field := range []Field{FieldReceived, FieldOpened, FieldExpiry} {
		i, ok := m.Columns[field]
		if !ok {
			continue
		}
		order, example := orderOfDates(t, i)
		if order == "" && example != "" {
			m.Questions = append(m.Questions, fmt.Sprintf("in the column %q, is %s day first or month first?", t.Header[i], example))
		}
	}
}

// splitHeading parts "Amount (mL)", "Amount [mL]", "Amount / mL" and "Amount in
// mL" into words and unit.
func splitHeading(heading string) (words, unit string) {
	words = strings.Join(strings.Fields(strings.ToLower(strings.ReplaceAll(heading, "_", " "))), " ")
	original := strings.Join(strings.Fields(strings.ReplaceAll(heading, "_", " ")), " ")
	for _, marks := range [][2]string{{"(", ")"}, {"[", "]"}, {" / ", ""}, {"/", ""}, {" in ", ""}, {", ", ""}} {
		at := strings.Index(words, marks[0])
		if at < 0 || len(words) != len(original) {
			continue
		}
		inner := strings.TrimSpace(strings.TrimSuffix(strings.TrimSpace(original[at+len(marks[0]):]), marks[1]))
		if unitKind(inner) != "" || inner == "%" {
			return strings.TrimSpace(words[:at]), inner
		}
	}
	return strings.TrimRight(words, " :*"), ""
}

func fieldOf(words string) (field Field, place int, ok bool) {
	for _, f := range Fields {
		for i, known := range headings[f] {
			if known == words {
				return f, i, true
			}
		}
	}
	return "", 0, false
}

func knownHeadings(row []string) (n int) {
	for _, cell := range row {
		words, _ := splitHeading(cell)
		if _, _, ok := fieldOf(words); ok {
			n++
		}
	}
	return n
}

func mostlyCAS(t Table, column int) bool {
	seen, good := 0, 0
	for _, row := range t.Rows[:min(50, len(t.Rows))] {
		if column < len(row) && strings.TrimSpace(row[column]) != "" {
			seen++
			if ValidCAS(strings.TrimSpace(row[column])) {
				good++
			}
		}
	}
	return seen > 0 && 2*good > seen
}

// unitKind says what a unit measures: "mass", "volume", "count" or "".
func unitKind(unit string) Measure {
	unit = tidyUnit(unit)
	if _, err := chem.ParseMass("1 " + unit); err == nil {
		return ByMass
	}
	if _, err := chem.ParseVolume("1 " + unit); err == nil {
		return ByVolume
	}
	if pieceWords[strings.ToLower(unit)] {
		return ByCount
	}
	return ""
}

var pieceWords = map[string]bool{"pcs": true, "pcs.": true, "pc": true, "piece": true, "pieces": true, "st": true,
	"stk": true, "stück": true, "ea": true, "each": true, "sheets": true, "strips": true, "papers": true}

// tidyUnit mends the capitals people put into units, where only one reading is
// left.
func tidyUnit(unit string) string {
	switch unit = strings.TrimSpace(unit); unit {
	case "Kg", "KG", "kG", "kgs", "Kgs":
		return "kg"
	case "G", "gm", "Gm", "grams", "gram", "Gramm":
		return "g"
	case "ML", "Ml", "mls", "cc":
		return "mL"
	case "Ltr", "ltr", "LTR", "liter", "litre", "litres", "liters", "Liter", "Lt", "lt":
		return "L"
	}
	return unit
}

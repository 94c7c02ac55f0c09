package chem

import (
	"strconv"
	"strings"
	"sync"
)

// PurchaseNote is a rule that may bear on buying or holding a substance. It is
// a flag to look the law up, not the law.
type PurchaseNote struct {
	Jurisdiction string // "EU", "UK", "US"
	Instrument   string
	Entry        string
	Threshold    string // with its unit; "any" where there is none
	Meaning      string
	Note         string
	Defer        string // "defer to local law"
	Source       string
}

// PurchaseNotes returns the rules on record for a substance by name at a mass
// fraction; 0 for a strength that is not known, which no threshold lets pass.
// No rule on record doesn't mean that there is none.
func PurchaseNotes(name string, w Fraction) []PurchaseNote {
	var notes []PurchaseNote
	r := Reactant{Name: name}
	for _, row := range purchaseRows() {
		if !row.speaksOf(r, w) {
			continue
		}
		notes = append(notes, row.note)
	}
	return notes
}

type purchaseRow struct {
	key   string  // of the substance, or "anycr6"
	above float64 // mass per cent from above which it holds; 0 for always
	note  PurchaseNote
}

func (row purchaseRow) speaksOf(r Reactant, w Fraction) bool {
	key := substanceKey(r.Name)
	switch {
	case row.key == "anycr6":
		return isChromateVI(r)
	case row.key == "nitricacidle70":
		return strings.HasPrefix(key, "nitricacid") && row.over(w) && w <= 0.70
	case row.key == "nitricacidgt70":
		return strings.HasPrefix(key, "nitricacid") && (w > 0.70 || w == 0)
	}
	return row.key == key && row.over(w)
}

func (row purchaseRow) over(w Fraction) bool {
	return row.above == 0 || w == 0 || w.Percent() > row.above
}

var purchaseRows = sync.OnceValue(func() []purchaseRow {
	var rows []purchaseRow
	for _, r := range readTable("regulated_precursors.csv") {
		row := purchaseRow{key: substanceKey(r.text("substance_id"))}
		unit := r.text("threshold_unit")
		if strings.HasPrefix(unit, "% w/w (above)") {
			row.above, _ = strconv.ParseFloat(r.text("threshold"), 64)
		}
		row.note = PurchaseNote{r.text("jurisdiction"), r.text("instrument"), r.text("list_entry"), strings.TrimSpace(r.text("threshold") + " " + unit),
			r.text("meaning_for_purchase"), r.text("other_note"), r.text("flag"), r.text("source")}
		rows = append(rows, row)
	}
	return rows
})

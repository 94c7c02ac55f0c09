package chem

import (
	"embed"
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"
)

// The tables behind two phases, drying, vapour and heat. Every row names its
// source in a column of its own.
//
//go:embed data/partition.csv data/mutual_solubility.csv data/drying_agents.csv
//go:embed data/antoine.csv data/azeotropes.csv data/formation_enthalpy.csv
//go:embed data/relative_volatility.csv data/substances.csv
var phaseTables embed.FS

// A dataRow is one row of an embedded table by column name.
type dataRow map[string]string

// dataRows reads an embedded table. It panics on a table that doesn't parse,
// which only a broken build can bring about.
func dataRows(fs embed.FS, name string) []dataRow {
	f, err := fs.Open("data/" + name)
	if err != nil {
		panic(fmt.Sprintf("chem: embedded table %s: %v", name, err))
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		panic(fmt.Sprintf("chem: embedded table %s: %v", name, err))
	}
	rows := make([]dataRow, 0, len(records)-1)
	for _, record := range records[1:] {
		row := make(dataRow, len(record))
		for i, cell := range record {
			row[records[0][i]] = strings.TrimSpace(cell)
		}
		rows = append(rows, row)
	}
	return rows
}

// number returns a column as a number; false where it is blank. It panics on
// text that is no number, as dataRows does.
func (r dataRow) number(column string) (float64, bool) {
	text := r[column]
	if text == "" {
		return 0, false
	}
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		panic(fmt.Sprintf("chem: embedded table, column %s: %v", column, err))
	}
	return x, true
}

// must returns a column that the table never leaves blank.
func (r dataRow) must(column string) float64 {
	x, ok := r.number(column)
	if !ok {
		panic(fmt.Sprintf("chem: embedded table, column %s is blank", column))
	}
	return x
}

// list splits a cell at semicolons.
func (r dataRow) list(column string) []string {
	var items []string
	for item := range strings.SplitSeq(r[column], ";") {
		if item = strings.TrimSpace(item); item != "" {
			items = append(items, item)
		}
	}
	return items
}

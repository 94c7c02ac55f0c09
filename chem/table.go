package chem

import (
	"embed"
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"
)

// tables holds the embedded reference tables, one source in every row.
//
//go:embed data/*.csv
var tables embed.FS

// row is one line of an embedded table, by column name.
type row struct {
	columns map[string]int
	fields  []string
}

// text returns the field of a column. It panics if the table has no such
// column, which is a mistake in the program and not in the data.
func (r row) text(column string) string {
	i, ok := r.columns[column]
	if !ok {
		panic("chem: no column " + column)
	}
	return r.fields[i]
}

// number returns the field as a number; false where it is blank or none.
func (r row) number(column string) (float64, bool) {
	x, err := strconv.ParseFloat(strings.TrimSpace(r.text(column)), 64)
	return x, err == nil
}

// list splits a field whose items are separated by "; ".
func (r row) list(column string) []string {
	var items []string
	for item := range strings.SplitSeq(r.text(column), ";") {
		if item = strings.TrimSpace(item); item != "" {
			items = append(items, item)
		}
	}
	return items
}

// readTable reads an embedded table of data/. It panics on a malformed table:
// the tables are part of the program and every one is read by a test.
func readTable(name string) []row {
	file, err := tables.Open("data/" + name)
	if err != nil {
		panic(fmt.Sprintf("chem: table %s: %v", name, err))
	}
	defer file.Close()
	records, err := csv.NewReader(file).ReadAll()
	if err != nil {
		panic(fmt.Sprintf("chem: table %s: %v", name, err))
	}
	columns := make(map[string]int, len(records[0]))
	for i, column := range records[0] {
		columns[column] = i
	}
	rows := make([]row, 0, len(records)-1)
	for _, fields := range records[1:] {
		rows = append(rows, row{columns, fields})
	}
	return rows
}

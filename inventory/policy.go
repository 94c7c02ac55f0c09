package inventory

import (
	"cmp"
	"slices"
)

// Policy is the dated, editable table of limits, fractions, intervals and
// priors, by key. Code holds none of these numbers itself; PolicyDefaults is
// what a new store starts with.
type Policy map[string]PolicyRow

// Value returns the value of a key, and whether the table has it.
func (p Policy) Value(key string) (float64, bool) {
	row, ok := p[key]
	return row.Value, ok
}

// Rows returns the rows in order of key.
func (p Policy) Rows() []PolicyRow {
	rows := make([]PolicyRow, 0, len(p))
	for _, row := range p {
		rows = append(rows, row)
	}
	slices.SortFunc(rows, func(a, b PolicyRow) int { return cmp.Compare(a.Key, b.Key) })
	return rows
}

// PolicyOf makes a Policy of rows; a later row of the same key wins.
func PolicyOf(rows []PolicyRow) Policy {
	p := make(Policy, len(rows))
	for _, row := range rows {
		p[row.Key] = row
	}
	return p
}

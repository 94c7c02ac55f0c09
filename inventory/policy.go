package inventory

// Policy is the dated, editable table of limits, fractions, intervals and
// priors. Code holds none of these numbers itself.
type Policy map[string]PolicyRow

// Value returns the value of a key, and whether the table has it.
func (p Policy) Value(key string) (float64, bool) {
	row, ok := p[key]
	return row.Value, ok
}

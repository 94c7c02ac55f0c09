package chem

// must returns a field that the table never leaves blank. It panics where it
// is, which a test that reads every table finds.
func (r row) must(column string) float64 {
	x, ok := r.number(column)
	if !ok {
		panic("chem: no number in column " + column)
	}
	return x
}

// withMore reads a reference table and, behind it, the rows that were added to
// it from memory or from further sources, so that the better rows come first.
func withMore(name string) []row {
	return append(readTable(name+".csv"), readTable(name+"_more.csv")...)
}

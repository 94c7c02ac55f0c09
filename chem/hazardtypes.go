package chem

// Incompatibility is a pair of things that must not meet.
type Incompatibility struct {
	A, B string // names of the substances
	// GroupA and GroupB are the reactivity groups that clash.
	GroupA, GroupB string
	Codes          []string // consequence codes of the chart, such as "H", "GT"
	Consequences   string   // in words
	Note           string
	Source         string
}

package planner

// Severity says what a finding does to a plan.
type Severity int

// The severities: a note informs, a warning asks for a decision, a refusal
// means that there is no plan.
const (
	Note Severity = iota
	Warning
	Refusal
)

// Finding is something the plan has to say that is no number: a vessel that
// doesn't fit, a scale beyond what is proven, an unsuitable drying agent.
type Finding struct {
	Kind     string // "scale-beyond-proven", "no-vessel-fits", …
	Severity Severity
	Step     int // 0 for the whole run
	Text     string
	Would    string // what would do instead
}

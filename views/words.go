package views

import (
	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// severityWord names a severity for the style sheet.
func severityWord(s planner.Severity) string {
	switch s {
	case planner.Warning:
		return "warning"
	case planner.Refusal:
		return "refusal"
	}
	return "note"
}

// pairText says which two must never meet and what would come of it.
func pairText(p chem.Incompatibility) string {
	text := p.A + " and " + p.B
	if p.Consequences != "" {
		text += ": " + p.Consequences
	}
	if p.Note != "" {
		text += " (" + p.Note + ")"
	}
	return text
}

// packSize writes the size of an offered pack.
func packSize(o inventory.Offer, f inventory.StockForm) string {
	return storedPlain(o.PackSize, f.Measure)
}

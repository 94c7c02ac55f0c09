package views

import (
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

// packSize writes the size of an offered pack.
func packSize(o inventory.Offer, f inventory.StockForm) string {
	return storedPlain(o.PackSize, f.Measure)
}

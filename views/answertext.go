package views

import (
	"fmt"
	"io"
	"text/tabwriter"

	"stillroom/planner/reckoner"
)

// WriteAnswerText writes the answer of a bench sum for a terminal, with the
// formula the numbers were put into and where the method comes from.
func WriteAnswerText(out io.Writer, a reckoner.Answer) error {
	w := tabwriter.NewWriter(out, 0, 0, 2, ' ', 0)
	for _, r := range a.Results {
		value := r.Text
		if !r.IsText {
			value = trimmed(r.Value, 5)
		}
		fmt.Fprintf(w, "%s\t%s\n", r.Name, joined(value, r.Unit))
	}
	for _, line := range []struct{ label, text string }{
		{"by", a.Derivation.Formula},
		{"with", a.Derivation.Inserted},
		{"holds for", a.Derivation.Range},
		{"source", a.Derivation.Source},
	} {
		if line.text != "" {
			fmt.Fprintf(w, "%s\t%s\n", line.label, line.text)
		}
	}
	for _, note := range a.Notes {
		fmt.Fprintf(w, "note\t%s\n", note)
	}
	return w.Flush()
}

// joined puts a unit behind a number that has one.
func joined(value, unit string) string {
	if unit == "" {
		return value
	}
	return with(value, unit)
}

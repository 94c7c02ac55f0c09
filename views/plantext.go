package views

import (
	"fmt"
	"io"
	"strings"
	"text/tabwriter"

	"stillroom/planner"
)

// WritePlanText writes a plan for a terminal: the verdict, the needs with their
// draws, what is short and what to buy, the steps, and where the waste goes.
func WritePlanText(out io.Writer, p *planner.Plan) error {
	w := tabwriter.NewWriter(out, 0, 0, 2, ' ', 0)
	fmt.Fprintf(w, "%s %s by %s on %s\n", massPlain(p.Target.Mass), p.Target.Substance, p.Recipe.Name, p.On.Long())
	fmt.Fprintf(w, "%s. %s\n", capital(p.Verdict.String()), p.Sentence)
	writeNeeds(w, p.Needs)
	writeBuying(w, p.Buy)
	writeSteps(w, p.Steps)
	writeWaste(w, p.Waste)
	writeFindings(w, p.Findings)
	fmt.Fprintf(w, "\nplan %s. It defers to local rules and a competent person's judgement; what has no data isn't harmless.\n", p.Revision)
	return w.Flush()
}

func capital(s string) string {
	if s == "" {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}

func writeNeeds(w io.Writer, needs []planner.Need) {
	fmt.Fprint(w, "\nneeds\n  state\tsubstance\tpure\tdrawn from\n")
	for _, n := range needs {
		var from []string
		for _, d := range n.Draws {
			from = append(from, d.Bottle.Code+" "+drawnText(d))
		}
		if lack := lackText(n); lack != "" {
			from = append(from, lack)
		}
		fmt.Fprintf(w, "  %s\t%s\t%s\t%s\n", n.State.String(), n.Substance, neededText(n), strings.Join(from, ", "))
	}
}

func writeBuying(w io.Writer, buy []planner.Purchase) {
	if len(buy) == 0 {
		return
	}
	fmt.Fprint(w, "\nto buy\n  form\tpacks\tcost\torder by\n")
	for _, b := range buy {
		fmt.Fprintf(w, "  %s\t%d × %s\t%s\t%s\n", b.Form.Name, b.Packs, packSize(b.Offer, b.Form), moneyText(b.Cost, b.Currency), b.OrderBy.Short())
	}
}

func writeSteps(w io.Writer, steps []planner.StepReport) {
	fmt.Fprint(w, "\nsteps\n")
	for _, s := range steps {
		fmt.Fprintf(w, "  %d\t%s\t%s\t%s\n", s.N, s.Do, s.Name, strings.Join(s.Says, "; "))
	}
}

func writeWaste(w io.Writer, lots []planner.WasteLot) {
	if len(lots) == 0 {
		return
	}
	fmt.Fprint(w, "\nwaste\n")
	for _, l := range lots {
		into := "no carboy takes it"
		if l.Fits {
			into = "carboy " + l.Carboy
		}
		fmt.Fprintf(w, "  %s\t%s\t%s\t%s\n", l.Stream, massText(l.Mass), into, l.Note)
	}
}

func writeFindings(w io.Writer, findings []planner.Finding) {
	if len(findings) == 0 {
		return
	}
	fmt.Fprint(w, "\nto know\n")
	for _, f := range findings {
		text := f.Text
		if f.Would != "" {
			text += "; " + f.Would
		}
		fmt.Fprintf(w, "  %s\t%s\n", severityWord(f.Severity), text)
	}
}

package views

import (
	"net/http"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/planner"
)

// hazardRow is a substance in the summary of hazards on the page of a run: what
// is drawn from the shelf, and what is formed on the way. The statements are
// there by their codes; in full they stand on a page of their own.
type hazardRow struct {
	planner.HazardNote
	Codes string
}

// hazardRows picks what the summary shows out of all notes, each substance once.
func hazardRows(notes []planner.HazardNote) []hazardRow {
	var rows []hazardRow
	seen := map[string]bool{}
	for _, n := range notes {
		if n.At != "as stored" && !n.Formed || seen[n.What] {
			continue
		}
		seen[n.What] = true
		rows = append(rows, hazardRow{n, codesText(n)})
	}
	return rows
}

// codesText is the codes of a note; without any, what is known of it instead.
func codesText(n planner.HazardNote) string {
	switch {
	case len(n.Statements) > 0:
		return statementCodes(n.Statements)
	case strings.HasPrefix(n.Basis, "not classified"):
		return "not classified"
	case n.Basis == "", strings.HasPrefix(n.Basis, "no data"):
		return "no data"
	}
	return "no statement on record"
}

// statementCodes takes the codes off the statements: "H314 Causes severe skin
// burns …" gives H314, and combined ones such as "H300+H310" stay together.
func statementCodes(statements []string) string {
	codes := make([]string, len(statements))
	for i, s := range statements {
		codes[i], _, _ = strings.Cut(s, " ")
	}
	return strings.Join(codes, ", ")
}

// hazardsPage is every hazard noted for a run, step by step.
type hazardsPage struct {
	frame
	Run   *runPage
	Notes []planner.HazardNote
	Back  string
}

// showHazards answers /runs/:id/hazards.
func (s *Server) showHazards(c *gin.Context) error {
	run, err := s.plannedRun(c)
	if err != nil {
		return err
	}
	if len(run.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "run", run)
	}
	p := &hazardsPage{Run: run, Notes: run.Plan.Hazards, Back: runAddress(run.Run.ID) + string(run.Query())}
	p.Title, p.Section = "Hazards of run "+strconv.FormatInt(run.Run.ID, 10), "/slate"
	return s.render(c, http.StatusOK, "hazards", p)
}

package views

import (
	"net/http"
	"strconv"

	"github.com/gin-gonic/gin"
)

// chancePage is what the draws of the whole walk-through say of a run: every
// uncertain figure of the recipe and of the bottles drawn together, step by
// step, instead of each charge by itself. htmx takes its block "chance" into the
// page of the run.
type chancePage struct {
	frame
	Run   *runPage
	Words []string
	Back  string
}

// showChance answers /runs/:id/chance.
func (s *Server) showChance(c *gin.Context) error {
	shelf, run, recipe, err := s.findRun(c)
	if err != nil {
		return err
	}
	r := s.runPageFor(run, recipe)
	r.readQuery(c.Request.URL.Query(), s.Today())
	r.drawn = true
	if err := s.planRun(c.Request.Context(), r, shelf); err != nil {
		return err
	}
	if len(r.Faults) > 0 {
		return s.answerFaults(c, r)
	}
	p := &chancePage{Run: r, Words: riskWords(r.Plan.Risk), Back: runAddress(run.ID) + string(r.Query())}
	p.Title, p.Section = "Chance of run "+strconv.FormatInt(run.ID, 10), "/slate"
	return s.render(c, http.StatusOK, "chance", p)
}

package views

import (
	"errors"
	"net/http"
	"net/url"
	"strconv"
	"time"

	"github.com/gin-gonic/gin"

	"stillroom/planner"
)

// paperRoutes are the papers of a run by the names of their files.
var paperRoutes = map[string]func(*planner.Plan, PaperOptions) ([]byte, error){
	"pick-list.pdf":    PickList,
	"hazard-sheet.pdf": HazardSheet,
	"requisition.pdf":  Requisition,
}

// showPaper makes the handler of one paper. It prints what the address asks,
// like the page of the run; ?paper=letter takes the paper of North America.
func (s *Server) showPaper(file string) func(*gin.Context) error {
	return func(c *gin.Context) error {
		run, err := s.plannedRun(c)
		if err != nil {
			return err
		}
		if len(run.Faults) > 0 {
			return s.answerFaults(c, run)
		}
		o := PaperOptions{Letter: c.Query("paper") == "letter", RunURL: s.runURL(c.Request, run),
			RunName: "run " + strconv.FormatInt(run.Run.ID, 10), PrintedBy: run.Run.Owner, PrintedAt: s.Now().Truncate(time.Minute)}
		pdf, err := paperRoutes[file](run.Plan, o)
		if errors.Is(err, ErrNothingShort) {
			return &missing{"requisition", o.RunName, "Nothing is short, so that nothing has to be bought for it."}
		}
		if err != nil {
			return err
		}
		c.Header("Content-Disposition", `inline; filename="`+o.RunName+" "+file+`"`)
		c.Data(http.StatusOK, "application/pdf", pdf)
		return nil
	}
}

// runURL is the whole address of a run as somebody with the paper in hand
// reaches it: the configured one, or else the one the browser used.
func (s *Server) runURL(r *http.Request, run *runPage) string {
	return s.baseURL(r) + runAddress(run.Run.ID) + string(run.Query())
}

// baseURL is the address of the program as people reach it: the configured one,
// or else the one the browser used.
func (s *Server) baseURL(r *http.Request) string {
	if s.Address != "" {
		return s.Address
	}
	scheme := "http"
	if r.TLS != nil {
		scheme = "https"
	}
	return (&url.URL{Scheme: scheme, Host: r.Host}).String()
}

package views

import (
	"net/http"
	"time"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
)

// showLabel answers /shelf/bottles/:code/label.pdf with the bottle's label;
// ?paper=letter takes the paper of North America.
func (s *Server) showLabel(c *gin.Context) error {
	p, err := s.findBottle(c)
	if err != nil {
		return err
	}
	if p.Form.Measure == inventory.ByCount {
		return &missing{"label", p.Code, "It holds pieces, which need no hazard label."}
	}
	label := BottleLabel{Bottle: p.Bottle, Form: p.Form, Substance: p.Substance, Owner: p.Place.Store,
		URL: s.baseURL(c.Request) + "/shelf/bottles/" + p.Bottle.Code}
	pdf, err := BottleLabels([]BottleLabel{label}, PaperOptions{Letter: c.Query("paper") == "letter", PrintedAt: s.Now().Truncate(time.Minute)})
	if err != nil {
		return err
	}
	c.Header("Content-Disposition", `inline; filename="label `+p.Bottle.Code+`.pdf"`)
	c.Data(http.StatusOK, "application/pdf", pdf)
	return nil
}

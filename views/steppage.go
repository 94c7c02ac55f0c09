package views

import (
	"html/template"
	"net/http"
	"strconv"

	"github.com/gin-gonic/gin"

	"stillroom/planner"
)

// stepPage is one step of a run on a screen by itself, to be read at the hood:
// what goes in and from which bottle, what to keep to, what can hurt, and where
// one may stop.
type stepPage struct {
	frame
	Run     *runPage
	Step    stepRow
	Picture template.HTML
	Takes   []stepTake
	Hazards []planner.HazardNote
	Of      int
	Earlier string
	Later   string
	Back    string
}

// stepTake is what the step takes out of one bottle.
type stepTake struct {
	Substance, Code, Place, Amount string
}

// showStep answers /runs/:id/steps/:n.
func (s *Server) showStep(c *gin.Context) error {
	run, err := s.plannedRun(c)
	if err != nil {
		return err
	}
	if len(run.Faults) > 0 {
		return s.answerFaults(c, run)
	}
	n, err := strconv.Atoi(c.Param("n"))
	steps := run.Plan.Steps
	if err != nil || n < 1 || n > len(steps) {
		return &missing{"step", c.Param("n"), "The run has steps 1 to " + strconv.Itoa(len(steps)) + "."}
	}
	return s.render(c, http.StatusOK, "step", newStepPage(run, n))
}

func newStepPage(run *runPage, n int) *stepPage {
	step := run.Plan.Steps[n-1]
	at := func(n int) string {
		if n < 1 || n > len(run.Plan.Steps) {
			return ""
		}
		return runAddress(run.Run.ID) + "/steps/" + strconv.Itoa(n) + string(run.Query())
	}
	p := &stepPage{Run: run, Of: len(run.Plan.Steps), Earlier: at(n - 1), Later: at(n + 1),
		Back:    runAddress(run.Run.ID) + string(run.Query()) + "#step-" + strconv.Itoa(n),
		Step:    stepRows(run.Plan.Steps[n-1:n], nowhere)[0],
		Picture: drawVessel(wareProfile(step.Vessel.Kind), layersOf(step), float64(step.Vessel.Limit), 260, stepPicture(step)),
		Takes:   takesOf(run.Plan.Needs, step.N)}
	for _, h := range run.Plan.Hazards {
		if h.At == step.Name {
			p.Hazards = append(p.Hazards, h)
		}
	}
	p.Title, p.Section = "Step "+strconv.Itoa(step.N)+", "+step.Name, "/slate"
	return p
}

// takesOf lists what a step takes out of the bottles.
func takesOf(needs []planner.Need, step int) []stepTake {
	var takes []stepTake
	for _, n := range needs {
		for _, d := range n.Draws {
			for _, part := range d.Steps {
				if part.Step != step {
					continue
				}
				amount := massText(part.Mass)
				switch {
				case part.Pieces > 0:
					amount = piecesText(part.Pieces)
				case d.HasVolume && part.Volume > 0:
					amount = volumeText(part.Volume) + " or " + amount
				}
				takes = append(takes, stepTake{n.Substance, d.Bottle.Code, d.Place.String(), amount})
			}
		}
	}
	return takes
}

// nowhere is for steps that belong to no run.
func nowhere(string, int) string { return "" }

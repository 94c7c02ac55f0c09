package views

import (
	"fmt"
	"net/http"
	"slices"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/planner"
)

// explainPage shows how numbers of a run came about. htmx takes its block "why"
// as a note at the foot of the run page; by itself it is a page.
type explainPage struct {
	frame
	Heading     string
	Back        string
	Derivations []chem.Derivation
	Words       []string // what there is to say beside the formulas
}

// explain answers /runs/:id/explain/:what.
func (s *Server) explain(c *gin.Context) error {
	p, err := s.plannedRun(c)
	if err != nil {
		return err
	}
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "run", p)
	}
	why, ok := explanation(p.Plan, c.Param("what"))
	if !ok {
		return &missing{"explanation", c.Param("what"), "Open it from an amount on the page of the run."}
	}
	why.Title = "How " + why.Heading + " came about"
	why.Section = "/slate"
	why.Back = runAddress(p.Run.ID) + string(p.Query())
	return s.render(c, http.StatusOK, "explain", why)
}

// explanation finds what an address part such as "need-3", "draw-3-1", "step-4",
// "waste-2", "chance" or "scale" stands for.
func explanation(plan *planner.Plan, what string) (*explainPage, bool) {
	kind, rest, _ := strings.Cut(what, "-")
	first, second, _ := strings.Cut(rest, "-")
	i, _ := strconv.Atoi(first)
	j, _ := strconv.Atoi(second)
	switch kind {
	case "scale":
		return &explainPage{Heading: "the scale", Derivations: []chem.Derivation{plan.Scale.Derivation}}, true
	case "chance":
		return &explainPage{Heading: "the chance that everything suffices", Derivations: told(plan.Risk.Derivation)}, true
	case "waste":
		if i >= 1 && i <= len(plan.Waste) {
			lot := plan.Waste[i-1]
			return &explainPage{Heading: massText(lot.Mass) + " of " + lot.Stream, Derivations: told(lot.Derivation)}, true
		}
	case "need":
		if i >= 1 && i <= len(plan.Needs) {
			return explainNeed(plan.Needs[i-1], plan.Steps), true
		}
	case "draw":
		if i >= 1 && i <= len(plan.Needs) && j >= 1 && j <= len(plan.Needs[i-1].Draws) {
			return explainDraw(plan.Needs[i-1].Draws[j-1]), true
		}
	case "step":
		for _, s := range plan.Steps {
			if s.N == i {
				return explainStep(s), true
			}
		}
	}
	return nil, false
}

// explainNeed tells the sum of a need, then how each of its charges came about.
func explainNeed(n planner.Need, steps []planner.StepReport) *explainPage {
	p := &explainPage{Heading: neededText(n) + " " + n.Substance, Derivations: told(n.Derivation)}
	if n.Why != "" {
		p.Words = append(p.Words, sentence(n.Why))
	}
	if len(n.For) > 0 {
		p.Words = append(p.Words, "For "+strings.Join(n.For, ", ")+".")
	}
	if n.Because != "" {
		p.Words = append(p.Words, sentence(n.State.String()+": "+n.Because))
	}
	for _, s := range steps {
		for _, a := range s.Adds {
			if a.Substance == n.Substance && slices.Contains(n.For, s.Name) {
				p.Derivations = append(p.Derivations, told(a.Derivation)...)
			}
		}
	}
	for _, b := range n.Barred {
		p.Words = append(p.Words, "Not bottle "+b.Bottle.Code+": "+b.Why+".")
	}
	return p
}

func explainDraw(d planner.Draw) *explainPage {
	p := &explainPage{Heading: drawnText(d) + " from bottle " + d.Bottle.Code, Derivations: told(d.Derivation)}
	if d.Why != "" {
		p.Words = append(p.Words, sentence(d.Why))
	}
	for _, s := range d.Steps {
		amount := massText(s.Mass)
		if s.Pieces > 0 {
			amount = piecesText(s.Pieces)
		}
		p.Words = append(p.Words, fmt.Sprintf("Step %d: %s.", s.Step, amount))
	}
	return p
}

func explainStep(s planner.StepReport) *explainPage {
	p := &explainPage{Heading: fmt.Sprintf("step %d, %s,", s.N, s.Name), Derivations: s.Derivations}
	for _, a := range s.Adds {
		p.Derivations = append(p.Derivations, told(a.Derivation)...)
	}
	p.Words = append(p.Words, s.Cautions...)
	return p
}

// told leaves out a derivation that nothing was written into.
func told(d chem.Derivation) []chem.Derivation {
	if d.Formula == "" && d.Inserted == "" && len(d.Inputs) == 0 {
		return nil
	}
	return []chem.Derivation{d}
}

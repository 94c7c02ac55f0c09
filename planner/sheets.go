package planner

import (
	"errors"
	"fmt"
	"slices"
	"sync"

	"stillroom/chem"
)

// sheets is what the papers need beside the amounts: waste, hazards, pairs
// and carriers. It depends on the draws alone, so that it is worked out while
// the chances are drawn.
type sheets struct {
	wait     sync.WaitGroup
	waste    []WasteLot
	hazards  []HazardNote
	pairs    []chem.Incompatibility
	carriers []Carrier
	err      error // of the carriers
}

// startSheets starts on the sheets of a plan whose steps have their numbers.
func (p *planning) startSheets(plan *Plan) *sheets {
	s := &sheets{}
	needs := make([]Need, len(p.covers))
	for i := range p.covers {
		needs[i] = p.covers[i].need
	}
	steps, discards, carboys := plan.Steps, p.walk.Waste, p.shelf.Carboys
	fill := p.policy.value("fill.waste")
	limits := CarrierLimits{MostMass: chem.Mass(p.policy.value("carrier.mass")), MostCount: int(p.policy.value("carrier.count"))}
	carried := carriedNeeds(needs, p.policy.value("prior.missing.most-size"))
	s.wait.Go(func() {
		s.waste = SortWaste(discards, carboys, fill)
		s.hazards = NoteHazards(needs, steps, s.waste)
	})
	s.wait.Go(func() {
		s.pairs = PairsOf(needs, steps)
		s.carriers, s.err = CarriersFor(carried, limits)
	})
	return s
}

// finish waits for the sheets and puts them into the plan.
func (s *sheets) finish(plan *Plan) {
	s.wait.Wait()
	plan.Waste, plan.Hazards, plan.Pairs, plan.Carriers = s.waste, s.hazards, s.pairs, s.carriers
	for _, w := range plan.Waste {
		if !w.Fits {
			plan.Findings = append(plan.Findings, Finding{Kind: "no-room-for-waste", Severity: Warning,
				Text:  fmt.Sprintf("no carboy takes %s of %s: %s", massText(w.Mass), w.Stream, firstOf(w.Note, "none is kept for that stream")),
				Would: "empty or provide a carboy before the run; no work starts before its disposal is planned"})
		}
	}
	switch {
	case errors.Is(s.err, ErrCarriersNotProven):
		plan.Findings = append(plan.Findings, Finding{Kind: "carriers-not-proven", Severity: Note, Text: s.err.Error()})
	case s.err != nil:
		plan.Findings = append(plan.Findings, Finding{Kind: "no-carriers", Severity: Warning, Text: s.err.Error()})
	}
}

// carriedNeeds are the needs without what is drawn at a tank or a bin: that
// stays where it is.
func carriedNeeds(needs []Need, most float64) []Need {
	needs = slices.Clone(needs)
	for i := range needs {
		needs[i].Draws = slices.DeleteFunc(slices.Clone(needs[i].Draws), func(d Draw) bool { return standsStill(&d.Bottle, &d.Form, most) })
	}
	return needs
}

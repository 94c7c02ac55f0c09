package planner

import "stillroom/inventory"

// The functions here plan one run as it stands among the others: against what
// the promises of the runs before it on the slate leave. MakePlan, LadderOf and
// OutlookOf see earmarks only.

// PlanAmong makes the plan of a run among those of a slate. The runs before it
// are those of an earlier day, or of the same day with a smaller number; a run
// without a number comes last on its day. The run itself doesn't count, so that
// another target or day can be tried. The error is that of MakePlan.
func PlanAmong(req Request, slate *Slate, shelf *inventory.Shelf) (*Plan, error) {
	return planAgainst(req, shelf, slate.claimsBefore(req, shelf))
}

// LadderAmong is LadderOf for a run among those of a slate.
func LadderAmong(req Request, slate *Slate, shelf *inventory.Shelf) ([]Rung, error) {
	p, err := newPlanning(req, shelf)
	if err != nil {
		return nil, err
	}
	p.claims = slate.claimsBefore(req, shelf)
	return p.ladder()
}

// OutlookAmong is OutlookOf for a run among those of a slate. What the runs
// before it on the day asked for are promised stays promised on the other days
// it looks at.
func OutlookAmong(req Request, slate *Slate, shelf *inventory.Shelf) (Outlook, error) {
	p, err := newPlanning(req, shelf)
	if err != nil {
		return Outlook{}, err
	}
	p.claims = slate.claimsBefore(req, shelf)
	return p.outlook()
}

// claimsBefore sums what the runs before a request draw, by bottle, as far as
// their earmarks don't cover it.
func (s *Slate) claimsBefore(req Request, shelf *inventory.Shelf) map[int64]int64 {
	before := slating{shelf: shelf, claims: map[int64]int64{}}
	for _, l := range s.Lines {
		if l.Plan == nil || req.Run != 0 && l.Run.ID == req.Run {
			continue
		}
		if l.Run.On < req.On || l.Run.On == req.On && (req.Run == 0 || l.Run.ID < req.Run) {
			before.claim(l.Run.ID, l.Plan)
		}
	}
	return before.claims
}

package views

import (
	"context"
	"hash/maphash"
	"strings"
	"sync"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// memory keeps the plans made against the stock as it stands, because the page
// of a run, its papers and its explanations ask for the same one and making it
// takes longer than everything else. Plans are never changed, so that several
// requests may share one. When anything on the shelf changes, all are forgotten.
type memory struct {
	mu    sync.Mutex
	seed  maphash.Seed
	last  *inventory.Shelf // the shelf looked at last, and its fingerprint
	sum   uint64
	state labState
	plans map[planKey]*planner.Plan
	slate *planner.Slate
}

// labState is the stock on a day and the recipes of the runs, by fingerprints.
type labState struct {
	shelf, recipes uint64
	today          inventory.Date
}

// planKey is everything in a request that the pages set.
type planKey struct {
	recipe    string // its whole text, because a run may keep an older one
	target    chem.Mass
	on        inventory.Date
	run       int64
	store     int64
	certainty chem.Fraction
	drawn     bool
	off       string
}

// mostPlans bounds the memory; a plan takes some hundred kilobytes.
const mostPlans = 64

func newMemory() *memory {
	return &memory{seed: maphash.MakeSeed(), plans: map[planKey]*planner.Plan{}}
}

// at makes the memory that of a state of the lab. Its caller holds the lock.
func (m *memory) at(state labState) {
	if m.state != state || len(m.plans) >= mostPlans {
		m.state, m.slate = state, nil
		clear(m.plans)
	}
}

// plan makes the plan of a run among the others of the slate, or gives the one
// made before.
func (s *Server) plan(ctx context.Context, req planner.Request, shelf *inventory.Shelf) (*planner.Plan, error) {
	runs, _, err := s.slateRuns(ctx, shelf)
	if err != nil {
		return nil, err
	}
	state := s.memory.stateOf(shelf, runs, req.Today)
	key := planKey{req.Recipe.Name + "\n" + req.Recipe.Text, req.Target, req.On, req.Run, req.Store, req.Certainty, req.Drawn, strings.Join(req.Off, "\n")}
	s.memory.mu.Lock()
	s.memory.at(state)
	plan, ok := s.memory.plans[key]
	s.memory.mu.Unlock()
	if ok {
		return plan, nil
	}
	if s.Plan != nil {
		plan, err = s.Plan(req, shelf)
	} else {
		plan, err = planner.PlanAmong(req, s.slateFor(state, runs, shelf), shelf)
	}
	if err != nil {
		return nil, err
	}
	s.memory.mu.Lock()
	defer s.memory.mu.Unlock()
	if s.memory.state == state {
		s.memory.plans[key] = plan
	}
	return plan, nil
}

// slateFor plans the slate, or gives the one worked out before.
func (s *Server) slateFor(state labState, runs []planner.SlateRun, shelf *inventory.Shelf) *planner.Slate {
	s.memory.mu.Lock()
	s.memory.at(state)
	slate := s.memory.slate
	s.memory.mu.Unlock()
	if slate != nil {
		return slate
	}
	slate = planner.SlateOf(runs, shelf, state.today)
	s.memory.mu.Lock()
	defer s.memory.mu.Unlock()
	if s.memory.state == state {
		s.memory.slate = slate
	}
	return slate
}

// stateOf returns the state of the lab. A shelf never changes, so that the same
// one isn't summed up twice.
func (m *memory) stateOf(shelf *inventory.Shelf, runs []planner.SlateRun, today inventory.Date) labState {
	recipes := m.recipes(runs)
	m.mu.Lock()
	defer m.mu.Unlock()
	if m.last != shelf {
		m.last, m.sum = shelf, m.fingerprint(shelf)
	}
	return labState{m.sum, recipes, today}
}

// recipes sums up which recipe text every run has.
func (m *memory) recipes(runs []planner.SlateRun) uint64 {
	var h maphash.Hash
	h.SetSeed(m.seed)
	for _, r := range runs {
		maphash.WriteComparable(&h, r.Run.ID)
		if r.Recipe != nil {
			maphash.WriteComparable(&h, r.Recipe.Text)
		}
	}
	return h.Sum64()
}

// fingerprint sums up everything on a shelf. Rows have a fixed order, so that
// the same stock gives the same number as long as the program runs.
func (m *memory) fingerprint(shelf *inventory.Shelf) uint64 {
	var h maphash.Hash
	h.SetSeed(m.seed)
	write(&h, shelf.Substances)
	write(&h, shelf.Forms)
	write(&h, shelf.Places)
	write(&h, shelf.Bottles)
	write(&h, shelf.Earmarks)
	for i := range shelf.Offers {
		writeOffer(&h, &shelf.Offers[i])
	}
	write(&h, shelf.Orders)
	write(&h, shelf.Carboys)
	write(&h, shelf.Equipment)
	write(&h, shelf.Runs)
	write(&h, shelf.Policy.Rows())
	return h.Sum64()
}

// writeOffer adds an offer, whose price breaks are a list. Every number of it
// counts; a field that is added to the type has to be added here.
func writeOffer(h *maphash.Hash, o *inventory.Offer) {
	write(h, o.Breaks)
	write(h, []string{o.Supplier, o.Item, o.Currency})
	write(h, []int64{o.ID, o.FormID, o.PackSize, o.PriceMinor, o.OrderFee, o.Surcharge, o.MinOrder,
		int64(o.LeadDays), int64(o.LeadDays90), int64(o.ShelfLifeDays)})
}

func write[R comparable](h *maphash.Hash, rows []R) {
	maphash.WriteComparable(h, len(rows))
	for _, r := range rows {
		maphash.WriteComparable(h, r)
	}
}

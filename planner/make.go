package planner

import (
	"fmt"
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// walker is what a plan wants of a compiled recipe.
type walker interface {
	ScaleFor(target chem.Mass, certainty chem.Fraction, policy inventory.Policy) (Scale, error)
	Walk(Conditions) (*Walk, error)
}

// planning holds what one plan is made from.
type planning struct {
	req     Request
	shelf   *inventory.Shelf
	program walker
	policy  *policyTable
	claims  map[int64]int64 // promised to earlier runs of a slate, by bottle
	relax   func(*Ask)      // loosens what the recipe accepts; nil for not at all
	light   bool            // states only: no risk, no sheets

	scale   Scale
	batches int
	tooBig  Finding // why fewer batches don't do
	walk    *Walk
	asks    []Ask // the walk's, and the water of make-ups
	stocks  map[string]Stock
	matcher *matcher
	covers  []coverage
	made    []makeUp
	found   []Finding
}

// MakePlan plans a run against a shelf. The same request and shelf give the
// same plan, byte for byte. The error is a *RequestError if the request can't be
// planned, a *StepError if the recipe can't be carried out at this scale.
func MakePlan(req Request, shelf *inventory.Shelf) (*Plan, error) {
	return planAgainst(req, shelf, nil)
}

// newPlanning checks the request and compiles its recipe.
func newPlanning(req Request, shelf *inventory.Shelf) (*planning, error) {
	if err := req.check(); err != nil {
		return nil, err
	}
	program, err := req.Recipe.compiled()
	if err != nil {
		return nil, err
	}
	return &planning{req: req, shelf: shelf, program: program}, nil
}

// mostPasses bounds how often the walk-through is repeated until the stocks it
// assumed are the stocks that are drawn. Two passes do, unless the amounts of
// the second tip the choice to another bottle.
const mostPasses = 5

// plan carries out the steps of planning in the order a chemist would.
func (p *planning) plan() (*Plan, error) {
	if err := p.req.check(); err != nil {
		return nil, err
	}
	p.policy = newPolicyTable(p.shelf.Policy)
	if err := p.chooseScale(); err != nil {
		return nil, err
	}
	if err := p.fitAndMatch(); err != nil {
		return nil, err
	}
	return p.write()
}

func (p *planning) chooseScale() error {
	certainty := p.req.Certainty
	if certainty == 0 {
		certainty = chem.Fraction(p.policy.value("risk.certainty"))
	}
	scale, err := p.program.ScaleFor(p.req.Target, certainty, p.shelf.Policy)
	p.scale = scale
	return err
}

// conditions are those of the next walk-through.
func (p *planning) conditions() Conditions {
	return Conditions{
		Limiting: p.scale.Amount, Batches: p.batches, Stocks: p.stocks, Off: p.req.Off,
		Equipment: p.shelf.Equipment, Policy: p.shelf.Policy,
	}
}

// matchAndWalk matches and allocates, and repeats the walk-through with the
// stocks drawn until they no longer change.
func (p *planning) matchAndWalk() error {
	matcher, err := newMatcher(p.req, p.shelf, p.policy)
	if err != nil {
		return err
	}
	matcher.claims = p.claims
	p.matcher = matcher
	for range mostPasses {
		if err := p.match(); err != nil {
			return err
		}
		stocks := stocksOf(p.covers, p.asks)
		if sameStocks(stocks, p.stocks) {
			return nil
		}
		p.stocks = stocks
		walk, err := p.program.Walk(p.conditions())
		if err != nil {
			return err
		}
		p.walk = walk
	}
	if err := p.match(); err != nil {
		return err
	}
	p.found = append(p.found, Finding{
		Kind: "stock-not-settled", Severity: Note,
		Text: fmt.Sprintf("after %d passes the bottles chosen still changed with the water they bring; the amounts are those of the last pass", mostPasses),
	})
	return nil
}

func (p *planning) match() error {
	matcher := p.matcher
	clear(matcher.used)
	p.asks = p.relaxed(p.walk.Asks)
	demands, err := demandsOf(p.asks, p.shelf)
	if err != nil {
		return err
	}
	p.covers = matcher.coverAll(p.asks, demands, p.req.Recipe.Limiting)
	p.made = makeUpsOf(p.covers)
	if len(p.made) == 0 {
		return nil
	}
	// The water of the make-ups is a need of its own, so that everything is
	// matched once more with it.
	p.asks = append(slices.Clip(p.asks), makeUpAsks(p.made)...)
	if demands, err = demandsOf(p.asks, p.shelf); err != nil {
		return err
	}
	clear(matcher.used)
	p.covers = matcher.coverAll(p.asks, demands, p.req.Recipe.Limiting)
	return nil
}

func (p *planning) relaxed(asks []Ask) []Ask {
	if p.relax == nil {
		return asks
	}
	asks = slices.Clone(asks)
	for i := range asks {
		p.relax(&asks[i])
	}
	return asks
}

// write puts the plan together.
func (p *planning) write() (*Plan, error) {
	plan := &Plan{
		Recipe: p.req.Recipe, On: p.req.On, Today: p.req.Today, Scale: p.scale,
		Target: Target{p.walk.Product.Substance, p.walk.Product.CAS, p.walk.Product.Formula, p.req.Target},
		Steps:  p.walk.Steps, Flow: p.walk.Flow, Findings: append(p.found, p.walk.Findings...),
	}
	plan.Scale.Batches = p.batches
	p.insertMakeUps(plan)
	if p.light {
		p.shortfalls(plan)
		p.states(plan)
		return plan, nil
	}
	sheets := p.startSheets(plan)
	p.shortfalls(plan)
	p.risk(plan)
	p.states(plan)
	plan.Findings = append(plan.Findings, p.largeFindings(plan)...)
	p.blends(plan)
	sheets.finish(plan)
	plan.Tools = measuringTools(p.shelf.Equipment)
	p.budget(plan)
	plan.Metrics = p.metrics(plan)
	plan.Findings = append(plan.Findings, p.policy.findings()...)
	plan.Sentence = sentence(plan, p.covers)
	plan.Revision = revisionOf(plan)
	return plan, nil
}

// shortfalls finds what is on its way and what is to be bought.
func (p *planning) shortfalls(plan *Plan) {
	for i := range p.covers {
		if p.covers[i].alloc.short > 0 {
			p.covers[i].coming = p.matcher.expected(&p.covers[i])
		}
	}
	buys, found := p.matcher.buy(p.covers)
	plan.Buy = buys
	plan.Findings = append(plan.Findings, found...)
}

// risk draws the chance of running short, and sets the mass of product beside
// the target.
func (p *planning) risk(plan *Plan) {
	do := make(map[int]string, len(p.walk.Steps))
	for _, s := range p.walk.Steps {
		do[s.N] = s.Do
	}
	a := newAssessor(p.matcher)
	if s, ok := p.program.(sampler); ok && p.req.Drawn {
		a.walks = drawWalks(s, p.conditions(), p.covers, p.walk.Asks, a.seed, a.n)
	}
	plan.Risk = a.assess(p.covers, p.asks, func(step int) string { return do[step] })
	plan.Risk.product(p.walk.Product, p.scale, p.req.Target)
	if a.walks != nil {
		plan.Risk.drawn(a.walks, p.req.Target)
	}
}

func (p *planning) states(plan *Plan) {
	limit := p.policy.value("risk.limit")
	for i := range p.covers {
		c := &p.covers[i]
		p.matcher.decide(c, plan.Buy, limit)
		if !c.alloc.proven {
			plan.Findings = append(plan.Findings, Finding{Kind: "bottles-not-proven", Severity: Note,
				Text: fmt.Sprintf("there were too many ways of choosing bottles of %s to try them all; a choice with less trouble may exist", c.demand.name)})
		}
		plan.Needs = append(plan.Needs, c.need)
		plan.Verdict = max(plan.Verdict, c.need.State)
	}
}

// budget lays the steps over working days and says what no day holds.
func (p *planning) budget(plan *Plan) {
	budget, err := timeBudget(plan.Steps, p.batches, plan.On, p.policy)
	if err != nil {
		plan.Findings = append(plan.Findings, Finding{Kind: "no-working-day", Severity: Note,
			Text: "the last safe start is not assessed: " + err.Error(), Would: "mend the row in the policy table"})
		return
	}
	plan.Budget = budget
	plan.Findings = append(plan.Findings, budget.findings()...)
}

// measuringTools are the balances and cylinders among the lab's ware.
func measuringTools(ware []inventory.Equipment) []inventory.Equipment {
	var tools []inventory.Equipment
	for _, e := range ware {
		if e.Kind == "balance" || e.Kind == "cylinder" {
			tools = append(tools, e)
		}
	}
	return tools
}

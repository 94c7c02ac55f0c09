package planner

import (
	"fmt"
	"math"
	"slices"

	"stillroom/chem"
)

// The chance of running short. For each draw of the run
//
//	need = Σ charge · loss          over the charges of the need, or drawn with the walk-through
//	have = Σ found · (content − promised − dead) · strength   over its bottles, spares included
//
// and the need is short where need > have. Content, strength, finding and loss
// are distributions of the policy table's priors (practice §5). Every
// uncertain thing has a random stream of its own name under one seed, so that
// two plans that share a bottle share its luck, and a question asked twice gets
// the same draws (common random numbers). With normal need and have the chance
// is Φ((need − have)/√(sd²+sd²)).

// needRisk is a need's part in the run.
type needRisk struct {
	cover   *coverage
	charges []float64
	losses  []quantity
	bottles []bottleRisk
	certain bool      // it suffices whatever happens, if the bottles drawn on are found
	drawn   []float64 // draws of the need, where the walk-through was drawn
	least   float64   // the need doesn't come to less in any draw
	most    float64   // more than the need comes to in any draw
	usual   float64   // more than it comes to if every charge keeps to what is usual
	safe    float64   // of a single bottle: if its content's random number is above this, it suffices
	short   []bool
	chance  float64
}

// assessor makes the draws of one plan.
type assessor struct {
	m     *matcher
	n     int
	seed  uint64
	limit float64
	walks *sampled // nil if only the charges are drawn
	needs []needRisk
	run   []uint8 // how many needs are short in each draw, up to 255
}

// mostDraws bounds what a policy row can ask for: a million draws have a
// standard error of a twentieth of a point at the worst.
const mostDraws = 1_000_000

func newAssessor(m *matcher) *assessor {
	return &assessor{
		m: m, n: int(min(max(2, m.policy.value("risk.draws")), mostDraws)), seed: uint64(m.policy.value("risk.seed")),
		limit: m.policy.value("risk.limit"),
	}
}

// assess fills in the chance of every need and returns that of the run.
func (a *assessor) assess(covers []coverage, asks []Ask, do func(step int) string) Risk {
	a.run = make([]uint8, a.n)
	if a.walks != nil {
		for i, failed := range a.walks.failed {
			a.run[i] = uint8(b2i(failed))
		}
	}
	a.needs = make([]needRisk, len(covers))
	// So that the run as a whole stays within the limit, a need has to stay
	// within its share: eight needs at 95 % are a run at 66 %.
	share := 1 - math.Pow(1-a.limit, 1/float64(max(1, len(covers))))
	for i := range covers {
		a.needs[i] = a.needRisk(&covers[i], asks, do)
		if a.walks != nil {
			a.needs[i].drawn = a.walks.asked[i]
		}
		a.assessNeed(&a.needs[i], share)
		a.nameNext(&a.needs[i])
	}
	risk := Risk{Draws: a.n, Seed: a.seed, RunEnough: a.enough()}
	a.decides(&risk)
	a.weighFirst(&risk)
	risk.Derivation = a.derivation(risk, covers)
	return risk
}

// derivation shows the chance of each need behind that of the run. The draws
// are common to all needs, so the chances don't simply multiply.
func (a *assessor) derivation(risk Risk, covers []coverage) chem.Derivation {
	d := chem.Derivation{Of: "chance that everything suffices", Formula: "P = draws in which no need runs short / draws",
		Inserted: fmt.Sprintf("P = %.0f / %d", risk.RunEnough*float64(risk.Draws), risk.Draws),
		Value:    risk.RunEnough, Range: fmt.Sprintf("%d draws with seed %d, the same in every need", risk.Draws, risk.Seed),
		Source: "Monte Carlo with common random numbers; the spreads are the policy's priors"}
	for i := range covers {
		n := &covers[i].need
		if n.ChanceShort > 0 {
			d.Inputs = append(d.Inputs, chem.Input{Symbol: "p", Name: n.Substance + " runs short", Value: 100 * n.ChanceShort,
				Unit: "%", Source: "its draws: content, assay and finding of its bottles, spread of the need"})
		}
	}
	return d
}

func (a *assessor) enough() float64 {
	bad := 0
	for _, k := range a.run {
		bad += b2i(k > 0)
	}
	return 1 - float64(bad)/float64(a.n)
}

func (a *assessor) needRisk(c *coverage, asks []Ask, do func(step int) string) needRisk {
	r := needRisk{cover: c}
	for k, i := range c.demand.asks {
		r.charges = append(r.charges, amountOf(&asks[i]))
		name := fmt.Sprintf("charge %s %d %d", c.demand.name, asks[i].Step, k)
		r.losses = append(r.losses, a.loss(asks[i], do(asks[i].Step), name))
	}
	for _, t := range c.alloc.taken {
		r.bottles = append(r.bottles, a.bottleRisk(&c.found.fits[t.line], t.amount/c.found.fits[t.line].pure))
	}
	return r
}

// loss is the factor by which a charge may come out other than planned.
func (a *assessor) loss(ask Ask, do, name string) quantity {
	q := quantity{stream: chem.NewStream(a.seed, name), mean: 1, least: 0, most: math.Inf(1)}
	value := a.m.policy.value
	switch {
	case ask.Pieces > 0:
	case do == "extract":
		q.dist = shifted(1, value("prior.solvent-loss.mean"), value("prior.solvent-loss.sd"))
	case do == "dry":
		q.dist = shifted(0, 1, value("prior.drying-agent.sd"))
	case do == "neutralise" || do == "acidify":
		q.sd = value("prior.acid-base.sd")
	case do == "quench":
		low, high := value("prior.quench.low"), value("prior.quench.high")
		q.flat, q.least, q.most = true, 2*low/(low+high), 2*high/(low+high)
	case ask.Exact:
		q.sd = value("prior.balance")
	default:
		q.sd = value("prior.cylinder")
	}
	return q
}

// assessNeed draws one need, naming spares until its chance is within share.
func (a *assessor) assessNeed(r *needRisk, share float64) {
	n := &r.cover.need
	switch {
	case r.cover.demand.amount <= 0:
		n.ChanceShort, n.ChanceError = 0, 0
		return
	case r.cover.alloc.short > 0:
		a.waitFor(r)
		return
	}
	r.short = make([]bool, a.n)
	r.bound()
	r.draw(r.bottles)
	a.nameSpares(r, share)
	for i, s := range r.short {
		a.run[i] += uint8(b2i(s))
	}
	n.ChanceShort = r.chance
	n.ChanceError = math.Sqrt(r.chance * (1 - r.chance) / float64(a.n))
	if r.certain && len(r.bottles) == 1 {
		n.ChanceShort, n.ChanceError = r.bottles[0].missing, 0 // no need of draws
	}
	if r.chance > a.limit && !r.certain {
		n.CoverWith = chem.Mass(r.lacking(1 - a.limit))
	}
}

// waitFor draws whether an order under way comes in time for what is short;
// without one the need is short for certain.
func (a *assessor) waitFor(r *needRisk) {
	n, late := &r.cover.need, 1.0
	if r.cover.coming.covers {
		late = r.cover.coming.late
	}
	order := chem.NewStream(a.seed, "order for "+r.cover.demand.name)
	for i := range a.run {
		a.run[i] += uint8(b2i(order.Uniform(i) < late))
	}
	n.ChanceShort, n.ChanceError = late, 0
}

// usualShare is the share of the draws in which a charge keeps to what is usual.
const usualShare = 0.999

// bound finds the least and most the need can be and what it usually is, whether the bottles
// drawn on suffice whatever the draw, as long as each is found, and for a single
// bottle the random number above which its content is enough for what is usual,
// so that most draws are decided by a few comparisons.
func (r *needRisk) bound() {
	r.least, r.most, r.usual, r.safe = 0, 0, 0, 1
	if r.drawn != nil {
		r.least, r.most = slices.Min(r.drawn), slices.Max(r.drawn)
		r.usual = r.most
	} else {
		for k := range r.charges {
			r.least += r.charges[k] * r.losses[k].extreme(false)
			r.most += r.charges[k] * r.losses[k].extreme(true)
			r.usual += r.charges[k] * r.losses[k].usual()
		}
	}
	r.certain = r.sureWith(r.bottles)
	r.cover.onlyFinding = r.certain
	if len(r.bottles) == 1 && !r.certain {
		r.safe = r.bottles[0].enoughAbove(r.usual)
	}
}

// draw finds the draws in which the bottles don't suffice.
func (r *needRisk) draw(bottles []bottleRisk) {
	bad := 0
	for i := range r.short {
		r.short[i] = r.shortAt(bottles, i)
		bad += b2i(r.short[i])
	}
	r.chance = float64(bad) / float64(len(r.short))
}

func (r *needRisk) shortAt(bottles []bottleRisk, i int) bool {
	if r.safe < 1 && len(bottles) == 1 {
		b := &bottles[0]
		if b.content.stream.Uniform(i) > r.safe && r.usually(i) {
			return b.isMissing(i)
		}
	}
	if r.certain && allFound(bottles, i) {
		return false
	}
	return r.shortOf(bottles, i)
}

// shortOf compares need and content, whatever is known beforehand.
func (r *needRisk) shortOf(bottles []bottleRisk, i int) bool {
	have := 0.0
	for k := range bottles {
		b := &bottles[k]
		if b.isMissing(i) {
			continue
		}
		if have+b.floor > r.most {
			return false
		}
		if have += b.holds(i); have > r.most {
			return false
		}
	}
	if have < r.least {
		return true
	}
	return (have <= r.usual || !r.usually(i)) && have < r.needAt(i)
}

// usually reports whether no charge goes beyond what is usual in draw i.
func (r *needRisk) usually(i int) bool {
	if r.drawn != nil {
		return true
	}
	for k := range r.losses {
		if !r.losses[k].constant() && r.losses[k].stream.Uniform(i) > usualShare {
			return false
		}
	}
	return true
}

func allFound(bottles []bottleRisk, i int) bool {
	for k := range bottles {
		if bottles[k].isMissing(i) {
			return false
		}
	}
	return true
}

// needAt is draw i of the need.
func (r *needRisk) needAt(i int) float64 {
	if r.drawn != nil {
		return r.drawn[i]
	}
	sum := 0.0
	for k := range r.charges {
		sum += float64(r.charges[k] * r.losses[k].at(i))
	}
	return sum
}

// lacking is how much more, found for sure, would suffice in a share p of the
// draws.
func (r *needRisk) lacking(p float64) float64 {
	lack := make([]float64, len(r.short))
	for i := range lack {
		have := 0.0
		for k := range r.bottles {
			have += r.bottles[k].have(i)
		}
		lack[i] = r.needAt(i) - have
	}
	slices.Sort(lack)
	return max(0, lack[min(len(lack)-1, int(math.Ceil(p*float64(len(lack)))))])
}

// decides names the need most likely to run short.
func (a *assessor) decides(risk *Risk) {
	worst := 0.0
	for i := range a.needs {
		if n := &a.needs[i].cover.need; n.ChanceShort > worst {
			worst, risk.Decides = n.ChanceShort, n.Substance
		}
	}
}

// weighFirst finds the bottle whose weighing lowers the run's chance of being
// short the most, with the same draws before and after.
func (a *assessor) weighFirst(risk *Risk) {
	risk.WeighBefore = 1 - risk.RunEnough
	best := risk.WeighBefore
	bad := 0
	for _, k := range a.run {
		bad += b2i(k > 0)
	}
	for k := range a.needs {
		r := &a.needs[k]
		if r.short == nil || r.chance == 0 {
			continue
		}
		for b := range r.bottles {
			if after := a.afterWeighing(r, b, bad, best); after < best {
				best, risk.WeighFirst = after, r.bottles[b].fit.bottle.Code
				risk.LookOnly = !r.bottles[b].doubtful || r.certain
			}
		}
	}
	risk.WeighAfter = best
}

// afterWeighing is the run's chance of being short once a bottle's content is
// known to the spread of a weighing, bad being the draws that are short before.
// If it can't be below best it may return early with any chance that isn't.
func (a *assessor) afterWeighing(r *needRisk, b, bad int, best float64) float64 {
	bottles := slices.Clone(r.bottles)
	bottles[b].missing = 0 // what is weighed has been found
	if bottles[b].doubtful {
		bottles[b].content = a.weighed(&bottles[b])
		bottles[b].floor = bottles[b].least()
	}
	onlyBetter := !bottles[b].doubtful || r.sureWith(bottles)
	for i := range r.short {
		if r.short[i] && a.run[i] == 1 && !r.shortOf(bottles, i) {
			bad--
		}
	}
	if onlyBetter || float64(bad)/float64(a.n) >= best {
		return float64(bad) / float64(a.n)
	}
	for i := range r.short {
		if a.run[i] == 0 && r.shortOf(bottles, i) {
			bad++
		}
	}
	return float64(bad) / float64(a.n)
}

// sureWith reports whether bottles suffice whatever the draw, if each is found.
func (r *needRisk) sureWith(bottles []bottleRisk) bool {
	least := 0.0
	for k := range bottles {
		least += bottles[k].floor
	}
	return least > r.most
}

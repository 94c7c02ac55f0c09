package planner

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"sync"

	"stillroom/chem"
	"stillroom/inventory"
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

// quantity is something uncertain: a name for its stream and a distribution.
type quantity struct {
	stream chem.Stream
	mean   float64
	sd     float64 // of a normal distribution around mean, cut at least and most
	least  float64
	most   float64
	flat   bool      // uniform between least and most
	dist   chem.Dist // any other; nil for none
}

// at returns draw i.
func (q *quantity) at(i int) float64 {
	switch {
	case q.dist != nil:
		return q.stream.Draw(q.dist, i)
	case q.flat:
		return q.least + float64((q.most-q.least)*q.stream.Uniform(i))
	case q.sd == 0:
		return q.mean
	}
	return min(max(q.mean+float64(q.sd*standardNormal(q.stream.Uniform(i))), q.least), q.most)
}

// extreme returns a value that isn't passed, downwards or upwards: for other
// than normal and uniform distributions less than once in 10¹² draws.
func (q *quantity) extreme(up bool) float64 {
	p, z := 1e-12, standardNormal(0)
	if up {
		p, z = 1-1e-12, -z
	}
	switch {
	case q.dist != nil:
		return q.dist.Quantile(p)
	case q.flat && up:
		return q.most
	case q.flat:
		return q.least
	}
	return min(max(q.mean+q.sd*z, q.least), q.most)
}

// normalSteps is how finely the standard normal distribution is tabulated: the
// outermost step lies at 4.3 standard deviations.
const normalSteps = 1 << 16

var normalTable = sync.OnceValue(func() []float64 {
	standard, err := chem.NewNormal(0, 1)
	if err != nil {
		panic(err) // 0 and 1 are a mean and a standard deviation
	}
	table := make([]float64, normalSteps)
	for i := range table {
		table[i] = standard.Quantile((float64(i) + 0.5) / normalSteps)
	}
	return table
})

// standardNormal is the quantile of p by the table.
func standardNormal(p float64) float64 { return normalTable()[int(p*normalSteps)] }

// bottleRisk is a bottle's part in a need.
type bottleRisk struct {
	fit      *fit
	missing  float64 // chance that it isn't found
	found    chem.Stream
	content  quantity // ledger units
	strength quantity // against the low end that was planned with
	off      float64  // ledger units that aren't for this need
	doubtful bool     // weighing would tell more
}

// have is what the bottle gives in draw i, in the unit of the need.
func (b *bottleRisk) have(i int) float64 {
	if b.found.Uniform(i) < b.missing {
		return 0
	}
	return max(0, b.content.at(i)-b.off) * b.strength.at(i) * b.fit.pure
}

func (b *bottleRisk) least() float64 {
	return max(0, b.content.extreme(false)-b.off) * b.strength.extreme(false) * b.fit.pure
}

// needRisk is a need's part in the run.
type needRisk struct {
	cover   *coverage
	charges []float64
	losses  []quantity
	bottles []bottleRisk
	certain bool      // it suffices whatever happens, if the bottles drawn on are found
	drawn   []float64 // draws of the need, where the walk-through was drawn
	most    float64   // more than the need comes to in any draw
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

func newAssessor(m *matcher) *assessor {
	return &assessor{
		m: m, n: max(2, int(m.policy.value("risk.draws"))), seed: uint64(m.policy.value("risk.seed")),
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
	}
	risk := Risk{Draws: a.n, Seed: a.seed, RunEnough: a.enough()}
	a.decides(&risk)
	a.weighFirst(&risk)
	return risk
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
		r.charges = append(r.charges, amountOf(asks[i]))
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

// shiftedLogNormal is base plus a log-normal part.
type shiftedLogNormal struct {
	base float64
	chem.LogNormal
}

// Quantile returns the value that a share p lies below.
func (s shiftedLogNormal) Quantile(p float64) float64 { return s.base + s.LogNormal.Quantile(p) }

// shifted returns base plus a log-normal part, or nil, which is no loss at all,
// if the prior isn't one.
func shifted(base, mean, sd float64) chem.Dist {
	l, err := chem.NewLogNormal(mean, sd)
	if err != nil {
		return nil
	}
	return shiftedLogNormal{base, l}
}

// bottleRisk sets up a bottle of which a need takes own ledger units.
func (a *assessor) bottleRisk(x *fit, own float64) bottleRisk {
	b := x.bottle
	r := bottleRisk{
		fit: x, missing: a.missing(x), found: chem.NewStream(a.seed, "found "+b.Code),
	}
	// What isn't for this need: promised, taken by other needs, dead.
	r.off = float64(x.promised+a.m.used[b.ID]+a.m.dead(x)) - own
	r.content, r.doubtful = a.content(x)
	r.strength = quantity{stream: chem.NewStream(a.seed, "assay "+b.Code), mean: 1, least: 1, most: 1}
	if x.top > x.strength && b.LotAssay == 0 && x.form.Measure != inventory.ByCount && !x.aged {
		r.strength.flat, r.strength.most = true, float64(x.top/x.strength)
	}
	return r
}

// missing is the chance that a bottle isn't found, by when it was last seen.
func (a *assessor) missing(x *fit) float64 {
	if standsStill(x.bottle, x.form, a.m.policy.value("prior.missing.most-size")) {
		return 0
	}
	seen := max(x.bottle.MeasuredOn, x.bottle.Received, x.bottle.Opened)
	switch age := a.m.req.Today - seen; {
	case seen.Set() && age <= 30:
		return a.m.policy.value("prior.missing.recent")
	case seen.Set() && age <= 365:
		return a.m.policy.value("prior.missing.year")
	}
	return a.m.policy.value("prior.missing.older")
}

// standsStill reports whether a container is so large, in litres or kilograms,
// that it is neither mislaid nor carried.
func standsStill(b *inventory.Bottle, form *inventory.StockForm, most float64) bool {
	switch form.Measure {
	case inventory.ByMass:
		return float64(inventory.MassUnits(b.Size)) >= most
	case inventory.ByVolume:
		return inventory.VolumeUnits(b.Size).Litres() >= most
	}
	return false
}

// content is the distribution of what is in a bottle, by how that was found
// out, and whether weighing it would tell more.
func (a *assessor) content(x *fit) (quantity, bool) {
	b := x.bottle
	has, size := float64(b.Content), max(float64(b.Size), float64(b.Content))
	q := quantity{stream: chem.NewStream(a.seed, "content "+b.Code), mean: has, least: 0, most: size * 1.05}
	prior := func(key string) float64 { return a.m.policy.value("prior.content." + key) }
	switch b.MeasuredBy {
	case inventory.ByUnopened:
		q.flat, q.least, q.most = true, has*(1+prior("unopened-low")), has*(1+prior("unopened-high"))
		return q, false
	case inventory.ByWeighing:
		q.sd = has * prior("weighed")
		return q, false
	case inventory.ByLedger:
		q.sd = has * prior("ledger")
		if x.form.StorageClass == flammable && b.MeasuredOn.Set() {
			months := max(0, float64(a.m.req.On-b.MeasuredOn)/30)
			q.sd = math.Hypot(q.sd, has*prior("ledger-month")*months)
		}
	case inventory.ByLevel:
		q.sd = size * prior(levelKey(x.form))
	default: // guessed, or nobody said how
		q.sd = size * prior("guessed")
	}
	return q, x.form.Measure != inventory.ByCount
}

// levelKey takes a liquid's bottle for amber, because its glass isn't recorded
// and a level is read less surely through amber.
func levelKey(form *inventory.StockForm) string {
	if form.Measure == inventory.ByVolume {
		return "level-amber"
	}
	return "level-powder"
}

// weighed is the content once the bottle has been weighed, if what is thought
// to be in it is right.
func (a *assessor) weighed(b *bottleRisk) quantity {
	q := b.content
	q.sd = q.mean * a.m.policy.value("prior.content.weighed")
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

// bound finds the most the need can be, whether the bottles drawn on suffice
// whatever the draw, as long as each is found, and for a single bottle the
// random number above which its content is enough, so that most draws are
// decided by two comparisons.
func (r *needRisk) bound() {
	r.most, r.safe = 0, 1
	if r.drawn != nil {
		r.most = slices.Max(r.drawn)
	} else {
		for k := range r.charges {
			r.most += r.charges[k] * r.losses[k].extreme(true)
		}
	}
	r.certain = r.sureWith(r.bottles)
	r.cover.onlyFinding = r.certain
	if len(r.bottles) == 1 && !r.certain {
		r.safe = r.bottles[0].enoughAbove(r.most)
	}
}

// enoughAbove is the random number above which the content, at the weakest the
// bottle may be, is more than an amount; 1 if there is none.
func (b *bottleRisk) enoughAbove(amount float64) float64 {
	units := amount/(b.strength.extreme(false)*b.fit.pure) + b.off
	q := &b.content
	switch {
	case q.dist != nil || q.sd == 0 || q.flat || units >= q.most:
		return 1
	case units < q.least:
		return 0
	}
	low, high := 0.0, 1.0
	for range 30 {
		if mid := (low + high) / 2; q.mean+float64(q.sd*standardNormal(mid)) > units {
			high = mid
		} else {
			low = mid
		}
	}
	return high
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
		if b.content.stream.Uniform(i) > r.safe {
			return b.found.Uniform(i) < b.missing
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
		if have += bottles[k].have(i); have > r.most {
			return false
		}
	}
	return have < r.needAt(i)
}

func allFound(bottles []bottleRisk, i int) bool {
	for k := range bottles {
		if bottles[k].found.Uniform(i) < bottles[k].missing {
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

// mostSpares bounds the bottles named beside those drawn on.
const mostSpares = 2

// nameSpares adds fit bottles that aren't drawn on, the least trouble first,
// until the chance is within share.
func (a *assessor) nameSpares(r *needRisk, share float64) {
	before := r.chance
	for len(r.cover.need.Spares) < mostSpares && r.chance > share {
		x := a.nextSpare(r)
		if x == nil {
			break
		}
		spare := a.bottleRisk(x, 0)
		was := r.chance
		bottles := append(slices.Clone(r.bottles), spare)
		r.drawSpare(bottles)
		if r.chance >= was {
			break
		}
		r.bottles = bottles
		place, _ := a.m.shelf.Place(x.bottle.PlaceID)
		r.cover.need.Spares = append(r.cover.need.Spares, Spare{Bottle: *x.bottle, Form: *x.form, Place: place})
	}
	for k := range r.cover.need.Spares {
		s := &r.cover.need.Spares[k]
		s.Why = fmt.Sprintf("%s at hand as a spare takes the chance of running short from %.2g %% to %.2g %%", s.Bottle.Code, before*100, r.chance*100)
	}
}

// drawSpare looks again at the draws that are short: a further bottle can only
// help. What is certain of the bottles drawn on doesn't hold for the spares.
func (r *needRisk) drawSpare(bottles []bottleRisk) {
	bad := 0
	for i := range r.short {
		if r.short[i] {
			r.short[i] = r.shortOf(bottles, i)
			bad += b2i(r.short[i])
		}
	}
	r.chance = float64(bad) / float64(len(r.short))
}

// nextSpare is the fit bottle, neither drawn on nor a spare yet, that is the
// least trouble: opened, then the first to expire, then by code.
func (a *assessor) nextSpare(r *needRisk) *fit {
	var best *fit
	for i := range r.cover.found.fits {
		x := &r.cover.found.fits[i]
		if x.free <= a.m.used[x.bottle.ID] || slices.ContainsFunc(r.bottles, func(b bottleRisk) bool { return b.fit.bottle.ID == x.bottle.ID }) {
			continue
		}
		if best == nil || lessTrouble(x, best) < 0 {
			best = x
		}
	}
	return best
}

func lessTrouble(x, y *fit) int {
	return cmp.Or(
		cmp.Compare(b2i(x.sealed), b2i(y.sealed)),
		cmp.Compare(endOfLife(x.life), endOfLife(y.life)),
		cmp.Compare(x.bottle.Code, y.bottle.Code),
	)
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
	for k := range a.needs {
		r := &a.needs[k]
		if r.short == nil || r.chance == 0 {
			continue
		}
		for b := range r.bottles {
			if after := a.afterWeighing(r, b); after < best {
				best, risk.WeighFirst = after, r.bottles[b].fit.bottle.Code
				risk.LookOnly = !r.bottles[b].doubtful || r.certain
			}
		}
	}
	risk.WeighAfter = best
}

// afterWeighing is the run's chance of being short once a bottle's content is
// known to the spread of a weighing.
func (a *assessor) afterWeighing(r *needRisk, b int) float64 {
	bottles := slices.Clone(r.bottles)
	bottles[b].missing = 0 // what is weighed has been found
	if bottles[b].doubtful {
		bottles[b].content = a.weighed(&bottles[b])
	}
	onlyBetter := !bottles[b].doubtful || r.sureWith(bottles)
	bad := 0
	for i := range r.short {
		switch others := int(a.run[i]) - b2i(r.short[i]); {
		case others > 0:
			bad++
		case r.short[i] || !onlyBetter:
			bad += b2i(r.shortOf(bottles, i))
		}
	}
	return float64(bad) / float64(a.n)
}

// sureWith reports whether bottles suffice whatever the draw, if each is found.
func (r *needRisk) sureWith(bottles []bottleRisk) bool {
	least := 0.0
	for k := range bottles {
		least += bottles[k].least()
	}
	return least > r.most
}

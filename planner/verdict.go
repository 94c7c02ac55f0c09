package planner

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// product sets the product's range and the chance of the target beside the
// rest, from the yield's distribution itself: the mass is proportional to it.
func (r *Risk) product(p Product, scale Scale, target chem.Mass) {
	yield, err := p.yieldDist()
	if err != nil || p.Amount <= 0 || p.PerLimiting <= 0 {
		r.TargetMet = -1
		return
	}
	whole := float64(p.Mass) / float64(p.Amount) * float64(scale.Amount) * p.PerLimiting // at a yield of one
	at := func(share float64) chem.Mass { return chem.Mass(whole * yield.Quantile(share)) }
	r.MassLow, r.MassMedian, r.MassHigh = at(0.05), at(0.5), at(0.95)
	r.ScaleFor90 = at(0.10)
	low, high := 0.0, 1.0
	for range 40 {
		if mid := (low + high) / 2; at(mid) < target*(1-enough) {
			low = mid
		} else {
			high = mid
		}
	}
	r.TargetMet = 1 - (low+high)/2
}

// sentence is the verdict in words: how likely, the chief doubt, what one act
// would change, with two figures at the most (practice §5).
func sentence(plan *Plan, covers []coverage) string {
	if plan.Verdict >= Late {
		return blocked(plan, covers)
	}
	chance := plan.Risk.RunEnough
	s := fmt.Sprintf("%s, %s", likely(chance), percent(chance))
	doubt := doubtOf(plan, covers)
	if doubt == "" {
		return s + "."
	}
	s += "; the chief doubt is " + doubt
	if w := plan.Risk.WeighFirst; w != "" && plan.Risk.WeighBefore-plan.Risk.WeighAfter >= worthWeighing {
		act := "Weighing"
		if plan.Risk.LookOnly {
			act = "Making sure of"
		}
		return s + fmt.Sprintf(". %s %s makes it %s.", act, w, percent(1-plan.Risk.WeighAfter))
	}
	return s + "."
}

// likely puts a chance into words.
func likely(p float64) string {
	switch {
	case p >= 0.99:
		return "As good as certain"
	case p >= 0.95:
		return "Very likely"
	case p >= 0.85:
		return "Likely enough"
	case p >= 0.6:
		return "More likely than not"
	case p >= 0.4:
		return "An even chance"
	default:
		return "Unlikely"
	}
}

// percent never rounds to certainty.
func percent(p float64) string {
	switch {
	case p > 0.995 && p < 1:
		return "over 99 %"
	case p > 0 && p < 0.005:
		return "under 1 %"
	}
	return fmt.Sprintf("%.0f %%", p*100)
}

// doubtOf names the bottle behind the need most likely to run short.
func doubtOf(plan *Plan, covers []coverage) string {
	for i := range covers {
		c := &covers[i]
		if !c.doubted(&plan.Risk) {
			continue
		}
		if len(c.need.Draws) == 0 && !c.coming.covers {
			return c.need.Substance
		}
		if c.coming.covers && c.alloc.short > 0 {
			return "whether " + c.need.Substance + " comes in time: " + strings.TrimSuffix(c.coming.text, ",")
		}
		b := doubtfulBottle(&c.need, plan.Risk.WeighFirst)
		if c.onlyFinding || plan.Risk.LookOnly && b.Code == plan.Risk.WeighFirst {
			return fmt.Sprintf("whether %s of %s is found, last seen in %s", b.Code, c.need.Substance, lastSeen(b))
		}
		return fmt.Sprintf("%s of %s, %s", b.Code, c.need.Substance, howMeasured(b))
	}
	if plan.Risk.Decides != "" {
		return plan.Risk.Decides
	}
	return ""
}

// doubted reports whether a need is the one to speak of: the one with the
// bottle that lowers the risk most, else the one that decides.
func (c *coverage) doubted(r *Risk) bool {
	if len(c.need.Draws) == 0 || r.WeighFirst == "" || r.WeighBefore-r.WeighAfter < worthWeighing {
		return c.need.Substance == r.Decides
	}
	return slices.ContainsFunc(c.need.Draws, func(d Draw) bool { return d.Bottle.Code == r.WeighFirst })
}

// doubtfulBottle is the one to weigh if it is among the draws, else the one
// least surely known.
func doubtfulBottle(n *Need, weigh string) inventory.Bottle {
	doubt := map[inventory.MeasuredBy]int{inventory.ByUnopened: 0, inventory.ByWeighing: 1, inventory.ByLedger: 2, inventory.ByLevel: 3, inventory.ByGuess: 4}
	worst := n.Draws[0].Bottle
	for _, d := range n.Draws {
		if d.Bottle.Code == weigh {
			return d.Bottle
		}
		if doubt[d.Bottle.MeasuredBy] > doubt[worst.MeasuredBy] {
			worst = d.Bottle
		}
	}
	return worst
}

// lastSeen is the month in which somebody had a bottle in hand.
func lastSeen(b inventory.Bottle) string {
	seen := max(b.MeasuredOn, b.Received, b.Opened)
	if !seen.Set() {
		return "a time nobody wrote down"
	}
	return seen.Time().Format("January")
}

// howMeasured says how and when a content was found out, without a figure.
func howMeasured(b inventory.Bottle) string {
	how := map[inventory.MeasuredBy]string{
		inventory.ByUnopened: "unopened", inventory.ByWeighing: "weighed", inventory.ByLedger: "known from the ledger",
		inventory.ByLevel: "judged by its level", inventory.ByGuess: "guessed",
	}[b.MeasuredBy]
	if how == "" {
		how = "of unknown measure"
	}
	if !b.MeasuredOn.Set() {
		return how
	}
	if b.MeasuredBy == inventory.ByUnopened {
		return how + ", last seen in " + b.MeasuredOn.Time().Format("January")
	}
	return how + " in " + b.MeasuredOn.Time().Format("January")
}

// blocked says what stops a run first and the act that helps.
func blocked(plan *Plan, covers []coverage) string {
	first, more := -1, 0
	for i := range covers {
		s := covers[i].need.State
		if s < Late {
			continue
		}
		more++
		if first < 0 || s > covers[first].need.State {
			first = i
		}
	}
	c := &covers[first]
	s := "Not yet: " + shortText(c) + " " + isAre(c) + stateWords[c.need.State]
	if more > 1 {
		s += ", and not that alone"
	}
	return s + "; " + actFor(plan, c) + "."
}

var stateWords = map[State]string{
	Late: "covered only after the date", Unfit: "on the shelf in bottles that may not be used", Short: "short",
}

func isAre(c *coverage) string {
	if c.demand.count {
		return "are "
	}
	return "is "
}

// actFor is the one act that would change the verdict.
func actFor(plan *Plan, c *coverage) string {
	switch {
	case c.coming.covers && c.coming.on > plan.On:
		return "moving the run to " + c.coming.on.Short() + " lets the order under way cover it"
	case len(c.need.buys) == 0 && len(c.need.Barred) > 0:
		b := c.need.Barred[0]
		return fmt.Sprintf("%s is barred: %s", b.Bottle.Code, b.Why)
	case len(c.need.buys) == 0:
		return "nothing that would do is on offer"
	}
	p := plan.Buy[c.need.buys[0]]
	if p.InTime {
		return fmt.Sprintf("ordering from %s by %s covers it", p.Offer.Supplier, p.OrderBy.Short())
	}
	return fmt.Sprintf("ordered today from %s it is there by %s", p.Offer.Supplier, p.Arrives.Short())
}

package planner

import (
	"fmt"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// decide gives a need its state and says why:
//
//	covered  fit bottles, or an order under way that is due before the run, cover it,
//	         and the chance of running short is within the limit
//	tight    they cover it, but the chance exceeds the limit
//	late     an order under way, or the quickest offer, covers it only after the run's date
//	unfit    only barred bottles would cover it
//	short    nothing on the shelf or on its way covers it
func (m *matcher) decide(c *coverage, buys []Purchase, limit float64) {
	n := &c.need
	switch {
	case c.alloc.short <= 0:
		m.decideCovered(c, limit)
	case c.coming.covers && c.coming.on <= m.req.On:
		n.State = Covered
		if c.coming.late > limit {
			n.State = Tight
		}
		n.Because = plainf("%s are not on the shelf; %s brings them before the run; it is late with a chance of %.2g %%", shortText(c), c.coming.text, 100*c.coming.late)
	case c.coming.covers:
		n.State, n.CoveredOn = Late, c.coming.on
		n.Because = fmt.Sprintf("%s are short; %s covers them only after the run", shortText(c), c.coming.text)
	case c.onlyBarred():
		n.State = Unfit
		n.Because = "no fit bottle: " + c.barredText()
	default:
		m.decideShort(c, buys)
	}
	if c.demand.apart != "" {
		n.Because += "; it isn't one need with the other charges of " + n.Substance + ": " + c.demand.apart
	}
}

func (m *matcher) decideCovered(c *coverage, limit float64) {
	n := &c.need
	n.State = Covered
	n.Because = "fit bottles cover it"
	if len(n.Draws) > 0 {
		n.Because = fmt.Sprintf("covered by %s", drawCodes(n.Draws))
	}
	if c.alloc.mixed && len(n.Draws) > 1 {
		n.Because += "; no single lot is enough"
	}
	if n.ChanceShort < 0 {
		return
	}
	if len(n.Spares) > 0 {
		n.Because += "; " + n.Spares[0].Why
	}
	// Two standard errors of the draws are allowed for, so that chance alone
	// doesn't make a need tight that stands exactly at the limit.
	if n.ChanceShort-2*n.ChanceError > limit {
		n.State = Tight
		n.Because = plainf("covered by %s, but the chance of running short is %.2g %%, above the limit of %.2g %%", drawCodes(n.Draws), n.ChanceShort*100, limit*100)
	}
}

func drawCodes(draws []Draw) string {
	codes := make([]string, len(draws))
	for i := range draws {
		codes[i] = draws[i].Bottle.Code
	}
	switch n := len(codes); {
	case n == 1:
		return codes[0]
	case n > 4:
		return fmt.Sprintf("%d bottles", n)
	default:
		return strings.Join(codes[:n-1], ", ") + " and " + codes[n-1]
	}
}

// onlyBarred reports whether no bottle is fit while barred ones would do. What
// stands promised to other runs isn't unfit: it is somebody else's.
func (c *coverage) onlyBarred() bool {
	if len(c.found.fits) > 0 {
		return false
	}
	for kind, pure := range c.found.barredBy {
		if kind != barPromised && (pure > 0 || kind == barNoData) {
			return true
		}
	}
	return false
}

func (c *coverage) barredText() string {
	var parts []string
	for i, b := range c.found.barred {
		if i == 3 {
			parts = append(parts, fmt.Sprintf("%d more", len(c.found.barred)-3+c.found.more))
			break
		}
		parts = append(parts, fmt.Sprintf("%s (%s) %s", b.Bottle.Code, b.Form.Name, b.Why))
	}
	return strings.Join(parts, "; ")
}

func (m *matcher) decideShort(c *coverage, buys []Purchase) {
	n := &c.need
	n.State = Short
	n.Because = shortText(c) + " are short"
	switch {
	case !c.demand.known:
		n.Because += fmt.Sprintf("; the shelf has no record of %s", n.Substance)
	case len(c.found.fits) == 0 && len(c.found.barred) == 0:
		n.Because += "; there is no bottle of it"
	case len(c.found.fits) == 0:
		n.Because += "; " + c.barredText()
	case len(n.Draws) == 0:
		n.Because += "; other steps of the run use up the fit bottles"
	default:
		n.Because += fmt.Sprintf("; all fit bottles together (%s) give the rest", drawCodes(n.Draws))
	}
	if len(n.buys) == 0 {
		n.Because += "; nothing that would do is on offer"
		return
	}
	arrives := inventory.Date(0)
	for _, i := range n.buys {
		arrives = max(arrives, buys[i].Arrives)
	}
	if arrives > m.req.On {
		n.State, n.CoveredOn = Late, arrives
		n.Because += fmt.Sprintf("; ordered today it arrives by %s, after the run", arrives.Short())
		return
	}
	n.Because += fmt.Sprintf("; if ordered by %s it arrives in time", buys[n.buys[0]].OrderBy.Short())
}

// shortText is the amount that is short, for a sentence.
func shortText(c *coverage) string {
	if c.demand.count {
		return plainf("%.3g pieces of %s", c.alloc.short, c.demand.name)
	}
	return massText(chem.Mass(c.alloc.short)) + " of " + c.demand.name
}

// massText writes a mass to three figures, for sentences only.
func massText(m chem.Mass) string {
	switch g := m.Grams(); {
	case g >= 1000:
		return plainf("%.3g kg", g/1000)
	case g >= 100:
		return fmt.Sprintf("%.0f g", g)
	case g < 0.1:
		return plainf("%.3g mg", g*1000)
	default:
		return plainf("%.3g g", g)
	}
}

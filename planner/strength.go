package planner

import (
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

type agedKey struct {
	from     inventory.Date
	strength chem.Fraction
}

// strength finds what a ledger unit of the bottle holds on the run's date.
func (f *formMatch) strength(x *fit) {
	if f.form.Measure == inventory.ByCount {
		x.pure, x.strength, x.top, x.share = 1, 1, 1, 1
		return
	}
	low, high := x.bottle.AssayRange(*f.form)
	x.strength, x.top = low, high
	if f.form.Ageing != "" {
		x.strength = f.onTheDay(x.bottle, low)
		x.aged = x.strength < low
	}
	x.share = x.strength * f.anhydrous
	x.water = x.strength - x.share
	if strings.EqualFold(f.form.Diluent, "water") {
		x.water += 1 - x.strength
	}
	x.pure = x.content * float64(x.share)
	if f.sub.Factor > 0 {
		x.pure /= f.sub.Factor
	}
	if f.sub.Substance != "" {
		x.standsIn = f.sub.Substance
	}
}

// onTheDay is the aged strength. Its store's temperature isn't recorded, so the
// room's is taken: a bottle kept cold is stronger than this. A law that can't
// answer leaves the strength unknown, and then the bottle counts as empty.
func (f *formMatch) onTheDay(b *inventory.Bottle, w0 chem.Fraction) chem.Fraction {
	key := agedKey{b.Received, w0}
	if w, ok := f.aged[key]; ok {
		return w
	}
	days := 0.0
	if b.Received.Set() {
		days = max(0, float64(f.req.On-b.Received))
	}
	w, err := chem.AgedFraction(f.form.Ageing, w0, days, chem.Celsius(f.roomC))
	if err != nil {
		w = 0
	}
	if f.aged == nil {
		f.aged = map[agedKey]chem.Fraction{}
	}
	f.aged[key] = w
	return w
}

// unfitStrength compares the strength of the form as named with the window.
func (f *formMatch) unfitStrength(x *fit) (barKind, string) {
	if f.form.Measure == inventory.ByCount {
		return "", ""
	}
	if x.strength <= 0 {
		return barNoData, "assay: no data; enter the lot's assay or the label's range"
	}
	accept := f.demand.accept
	if x.strength < accept.Least*(1-enough) {
		why := plainf("too weak: %.3g %%; the recipe asks for at least %.3g %%", x.strength.Percent(), accept.Least.Percent())
		if x.aged {
			why += plainf(" (label %.3g %%, less what it loses until %s)", float64(f.form.AssayLow)*100, f.req.On.Short())
		}
		return barWeak, why
	}
	if accept.Most > 0 && x.strength > accept.Most*(1+enough) {
		if accept.Solution {
			x.dilute = true
			return "", ""
		}
		return barStrong, plainf("too strong: %.3g %%; the recipe asks for at most %.3g %%", x.strength.Percent(), accept.Most.Percent())
	}
	return "", ""
}

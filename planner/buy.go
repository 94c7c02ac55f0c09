package planner

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"stillroom/chem"
	"stillroom/inventory"
)

// coming is what orders under way bring for a shortfall.
type coming struct {
	covers bool           // the orders cover what is short
	on     inventory.Date // the day on which they do
	text   string         // "the order of 2 packs from …, due …"
	late   float64        // chance that it comes after the run
}

// expected finds the orders under way that cover what is short, the earliest
// first. Orders for other runs don't count.
func (m *matcher) expected(c *coverage) coming {
	type arrival struct {
		order inventory.Order
		offer inventory.Offer
		pure  float64
	}
	var arrivals []arrival
	m.eachForm(&c.demand, func(f *formMatch) {
		for _, o := range m.shelf.OrdersOf(f.form.ID) {
			offer, ok := m.offer(f.form.ID, o.OfferID)
			if !ok || o.State != inventory.OrderUnderWay || o.RunID != 0 && o.RunID != m.req.Run {
				continue
			}
			if pure := f.purePack(offer); pure > 0 {
				arrivals = append(arrivals, arrival{o, offer, pure * float64(o.Packs)})
			}
		}
	})
	slices.SortStableFunc(arrivals, func(a, b arrival) int { return int(a.order.Due) - int(b.order.Due) })
	sum := 0.0
	for _, a := range arrivals {
		sum += a.pure
		if sum >= c.alloc.short*(1-enough) {
			due := max(a.order.Due, m.req.Today)
			return coming{true, due, fmt.Sprintf("the order from %s, due %s,", a.offer.Supplier, a.order.Due.Short()), m.lateChance(a.order, a.offer)}
		}
	}
	return coming{}
}

// lateChance is the chance that an order comes after the run, given that it
// hasn't come yet: lead times are taken as log-normal through the offer's
// median and its ninth decile (practice §5). Without a spread the due date holds.
func (m *matcher) lateChance(o inventory.Order, offer inventory.Offer) float64 {
	until := float64(m.req.On-o.Ordered) - m.policy.value("buy.receiving-days")
	gone := float64(m.req.Today - o.Ordered)
	if offer.LeadDays <= 0 || offer.LeadDays90 <= offer.LeadDays || until <= 0 || !o.Ordered.Set() {
		return float64(b2i(o.Due > m.req.On))
	}
	const ninthDecile = 1.2815515655446004 // of the standard normal distribution
	sigma := math.Log(float64(offer.LeadDays90)/float64(offer.LeadDays)) / ninthDecile
	after := func(days float64) float64 {
		if days <= 0 {
			return 1
		}
		return 0.5 * math.Erfc(math.Log(days/float64(offer.LeadDays))/sigma/math.Sqrt2)
	}
	if still := after(gone); still > 0 {
		return min(1, after(until)/still)
	}
	return 1
}

func (m *matcher) offer(formID, id int64) (inventory.Offer, bool) {
	for _, o := range m.shelf.OffersOf(formID) {
		if o.ID == id {
			return o, true
		}
	}
	return inventory.Offer{}, false
}

// eachForm calls do for every form, of the substance and of its substitutes,
// that is fit for the demand by form.
func (m *matcher) eachForm(d *demand, do func(*formMatch)) {
	each := func(s inventory.Substance, sub Substitute) {
		forms := m.shelf.FormsOf(s.ID)
		for i := range forms {
			f := formMatch{matcher: m, demand: d, form: &forms[i], sub: sub}
			if f.look(); f.kind == "" {
				do(&f)
			}
		}
	}
	if d.known {
		each(d.substance, Substitute{Factor: 1})
	}
	for _, sub := range d.accept.Substitutes {
		if s, ok := m.shelf.Substance(sub.Substance); ok && sub.Factor > 0 {
			each(s, sub)
		}
	}
}

// purePack is what a new pack of an offer gives the need, at the low end of the
// label; 0 if it is too weak, too strong or wouldn't keep until the run.
func (f *formMatch) purePack(o inventory.Offer) float64 {
	if o.PackSize <= 0 {
		return 0
	}
	x := fit{bottle: &inventory.Bottle{FormID: f.form.ID, Received: f.req.On}, form: f.form, content: f.content}
	f.strength(&x)
	if kind, _ := f.unfitStrength(&x); kind != "" {
		return 0
	}
	if o.ShelfLifeDays > 0 && f.req.Today.AddDays(o.LeadDays+o.ShelfLifeDays) < f.req.On {
		return 0
	}
	return x.pure * float64(o.PackSize)
}

// candidate is an offer against a shortfall.
type candidate struct {
	offer      inventory.Offer
	form       inventory.StockForm
	pure       float64 // in a pack
	arrives    inventory.Date
	orderBy    inventory.Date
	conversion string
}

// candidates lists the offers for a shortfall in one currency: those that
// arrive in time, else those that arrive first.
func (m *matcher) candidates(c *coverage) []candidate {
	var all []candidate
	receiving := int(m.policy.value("buy.receiving-days"))
	m.eachForm(&c.demand, func(f *formMatch) {
		for _, o := range m.shelf.OffersOf(f.form.ID) {
			pure := f.purePack(o)
			if pure <= 0 {
				continue
			}
			days := max(o.LeadDays, o.LeadDays90) + receiving
			all = append(all, candidate{
				offer: o, form: *f.form, pure: pure, conversion: f.conversion(),
				arrives: m.req.Today.AddDays(days), orderBy: m.req.On.AddDays(-days),
			})
		}
	})
	return m.inTimeOrFirst(oneCurrency(all))
}

// conversion says how the form differs from the pure substance, for the buyer.
func (f *formMatch) conversion() string {
	if f.sub.Substance != "" {
		return plainf("stands in for %s, %.4g g for 1 g", f.demand.name, f.sub.Factor)
	}
	if f.form.HydrateWaters > 0 {
		return plainf("a hydrate: %.4g g hold 1 g of anhydrous %s", 1/float64(f.anhydrous), f.demand.name)
	}
	return ""
}

// oneCurrency keeps the offers in the currency most of them have, ties by its
// code, because prices in two currencies can't be compared.
func oneCurrency(all []candidate) []candidate {
	count := map[string]int{}
	best := ""
	for _, c := range all {
		count[c.offer.Currency]++
	}
	for code, n := range count {
		if best == "" || n > count[best] || n == count[best] && code < best {
			best = code
		}
	}
	return slices.DeleteFunc(all, func(c candidate) bool { return c.offer.Currency != best })
}

func (m *matcher) inTimeOrFirst(all []candidate) []candidate {
	var inTime []candidate
	for _, c := range all {
		if c.arrives <= m.req.On {
			inTime = append(inTime, c)
		}
	}
	if len(inTime) > 0 || len(all) == 0 {
		return inTime
	}
	first := all[0].arrives
	for _, c := range all {
		first = min(first, c.arrives)
	}
	return slices.DeleteFunc(all, func(c candidate) bool { return c.arrives > first })
}

// buy finds the cheapest order for everything that is short and not on its way,
// all needs together because they share fees.
func (m *matcher) buy(covers []coverage) ([]Purchase, []Finding) {
	var needs []PackNeed
	var offers [][]candidate
	var of []int
	for i := range covers {
		c := &covers[i]
		if c.alloc.short <= 0 || c.coming.covers && c.coming.on <= m.req.On {
			continue
		}
		list := m.candidates(c)
		if len(list) == 0 {
			continue
		}
		needs = append(needs, packNeed(c.alloc.short, list))
		offers = append(offers, list)
		of = append(of, i)
	}
	if len(needs) == 0 {
		return nil, nil
	}
	order, err := CheapestPacks(needs)
	switch {
	case errors.Is(err, ErrPacksNotProven):
		return m.purchases(covers, of, offers, needs, order), []Finding{{Kind: "order-not-proven", Severity: Note, Text: "there were too many ways of buying to try them all; the order given may not be the cheapest"}}
	case err != nil:
		return nil, []Finding{{Kind: "no-order", Severity: Warning, Text: "no order could be worked out: " + err.Error(), Would: "order larger packs, or ask the supplier"}}
	}
	return m.purchases(covers, of, offers, needs, order), nil
}

func packNeed(short float64, list []candidate) PackNeed {
	n := PackNeed{Amount: short}
	for _, c := range list {
		o := PackOffer{
			Name: c.offer.Item, Supplier: c.offer.Supplier, Size: c.pure, Price: c.offer.PriceMinor,
			Fee: c.offer.OrderFee, Surcharge: c.offer.Surcharge, Least: c.offer.MinOrder,
		}
		for _, b := range c.offer.Breaks {
			o.Breaks = append(o.Breaks, PackBreak{b.From, b.PriceMinor})
		}
		n.Offers = append(n.Offers, o)
	}
	return n
}

// purchases writes the order down. What an order costs beside its goods is put
// to the first line of that supplier, so that the lines add up to the whole.
func (m *matcher) purchases(covers []coverage, of []int, offers [][]candidate, needs []PackNeed, order PackOrder) []Purchase {
	extra := orderExtras(needs, order)
	var out []Purchase
	for k, i := range of {
		c := &covers[i]
		for _, choice := range order.Choices[k] {
			cand := offers[k][choice.Offer]
			p := Purchase{
				Substance: c.demand.name, Offer: cand.offer, Form: cand.form, Packs: choice.Packs,
				Cost: needs[k].Offers[choice.Offer].total(choice.Packs), Currency: cand.offer.Currency,
				OrderBy: cand.orderBy, Arrives: cand.arrives, InTime: cand.arrives <= m.req.On,
			}
			p.Why = whyBuy(c, &cand, choice.Packs)
			if x, ok := extra[cand.offer.Supplier]; ok {
				p.Cost += x.cost
				p.Why += x.text
				delete(extra, cand.offer.Supplier)
			}
			if c.demand.count {
				p.LeftoverPieces = order.Left[k]
			} else {
				p.Leftover = chem.Mass(order.Left[k])
			}
			c.need.buys = append(c.need.buys, len(out))
			out = append(out, p)
		}
	}
	return out
}

func whyBuy(c *coverage, cand *candidate, packs int64) string {
	unit := "g"
	short := c.alloc.short * 1e3
	holds := cand.pure * float64(packs) * 1e3
	if c.demand.count {
		unit, short, holds = "pieces", c.alloc.short, cand.pure*float64(packs)
	}
	why := plainf("%.3g %s are short; %d of these hold %.3g %s", short, unit, packs, holds, unit)
	if cand.conversion != "" {
		why += "; " + cand.conversion
	}
	if cand.offer.ShelfLifeDays > 0 {
		why += fmt.Sprintf("; keeps until about %s", cand.arrives.AddDays(cand.offer.ShelfLifeDays).Short())
	}
	return why
}

// orderExtra is what a supplier's order costs beside the goods.
type orderExtra struct {
	cost int64
	text string
}

func orderExtras(needs []PackNeed, order PackOrder) map[string]orderExtra {
	type sum struct{ goods, fee, surcharge, least int64 }
	sums := map[string]*sum{}
	for k := range needs {
		for _, choice := range order.Choices[k] {
			o := needs[k].Offers[choice.Offer]
			s := sums[o.Supplier]
			if s == nil {
				s = &sum{}
				sums[o.Supplier] = s
			}
			s.goods += o.total(choice.Packs)
			s.fee, s.surcharge, s.least = max(s.fee, o.Fee), max(s.surcharge, o.Surcharge), max(s.least, o.Least)
		}
	}
	extras := map[string]orderExtra{}
	for supplier, s := range sums {
		x := orderExtra{cost: s.fee + s.surcharge + max(0, s.least-s.goods)}
		if s.fee > 0 {
			x.text += "; order fee included"
		}
		if s.surcharge > 0 {
			x.text += "; surcharge for hazardous goods included"
		}
		if s.least > s.goods {
			x.text += "; charged at the supplier's least order value"
		}
		extras[supplier] = x
	}
	return extras
}

package planner

import (
	"errors"
	"fmt"
	"math"

	"stillroom/chem"
)

// Replenishing stock that isn't bought for one planned run. The formulas are
// the textbook ones (S. Nahmias, Production and Operations Analysis):
// they hold for steady, independent demand, which a preparative lab hardly has,
// so that planned runs are netted one by one instead.

// errReplenish is the cause of a refusal here.
var errReplenish = errors.New("numbers must be finite and not negative")

// Demand is what is used and how long an order takes, in one unit of time.
type Demand struct {
	Mean, SD         float64 // per unit of time
	Lead, LeadSpread float64 // mean and standard deviation of the lead time
}

// SafetyStock is what is kept against chance until an order comes in,
//
//	z · √(L·σ² + d²·σ_L²)
//
// where z is the quantile of the service level, d and σ the demand's mean and
// standard deviation, L and σ_L those of the lead time.
func (d Demand) SafetyStock(service float64) (float64, error) {
	z, err := serviceQuantile(service)
	if err != nil {
		return 0, err
	}
	spread, err := d.spread()
	return z * spread, err
}

// spread is the standard deviation of the demand over the lead time.
func (d Demand) spread() (float64, error) {
	s := math.Sqrt(d.Lead*d.SD*d.SD + d.Mean*d.Mean*d.LeadSpread*d.LeadSpread)
	if !chem.Finite(s) || d.Mean < 0 || d.SD < 0 || d.Lead < 0 || d.LeadSpread < 0 {
		return 0, fmt.Errorf("demand %+v: %w", d, errReplenish)
	}
	return s, nil
}

// ReorderPoint is the stock at which to order: the demand over the lead time
// and the safety stock.
func (d Demand) ReorderPoint(service float64) (float64, error) {
	safety, err := d.SafetyStock(service)
	return d.Mean*d.Lead + safety, err
}

// Service is the service level that a safety stock gives.
func (d Demand) Service(safety float64) (float64, error) {
	spread, err := d.spread()
	switch {
	case err != nil:
		return 0, err
	case spread == 0:
		return 1, nil
	}
	return 0.5 * math.Erfc(-safety/spread/math.Sqrt2), nil
}

// serviceQuantile is the standard normal quantile of a service level.
func serviceQuantile(service float64) (float64, error) {
	if !(service > 0 && service < 1) {
		return 0, fmt.Errorf("service level %g: must lie between 0 and 1", service)
	}
	normal, err := chem.NewNormal(0, 1)
	if err != nil {
		return 0, err
	}
	return normal.Quantile(service), nil
}

// EconomicOrder is the order quantity at which the cost of ordering and of
// holding balance, √(2·D·S/H), for a yearly demand D, a cost per order S and a
// cost H of holding one unit for a year.
func EconomicOrder(demand, perOrder, holding float64) (float64, error) {
	q := math.Sqrt(2 * demand * perOrder / holding)
	if !chem.Finite(q) || demand < 0 || perOrder < 0 || holding <= 0 {
		return 0, fmt.Errorf("demand %g, order cost %g, holding cost %g: %w, the last above 0", demand, perOrder, holding, errReplenish)
	}
	return q, nil
}

// UnitBreak is a unit price from a quantity on.
type UnitBreak struct{ From, Price float64 }

// EconomicOrderWithBreaks tries each price's own best quantity, raised to the
// break if it falls below, dropped if it lies at or above the next, and returns
// the one of least cost a year, D·P + S·D/Q + r·P·Q/2, with r the rate of holding
// cost. Breaks rise by From.
func EconomicOrderWithBreaks(demand, perOrder, rate float64, breaks []UnitBreak) (quantity, cost float64, err error) {
	cost = math.Inf(1)
	for i, b := range breaks {
		q, err := EconomicOrder(demand, perOrder, rate*b.Price)
		if err != nil {
			return 0, 0, err
		}
		q = max(q, b.From)
		if i+1 < len(breaks) && q >= breaks[i+1].From {
			continue
		}
		if c := demand*b.Price + perOrder*demand/q + rate*b.Price*q/2; c < cost {
			quantity, cost = q, c
		}
	}
	if len(breaks) == 0 {
		return 0, 0, errors.New("no price given")
	}
	return quantity, cost, nil
}

// OneSeason is the quantity to buy once of what can't be bought again and loses
// value, for a normal demand: F⁻¹(cᵤ/(cᵤ+cₒ)) with cᵤ = price − cost and cₒ =
// cost − salvage.
func OneSeason(cost, price, salvage, mean, sd float64) (float64, error) {
	under, over := price-cost, cost-salvage
	if !(under > 0) || !(over > 0) {
		return 0, fmt.Errorf("cost %g, price %g, salvage %g: the price must lie above the cost and the salvage below it", cost, price, salvage)
	}
	normal, err := chem.NewNormal(mean, sd)
	if err != nil {
		return 0, err
	}
	return normal.Quantile(under / (under + over)), nil
}

// NetRequirements nets what each period asks against what is on hand and what
// arrives, period by period, lot for lot: net = max(0, asked − what is left).
func NetRequirements(onHand float64, arrives, asked []float64) []float64 {
	net := make([]float64, len(asked))
	for t := range asked {
		if t < len(arrives) {
			onHand += arrives[t]
		}
		net[t] = max(0, asked[t]-onHand)
		onHand = max(0, onHand-asked[t])
	}
	return net
}

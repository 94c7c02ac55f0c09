package planner

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// demand is a need before any bottle has been looked at: what the asks of one
// substance come to.
type demand struct {
	name, cas, formula string
	substance          inventory.Substance // as the shelf has it
	known              bool                // the shelf has it
	molar              chem.MolarMass      // of the pure, anhydrous substance; 0 for none
	accept             Accept
	count              bool
	who                string // the substance, as the asks are told apart by it
	apart              string // why it isn't one need with the substance's other asks; "" if it is
	// amount is in kilograms of pure, anhydrous substance or in pieces.
	amount float64
	asks   []int // into the asks of the walk
	// charges are the amounts of the asks.
	charges []float64
	key     string // of its matches
	alone   bool   // no other demand shares its substance, and it has no substitutes
}

// unknownMolar is for what has no formula, such as filter aid.
const unknownMolar chem.MolarMass = 0

// demandsOf sums asks by substance, in the order in which the substances are
// first asked for. Only what all asks of a substance accept may be drawn for
// it; asks that have nothing in common are demands of their own.
func demandsOf(asks []Ask, shelf *inventory.Shelf) ([]demand, error) {
	var demands []demand
	for i := range asks {
		ask := &asks[i]
		if !chem.Finite(ask.Pure) || ask.Pure < 0 || !(ask.Pieces >= 0) {
			return nil, fmt.Errorf("step %d (%s): the charge of %s is %g g, %g pieces: not an amount",
				ask.Step, ask.StepName, ask.Substance, ask.Pure.Grams(), ask.Pieces)
		}
		substance, known := lookUp(shelf, ask)
		asked := newDemand(ask, substance, known)
		at := together(demands, &asked)
		if at < 0 {
			at = len(demands)
			demands = append(demands, asked)
		}
		d := &demands[at]
		d.asks = append(d.asks, i)
		d.charges = append(d.charges, amountOf(ask))
		d.amount += amountOf(ask)
	}
	for i := range demands {
		demands[i].key = demands[i].matchKey()
	}
	markAlone(demands)
	return demands, nil
}

// together finds the first demand that asks for the same substance and shares
// stock with what is asked now, and narrows it to that; -1 for none. Demands
// that share none keep the reason.
func together(demands []demand, asked *demand) int {
	for i := range demands {
		d := &demands[i]
		if d.who != asked.who || d.count != asked.count {
			continue
		}
		both, clash := inCommon(d.accept, asked.accept)
		if clash == "" {
			d.accept = both
			return i
		}
		d.apart, asked.apart = firstOf(d.apart, clash), firstOf(asked.apart, clash)
	}
	return -1
}

// markAlone finds the demands whose bottles no other demand can want.
func markAlone(demands []demand) {
	wanted := map[int64]int{}
	for i := range demands {
		wanted[demands[i].substance.ID]++
	}
	for i := range demands {
		d := &demands[i]
		d.alone = d.known && wanted[d.substance.ID] == 1 && len(d.accept.Substitutes) == 0
		for k := range demands {
			if len(demands[k].accept.Substitutes) > 0 && k != i {
				d.alone = false // it may be a substitute for the other
			}
		}
	}
}

func amountOf(ask *Ask) float64 {
	if ask.Pieces > 0 {
		return ask.Pieces
	}
	return float64(ask.Pure)
}

// lookUp finds an ask's substance on the shelf by its CAS number, else by name.
func lookUp(shelf *inventory.Shelf, ask *Ask) (inventory.Substance, bool) {
	if ask.CAS != "" {
		if s, ok := shelf.Substance(ask.CAS); ok {
			return s, true
		}
	}
	return shelf.Substance(ask.Substance)
}

func newDemand(ask *Ask, substance inventory.Substance, known bool) demand {
	d := demand{
		name: ask.Substance, cas: ask.CAS, formula: ask.Formula, accept: ask.Accept,
		count: ask.Pieces > 0, substance: substance, known: known, molar: molarOf(ask, substance),
		who: strings.ToLower(firstOf(ask.CAS, ask.Substance)),
	}
	if known {
		d.who = "#" + strconv.FormatInt(substance.ID, 10)
		d.name = substance.Name
		d.cas = firstOf(d.cas, substance.CAS)
		d.formula = firstOf(d.formula, substance.Formula)
	}
	return d
}

func firstOf(texts ...string) string {
	for _, t := range texts {
		if t != "" {
			return t
		}
	}
	return ""
}

// molarOf takes the molar mass the walk-through used, so that mass and amount
// of a need agree; else that of the formula.
func molarOf(ask *Ask, substance inventory.Substance) chem.MolarMass {
	if ask.Amount > 0 && ask.Pure > 0 {
		return chem.MolarMass(float64(ask.Pure) / float64(ask.Amount))
	}
	f, err := chem.ParseFormula(firstOf(ask.Formula, substance.Formula))
	if err != nil {
		return unknownMolar
	}
	return f.MolarMass()
}

// matchKey is the same for demands that the same bottles fit: the substance,
// what may stand for it, and whether it is counted.
func (d *demand) matchKey() string {
	a := &d.accept
	return fmt.Sprintf("%s|%t|%g|%g|%t|%t|%q|%t|%v", d.who, d.count,
		a.Least, a.Most, a.Hydrate, a.Solution, a.Grades, a.WithAdditive, a.Substitutes)
}

// need writes down what a demand asks, before it is matched.
func (d *demand) need(asks []Ask) Need {
	n := Need{
		Substance: d.name, CAS: d.cas, Formula: d.formula, Count: d.count,
		ChanceShort: -1, Hidden: true,
	}
	if d.count {
		n.Pieces = d.amount
	} else {
		n.Mass = chem.Mass(d.amount)
		if d.molar > 0 {
			n.Amount = d.molar.Of(n.Mass)
		}
	}
	for _, i := range d.asks {
		ask := &asks[i]
		if !slices.Contains(n.For, ask.StepName) {
			n.For = append(n.For, ask.StepName)
		}
		n.Exact = n.Exact || ask.Exact
		if !ask.Hidden {
			n.Hidden = false
			continue
		}
		n.Parts = append(n.Parts, HiddenPart{Key: ask.Key, Why: ask.Why, Step: ask.Step, Mass: ask.Pure, Pieces: ask.Pieces})
	}
	if n.Hidden && len(n.Parts) > 0 {
		n.Key, n.Why = n.Parts[0].Key, n.Parts[0].Why
	}
	n.Derivation = d.derivation(asks)
	return n
}

// derivation shows the sum over the charges.
func (d *demand) derivation(asks []Ask) chem.Derivation {
	out := chem.Derivation{Of: d.name, Formula: "m = Σ mᵢ over the charges", Unit: "g", Source: "sum of the walk-through's charges"}
	scale := 1e3
	if d.count {
		out.Formula, out.Unit, scale = "N = Σ Nᵢ over the charges", "", 1
	}
	terms := make([]string, len(d.asks))
	for k, i := range d.asks {
		v := amountOf(&asks[i]) * scale
		terms[k] = plainf("%.4g", v)
		out.Inputs = append(out.Inputs, chem.Input{
			Symbol: fmt.Sprint("charge ", k+1), Name: asks[i].StepName, Value: v, Unit: out.Unit,
			Source: fmt.Sprintf("step %d of the recipe, %s", asks[i].Step, firstOf(asks[i].Rule, "as written")),
		})
	}
	out.Value = d.amount * scale
	out.Inserted = plainf("%s = %.4g %s", strings.Join(terms, " + "), out.Value, out.Unit)
	return out
}

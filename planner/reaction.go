package planner

import (
	"fmt"
	"math"
	"slices"

	"stillroom/chem"
)

// reactionOf is a reaction between components: numbers are negative for what
// it consumes.
type reactionOf struct {
	name  string
	terms []reactionTerm
	key   int // the component the conversion and the enthalpy refer to
	// enthalpy is per mole of key in J/mol; known is false if there is none.
	enthalpy       float64
	known          bool
	enthalpySource string
}

type reactionTerm struct {
	component int
	number    float64
}

func (x *reactionOf) numberOf(component int) float64 {
	for _, t := range x.terms {
		if t.component == component {
			return t.number
		}
	}
	return 0
}

// reactions enters the reactions and refuses those that don't balance.
func (c *compiler) reactions() error {
	for _, r := range c.r.Reactions {
		x := reactionOf{name: r.Name}
		for _, t := range r.Consumes {
			x.add(c.index[t.Substance], -t.Number)
		}
		for _, t := range r.Forms {
			x.add(c.index[t.Substance], t.Number)
		}
		if len(r.Consumes) == 0 {
			return c.refuse(ErrUnbalanced, "reaction "+r.Name+" consumes nothing", "list what it consumes")
		}
		x.key = c.index[r.Consumes[0].Substance]
		if err := c.checkBalance(&x); err != nil {
			return err
		}
		if err := c.enthalpy(&x, r); err != nil {
			return err
		}
		c.p.reactions = append(c.p.reactions, x)
	}
	return nil
}

func (x *reactionOf) add(component int, number float64) {
	for i := range x.terms {
		if x.terms[i].component == component {
			x.terms[i].number += number
			return
		}
	}
	x.terms = append(x.terms, reactionTerm{component, number})
}

// balanceTolerance is how far apart two sides may be, relative to the larger:
// coefficients in files are short decimals, so a true balance is exact up to
// float64 rounding.
const balanceTolerance = 1e-9

// checkBalance sums every element and the charge over a reaction.
func (c *compiler) checkBalance(x *reactionOf) error {
	sums, sizes := map[string]float64{}, map[string]float64{}
	for _, t := range x.terms {
		m := &c.p.matter[t.component]
		for _, e := range m.formula.Elements() {
			sums[e.Symbol] += t.number * e.Count
			sizes[e.Symbol] += math.Abs(t.number) * e.Count
		}
		sums["charge"] += t.number * m.charge
		sizes["charge"] += math.Abs(t.number * m.charge)
	}
	var names []string
	for name := range sums {
		names = append(names, name)
	}
	slices.Sort(names)
	for _, name := range names {
		if math.Abs(sums[name]) > balanceTolerance*math.Max(sizes[name], 1) {
			return &StepError{Recipe: c.r.Name, Step: c.firstUse(x.name), Name: "reaction " + x.name, Err: ErrUnbalanced,
				What:  fmt.Sprintf("reaction %s doesn't balance: %s differs by %+.6g (right minus left)", x.name, name, sums[name]),
				Would: "correct its stoichiometric numbers"}
		}
	}
	return nil
}

// firstUse returns the number of the first step that names a reaction, 0 for none.
func (c *compiler) firstUse(reaction string) int {
	for _, s := range c.r.Steps {
		used := false
		s.spec.names(func(kind, name string, _ place) { used = used || kind == "reaction" && name == reaction })
		if used {
			return s.N
		}
	}
	return 0
}

// enthalpy takes the stated enthalpy, or computes one from the ionic equation.
func (c *compiler) enthalpy(x *reactionOf, r Reaction) error {
	if r.EnthalpySource != "" {
		x.enthalpy, x.known, x.enthalpySource = float64(r.Enthalpy), true, r.EnthalpySource
		return nil
	}
	if len(r.IonsConsumed) == 0 {
		return nil
	}
	h, source, err := ionicEnthalpy(r.IonsConsumed, r.IonsFormed)
	if err != nil {
		return c.refuse(ErrNoData, fmt.Sprintf("reaction %s in ions: %v", r.Name, err), "state enthalpy: with its source, or leave ions: out")
	}
	x.enthalpy, x.known, x.enthalpySource = h, true, source
	return nil
}

// component finds a reaction by name.
func (p *Program) reaction(name string) int {
	return slices.IndexFunc(p.reactions, func(x reactionOf) bool { return x.name == name })
}

// react carries a reaction to an extent in mol in vessel v, taking each
// component from whatever phase holds it and putting what forms into its own
// phase. It returns the heat given off in joules.
func (w *Workspace) react(x *reactionOf, v int, extent float64) float64 {
	if extent == 0 {
		return 0
	}
	w.dirty[v] = true
	for _, t := range x.terms {
		n := float64(t.number * extent)
		if n < 0 {
			w.consume(v, t.component, -n)
			continue
		}
		w.amounts[w.at(v, w.p.matter[t.component].home, t.component)] += n
	}
	if !x.known {
		return 0
	}
	return -x.enthalpy * extent * -x.numberOf(x.key)
}

// mostExtent returns the extent at which the scarcest component is used up,
// and that component.
func (w *Workspace) mostExtent(x *reactionOf, v int) (extent float64, scarce int) {
	extent, scarce = math.Inf(1), x.key
	for _, t := range x.terms {
		if t.number >= 0 {
			continue
		}
		if e := w.total(v, t.component) / -t.number; e < extent {
			extent, scarce = e, t.component
		}
	}
	return extent, scarce
}

func (c *compiler) reactionIndex(name string) (int, error) {
	i := c.p.reaction(name)
	if i < 0 {
		return 0, c.refuse(ErrNoData, fmt.Sprintf("reaction %q isn't declared", name), "declare it under reactions:")
	}
	return i, nil
}

// heatText says a heat in words.
func heatText(q chem.Energy) string {
	if q < 0 {
		return plainf("takes up %.3g kJ", -q.Kilojoules())
	}
	return plainf("gives off %.3g kJ", q.Kilojoules())
}

package planner

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"stillroom/chem"
)

// Program is a recipe with every name looked up once, ready to be walked
// through at any scale. It is never changed after Compile; any number of
// goroutines may walk it.
type Program struct {
	Recipe *Recipe

	matter   []matter
	elements []string
	// places are the recipe's vessels, then air and product, then the waste
	// streams and other places where matter ends.
	places  []string
	vessels int // how many of them are vessels
	steps   []compiledStep
	asks    []Ask // the asks without their amounts
	factors []factor

	water, product, limiting int
	perLimiting              float64
	reactions                []reactionOf
	exchanges                []exchange
	acids                    []acidOf
	acidIndex                []int
	partition                [][]float64 // [solute][solvent]: c_org/c_aq of the neutral form; NaN for none
	carbonic                 int
	yieldFactor              int
	yield                    chem.Dist // of the recipe's yield, unless yieldErr says why not
	yieldErr                 error
	salting                  []float64  // by component: salting-out constant in L/mol
	mutual                   []mutualOf // by solvent
	dilutions                []dilutionOf
	notes                    []Finding // what had to be estimated
}

type compiledStep struct {
	Step
	vessel int
	run    runner
}

// StepError is a step that can't be done, or a recipe that can't be compiled.
type StepError struct {
	Recipe string
	Step   int // 0 for the whole recipe
	Name   string
	What   string // with the number that decides
	Would  string // the nearest thing that works
	Err    error
}

// Error returns the step, what doesn't hold and what would do.
func (e *StepError) Error() string {
	s := fmt.Sprintf("%s: %s", e.Recipe, e.What)
	if e.Step > 0 {
		s = fmt.Sprintf("%s, step %d (%s): %s", e.Recipe, e.Step, e.Name, e.What)
	}
	if e.Would != "" {
		s += "; " + e.Would
	}
	return s
}

// Unwrap returns the kind of the refusal.
func (e *StepError) Unwrap() error { return e.Err }

// Kinds of refusal.
var (
	ErrUnbalanced  = errors.New("not balanced")
	ErrEmptyVessel = errors.New("empty vessel")
	ErrOnePhase    = errors.New("one phase only")
	ErrPH          = errors.New("pH out of reach")
	ErrRecovery    = errors.New("recovery out of reach")
	ErrUnsuitable  = errors.New("unsuitable drying agent")
	ErrNoData      = errors.New("no data")
	ErrScale       = errors.New("scale out of range")
)

// compiler looks names up and collects them.
type compiler struct {
	r     *Recipe
	p     *Program
	step  *Step
	index map[string]int
	place map[string]int
}

// Compile looks up every substance, vessel and reaction of a recipe and checks
// that its reactions balance. The error is a *StepError, or several joined.
func Compile(r *Recipe) (*Program, error) {
	c := &compiler{r: r, p: &Program{Recipe: r}, index: map[string]int{}, place: map[string]int{}}
	var faults []error
	note := func(err error) {
		if err != nil {
			faults = append(faults, err)
		}
	}
	note(c.names())
	note(c.reactions())
	if len(faults) > 0 {
		return nil, errors.Join(faults...)
	}
	c.addExchanges()
	c.addYield()
	for i := range r.Steps {
		s := &r.Steps[i]
		c.step = s
		run, err := s.spec.compile(c)
		note(err)
		c.p.steps = append(c.p.steps, compiledStep{*s, c.place[s.Vessel], run})
	}
	if len(faults) > 0 {
		return nil, errors.Join(faults...)
	}
	c.addElements()
	c.addPhases()
	c.addDilutions()
	c.noteGaps()
	note(c.theory())
	return c.p, errors.Join(faults...)
}

// refuse makes a *StepError of the step being compiled.
func (c *compiler) refuse(kind error, what, would string) error {
	e := &StepError{Recipe: c.r.Name, What: what, Would: would, Err: kind}
	if c.step != nil {
		e.Step, e.Name = c.step.N, c.step.Name
	}
	return e
}

// names enters the vessels and every substance, water first.
func (c *compiler) names() error {
	for _, v := range c.r.Vessels {
		c.place[v.Name] = len(c.p.places)
		c.p.places = append(c.p.places, v.Name)
	}
	c.p.vessels = len(c.p.places)
	c.sink("air")
	c.sink("product")
	var faults []error
	enter := func(name string) int {
		i, err := c.component(name)
		if err != nil {
			faults = append(faults, err)
		}
		return i
	}
	c.p.water = enter(waterName)
	c.p.limiting = enter(c.r.Limiting)
	c.p.product = enter(c.r.Product)
	for _, x := range c.r.Reactions {
		for _, t := range slices.Concat(x.Consumes, x.Forms) {
			enter(t.Substance)
		}
	}
	for i := range c.r.Steps {
		c.step = &c.r.Steps[i]
		c.r.Steps[i].spec.names(func(kind, name string, _ place) {
			if kind == "substance" {
				enter(name)
			}
		})
	}
	c.step = nil
	return errors.Join(faults...)
}

// component returns the index of a substance, entering it when it is new.
func (c *compiler) component(name string) (int, error) {
	if i, ok := c.index[name]; ok {
		return i, nil
	}
	m, err := findMatter(c.r, name)
	if err != nil {
		return 0, c.refuse(ErrNoData, err.Error(), "")
	}
	for i := range c.p.matter {
		if m.cas != "" && c.p.matter[i].cas == m.cas {
			c.index[name] = i
			return i, nil
		}
	}
	c.p.matter = append(c.p.matter, m)
	c.index[name] = len(c.p.matter) - 1
	return len(c.p.matter) - 1, nil
}

// sink returns the index of a place that isn't a vessel.
func (c *compiler) sink(name string) int {
	if i, ok := c.place["\x00"+name]; ok {
		return i
	}
	i := len(c.p.places)
	c.place["\x00"+name] = i
	c.p.places = append(c.p.places, name)
	return i
}

// air and productPlace are the sinks every program has.
func (p *Program) air() int          { return p.vessels }
func (p *Program) productPlace() int { return p.vessels + 1 }

func (c *compiler) addElements() {
	index := map[string]int{}
	for i := range c.p.matter {
		m := &c.p.matter[i]
		m.elements = nil
		for _, e := range m.formula.Elements() {
			k, ok := index[e.Symbol]
			if !ok {
				k = len(c.p.elements)
				index[e.Symbol] = k
				c.p.elements = append(c.p.elements, e.Symbol)
			}
			m.elements = append(m.elements, elementAmount{k, e.Count})
		}
	}
}

// theory works out how much product the limiting reagent gives at most, along
// the reactions of the recipe.
func (c *compiler) theory() error {
	p := c.p
	p.perLimiting = p.yieldAlong(p.limiting, map[int]bool{})
	if p.perLimiting > 0 {
		return nil
	}
	c.step = nil
	return c.refuse(ErrUnbalanced, fmt.Sprintf("no reaction leads from %s to %s", c.r.Limiting, c.r.Product), "add the reaction under reactions:")
}

// yieldAlong follows reactions from component i to the product and returns the
// most product per mole of i.
func (p *Program) yieldAlong(i int, seen map[int]bool) float64 {
	if i == p.product {
		return 1
	}
	seen[i] = true
	best := 0.0
	for k := range p.reactions {
		best = math.Max(best, p.yieldBy(&p.reactions[k], i, seen))
	}
	for k := range p.exchanges {
		best = math.Max(best, p.yieldBy(&p.exchanges[k].reactionOf, i, seen))
	}
	delete(seen, i)
	return best
}

func (p *Program) yieldBy(x *reactionOf, i int, seen map[int]bool) float64 {
	from, best := x.numberOf(i), 0.0
	if from >= 0 {
		return 0
	}
	for _, t := range x.terms {
		if t.number > 0 && !seen[t.component] && t.component != p.water {
			best = math.Max(best, p.yieldAlong(t.component, seen)*t.number/-from)
		}
	}
	return best
}

// IsStep returns the *StepError in err, or nil if there is none.
func IsStep(err error) *StepError {
	var step *StepError
	if errors.As(err, &step) {
		return step
	}
	return nil
}

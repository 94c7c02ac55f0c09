package planner

import (
	"math"
	"strings"
)

// noteGaps says what the walk lacks data for and what it takes instead, so that
// nothing is replaced in silence.
func (c *compiler) noteGaps() {
	c.gap("no-density", "no density of %s: the volume is counted as that of as much water", "state density: under substances:",
		func(m *matter) bool {
			return m.home != gas && m.density == 0 && m.inWater == nil && m.cas != waterNumber
		})
	c.gap("no-heat-capacity", "no heat capacity of %s, which counts as nothing: heats to warm or cool are too low, rises without cooling too high", "measure it, or allow for it",
		func(m *matter) bool { return m.liquid && m.cp == 0 })
	c.gap("no-partition", "no partition data of %s: counted as staying in its own layer", "allow for what goes into the other layer", c.unparted)
	c.gap("no-boiling-point", "no boiling point of %s: counted as staying in the pot of every distillation", "state boiling: under substances:",
		func(m *matter) bool { return m.home == organic && m.boiling == 0 })
}

// gap enters one finding for all components that have it.
func (c *compiler) gap(kind, text, would string, lacks func(*matter) bool) {
	var names []string
	for i := range c.p.matter {
		if m := &c.p.matter[i]; lacks(m) {
			names = append(names, m.name)
		}
	}
	if len(names) == 0 {
		return
	}
	c.p.notes = append(c.p.notes, Finding{Kind: kind, Severity: Note, Text: strings.Replace(text, "%s", strings.Join(names, ", "), 1), Would: would})
}

// unparted reports whether a substance that could go between layers has no
// partition coefficient with any solvent of the recipe.
func (c *compiler) unparted(m *matter) bool {
	if !m.distributes() {
		return false
	}
	i := c.find(m.cas)
	if i < 0 {
		return true
	}
	others := false
	for j := range c.p.matter {
		if j == i || c.p.matter[j].home != organic {
			continue
		}
		others = true
		if !math.IsNaN(c.p.partition[i][j]) {
			return false
		}
	}
	return others
}

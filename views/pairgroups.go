package views

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// A pairGroup is what must not meet one substance, by what would come of it.
type pairGroup struct {
	With  string
	Kinds []pairKind
}

// A pairKind is the partners of a substance with the same consequence. Partners
// that the recipe brings together with it on purpose name the step.
type pairKind struct {
	Consequences, Note string
	Partners           []partner
}

// A partner is met in a step, 0 for in none.
type partner struct {
	Name string
	Step int
}

// pairGroups are the pairs that must not meet in the order they are read: those
// that end in fire, explosion, violent polymerisation or a gas that poisons or
// burns, and those that nobody assessed; then those that only warm up, fizz or
// dissolve something toxic.
type pairGroups struct{ Grave, Mild []pairGroup }

// groupPairs groups the pairs of a plan by the partner that occurs in most of
// them, so that each pair is said once and in few lines.
func groupPairs(p *planner.Plan) pairGroups {
	var graves, milds []chem.Incompatibility
	for _, pair := range p.Pairs {
		if grave(pair) {
			graves = append(graves, pair)
		} else {
			milds = append(milds, pair)
		}
	}
	meet := meetings(p.Steps)
	return pairGroups{groupByPartner(graves, meet), groupByPartner(milds, meet)}
}

// grave tells the pairs that are read first from those that only warm up, fizz
// or dissolve.
func grave(p chem.Incompatibility) bool {
	return slices.ContainsFunc(p.Codes, func(code string) bool { return code != "H" && code != "G" && code != "S" })
}

// groupByPartner takes the partner with the most pairs left, over and over. The
// pairs come with the gravest first; so do the groups, and the kinds of a group.
func groupByPartner(pairs []chem.Incompatibility, meet func(a, b string) int) []pairGroup {
	type placed struct {
		pairGroup
		first int
	}
	var groups []placed
	taken := make([]bool, len(pairs))
	for left := len(pairs); left > 0; {
		g := placed{pairGroup{With: busiest(pairs, taken)}, -1}
		for i, pair := range pairs {
			if taken[i] || pair.A != g.With && pair.B != g.With {
				continue
			}
			if g.first < 0 {
				g.first = i
			}
			taken[i] = true
			left--
			g.take(pair, meet(pair.A, pair.B))
		}
		groups = append(groups, g)
	}
	slices.SortStableFunc(groups, func(a, b placed) int { return a.first - b.first })
	list := make([]pairGroup, len(groups))
	for i, g := range groups {
		list[i] = g.pairGroup
	}
	return list
}

// busiest is the substance in most of the pairs that aren't taken, the one
// listed first among equals.
func busiest(pairs []chem.Incompatibility, taken []bool) string {
	count := map[string]int{}
	for i, pair := range pairs {
		if !taken[i] {
			count[pair.A]++
			count[pair.B]++
		}
	}
	best, most := "", 0
	for i, pair := range pairs {
		if taken[i] {
			continue
		}
		for _, name := range []string{pair.A, pair.B} {
			if count[name] > most {
				best, most = name, count[name]
			}
		}
	}
	return best
}

// take adds a pair that meets in a step, 0 for none.
func (g *pairGroup) take(pair chem.Incompatibility, step int) {
	with := partner{pair.A, step}
	if with.Name == g.With {
		with.Name = pair.B
	}
	for i := range g.Kinds {
		if k := &g.Kinds[i]; k.Consequences == pair.Consequences && k.Note == pair.Note {
			k.Partners = append(k.Partners, with)
			return
		}
	}
	g.Kinds = append(g.Kinds, pairKind{pair.Consequences, pair.Note, []partner{with}})
}

// Text is a kind in words: what would come of it, with what, and the remark.
func (k pairKind) Text() string {
	text := k.Consequences + ": with " + k.with(" (step\u00a0%d, controlled)")
	if k.Note != "" {
		text += "; " + k.Note
	}
	return sentence(text)
}

// with lists the partners, with the step that brings them together if there is
// one.
func (k pairKind) with(step string) string {
	names := make([]string, len(k.Partners))
	for i, p := range k.Partners {
		names[i] = p.Name
		if p.Step > 0 {
			names[i] += fmt.Sprintf(step, p.Step)
		}
	}
	return strings.Join(names, ", ")
}

// mildText is the closing paragraph: the pairs that only warm up, fizz or
// dissolve, by what they do.
func mildText(groups []pairGroup) string {
	var kinds []string
	byKind, remarks := map[string][]string{}, map[string][]string{}
	for _, g := range groups {
		for _, k := range g.Kinds {
			if _, ok := byKind[k.Consequences]; !ok {
				kinds = append(kinds, k.Consequences)
			}
			pairs := g.With + " with " + k.with(" (%d)")
			byKind[k.Consequences] = append(byKind[k.Consequences], pairs)
			if k.Note != "" {
				remarks[k.Consequences] = appendOnce(remarks[k.Consequences], k.Note)
			}
		}
	}
	var words []string
	for _, kind := range kinds {
		words = append(words, sentence(kind+": "+strings.Join(slices.Concat(byKind[kind], remarks[kind]), "; ")))
	}
	return strings.Join(words, " ")
}

// meetings answers in which step the recipe brings two substances together for
// the first time, 0 for in none: what a step adds, with what is from one per cent
// on, as on the papers, of what is in its vessel then or in the step before.
func meetings(steps []planner.StepReport) func(a, b string) int {
	type gathering struct {
		step  int
		names map[string]bool
	}
	var all []gathering
	held := map[string][]planner.Content{}
	for _, s := range steps {
		g := gathering{s.N, map[string]bool{}}
		for _, contents := range [][]planner.Content{held[s.Vessel.Name], s.Contents} {
			total := chem.Mass(0)
			for _, c := range contents {
				total += c.Mass
			}
			for _, c := range contents {
				if c.Mass >= 0.01*total {
					g.names[recordName(c.Substance)] = true
				}
			}
		}
		for _, a := range s.Adds {
			g.names[recordName(a.Substance)] = true
		}
		held[s.Vessel.Name] = s.Contents
		if s.Do == "discard" {
			delete(held, s.Vessel.Name)
		}
		all = append(all, g)
	}
	return func(a, b string) int {
		a, b = recordName(a), recordName(b)
		for _, g := range all {
			if g.names[a] && g.names[b] {
				return g.step
			}
		}
		return 0
	}
}

// recordName is the name of the record of a substance, or the name itself.
func recordName(name string) string {
	if s, ok := chem.LookupSubstance(name); ok {
		return s.Name
	}
	return name
}

package chem

import (
	"slices"
	"sort"
	"strconv"
	"strings"
	"sync"
)

// Reactant is what the compatibility chart needs to know of a substance.
type Reactant struct {
	Name    string
	Formula string
	// Groups are reactivity groups of EPA-600/2-80-076.
	Groups []int
	// Assessed says that somebody put the substance into groups, perhaps into
	// none. Without it the substance counts as unknown.
	Assessed bool
}

// ReactantNamed returns a substance as the chart sees it: its groups from the
// table of groups and those given, which a substance record may hold.
func ReactantNamed(name, formula string, groups ...int) Reactant {
	r := Reactant{Name: name, Formula: formula, Groups: slices.Clone(groups), Assessed: len(groups) > 0}
	if listed, ok := listedGroups(name); ok {
		r.Assessed = true
		for _, g := range listed {
			if !slices.Contains(r.Groups, g) {
				r.Groups = append(r.Groups, g)
			}
		}
	}
	slices.Sort(r.Groups)
	return r
}

// listedGroups finds the groups of the table of groups by name.
func listedGroups(name string) ([]int, bool) {
	key := substanceKey(name)
	if strings.HasPrefix(key, "nitricacid") {
		key = "nitricacidle70"
	}
	if groups, ok := substanceGroups()[key]; ok {
		return groups, ok
	}
	// A hydrate reacts as the substance it is a hydrate of.
	if name, hydrate := strings.CutSuffix(name, "hydrate"); hydrate {
		if i := strings.LastIndex(name, " "); i > 0 {
			groups, ok := substanceGroups()[substanceKey(name[:i])]
			return groups, ok
		}
	}
	return nil, false
}

var substanceGroups = sync.OnceValue(func() map[string][]int {
	byKey := map[string][]int{}
	for _, row := range readTable("substance_groups.csv") {
		var groups []int
		for g := range strings.FieldsSeq(row.text("epa_groups")) {
			n, err := strconv.Atoi(g)
			if err != nil {
				panic("chem: substance_groups.csv: group " + g)
			}
			groups = append(groups, n)
		}
		byKey[substanceKey(row.text("substance_id"))] = groups
	}
	return byKey
})

// chartRow is a pair of groups of the EPA chart that must not meet.
type chartRow struct {
	a, b         int
	nameA, nameB string
	codes        []string
	note, source string
}

var epaChart = sync.OnceValue(func() []chartRow {
	var rows []chartRow
	for _, row := range readTable("incompatibility.csv") {
		if row.text("chart") != "EPA" {
			continue
		}
		a, errA := strconv.Atoi(row.text("group_a"))
		b, errB := strconv.Atoi(row.text("group_b"))
		if errA != nil || errB != nil {
			panic("chem: incompatibility.csv: groups " + row.text("group_a") + ", " + row.text("group_b"))
		}
		rows = append(rows, chartRow{a, b, row.text("group_a_name"), row.text("group_b_name"), strings.Fields(row.text("codes")), row.text("note"), row.text("source")})
	}
	return rows
})

// waterReactive is the chart's group of which nothing may come near: row 107.
const waterReactive = 107

// IncompatibleReactants returns the pairs of reactants that must not meet, the
// gravest consequences first: every pair by the chart of EPA-600/2-80-076, and
// by the supplementary rows for chemistry that the chart's groups miss. A
// reactant that nobody assessed is listed with code U, "may be hazardous but
// unknown": a pair that is absent is not evidence that the pair is harmless.
func IncompatibleReactants(rs []Reactant) []Incompatibility {
	var found []Incompatibility
	for i, a := range rs {
		for _, b := range rs[i+1:] {
			if a.Name == b.Name {
				continue
			}
			if inc, ok := pairOf(a, b, rs); ok {
				found = append(found, inc)
			}
		}
	}
	for _, r := range rs {
		if !r.Assessed {
			found = append(found, Incompatibility{A: r.Name, B: "everything else", Codes: []string{"U"},
				Consequences: consequenceWords([]string{"U"}), Note: "not assessed: no reactivity group on record", Source: "no data"})
		}
	}
	sort.SliceStable(found, func(i, j int) bool { return gravity(found[i].Codes) > gravity(found[j].Codes) })
	return found
}

// pairOf gathers every row that speaks of a pair into one.
func pairOf(a, b Reactant, all []Reactant) (Incompatibility, bool) {
	inc := Incompatibility{A: a.Name, B: b.Name}
	var groupsA, groupsB, notes, sources []string
	add := func(nameA, nameB, note, source string, codes []string) {
		groupsA, groupsB = appendNew(groupsA, nameA), appendNew(groupsB, nameB)
		inc.Codes = appendNew(inc.Codes, codes...)
		if note != "" {
			notes = appendNew(notes, note)
		}
		sources = appendNew(sources, source)
	}
	for _, row := range supplementRows() {
		if row.a(a, all) && row.b(b, all) {
			add(row.nameA, row.nameB, row.note, row.source, row.codes)
		} else if row.a(b, all) && row.b(a, all) {
			add(row.nameB, row.nameA, row.note, row.source, row.codes)
		}
	}
	for _, row := range epaChart() {
		if row.mild(a, b) {
			continue
		}
		if slices.Contains(a.Groups, row.a) && slices.Contains(b.Groups, row.b) {
			add(row.nameA, row.nameB, row.note, row.source, row.codes)
		} else if slices.Contains(a.Groups, row.b) && slices.Contains(b.Groups, row.a) {
			add(row.nameB, row.nameA, row.note, row.source, row.codes)
		}
	}
	if slices.Contains(a.Groups, waterReactive) != slices.Contains(b.Groups, waterReactive) && len(inc.Codes) == 0 {
		add("Water Reactive Substances", "any chemical", "row 107: extremely reactive", "EPA-600/2-80-076 row 107 (read)", []string{"X"})
	}
	if len(inc.Codes) == 0 {
		return Incompatibility{}, false
	}
	sort.SliceStable(inc.Codes, func(i, j int) bool { return gravity(inc.Codes[i:i+1]) > gravity(inc.Codes[j:j+1]) })
	inc.GroupA, inc.GroupB = strings.Join(groupsA, "; "), strings.Join(groupsB, "; ")
	inc.Consequences, inc.Note, inc.Source = consequenceWords(inc.Codes), strings.Join(notes, "; "), strings.Join(sources, "; ")
	return inc, true
}

// mild excepts the sulfites and thiosulfates, which the table of groups puts
// with the strong reducing agents by analogy, from what those do with water:
// "mild reducer … not water reactive".
func (row chartRow) mild(a, b Reactant) bool {
	return row.a == 105 && row.b == 106 && (isSulfite(a) || isThiosulfate(a) || isSulfite(b) || isThiosulfate(b) ||
		named(a, "sulfur dioxide") || named(b, "sulfur dioxide"))
}

// consequenceCodes orders the chart's codes from the gravest; the order is this
// program's choice, for listing only.
var consequenceCodes = []string{"X", "E", "F", "GT", "GF", "P", "U", "H", "G", "S"}

func gravity(codes []string) int {
	worst := 0
	for _, c := range codes {
		if i := slices.Index(consequenceCodes, c); i >= 0 {
			worst = max(worst, len(consequenceCodes)-i)
		}
	}
	return worst
}

var codeMeanings = sync.OnceValue(func() map[string]string {
	meaning := map[string]string{}
	for _, row := range readTable("incompatibility_codes.csv") {
		if strings.HasPrefix(row.text("chart"), "EPA") {
			meaning[row.text("code")] = row.text("meaning")
		}
	}
	return meaning
})

func consequenceWords(codes []string) string {
	var words []string
	for _, c := range codes {
		words = append(words, codeMeanings()[c])
	}
	return strings.Join(words, "; ")
}

// CarryApart reports whether two bottles must not share a carrier, and why.
// Dissolving of a toxic metal alone is no reason in a carrier. What nobody
// assessed is carried apart from everything but what was assessed to be in no
// group.
func CarryApart(a, b Reactant) (why string, apart bool) {
	if a.Name == b.Name {
		return "", false
	}
	if inc, ok := pairOf(a, b, []Reactant{a, b}); ok && gravity(inc.Codes) > gravity([]string{"S"}) {
		return a.Name + " and " + b.Name + ": " + inc.Consequences, true
	}
	if !a.Assessed && !(b.Assessed && len(b.Groups) == 0) {
		return a.Name + ": reactivity not assessed", true
	}
	if !b.Assessed && !(a.Assessed && len(a.Groups) == 0) {
		return b.Name + ": reactivity not assessed", true
	}
	return "", false
}

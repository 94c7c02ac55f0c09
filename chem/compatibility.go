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

// epaChart holds the rows of the chart by their two groups, smaller first.
var epaChart = sync.OnceValue(func() map[[2]int][]chartRow {
	rows := map[[2]int][]chartRow{}
	for _, row := range readTable("incompatibility.csv") {
		if row.text("chart") != "EPA" {
			continue
		}
		a, errA := strconv.Atoi(row.text("group_a"))
		b, errB := strconv.Atoi(row.text("group_b"))
		if errA != nil || errB != nil {
			panic("chem: incompatibility.csv: groups " + row.text("group_a") + ", " + row.text("group_b"))
		}
		note, source := row.text("note"), row.text("source")
		if strings.HasPrefix(note, "missing from the copy") {
			note, source = "", note+"; "+source // it speaks of the table, not of the pair
		}
		key := [2]int{min(a, b), max(a, b)}
		rows[key] = append(rows[key], chartRow{a, b, row.text("group_a_name"), row.text("group_b_name"),
			strings.Fields(row.text("codes")), note, source})
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
	profiles := profilesOf(rs)
	for i := range profiles {
		for k := i + 1; k < len(profiles); k++ {
			if inc, ok := pairOf(profiles[i], profiles[k]); ok {
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

// profile is a reactant with the sides of the supplementary rows it is on, one
// bit for each row, and whether it is a mild reducing agent.
type profile struct {
	Reactant
	a, b uint64
	mild bool
}

func profilesOf(rs []Reactant) []profile {
	profiles := make([]profile, len(rs))
	for i, r := range rs {
		p := profile{Reactant: r, mild: isSulfite(r) || isThiosulfate(r) || named(r, "sulfur dioxide")}
		for k, row := range supplementRows() {
			if row.a(r, rs) {
				p.a |= 1 << k
			}
			if row.b(r, rs) {
				p.b |= 1 << k
			}
		}
		profiles[i] = p
	}
	return profiles
}

// pairOf gathers every row that speaks of a pair into one.
func pairOf(a, b profile) (Incompatibility, bool) {
	if a.Name == b.Name {
		return Incompatibility{}, false
	}
	g := gathered{Incompatibility: Incompatibility{A: a.Name, B: b.Name}}
	if a.a&b.b|a.b&b.a != 0 {
		for k, row := range supplementRows() {
			switch bit := uint64(1) << k; {
			case a.a&b.b&bit != 0:
				g.add(row.nameA, row.nameB, row.note, row.source, row.codes)
			case a.b&b.a&bit != 0:
				g.add(row.nameB, row.nameA, row.note, row.source, row.codes)
			}
		}
	}
	for _, x := range a.Groups {
		for _, y := range b.Groups {
			g.addChart(x, y, a.mild || b.mild)
		}
	}
	if slices.Contains(a.Groups, waterReactive) != slices.Contains(b.Groups, waterReactive) && len(g.Codes) == 0 {
		g.add("Water Reactive Substances", "any chemical", "row 107: extremely reactive", "EPA-600/2-80-076 row 107 (read)", []string{"X"})
	}
	if len(g.Codes) == 0 {
		return Incompatibility{}, false
	}
	sort.SliceStable(g.Codes, func(i, j int) bool { return gravity(g.Codes[i:i+1]) > gravity(g.Codes[j:j+1]) })
	g.GroupA, g.GroupB = strings.Join(g.groupsA, "; "), strings.Join(g.groupsB, "; ")
	g.Consequences, g.Note, g.Source = consequenceWords(g.Codes), strings.Join(g.notes, "; "), strings.Join(g.sources, "; ")
	return g.Incompatibility, true
}

// gathered is a pair with what the rows on it say so far.
type gathered struct {
	Incompatibility
	groupsA, groupsB, notes, sources []string
}

func (g *gathered) add(nameA, nameB, note, source string, codes []string) {
	g.groupsA, g.groupsB = appendNew(g.groupsA, nameA), appendNew(g.groupsB, nameB)
	g.Codes = appendNew(g.Codes, codes...)
	if note != "" {
		g.notes = appendNew(g.notes, note)
	}
	g.sources = appendNew(g.sources, source)
}

// addChart adds what the chart says of two groups. The sulfites and thiosulfates
// are with the strong reducing agents by analogy only, "mild reducer … not water
// reactive" in the table of groups, and are excepted from what those do with
// water.
func (g *gathered) addChart(x, y int, mild bool) {
	for _, row := range epaChart()[[2]int{min(x, y), max(x, y)}] {
		switch {
		case mild && row.a == 105 && row.b == 106:
		case row.a == x:
			g.add(row.nameA, row.nameB, row.note, row.source, row.codes)
		default:
			g.add(row.nameB, row.nameA, row.note, row.source, row.codes)
		}
	}
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
	p := profilesOf([]Reactant{a, b})
	return carryApart(p[0], p[1])
}

// CarriedApart answers CarryApart for any two of many, by their index, without
// looking each up again.
func CarriedApart(rs []Reactant) func(i, j int) bool {
	profiles := make([]profile, len(rs))
	for i, r := range rs {
		profiles[i] = profilesOf([]Reactant{r})[0]
	}
	return func(i, j int) bool {
		_, apart := carryApart(profiles[i], profiles[j])
		return apart
	}
}

func carryApart(a, b profile) (why string, apart bool) {
	if a.Name == b.Name {
		return "", false
	}
	if inc, ok := pairOf(a, b); ok && gravity(inc.Codes) > gravity([]string{"S"}) {
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

package planner

import (
	"errors"
	"fmt"
	"math/rand/v2"
	"reflect"
	"testing"

	"stillroom/chem"
)

type edge [2]int

func byEdges(edges []edge) func(i, j int) bool {
	set := map[edge]bool{}
	for _, e := range edges {
		set[e] = true
		set[edge{e[1], e[0]}] = true
	}
	return func(i, j int) bool { return set[edge{i, j}] }
}

func numbered(n int) []CarrierItem {
	items := make([]CarrierItem, n)
	for i := range items {
		items[i] = CarrierItem{Code: fmt.Sprintf("B%03d", i), Walk: i}
	}
	return items
}

// mycielski returns the Mycielski transform of a graph: chromatic number one
// higher, no new triangle (J. Mycielski, Colloq. Math. 3, 161, 1955).
func mycielski(n int, edges []edge) (int, []edge) {
	out := append([]edge(nil), edges...)
	for _, e := range edges {
		out = append(out, edge{e[0], n + e[1]}, edge{e[1], n + e[0]})
	}
	for i := range n {
		out = append(out, edge{n + i, 2 * n})
	}
	return 2*n + 1, out
}

// queens returns the queen graph of an n by n board.
func queens(n int) []edge {
	var edges []edge
	for a := range n * n {
		for b := a + 1; b < n*n; b++ {
			r, c := a/n-b/n, a%n-b%n
			if r == 0 || c == 0 || r == c || r == -c {
				edges = append(edges, edge{a, b})
			}
		}
	}
	return edges
}

// The chromatic numbers are those of the DIMACS colouring instances of these
// names (Johnson and Trick, DIMACS Series 26, 1996): myciel3 4, myciel4 5,
// queen5_5 5, queen6_6 7, queen7_7 7.
func TestGroupCarriersDIMACS(t *testing.T) {
	n, edges := 5, []edge{{0, 1}, {1, 2}, {2, 3}, {3, 4}, {4, 0}} // the 5-cycle is the transform of one edge
	n3, e3 := mycielski(n, edges)
	n4, e4 := mycielski(n3, e3)
	for _, tc := range []struct {
		name  string
		n, m  int // vertices and edges as the instances state them
		edges []edge
		want  int
	}{
		{"5-cycle", 5, 5, edges, 3},
		{"myciel3", n3, 20, e3, 4},
		{"myciel4", n4, 71, e4, 5},
		{"queen5_5", 25, 160, queens(5), 5},
		{"queen6_6", 36, 290, queens(6), 7},
		{"queen7_7", 49, 476, queens(7), 7},
	} {
		t.Run(tc.name, func(t *testing.T) {
			if len(tc.edges) != tc.m {
				t.Fatalf("graph has %d edges, want %d", len(tc.edges), tc.m)
			}
			got, err := GroupCarriers(numbered(tc.n), byEdges(tc.edges), CarrierLimits{})
			if err != nil || len(got) != tc.want {
				t.Errorf("GroupCarriers = %d carriers, %v, want %d", len(got), err, tc.want)
			}
		})
	}
}

// fewestByBruteForce tries every partition.
func fewestByBruteForce(items []CarrierItem, conflict func(i, j int) bool, l CarrierLimits) int {
	best := len(items)
	var groups [][]int
	fits := func(g []int, i int) bool {
		mass := items[i].Mass
		for _, j := range g {
			if conflict(i, j) {
				return false
			}
			mass += items[j].Mass
		}
		return (l.MostCount == 0 || len(g) < l.MostCount) && (l.MostMass == 0 || mass <= l.MostMass*(1+1e-12))
	}
	var try func(i int)
	try = func(i int) {
		if len(groups) >= best {
			return
		}
		if i == len(items) {
			best = len(groups)
			return
		}
		for k := range groups {
			if fits(groups[k], i) {
				groups[k] = append(groups[k], i)
				try(i + 1)
				groups[k] = groups[k][:len(groups[k])-1]
			}
		}
		groups = append(groups, []int{i})
		try(i + 1)
		groups = groups[:len(groups)-1]
	}
	try(0)
	return best
}

func TestGroupCarriersAgainstBruteForce(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 11))
	for range 300 {
		n := 1 + r.IntN(9)
		items := numbered(n)
		var edges []edge
		p := r.Float64()
		for i := range n {
			items[i].Mass = chem.Mass(0.2 + 2*r.Float64())
			for j := range i {
				if r.Float64() < p {
					edges = append(edges, edge{j, i})
				}
			}
		}
		limits := CarrierLimits{}
		if r.IntN(2) == 0 {
			limits.MostCount = 1 + r.IntN(4)
		}
		if r.IntN(2) == 0 {
			limits.MostMass = chem.Mass(1 + 5*r.Float64())
		}
		conflict := byEdges(edges)
		got, err := GroupCarriers(items, conflict, limits)
		if err != nil {
			t.Fatal(err)
		}
		if want := fewestByBruteForce(items, conflict, limits); len(got) != want {
			t.Errorf("%d items, %d conflicts, %+v: %d carriers, brute force %d", n, len(edges), limits, len(got), want)
		}
		checkCarriers(t, items, got, conflict, limits)
	}
}

// checkCarriers puts the answer back into the question.
func checkCarriers(t *testing.T, items []CarrierItem, carriers []Carrier, conflict func(i, j int) bool, l CarrierLimits) {
	t.Helper()
	index := map[string]int{}
	for i, it := range items {
		index[it.Code] = i
	}
	seen := map[string]bool{}
	for _, c := range carriers {
		mass := chem.Mass(0)
		for a, code := range c.Bottles {
			if seen[code] {
				t.Errorf("bottle %s travels twice", code)
			}
			seen[code] = true
			mass += items[index[code]].Mass
			for _, other := range c.Bottles[:a] {
				if conflict(index[code], index[other]) {
					t.Errorf("carrier %d holds %s and %s", c.N, other, code)
				}
			}
		}
		if l.MostCount > 0 && len(c.Bottles) > l.MostCount {
			t.Errorf("carrier %d holds %d bottles, most %d", c.N, len(c.Bottles), l.MostCount)
		}
		if l.MostMass > 0 && mass > l.MostMass*(1+1e-9) && len(c.Bottles) > 1 {
			t.Errorf("carrier %d weighs %v kg, most %v", c.N, mass, l.MostMass)
		}
	}
	if len(seen) != len(items) {
		t.Errorf("%d of %d bottles travel", len(seen), len(items))
	}
}

func TestGroupCarriersWalkingOrder(t *testing.T) {
	items := []CarrierItem{{Code: "C", Walk: 3}, {Code: "A", Walk: 1}, {Code: "D", Walk: 1}, {Code: "B", Walk: 2}}
	got, err := GroupCarriers(items, func(i, j int) bool { return items[i].Code == "B" || items[j].Code == "B" }, CarrierLimits{})
	want := []Carrier{{N: 1, Bottles: []string{"A", "D", "C"}}, {N: 2, Bottles: []string{"B"}}}
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("GroupCarriers = %v, %v, want %v", got, err, want)
	}
}

func TestGroupCarriersHeavyBottleAlone(t *testing.T) {
	items := []CarrierItem{{Code: "A", Mass: 1}, {Code: "B", Mass: 12}, {Code: "C", Mass: 1}}
	got, err := GroupCarriers(items, nil, CarrierLimits{MostMass: 5})
	if err != nil || len(got) != 2 || got[1].Note == "" {
		t.Errorf("GroupCarriers = %+v, %v, want B alone with a note", got, err)
	}
}

func TestGroupCarriersBadInput(t *testing.T) {
	if _, err := GroupCarriers([]CarrierItem{{Code: "A", Mass: -1}}, nil, CarrierLimits{}); err == nil {
		t.Error("negative mass: no error")
	}
	if _, err := GroupCarriers(nil, nil, CarrierLimits{MostCount: -1}); err == nil || errors.Is(err, ErrCarriersNotProven) {
		t.Errorf("negative count: error %v", err)
	}
}

func BenchmarkGroupCarriers(b *testing.B) {
	items := numbered(40)
	class := func(i int) int { return i % 5 }
	conflict := func(i, j int) bool { return class(i) != class(j) && (class(i) < 2 || class(j) < 2) }
	for b.Loop() {
		if _, err := GroupCarriers(items, conflict, CarrierLimits{MostCount: 8}); err != nil {
			b.Fatal(err)
		}
	}
}

package chem

import (
	"cmp"
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

// workedOwner is the test that reproduces the rows of a method, and how its file tells
// the method's rows.
type workedOwner struct{ folder, test, word string }

// workedOwners says which test reproduces the rows of each method of
// testdata/worked_examples.csv. Each of these tests fails on a row that it can't
// compute, so that none is passed over.
var workedOwners = map[string]workedOwner{
	"a_stoichiometry":  {".", "TestWorkedStoichiometry", ""},
	"b_redox_balance":  {".", "TestWorkedBalances", ""},
	"c_concentration":  {".", "TestWorkedSolutions", ""},
	"c_dilution_heat":  {".", "TestWorkedSolutions", ""},
	"d_acid_base":      {".", "TestWorkedSolutions", ""},
	"i_green":          {".", "TestWorkedSolutions", ""},
	"e_extraction":     {".", "TestWorkedPhases", `"efghj"`},
	"f_drying":         {".", "TestWorkedPhases", `"efghj"`},
	"g_vapour":         {".", "TestWorkedPhases", `"efghj"`},
	"h_heat":           {".", "TestWorkedPhases", `"efghj"`},
	"j_chromium_waste": {".", "TestWorkedPhases", `"efghj"`},
	"k_inventory":      {"../planner", "TestWorkedInventory", ""},
	"l_combinatorial":  {"../planner", "TestWorkedCovers", ""},
	"m_vessels":        {"../planner", "TestWorkedVessels", ""},
}

// TestWorkedMethodsHaveTests checks that every method in the file has its test, and
// that the test names the method.
func TestWorkedMethodsHaveTests(t *testing.T) {
	methods := map[string]bool{}
	for _, e := range workedExamples(t) {
		methods[e.method] = true
	}
	for method := range methods {
		owner, ok := workedOwners[method]
		if !ok {
			t.Errorf("no test reproduces the rows of %s", method)
			continue
		}
		if word := cmp.Or(owner.word, method); !testNames(t, owner.folder, "func "+owner.test, word) {
			t.Errorf("%s: no test file holds %s and %q", owner.folder, owner.test, word)
		}
	}
}

// testNames reports whether one test file of a folder, this one left out, holds all
// the words.
func testNames(t *testing.T, folder string, words ...string) bool {
	t.Helper()
	files, err := filepath.Glob(filepath.Join(folder, "*_test.go"))
	if err != nil {
		t.Fatal(err)
	}
	for _, file := range files {
		text, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		if file == "worked_test.go" {
			continue // this file names them all
		}
		held := 0
		for _, word := range words {
			if strings.Contains(string(text), word) {
				held++
			}
		}
		if held == len(words) {
			return true
		}
	}
	return false
}

// workedExample is one row of the file; the source stands in it.
type workedExample struct {
	id, method, ask, expected, unit, source string
	tolerance                               float64 // 0 where the row says exact
	items                                   []workedItem
}

// workedItem is one input, in the order of the row.
type workedItem struct{ key, value string }

func workedExamples(t *testing.T, methods ...string) []workedExample {
	t.Helper()
	file, err := os.Open("../testdata/worked_examples.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	records, err := csv.NewReader(file).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var list []workedExample
	for _, f := range records[1:] {
		e := workedExample{id: f[0], method: f[1], expected: f[3], unit: f[4], source: f[6]}
		e.tolerance, _ = strconv.ParseFloat(f[5], 64) // "exact" is 0
		for item := range strings.SplitSeq(f[2], ";") {
			key, value, _ := strings.Cut(strings.TrimSpace(item), "=")
			e.items = append(e.items, workedItem{key, value})
		}
		e.ask = e.input("ask")
		if len(methods) == 0 || contains(methods, e.method) {
			list = append(list, e)
		}
	}
	if len(list) == 0 {
		t.Fatalf("no rows of %v", methods)
	}
	return list
}

func contains(list []string, s string) bool {
	for _, x := range list {
		if x == s {
			return true
		}
	}
	return false
}

// input returns the value of a key, "" without.
func (e workedExample) input(key string) string {
	for _, i := range e.items {
		if i.key == key {
			return i.value
		}
	}
	return ""
}

// check compares a number with the row.
func (e workedExample) check(t *testing.T, got float64) {
	t.Helper()
	want, err := strconv.ParseFloat(e.expected, 64)
	if err != nil {
		t.Fatalf("%s: expected %q isn't a number", e.id, e.expected)
	}
	if !(math.Abs(got-want) <= e.tolerance*(1+1e-9)) {
		t.Errorf("%s: %s = %v %s, want %v ± %v (%s)", e.id, e.ask, got, e.unit, want, e.tolerance, e.source)
	}
}

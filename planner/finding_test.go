package planner

import (
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
)

// Every kind of finding that the package makes is explained in finding.go, and
// every kind explained there is made.
func TestFindingKindsAreExplained(t *testing.T) {
	files, err := filepath.Glob("*.go")
	if err != nil {
		t.Fatal(err)
	}
	made := regexp.MustCompile(`(?:Finding\{+\s*Kind: "|\.gap\("|\bf\.Kind, f\.Severity = "|noVesselFits = ")([a-z][a-z-]+)"`)
	var kinds []string
	for _, file := range files {
		if strings.HasSuffix(file, "_test.go") {
			continue
		}
		text, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		for _, m := range made.FindAllStringSubmatch(string(text), -1) {
			kinds = append(kinds, m[1])
		}
	}
	slices.Sort(kinds)
	kinds = slices.Compact(kinds)
	source, err := os.ReadFile("finding.go")
	if err != nil {
		t.Fatal(err)
	}
	var explained []string
	for _, m := range regexp.MustCompile(`(?m)^//\t([a-z][a-z-]+) +\S`).FindAllStringSubmatch(string(source), -1) {
		explained = append(explained, m[1])
	}
	slices.Sort(explained)
	if !slices.Equal(kinds, explained) {
		t.Errorf("made      %v\nexplained %v", kinds, explained)
	}
}

package main

import (
	"bytes"
	"context"
	"encoding/json"
	"strings"
	"testing"

	"stillroom/planner/reckoner"
)

// TestHelpExamplesRun runs the example that the help of every sum prints.
func TestHelpExamplesRun(t *testing.T) {
	for _, sum := range reckoner.Sums() {
		t.Run(sum.Name, func(t *testing.T) {
			help := output(t, "reckon", sum.Name, "--help")
			if !strings.Contains(help, exampleOf(sum)) {
				t.Errorf("help doesn't show the example %q", exampleOf(sum))
			}
			answer := output(t, append([]string{"reckon", sum.Name, "--json"}, sum.Example...)...)
			var got struct {
				Sum     string
				Results []struct {
					Name  string
					Value any
				}
			}
			if err := json.Unmarshal([]byte(answer), &got); err != nil {
				t.Fatalf("%v in %s", err, answer)
			}
			if got.Sum != sum.Name || len(got.Results) == 0 {
				t.Errorf("answer %+v, want results of %s", got, sum.Name)
			}
		})
	}
}

// output runs the program, wants exit status 0 and returns what it printed.
func output(t *testing.T, args ...string) string {
	t.Helper()
	var out, errs bytes.Buffer
	if status := run(context.Background(), args, &out, &errs); status != statusOK {
		t.Fatalf("stillroom %v: exit status %d: %s", args, status, errs.String())
	}
	return out.String()
}

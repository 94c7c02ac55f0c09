package planner

import (
	"fmt"
	"strings"
	"testing"
)

func TestKeyDifference(t *testing.T) {
	const before = `recipe: x
yield: {mean: 68 %, spread: 5 %}
sources: [one, two]
steps:
  - do: cool
    name: chill
    to: 12 °C
  - do: add
    name: acid in
    charges:
      - {substance: sulfuric acid, equivalents: 3.3}
  - do: react
    name: reflux
    time: 2 h
`
	tests := []struct {
		name  string
		after string
		want  []string
	}{
		{"nothing but layout", "# a remark\n" + strings.Replace(before, "{mean: 68 %, spread: 5 %}", "\n  mean: \"68 %\"\n  spread: 5 %", 1), nil},
		{"a value", strings.Replace(before, "2 h", "3 h", 1), []string{"steps › reflux › time: 2 h → 3 h"}},
		{"a charge", strings.Replace(before, "3.3", "3.5", 1), []string{"steps › acid in › charges › sulfuric acid › equivalents: 3.3 → 3.5"}},
		{"a list of texts", strings.Replace(before, "two", "three", 1), []string{"sources: one; two → one; three"}},
		{"a step put in", strings.Replace(before, "  - do: add", "  - do: hold\n    name: wait\n  - do: add", 1), []string{"added steps › wait › do: hold", "added steps › wait › name: wait"}},
		{"a step taken out", strings.Replace(before, "  - do: cool\n    name: chill\n    to: 12 °C\n", "", 1),
			[]string{"removed steps › chill › do: cool", "removed steps › chill › name: chill", "removed steps › chill › to: 12 °C"}},
		{"a step moved", strings.Replace(before, "  - do: cool\n    name: chill\n    to: 12 °C\n", "", 1) + "  - do: cool\n    name: chill\n    to: 12 °C\n",
			[]string{"steps › chill: first → after reflux"}},
	}
	for _, tt := range tests {
		changes, err := KeyDifference(before, tt.after)
		if err != nil {
			t.Fatal(err)
		}
		var got []string
		for _, c := range changes {
			switch {
			case c.Added:
				got = append(got, fmt.Sprintf("added %s: %s", c.Key, c.Is))
			case c.Removed:
				got = append(got, fmt.Sprintf("removed %s: %s", c.Key, c.Was))
			default:
				got = append(got, fmt.Sprintf("%s: %s → %s", c.Key, c.Was, c.Is))
			}
		}
		if strings.Join(got, "\n") != strings.Join(tt.want, "\n") {
			t.Errorf("%s:\n got %q\nwant %q", tt.name, got, tt.want)
		}
	}
	if _, err := KeyDifference("a: [", before); err == nil {
		t.Error("a text that is no YAML was compared")
	}
}

package planner

import (
	"fmt"
	"strings"
	"testing"

	"stillroom/chem"
)

func TestWithoutPowers(t *testing.T) {
	for text, want := range map[string]string{
		fmt.Sprintf("%.3g g, %.3g mL", 1432.0, 998.0): "1430 g, 998 mL",
		fmt.Sprintf("%.2g g", 9.9e7):                  "99000000 g",
		fmt.Sprintf("%.3g of 1e-9", 2.5e-12):          "2.5e-12 of 1e-9",
	} {
		if got := withoutPowers(text); got != want {
			t.Errorf("withoutPowers(%q) = %q, want %q", text, got, want)
		}
	}
}

// No step of the program's recipes speaks in powers of ten, at any scale of a
// bench.
func TestStepsSpeakInPlainFigures(t *testing.T) {
	for _, r := range Recipes() {
		p, err := Compile(r)
		if err != nil {
			t.Fatal(err)
		}
		walk, err := p.Walk(labConditions(chem.Amount(5)))
		if err != nil {
			t.Errorf("%s at 5 mol: %v", r.Name, err)
			continue
		}
		for _, s := range walk.Steps {
			for _, say := range append(s.Says, s.Cautions...) {
				if strings.Contains(say, "e+") {
					t.Errorf("%s, step %d: %s", r.Name, s.N, say)
				}
			}
		}
	}
}

package planner

import (
	"math"
	"testing"
)

// 3 C5H12O + 2 Na2Cr2O7 + 8 H2SO4 → 3 C5H10O2 + …: 3 · 102.133 of
// 3 · 88.150 + 2 · 261.965 + 8 · 98.078 g (molar masses from the standard atomic
// weights): 306.40 of 1573.0 g, 19.5 %.
func TestAtomEconomyOfDichromateRecipe(t *testing.T) {
	r, ok := RecipeByName("pentanoic-acid-dichromate")
	if !ok {
		t.Fatal("no recipe")
	}
	program, err := Compile(r)
	if err != nil {
		t.Fatal(err)
	}
	got, ok := program.atomEconomy()
	want := 3 * 102.133 / (3*88.150 + 2*261.965 + 8*98.078)
	if !ok || math.Abs(float64(got)-want) > 1e-4 {
		t.Errorf("atom economy %.5f, want %.5f", got, want)
	}
}

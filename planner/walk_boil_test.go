package planner

import (
	"fmt"
	"regexp"
	"strconv"
	"testing"
)

// Boiling water off a solution of common salt: what stays is the rest of the
// water and all of the salt, by mass balance done here; the heat is 2257 kJ for
// each kilogram of water at 100 °C (steam tables; OpenStax Chemistry 2e, 10.3
// gives 40.67 kJ/mol, which is 2258 kJ/kg).
func TestBoilDownByHand(t *testing.T) {
	const water = 0.9 // kg to a mole of salt
	for _, off := range []float64{0.25, 0.6, 0.9} {
		w := walkText(t, bench("sodium chloride", "sodium chloride", "", fmt.Sprintf(`
  - {do: charge, name: salt, vessel: a, time: 1 min, charges: [{substance: sodium chloride, equivalents: 1}, {substance: water, per-mole: 900 g}]}
  - {do: boil-down, name: down, vessel: a, boil-off: %v %%, to: b, time: 1 h}
  - {do: hold, name: stand, vessel: a, at: 20 °C, time: 1 h}
`, off*100)))
		said := w.Steps[1].Says
		wantNear(t, "water boiled off in g", firstNumber(t, said[0]), 1000*water*off, 0.005)
		wantNear(t, "heat in kJ", firstNumber(t, said[1]), 2257*water*off, 0.01)
		left, salt := heldMass(w.Steps[2], "water"), heldMass(w.Steps[2], "sodium chloride")
		wantNear(t, "water that stays", left, water*(1-off), 1e-9)
		wantNear(t, "salt that stays", salt, 0.05844, 1e-3) // 58.44 g/mol
	}
}

// Holding changes no content, takes its time and ends at its temperature.
func TestHoldChangesNothing(t *testing.T) {
	w := walkText(t, bench("sodium chloride", "sodium chloride", "", `
  - {do: charge, name: salt, vessel: a, time: 1 min, charges: [{substance: sodium chloride, equivalents: 1}, {substance: water, per-mole: 900 g}]}
  - {do: hold, name: stand, vessel: a, at: 45 °C, time: 90 min}
`))
	before, after := w.Steps[0], w.Steps[1]
	for _, name := range []string{"water", "sodium chloride"} {
		wantNear(t, name, heldMass(after, name), heldMass(before, name), 1e-12)
	}
	wantNear(t, "temperature in °C", after.Temperature.Celsius(), 45, 1e-9)
	wantNear(t, "time in min", after.Time.Minutes(), 90, 1e-9)
}

// heldMass sums a substance over the phases of a step, in kg.
func heldMass(s StepReport, substance string) float64 {
	sum := 0.0
	for _, c := range s.Contents {
		if c.Substance == substance {
			sum += float64(c.Mass)
		}
	}
	return sum
}

func firstNumber(t *testing.T, text string) float64 {
	t.Helper()
	x, err := strconv.ParseFloat(regexp.MustCompile(`[0-9.]+`).FindString(text), 64)
	if err != nil {
		t.Fatalf("no number in %q", text)
	}
	return x
}

package planner

import (
	"math"
	"strings"
	"testing"

	"stillroom/inventory"
)

// METHODS m and the policy: each vessel is the smallest owned piece that keeps
// its limit at the fullest moment; a still and an evaporator have limits of
// their own.
func TestWareKeepsItsLimits(t *testing.T) {
	in := labConditions(0.8)
	w, err := mustCompile(t, "pentanoic-acid-dichromate").Walk(in)
	if err != nil {
		t.Fatal(err)
	}
	largest := map[string]float64{}
	pieces := map[string]string{}
	for _, s := range w.Steps {
		if !s.Vessel.Fits || s.Vessel.Fill > s.Vessel.Limit {
			t.Errorf("step %d: %s is %.0f %% full, limit %.0f %%", s.N, s.Vessel.Ware, s.Vessel.Fill.Percent(), s.Vessel.Limit.Percent())
		}
		if was, ok := pieces[s.Vessel.Name]; ok && was != s.Vessel.Ware {
			t.Errorf("%s is %s, then %s", s.Vessel.Name, was, s.Vessel.Ware)
		}
		pieces[s.Vessel.Name] = s.Vessel.Ware
		largest[s.Vessel.Name] = max(largest[s.Vessel.Name], float64(s.Vessel.Fill/s.Vessel.Limit))
	}
	if s := stepOf(t, w, "strip the solvent"); s.Vessel.Limit != 0.5 {
		t.Errorf("an evaporator flask may be %.0f %% full, want 50", s.Vessel.Limit.Percent())
	}
	// The separating funnel one size smaller would be too small.
	funnel := stepOf(t, w, "take the ester off").Vessel
	for _, e := range in.Equipment {
		size := float64(e.Size) * 1e-9
		if e.Kind == "separating funnel" && size < float64(funnel.Size) && size*float64(funnel.Limit) >= largest["funnel"]*float64(funnel.Size)*float64(funnel.Limit) {
			t.Errorf("%s would have done instead of %s", e.Name, funnel.Ware)
		}
	}
}

func TestTooLargeForAnyVessel(t *testing.T) {
	in := labConditions(20)
	w, err := mustCompile(t, "pentanoic-acid-dichromate").Walk(in)
	if err != nil {
		t.Fatal(err)
	}
	found := false
	for _, f := range w.Findings {
		if f.Kind != "no-vessel-fits" {
			continue
		}
		found = true
		if f.Severity != Refusal || f.Step == 0 || !strings.Contains(f.Would, "batches") && !strings.Contains(f.Would, "in use") {
			t.Errorf("finding %+v, want a refusal with its step and the batches that fit", f)
		}
	}
	if !found {
		t.Fatal("20 mol fit a bench lab")
	}
	in.Batches = 20
	if w, err = mustCompile(t, "pentanoic-acid-dichromate").Walk(in); err != nil {
		t.Fatal(err)
	}
	for _, f := range w.Findings {
		if f.Kind == "no-vessel-fits" {
			t.Errorf("1 mol in a batch: %s", f.Text)
		}
	}
}

// Two vessels in use at the same time are two pieces: with one flask of the
// size, the second vessel takes the next size or is refused.
func TestOnePieceIsOneVessel(t *testing.T) {
	in := labConditions(1)
	in.Equipment = []inventory.Equipment{
		{Kind: "round flask", Name: "round flask 1 L", Size: 1000_000, Count: 1},
		{Kind: "round flask", Name: "round flask 2 L", Size: 2000_000, Count: 1},
	}
	text := bench("sodium acetate", "acetic acid", acetate, `
  - {do: charge, name: first, vessel: a, time: 1 min, charges: [{substance: water, per-mole: 300 mL}]}
  - {do: charge, name: second, vessel: b, time: 1 min, charges: [{substance: water, per-mole: 300 mL}]}
  - {do: discard, name: away, vessel: a, time: 1 min, stream: drain}
  - {do: discard, name: away too, vessel: b, time: 1 min, stream: drain}
`)
	w, err := compileText(t, text).Walk(in)
	if err != nil {
		t.Fatal(err)
	}
	if a, b := w.Steps[0].Vessel.Ware, w.Steps[1].Vessel.Ware; a != "round flask 1 L" || b != "round flask 2 L" {
		t.Errorf("the vessels are %q and %q, want one flask of each size", a, b)
	}
}

// practice §5: a 5 L flask 60 % full, 200 W/(m² K) and a gap of 10 K take 170 W
// (there rounded), so that 875 kJ last at least 86 min. Here the heat of diluting
// acid is taken over the cooling of the flask that the step picks.
func TestShortestAddition(t *testing.T) {
	w, err := mustCompile(t, "pentanoic-acid-dichromate").Walk(labConditions(2))
	if err != nil {
		t.Fatal(err)
	}
	s := stepOf(t, w, "acid into the oxidant")
	if s.Vessel.Size == 0 {
		t.Fatal("no vessel was picked for 2 mol")
	}
	power := float64(s.Heat) / float64(s.Shortest)
	// A sphere filled to φ has the wetted area of practice's figure at 60 %, 0.085
	// m² for 5 L, growing with V^(2/3): a bound between a third and full.
	area := 0.085 * math.Cbrt(math.Pow(float64(s.Vessel.Size)/0.005, 2))
	if power < 200*10*area*0.4 || power > 200*10*area*1.7 {
		t.Errorf("cooling of %.0f W in %s, out of keeping with %.3f m2", power, s.Vessel.Ware, area)
	}
}

package planner

import (
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
)

// TestWorkedVessels compares the fill limits of the delivered policy with the usual
// rules of m_vessels, and the fill of published charges with the published vessel.
func TestWorkedVessels(t *testing.T) {
	policy := inventory.Policy{}
	for _, p := range inventory.PolicyDefaults(0) {
		policy[p.Key] = p
	}
	limits := map[string]string{
		"distillation pot, recommended fill at start, high":         "fill.still",
		"separatory funnel, maximum fill to leave room for shaking": "fill.separating-funnel",
		"reflux flask, usual maximum fill":                          "fill.round-flask",
	}
	for _, r := range workedRows(t, "m_vessels") {
		question := r.inputs["vessel"] + ", " + r.inputs["ask"]
		key, limit := limits[question]
		switch {
		case r.inputs["flask"] != "":
			r.check(t, fillOf(t, r.inputs["flask"], r.inputs["charge"]), nil)
		case limit:
			value, ok := policy.Value(key)
			if !ok {
				t.Errorf("%s: no policy row %s", r.id, key)
				continue
			}
			r.check(t, value, nil)
		case strings.HasSuffix(question, "recommended fill at start, low"):
			// The program has upper limits alone; half a pot has to be allowed.
			if value, _ := policy.Value("fill.still"); value < number(t, r.expected) {
				t.Errorf("%s: a still may be filled to %v, below the usual %s", r.id, value, r.expected)
			}
		default:
			t.Errorf("%s: no way to compute %q", r.id, question)
		}
	}
}

// fillOf sums a charge, such as "600 mL water + 90 g menthol density 0.89 g/mL", and
// divides by the nominal volume of the vessel.
func fillOf(t *testing.T, vessel, charge string) float64 {
	t.Helper()
	size, err := chem.ParseVolume(strings.Join(strings.Fields(vessel)[:2], " "))
	if err != nil {
		t.Fatal(err)
	}
	var sum chem.Volume
	for part := range strings.SplitSeq(charge, " + ") {
		sum += partVolume(t, part)
	}
	return float64(sum / size)
}

// partVolume reads a volume, a mass with its density, or a solid with the volume that it
// takes up in brackets.
func partVolume(t *testing.T, part string) chem.Volume {
	t.Helper()
	words := strings.Fields(strings.TrimSuffix(part, ")"))
	quantity := strings.Join(words[:2], " ")
	if strings.HasSuffix(part, "mL)") {
		quantity = strings.Join(words[len(words)-2:], " ")
	}
	if v, err := chem.ParseVolume(quantity); err == nil {
		return v
	}
	_, density, _ := strings.Cut(part, "density ")
	m, err := chem.ParseMass(quantity)
	if err != nil {
		t.Fatal(err)
	}
	d, err := chem.ParseDensity(density)
	if err != nil {
		t.Fatal(err)
	}
	return d.Volume(m)
}

package planner

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// The ware of a run: every vessel of the recipe is one piece from its first
// step to its last, the smallest that keeps the fill limit at its fullest.

// use is what a vessel of the recipe has to hold.
type use struct {
	vessel      int
	first, last int     // step numbers
	most        float64 // m3 when it needs the largest ware
	step        int     // when that is
	limit       float64 // fill limit then
	limitKey    string
	need        float64 // nominal volume that keeps every limit, in m3
	piece       int     // index in the equipment; -1 for none
}

// limitKey names the policy row whose fill limit holds for a vessel in a step:
// that of the ware, or of a still or an evaporator while it is one.
func (r *reporter) limitKey(s *compiledStep, v int) string {
	if v == s.vessel {
		switch s.Do {
		case "strip":
			return "fill.evaporator"
		case "distil", "co-distil", "boil-down":
			return "fill.still"
		}
	}
	return "fill." + strings.ReplaceAll(r.p.Recipe.Vessels[v].Ware, " ", "-")
}

// uses gathers the peaks of a walk by vessel, in order of first use.
func (r *reporter) uses(policy inventory.Policy) []use {
	list := make([]use, r.p.vessels)
	for i := range list {
		list[i] = use{vessel: i, piece: -1}
	}
	for _, k := range r.peaks {
		u := &list[k.vessel]
		if u.first == 0 {
			u.first = k.step
		}
		u.last = k.step
		limit, _ := policy.Value(k.limit)
		if limit <= 0 || u.limitKey != "" && u.limit <= 0 {
			u.limit, u.limitKey, u.step = 0, k.limit, k.step
			continue
		}
		if need := k.volume / limit; need > u.need || u.limitKey == "" {
			u.need, u.most, u.step, u.limit, u.limitKey = need, k.volume, k.step, limit, k.limit
		}
	}
	list = slices.DeleteFunc(list, func(u use) bool { return u.first == 0 })
	slices.SortStableFunc(list, func(a, b use) int { return cmp.Compare(a.first, b.first) })
	return list
}

// chooseWare picks the pieces and writes them into the reports of the steps.
func (r *reporter) chooseWare(w *Workspace) {
	list := r.uses(w.conditions.Policy)
	for i := range list {
		r.pick(&list[i], list[:i], w.conditions.Equipment)
		if list[i].piece < 0 && len(w.conditions.Equipment) > 0 {
			r.walk.Findings = append(r.walk.Findings, r.tooSmall(&list[i], w.conditions.Equipment))
		}
	}
	if w.conditions.Equipment != nil && len(w.conditions.Equipment) == 0 {
		r.walk.Findings = append(r.walk.Findings, Finding{Kind: "no-ware-known", Severity: Warning,
			Text:  "no glassware is on record, so that no vessel is picked; whether the lab's own hold each step, and cool it, is not assessed",
			Would: "enter the lab's ware, or compare the volumes of the steps with it by hand"})
	}
	byVessel := map[int]use{}
	for _, u := range list {
		byVessel[u.vessel] = u
	}
	for i := range r.walk.Steps {
		s := &r.walk.Steps[i]
		r.describeWare(s, r.p.steps[i].vessel, byVessel, w.conditions.Equipment, w.conditions.Policy)
		r.coolingOf(s, w)
	}
}

// pick takes the smallest piece of the right kind that holds the vessel's
// contents within the limit and is free from its first step to its last; ties
// go to the name.
func (r *reporter) pick(u *use, earlier []use, owned []inventory.Equipment) {
	if u.limit <= 0 {
		return
	}
	kind := r.p.Recipe.Vessels[u.vessel].Ware
	for i, e := range owned {
		if e.Kind != kind || float64(e.Size)*1e-9 < u.need {
			continue
		}
		taken := 0
		for _, other := range earlier {
			if other.piece == i && other.first <= u.last && u.first <= other.last {
				taken++
			}
		}
		if taken >= max(e.Count, 1) {
			continue
		}
		if u.piece < 0 || e.Size < owned[u.piece].Size || e.Size == owned[u.piece].Size && e.Name < owned[u.piece].Name {
			u.piece = i
		}
	}
}

// tooSmall is the refusal of a run that fits no vessel, with the size that
// would do and the number of batches that fit.
func (r *reporter) tooSmall(u *use, owned []inventory.Equipment) Finding {
	vessel := r.p.Recipe.Vessels[u.vessel]
	f := Finding{Kind: "no-vessel-fits", Severity: Refusal, Step: u.step}
	if u.limit <= 0 {
		f.Kind, f.Severity = "no-fill-limit", Warning
		f.Text = fmt.Sprintf("the policy has no fill limit for a %s, so that none was picked for %s", vessel.Ware, vessel.Name)
		f.Would = "add the policy row " + u.limitKey
		return f
	}
	largest := 0.0
	for _, e := range owned {
		if e.Kind == vessel.Ware {
			largest = math.Max(largest, float64(e.Size)*1e-9)
		}
	}
	need := u.need
	f.Text = plainf("%s holds %.3g L in step %d and needs a %s of %.3g L at a fill limit of %.0f %%", vessel.Name, u.most*1e3, u.step, vessel.Ware, need*1e3, 100*u.limit)
	switch {
	case largest == 0:
		f.Would = fmt.Sprintf("the lab owns no %s", vessel.Ware)
	case largest >= need:
		f.Would = fmt.Sprintf("all %ss that are large enough are in use at that step", vessel.Ware)
	default:
		n := int(math.Ceil(float64(r.walk.Batches) * need / largest))
		f.Would = plainf("%d equal batches fit the %.3g L one; strips, filter papers, rinses and the time come with every batch", n, largest*1e3)
	}
	return f
}

func (r *reporter) describeWare(s *StepReport, vessel int, byVessel map[int]use, owned []inventory.Equipment, policy inventory.Policy) {
	u, used := byVessel[vessel]
	note := r.p.Recipe.Vessels[vessel]
	s.Vessel = VesselReport{Name: note.Name, Kind: note.Ware}
	volume := 0.0
	for _, k := range r.peaks {
		if k.step == s.N && k.vessel == vessel {
			volume = math.Max(volume, k.volume)
			limit, _ := policy.Value(k.limit)
			s.Vessel.Limit = chem.Fraction(limit)
		}
	}
	if !used || u.piece < 0 {
		return
	}
	e := owned[u.piece]
	s.Vessel.Ware, s.Vessel.Size, s.Vessel.Fits = e.Name, chem.Volume(float64(e.Size)*1e-9), true
	s.Vessel.Fill = chem.Fraction(volume) / chem.Fraction(s.Vessel.Size)
	s.Derivations = append(s.Derivations, deriveFill(s, volume))
}

func deriveFill(s *StepReport, volume float64) chem.Derivation {
	return chem.Derivation{
		Of: "fill of " + s.Vessel.Name, Formula: "φ = V(contents) / V(nominal)",
		Inserted: plainf("%.5g mL / %.5g mL = %.3g", volume*1e6, s.Vessel.Size.Millilitres(), float64(s.Vessel.Fill)),
		Inputs: []chem.Input{
			{Symbol: "V(contents)", Name: "all that is in it at the fullest moment of the step, but gas", Value: volume * 1e6, Unit: "mL", Source: "contents of the vessel"},
			{Symbol: "V(nominal)", Name: s.Vessel.Ware, Value: s.Vessel.Size.Millilitres(), Unit: "mL", Source: "equipment of the lab, the smallest that keeps the limits from its first step to its last"},
		},
		Value: float64(s.Vessel.Fill), Range: plainf("limit %.3g", float64(s.Vessel.Limit)), Source: "fill limits: common practice",
	}
}

// coolingOf works out the shortest time of a dosed addition: the heat over what
// the vessel's wall gives to the bath.
func (r *reporter) coolingOf(s *StepReport, w *Workspace) {
	if !slices.Contains(r.dosing, s.N) || s.Heat <= 0 {
		return
	}
	if !(s.Vessel.Size > 0) || w.policy.heatU <= 0 || w.policy.heatGap <= 0 {
		s.Says = append(s.Says, "shortest time of the addition: not assessed")
		return
	}
	power, err := chem.CoolingPower(s.Vessel.Size, min(s.Vessel.Fill, 1), chem.Temperature(w.policy.heatGap), w.policy.heatU)
	if err != nil {
		s.Says = append(s.Says, "shortest time of the addition: not assessed: "+err.Error())
		return
	}
	if s.Shortest, err = chem.ShortestDose(s.Heat, power); err != nil {
		return
	}
	s.Says = append(s.Says, plainf("not faster than in %.0f min: %.3g kJ over %.3g W", math.Ceil(s.Shortest.Minutes()), s.Heat.Kilojoules(), float64(power)))
	s.Derivations = append(s.Derivations, chem.Derivation{
		Of: "shortest time of the addition", Formula: "t = q / (U · A · ΔT)",
		Inserted: plainf("%.5g kJ / %.5g W = %.4g min", s.Heat.Kilojoules(), float64(power), s.Shortest.Minutes()),
		Inputs: []chem.Input{
			{Symbol: "q", Name: "heat given off", Value: s.Heat.Kilojoules(), Unit: "kJ", Source: "heat balance of the step"},
			{Symbol: "U", Name: "heat transfer", Value: w.policy.heatU, Unit: "W/(m2 K)", Source: "policy heat.u"},
			{Symbol: "ΔT", Name: "gap between contents and bath", Value: w.policy.heatGap, Unit: "K", Source: "policy heat.gap"},
			{Symbol: "A", Name: "wetted wall of " + s.Vessel.Ware, Value: float64(power) / w.policy.heatU / w.policy.heatGap, Unit: "m2", Source: "sphere filled to this level"},
		},
		Value: s.Shortest.Minutes(), Unit: "min", Range: "valid while the reaction keeps up with the addition", Source: "Stoessel, Thermal Safety of Chemical Processes; OpenStax Chemistry 2e, 5.2",
	})
	if s.Time > 0 && s.Time < s.Shortest {
		s.Time = s.Shortest
	}
}

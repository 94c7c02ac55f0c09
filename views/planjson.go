package views

import (
	"encoding/json"
	"fmt"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// PlanJSON writes a plan for scripts. Numbers are plain and unrounded, in the
// units their names say; what isn't known is null, and a chance or a metric
// that wasn't assessed is absent. Masses of a need are of the pure, anhydrous
// substance, those of a draw of what is in the bottle; a need that is counted
// in pieces has no masses. The same plan gives the same bytes. It fails only if
// the plan holds a number that isn't one.
func PlanJSON(p *planner.Plan) ([]byte, error) {
	text, err := json.MarshalIndent(planText(p), "", "  ")
	if err != nil {
		return nil, fmt.Errorf("writing the plan of %s as JSON: %w", p.Recipe.Name, err)
	}
	return append(text, '\n'), nil
}

type planJSON struct {
	Recipe   string         `json:"recipe"`
	On       inventory.Date `json:"on"`
	Verdict  string         `json:"verdict"`
	Target   targetJSON     `json:"target"`
	Scale    scaleJSON      `json:"scale"`
	Needs    []needJSON     `json:"needs"`
	Steps    []stepJSON     `json:"steps"`
	Carriers []carrierJSON  `json:"carriers"`
	Buy      []buyJSON      `json:"buy"`
	Waste    []wasteJSON    `json:"waste"`
	Hazards  []hazardJSON   `json:"hazards"`
	Metrics  *metricsJSON   `json:"metrics,omitempty"`
}

type targetJSON struct {
	Substance string  `json:"substance"`
	Mass      float64 `json:"mass_g"`
}

type scaleJSON struct {
	Limiting      string  `json:"limiting"`
	Amount        float64 `json:"amount_mol"`
	ExpectedYield float64 `json:"expected_yield"`
	ExpectedMass  float64 `json:"expected_mass_g"`
}

type needJSON struct {
	Substance string     `json:"substance"`
	CAS       string     `json:"cas"`
	Pure      *float64   `json:"pure_mass_g"`
	Amount    *float64   `json:"amount_mol"`
	For       []string   `json:"for"`
	OnShelf   *float64   `json:"on_shelf_g"`
	Earmarked *float64   `json:"earmarked_g"`
	Short     *float64   `json:"short_g"`
	Chance    *float64   `json:"chance_short,omitempty"`
	State     string     `json:"state"`
	Draws     []drawJSON `json:"draws"`
}

type drawJSON struct {
	Bottle  string          `json:"bottle"`
	Form    string          `json:"form"`
	Place   string          `json:"place"`
	Mass    *float64        `json:"mass_g"`
	Volume  *float64        `json:"volume_mL"`
	Leaves  *float64        `json:"leaves_g"`
	Expires *inventory.Date `json:"expires"`
}

type stepJSON struct {
	N           int           `json:"n"`
	Do          string        `json:"do"`
	Vessel      vesselJSON    `json:"vessel"`
	Adds        []addJSON     `json:"adds"`
	Contents    []contentJSON `json:"contents"`
	Temperature *float64      `json:"temperature_C"`
	Heat        float64       `json:"heat_kJ"`
	Gas         float64       `json:"gas_L"`
	Minutes     *float64      `json:"minutes"`
	Cautions    []string      `json:"cautions"`
}

type vesselJSON struct {
	Name string   `json:"name"`
	Size *float64 `json:"size_mL"`
	Fill *float64 `json:"fill"`
}

type addJSON struct {
	Substance string   `json:"substance"`
	Form      string   `json:"form"`
	Mass      *float64 `json:"mass_g"`
	Volume    *float64 `json:"volume_mL"`
	Amount    *float64 `json:"amount_mol"`
}

type contentJSON struct {
	Substance string  `json:"substance"`
	Phase     string  `json:"phase"`
	Amount    float64 `json:"amount_mol"`
	Mass      float64 `json:"mass_g"`
}

type carrierJSON struct {
	N       int      `json:"n"`
	Bottles []string `json:"bottles"`
}

type buyJSON struct {
	Substance string         `json:"substance"`
	Offer     string         `json:"offer"`
	Packs     int64          `json:"packs"`
	Cost      int64          `json:"cost_minor"`
	Currency  string         `json:"currency"`
	OrderBy   inventory.Date `json:"order_by"`
}

type wasteJSON struct {
	Stream   string              `json:"stream"`
	Mass     float64             `json:"mass_g"`
	Volume   *float64            `json:"volume_mL"`
	Contains []wasteContentsJSON `json:"contains"`
	Carboy   *string             `json:"carboy"`
	Fits     bool                `json:"fits"`
}

type wasteContentsJSON struct {
	Substance string  `json:"substance"`
	Mass      float64 `json:"mass_g"`
}

type hazardJSON struct {
	At         string   `json:"at"`
	What       string   `json:"what"`
	Classes    []string `json:"classes"`
	Statements []string `json:"statements"`
	Pictograms []string `json:"pictograms"`
	Signal     string   `json:"signal"`
}

type metricsJSON struct {
	AtomEconomy          float64 `json:"atom_economy"`
	EFactor              float64 `json:"e_factor"`
	ProcessMassIntensity float64 `json:"process_mass_intensity"`
}

func planText(p *planner.Plan) planJSON {
	out := planJSON{
		Recipe: p.Recipe.Name, On: p.On, Verdict: p.Verdict.String(),
		Target: targetJSON{p.Target.Substance, p.Target.Mass.Grams()},
		Scale: scaleJSON{p.Scale.Limiting, float64(p.Scale.Amount), float64(p.Scale.ExpectedYield),
			p.Scale.ExpectedMass.Grams()},
		Needs: each(p.Needs, needText), Steps: each(p.Steps, stepText),
		Carriers: each(p.Carriers, func(c planner.Carrier) carrierJSON { return carrierJSON{c.N, list(c.Bottles)} }),
		Buy:      each(p.Buy, buyText), Waste: each(p.Waste, wasteText), Hazards: each(p.Hazards, hazardText),
	}
	// A run uses at least the mass it makes, so that an intensity of zero means
	// that nothing was worked out.
	if m := p.Metrics; m.ProcessMassIntensity > 0 {
		out.Metrics = &metricsJSON{float64(m.AtomEconomy), m.EFactor, m.ProcessMassIntensity}
	}
	return out
}

func needText(n planner.Need) needJSON {
	out := needJSON{Substance: n.Substance, CAS: n.CAS, For: list(n.For), State: n.State.String(), Draws: each(n.Draws, drawText)}
	if n.ChanceShort >= 0 {
		out.Chance = &n.ChanceShort
	}
	if !n.Count {
		out.Pure, out.Amount = grams(n.Mass), number(n.Amount)
		out.OnShelf, out.Earmarked, out.Short = grams(n.OnShelf), grams(n.Earmarked), grams(n.Short)
	}
	return out
}

func drawText(d planner.Draw) drawJSON {
	out := drawJSON{Bottle: d.Bottle.Code, Form: d.Form.Name, Place: d.Place.String()}
	if d.Form.Measure != inventory.ByCount {
		out.Mass, out.Leaves = grams(d.Mass), grams(d.Leaves)
	}
	if d.HasVolume {
		out.Volume = millilitres(d.Volume)
	}
	if d.Bottle.Expiry.Set() {
		out.Expires = &d.Bottle.Expiry
	}
	return out
}

func stepText(s planner.StepReport) stepJSON {
	out := stepJSON{N: s.N, Do: s.Do, Vessel: vesselJSON{Name: s.Vessel.Name}, Adds: each(s.Adds, addText),
		Contents: each(s.Contents, func(c planner.Content) contentJSON {
			return contentJSON{c.Substance, c.Phase, float64(c.Amount), c.Mass.Grams()}
		}),
		Heat: s.Heat.Kilojoules(), Gas: s.Gas.Litres(), Cautions: list(s.Cautions)}
	if s.Vessel.Size > 0 {
		out.Vessel.Size, out.Vessel.Fill = millilitres(s.Vessel.Size), number(s.Vessel.Fill)
	}
	if s.Temperature > 0 {
		t := s.Temperature.Celsius()
		out.Temperature = &t
	}
	if !s.TimeNotAssessed {
		m := s.Time.Minutes()
		out.Minutes = &m
	}
	return out
}

func addText(a planner.Add) addJSON {
	out := addJSON{Substance: a.Substance, Form: a.Form}
	if a.Pieces == 0 {
		out.Mass, out.Amount = grams(a.Mass), number(a.Amount)
	}
	if a.HasVolume {
		out.Volume = millilitres(a.Volume)
	}
	return out
}

func buyText(b planner.Purchase) buyJSON {
	return buyJSON{b.Substance, b.Offer.Item, b.Packs, b.Cost, b.Currency, b.OrderBy}
}

func wasteText(w planner.WasteLot) wasteJSON {
	out := wasteJSON{Stream: w.Stream, Mass: w.Mass.Grams(), Fits: w.Fits,
		Contains: each(w.Contains, func(c planner.Content) wasteContentsJSON {
			return wasteContentsJSON{c.Substance, c.Mass.Grams()}
		})}
	if w.Volume > 0 {
		out.Volume = millilitres(w.Volume)
	}
	if w.Carboy != "" {
		out.Carboy = &w.Carboy
	}
	return out
}

func hazardText(h planner.HazardNote) hazardJSON {
	return hazardJSON{h.At, h.What, list(h.Classes), list(h.Statements), list(h.Pictograms), h.Signal}
}

func grams(m chem.Mass) *float64 {
	g := m.Grams()
	return &g
}

func millilitres(v chem.Volume) *float64 {
	ml := v.Millilitres()
	return &ml
}

func number[Q ~float64](q Q) *float64 {
	x := float64(q)
	return &x
}

// each maps a slice; what is empty becomes an empty list and not null.
func each[A, B any](in []A, f func(A) B) []B {
	out := make([]B, len(in))
	for i, a := range in {
		out[i] = f(a)
	}
	return out
}

func list(in []string) []string {
	if in == nil {
		return []string{}
	}
	return in
}

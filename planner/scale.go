package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
	"stillroom/inventory"
)

// Dist returns the yield as a distribution: normal, cut at 0 and at Cap.
func (y Yield) Dist() (chem.Dist, error) {
	most := float64(y.Cap)
	if most == 0 {
		most = 1
	}
	if y.SD == 0 {
		return chem.Exactly(math.Min(float64(y.Mean), most)), nil
	}
	normal, err := chem.NewNormal(float64(y.Mean), float64(y.SD))
	if err != nil {
		return nil, err
	}
	return chem.NewClipped(normal, 0, most)
}

// ScaleFor works out the limiting reagent that gives target with a certainty:
// the run is scaled on the yield that is reached with that chance, not on the
// mean,
//
//	n = m(target) / (M(product) · ν · Y(certainty))
//
// A target or certainty out of range is a *StepError that wraps ErrScale. The
// policy's scale.warn and scale.large-substrate are left to the plan.
func (p *Program) ScaleFor(target chem.Mass, certainty chem.Fraction, _ inventory.Policy) (Scale, error) {
	if !(target > 0) || !chem.Finite(target) {
		return Scale{}, &StepError{Recipe: p.Recipe.Name, What: fmt.Sprintf("a target of %v g", target.Grams()), Would: "give a mass above 0, such as 50 g", Err: ErrScale}
	}
	if !(certainty > 0 && certainty < 1) {
		return Scale{}, &StepError{Recipe: p.Recipe.Name, What: fmt.Sprintf("a certainty of %v", float64(certainty)), Would: "give a share between 0 and 1, such as 90 %", Err: ErrScale}
	}
	if p.yieldErr != nil {
		return Scale{}, &StepError{Recipe: p.Recipe.Name, What: "the yield: " + p.yieldErr.Error(), Would: "give a mean and a spread that fit", Err: ErrScale}
	}
	planned := p.yield.Quantile(1 - float64(certainty))
	if !(planned > 0) {
		return Scale{}, &StepError{Recipe: p.Recipe.Name, What: plainf("no yield is reached with %.3g %% certainty", certainty.Percent()), Would: "lower the certainty", Err: ErrScale}
	}
	m := &p.matter[p.product]
	n := float64(target) / (m.molar * p.perLimiting * planned)
	s := Scale{
		Limiting: p.matter[p.limiting].name, Amount: chem.Amount(n), ExpectedYield: p.Recipe.Yield.Mean, PlannedYield: chem.Fraction(planned),
		ExpectedMass: chem.Mass(n * m.molar * p.perLimiting * float64(p.Recipe.Yield.Mean)), Percentile: certainty, Batches: 1,
	}
	if p.Recipe.ProvenScale > 0 {
		s.Factor = n / float64(p.Recipe.ProvenScale)
	}
	s.Derivation = p.deriveScale(target, n, planned, certainty)
	return s, nil
}

func (p *Program) deriveScale(target chem.Mass, n, planned float64, certainty chem.Fraction) chem.Derivation {
	m := &p.matter[p.product]
	return chem.Derivation{
		Of: p.matter[p.limiting].name + ", limiting", Formula: "n = m(target) / (M · ν · Y)",
		Inserted: plainf("%.6g g / (%.6g g/mol · %.4g · %.4g) = %.6g mol", target.Grams(), m.molar*1e3, p.perLimiting, planned, n),
		Inputs: []chem.Input{
			{Symbol: "m(target)", Name: "mass of " + m.name + " wanted", Value: target.Grams(), Unit: "g", Source: "request"},
			{Symbol: "M", Name: "molar mass of " + m.written, Value: m.molar * 1e3, Unit: "g/mol", Source: "standard atomic weights, IUPAC"},
			{Symbol: "ν", Name: "moles of product for one of limiting reagent", Value: p.perLimiting, Source: "reactions of the recipe"},
			{Symbol: "Y", Name: plainf("yield reached with %.3g %% certainty (mean %.3g %%, standard deviation %.3g points, %s)", certainty.Percent(), p.Recipe.Yield.Mean.Percent(), p.Recipe.Yield.SD.Percent(), p.Recipe.Yield.Basis), Value: planned, Source: "recipe, percentile of the policy"},
		},
		Value: n, Unit: "mol", Source: "OpenStax Chemistry 2e, 4.3 and 4.4",
	}
}

// scaleFindings says how the run stands to what the recipe has been proven at.
func (r *reporter) scaleFindings(w *Workspace) {
	recipe := r.p.Recipe
	warn := w.policy.scaleWarn
	if recipe.ProvenScale <= 0 {
		r.walk.Findings = append(r.walk.Findings, Finding{Kind: "scale-not-proven", Severity: Note,
			Text: fmt.Sprintf("version %s of the recipe has no proven scale", recipe.Version), Would: "run it small first and write the close-out"})
		return
	}
	factor := w.limiting / float64(recipe.ProvenScale)
	if factor <= warn {
		return
	}
	r.walk.Findings = append(r.walk.Findings, Finding{
		Kind: "scale-beyond-proven", Severity: Warning,
		Text:  plainf("%.3g mol in a batch is %.2g times the proven scale of %.3g mol (%d runs); more than %.3g times asks for a review", w.limiting, factor, float64(recipe.ProvenScale), recipe.ProvenRuns, warn),
		Would: fmt.Sprintf("%.0f batches stay within it", math.Ceil(w.limiting*w.batches/(warn*float64(recipe.ProvenScale)))),
	})
}

package planner

import (
	"errors"
	"math"
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
)

// asked is a recipe reduced to its asks at one mole of limiting reagent, for
// tests of what comes after the walk-through.
type asked struct {
	asks   []Ask
	molar  chem.MolarMass // of the product
	volume chem.Volume    // per mole, in the one vessel it has
	most   chem.Volume    // of that vessel; 0 for no limit
	seen   []map[string]Stock
}

func (a *asked) ScaleFor(target chem.Mass, certainty chem.Fraction, _ inventory.Policy) (Scale, error) {
	n := chem.Amount(float64(target) / float64(a.molar) / 0.6)
	return Scale{Limiting: "1-pentanol", Amount: n, ExpectedYield: 0.7, PlannedYield: 0.6, ExpectedMass: a.molar.Mass(n * 0.7), Percentile: certainty}, nil
}

func (a *asked) Walk(in Conditions) (*Walk, error) {
	a.seen = append(a.seen, in.Stocks)
	w := &Walk{Batches: max(1, in.Batches)}
	for _, ask := range a.asks {
		ask.Pure *= chem.Mass(in.Limiting)
		ask.Amount *= in.Limiting
		ask.Pieces = math.Ceil(ask.Pieces)
		if s, ok := in.Stocks["sodium dichromate"]; ok && ask.Substance == "water" {
			ask.Pure -= 0.7 * chem.Mass(in.Limiting) * 0.262 / chem.Mass(s.Pure) * chem.Mass(s.Water)
		}
		w.Asks = append(w.Asks, ask)
		w.Steps = append(w.Steps, StepReport{N: ask.Step, Do: ask.Rule, Name: ask.StepName})
	}
	if a.most > 0 && a.volume*chem.Volume(in.Limiting)/chem.Volume(w.Batches) > a.most {
		w.Findings = append(w.Findings, Finding{Kind: noVesselFits, Severity: Warning, Step: 1, Text: "step 1 needs a larger flask than the lab has"})
	}
	n := in.Limiting * 0.7
	w.Product = Product{Substance: "pentanoic acid", Formula: "C5H10O2", Amount: n, Mass: a.molar.Mass(n), PerLimiting: 1, Yield: Yield{Mean: 0.7, SD: 0.07}}
	return w, nil
}

const onDay = inventory.Date(20790) // 2026-12-03

func grams(x float64) chem.Mass { return chem.Mass(x) * chem.Gram }

// charge is an ask of so many moles per mole of limiting reagent.
func testAsk(t *testing.T, substance, formula string, equivalents float64, accept Accept) Ask {
	t.Helper()
	f, err := chem.ParseFormula(formula)
	if err != nil {
		t.Fatal(err)
	}
	n := chem.Amount(equivalents)
	return Ask{Substance: substance, Formula: formula, Step: 1, StepName: "oxidise", Pure: f.MolarMass().Mass(n), Amount: n, Accept: accept}
}

func planOf(t *testing.T, a *asked, shelf *inventory.Shelf, target chem.Mass) *Plan {
	t.Helper()
	plan, err := tryPlan(a, shelf, target)
	if err != nil {
		t.Fatal(err)
	}
	return plan
}

func tryPlan(a *asked, shelf *inventory.Shelf, target chem.Mass) (*Plan, error) {
	if a.molar == 0 {
		a.molar = 102.13 * chem.GramPerMole
	}
	req := Request{Recipe: &Recipe{Name: "test", Limiting: "1-pentanol"}, Target: target, On: onDay, Today: onDay - 2}
	p := planning{req: req, shelf: shelf, program: a}
	return p.plan()
}

func needOf(t *testing.T, plan *Plan, substance string) *Need {
	t.Helper()
	for i := range plan.Needs {
		if plan.Needs[i].Substance == substance {
			return &plan.Needs[i]
		}
	}
	t.Fatalf("plan has no need of %s", substance)
	return nil
}

// dichromateLab holds 300 g of the dihydrate, 99.5 %, and a tank of water.
func dichromateLab() inventory.Lab {
	return inventory.Lab{
		Substances: []inventory.Substance{
			{ID: 1, Name: "sodium dichromate", Formula: "Na2Cr2O7", CAS: "10588-01-9"},
			{ID: 2, Name: "water", Formula: "H2O", CAS: "7732-18-5"},
		},
		Forms: []inventory.StockForm{
			{ID: 1, SubstanceID: 1, Name: "sodium dichromate dihydrate 99.5 %", HydrateWaters: 2, AssayLow: .995, AssayHigh: .995, Measure: inventory.ByMass},
			{ID: 2, SubstanceID: 2, Name: "water, deionised", AssayLow: 1, AssayHigh: 1, Measure: inventory.ByVolume, DensityGML: .9982},
		},
		Places: []inventory.Place{{ID: 1, StoreID: 1, Store: "A", Walk: 10}, {ID: 2, StoreID: 2, Store: "B", Walk: 20}},
		Bottles: []inventory.Bottle{
			{ID: 1, StoreID: 1, Code: "D1", FormID: 1, PlaceID: 1, State: inventory.Opened, Content: 300e6, Size: 500e6, MeasuredBy: inventory.ByWeighing, MeasuredOn: onDay - 10},
			{ID: 2, StoreID: 1, Code: "W1", FormID: 2, PlaceID: 1, State: inventory.Opened, Content: 30e6, Size: 50e6, MeasuredBy: inventory.ByLevel, MeasuredOn: onDay - 3},
		},
		Policy: inventory.PolicyOf(inventory.PolicyDefaults(onDay)),
	}
}

// The recipe asks for the anhydrous salt, the shelf holds the dihydrate of
// 99.5 %: pure mass in needs is anhydrous, what is drawn is the dihydrate,
// 298.00/261.97 times as much and more by the assay. Molar masses from the
// standard atomic weights (IUPAC): Na 22.990, Cr 51.996, O 15.999, H 1.008.
func TestPlanDichromateDihydrate(t *testing.T) {
	a := &asked{asks: []Ask{
		testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{Hydrate: true}),
		testAsk(t, "water", "H2O", 20, Accept{}),
	}}
	a.asks[1].Step = 2
	plan := planOf(t, a, inventory.NewShelf(dichromateLab()), grams(50))
	n := needOf(t, plan, "sodium dichromate")
	moles := 0.7 * 50 / 102.13 / 0.6
	const anhydrous, dihydrate = 261.965, 297.995
	if got, want := n.Mass.Grams(), moles*anhydrous; math.Abs(got-want) > 0.001*want {
		t.Errorf("need %.3f g of anhydrous dichromate, want %.3f g", got, want)
	}
	if len(n.Draws) != 1 || n.State != Covered {
		t.Fatalf("state %v, draws %d, want covered by one bottle: %s", n.State, len(n.Draws), n.Because)
	}
	if got, want := n.Draws[0].Mass.Grams(), moles*dihydrate/0.995; math.Abs(got-want) > 0.001*want {
		t.Errorf("draw %.3f g of the dihydrate, want %.3f g", got, want)
	}
	if got, want := n.Draws[0].Leaves.Grams(), 300-n.Draws[0].Mass.Grams(); math.Abs(got-want) > 1e-3 {
		t.Errorf("leaves %.3f g, want %.3f g", got, want)
	}
	// The second walk sees the water: 2 M(H2O)/M(dihydrate) of 99.5 %.
	last := a.seen[len(a.seen)-1]["sodium dichromate"]
	if want := 0.995 * 2 * 18.015 / dihydrate; math.Abs(float64(last.Water)-want) > 1e-4 {
		t.Errorf("water in the stock %.5f, want %.5f", last.Water, want)
	}
	if want := 0.995 * anhydrous / dihydrate; math.Abs(float64(last.Pure)-want) > 1e-4 {
		t.Errorf("pure in the stock %.5f, want %.5f", last.Pure, want)
	}
}

func TestPlanHydrateNotAllowed(t *testing.T) {
	a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{})}}
	n := needOf(t, planOf(t, a, inventory.NewShelf(dichromateLab()), grams(50)), "sodium dichromate")
	if n.State != Unfit || len(n.Draws) != 0 || len(n.Barred) != 1 || n.Barred[0].Kind != string(barHydrate) {
		t.Errorf("need = %v, draws %d, barred %+v; want unfit, the hydrate barred", n.State, len(n.Draws), n.Barred)
	}
}

// Why a bottle is barred, one reason each.
func TestPlanBars(t *testing.T) {
	base := inventory.Bottle{ID: 1, StoreID: 1, Code: "D1", FormID: 1, PlaceID: 1, State: inventory.Opened, Content: 300e6, Size: 500e6, MeasuredBy: inventory.ByWeighing, MeasuredOn: onDay - 10}
	form := dichromateLab().Forms[0]
	for _, tc := range []struct {
		name   string
		change func(b *inventory.Bottle, f *inventory.StockForm, lab *inventory.Lab, accept *Accept)
		want   barKind
	}{
		{"expired the day before", func(b *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, _ *Accept) { b.Expiry = onDay - 1 }, barExpired},
		{"opened too long", func(b *inventory.Bottle, f *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			b.Opened = onDay - 100
			f.OpenLifeDays = 90
		}, barExpired},
		{"quarantined", func(b *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			b.State = inventory.Quarantined
		}, barState},
		{"missing", func(b *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			b.State = inventory.Missing
		}, barState},
		{"another store", func(b *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			b.StoreID, b.PlaceID = 2, 2
		}, barStore},
		{"too weak", func(b *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, a *Accept) {
			b.LotAssay = .9
			a.Least = .95
		}, barWeak},
		{"too strong", func(_ *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, a *Accept) { a.Most = .9 }, barStrong},
		{"wrong grade", func(_ *inventory.Bottle, f *inventory.StockForm, _ *inventory.Lab, a *Accept) {
			f.Grade = "technical"
			a.Grades = []string{"analysis"}
		}, barGrade},
		{"additive", func(_ *inventory.Bottle, f *inventory.StockForm, _ *inventory.Lab, _ *Accept) { f.Additive = "BHT" }, barAdditive},
		{"peroxide test overdue", func(b *inventory.Bottle, f *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			b.Opened = onDay - 200
			f.PeroxideTestDays = 180
		}, barPeroxide},
		{"failed peroxide test", func(b *inventory.Bottle, _ *inventory.StockForm, _ *inventory.Lab, _ *Accept) { b.PeroxidePPM = 150 }, barPeroxide},
		{"promised", func(b *inventory.Bottle, _ *inventory.StockForm, lab *inventory.Lab, _ *Accept) {
			lab.Earmarks = []inventory.Earmark{{ID: 1, BottleID: 1, RunID: 9, Amount: 300e6}}
		}, barPromised},
		{"no density", func(_ *inventory.Bottle, f *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			f.Measure = inventory.ByVolume
		}, barNoData},
		{"no assay", func(_ *inventory.Bottle, f *inventory.StockForm, _ *inventory.Lab, _ *Accept) {
			f.AssayLow, f.AssayHigh = 0, 0
		}, barNoData},
	} {
		t.Run(tc.name, func(t *testing.T) {
			lab, b, f, accept := dichromateLab(), base, form, Accept{Hydrate: true}
			tc.change(&b, &f, &lab, &accept)
			lab.Bottles, lab.Forms[0] = []inventory.Bottle{b}, f
			a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, accept)}}
			n := needOf(t, planOf(t, a, inventory.NewShelf(lab), grams(50)), "sodium dichromate")
			if len(n.Barred) != 1 || n.Barred[0].Kind != string(tc.want) || n.Barred[0].Why == "" || n.State < Unfit {
				t.Errorf("state %v, barred %+v, want barred as %q", n.State, n.Barred, tc.want)
			}
		})
	}
}

// A bottle that expires on the run's day is still good on it.
func TestPlanExpiresOnTheDay(t *testing.T) {
	lab := dichromateLab()
	lab.Bottles[0].Expiry = onDay
	a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{Hydrate: true})}}
	if n := needOf(t, planOf(t, a, inventory.NewShelf(lab), grams(50)), "sodium dichromate"); len(n.Draws) != 1 {
		t.Errorf("state %v: %s", n.State, n.Because)
	}
}

func TestPlanEarmarks(t *testing.T) {
	lab := dichromateLab()
	lab.Earmarks = []inventory.Earmark{{ID: 1, BottleID: 1, RunID: 9, Amount: 200e6}}
	a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{Hydrate: true})}}
	n := needOf(t, planOf(t, a, inventory.NewShelf(lab), grams(50)), "sodium dichromate")
	// 300 g less 200 g promised less 0.5 % of 500 g that stay in the bottle.
	if got := n.Draws[0].Mass.Grams(); math.Abs(got-97.5) > 1e-6 {
		t.Errorf("draw %.4f g, want the 97.5 g that are free", got)
	}
	if n.Short <= 0 || n.State != Short {
		t.Errorf("state %v, short %.3f g, want short", n.State, n.Short.Grams())
	}
	if sum := n.Draws[0].Pure + n.Short; math.Abs(float64(sum-n.Mass)) > 1e-9 {
		t.Errorf("draws and short make %.6f g of %.6f g", sum.Grams(), n.Mass.Grams())
	}
}

func TestPlanStrongerStockIsMadeUp(t *testing.T) {
	lab := dichromateLab()
	lab.Substances = append(lab.Substances, inventory.Substance{ID: 3, Name: "sulfuric acid", Formula: "H2SO4", CAS: "7664-93-9"})
	lab.Forms = append(lab.Forms, inventory.StockForm{ID: 3, SubstanceID: 3, Name: "sulfuric acid 96 %", AssayLow: .96, AssayHigh: .96, Diluent: "water", Measure: inventory.ByVolume, DensityGML: 1.8355})
	lab.Bottles = append(lab.Bottles, inventory.Bottle{ID: 3, StoreID: 1, Code: "S1", FormID: 3, PlaceID: 1, State: inventory.Opened, Content: 900e3, Size: 1000e3, MeasuredBy: inventory.ByWeighing, MeasuredOn: onDay - 10})
	ask := testAsk(t, "sulfuric acid", "H2SO4", 1, Accept{Least: .45, Most: .5, Solution: true})
	ask.CAS = "7664-93-9"
	plan := planOf(t, &asked{asks: []Ask{ask}}, inventory.NewShelf(lab), grams(50))
	n, water := needOf(t, plan, "sulfuric acid"), needOf(t, plan, "water")
	// m(water) = m(pure)/0.50 − m(pure)/0.96, by mass balance.
	if want := n.Mass.Grams() * (1/0.5 - 1/0.96); math.Abs(water.Mass.Grams()-want) > 1e-6*want {
		t.Errorf("water %.4f g, want %.4f g", water.Mass.Grams(), want)
	}
	if len(plan.Steps) != 2 || plan.Steps[0].Do != "make-up" || plan.Steps[1].N != 2 || n.Draws[0].Steps[0].Step != 2 {
		t.Errorf("steps %+v, want a make-up before the step, and numbers anew", plan.Steps)
	}
	if plan.Steps[0].Heat <= 0 || !strings.Contains(strings.Join(plan.Steps[0].Cautions, " "), "never pour water into it") {
		t.Errorf("make-up gives %v J, cautions %q", plan.Steps[0].Heat, plan.Steps[0].Cautions)
	}
	last := n.Draws[0].Pure.Grams() / 0.96
	if math.Abs(n.Draws[0].Mass.Grams()-last) > 1e-6 {
		t.Errorf("draw %.4f g, want %.4f g of the 96 %% acid", n.Draws[0].Mass.Grams(), last)
	}
}

func TestPlanRefusals(t *testing.T) {
	shelf := inventory.NewShelf(dichromateLab())
	recipe := &Recipe{Name: "test"}
	for _, tc := range []struct {
		name string
		req  Request
		kind error
	}{
		{"no recipe", Request{Target: 1, On: onDay, Today: onDay}, ErrNoRecipe},
		{"zero", Request{Recipe: recipe, On: onDay, Today: onDay}, ErrTarget},
		{"negative", Request{Recipe: recipe, Target: -1, On: onDay, Today: onDay}, ErrTarget},
		{"less than the ledger knows", Request{Recipe: recipe, Target: 1e-15, On: onDay, Today: onDay}, ErrTarget},
		{"more than a laboratory makes", Request{Recipe: recipe, Target: 1e9, On: onDay, Today: onDay}, ErrTarget},
		{"no number", Request{Recipe: recipe, Target: chem.Mass(math.NaN()), On: onDay, Today: onDay}, ErrTarget},
		{"past", Request{Recipe: recipe, Target: 1, On: onDay - 1, Today: onDay}, ErrDate},
		{"no date", Request{Recipe: recipe, Target: 1, Today: onDay}, ErrDate},
		{"batches", Request{Recipe: recipe, Target: 1, On: onDay, Today: onDay, Batches: -2}, ErrBatches},
	} {
		p := planning{req: tc.req, shelf: shelf, program: &asked{}}
		_, err := p.plan()
		var refused *RequestError
		if !errors.As(err, &refused) || !errors.Is(err, tc.kind) || refused.Would == "" {
			t.Errorf("%s: error %v, want %v with what would do", tc.name, err, tc.kind)
		}
	}
}

// Univ. Illinois DRS (read as a stored copy): more than 15 g of substrate or
// 500 mL of solvent is large.
func TestPlanLargeFindings(t *testing.T) {
	a := &asked{asks: []Ask{testAsk(t, "1-pentanol", "C5H12O", 1, Accept{})}}
	plan := planOf(t, a, inventory.NewShelf(dichromateLab()), grams(50)) // 0.816 mol, 71.9 g
	kinds := map[string]bool{}
	for _, f := range plan.Findings {
		kinds[f.Kind] = true
	}
	if !kinds["large-substrate"] || kinds["large-solvent"] {
		t.Errorf("findings %v, want the substrate, not the solvent", kinds)
	}
}

func TestPlanNoVessel(t *testing.T) {
	shelf := inventory.NewShelf(dichromateLab())
	a := &asked{asks: []Ask{testAsk(t, "sodium dichromate", "Na2Cr2O7", 0.7, Accept{Hydrate: true})}, volume: 1 * chem.Litre, most: 1 * chem.Litre}
	plan, err := tryPlan(a, shelf, grams(100)) // 1.63 mol
	if err != nil || plan.Scale.Batches != 2 {
		t.Fatalf("plan %v, want two batches", err)
	}
	_, err = tryPlan(a, shelf, grams(1000))
	if !errors.Is(err, ErrNoVessel) {
		t.Fatalf("error %v, want no vessel", err)
	}
	// One litre takes one mole, which is 61.3 g of product at the yield planned.
	if !strings.Contains(err.Error(), "at most 61.3 g fits in one batch; ask for 17 batches or for less product") {
		t.Errorf("error %q doesn't name the 61.3 g that fit and the 17 batches of 1000 g", err)
	}
}

// 800 g of pure acid are wanted at 45 % or more; 500 g of pure acid lie there at
// 96 %, the rest at 30 %. With P = 500 g and M = 520.8 g the weak one may give
// (500/0.45 − 520.8)/(1/0.30 − 1/0.45) = 531 g, so the 300 g missing fit, and the
// blend is 800/(520.8 + 1000) = 52.6 %.
func TestPlanBlendsWeakStock(t *testing.T) {
	lab := dichromateLab()
	lab.Substances = append(lab.Substances, inventory.Substance{ID: 3, Name: "sulfuric acid", Formula: "H2SO4", CAS: "7664-93-9"})
	lab.Forms = append(lab.Forms,
		inventory.StockForm{ID: 3, SubstanceID: 3, Name: "sulfuric acid 96 %", AssayLow: .96, AssayHigh: .96, Diluent: "water", Measure: inventory.ByMass},
		inventory.StockForm{ID: 4, SubstanceID: 3, Name: "sulfuric acid 30 %", AssayLow: .30, AssayHigh: .30, Diluent: "water", Measure: inventory.ByMass})
	lab.Bottles = append(lab.Bottles,
		inventory.Bottle{ID: 3, StoreID: 1, Code: "S1", FormID: 3, PlaceID: 1, State: inventory.Opened, Content: 520833333, Size: 1, MeasuredBy: inventory.ByWeighing, MeasuredOn: onDay - 10},
		inventory.Bottle{ID: 4, StoreID: 1, Code: "S2", FormID: 4, PlaceID: 1, State: inventory.Opened, Content: 2000e6, Size: 1, MeasuredBy: inventory.ByWeighing, MeasuredOn: onDay - 10})
	n := 50 / 102.13 / 0.6
	ask := testAsk(t, "sulfuric acid", "H2SO4", 800/98.078/n, Accept{Least: .45, Solution: true})
	plan := planOf(t, &asked{asks: []Ask{ask}}, inventory.NewShelf(lab), grams(50))
	need := needOf(t, plan, "sulfuric acid")
	if len(need.Draws) != 2 || need.Short > 0 {
		t.Fatalf("draws %d, short %.3f g: %s", len(need.Draws), need.Short.Grams(), need.Because)
	}
	pure, mass := 0.0, 0.0
	for _, d := range need.Draws {
		pure += float64(d.Pure)
		mass += float64(d.Mass)
	}
	if got := pure / mass; math.Abs(got-0.526) > 0.001 {
		t.Errorf("blend of %.4f, want 0.526", got)
	}
	// At 60 % the weak one may give only (500/0.6 − 520.8)/(1/0.3 − 1/0.6) = 187.5 g.
	ask.Accept.Least = .6
	need = needOf(t, planOf(t, &asked{asks: []Ask{ask}}, inventory.NewShelf(lab), grams(50)), "sulfuric acid")
	if got := need.Short.Grams(); math.Abs(got-112.5) > 0.2 {
		t.Errorf("short %.3f g, want 112.5 g", got)
	}
}

// A substitute does the work of the substance by its factor: 1.3 g of it for
// 1 g, at 95 % in the bottle. Where the recipe doesn't name it, it isn't taken.
func TestPlanSubstitute(t *testing.T) {
	lab := dichromateLab()
	lab.Substances = append(lab.Substances,
		inventory.Substance{ID: 3, Name: "magnesium sulfate", Formula: "MgSO4"},
		inventory.Substance{ID: 4, Name: "calcium chloride", Formula: "CaCl2"})
	lab.Forms = append(lab.Forms, inventory.StockForm{ID: 3, SubstanceID: 4, Name: "calcium chloride 95 %", AssayLow: .95, AssayHigh: .95, Measure: inventory.ByMass})
	lab.Bottles = append(lab.Bottles, inventory.Bottle{ID: 3, StoreID: 1, Code: "C1", FormID: 3, PlaceID: 1, State: inventory.Opened, Content: 500e6, Size: 500e6, MeasuredBy: inventory.ByWeighing, MeasuredOn: onDay - 10})
	ask := testAsk(t, "magnesium sulfate", "MgSO4", 0.2, Accept{Substitutes: []Substitute{{Substance: "calcium chloride", Factor: 1.3}}})
	n := needOf(t, planOf(t, &asked{asks: []Ask{ask}}, inventory.NewShelf(lab), grams(50)), "magnesium sulfate")
	if len(n.Draws) != 1 || n.Short > 0 {
		t.Fatalf("draws %d, short %v: %s", len(n.Draws), n.Short, n.Because)
	}
	if got, want := n.Draws[0].Mass.Grams(), n.Mass.Grams()*1.3/.95; math.Abs(got-want) > 1e-6*want {
		t.Errorf("draws %.4f g of the substitute, want %.4f g", got, want)
	}
	ask.Accept.Substitutes = nil
	if n := needOf(t, planOf(t, &asked{asks: []Ask{ask}}, inventory.NewShelf(lab), grams(50)), "magnesium sulfate"); n.State != Short {
		t.Errorf("state %v without a substitute, want short", n.State)
	}
}

// What brings the chance under the limit is what the draws lack: a bottle of
// 300 g ± 1 % and a need of 300 g ± 1 % fall short half the time; 1.645 standard
// deviations of √2 · 3 g more, 7.0 g, make it 5 %.
func TestPlanCoverWith(t *testing.T) {
	a := &assessor{n: 100_000, seed: 3, limit: 0.05}
	x := fit{pure: 1, bottle: &inventory.Bottle{Code: "B"}}
	r := needRisk{
		cover: &coverage{}, charges: []float64{300}, short: make([]bool, a.n),
		losses:  []quantity{{stream: chem.NewStream(3, "need"), mean: 1, sd: .01, most: math.Inf(1)}},
		bottles: []bottleRisk{{fit: &x, content: quantity{stream: chem.NewStream(3, "content"), mean: 300, sd: 3, most: 400}, strength: quantity{mean: 1, most: 1}}},
	}
	r.bound()
	r.draw(r.bottles)
	if math.Abs(r.chance-0.5) > 0.01 {
		t.Errorf("chance %.4f, want one half", r.chance)
	}
	if got, want := r.lacking(1-a.limit), 1.645*math.Sqrt2*3; math.Abs(got-want) > 0.15 {
		t.Errorf("lacking %.3f g, want %.3f g", got, want)
	}
}

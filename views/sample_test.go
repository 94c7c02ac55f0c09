package views

import (
	"context"
	"slices"
	"testing"
	"time"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
	"stillroom/planner/reckoner"
)

// sampleToday is the day on which every test page is made.
var sampleToday = inventory.NewDate(2026, 12, 1)

// newSampleLab is the demonstration lab in memory.
func newSampleLab(t testing.TB) *inventory.Store {
	t.Helper()
	ctx := context.Background()
	noon := sampleToday.Time().Add(12 * time.Hour)
	store, err := inventory.Open(ctx, inventory.Options{Memory: true, Now: func() time.Time { return noon }})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { store.Close() })
	if err := store.Fill(ctx, inventory.DemoLab(sampleToday), inventory.Act{By: "test"}); err != nil {
		t.Fatal(err)
	}
	return store
}

// samplePlan is a plan with every need state, made up to look at; the amounts
// in it are nobody's.
func samplePlan(req planner.Request, shelf *inventory.Shelf) (*planner.Plan, error) {
	main := slices.DeleteFunc(slices.Clone(shelf.Bottles), func(b inventory.Bottle) bool {
		f, _ := shelf.Form(b.FormID)
		least := map[inventory.Measure]int64{inventory.ByMass: 200e6, inventory.ByVolume: 200e3}[f.Measure]
		return b.StoreID != 1 || least == 0 || b.Content < least || len(shelf.EarmarksOn(b.ID)) > 0 || b.State != inventory.Sealed
	})
	bottle := func(i int) planner.Draw {
		b := main[i%len(main)]
		f, _ := shelf.Form(b.FormID)
		p, _ := shelf.Place(b.PlaceID)
		return planner.Draw{Bottle: b, Form: f, Place: p, Mass: 63.5 * chem.Gram, Volume: 78 * chem.Millilitre, HasVolume: f.Measure == inventory.ByVolume, Why: "expires first"}
	}
	why := chem.Derivation{Of: "sodium dichromate, anhydrous", Formula: "m = n · M / w", Inserted: "m = 0.527 mol · 261.97 g/mol / 0.995", Value: 138.7, Unit: "g",
		Inputs: []chem.Input{{Symbol: "n", Name: "amount of oxidant", Value: .527, Unit: "mol", Source: "recipe, 0.73 mol per mol"}, {Symbol: "M", Name: "molar mass of Na2Cr2O7", Value: 261.97, Unit: "g/mol", Source: "standard atomic weights"}},
		Source: "made up", Range: "any amount"}
	return &planner.Plan{
		Recipe: req.Recipe, On: req.On, Today: req.Today, Verdict: planner.Short, Revision: "7f3a12bc",
		Sentence: "Not yet: dry sodium sulfate is short by 38 g. Buy one pack of 500 g by Tuesday 8 December and the run is likely enough, 94 %.",
		Target:   planner.Target{Substance: req.Recipe.Product, Formula: "C5H10O2", Mass: req.Target},
		Scale:    planner.Scale{Limiting: "1-pentanol", Amount: .72, ExpectedYield: .78, PlannedYield: .68, ExpectedMass: 57 * chem.Gram, Percentile: .9, Derivation: why},
		Needs: []planner.Need{
			{Substance: "1-pentanol", Formula: "C5H12O", Mass: 63.5 * chem.Gram, State: planner.Covered, ChanceShort: .001, Draws: []planner.Draw{bottle(40)}, Derivation: why, For: []string{"add"}},
			{Substance: "sodium dichromate", Formula: "Na2Cr2O7", Mass: 138 * chem.Gram, State: planner.Covered, ChanceShort: .003, Draws: []planner.Draw{bottle(2)}, Derivation: why},
			{Substance: "ethyl acetate", Formula: "C4H8O2", Mass: 466 * chem.Gram, State: planner.Tight, ChanceShort: .052, Because: "one bottle was judged by eye", Draws: []planner.Draw{bottle(20), bottle(21)}},
			{Substance: "diethyl ether", Formula: "C4H10O", Mass: 210 * chem.Gram, State: planner.Unfit, Because: "the only bottle has expired", ChanceShort: -1},
			{Substance: "sodium metabisulfite", Formula: "Na2S2O5", Mass: 40 * chem.Gram, State: planner.Late, Because: "an order arrives two days after the run", ChanceShort: -1, Hidden: true, Why: "destroys 0.09 mol of left-over dichromate, half as much again"},
			{Substance: "sodium sulfate", Formula: "Na2SO4", Mass: 60 * chem.Gram, Short: 38 * chem.Gram, State: planner.Short, ChanceShort: -1, Draws: []planner.Draw{bottle(7)}},
		},
		Steps: []planner.StepReport{
			{N: 1, Do: "make-up", Name: "make up the oxidant", Vessel: planner.VesselReport{Kind: "round flask", Size: 2 * chem.Litre, Fill: .31, Fits: true}, Adds: []planner.Add{{Substance: "water", Volume: 400 * chem.Millilitre, HasVolume: true}, {Substance: "sodium dichromate dihydrate", Mass: 157 * chem.Gram, Derivation: why}}, Temperature: chem.Celsius(15), Heat: 96 * chem.Kilojoule, Ice: .3,
				Contents:    []planner.Content{{Substance: "water", Formula: "H2O", Phase: "aqueous", Volume: 610 * chem.Millilitre, Mass: .7, Amount: 30}},
				Derivations: []chem.Derivation{why}, Cautions: []string{"Acid into water, never the other way."}},
			{N: 2, Do: "add", Name: "add 1-pentanol", Vessel: planner.VesselReport{Kind: "round flask", Size: 2 * chem.Litre, Fill: .4, Fits: true}, Heat: 412 * chem.Kilojoule, Shortest: 48 * 60, IfCoolingLost: chem.Celsius(96),
				Contents: []planner.Content{{Substance: "water", Phase: "aqueous", Volume: 700 * chem.Millilitre, Mass: .8}, {Substance: "1-pentanol", Phase: "organic", Volume: 80 * chem.Millilitre, Mass: .064}}},
			{N: 3, Do: "extract", Name: "extract", Says: []string{"98.2 % of the acid", "a fifth portion would add 0.9 %"}, Vessel: planner.VesselReport{Kind: "separating funnel", Size: 1 * chem.Litre, Fill: .58, Fits: true},
				Contents: []planner.Content{{Substance: "water", Phase: "aqueous", Volume: 430 * chem.Millilitre, Mass: .43}, {Substance: "ethyl acetate", Phase: "organic", Volume: 150 * chem.Millilitre, Mass: .13}}},
			{N: 4, Do: "dry", Name: "dry", Vessel: planner.VesselReport{Kind: "conical flask", Size: .5 * chem.Litre, Fill: .7, Fits: true},
				Contents: []planner.Content{{Substance: "sodium sulfate", Phase: "solid", Volume: 40 * chem.Millilitre, Mass: .09}, {Substance: "ethyl acetate", Phase: "organic", Volume: 300 * chem.Millilitre, Mass: .27}}},
			{N: 5, Do: "quench", Name: "destroy the left-over oxidant", Vessel: planner.VesselReport{Kind: "beaker", Size: 3 * chem.Litre, Fill: .55, Fits: true}, TimeNotAssessed: true,
				Contents: []planner.Content{{Substance: "water", Phase: "aqueous", Volume: 1.6 * chem.Litre, Mass: 1.7}}},
		},
		Flow: []planner.Flow{
			{From: "shelf", To: "make up the oxidant", Substance: "water", Mass: .4}, {From: "shelf", To: "make up the oxidant", Substance: "sodium dichromate dihydrate", Mass: .157},
			{From: "make up the oxidant", To: "add 1-pentanol", Substance: "water", Mass: .45}, {From: "make up the oxidant", To: "add 1-pentanol", Substance: "sodium dichromate", Mass: .107},
			{From: "shelf 2", To: "add 1-pentanol", Substance: "1-pentanol", Mass: .0635},
			{From: "add 1-pentanol", To: "extract", Substance: "pentanoic acid", Mass: .058}, {From: "add 1-pentanol", To: "extract", Substance: "water", Mass: .25}, {From: "add 1-pentanol", To: "destroy the left-over oxidant", Substance: "chromium", Mass: .31},
			{From: "shelf 3", To: "extract", Substance: "ethyl acetate", Mass: .43}, {From: "extract", To: "product", Substance: "pentanoic acid", Mass: .056}, {From: "extract", To: "halogen-free solvent", Substance: "ethyl acetate", Mass: .42}, {From: "extract", To: "aqueous", Substance: "water", Mass: .26},
			{From: "destroy the left-over oxidant", To: "chromium sludge", Substance: "chromium(III) hydroxide", Mass: .31},
		},
		Waste:    []planner.WasteLot{{Stream: "halogen-free solvent", Mass: .5, Volume: 500 * chem.Millilitre, Contains: []planner.Content{{Substance: "ethyl acetate", Mass: .42}}, Carboy: shelf.Carboys[0].Code, Fits: true}},
		Hazards:  []planner.HazardNote{{At: "as stored", What: "sodium dichromate", Signal: "Danger", Statements: []string{"H350 May cause cancer"}, Basis: "harmonised"}, {At: "add", What: "pentanal", Formed: true}},
		Carriers: []planner.Carrier{{N: 1, Bottles: []string{shelf.Bottles[0].Code, shelf.Bottles[1].Code}}},
		Buy:      []planner.Purchase{{Substance: "sodium sulfate", Offer: shelf.Offers[0], Form: shelf.Forms[0], Packs: 1, Cost: 1850, Currency: "EUR", OrderBy: req.On.AddDays(-5), Arrives: req.On.AddDays(-1), InTime: true}},
		Risk:     planner.Risk{Draws: 10000, Seed: 1, RunEnough: .94, TargetMet: .91, MassLow: .048, MassMedian: .057, MassHigh: .066, Decides: "ethyl acetate", WeighFirst: shelf.Bottles[3].Code, WeighBefore: .06, WeighAfter: .012},
		Findings: []planner.Finding{{Kind: "scale-beyond-proven", Severity: planner.Warning, Text: "This is 4 times the largest proven scale.", Would: "Make half of it first."}},
	}, nil
}

// newSampleServer makes a server with the demonstration lab and the made-up
// plan.
func newSampleServer(t testing.TB) *Server {
	t.Helper()
	s, err := New(Config{Lab: newSampleLab(t), Plan: samplePlan, Recipes: planner.Recipes(), Sums: sampleSums(), Today: func() inventory.Date { return sampleToday }})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// sampleSums is one sum that adds nothing to chemistry, for the form around it.
func sampleSums() []reckoner.Sum {
	return []reckoner.Sum{{
		Name: "amount", Title: "Amount of substance", Group: "Amounts", About: "How many moles a mass is.",
		Keys:    []reckoner.Key{{Name: "mass", Label: "mass", Hint: "50 g"}, {Name: "purity", Label: "purity", Hint: "98 %", Optional: true}},
		Example: []string{"mass=50 g"}, Range: "any mass", Source: "made up",
		Run: func(_ context.Context, a reckoner.Args) (reckoner.Answer, error) {
			m, err := chem.ParseMass(a["mass"])
			if err != nil {
				return reckoner.Answer{}, err
			}
			return reckoner.Answer{Sum: "amount", Results: []reckoner.Result{{Name: "amount", Value: m.Grams() / 98.0785, Unit: "mol"}},
				Derivation: chem.Derivation{Formula: "n = m / M", Inserted: "n = 50 g / 98.08 g/mol"}}, nil
		},
	}}
}

// newDemoServer is the demonstration lab as the program serves it.
func newDemoServer(t testing.TB) *Server {
	t.Helper()
	s, err := New(Config{Lab: newSampleLab(t), Recipes: planner.Recipes(), Sums: reckoner.Sums(), Today: func() inventory.Date { return sampleToday }})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// The answer a person waits for most often: a run page on the demonstration
// lab, database, plan and rendering included.
func BenchmarkRunPage(b *testing.B) {
	s := newDemoServer(b)
	for b.Loop() {
		if w := get(b, s, "/runs/1"); w.Code != 200 {
			b.Fatal(w.Code)
		}
	}
}

package planner

import (
	"fmt"
	"math/rand/v2"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
)

// crowdedLab is the demonstration lab with bottles of its own forms added until
// there are n, in every state of wear: a site's shelf on which everything the
// recipe needs is there more than a thousand times.
func crowdedLab(today inventory.Date, n int) inventory.Lab {
	lab := inventory.DemoLab(today)
	r := rand.New(rand.NewPCG(1, 2))
	first := len(lab.Bottles)
	for i := first; i < n; i++ {
		b := lab.Bottles[r.IntN(first)]
		b.ID, b.Code = int64(i+1), fmt.Sprintf("X%06d", i)
		if b.State == inventory.Sealed || r.IntN(3) == 0 {
			b.State, b.Content, b.MeasuredBy = inventory.Sealed, b.Size, inventory.ByUnopened
			b.Opened = 0
		} else if b.Content > 10 {
			b.Content = b.Content/10 + r.Int64N(b.Content)
		}
		if b.Expiry.Set() {
			b.Expiry = b.Expiry.AddDays(r.IntN(400) - 200)
		}
		lab.Bottles = append(lab.Bottles, b)
	}
	return lab
}

// siteLab is the demonstration lab within a site of n bottles: some 2,500
// substances with forty bottles each, those of the recipe among them.
func siteLab(today inventory.Date, n int) inventory.Lab {
	const others = 2440
	lab := crowdedLab(today, n/41)
	firstForm := int64(len(lab.Forms))
	for i := range int64(others) {
		lab.Substances = append(lab.Substances, inventory.Substance{ID: 1000 + i, Name: fmt.Sprint("substance ", i), Formula: "C2H6O"})
		lab.Forms = append(lab.Forms, inventory.StockForm{ID: firstForm + 1 + i, SubstanceID: 1000 + i, Name: fmt.Sprint("form ", i), AssayLow: .99, AssayHigh: 1, Measure: inventory.ByMass})
	}
	for i := len(lab.Bottles); i < n; i++ {
		b := lab.Bottles[i%80]
		b.ID, b.Code, b.FormID = int64(i+1), fmt.Sprintf("Y%06d", i), firstForm+1+int64(i%others)
		lab.Bottles = append(lab.Bottles, b)
	}
	return lab
}

// BenchmarkPlan plans the dichromate recipe after load. "site" spreads the
// bottles over 2,500 substances, as a site's are; "crowded" holds bottles of the
// demonstration lab's sixty forms alone, over a thousand of everything the
// recipe needs.
func BenchmarkPlan(b *testing.B) {
	today := inventory.NewDate(2026, 12, 1)
	r, ok := RecipeByName("pentanoic-acid-dichromate")
	if !ok {
		b.Fatal("no recipe")
	}
	for _, c := range []struct {
		name string
		lab  inventory.Lab
	}{
		{"demo", inventory.DemoLab(today)},
		{"site-100000", siteLab(today, 100_000)},
		{"crowded-100000", crowdedLab(today, 100_000)},
	} {
		shelf := inventory.NewShelf(c.lab)
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				if _, err := MakePlan(Request{Recipe: r, Target: 50 * chem.Gram, On: today.AddDays(9), Today: today}, shelf); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

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

func BenchmarkPlan(b *testing.B) {
	today := inventory.NewDate(2026, 12, 1)
	r, ok := RecipeByName("pentanoic-acid-dichromate")
	if !ok {
		b.Fatal("no recipe")
	}
	for _, n := range []int{100, 10_000, 100_000} {
		shelf := inventory.NewShelf(crowdedLab(today, n))
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			for b.Loop() {
				if _, err := MakePlan(Request{Recipe: r, Target: 50 * chem.Gram, On: today.AddDays(9), Today: today}, shelf); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

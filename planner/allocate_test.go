package planner

import (
	"fmt"
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"stillroom/inventory"
)

func deliveredPoints() points { return allocatePoints(newPolicyTable(nil)) }

// bruteAllocate tries every subset of the lines and prices it from the words
// of the objective, not from the search.
func bruteAllocate(need float64, lines []line, p points) int64 {
	ranks := make([]int, len(lines))
	for i := range ranks {
		ranks[i] = i
	}
	slices.SortFunc(ranks, func(i, j int) int {
		if lines[i].code < lines[j].code {
			return -1
		}
		return 1
	})
	rank := map[int]int64{}
	for r, i := range ranks {
		rank[i] = int64(r)
	}
	best := int64(math.MaxInt64)
	for set := 1; set < 1<<len(lines); set++ {
		if cost, ok := priceOf(need, lines, set, rank, p); ok {
			best = min(best, cost)
		}
	}
	return best
}

func priceOf(need float64, lines []line, set int, rank map[int]int64, p points) (int64, bool) {
	var pick []int
	for i := range lines {
		if set>>i&1 == 1 {
			pick = append(pick, i)
		}
	}
	slices.SortFunc(pick, func(i, j int) int { return byDrawing(&lines[i], &lines[j]) })
	left, points, ties := need, 0.0, int64(0)
	for _, i := range pick {
		l := lines[i]
		amount := min(left, l.free)
		if amount <= 0 {
			return 0, false
		}
		left -= amount
		f := p.bottle + p.walk*float64(l.walk-firstWalk(lines))
		if l.sealed {
			f += p.opening
		}
		days := 0.0
		if first := firstLife(lines); first.Set() {
			days = p.laterMost
			if l.life.Set() {
				days = min(p.laterMost, p.later*float64(l.life-first))
			}
		}
		extra := days * amount / need
		switch heel := l.all - amount; {
		case heel <= l.all*1e-9:
			extra -= p.finished
		case heel < l.heel:
			extra += p.useless
		}
		points += math.Round(f-p.finished) + math.Round(extra+p.finished)
		ties += rank[i]
	}
	if left > need*enough {
		return 0, false
	}
	return int64(points)*tie + ties, true
}

func randomLines(r *rand.Rand, n int) []line {
	lines := make([]line, n)
	for i := range lines {
		size := []float64{100, 250, 500}[r.IntN(3)]
		l := line{at: i, all: size, code: fmt.Sprintf("B%02d", r.IntN(90)*10+i), walk: 10 * r.IntN(5), heel: 0.05 * size}
		if l.sealed = r.IntN(2) == 0; !l.sealed {
			l.all = math.Round(size*r.Float64()) + 1
		}
		l.free = l.all
		if r.IntN(4) == 0 {
			l.free = math.Round(l.all * r.Float64())
		}
		if r.IntN(5) > 0 {
			l.life = inventory.Date(20000 + 30*r.IntN(30))
		}
		lines[i] = l
	}
	return lines
}

func TestAllocateAgainstBruteForce(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 5))
	p := deliveredPoints()
	for range 2000 {
		lines := randomLines(r, 1+r.IntN(9))
		need := math.Round(900*r.Float64()) + 1
		got := allocate(need, lines, p)
		sum := 0.0
		for _, d := range got.taken {
			if d.amount > lines[d.line].free*(1+1e-12) || d.amount <= 0 {
				t.Fatalf("takes %g of %g", d.amount, lines[d.line].free)
			}
			sum += d.amount
		}
		if math.Abs(sum+got.short-need) > 1e-9*need {
			t.Fatalf("draws %g and short %g don't make the need %g", sum, got.short, need)
		}
		if got.short > 0 {
			continue
		}
		if want := bruteAllocate(need, lines, p); got.cost != want {
			t.Errorf("need %g of %+v: cost %d, brute force %d", need, lines, got.cost, want)
		}
	}
}

// FEFO with opened bottles first: METHODS k and practice §4, common practice.
func TestAllocateFirstExpiredFirstOut(t *testing.T) {
	lines := []line{
		{code: "LATE", all: 100, free: 100, life: 20400},
		{code: "SOON", all: 30, free: 30, life: 20020},
		{code: "SEALED", all: 500, free: 500, life: 20010, sealed: true},
	}
	got := allocate(50, lines, deliveredPoints())
	want := []taken{{1, 30}, {0, 20}}
	if !slices.Equal(got.taken, want) {
		t.Errorf("allocate = %v, want %v: the first to expire of the opened ones, then the next", got.taken, want)
	}
}

func TestAllocateKeepsClassesApart(t *testing.T) {
	lines := []line{
		{code: "A", all: 30, free: 30, class: "L1"}, {code: "B", all: 30, free: 30, class: "L2"},
		{code: "C", all: 60, free: 60, class: "L2", sealed: true},
	}
	if got := allocate(50, lines, deliveredPoints()); got.mixed || len(got.taken) != 1 || got.taken[0].line != 2 {
		t.Errorf("allocate = %+v, want the one lot that is enough", got)
	}
	if got := allocate(110, lines, deliveredPoints()); !got.mixed || got.short != 0 {
		t.Errorf("allocate = %+v, want both lots, and that said", got)
	}
}

func BenchmarkAllocate(b *testing.B) {
	r := rand.New(rand.NewPCG(3, 5))
	lines := randomLines(r, 1600)
	slices.SortFunc(lines, func(x, y line) int { return strings.Compare(x.code, y.code) })
	p := deliveredPoints()
	for _, need := range []float64{40, 400} {
		b.Run(fmt.Sprint(need), func(b *testing.B) {
			var got allocation
			for b.Loop() {
				got = allocate(need, lines, p)
			}
			if !got.proven {
				b.Error("not proven")
			}
		})
	}
}

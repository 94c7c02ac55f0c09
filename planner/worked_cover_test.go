package planner

import (
	"errors"
	"strconv"
	"strings"
	"testing"
)

// dear is a price per unit above any gain, so that the cheapest cover is an exact one
// wherever there is one.
const dear = 1_000_000

// coverNotAsked are the rows of l_combinatorial that neither covering nor colouring
// answers; each is told with its reason, and any other row without a way to compute it
// fails.
var coverNotAsked = map[string]string{
	"L04": "generalised assignment: nothing in a run is assigned to capacities for a profit",
	"L21": "cutting stock: the program buys packs and cuts none",
}

// TestWorkedCovers puts the published puzzles of l_combinatorial as questions of
// covering a need by packs, where they can be put that way, and so checks the search
// that buys. Covering and colouring rows are those of TestWorkedCombinatorial.
func TestWorkedCovers(t *testing.T) {
	solve := map[string]func(*testing.T, *workedRow) float64{
		"0-1 knapsack": bestKnapsack, "change making": fewestCoins, "rod cutting": bestRod, "Frobenius": largestGap,
	}
	for _, r := range workedRows(t, "l_combinatorial") {
		switch kind := r.inputs["type"]; {
		case kind == "minimum-cost covering" || kind == "graph colouring":
		case coverNotAsked[r.id] != "":
			t.Logf("%s: %s", r.id, coverNotAsked[r.id])
		case solve[kind] == nil:
			t.Errorf("%s: no way to compute %s", r.id, kind)
		default:
			r.check(t, solve[kind](t, &r), nil)
		}
	}
}

// leastCost returns the cost of covering a need. Where the search gives up proving that
// it is the least, it still has to be the published one.
func leastCost(t *testing.T, need PackNeed) int64 {
	t.Helper()
	order, err := CheapestPacks([]PackNeed{need})
	if err != nil && !errors.Is(err, ErrPacksNotProven) {
		t.Fatal(err)
	}
	return order.Cost
}

// bestKnapsack turns the question round: what is left out has to cover the weight over
// the capacity at the least value, each item once.
func bestKnapsack(t *testing.T, r *workedRow) float64 {
	weights, values := numbers(t, r.inputs["weights"]), numbers(t, r.inputs["values"])
	need := PackNeed{Amount: -r.number(t, "capacity")}
	total := 0.0
	for i, w := range weights {
		need.Amount += w
		total += values[i]
		need.Offers = append(need.Offers, PackOffer{Name: strconv.Itoa(i), Size: w, Price: int64(values[i]), Breaks: []PackBreak{{2, dear}}})
	}
	return total - float64(leastCost(t, need))
}

// fewestCoins prices a coin by its size and one more, so that exact change costs
// least and of that the fewest coins.
func fewestCoins(t *testing.T, r *workedRow) float64 {
	amount := r.number(t, "amount")
	need := PackNeed{Amount: amount}
	for _, c := range numbers(t, r.inputs["coins"]) {
		need.Offers = append(need.Offers, PackOffer{Size: c, Price: int64(c)*dear + 1})
	}
	return float64(leastCost(t, need)) - amount*dear
}

// bestRod prices a piece by its length less its revenue.
func bestRod(t *testing.T, r *workedRow) float64 {
	length := r.number(t, "length")
	prices, _, _ := strings.Cut(r.inputs["prices"], " ")
	need := PackNeed{Amount: length}
	for i, p := range numbers(t, prices) {
		need.Offers = append(need.Offers, PackOffer{Size: float64(i + 1), Price: int64(i+1)*dear - int64(p)})
	}
	return length*dear - float64(leastCost(t, need))
}

// largestGap looks for the largest amount whose cheapest cover, at one per unit, isn't
// exact, from an amount down above which there is none: sizes 6 and 9 with 20 make
// every multiple of 3 from 6 up, and with one or two of 20 every other from 45 up.
func largestGap(t *testing.T, r *workedRow) float64 {
	sizes := numbers(t, r.inputs["packs"])
	for amount := sizes[0] * sizes[len(sizes)-1]; amount > 0; amount-- {
		need := PackNeed{Amount: amount}
		for _, s := range sizes {
			need.Offers = append(need.Offers, PackOffer{Size: s, Price: int64(s)})
		}
		if float64(leastCost(t, need)) > amount {
			return amount
		}
	}
	return 0
}

func numbers(t *testing.T, text string) []float64 {
	t.Helper()
	var list []float64
	for item := range strings.SplitSeq(text, ",") {
		list = append(list, number(t, item))
	}
	return list
}

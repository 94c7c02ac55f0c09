package planner

import (
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

// solver returns the path of the integer-programming solver cbc, or skips.
func solver(t *testing.T) string {
	t.Helper()
	path, err := exec.LookPath("cbc")
	if err == nil {
		return path
	}
	if os.Getenv("STILLROOM_CI") == "1" {
		t.Fatal("cbc is not installed, and STILLROOM_CI=1 makes it compulsory (Debian: coinor-cbc)")
	}
	t.Skip("skipped: the integer-programming solver cbc is not installed (Debian: coinor-cbc)")
	return ""
}

// packProgram writes the problem as an integer program in the LP format:
// packs of each offer as whole numbers, a supplier's order as 0 or 1, the goods
// charged to it at least their value and at least the least order value.
func packProgram(needs []PackNeed) string {
	var object, rows, ints, bins []string
	goods := map[string][]string{}
	fee, extra, least := map[string]int64{}, map[string]int64{}, map[string]int64{}
	var suppliers []string
	for i, n := range needs {
		var cover []string
		for k, o := range n.Offers {
			x := fmt.Sprintf("x_%d_%d", i, k)
			cover = append(cover, fmt.Sprintf("%g %s", o.Size, x))
			ints = append(ints, x)
			if _, ok := goods[o.Supplier]; !ok {
				suppliers = append(suppliers, o.Supplier)
			}
			goods[o.Supplier] = append(goods[o.Supplier], fmt.Sprintf("%d %s", o.Price, x))
			fee[o.Supplier], least[o.Supplier] = max(fee[o.Supplier], o.Fee), max(least[o.Supplier], o.Least)
			extra[o.Supplier] = max(extra[o.Supplier], o.Surcharge)
			rows = append(rows, fmt.Sprintf("%s - 100000 y_%s <= 0", x, o.Supplier))
			if o.Surcharge > 0 {
				rows = append(rows, fmt.Sprintf("%s - 100000 h_%s <= 0", x, o.Supplier))
			}
		}
		rows = append(rows, fmt.Sprintf("%s >= %g", strings.Join(cover, " + "), n.Amount))
	}
	for _, s := range suppliers {
		rows = append(rows, fmt.Sprintf("g_%s - %s >= 0", s, strings.Join(goods[s], " - ")))
		rows = append(rows, fmt.Sprintf("g_%s - %d y_%s >= 0", s, least[s], s))
		object = append(object, fmt.Sprintf("g_%s + %d y_%s + %d h_%s", s, fee[s], s, extra[s], s))
		bins = append(bins, "y_"+s, "h_"+s)
	}
	lp := "Minimize\n obj: " + strings.Join(object, " + ") + "\nSubject To\n"
	for i, r := range rows {
		lp += fmt.Sprintf(" r%d: %s\n", i, r)
	}
	return lp + "Generals\n " + strings.Join(ints, " ") + "\nBinaries\n " + strings.Join(bins, " ") + "\nEnd\n"
}

func solveProgram(t *testing.T, cbc, lp string) float64 {
	t.Helper()
	file := filepath.Join(t.TempDir(), "packs.lp")
	if err := os.WriteFile(file, []byte(lp), 0o600); err != nil {
		t.Fatal(err)
	}
	out, err := exec.Command(cbc, file, "-ratioGap", "0", "-allowableGap", "0", "-solve", "-quit").CombinedOutput()
	if err != nil {
		t.Fatalf("cbc: %v\n%s", err, out)
	}
	for line := range strings.Lines(string(out)) {
		if rest, ok := strings.CutPrefix(line, "Objective value:"); ok {
			v, err := strconv.ParseFloat(strings.TrimSpace(rest), 64)
			if err != nil {
				t.Fatal(err)
			}
			return v
		}
	}
	t.Fatalf("cbc gave no objective value:\n%s\n%s", lp, out)
	return 0
}

// Random orders over one to three needs and up to three suppliers, with fees,
// surcharges and least order values: the same cost as the integer program.
func TestCheapestPacksAgainstIntegerProgram(t *testing.T) {
	cbc := solver(t)
	r := rand.New(rand.NewPCG(17, 4))
	for trial := range 40 {
		fees := map[string]int64{"a": int64(r.IntN(20)) * 50, "b": int64(r.IntN(20)) * 50, "c": int64(r.IntN(20)) * 50}
		least := map[string]int64{"b": int64(r.IntN(3)) * 3000}
		hazard := map[string]int64{"a": 1800, "b": 2400, "c": 3200}
		needs := make([]PackNeed, 1+r.IntN(3))
		for i := range needs {
			needs[i].Amount = float64(100 + 10*r.IntN(300))
			for k := range 2 + r.IntN(3) {
				s := string(rune('a' + r.IntN(3)))
				size := []float64{100, 250, 500, 1000, 2500}[r.IntN(5)]
				o := PackOffer{Name: fmt.Sprint(i, k), Supplier: s, Size: size, Fee: fees[s], Least: least[s]}
				o.Price = int64(size*(2+3*r.Float64())) + 300
				if r.IntN(3) == 0 {
					o.Surcharge = hazard[s]
				}
				needs[i].Offers = append(needs[i].Offers, o)
			}
		}
		got, err := CheapestPacks(needs)
		if err != nil {
			t.Fatal(err)
		}
		checkPackOrder(t, needs, got)
		if want := solveProgram(t, cbc, packProgram(needs)); float64(got.Cost) != want {
			t.Errorf("trial %d: cost %d, integer program %g for %+v", trial, got.Cost, want, needs)
		}
	}
}

// checkPackOrder puts the answer back into the question.
func checkPackOrder(t *testing.T, needs []PackNeed, got PackOrder) {
	t.Helper()
	for i, n := range needs {
		sum := 0.0
		for _, c := range got.Choices[i] {
			sum += float64(c.Packs) * n.Offers[c.Offer].Size
		}
		if sum < n.Amount*(1-1e-9) {
			t.Errorf("need %d: packs hold %g of %g", i, sum, n.Amount)
		}
	}
}

func TestCheapestPacksPriceBreak(t *testing.T) {
	// Three packs at 10 cost 30, four at 7 cost 28: arithmetic.
	got, err := CheapestPacks([]PackNeed{{Amount: 3, Offers: []PackOffer{{Name: "p", Size: 1, Price: 10, Breaks: []PackBreak{{4, 7}}}}}})
	if err != nil || got.Cost != 28 || got.Choices[0][0].Packs != 4 {
		t.Errorf("CheapestPacks = %+v, %v, want 4 packs for 28", got, err)
	}
}

func TestCheapestPacksRefuses(t *testing.T) {
	for name, needs := range map[string][]PackNeed{
		"no offer":      {{Amount: 1}},
		"zero need":     {{Amount: 0, Offers: []PackOffer{{Size: 1}}}},
		"negative size": {{Amount: 1, Offers: []PackOffer{{Size: -1}}}},
		"tiny pack":     {{Amount: 1e9, Offers: []PackOffer{{Size: 1}}}},
	} {
		if _, err := CheapestPacks(needs); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}

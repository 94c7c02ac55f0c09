package planner

import (
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"stillroom/chem"
)

// workedRow is a row of testdata/worked_examples.csv, whose source column says
// where each answer comes from.
type workedRow struct {
	id, method, expected, source string
	tolerance                    float64
	inputs                       map[string]string
}

func workedRows(t *testing.T, methods ...string) []workedRow {
	t.Helper()
	f, err := os.Open("../testdata/worked_examples.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	column := map[string]int{}
	for i, name := range records[0] {
		column[name] = i
	}
	var rows []workedRow
	for _, rec := range records[1:] {
		r := workedRow{id: rec[column["id"]], method: rec[column["method"]], expected: rec[column["expected"]], source: rec[column["source"]], inputs: map[string]string{}}
		if rec[column["tolerance"]] != "exact" {
			r.tolerance = number(t, rec[column["tolerance"]])
		}
		for item := range strings.SplitSeq(rec[column["inputs"]], ";") {
			key, value, _ := strings.Cut(strings.TrimSpace(item), "=")
			r.inputs[key] = value
		}
		for _, m := range methods {
			if r.method == m {
				rows = append(rows, r)
			}
		}
	}
	if len(rows) == 0 {
		t.Fatalf("no rows of %v", methods)
	}
	return rows
}

// number reads the leading number of "1000 /yr".
func number(t *testing.T, text string) float64 {
	t.Helper()
	text, _, _ = strings.Cut(strings.TrimSpace(text), " ")
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

func (r *workedRow) number(t *testing.T, key string) float64 {
	t.Helper()
	text, ok := r.inputs[key]
	if !ok {
		return 0
	}
	return number(t, text)
}

func (r *workedRow) check(t *testing.T, got float64, err error) {
	t.Helper()
	if err != nil {
		t.Errorf("%s (%s): %v", r.id, r.source, err)
		return
	}
	want := number(t, r.expected)
	if math.Abs(got-want) > r.tolerance+1e-9 {
		t.Errorf("%s: %s = %g, want %g ± %g (%s)", r.id, r.inputs["ask"], got, want, r.tolerance, r.source)
	}
}

func TestWorkedInventory(t *testing.T) {
	for _, r := range workedRows(t, "k_inventory") {
		t.Run(r.id, func(t *testing.T) {
			got, err := r.inventory(t)
			if r.inputs["ask"] == "planned order releases" {
				r.releases(t)
				return
			}
			r.check(t, got, err)
		})
	}
}

func (r *workedRow) inventory(t *testing.T) (float64, error) {
	d := Demand{Mean: r.number(t, "daily_mean"), SD: r.number(t, "daily_sd"), Lead: r.number(t, "lead_time")}
	service := r.number(t, "service")
	if z := r.number(t, "z"); z != 0 {
		service = 0.5 * math.Erfc(-z/math.Sqrt2)
	}
	switch ask := r.inputs["ask"]; {
	case ask == "EOQ":
		return EconomicOrder(r.number(t, "demand"), r.number(t, "order_cost"), r.number(t, "holding"))
	case strings.HasPrefix(ask, "order quantity"), ask == "total annual cost":
		q, cost, err := EconomicOrderWithBreaks(r.number(t, "demand"), r.number(t, "order_cost"), r.number(t, "holding_rate"), r.breaks(t))
		if ask == "total annual cost" {
			return cost, err
		}
		return q, err
	case ask == "safety stock":
		return d.SafetyStock(service)
	case ask == "service level":
		return d.Service(r.number(t, "safety"))
	case ask == "newsvendor quantity":
		return OneSeason(r.number(t, "cost"), r.number(t, "price"), r.number(t, "salvage"), r.number(t, "mean"), r.number(t, "sd"))
	case strings.HasPrefix(ask, "net requirement"):
		period, err := strconv.Atoi(ask[len(ask)-1:])
		if err != nil {
			return 0, err
		}
		return NetRequirements(r.number(t, "on_hand"), r.periods(t, "scheduled"), r.periods(t, "gross"))[period], nil
	default:
		return r.reorderPoint(t, d, service)
	}
}

// reorderPoint covers the rows that give the demand in different ways: by day,
// by year with the spread over the lead time, or over the lead time at once.
func (r *workedRow) reorderPoint(t *testing.T, d Demand, service float64) (float64, error) {
	switch {
	case r.inputs["lead_mean"] != "":
		d = Demand{Mean: r.number(t, "lead_mean"), SD: r.number(t, "lead_sd"), Lead: 1}
	case r.inputs["annual_demand"] != "":
		d.Mean = r.number(t, "annual_demand") / r.number(t, "days")
		d.SD = r.number(t, "lead_sd") / math.Sqrt(d.Lead)
	}
	point, err := d.ReorderPoint(service)
	if r.tolerance == 0 {
		point = math.Round(point)
	}
	return point, err
}

func (r *workedRow) breaks(t *testing.T) []UnitBreak {
	t.Helper()
	var out []UnitBreak
	for part := range strings.SplitSeq(r.inputs["breaks"], ",") {
		from, price, _ := strings.Cut(part, ":")
		out = append(out, UnitBreak{number(t, from), number(t, price)})
	}
	return out
}

// periods reads "1:75,3:20" as a list from period 0.
func (r *workedRow) periods(t *testing.T, key string) []float64 {
	t.Helper()
	var out []float64
	for part := range strings.SplitSeq(r.inputs[key], ",") {
		period, amount, _ := strings.Cut(part, ":")
		n := int(number(t, period))
		for len(out) <= n {
			out = append(out, 0)
		}
		out[n] = number(t, amount)
	}
	return out
}

// releases nets and moves every order back by the lead time.
func (r *workedRow) releases(t *testing.T) {
	t.Helper()
	net := NetRequirements(r.number(t, "on_hand"), nil, r.periods(t, "gross"))
	lead := int(r.number(t, "lead_time"))
	var parts []string
	for period, n := range net {
		if n > 0 {
			parts = append(parts, fmt.Sprintf("%d:%g", period-lead, n))
		}
	}
	if got := strings.Join(parts, ","); got != r.expected {
		t.Errorf("%s: releases %s, want %s (%s)", r.id, got, r.expected, r.source)
	}
}

// TestWorkedCombinatorial covers the rows that a plan has a use for: covering
// by packs and colouring of carriers. The others (knapsack, assignment, change,
// rods and rolls) check solvers the program doesn't have.
func TestWorkedCombinatorial(t *testing.T) {
	covering, colouring := 0, 0
	for _, r := range workedRows(t, "l_combinatorial") {
		switch r.inputs["type"] {
		case "minimum-cost covering":
			covering++
			t.Run(r.id, func(t *testing.T) { r.covering(t) })
		case "graph colouring":
			colouring++
			t.Run(r.id, func(t *testing.T) { r.colouring(t) })
		}
	}
	if covering == 0 || colouring == 0 {
		t.Errorf("%d rows of covering and %d of colouring, want some of each", covering, colouring)
	}
}

func (r *workedRow) covering(t *testing.T) {
	need := PackNeed{Amount: r.number(t, "need")}
	packs, _, _ := strings.Cut(r.inputs["packs"], " ")
	for part := range strings.SplitSeq(packs, ",") {
		size, price, _ := strings.Cut(part, "@")
		need.Offers = append(need.Offers, PackOffer{Name: size, Size: number(t, size), Price: int64(math.Round(100 * number(t, price)))})
	}
	got, err := CheapestPacks([]PackNeed{need})
	r.check(t, float64(got.Cost)/100, err)
	// The same by listing ways instead of the table: a break nobody reaches.
	need.Offers[0].Breaks = []PackBreak{{From: 1 << 40, Price: 1}}
	listed, err := CheapestPacks([]PackNeed{need})
	r.check(t, float64(listed.Cost)/100, err)
}

func (r *workedRow) colouring(t *testing.T) {
	n, edges := int(r.number(t, "vertices")), []edge(nil)
	if r.inputs["name"] == "queen6_6" {
		n, edges = 36, queens(6)
	} else {
		for part := range strings.SplitSeq(r.inputs["edges"], ",") {
			a, b, _ := strings.Cut(part, "-")
			edges = append(edges, edge{int(number(t, a)) - 1, int(number(t, b)) - 1})
		}
	}
	got, err := GroupCarriers(numbered(n), byEdges(edges), CarrierLimits{MostMass: 0 * chem.Kilogram})
	r.check(t, float64(len(got)), err)
}

package chem

import (
	"embed"
	"encoding/csv"
	"strconv"
	"strings"
	"sync"
)

//go:embed data/ghs_statements.csv data/ghs_classes.csv data/ghs_mixture_rules.csv
//go:embed data/incompatibility.csv data/incompatibility_more.csv data/incompatibility_codes.csv data/substance_groups.csv
//go:embed data/waste_rules.csv data/regulated_precursors.csv data/substance_hazards.csv
var hazardFiles embed.FS

// hazardRows reads one embedded hazard table as rows by column name. It panics
// if the table is broken, which a test would have shown.
func hazardRows(name string) []map[string]string {
	f, err := hazardFiles.Open("data/" + name)
	if err != nil {
		panic("chem: " + err.Error())
	}
	defer f.Close()
	records, err := csv.NewReader(f).ReadAll()
	if err != nil {
		panic("chem: " + name + ": " + err.Error())
	}
	rows := make([]map[string]string, 0, len(records)-1)
	for _, rec := range records[1:] {
		row := make(map[string]string, len(rec))
		for i, column := range records[0] {
			row[column] = rec[i]
		}
		rows = append(rows, row)
	}
	return rows
}

// substanceKey reduces a name to its letters and digits, so that "1-Pentanol",
// "1-pentanol" and the row identity "1-pentanol" are one.
func substanceKey(name string) string {
	return strings.Map(func(r rune) rune {
		if r >= 'a' && r <= 'z' || r >= '0' && r <= '9' {
			return r
		}
		return -1
	}, strings.ToLower(name))
}

// mixtureRule is a row of the table of mixture rules. Limits are in per cent
// where the row says so.
type mixtureRule struct {
	id, kind, ingredient, result, condition string
	low, high                               float64
	hasHigh                                 bool
	source                                  string
}

var mixtureRules = sync.OnceValue(func() []mixtureRule {
	var rules []mixtureRule
	for _, row := range hazardRows("ghs_mixture_rules.csv") {
		r := mixtureRule{id: row["rule_id"], kind: row["rule_type"], ingredient: row["ingredient_category"],
			result: row["result_category"], condition: row["condition"], source: row["source"]}
		r.low, _ = strconv.ParseFloat(row["lower_limit"], 64)
		high, err := strconv.ParseFloat(row["upper_limit"], 64)
		r.high, r.hasHigh = high, err == nil
		rules = append(rules, r)
	}
	return rules
})

var mixtureRuleByID = sync.OnceValue(func() map[string]mixtureRule {
	byID := map[string]mixtureRule{}
	for _, r := range mixtureRules() {
		byID[r.id] = r
	}
	return byID
})

// ruleLimit returns the lower limit of a rule. It panics if there is no such
// rule, which is a programmer's mistake.
func ruleLimit(id string) float64 {
	r, ok := mixtureRuleByID()[id]
	if !ok || r.low == 0 {
		panic("chem: no mixture rule with a limit " + id)
	}
	return r.low
}

package chem

import (
	"strings"
	"sync"
)

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
	for _, row := range readTable("ghs_mixture_rules.csv") {
		r := mixtureRule{id: row.text("rule_id"), kind: row.text("rule_type"), ingredient: row.text("ingredient_category"),
			result: row.text("result_category"), condition: row.text("condition"), source: row.text("source")}
		r.low, _ = row.number("lower_limit")
		r.high, r.hasHigh = row.number("upper_limit")
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

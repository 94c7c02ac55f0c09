package chem

import (
	"slices"
	"strings"
	"sync"
)

// additiveClasses have rules of their own; all other health and environmental
// classes go by the largest single ingredient.
var additiveClasses = []string{"Acute Tox.", "Skin Corr.", "Skin Irrit.", "Eye Dam.", "Eye Irrit.", "Asp. Tox.",
	"Aquatic Acute", "Aquatic Chronic"}

// singles classifies by single ingredients against their specific or the
// generic limit, with no adding: sensitisers, mutagens, carcinogens, toxicants
// to reproduction, target organs, ozone and endocrine classes (CLP Annex I
// Tables 3.4.5, 3.5.2, 3.6.2, 3.7.2, 3.8.2, 3.9.3, 5.1).
func (m *mixture) singles() {
	for _, p := range m.parts {
		for _, l := range p.limits {
			if l.Name == "" || slices.Contains(additiveClasses, l.Name) || isEffectSum(l.HazardClass) || !l.holds(p.limited) {
				continue
			}
			c := l.HazardClass
			if c.Category == "" { // Annex VI leaves a lone category 1 out in places
				c.Category = p.categoryOf(c.Name)
			}
			m.reason(Reason{Class: c.String(), Rule: "GE-003", Value: p.limited, Limit: l.low, Unit: "%", Who: p.Name})
			m.give(c)
		}
		for _, c := range p.classes {
			m.generic(p, c)
		}
	}
}

func isEffectSum(c HazardClass) bool { return c.Name == "STOT SE" && c.Category == "3" }

func (p mixPart) categoryOf(name string) string {
	c, ok := p.class(name)
	if !ok {
		return "1"
	}
	return c.Category
}

// generic applies the generic limits to one class of an ingredient that has no
// specific limit for it.
func (m *mixture) generic(p mixPart, c HazardClass) {
	if isEffectSum(c) || p.hasOwnLimit(c) {
		return
	}
	for _, r := range genericLimits()[[2]string{c.Name, c.Category}] {
		if !atLeast(p.percent, r.low) || r.hasHigh && atLeast(p.percent, r.high) {
			continue
		}
		given := c
		if r.result != r.ingredient {
			given = HazardClass{Name: c.Name, Category: r.result[len(r.result)-1:], Code: lowerCode(c.Code)}
		}
		m.reason(Reason{Class: given.String(), Rule: r.id, Value: p.percent, Limit: r.low, Unit: "%", Who: p.Name})
		m.give(given)
	}
}

// genericLimits are the rules with generic limits for liquids and solids, by
// class and category.
var genericLimits = sync.OnceValue(func() map[[2]string][]mixtureRule {
	byClass := map[[2]string][]mixtureRule{}
	for _, r := range mixtureRules() {
		if r.kind != "gcl" || r.condition == "gas mixture" {
			continue
		}
		key := [2]string{r.ingredient, ""} // such as "Lact.", "PBT"
		if i := strings.LastIndexByte(r.ingredient, ' '); i > 0 && isCategory(r.ingredient[i+1:]) {
			key = [2]string{r.ingredient[:i], r.ingredient[i+1:]}
		}
		byClass[key] = append(byClass[key], r)
	}
	return byClass
})

// hasOwnLimit tells carcinogens and the like by class, target organs by class
// alone too: a specific limit replaces the generic one for that ingredient.
func (p mixPart) hasOwnLimit(c HazardClass) bool {
	for _, l := range p.limits {
		if l.Name == c.Name && !(c.Name == "STOT SE" && l.Category == "3") {
			return true
		}
	}
	return false
}

// lowerCode is the statement of category 2 where category 1 is diluted.
func lowerCode(code string) string {
	switch code {
	case "H370":
		return "H371"
	case "H372":
		return "H373"
	}
	return code
}

// sumsOfEffects adds respiratory irritation and narcosis, each by itself, with
// the guide value of 20 % (CLP Annex I 3.8.3.4.5), and aspiration hazards with
// 10 % (3.10.3.3.1).
func (m *mixture) sumsOfEffects() {
	m.effect("H335", "ST-007")
	m.effect("H336", "ST-008")
	m.aspiration()
}

func (m *mixture) effect(code, rule string) {
	sum, specific, guide := 0.0, false, ruleLimit(rule)
	for _, p := range m.parts {
		low, found := lowest(p.limits, func(l specificLimit) bool { return isEffectSum(l.HazardClass) && l.Code == code })
		switch {
		case found && low > 0:
			sum += p.limited / low
			specific = specific || atLeast(p.limited, low)
		case p.hasCode(code) && atLeast(p.percent, 1): // relevant from 1 % on (Table 1.1)
			sum += p.percent / guide
		}
	}
	if !atLeast(sum, 1) {
		return
	}
	if code == "H335" && m.has("Skin Corr.", "") && !specific {
		m.note("STOT SE 3 H335 left out: the corrosive effect covers it (guidance 3.8.2.5)")
		return
	}
	m.reason(Reason{Class: "STOT SE 3 " + code, Rule: rule, Value: sum, Limit: 1, Unit: "sum C/L"})
	m.give(HazardClass{Name: "STOT SE", Category: "3", Code: code})
}

func (p mixPart) hasCode(code string) bool {
	for _, c := range p.classes {
		if c.Code == code {
			return true
		}
	}
	return false
}

func (m *mixture) aspiration() {
	sum, limit := 0.0, ruleLimit("AS-002")
	for _, p := range m.parts {
		if c, ok := p.class("Asp. Tox."); ok && c.Category == "1" && atLeast(p.percent, ruleLimit("AS-001")) {
			sum += p.percent
		}
	}
	if sum == 0 {
		return
	}
	if !atLeast(sum, limit) {
		m.reason(Reason{Class: "not Asp. Tox. 1", Rule: "AS-002", Value: sum, Limit: limit, Unit: "%"})
		return
	}
	m.note("Asp. Tox. 1: the viscosity of the mixture is not known and taken as low")
	m.reason(Reason{Class: "Asp. Tox. 1", Rule: "AS-002", Value: sum, Limit: limit, Unit: "%"})
	m.give(HazardClass{Name: "Asp. Tox.", Category: "1", Code: "H304"})
}

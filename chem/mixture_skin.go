package chem

import "fmt"

// skin classifies skin corrosion and irritation by the sum of shares over their
// limits (CLP Annex I 3.2.3.3, Table 3.2.3; with specific limits Σ C/L ≥ 1):
// the limit is the ingredient's own or, without one, 5 % for corrosion, and 1 %
// (a corrosive) or 10 % (an irritant) for irritation. Sub-categories are found
// by running sums. A corrosive of extreme pH without specific limits doesn't
// add but counts from 1 % on (Table 3.2.4).
func (m *mixture) skin() {
	m.extremePH()
	for _, level := range []struct{ category, rule string }{{"1A", "SK-007"}, {"1B", "SK-008"}, {"1C", "SK-009"}, {"1", "SK-003"}} {
		sum := 0.0
		for _, p := range m.parts {
			if share, limit, ok := p.corrosion(level.category); ok {
				sum += share / limit
			}
		}
		if sum == 0 {
			continue
		}
		if atLeast(sum, 1) {
			m.reason(Reason{Class: "Skin Corr. " + level.category, Rule: level.rule, Value: sum, Limit: 1, Unit: "sum C/L"})
			m.giveCorrosion(level.category)
			return
		}
		m.reason(Reason{Class: "not Skin Corr. " + level.category, Rule: level.rule, Value: sum, Limit: 1, Unit: "sum C/L"})
	}
	if !m.has("Skin Corr.", "") {
		m.skinIrritation()
	}
}

// giveCorrosion lets a sub-category stand in for the bare category that an
// extreme pH gives.
func (m *mixture) giveCorrosion(category string) {
	for i, c := range m.classes {
		if c.Name == "Skin Corr." {
			if c.Category == "1" {
				m.classes[i].Category = category
			}
			return
		}
	}
	m.give(HazardClass{Name: "Skin Corr.", Category: category, Code: "H314"})
}

func (m *mixture) skinIrritation() {
	weight := ruleLimit("SK-006")
	sum := 0.0
	for _, p := range m.parts {
		if share, limit, ok := p.irritation(); ok {
			sum += weight * share / limit
		}
	}
	if sum == 0 {
		return
	}
	if !atLeast(sum, weight) {
		m.reason(Reason{Class: "not Skin Irrit. 2", Rule: "SK-006", Value: sum, Limit: weight, Unit: "% weighted"})
		return
	}
	m.reason(Reason{Class: "Skin Irrit. 2", Rule: "SK-006", Value: sum, Limit: weight, Unit: "% weighted"})
	m.give(HazardClass{Name: "Skin Irrit.", Category: "2", Code: "H315"})
}

// corrosion returns the share of an ingredient that counts for a level of
// corrosion, and the limit it is divided by.
func (p mixPart) corrosion(level string) (share, limit float64, ok bool) {
	if limits := p.limitsOf("Skin Corr.", "Skin Irrit."); len(limits) > 0 {
		low, found := lowest(limits, func(l specificLimit) bool { return l.Name == "Skin Corr." && countsFor(l.Category, level) })
		return p.limited, low, found && low > 0
	}
	c, found := p.class("Skin Corr.")
	if !found || !countsFor(c.Category, level) || p.extreme() || !atLeast(p.percent, ruleLimit("SK-001")) {
		return 0, 0, false
	}
	return p.percent, ruleLimit("SK-003"), true
}

// countsFor reports whether a category counts in the running sum of a level:
// 1A alone in that of 1A, 1A and 1B in that of 1B, and all in that of 1.
func countsFor(category, level string) bool {
	switch level {
	case "1A":
		return category == "1A"
	case "1B":
		return category == "1A" || category == "1B"
	case "1C":
		return category != "1"
	}
	return true
}

func (p mixPart) irritation() (share, limit float64, ok bool) {
	if limits := p.limitsOf("Skin Corr.", "Skin Irrit."); len(limits) > 0 {
		low, found := lowest(limits, func(specificLimit) bool { return true })
		return p.limited, low, found && low > 0
	}
	if !atLeast(p.percent, ruleLimit("SK-001")) {
		return 0, 0, false
	}
	if _, found := p.class("Skin Corr."); found {
		return p.percent, ruleLimit("SK-004"), true
	}
	if c, found := p.class("Skin Irrit."); found && c.Category == "2" {
		return p.percent, ruleLimit("SK-005"), true
	}
	return 0, 0, false
}

// extreme reports a pH at which corrosion doesn't add (CLP Annex I 3.2.3.3.4).
// Specific limits, where an ingredient has them, go first.
func (p mixPart) extreme() bool {
	return p.HasPH && extremePH(p.PH) && len(p.limitsOf("Skin Corr.", "Skin Irrit.")) == 0
}

// extremePH is the range of CLP Annex I 3.2.3.1.2: at most 2, or at least 11.5.
func extremePH(pH float64) bool { return pH <= 2 || pH >= 11.5 }

// extremePH classifies by the pH of the whole, and by single ingredients of
// extreme pH at 1 % or more.
func (m *mixture) extremePH() {
	if m.options.HasPH && extremePH(m.options.PH) {
		m.reason(Reason{Class: "Skin Corr. 1", Rule: "SK-002", Value: m.options.PH, Unit: "pH"})
		m.give(HazardClass{Name: "Skin Corr.", Category: "1", Code: "H314"})
		m.give(HazardClass{Name: "Eye Dam.", Category: "1", Code: "H318"})
	}
	for _, p := range m.parts {
		_, corrosive := p.class("Skin Corr.")
		if !corrosive || !p.extreme() || !atLeast(p.percent, ruleLimit("SK-010")) {
			continue
		}
		rule := "SK-010"
		if p.PH > 7 {
			rule = "SK-011"
		}
		m.reason(Reason{Class: "Skin Corr. 1", Rule: rule, Value: p.percent, Limit: ruleLimit(rule), Unit: "%", Who: fmt.Sprintf("%s of pH %.1f, whose corrosion does not add,", p.Name, p.PH)})
		m.give(HazardClass{Name: "Skin Corr.", Category: "1", Code: "H314"})
	}
}

// eye classifies eye damage and irritation in the same way (CLP Annex I 3.3.3,
// Table 3.3.3): 3 % for damage, 1 % and 10 % for irritation. A mixture that is
// corrosive to skin is Eye Dam. 1 without more (3.3.2).
func (m *mixture) eye() {
	if m.has("Skin Corr.", "") {
		m.reason(Reason{Class: "Eye Dam. 1", Rule: "EY-011"})
		m.give(HazardClass{Name: "Eye Dam.", Category: "1", Code: "H318"})
		return
	}
	damage, irritation, weight := 0.0, 0.0, ruleLimit("EY-006")
	for _, p := range m.parts {
		if share, limit, ok := p.eyeDamage(); ok {
			damage += share / limit
		}
		if share, limit, ok := p.eyeIrritation(); ok {
			irritation += weight * share / limit
		}
	}
	switch {
	case atLeast(damage, 1):
		m.reason(Reason{Class: "Eye Dam. 1", Rule: "EY-003", Value: damage, Limit: 1, Unit: "sum C/L"})
		m.give(HazardClass{Name: "Eye Dam.", Category: "1", Code: "H318"})
	case atLeast(irritation, weight):
		m.reason(Reason{Class: "Eye Irrit. 2", Rule: "EY-006", Value: irritation, Limit: weight, Unit: "% weighted"})
		m.give(HazardClass{Name: "Eye Irrit.", Category: "2", Code: "H319"})
	}
}

// eyeDamage takes the ingredient's own limit for eye damage, else the one for
// skin corrosion if it has limits for eye irritation below that, else 3 %.
func (p mixPart) eyeDamage() (share, limit float64, ok bool) {
	if low, found := lowest(p.limitsOf("Eye Dam."), func(specificLimit) bool { return true }); found {
		return p.limited, low, low > 0
	}
	if len(p.limitsOf("Eye Irrit.")) > 0 {
		low, found := lowest(p.limitsOf("Skin Corr."), func(specificLimit) bool { return true })
		if found {
			return p.limited, low, low > 0
		}
	}
	_, corrosive := p.class("Skin Corr.")
	_, damaging := p.class("Eye Dam.")
	if !corrosive && !damaging || !atLeast(p.percent, ruleLimit("EY-001")) {
		return 0, 0, false
	}
	return p.percent, ruleLimit("EY-003"), true
}

func (p mixPart) eyeIrritation() (share, limit float64, ok bool) {
	if limits := p.limitsOf("Eye Dam.", "Eye Irrit."); len(limits) > 0 {
		low, _ := lowest(limits, func(specificLimit) bool { return true })
		return p.limited, low, low > 0
	}
	if !atLeast(p.percent, ruleLimit("EY-001")) {
		return 0, 0, false
	}
	_, corrosive := p.class("Skin Corr.")
	_, damaging := p.class("Eye Dam.")
	if corrosive || damaging {
		return p.percent, ruleLimit("EY-004"), true
	}
	if c, found := p.class("Eye Irrit."); found && c.Category[:1] == "2" {
		return p.percent, ruleLimit("EY-005"), true
	}
	return 0, 0, false
}

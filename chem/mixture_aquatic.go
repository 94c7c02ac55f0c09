package chem

import (
	"strings"
)

// aquatic classifies hazards to the aquatic environment by the summation method
// (CLP Annex I 4.1.3.5.5, Tables 4.1.1 and 4.1.2): shares weighted by M-factors
// and by 10 for each step of category, 25 % being the limit; the first category
// met stands.
func (m *mixture) aquatic() {
	var acute [3]float64 // Σ of Acute 1 with M, of Acute 2, of Acute 3
	var chronic [4]float64
	plain := 0.0 // Σ of all chronic categories without M
	var assumed []string
	for _, p := range m.parts {
		if c, ok := p.class("Aquatic Acute"); ok {
			a := p.factored(c, p.Hazard.MAcute, &assumed)
			acute[c.Category[0]-'1'] += a
		}
		if c, ok := p.class("Aquatic Chronic"); ok {
			chronic[c.Category[0]-'1'] += p.factored(c, p.Hazard.MChronic, &assumed)
			if atLeast(p.percent, ruleLimit("AQ-002")) || c.Category == "1" {
				plain += p.percent
			}
		}
	}
	if len(assumed) > 0 {
		m.note("no M-factor on record for %s: 1 assumed", strings.Join(assumed, ", "))
	}
	m.aquaticAcute(acute)
	m.aquaticChronic(chronic, plain)
	if m.unknown > 0 {
		m.note("contains %.3g %% of components with unknown hazards to the aquatic environment", m.unknown)
	}
}

// factored is an ingredient's share times its M-factor where that applies, and
// 0 below the cut-off of 0.1/M % for category 1 or 1 % for the others.
func (p mixPart) factored(c HazardClass, factor float64, assumed *[]string) float64 {
	if c.Category != "1" {
		if !atLeast(p.percent, ruleLimit("AQ-002")) {
			return 0
		}
		return p.percent
	}
	if factor == 0 {
		factor = 1
		if p.percent > 0 && (len(*assumed) == 0 || (*assumed)[len(*assumed)-1] != p.Name) {
			*assumed = append(*assumed, p.Name)
		}
	}
	if !atLeast(p.percent, 0.1/factor) { // 0.1 % is the cut-off of Table 1.1
		return 0
	}
	return p.percent * factor
}

func (m *mixture) aquaticAcute(a [3]float64) {
	if m.aquaticStep("Aquatic Acute", "1", "H400", "AQ-003", a[0]) || m.options.System != UNGHS {
		return
	}
	if m.aquaticStep("Aquatic Acute", "2", "H401", "AQ-008", 10*a[0]+a[1]) {
		return
	}
	m.aquaticStep("Aquatic Acute", "3", "H402", "AQ-009", 100*a[0]+10*a[1]+a[2])
}

func (m *mixture) aquaticChronic(c [4]float64, plain float64) {
	if m.aquaticStep("Aquatic Chronic", "1", "H410", "AQ-004", c[0]) ||
		m.aquaticStep("Aquatic Chronic", "2", "H411", "AQ-005", 10*c[0]+c[1]) ||
		m.aquaticStep("Aquatic Chronic", "3", "H412", "AQ-006", 100*c[0]+10*c[1]+c[2]) {
		return
	}
	m.aquaticStep("Aquatic Chronic", "4", "H413", "AQ-007", plain)
}

func (m *mixture) aquaticStep(name, category, code, rule string, sum float64) bool {
	limit := ruleLimit(rule)
	if sum == 0 {
		return false
	}
	if !atLeast(sum, limit) {
		m.reason(Reason{Class: "not " + name + " " + category, Rule: rule, Value: sum, Limit: limit, Unit: "% weighted"})
		return false
	}
	m.reason(Reason{Class: name + " " + category, Rule: rule, Value: sum, Limit: limit, Unit: "% weighted"})
	m.give(HazardClass{Name: name, Category: category, Code: code})
	return true
}

package chem

import (
	"strings"
)

// Exposure routes and, for inhalation, forms of acute toxicity. Forms are kept
// apart: a vapour and a dust are never summed (CLP Annex I 3.1.3.3).
const (
	Oral          = "oral"
	Dermal        = "dermal"
	InhaledGas    = "inhalation gas"
	InhaledVapour = "inhalation vapour"
	InhaledDust   = "inhalation dust/mist"
)

var acuteRoutes = []string{Oral, Dermal, InhaledGas, InhaledVapour, InhaledDust}

// AcuteEstimate is an acute toxicity estimate (ATE): mg/kg body weight for the
// oral and dermal routes, ppmV for gases, mg/L for vapours, dusts and mists,
// the inhaled ones for four hours.
type AcuteEstimate struct {
	Route string
	Value float64
}

// routeOf returns the route of an acute toxicity statement.
func routeOf(code string) string {
	switch code {
	case "H300", "H301", "H302", "H303":
		return Oral
	case "H310", "H311", "H312", "H313":
		return Dermal
	case "H330", "H331", "H332", "H333":
		return "inhalation"
	}
	return ""
}

// acuteCodes are the statements of categories 1 to 5 by route (UN GHS Tables
// 3.1.1 and Annex 3).
func acuteCode(route, category string) string {
	codes := map[string]string{Oral: "H300 H300 H301 H302 H303", Dermal: "H310 H310 H311 H312 H313"}
	list, ok := codes[route]
	if !ok {
		list = "H330 H330 H331 H332 H333"
	}
	return strings.Fields(list)[category[0]-'1']
}

// acute classifies acute toxicity by each route with the additivity formula
//
//	(100 − u) / ATEmix = Σ Cᵢ / ATEᵢ
//
// where C is the per cent of an ingredient and u the per cent of ingredients of
// unknown acute toxicity, put in only if it is more than 10 (CLP Annex I
// 3.1.3.6.1 and 3.1.3.6.2.3).
func (m *mixture) acute() {
	for _, route := range acuteRoutes {
		sum, unknown := 0.0, 0.0
		for _, p := range m.parts {
			if p.unknownFor(route) {
				if p.percent >= 1 {
					unknown += p.percent
				}
				continue
			}
			if ate, ok := p.estimate(route); ok {
				sum += p.percent / ate
			}
		}
		if sum == 0 {
			continue
		}
		m.noteAcuteUnknown(route, unknown)
		numerator := 100.0
		if unknown > 10 {
			numerator -= unknown
		}
		m.acuteCategory(route, numerator/sum)
	}
}

func (m *mixture) noteAcuteUnknown(route string, unknown float64) {
	if unknown > 0 {
		m.note("%.3g %% of the mixture consists of ingredients of unknown acute toxicity (%s)", unknown, route)
	}
}

func (p mixPart) unknownFor(route string) bool {
	if !p.Known {
		return true
	}
	for _, r := range p.UnknownFor {
		if r == route || strings.HasPrefix(route, r) {
			return true
		}
	}
	return false
}

// estimate returns the ingredient's estimate by a route: from data, or the
// converted point estimate of its category (CLP Annex I Table 3.1.2). Ones over
// 5000 mg/kg, beyond the last category of UN GHS, don't count.
func (p mixPart) estimate(route string) (float64, bool) {
	for _, e := range p.acute {
		if e.Route == route {
			return e.Value, e.Value > 0 && p.percent >= ruleLimit("AT-047")
		}
	}
	for _, c := range p.classes {
		if c.Name != "Acute Tox." || !p.inhaledAs(c, route) || p.percent < acuteCutOff(c.Category) {
			continue
		}
		for _, r := range mixtureRules() {
			if r.kind == "ate_conversion" && r.condition == route && r.ingredient == "Acute Tox. "+c.Category {
				return r.low, true
			}
		}
	}
	return 0, false
}

// inhaledAs reports whether a class is for the route, in the form that the
// ingredient is inhaled in: a gas as gas, a liquid as vapour, a solid as dust.
// A liquid or solid of state unknown counts as dust or mist, the stricter one.
func (p mixPart) inhaledAs(c HazardClass, route string) bool {
	if routeOf(c.Code) != "inhalation" {
		return routeOf(c.Code) == route
	}
	for _, e := range p.acute {
		if strings.HasPrefix(e.Route, "inhalation") {
			return false // there are data, in their own form
		}
	}
	switch {
	case p.State == "gas":
		return route == InhaledGas
	case strings.HasPrefix(p.State, "liquid"):
		return route == InhaledVapour
	}
	return route == InhaledDust
}

func acuteCutOff(category string) float64 {
	if category == "4" || category == "5" {
		return ruleLimit("AT-050")
	}
	return ruleLimit("AT-047")
}

// acuteCategory gives the category in whose range an estimate lies, upper bound
// included (CLP Annex I Table 3.1.1).
func (m *mixture) acuteCategory(route string, ate float64) {
	unit := map[string]string{Oral: "mg/kg", Dermal: "mg/kg", InhaledGas: "ppmV", InhaledVapour: "mg/L vapour", InhaledDust: "mg/L dust or mist"}[route]
	for _, r := range mixtureRules() {
		if r.kind != "ate_range" || r.condition != route || ate > r.high*(1+1e-9) || ate <= r.low*(1+1e-9) {
			continue
		}
		category := strings.TrimPrefix(r.result, "Acute Tox. ")
		if category == "5" && m.options.System != UNGHS {
			break
		}
		m.reason(Reason{Class: r.result + " " + route, Rule: r.id, Value: ate, Limit: r.high, Unit: unit})
		m.give(HazardClass{Name: "Acute Tox.", Category: category, Code: acuteCode(route, category)})
		return
	}
	m.reason(Reason{Class: "not Acute Tox. " + route, Rule: "AT-051", Value: ate, Unit: unit})
}

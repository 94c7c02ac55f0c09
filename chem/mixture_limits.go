package chem

import (
	"regexp"
	"strconv"
	"strings"
)

// specificLimit is a specific concentration limit: the class that holds for a
// share of the ingredient between low and high per cent.
type specificLimit struct {
	HazardClass
	low, high      float64
	lowIn, highIn  bool // whether the bound itself belongs to it
	hasLow, hasTop bool
}

// holds reports whether the limit's band contains a share in per cent.
func (l specificLimit) holds(percent float64) bool {
	if l.hasLow && !(percent > l.low || l.lowIn && atLeast(percent, l.low)) {
		return false
	}
	if l.hasTop && !(percent < l.high*(1-1e-9) || l.highIn && percent <= l.high) {
		return false
	}
	return true
}

var (
	limitBand = regexp.MustCompile(`^(?:([\d.]+) ?%\*? ?([≤<]) ?)?C ?(?:([≥>≤<]) ?([\d.]+) ?%)?[ *]*$`)
	limitATE  = regexp.MustCompile(`(?i)^(oral|dermal|inhalation)[;:]\s*ATE ?= ?([\d.]+) ?(mg/kg(?: bw)?|mg/L|ppmV)(?: \((vapours?|dusts/mists|dusts or mists|gases)\))?[ *]*$`)
)

// parseSpecificLimits reads the column of Annex VI with specific limits and
// acute toxicity estimates, separated by " | ". What it can't read it returns,
// so that nothing is passed over in silence.
func parseSpecificLimits(text string) (limits []specificLimit, acute []AcuteEstimate, bad []string) {
	for item := range strings.SplitSeq(text, "|") {
		item = strings.TrimSpace(strings.ReplaceAll(item, ",", "."))
		if item == "" || item == "*" || strings.HasPrefix(item, "* ") {
			continue // an asterisk marks a minimum category and is no limit
		}
		if e, ok := parseATE(item); ok {
			acute = append(acute, e)
			continue
		}
		l, ok := parseLimit(item)
		if !ok {
			bad = append(bad, item)
			continue
		}
		limits = append(limits, l)
	}
	return limits, acute, bad
}

func parseLimit(item string) (specificLimit, bool) {
	cut := strings.LastIndexAny(item, ":;")
	if cut < 0 {
		return specificLimit{}, false
	}
	m := limitBand.FindStringSubmatch(strings.TrimSpace(item[cut+1:]))
	if m == nil {
		return specificLimit{}, false
	}
	var l specificLimit
	head := strings.TrimSpace(item[:cut])
	c, ok := ParseHazardClass(head)
	switch {
	case ok:
		l.HazardClass = c
	case isStatementCode(head):
		l.Code = head // a supplemental statement, such as EUH031
	default:
		return specificLimit{}, false
	}
	l.low, l.hasLow = limitNumber(m[1])
	l.lowIn = m[2] == "≤"
	if bound, ok := limitNumber(m[4]); ok {
		switch m[3] {
		case "≥", ">":
			l.low, l.hasLow, l.lowIn = bound, true, m[3] == "≥"
		default:
			l.high, l.hasTop, l.highIn = bound, true, m[3] == "≤"
		}
	}
	return l, l.hasLow || l.hasTop
}

func limitNumber(s string) (float64, bool) {
	x, err := strconv.ParseFloat(s, 64)
	return x, err == nil
}

func parseATE(item string) (AcuteEstimate, bool) {
	m := limitATE.FindStringSubmatch(strings.TrimSpace(strings.ReplaceAll(item, ":*", "")))
	if m == nil {
		return AcuteEstimate{}, false
	}
	value, ok := limitNumber(m[2])
	if !ok || value <= 0 {
		return AcuteEstimate{}, false
	}
	e := AcuteEstimate{Route: Oral, Value: value}
	switch {
	case strings.EqualFold(m[1], "dermal"):
		e.Route = Dermal
	case strings.EqualFold(m[1], "oral"):
	case strings.HasPrefix(strings.ToLower(m[4]), "gas"):
		e.Route = InhaledGas
	case strings.HasPrefix(strings.ToLower(m[4]), "vapour"):
		e.Route = InhaledVapour
	default:
		e.Route = InhaledDust
	}
	return e, true
}

// limitsOf returns the specific limits for classes of any of the names.
func (p mixPart) limitsOf(names ...string) []specificLimit {
	var found []specificLimit
	for _, l := range p.limits {
		for _, name := range names {
			if l.Name == name {
				found = append(found, l)
			}
		}
	}
	return found
}

// lowest returns the smallest share at which one of the limits for which want
// holds starts.
func lowest(limits []specificLimit, want func(specificLimit) bool) (float64, bool) {
	low, found := 0.0, false
	for _, l := range limits {
		if want(l) && (!found || l.low < low) {
			low, found = l.low, true
		}
	}
	return low, found
}

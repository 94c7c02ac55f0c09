package inventory

import (
	"errors"
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"
	"time"

	"stillroom/chem"
)

// amountCell is an amount as a cell gives it.
type amountCell struct {
	units   int64   // of the measure, if share is NaN
	share   float64 // of the size, for "1/2", "half" and "50 %"; NaN otherwise
	measure Measure
	count   int64 // bottles, for "2 x 500 mL"; 1 otherwise
	about   bool  // "ca."
}

var (
	timesCell = regexp.MustCompile(`^(\d{1,4})\s*[x×*]\s*(.+)$`)
	aboutCell = regexp.MustCompile(`^(?i)(?:ca\.?|c\.|circa|about|approx\.?|approximately|~|≈|roughly|etwa)\s*`)
	ratioCell = regexp.MustCompile(`^(\d{1,3})\s*/\s*(\d{1,3})(?:\s*(?:full|left|voll))?$`)
	shareCell = regexp.MustCompile(`^(\d{1,3}(?:[.,]\d+)?)\s*%(?:\s*(?:full|left|voll))?$`)
	bareCell  = regexp.MustCompile(`^[\d.,' ]+$`)
)

var shareWords = map[string]float64{"full": 1, "sealed": 1, "unopened": 1, "new": 1, "voll": 1, "empty": 0, "leer": 0,
	"half": .5, "half full": .5, "halb": .5, "½": .5, "¼": .25, "¾": .75, "quarter": .25, "three quarters": .75, "nearly empty": .05, "almost empty": .05, "nearly full": .95, "almost full": .95}

// parseAmount reads "2.5 L", "500g", "ca. 1/2", "2 x 500 mL", "half", "50 %". A
// bare number takes the unit given; without one it is refused.
func parseAmount(cell, unit string) (a amountCell, err error) {
	text := strings.TrimSpace(cell)
	a = amountCell{share: math.NaN(), count: 1}
	if rest := aboutCell.ReplaceAllString(text, ""); rest != text {
		a.about, text = true, rest
	}
	if m := timesCell.FindStringSubmatch(text); m != nil {
		a.count, _ = strconv.ParseInt(m[1], 10, 64)
		text = m[2]
		if a.count == 0 {
			return a, fmt.Errorf("amount %q: no bottles", cell)
		}
	}
	if share, ok := shareOf(text); ok {
		a.share = share
		return a, nil
	}
	if bareCell.MatchString(text) {
		if strings.TrimSpace(unit) == "" {
			return a, fmt.Errorf("amount %q: no unit; want it in the cell, the heading or a unit column, such as 500 g", cell)
		}
		text += " " + unit
	}
	return quantityOf(a, cell, text)
}

func shareOf(text string) (float64, bool) {
	if share, ok := shareWords[strings.ToLower(text)]; ok {
		return share, true
	}
	if m := ratioCell.FindStringSubmatch(text); m != nil {
		over, _ := strconv.ParseFloat(m[1], 64)
		under, _ := strconv.ParseFloat(m[2], 64)
		return over / under, under > 0 && over <= under
	}
	if m := shareCell.FindStringSubmatch(text); m != nil {
		percent, _ := strconv.ParseFloat(strings.ReplaceAll(m[1], ",", "."), 64)
		return percent / 100, percent <= 100
	}
	return 0, false
}

// quantityOf reads a number with a unit into ledger units, to the nearest.
func quantityOf(a amountCell, cell, text string) (amountCell, error) {
	number, unit := splitUnit(text)
	if pieceWords[strings.ToLower(unit)] {
		n, err := strconv.ParseInt(number, 10, 64)
		if err != nil || n < 0 {
			return a, fmt.Errorf("amount %q: want a whole number of pieces", cell)
		}
		a.units, a.measure = n, ByCount
		return a, nil
	}
	text = number + " " + tidyUnit(unit)
	ok := true
	mass, err := chem.ParseMass(text)
	a.measure = ByMass
	if err == nil {
		a.units, ok = UnitsNear(mass)
	} else {
		volume, errV := chem.ParseVolume(text)
		if errV != nil {
			return a, amountError(cell, err, errV)
		}
		a.measure = ByVolume
		a.units, ok = UnitsNear(volume)
	}
	if !ok {
		return a, fmt.Errorf("amount %q: too large for a bottle", cell)
	}
	return a, nil
}

func amountError(cell string, mass, volume error) error {
	var q *chem.QuantityError
	if errors.As(volume, &q) {
		if q.Cause == chem.ErrUnknownUnit {
			_, unit := splitUnit(cell)
			return fmt.Errorf("amount %q: unknown unit %q; want g, kg, mL or L", cell, unit)
		}
		return fmt.Errorf("amount %q: %s; %s", cell, q.What, q.Wanted)
	}
	return mass
}

// splitUnit parts a number from what follows it.
func splitUnit(text string) (number, unit string) {
	at := strings.IndexFunc(text, func(r rune) bool {
		return !(r >= '0' && r <= '9' || strings.ContainsRune(".,' \u00a0\u202f+-−", r))
	})
	if at < 0 {
		return strings.TrimSpace(text), ""
	}
	return strings.TrimSpace(text[:at]), strings.TrimSpace(text[at:])
}

// strengthCell is a range of mass fractions as a cell gives it.
type strengthCell struct{ low, high float64 }

var (
	strengthRange = regexp.MustCompile(`^(\d{1,3}(?:[.,]\d+)?)\s*%?\s*(?:-|–|to|bis)\s*(\d{1,3}(?:[.,]\d+)?)\s*(%|$)`)
	strengthOne   = regexp.MustCompile(`^(≥|>=|>|min\.?|≤|<=|<|max\.?|~|ca\.?)?\s*(\d{1,3}(?:[.,]\d+)?)\s*(\+)?\s*(%)?(\+)?\s*(.*)$`)
)

// parseStrength reads "98%", "95–98 %", "≥ 99 %", "99+ %", 0.98 or 98. Unit is
// the one in the heading. What isn't by mass is refused, because it needs a
// density.
func parseStrength(cell, unit string) (s strengthCell, err error) {
	text := strings.TrimSpace(cell)
	lower := strings.ToLower(text + " " + unit)
	for _, other := range []string{"v/v", "vol", "w/v", "m/v", "mol/l", "g/l", "mg/ml", " m ", " n "} {
		if strings.Contains(lower+" ", other) {
			return s, fmt.Errorf("strength %q isn't a share by mass; want it in %% w/w", cell)
		}
	}
	if regexpMolar.MatchString(text) {
		return s, fmt.Errorf("strength %q is an amount concentration; want it in %% w/w", cell)
	}
	if m := strengthRange.FindStringSubmatch(text); m != nil {
		s.low, s.high = decimal(m[1]), decimal(m[2])
		return s.scaled(cell, true)
	}
	m := strengthOne.FindStringSubmatch(text)
	if m == nil {
		return s, fmt.Errorf("strength %q: want a share by mass such as 98 %%", cell)
	}
	if rest := strings.ToLower(strings.Trim(m[6], " .,()")); rest != "" && rest != "w/w" && rest != "pure" && rest != "m/m" && rest != "wt" && rest != "wt%" {
		return s, fmt.Errorf("strength %q: what %q means isn't known; want a share by mass such as 98 %%", cell, m[6])
	}
	s.low, s.high = decimal(m[2]), decimal(m[2])
	percent := m[4] != "" || unit == "%" || s.low > 1
	top := 1.0
	if percent {
		top = 100
	}
	switch {
	case strings.HasPrefix(m[1], "≤") || strings.HasPrefix(m[1], "<") || strings.HasPrefix(m[1], "max"):
		s.low = 0
	case m[1] != "" && m[1] != "~" && !strings.HasPrefix(m[1], "ca"), m[3] != "", m[5] != "":
		s.high = top
	}
	return s.scaled(cell, percent)
}

var regexpMolar = regexp.MustCompile(`^\d+(?:[.,]\d+)?\s*[MN]$`)

func (s strengthCell) scaled(cell string, percent bool) (strengthCell, error) {
	if percent {
		// Decimals of a per cent, without what binary fractions add.
		s.low, s.high = math.Round(s.low*1e7)/1e9, math.Round(s.high*1e7)/1e9
	}
	if s.high > 1 || s.low > s.high {
		return s, fmt.Errorf("strength %q: want 0 to 100 %%, the lower end first", cell)
	}
	return s, nil
}

func decimal(s string) float64 {
	x, _ := strconv.ParseFloat(strings.ReplaceAll(s, ",", "."), 64)
	return x
}

// String writes the range as it stands in a form's name.
func (s strengthCell) String() string {
	text := func(x float64) string { return strconv.FormatFloat(math.Round(x*1e6)/1e4, 'f', -1, 64) }
	switch {
	case s.low == s.high:
		return text(s.low) + " %"
	case s.high == 1:
		return "≥ " + text(s.low) + " %"
	case s.low == 0:
		return "≤ " + text(s.high) + " %"
	}
	return text(s.low) + "–" + text(s.high) + " %"
}

// dayMonthCell is a date with bare numbers, in which the order must be known.
var dayMonthCell = regexp.MustCompile(`^(\d{1,2})[/\-](\d{1,2})[/\-](\d{4}|\d{2})$`)

var (
	dottedCell    = regexp.MustCompile(`^(\d{1,2})\.(\d{1,2})\.(\d{4}|\d{2})$`)
	monthYearCell = regexp.MustCompile(`^(\d{1,2})[/.\-](\d{4})$`)
	yearFirstCell = regexp.MustCompile(`^(\d{4})[/.](\d{1,2})[/.](\d{1,2})$`)
)

// parseDateCell reads a date. Order is "day", "month" or ""; with "" a date whose
// order matters is refused. A month alone is its last day. Dates with stops have
// the day first everywhere. Serial allows a spreadsheet's count of days since
// 30 December 1899 (ECMA-376 part 1, 18.17.4.1, for days from March 1900 on).
func parseDateCell(cell, order string, serial bool) (Date, error) {
	text := strings.TrimSpace(cell)
	if at := strings.IndexByte(text, 'T'); at == 10 {
		text = text[:at]
	}
	if d, err := ParseDate(text); err == nil {
		return d, nil
	}
	if serial {
		if n, err := strconv.ParseFloat(text, 64); err == nil && n > 20000 && n < 80000 {
			return NewDate(1899, time.December, 30).AddDays(int(n)), nil
		}
	}
	if m := dayMonthCell.FindStringSubmatch(text); m != nil {
		return dayMonthDate(cell, m, order)
	}
	if m := dottedCell.FindStringSubmatch(text); m != nil {
		return civil(cell, m[3], m[2], m[1])
	}
	if m := yearFirstCell.FindStringSubmatch(text); m != nil {
		return civil(cell, m[1], m[2], m[3])
	}
	if m := monthYearCell.FindStringSubmatch(text); m != nil {
		first, err := civil(cell, m[2], m[1], "1")
		if err != nil {
			return 0, err
		}
		return DateOf(first.Time().AddDate(0, 1, -1)), nil
	}
	return namedDate(cell, text)
}

func dayMonthDate(cell string, m []string, order string) (Date, error) {
	first, _ := strconv.Atoi(m[1])
	second, _ := strconv.Atoi(m[2])
	switch {
	case order == "month" || order == "" && second > 12:
		return civil(cell, m[3], m[1], m[2])
	case order == "day" || first > 12 || first == second:
		return civil(cell, m[3], m[2], m[1])
	}
	return 0, fmt.Errorf("date %q may be day or month first: say which, or write 2026-04-03", cell)
}

// namedDate reads dates whose month is a word.
func namedDate(cell, text string) (Date, error) {
	for _, layout := range []string{"2 Jan 2006", "2 January 2006", "2-Jan-2006", "2-Jan-06", "Jan 2, 2006", "January 2, 2006", "2. January 2006"} {
		if t, err := time.Parse(layout, text); err == nil {
			return DateOf(t), nil
		}
	}
	for _, layout := range []string{"Jan 2006", "January 2006", "Jan-06", "Jan-2006"} {
		if t, err := time.Parse(layout, text); err == nil {
			return DateOf(t.AddDate(0, 1, -1)), nil
		}
	}
	return 0, fmt.Errorf("date %q: want year-month-day, such as 2027-01-14", cell)
}

func civil(cell, year, month, day string) (Date, error) {
	y, _ := strconv.Atoi(year)
	m, _ := strconv.Atoi(month)
	d, _ := strconv.Atoi(day)
	if y < 100 {
		y += 2000
	}
	date := NewDate(y, time.Month(m), d)
	if got := date.Time(); got.Day() != d || int(got.Month()) != m {
		return 0, fmt.Errorf("date %q: there is no such day", cell)
	}
	return date, nil
}

// orderOfDates looks through a column for dates that show in which order day
// and month stand. Without any, or with both, order is "" and example one that
// could be read two ways.
func orderOfDates(t Table, column int) (order, example string) {
	day, month := false, false
	for _, row := range t.Rows {
		if column >= len(row) {
			continue
		}
		m := dayMonthCell.FindStringSubmatch(strings.TrimSpace(row[column]))
		if m == nil {
			continue
		}
		first, _ := strconv.Atoi(m[1])
		second, _ := strconv.Atoi(m[2])
		switch {
		case first > 12:
			day = true
		case second > 12:
			month = true
		case first != second && example == "":
			example = strings.TrimSpace(row[column])
		}
	}
	switch {
	case day && !month:
		return "day", example
	case month && !day:
		return "month", example
	}
	return "", example
}

package views

import (
	"math"
	"strconv"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// Rounding is for people's eyes and happens here only. A number and its unit
// are kept together by a narrow space that doesn't break (U+202F).
const narrow = "\u202f"

// with joins a number and a unit.
func with(number, unit string) string { return number + narrow + unit }

// figures writes x with n significant figures, without an exponent; whole
// places beyond them are kept, so that 1234 stays 1234. What isn't a number
// reads as a dash.
func figures(x float64, n int) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return "–"
	}
	if x == 0 {
		return "0"
	}
	digits := int(math.Floor(math.Log10(math.Abs(x)))) + 1
	places := max(n-digits, 0)
	s := strconv.FormatFloat(x, 'f', places, 64)
	// 9.996 becomes 10.00 with two places; one of them is too many.
	if r, _ := strconv.ParseFloat(s, 64); places > 0 && math.Abs(r) >= math.Pow10(digits) {
		s = strconv.FormatFloat(x, 'f', places-1, 64)
	}
	return strings.Replace(s, "-", "−", 1)
}

// trimmed is figures without zeros at the end of the decimals.
func trimmed(x float64, n int) string {
	s := figures(x, n)
	if !strings.Contains(s, ".") {
		return s
	}
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}

// A scaled unit is chosen so that the number before it has at most three
// places before the point.
type scaledUnit struct {
	size float64
	name string
}

var (
	massUnits   = []scaledUnit{{1, "kg"}, {1e-3, "g"}, {1e-6, "mg"}, {1e-9, "µg"}}
	volumeUnits = []scaledUnit{{1e-3, "L"}, {1e-6, "mL"}, {1e-9, "µL"}}
	amountUnits = []scaledUnit{{1, "mol"}, {1e-3, "mmol"}, {1e-6, "µmol"}}
)

func scaled(x float64, units []scaledUnit, write func(float64, int) string) string {
	for _, u := range units {
		// 0.9996 of a unit rounds to 1.00 of it and belongs there.
		if math.Abs(x) >= 0.9995*u.size {
			return with(write(x/u.size, 3), u.name)
		}
	}
	if x == 0 {
		return with("0", units[1].name)
	}
	last := units[len(units)-1]
	return with(write(x/last.size, 3), last.name)
}

// massText writes a mass with three significant figures: 63.5 g.
func massText(m chem.Mass) string { return scaled(float64(m), massUnits, figures) }

// massPlain writes a mass without idle zeros, as people say it: 50 g.
func massPlain(m chem.Mass) string { return scaled(float64(m), massUnits, trimmed) }

// volumeText writes a volume with three significant figures.
func volumeText(v chem.Volume) string { return scaled(float64(v), volumeUnits, figures) }

// volumePlain writes a volume without idle zeros, as sizes are marked: 2 L.
func volumePlain(v chem.Volume) string { return scaled(float64(v), volumeUnits, trimmed) }

// amountText writes an amount of substance.
func amountText(n chem.Amount) string { return scaled(float64(n), amountUnits, figures) }

// percentText writes a share with up to three figures and no idle zeros: 98.2 %.
func percentText(f chem.Fraction) string { return with(trimmed(f.Percent(), 3), "%") }

// fillText writes how full something is, to the whole per cent where that says
// enough.
func fillText(f chem.Fraction) string { return with(trimmed(f.Percent(), 2), "%") }

// chanceText writes a probability with two figures at most. A negative one was
// not assessed, and neither end is ever called certain.
func chanceText(p float64) string {
	switch {
	case math.IsNaN(p) || p < 0:
		return "not assessed"
	case p < 0.0005:
		return "under " + with("0.1", "%")
	case p < 0.0995:
		return with(trimmed(p*100, 2), "%")
	case p < 0.995:
		return with(strconv.Itoa(int(math.Round(p*100))), "%")
	}
	return "over " + with("99", "%")
}

// celsiusText writes a temperature on the Celsius scale to whole degrees.
func celsiusText(t chem.Temperature) string {
	return with(strings.Replace(strconv.Itoa(int(math.Round(t.Celsius()))), "-", "−", 1), "°C")
}

// heatText writes a heat; below a kilojoule nobody plans a bath by it.
func heatText(e chem.Energy) string { return with(trimmed(e.Kilojoules(), 3), "kJ") }

// timeText writes a length of time in minutes, or in hours and minutes.
func timeText(d chem.Duration) string {
	m := int(math.Ceil(d.Minutes() - 1e-9))
	switch {
	case m < 120:
		return with(strconv.Itoa(m), "min")
	case m%60 == 0:
		return with(strconv.Itoa(m/60), "h")
	}
	return with(strconv.Itoa(m/60), "h") + " " + with(strconv.Itoa(m%60), "min")
}

// piecesText writes a number of pieces.
func piecesText(n float64) string { return trimmed(n, 3) }

// moneyText writes whole minor units of a currency with two decimals.
func moneyText(minor int64, currency string) string {
	sign := ""
	if minor < 0 {
		sign, minor = "−", -minor
	}
	cents := strconv.FormatInt(minor%100, 10)
	if len(cents) == 1 {
		cents = "0" + cents
	}
	return sign + strconv.FormatInt(minor/100, 10) + "." + cents + narrow + currency
}

// stored writes a ledger amount in the unit of its measure.
func stored(amount int64, measure inventory.Measure) string {
	switch measure {
	case inventory.ByMass:
		return massText(chem.Mass(amount) * chem.Microgram)
	case inventory.ByVolume:
		return volumeText(chem.Volume(amount) * chem.Microlitre)
	}
	return strconv.FormatInt(amount, 10)
}

// storedPlain is stored without idle zeros, for sizes: 2.5 L.
func storedPlain(amount int64, measure inventory.Measure) string {
	switch measure {
	case inventory.ByMass:
		return massPlain(chem.Mass(amount) * chem.Microgram)
	case inventory.ByVolume:
		return volumePlain(chem.Volume(amount) * chem.Microlitre)
	}
	return strconv.FormatInt(amount, 10)
}

// numberText writes a computed number with four figures, as on a reckoner page;
// very small and very large ones as a power of ten.
func numberText(x float64) string {
	if a := math.Abs(x); x != 0 && (a < 1e-3 || a >= 1e7) && chem.Finite(x) {
		exponent := int(math.Floor(math.Log10(a)))
		return trimmed(x/math.Pow10(exponent), 4) + "·10" + superscript(exponent)
	}
	return trimmed(x, 4)
}

func superscript(n int) string {
	return strings.NewReplacer("-", "⁻", "0", "⁰", "1", "¹", "2", "²", "3", "³", "4", "⁴",
		"5", "⁵", "6", "⁶", "7", "⁷", "8", "⁸", "9", "⁹").Replace(strconv.Itoa(n))
}

package chem

import (
	"errors"
	"fmt"
	"strings"
)

// Kinds of refusal of a quantity, for errors.Is, beside ErrAmbiguous and
// ErrOutOfRange.
var (
	ErrNoNumber    = errors.New("no number")
	ErrNoUnit      = errors.New("no unit")
	ErrUnknownUnit = errors.New("unknown unit")
)

// QuantityError says what is wrong with a quantity as typed and what would do.
type QuantityError struct {
	Quantity string // "mass"
	Text     string // as typed
	What     string // what is wrong
	Wanted   string // what would do
	Cause    error  // one of the kinds above
}

func (e *QuantityError) Error() string {
	return fmt.Sprintf("%s %q: %s; %s", e.Quantity, e.Text, e.What, e.Wanted)
}

// Unwrap returns the kind.
func (e *QuantityError) Unwrap() error { return e.Cause }

// quantityKind is how one quantity is written.
type quantityKind[Q ~float64] struct {
	name    string
	example string
	unit    func(string) (Q, bool)
	signed  bool // may be negative
}

// ParseMass reads a mass: "50 g", "1,5 kg". Here as for all quantities the unit is
// compulsory, "1,234 g" is refused as ambiguous, and the error is a
// *QuantityError.
func ParseMass(text string) (Mass, error) {
	return parseQuantity(text, quantityKind[Mass]{"mass", "50 g", massUnit, false})
}

// ParseVolume reads a volume: "250 mL".
func ParseVolume(text string) (Volume, error) {
	return parseQuantity(text, quantityKind[Volume]{"volume", "250 mL", volumeUnit, false})
}

// ParseAmount reads an amount of substance: "0.5 mol".
func ParseAmount(text string) (Amount, error) {
	return parseQuantity(text, quantityKind[Amount]{"amount", "0.5 mol", amountUnit, false})
}

// ParsePressure reads a pressure: "101.325 kPa", "18 mmHg".
func ParsePressure(text string) (Pressure, error) {
	return parseQuantity(text, quantityKind[Pressure]{"pressure", "101.325 kPa", pressureUnit, false})
}

// ParseDensity reads a density above nought: "0.815 g/mL".
func ParseDensity(text string) (Density, error) {
	return above(parseQuantity(text, quantityKind[Density]{"density", "0.815 g/mL", densityUnit, false}))("density", text)
}

// lightest is below the molar mass of every substance, hydrogen atoms included, and
// heaviest above that of every molecule with a formula.
const lightest, heaviest = 1 * GramPerMole, 1e9 * GramPerMole

// ParseMolarMass reads a molar mass from 1 to 10⁹ g/mol: "98.072 g/mol". A bare number
// is in g/mol.
func ParseMolarMass(text string) (MolarMass, error) {
	unit := func(u string) (MolarMass, bool) {
		if u == "" {
			return GramPerMole, true
		}
		return molarMassUnit(u)
	}
	m, err := parseQuantity(text, quantityKind[MolarMass]{"molar mass", "98.072 g/mol", unit, false})
	if err == nil && (m < lightest || m > heaviest) {
		return 0, &QuantityError{"molar mass", text, "no substance is that light or that heavy", "give 1 to 1e9 g/mol", ErrOutOfRange}
	}
	return m, err
}

// ParseConcentration reads an amount concentration: "0.5 mol/L".
func ParseConcentration(text string) (Concentration, error) {
	return parseQuantity(text, quantityKind[Concentration]{"concentration", "0.5 mol/L", concentrationUnit, false})
}

// ParseMassConcentration reads a mass per volume of solution: "50 g/L", "5 % w/v".
func ParseMassConcentration(text string) (MassConcentration, error) {
	return parseQuantity(text, quantityKind[MassConcentration]{"mass concentration", "50 g/L", massConcentrationUnit, false})
}

// ParseMolality reads a molality: "2 mol/kg".
func ParseMolality(text string) (Molality, error) {
	return parseQuantity(text, quantityKind[Molality]{"molality", "2 mol/kg", molalityUnit, false})
}

// ParseEnergy reads an energy or heat, which may be negative: "-12 kJ".
func ParseEnergy(text string) (Energy, error) {
	return parseQuantity(text, quantityKind[Energy]{"heat", "50 kJ", energyUnit, true})
}

// ParseMolarEnergy reads an energy per amount, which may be negative: "-95.3 kJ/mol".
func ParseMolarEnergy(text string) (MolarEnergy, error) {
	return parseQuantity(text, quantityKind[MolarEnergy]{"enthalpy", "-95.3 kJ/mol", molarEnergyUnit, true})
}

// ParseSpecificHeat reads a specific heat capacity above nought: "4.18 J/(g K)".
func ParseSpecificHeat(text string) (SpecificHeat, error) {
	return above(parseQuantity(text, quantityKind[SpecificHeat]{"heat capacity", "4.18 J/(g K)", specificHeatUnit, false}))("heat capacity", text)
}

// ParsePower reads a power: "170 W".
func ParsePower(text string) (Power, error) {
	return parseQuantity(text, quantityKind[Power]{"power", "170 W", powerUnit, false})
}

// ParseArea reads an area: "0.085 m²".
func ParseArea(text string) (Area, error) {
	return parseQuantity(text, quantityKind[Area]{"area", "0.085 m²", areaUnit, false})
}

// ParseDuration reads a length of time: "90 min", "1 h 30 min".
func ParseDuration(text string) (Duration, error) {
	kind := quantityKind[Duration]{"time", "90 min", durationUnit, false}
	hours, minutes, two := strings.Cut(strings.TrimSpace(text), "h ")
	if !two {
		return parseQuantity(text, kind)
	}
	h, err := parseQuantity(hours+"h", kind)
	if err != nil {
		return 0, err
	}
	m, err := parseQuantity(minutes, kind)
	if err != nil {
		return 0, err
	}
	return h + m, nil
}

// ParseTemperature reads a temperature not below absolute zero: "25 °C", "298 K".
func ParseTemperature(text string) (Temperature, error) {
	kind := quantityKind[Temperature]{"temperature", "25 °C", temperatureStepUnit, true}
	step, err := parseQuantity(text, kind)
	if err != nil {
		return 0, err
	}
	t := step
	switch plainUnit(readNumber(text).rest) {
	case "°C", "C", "degC":
		t = step + ZeroCelsius
	case "°F", "F", "degF":
		// 32 °F is 0 °C exactly (NIST SP 811 app. B.8).
		t = step - 32*Temperature(5.0/9) + ZeroCelsius
	}
	const rounding = 1e-9 // of -459.67 °F, which is nought exactly
	if t < 0 && t > -rounding {
		t = 0
	}
	if t < 0 {
		return 0, &QuantityError{kind.name, text, "below absolute zero", "give one above -273.15 °C", ErrOutOfRange}
	}
	return t, nil
}

// ParseTemperatureStep reads a difference of two temperatures: "10 K".
func ParseTemperatureStep(text string) (Temperature, error) {
	return parseQuantity(text, quantityKind[Temperature]{"temperature difference", "10 K", temperatureStepUnit, true})
}

// ParseFraction reads a share of one by mass, such as a strength, a purity, a
// conversion or a recovery: "98 % w/w", "98 %", "0.98". Above one it is refused,
// and so is a strength by volume, which is another quantity.
func ParseFraction(text string) (Fraction, error) {
	kind := quantityKind[Fraction]{"fraction", "98 % w/w", fractionUnit, false}
	switch u := plainUnit(readNumber(text).rest); {
	case strings.Contains(u, "w/v") || strings.Contains(u, "m/v"):
		return 0, &QuantityError{kind.name, text, "a mass per volume, not a share", "give % w/w, or the mass concentration with the density", ErrUnknownUnit}
	case strings.Contains(u, "v/v") || strings.Contains(u, "vol"):
		return 0, &QuantityError{kind.name, text, "a share by volume, not by mass", "give % w/w", ErrUnknownUnit}
	}
	f, err := parseQuantity(text, kind)
	if err == nil && f > 1 {
		return 0, &QuantityError{kind.name, text, "more than the whole", "give 0 to 100 %, or 0 to 1", ErrOutOfRange}
	}
	return f, err
}

// mostExcess is a thousand times the theoretical amount, above which an excess is a
// slip.
const mostExcess = 1000

// ParseExcess reads what is taken beyond the theoretical amount, as a share of it:
// "20 %" and "0.2" and "1.2 equiv" are all 0.2.
func ParseExcess(text string) (Fraction, error) {
	f, err := parseExcess(text)
	if err == nil && f > mostExcess {
		return 0, &QuantityError{"excess", text, "more than a thousand times the theoretical amount", "write it as 20 %", ErrOutOfRange}
	}
	return f, err
}

func parseExcess(text string) (Fraction, error) {
	n := readNumber(text)
	if u := plainUnit(n.rest); n.err == nil && (u == "equiv" || u == "eq") {
		if n.value < 1 {
			return 0, &QuantityError{"excess", text, "less than the theoretical amount", "give at least 1 equiv", ErrOutOfRange}
		}
		return Fraction(n.value - 1), nil
	}
	return parseQuantity(text, quantityKind[Fraction]{"excess", "20 %", fractionUnit, false})
}

// ParseNumber reads a pure number: "4", "1,5", "2e-3".
func ParseNumber(text string) (float64, error) {
	unit := func(u string) (float64, bool) { return 1, u == "" }
	return parseQuantity(text, quantityKind[float64]{"number", "1.5", unit, true})
}

// parseQuantity reads a number with its unit.
func parseQuantity[Q ~float64](text string, kind quantityKind[Q]) (Q, error) {
	n := readNumber(text)
	refuse := func(what string, cause error) (Q, error) {
		return 0, &QuantityError{kind.name, text, what, "write it as " + kind.example, cause}
	}
	switch {
	case strings.TrimSpace(text) == "":
		return refuse("nothing given", ErrNoNumber)
	case n.err == ErrAmbiguous:
		return 0, &QuantityError{kind.name, text, "the mark may be a decimal sign or part thousands", "write 1.234 or 1234", ErrAmbiguous}
	case n.err == ErrOutOfRange:
		return refuse("the number is too large", ErrOutOfRange)
	case n.err != nil:
		return refuse("no number", ErrNoNumber)
	case n.value < 0 && !kind.signed:
		return refuse("less than nought", ErrOutOfRange)
	}
	u := plainUnit(n.rest)
	unit, ok := kind.unit(u)
	switch {
	case !ok && u == "":
		return refuse("no unit", ErrNoUnit)
	case !ok:
		return refuse(unknownUnit(u, n.rest), ErrUnknownUnit)
	}
	q := Q(n.value) * unit
	if !Finite(q) {
		return refuse("the number is too large", ErrOutOfRange)
	}
	return q, nil
}

// unknownUnit says what a unit that doesn't fit is, if it is any.
func unknownUnit(u, written string) string {
	if other := quantityOf(u); other != "" {
		return fmt.Sprintf("%q is a unit of %s", written, other)
	}
	return fmt.Sprintf("unknown unit %q", written)
}

// quantityOf names the quantity a unit belongs to, "" if none.
func quantityOf(u string) string {
	_, mass := massUnit(u)
	_, volume := volumeUnit(u)
	_, amount := amountUnit(u)
	_, pressure := pressureUnit(u)
	_, density := densityUnit(u)
	_, concentration := concentrationUnit(u)
	_, molality := molalityUnit(u)
	_, duration := durationUnit(u)
	_, energy := energyUnit(u)
	_, power := powerUnit(u)
	_, temperature := temperatureStepUnit(u)
	_, fraction := fractionUnit(u)
	for _, k := range []struct {
		fits bool
		name string
	}{{mass, "mass"}, {volume, "volume"}, {amount, "amount"}, {pressure, "pressure"}, {density, "density"},
		{concentration, "concentration"}, {molality, "molality"}, {duration, "time"}, {energy, "energy"},
		{power, "power"}, {temperature, "temperature"}, {fraction, "a fraction"}} {
		if k.fits {
			return k.name
		}
	}
	return ""
}

// above refuses nought, for quantities that are divided by.
func above[Q ~float64](q Q, err error) func(name, text string) (Q, error) {
	return func(name, text string) (Q, error) {
		if err == nil && q <= 0 {
			return 0, &QuantityError{name, text, "nought", "give one above nought", ErrOutOfRange}
		}
		return q, err
	}
}

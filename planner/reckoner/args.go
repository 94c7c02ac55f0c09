package reckoner

import (
	"maps"
	"slices"
	"strings"

	"stillroom/chem"
)

// ParseArgs takes "key=value" pairs apart at their first equals sign.
func ParseArgs(pairs []string) (Args, error) {
	args := make(Args, len(pairs))
	for _, pair := range pairs {
		key, value, ok := strings.Cut(pair, "=")
		key = strings.TrimSpace(key)
		if !ok || key == "" {
			return nil, &KeyError{Key: pair, What: "no key with a value", Wanted: "write key=value, such as mass=\"50 g\"", Cause: ErrUnknownKey}
		}
		if _, twice := args[key]; twice {
			return nil, &KeyError{Key: key, Text: value, What: "given twice", Wanted: "give it once; lists are parted by ;", Cause: ErrUnknownKey}
		}
		args[key] = strings.TrimSpace(value)
	}
	return args, nil
}

func (a Args) sorted() []string { return slices.Sorted(maps.Keys(a)) }

// Has reports whether a key was given with a value.
func (a Args) Has(key string) bool { return strings.TrimSpace(a[key]) != "" }

// Text returns the text of a key; without it a *KeyError.
func (a Args) Text(key string) (string, error) {
	if !a.Has(key) {
		return "", missing(key, hintOf(key))
	}
	return strings.TrimSpace(a[key]), nil
}

// get reads a key by a parser of package chem.
func get[T any](a Args, key string, parse func(string) (T, error)) (T, error) {
	var none T
	text, err := a.Text(key)
	if err != nil {
		return none, err
	}
	value, err := parse(text)
	if err != nil {
		return none, &KeyError{Key: key, Text: text, Cause: err}
	}
	return value, nil
}

// The typed getters read one key each. A missing key, or a text that is not of
// that quantity, is a *KeyError that says what would do. Ask Has first for an
// optional key.

// Mass reads a mass such as "50 g".
func (a Args) Mass(key string) (chem.Mass, error) { return get(a, key, chem.ParseMass) }

// Volume reads a volume such as "250 mL".
func (a Args) Volume(key string) (chem.Volume, error) { return get(a, key, chem.ParseVolume) }

// Amount reads an amount of substance such as "0.5 mol".
func (a Args) Amount(key string) (chem.Amount, error) { return get(a, key, chem.ParseAmount) }

// Temperature reads a temperature such as "25 °C".
func (a Args) Temperature(key string) (chem.Temperature, error) {
	return get(a, key, chem.ParseTemperature)
}

// TemperatureStep reads a temperature difference such as "10 K".
func (a Args) TemperatureStep(key string) (chem.Temperature, error) {
	return get(a, key, chem.ParseTemperatureStep)
}

// Pressure reads a pressure such as "101.325 kPa".
func (a Args) Pressure(key string) (chem.Pressure, error) { return get(a, key, chem.ParsePressure) }

// Density reads a density such as "0.815 g/mL".
func (a Args) Density(key string) (chem.Density, error) { return get(a, key, chem.ParseDensity) }

// MolarMass reads a molar mass such as "98.072 g/mol".
func (a Args) MolarMass(key string) (chem.MolarMass, error) { return get(a, key, chem.ParseMolarMass) }

// Concentration reads an amount concentration such as "0.5 mol/L".
func (a Args) Concentration(key string) (chem.Concentration, error) {
	return get(a, key, chem.ParseConcentration)
}

// Molality reads a molality such as "2 mol/kg".
func (a Args) Molality(key string) (chem.Molality, error) { return get(a, key, chem.ParseMolality) }

// Fraction reads a share of one by mass such as "98 % w/w" or "0.98".
func (a Args) Fraction(key string) (chem.Fraction, error) { return get(a, key, chem.ParseFraction) }

// Excess reads what is taken beyond the theoretical amount, such as "20 %".
func (a Args) Excess(key string) (chem.Fraction, error) { return get(a, key, chem.ParseExcess) }

// Energy reads a heat such as "50 kJ".
func (a Args) Energy(key string) (chem.Energy, error) { return get(a, key, chem.ParseEnergy) }

// MolarEnergy reads an enthalpy such as "-95.3 kJ/mol".
func (a Args) MolarEnergy(key string) (chem.MolarEnergy, error) {
	return get(a, key, chem.ParseMolarEnergy)
}

// SpecificHeat reads a specific heat capacity such as "4.18 J/(g K)".
func (a Args) SpecificHeat(key string) (chem.SpecificHeat, error) {
	return get(a, key, chem.ParseSpecificHeat)
}

// Power reads a power such as "170 W".
func (a Args) Power(key string) (chem.Power, error) { return get(a, key, chem.ParsePower) }

// Duration reads a length of time such as "90 min".
func (a Args) Duration(key string) (chem.Duration, error) { return get(a, key, chem.ParseDuration) }

// Number reads a pure number such as "4.2".
func (a Args) Number(key string) (float64, error) { return get(a, key, chem.ParseNumber) }

// Formula reads a chemical formula.
func (a Args) Formula(key string) (chem.Formula, error) { return get(a, key, chem.ParseFormula) }

// Equation reads a reaction.
func (a Args) Equation(key string) (chem.Equation, error) { return get(a, key, chem.ParseEquation) }

// maxWhole bounds a whole number to what a bench sum can mean.
const maxWhole = 1_000_000

// Whole reads a whole number from 1 up, such as a number of portions.
func (a Args) Whole(key string) (int, error) {
	x, err := a.Number(key)
	if err != nil {
		return 0, err
	}
	n := int(x)
	if x < 1 || x > maxWhole || float64(n) != x {
		return 0, &KeyError{Key: key, Text: a[key], What: "not a whole number from 1 to a million", Wanted: "write 3", Cause: chem.ErrOutOfRange}
	}
	return n, nil
}

// Positive reads a pure number above nought.
func (a Args) Positive(key string) (float64, error) {
	x, err := a.Number(key)
	if err == nil && x <= 0 {
		return 0, &KeyError{Key: key, Text: a[key], What: "not above nought", Wanted: "give a positive number", Cause: chem.ErrOutOfRange}
	}
	return x, err
}

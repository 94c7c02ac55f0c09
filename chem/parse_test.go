package chem

import (
	"errors"
	"math"
	"testing"
)

// The units' sizes are those of the SI Brochure, 9th ed., and of NIST SP 811 app. B.8.
func TestParseQuantities(t *testing.T) {
	checkParse(t, "ParseMass", ParseMass, 1e-3, map[string]float64{
		"50 g": 50, "50g": 50, "1,5 g": 1.5, "0,125 g": 0.125, "1.5 kg": 1500, "12 mg": 0.012, "5 µg": 5e-6, "5 ug": 5e-6,
		"1 234 g": 1234, "1\u202f234,5 g": 1234.5, "1,234.5 g": 1234.5, "1.234,5 g": 1234.5, "1,234,567 g": 1234567,
		"2e-3 kg": 2, "1.2×10^3 g": 1200, ".5 g": 0.5, "0 g": 0, "1 lb": 453.59237, "1234,567 g": 1234.567, "1,5\u00a0kg": 1500,
	})
	checkParse(t, "ParseVolume", ParseVolume, 1e-6, map[string]float64{
		"250 mL": 250, "250 ml": 250, "1,5 L": 1500, "3 cm³": 3, "3 cm^3": 3, "2 dm3": 2000, "40 µL": 0.04, "1 m3": 1e6})
	checkParse(t, "ParseAmount", ParseAmount, 1, map[string]float64{"0.5 mol": 0.5, "20 mmol": 0.02})
	checkParse(t, "ParseTemperature", ParseTemperature, 1, map[string]float64{
		"25 °C": 298.15, "25 C": 298.15, "298.15 K": 298.15, "-10 °C": 263.15, "−10 °C": 263.15, "77 °F": 298.15, "-459.67 °F": 0})
	checkParse(t, "ParsePressure", ParsePressure, 1, map[string]float64{
		"101.325 kPa": 101325, "1 atm": 101325, "760 Torr": 101325, "1013.25 mbar": 101325, "18 mmHg": 2399.80297347, "1 bar": 1e5})
	checkParse(t, "ParseFraction", ParseFraction, 1, map[string]float64{
		"98 %": 0.98, "98% w/w": 0.98, "98 wt%": 0.98, "0.98": 0.98, "1": 1, "0": 0, "500 ppm": 5e-4, "37,5 %": 0.375})
	checkParse(t, "ParseExcess", ParseExcess, 1, map[string]float64{"20 %": 0.2, "0.2": 0.2, "1.2 equiv": 0.2, "150 %": 1.5})
	checkParse(t, "ParseDensity", ParseDensity, 1, map[string]float64{"1.83 g/mL": 1830, "1830 kg/m³": 1830, "0.998 kg/L": 998, "0.8 g/cm3": 800})
	checkParse(t, "ParseConcentration", ParseConcentration, 1, map[string]float64{"0.5 mol/L": 500, "0.5 M": 500, "20 mM": 20, "1 kmol/m3": 1000})
	checkParse(t, "ParseMassConcentration", ParseMassConcentration, 1, map[string]float64{"50 g/L": 50, "5 % w/v": 50, "5 mg/mL": 5})
	checkParse(t, "ParseMolality", ParseMolality, 1, map[string]float64{"2 mol/kg": 2})
	checkParse(t, "ParseDuration", ParseDuration, 1, map[string]float64{"90 min": 5400, "1 h 30 min": 5400, "2 h": 7200, "3 days": 259200, "5 s": 5})
	checkParse(t, "ParseEnergy", ParseEnergy, 1, map[string]float64{"-12 kJ": -12000, "1 kcal": 4184})
	checkParse(t, "ParseMolarEnergy", ParseMolarEnergy, 1, map[string]float64{"-95.3 kJ/mol": -95300})
	checkParse(t, "ParseSpecificHeat", ParseSpecificHeat, 1, map[string]float64{"4.18 J/(g K)": 4180, "4.18 J/g/K": 4180, "4.18 kJ/(kg·K)": 4180, "4180 J/kg/K": 4180})
	checkParse(t, "ParsePower", ParsePower, 1, map[string]float64{"170 W": 170, "0.2 kW": 200})
	checkParse(t, "ParseMolarMass", ParseMolarMass, 1e-3, map[string]float64{"98.072 g/mol": 98.072, "98.072": 98.072})
	checkParse(t, "ParseTemperatureStep", ParseTemperatureStep, 1, map[string]float64{"10 K": 10, "18 °F": 10, "10 °C": 10})
	checkParse(t, "ParseArea", ParseArea, 1, map[string]float64{"0.085 m²": 0.085, "850 cm2": 0.085})
	checkParse(t, "ParseNumber", ParseNumber, 1, map[string]float64{"4": 4, "1,5": 1.5, "-2e-3": -0.002})
}

// checkParse compares in the unit given, within the rounding of a float64.
func checkParse[Q ~float64](t *testing.T, name string, parse func(string) (Q, error), unit Q, cases map[string]float64) {
	t.Helper()
	for text, want := range cases {
		got, err := parse(text)
		if value := float64(got / unit); err != nil || math.Abs(value-want) > 1e-9*math.Max(1, math.Abs(want)) {
			t.Errorf("%s(%q) = %v, %v; want %v", name, text, value, err, want)
		}
	}
}

func TestParseQuantitiesRefuse(t *testing.T) {
	checkRefuse(t, "ParseMass", ParseMass, map[string]error{
		"": ErrNoNumber, "g": ErrNoNumber, "50": ErrNoUnit, "12 mgs": ErrUnknownUnit, "5 mL": ErrUnknownUnit, "1,234 g": ErrAmbiguous,
		"1.2.3 g": ErrAmbiguous, "12,345 kg": ErrAmbiguous, "-5 g": ErrOutOfRange, "1e999 g": ErrOutOfRange, "1e400 kg": ErrOutOfRange,
		"NaN g": ErrNoNumber, "Inf g": ErrNoNumber, "0x10 g": ErrUnknownUnit, "1..5 g": ErrAmbiguous, "five g": ErrNoNumber, ",": ErrNoNumber,
	})
	checkRefuse(t, "ParseFraction", ParseFraction, map[string]error{
		"120 %": ErrOutOfRange, "98": ErrOutOfRange, "5 % w/v": ErrUnknownUnit, "40 % v/v": ErrUnknownUnit, "40 vol%": ErrUnknownUnit, "-1 %": ErrOutOfRange})
	checkRefuse(t, "ParseTemperature", ParseTemperature, map[string]error{"25": ErrNoUnit, "-300 °C": ErrOutOfRange, "-1 K": ErrOutOfRange, "25 g": ErrUnknownUnit})
	checkRefuse(t, "ParseDensity", ParseDensity, map[string]error{"0 g/mL": ErrOutOfRange, "1.2": ErrNoUnit})
	checkRefuse(t, "ParseMolarMass", ParseMolarMass, map[string]error{"0 g/mol": ErrOutOfRange, "0.5 g/mol": ErrOutOfRange, "1e300": ErrOutOfRange, "5 g": ErrUnknownUnit})
	checkRefuse(t, "ParseExcess", ParseExcess, map[string]error{"0.5 equiv": ErrOutOfRange, "1e9 %": ErrOutOfRange, "-5 %": ErrOutOfRange})
	checkRefuse(t, "ParseDuration", ParseDuration, map[string]error{"1 h 30": ErrNoUnit, "1 fortnight": ErrUnknownUnit})
	checkRefuse(t, "ParseNumber", ParseNumber, map[string]error{"4 g": ErrUnknownUnit, "1,234": ErrAmbiguous})
}

func checkRefuse[Q ~float64](t *testing.T, name string, parse func(string) (Q, error), cases map[string]error) {
	t.Helper()
	for text, want := range cases {
		got, err := parse(text)
		var refused *QuantityError
		if !errors.As(err, &refused) || !errors.Is(err, want) || refused.Wanted == "" || got != 0 {
			t.Errorf("%s(%q) = %v, %v; want a refusal with %v that says what would do", name, text, got, err, want)
		}
	}
}

package chem

import "strings"

// Conversions to SI that are exact by definition: the foot-pound units after the
// international pound and inch (BIPM SI Brochure 8th ed., table 8 and NIST SP 811
// app. B.8), the torr as 1/760 of the standard atmosphere, the thermochemical
// calorie 4.184 J, the conventional millimetre of mercury after NIST SP 811.
const (
	torr       = Atmosphere / 760
	mmHg       = 133.322387415 * Pascal
	psi        = 6894.757293168 * Pascal
	calorie    = 4.184 * Joule
	pound      = 453.59237 * Gram
	ounce      = pound / 16
	day        = 24 * Hour
	usGallon   = 3.785411784 * Litre
	megapascal = 1e6 * Pascal
)

// plainUnit writes a unit in one way: no blanks, no raised digits, u for micro.
func plainUnit(unit string) string {
	return unitSpelling.Replace(strings.TrimSpace(unit))
}

var unitSpelling = strings.NewReplacer(
	" ", "", "\u00a0", "", "\u2009", "", "\u202f", "",
	"µ", "u", "μ", "u", "²", "2", "³", "3", "⁻¹", "-1", "^", "", "⋅", "·", "*", "·", "ℓ", "L", "º", "°", "˚", "°")

func massUnit(u string) (Mass, bool) {
	switch u {
	case "g", "gram", "grams":
		return Gram, true
	case "kg":
		return Kilogram, true
	case "mg":
		return Milligram, true
	case "ug":
		return Microgram, true
	case "t", "tonne":
		return 1000 * Kilogram, true
	case "lb":
		return pound, true
	case "oz":
		return ounce, true
	}
	return 0, false
}

func volumeUnit(u string) (Volume, bool) {
	switch u {
	case "mL", "ml", "cm3", "cc":
		return Millilitre, true
	case "L", "l", "dm3", "litre", "litres", "liter", "liters":
		return Litre, true
	case "uL", "ul", "mm3":
		return Microlitre, true
	case "cL", "cl":
		return 10 * Millilitre, true
	case "dL", "dl":
		return 100 * Millilitre, true
	case "hL", "hl":
		return 100 * Litre, true
	case "m3":
		return CubicMetre, true
	case "gal":
		return usGallon, true
	}
	return 0, false
}

func amountUnit(u string) (Amount, bool) {
	switch u {
	case "mol", "mole", "moles":
		return Mole, true
	case "mmol":
		return Millimole, true
	case "umol":
		return 1e-6 * Mole, true
	case "kmol":
		return 1e3 * Mole, true
	}
	return 0, false
}

func pressureUnit(u string) (Pressure, bool) {
	switch u {
	case "Pa":
		return Pascal, true
	case "hPa", "mbar":
		return 100 * Pascal, true
	case "kPa":
		return Kilopascal, true
	case "MPa":
		return megapascal, true
	case "bar":
		return Bar, true
	case "atm":
		return Atmosphere, true
	case "mmHg":
		return mmHg, true
	case "torr", "Torr":
		return torr, true
	case "psi":
		return psi, true
	}
	return 0, false
}

func densityUnit(u string) (Density, bool) {
	switch u {
	case "g/mL", "g/ml", "g/cm3", "g/cc", "kg/L", "kg/l", "kg/dm3", "g·mL-1", "g·cm-3":
		return GramPerMillilitre, true
	case "kg/m3", "g/L", "g/l", "g/dm3", "kg·m-3":
		return 1, true
	}
	return 0, false
}

func concentrationUnit(u string) (Concentration, bool) {
	switch u {
	case "mol/L", "mol/l", "M", "mol/dm3", "kmol/m3", "mmol/mL", "mmol/ml", "mol·L-1":
		return MolePerLitre, true
	case "mmol/L", "mmol/l", "mM", "mol/m3":
		return 1, true
	case "umol/L", "umol/l", "uM":
		return 1e-3, true
	}
	return 0, false
}

func massConcentrationUnit(u string) (MassConcentration, bool) {
	switch u {
	case "g/L", "g/l", "mg/mL", "mg/ml", "kg/m3", "g/dm3":
		return GramPerLitre, true
	case "mg/L", "mg/l", "ug/mL", "ug/ml":
		return 1e-3 * GramPerLitre, true
	case "g/mL", "g/ml", "kg/L", "kg/l", "g/cm3":
		return 1000 * GramPerLitre, true
	case "g/100mL", "g/100ml", "%w/v", "%m/v", "w/v%":
		return 10 * GramPerLitre, true
	}
	return 0, false
}

func molalityUnit(u string) (Molality, bool) {
	switch u {
	case "mol/kg", "m", "mmol/g":
		return MolePerKilogram, true
	case "mmol/kg":
		return 1e-3 * MolePerKilogram, true
	}
	return 0, false
}

func fractionUnit(u string) (Fraction, bool) {
	switch u {
	case "%", "%w/w", "w/w%", "%m/m", "wt%", "mass%", "percent":
		return Percent, true
	case "", "w/w", "1":
		return 1, true
	case "‰":
		return 1e-3, true
	case "ppm":
		return 1e-6, true
	}
	return 0, false
}

func durationUnit(u string) (Duration, bool) {
	switch u {
	case "s", "sec", "second", "seconds":
		return Second, true
	case "min", "minute", "minutes":
		return Minute, true
	case "h", "hr", "hour", "hours":
		return Hour, true
	case "d", "day", "days":
		return day, true
	case "week", "weeks":
		return 7 * day, true
	}
	return 0, false
}

func energyUnit(u string) (Energy, bool) {
	switch u {
	case "J":
		return Joule, true
	case "kJ":
		return Kilojoule, true
	case "MJ":
		return 1e6 * Joule, true
	case "cal":
		return calorie, true
	case "kcal":
		return 1000 * calorie, true
	case "Wh":
		return 3600 * Joule, true
	case "kWh":
		return 3.6e6 * Joule, true
	}
	return 0, false
}

func molarEnergyUnit(u string) (MolarEnergy, bool) {
	switch u {
	case "kJ/mol":
		return KilojoulePerMole, true
	case "J/mol":
		return 1, true
	case "kcal/mol":
		return MolarEnergy(1000 * calorie), true
	}
	return 0, false
}

func specificHeatUnit(u string) (SpecificHeat, bool) {
	switch u {
	case "J/(gK)", "J/g/K", "J/(g·K)", "J/gK", "J/g·K", "kJ/(kgK)", "kJ/kg/K", "kJ/(kg·K)", "kJ/kgK", "J/(g°C)", "J/g/°C", "J/g°C":
		return JoulePerGramKelvin, true
	case "J/(kgK)", "J/kg/K", "J/(kg·K)", "J/kgK":
		return 1, true
	}
	return 0, false
}

func powerUnit(u string) (Power, bool) {
	switch u {
	case "W", "J/s":
		return Watt, true
	case "kW":
		return 1000 * Watt, true
	case "mW":
		return 1e-3 * Watt, true
	case "kJ/h":
		return Power(1000.0 / 3600), true
	case "kJ/min":
		return Power(1000.0 / 60), true
	}
	return 0, false
}

func molarMassUnit(u string) (MolarMass, bool) {
	switch u {
	case "g/mol", "g·mol-1", "kg/kmol", "u", "Da":
		return GramPerMole, true
	case "kg/mol":
		return 1, true
	}
	return 0, false
}

func areaUnit(u string) (Area, bool) {
	switch u {
	case "m2":
		return SquareMetre, true
	case "dm2":
		return 1e-2 * SquareMetre, true
	case "cm2":
		return 1e-4 * SquareMetre, true
	}
	return 0, false
}

func temperatureStepUnit(u string) (Temperature, bool) {
	switch u {
	case "K", "°C", "C", "degC":
		return Kelvin, true
	case "°F", "F", "degF":
		return Temperature(5.0 / 9), true
	}
	return 0, false
}

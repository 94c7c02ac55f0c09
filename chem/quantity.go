package chem

import "math"

// Each quantity is a type of its own, held in the coherent SI unit, so that a
// formula needs no stray factor and a mass can't be passed for a volume. The
// constants below are the units: 2.5*chem.Gram reads as written.

// Mass is a mass in kilograms.
type Mass float64

// Volume is a volume in cubic metres.
type Volume float64

// Amount is an amount of substance in moles.
type Amount float64

// MolarMass is a molar mass in kilograms per mole.
type MolarMass float64

// Density is a mass per volume in kilograms per cubic metre.
type Density float64

// Concentration is an amount concentration in moles per cubic metre.
type Concentration float64

// MassConcentration is a mass per volume of solution in kilograms per cubic metre.
type MassConcentration float64

// Molality is an amount of solute per mass of solvent in moles per kilogram.
type Molality float64

// Fraction is a dimensionless share of one: a mass, volume or amount fraction,
// a conversion or a recovery. 98 % is 0.98.
type Fraction float64

// Temperature is a thermodynamic temperature in kelvins.
type Temperature float64

// Pressure is a pressure in pascals.
type Pressure float64

// Energy is an energy or heat in joules; heat given off by the contents of a
// vessel is positive.
type Energy float64

// MolarEnergy is an energy per amount in joules per mole.
type MolarEnergy float64

// SpecificHeat is a heat capacity per mass in joules per kilogram and kelvin.
type SpecificHeat float64

// Power is a power in watts.
type Power float64

// Duration is a length of time in seconds. Unlike time.Duration it is a real
// number, because it comes out of heat balances.
type Duration float64

// Area is an area in square metres.
type Area float64

// Units.
const (
	Kilogram  Mass = 1
	Gram      Mass = 1e-3
	Milligram Mass = 1e-6
	Microgram Mass = 1e-9

	CubicMetre Volume = 1
	Litre      Volume = 1e-3
	Millilitre Volume = 1e-6
	Microlitre Volume = 1e-9

	Mole      Amount = 1
	Millimole Amount = 1e-3

	GramPerMole       MolarMass         = 1e-3
	GramPerMillilitre Density           = 1e3
	MolePerLitre      Concentration     = 1e3
	GramPerLitre      MassConcentration = 1
	MolePerKilogram   Molality          = 1
	Percent           Fraction          = 0.01

	Kelvin     Temperature = 1
	Pascal     Pressure    = 1
	Kilopascal Pressure    = 1e3
	Bar        Pressure    = 1e5

	Joule              Energy       = 1
	Kilojoule          Energy       = 1e3
	KilojoulePerMole   MolarEnergy  = 1e3
	JoulePerGramKelvin SpecificHeat = 1e3
	Watt               Power        = 1
	Second             Duration     = 1
	Minute             Duration     = 60
	Hour               Duration     = 3600
	SquareMetre        Area         = 1
)

// Atmosphere is the standard atmosphere, 101 325 Pa exactly (10th CGPM, 1954,
// resolution 4). ZeroCelsius is 273.15 K exactly (SI Brochure, 9th ed., 2.3.1).
const (
	Atmosphere  Pressure    = 101325
	ZeroCelsius Temperature = 273.15
)

// GasConstant is the molar gas constant in J/(mol K), exact since 2019 as the
// product of the Avogadro and Boltzmann constants (SI Brochure, 9th ed., 2.2).
const GasConstant = 8.31446261815324

// Celsius returns the temperature that reads t on the Celsius scale.
func Celsius(t float64) Temperature { return Temperature(t) + ZeroCelsius }

// Celsius returns t on the Celsius scale.
func (t Temperature) Celsius() float64 { return float64(t - ZeroCelsius) }

// Grams returns m in grams.
func (m Mass) Grams() float64 { return float64(m / Gram) }

// Millilitres returns v in millilitres.
func (v Volume) Millilitres() float64 { return float64(v / Millilitre) }

// Litres returns v in litres.
func (v Volume) Litres() float64 { return float64(v / Litre) }

// GramsPerMole returns m in grams per mole.
func (m MolarMass) GramsPerMole() float64 { return float64(m / GramPerMole) }

// GramsPerMillilitre returns d in grams per millilitre.
func (d Density) GramsPerMillilitre() float64 { return float64(d / GramPerMillilitre) }

// MolesPerLitre returns c in moles per litre.
func (c Concentration) MolesPerLitre() float64 { return float64(c / MolePerLitre) }

// Percent returns f in per cent.
func (f Fraction) Percent() float64 { return float64(f) * 100 }

// Kilojoules returns e in kilojoules.
func (e Energy) Kilojoules() float64 { return float64(e / Kilojoule) }

// Kilopascals returns p in kilopascals.
func (p Pressure) Kilopascals() float64 { return float64(p / Kilopascal) }

// Minutes returns d in minutes.
func (d Duration) Minutes() float64 { return float64(d / Minute) }

// Of returns the amount in a mass of a substance of molar mass m. It panics if
// m isn't positive, which is a programmer's mistake: a substance without a
// molar mass has to be refused before.
func (m MolarMass) Of(mass Mass) Amount {
	if !(m > 0) {
		panic("chem: molar mass must be positive")
	}
	return Amount(float64(mass) / float64(m))
}

// Mass returns the mass of an amount of a substance of molar mass m.
func (m MolarMass) Mass(n Amount) Mass { return Mass(float64(m) * float64(n)) }

// Volume returns the volume of a mass at density d. It panics if d isn't positive.
func (d Density) Volume(m Mass) Volume {
	if !(d > 0) {
		panic("chem: density must be positive")
	}
	return Volume(float64(m) / float64(d))
}

// Mass returns the mass of a volume at density d.
func (d Density) Mass(v Volume) Mass { return Mass(float64(d) * float64(v)) }

// Finite reports whether x is a number: neither NaN nor infinite.
func Finite[Q ~float64](x Q) bool {
	return !math.IsNaN(float64(x)) && !math.IsInf(float64(x), 0)
}

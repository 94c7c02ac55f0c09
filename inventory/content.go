package inventory

import (
	"math"

	"stillroom/chem"
)

// The ledger's whole numbers meet chemistry's real numbers here and nowhere
// else. What is taken or promised is rounded up to the next whole unit, what
// is there is rounded down, so that rounding never promises more than a bottle
// holds; a unit is a microgram, a microlitre or a piece.

// mostUnits bounds ledger numbers: 9·10¹⁸ µg is nine million tonnes.
const mostUnits = 9e18

// UnitsUp returns a mass in µg rounded up, or a volume in µL, as it is written
// into the ledger for what is taken, promised or asked. A relative 1e-12 is
// forgiven, so that 0.1 g is 100000 µg in spite of binary fractions. It
// returns false for what isn't a number, is negative or too large.
func UnitsUp[Q chem.Mass | chem.Volume](q Q) (int64, bool) {
	return whole(math.Ceil(float64(q) * 1e9 * (1 - 1e-12)))
}

// UnitsDown is UnitsUp rounded down: for what is there.
func UnitsDown[Q chem.Mass | chem.Volume](q Q) (int64, bool) {
	return whole(math.Floor(float64(q) * 1e9 * (1 + 1e-12)))
}

// UnitsNear is UnitsUp rounded to the nearest: for what was measured.
func UnitsNear[Q chem.Mass | chem.Volume](q Q) (int64, bool) {
	return whole(math.Round(float64(q) * 1e9))
}

func whole(x float64) (int64, bool) {
	if !(x >= 0 && x < mostUnits) {
		return 0, false
	}
	return int64(x), true
}

// MassUnits returns the mass of a number of µg.
func MassUnits(ug int64) chem.Mass { return chem.Mass(ug) * chem.Microgram }

// VolumeUnits returns the volume of a number of µL.
func VolumeUnits(ul int64) chem.Volume { return chem.Volume(ul) * chem.Microlitre }

// Density returns the density of the form's content at 20 °C; false for no data.
func (f StockForm) Density() (chem.Density, bool) {
	return chem.Density(f.DensityGML) * chem.GramPerMillilitre, f.DensityGML > 0
}

// MassOf returns the mass of n ledger units of the form. It returns false for
// pieces, and for volumes of a form whose density isn't known.
func (f StockForm) MassOf(n int64) (chem.Mass, bool) {
	switch f.Measure {
	case ByMass:
		return MassUnits(n), true
	case ByVolume:
		d, ok := f.Density()
		return d.Mass(VolumeUnits(n)), ok
	}
	return 0, false
}

// VolumeOf returns the volume of n ledger units of the form, as a liquid or as
// the solid's own volume without the air between the grains. It returns false
// for pieces, and for masses of a form whose density isn't known.
func (f StockForm) VolumeOf(n int64) (chem.Volume, bool) {
	switch f.Measure {
	case ByVolume:
		return VolumeUnits(n), true
	case ByMass:
		if d, ok := f.Density(); ok {
			return d.Volume(MassUnits(n)), true
		}
	}
	return 0, false
}

// UnitsFor returns the ledger units that hold a mass of the form's content,
// rounded up. It returns false as MassOf does, and for a mass that is negative
// or no number.
func (f StockForm) UnitsFor(m chem.Mass) (int64, bool) {
	switch f.Measure {
	case ByMass:
		return UnitsUp(m)
	case ByVolume:
		if d, ok := f.Density(); ok {
			return UnitsUp(d.Volume(m))
		}
	}
	return 0, false
}

// AssayRange returns what the mass fraction of the form as named may be in this
// bottle: its lot's assay if a certificate gave one, else the label's range.
func (b Bottle) AssayRange(f StockForm) (low, high chem.Fraction) {
	if b.LotAssay > 0 {
		return chem.Fraction(b.LotAssay), chem.Fraction(b.LotAssay)
	}
	return chem.Fraction(f.AssayLow), chem.Fraction(f.AssayHigh)
}

package inventory

import (
	"math"
	"testing"

	"stillroom/chem"
)

func TestUnitsRound(t *testing.T) {
	for _, c := range []struct {
		mass           chem.Mass
		down, near, up int64
	}{
		{0, 0, 0, 0},
		{0.1 * chem.Gram, 100000, 100000, 100000},
		{0.3 * chem.Gram, 300000, 300000, 300000},
		{1.4 * chem.Microgram, 1, 1, 2},
		{1.5 * chem.Microgram, 1, 2, 2},
		{25 * chem.Kilogram, 25e9, 25e9, 25e9},
	} {
		down, _ := UnitsDown(c.mass)
		near, _ := UnitsNear(c.mass)
		up, _ := UnitsUp(c.mass)
		if down != c.down || near != c.near || up != c.up {
			t.Errorf("%v kg: down %d, near %d, up %d, want %d, %d, %d", float64(c.mass), down, near, up, c.down, c.near, c.up)
		}
	}
	for _, bad := range []chem.Mass{-1, chem.Mass(math.NaN()), chem.Mass(math.Inf(1)), 1e10} {
		if n, ok := UnitsUp(bad); ok {
			t.Errorf("UnitsUp(%v) = %d, want it refused", float64(bad), n)
		}
	}
}

func TestContentWithoutDensity(t *testing.T) {
	form := StockForm{Measure: ByVolume}
	if m, ok := form.MassOf(1000); ok {
		t.Errorf("a volume without density has a mass of %v", m)
	}
	if n, ok := form.UnitsFor(chem.Gram); ok {
		t.Errorf("a mass of a liquid without density is %d µL", n)
	}
}

// 96 % sulfuric acid has 1.8355 g/mL at 20 °C: CRC Handbook 102nd ed.,
// concentrative properties; so 100 g is 54.481 mL.
func TestUnitsForAcid(t *testing.T) {
	form := StockForm{Measure: ByVolume, DensityGML: 1.8355}
	if n, ok := form.UnitsFor(100 * chem.Gram); !ok || n != 54482 {
		t.Errorf("100 g of acid = %d µL, want 54482", n)
	}
}

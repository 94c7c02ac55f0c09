package chem

import (
	"errors"
	"math"
	"testing"
)

// distilByTime integrates the loss of water and partner from a pot in small
// steps of water distilled, apart from the closed forms, and returns the water
// over when the recovery is met. alpha gives the relative volatility at a state.
func distilByTime(partner, water, left float64, level bool, alpha func(a, w float64) float64) float64 {
	over, start := 0.0, water
	step := water / 400000
	for partner > left {
		middle := partner - alpha(partner, water)*partner/water*step/2 // half a step ahead
		partner -= alpha(middle, water) * middle / water * step
		if !level {
			water -= step
		}
		over += step
		if over > 50*start {
			return math.Inf(1)
		}
	}
	return over
}

// TestRayleighAgainstIntegration compares the closed forms with a numerical
// distillation.
func TestRayleighAgainstIntegration(t *testing.T) {
	for _, alpha := range []float64{0.6, 1, 2.05, 2.95, 8} {
		constant := func(float64, float64) float64 { return alpha }
		other, err := RayleighOtherLeft(alpha, 0.1)
		if err != nil || !near(float64(RayleighLeft(alpha, other)), 0.1, 1e-12) {
			t.Errorf("α %v: left %v at %v, %v", alpha, RayleighLeft(alpha, other), other, err)
		}
		if got := distilByTime(1, 10, 0.1, false, constant) / 10; !near(got, 1-float64(other), 1e-3) {
			t.Errorf("α %v: %v of the water over, want %v", alpha, got, 1-other)
		}
		over := distilByTime(1, 10, 0.1, true, constant)
		if got := float64(SteamedLeft(alpha, Mass(over), 10)); !near(got, 0.1, 1e-3) {
			t.Errorf("α %v, level kept: left %v, want 0.1", alpha, got)
		}
	}
}

// TestCoDistillateLaws checks each regime against a numerical distillation or
// the azeotrope's own ratio.
func TestCoDistillateLaws(t *testing.T) {
	pentanoic := CoDistilling{CAS: "109-52-4", Partner: 10 * Gram, Water: 500 * Gram, Recovery: 0.9}
	d, err := CoDistillate(pentanoic)
	if err != nil {
		t.Fatal(err)
	}
	want := distilByTime(0.010, 0.5, 0.001, false, func(float64, float64) float64 { return d.Alpha })
	if d.Two || !near(float64(d.Water), want, 1e-3) || !near(float64(d.Water+d.PotWater), 0.5, 1e-12) {
		t.Errorf("dissolved: %+v, want %v kg over", d, want)
	}

	layered := CoDistilling{CAS: "109-52-4", Partner: 200 * Gram, Water: 500 * Gram, Recovery: 0.2}
	d, err = CoDistillate(layered)
	a, _ := AzeotropeWithWater("109-52-4")
	if err != nil || !d.Two || !near(float64(d.Water), float64(a.WaterCarried(40*Gram)), 1e-12) || d.Water != d.Layered {
		t.Errorf("two layers: %+v, %v", d, err)
	}

	// butanoic acid mixes; ln α falls in a line to 0 at the azeotrope
	butanoic := CoDistilling{CAS: "107-92-6", Partner: 50 * Gram, Water: 500 * Gram, Recovery: 0.9, Level: true}
	d, err = CoDistillate(butanoic)
	if err != nil {
		t.Fatal(err)
	}
	a, _ = AzeotropeWithWater("107-92-6")
	molar, _ := tableMolarMass("107-92-6")
	amountFraction := func(p, w float64) float64 { return (p / float64(molar)) / (p/float64(molar) + w/waterMolarMass) }
	xa := amountFraction(float64(a.PartnerFraction), 1-float64(a.PartnerFraction))
	want = distilByTime(0.050, 0.5, 0.005, true, func(p, w float64) float64 {
		return math.Exp(math.Log(2.05) * (1 - amountFraction(p, w)/xa))
	})
	if !near(float64(d.Water), want, 1e-3) {
		t.Errorf("butanoic acid: %v kg over, want %v", d.Water, want)
	}
}

// TestCoDistillateMonotone checks that more recovery takes more water and that
// keeping the level up takes more than boiling down.
func TestCoDistillateMonotone(t *testing.T) {
	for _, c := range []CoDistilling{
		{CAS: "109-52-4", Partner: 50 * Gram, Water: 1200 * Gram},
		{CAS: "107-92-6", Partner: 50 * Gram, Water: 1200 * Gram},
		{CAS: "142-62-1", Partner: 20 * Gram, Water: 1200 * Gram},
		{CAS: "64-19-7", Partner: 50 * Gram, Water: 1200 * Gram},
	} {
		last := Mass(0)
		for _, recovery := range []Fraction{0.1, 0.3, 0.5, 0.7, 0.9, 0.97} {
			c.Recovery, c.Level = recovery, false
			down, err := CoDistillate(c)
			if err != nil {
				t.Fatal(err)
			}
			c.Level = true
			level, err := CoDistillate(c)
			if err != nil {
				t.Fatal(err)
			}
			if down.Water <= last || level.Water < down.Water*(1-1e-12) || !near(float64(down.Partner), float64(c.Partner*Mass(recovery)), 1e-9) {
				t.Errorf("%s to %v: %v boiled down, %v level, before %v", nameOfCAS(c.CAS), recovery, down.Water, level.Water, last)
			}
			last = down.Water
		}
	}
}

// TestDiluteVolatility compares the relative volatility that follows from the
// heteroazeotrope and the solubility with that of the Duclaux distillation, two
// independent routes to one number. The solubilities scatter by a third.
func TestDiluteVolatility(t *testing.T) {
	for _, cas := range []string{"109-52-4", "142-62-1"} {
		a, ok := AzeotropeWithWater(cas)
		if !ok {
			t.Fatalf("no azeotrope of %s", cas)
		}
		c := CoDistilling{CAS: cas}
		fromLayers := perWater(a.PartnerFraction) / c.saturation()
		duclaux := diluteVolatilities()[cas].must("alpha_dilute")
		if off := math.Abs(math.Log(fromLayers / duclaux)); off > math.Log(2.1) {
			t.Errorf("%s: α %v from the layers, %v from Duclaux", a.Partner, fromLayers, duclaux)
		}
	}
	for cas, row := range diluteVolatilities() {
		alpha, want := row.must("alpha_dilute"), row.must("duclaux_first_tenth_percent")
		// 110 mL boiled down to 10; the first 10 mL over, as a share of the acid in all 100
		got := 100 * (1 - math.Pow(100.0/110, alpha)) / (1 - math.Pow(10.0/110, alpha))
		if math.Abs(got-want) > 0.05 {
			t.Errorf("%s: α %v gives %.2f %% in the first tenth, want %v", cas, alpha, got, want)
		}
	}
}

func TestCoDistillateRefuses(t *testing.T) {
	for name, c := range map[string]struct {
		pot  CoDistilling
		want error
	}{
		"boils dry":           {CoDistilling{CAS: "142-62-1", Partner: 100 * Gram, Water: 100 * Gram, Recovery: 0.9}, ErrImpossible},
		"past the azeotrope":  {CoDistilling{CAS: "107-92-6", Partner: 100 * Gram, Water: 100 * Gram, Recovery: 0.9}, ErrImpossible},
		"nothing known":       {CoDistilling{CAS: "50-99-7", Partner: 100 * Gram, Water: 100 * Gram, Recovery: 0.9}, ErrNoData},
		"all of it":           {CoDistilling{CAS: "109-52-4", Partner: 1 * Gram, Water: 100 * Gram, Recovery: 1}, ErrOutOfRange},
		"no water":            {CoDistilling{CAS: "109-52-4", Partner: 1 * Gram, Recovery: 0.5}, ErrOutOfRange},
		"mass isn't a number": {CoDistilling{CAS: "109-52-4", Partner: Mass(math.NaN()), Water: Gram, Recovery: 0.5}, ErrOutOfRange},
	} {
		if d, err := CoDistillate(c.pot); !errors.Is(err, c.want) || d.Water != 0 {
			t.Errorf("%s: %+v, %v, want %v", name, d, err, c.want)
		}
	}
}

// TestStripEnd solves for the end point again by Raoult's law and integrates the
// product's loss.
func TestStripEnd(t *testing.T) {
	solvent, err := VapourPressure("141-78-6", Celsius(40))
	if err != nil {
		t.Fatal(err)
	}
	product, err := VapourPressure("109-52-4", Celsius(40))
	if err != nil {
		t.Fatal(err)
	}
	s, err := StripEnd(solvent, product, 2*Kilopascal, 10)
	if err != nil {
		t.Fatal(err)
	}
	first, second, _, err := RaoultVapour(s.SolventFraction, solvent, product)
	if err != nil || !near(float64(first+second), 2000, 1e-9) {
		t.Errorf("pressure at the end %v, want 2 kPa", first+second)
	}
	b, a := 1.0, 10.0 // moles of product and solvent
	for a/b > s.SolventLeft {
		const step = 1e-5
		da := a * step
		b -= b * float64(product/solvent) * step
		a -= da
	}
	if got := 1 - b; !near(float64(s.ProductLost), got, 1e-3) {
		t.Errorf("product lost %v, want %v", s.ProductLost, got)
	}
	if _, err := StripEnd(solvent, product, Atmosphere, 10); !errors.Is(err, ErrImpossible) {
		t.Errorf("strip that doesn't boil: %v", err)
	}
	if _, err := StripEnd(solvent, product, product/2, 10); !errors.Is(err, ErrImpossible) {
		t.Errorf("strip that takes the product: %v", err)
	}
}

func TestUpperLayer(t *testing.T) {
	// the 1-butanol azeotrope, 55.5 % w/w, parts into layers of 79.9 and 7.7 %
	// (mutual_solubility.csv); the upper one is 71 parts by volume in Lange's table
	share, err := UpperLayer(0.555, 0.077, 0.799)
	if err != nil || math.Abs(float64(share)-0.662) > 0.001 {
		t.Errorf("upper layer %v, %v", share, err)
	}
	if _, err := UpperLayer(0.9, 0.077, 0.799); !errors.Is(err, ErrImpossible) {
		t.Errorf("a mixture outside the layers: %v", err)
	}
}

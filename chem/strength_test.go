package chem

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

// TestEveryWayRound turns a strength into each kind and back.
func TestEveryWayRound(t *testing.T) {
	s := Solute{Name: "sodium hypochlorite", CAS: hypochloriteCAS, MolarMass: 74.439 * GramPerMole,
		Temperature: Celsius(20), Equivalents: 2, Chlorine: 1, Oxygen: 0.5, PureDensity: 1.6 * GramPerMillilitre}
	for _, w := range []Fraction{0.001, 0.03, 0.06, 0.09, 0.105} {
		all, err := s.At(w)
		if err != nil {
			t.Fatal(err)
		}
		for kind, value := range map[StrengthKind]float64{
			ByMassFraction: float64(all.MassFraction), ByMassConcentration: float64(all.MassConcentration),
			ByMolarity: float64(all.Molarity), ByMolality: float64(all.Molality), ByMoleFraction: float64(all.MoleFraction),
			ByVolumeFraction: float64(all.VolumeFraction), ByNormality: float64(all.Normality),
			ByAvailableChlorine: float64(all.AvailableChlorine), ByAvailableChlorineVolume: float64(all.AvailableChlorineVolume),
			ByPeroxideVolume: all.PeroxideVolume,
		} {
			back, err := s.MassFraction(Strength{kind, value})
			if err != nil || math.Abs(float64(back/w-1)) > 1e-9 {
				t.Errorf("kind %d, value %v: w = %v, %v; want %v", kind, value, back, err, w)
			}
		}
	}
}

// TestTradeStrengths checks the trade's measures.
func TestTradeStrengths(t *testing.T) {
	peroxide := Solute{Name: "hydrogen peroxide", CAS: "7722-84-1", MolarMass: 34.014 * GramPerMole, Temperature: Celsius(20), Oxygen: 0.5}
	// 100 volume peroxide is 30.35 % w/v, 20 volume 6.07 % (pharmacopoeia, from memory).
	for volume, want := range map[float64]float64{20: 60.7, 100: 303.5} {
		w, err := peroxide.MassFraction(Strength{ByPeroxideVolume, volume})
		if err != nil {
			t.Fatal(err)
		}
		all, err := peroxide.At(w)
		if err != nil || math.Abs(float64(all.MassConcentration)-want) > 0.01*want {
			t.Errorf("%v volume: %v g/L, %v; want %v", volume, all.MassConcentration, err, want)
		}
	}
	// 6 % NaOCl is 5.71 % available chlorine (source of the density row).
	bleach := Solute{Name: "sodium hypochlorite", CAS: hypochloriteCAS, MolarMass: 74.439 * GramPerMole, Temperature: Celsius(20), Chlorine: 1}
	all, err := bleach.At(0.06)
	if err != nil || math.Abs(all.AvailableChlorine.Percent()-5.71) > 0.01 {
		t.Errorf("6 %% NaOCl: %v %% available chlorine, %v; want 5.71", all.AvailableChlorine.Percent(), err)
	}
	// 98 % sulfuric acid is 18.4 mol/L and 36.7 N, 37 % hydrochloric 12.0 (supplier
	// tables, from memory).
	for _, c := range []struct {
		solute Solute
		w      Fraction
		want   float64
	}{
		{Solute{Name: "sulfuric acid", CAS: sulfuricCAS, MolarMass: 98.072 * GramPerMole, Temperature: Celsius(20)}, 0.98, 18.4},
		{Solute{Name: "hydrogen chloride", CAS: "7647-01-0", MolarMass: 36.458 * GramPerMole, Temperature: Celsius(20)}, 0.37, 12.0},
		{Solute{Name: "acetic acid", CAS: "64-19-7", MolarMass: 60.052 * GramPerMole, Temperature: Celsius(20)}, 0.997, 17.4},
	} {
		all, err := c.solute.At(c.w)
		if err != nil || math.Abs(all.Molarity.MolesPerLitre()-c.want) > 0.1 {
			t.Errorf("%v %% %s: %v mol/L, %v; want %v", c.w.Percent(), c.solute.Name, all.Molarity.MolesPerLitre(), err, c.want)
		}
	}
}

func TestStrengthRefuses(t *testing.T) {
	nitric := Solute{Name: "nitric acid", CAS: "7697-37-2", MolarMass: 63.012 * GramPerMole, Temperature: Celsius(20)}
	tests := []struct {
		name string
		s    Solute
		from Strength
		want error
	}{
		{"120 %", nitric, Strength{ByMassFraction, 1.2}, ErrOutOfRange},
		{"40 mol/L", nitric, Strength{ByMolarity, 40e3}, ErrOutOfRange},
		{"minus", nitric, Strength{ByMolarity, -1}, ErrOutOfRange},
		{"no number", nitric, Strength{ByMolality, math.NaN()}, ErrOutOfRange},
		{"amount fraction 1.1", nitric, Strength{ByMoleFraction, 1.1}, ErrOutOfRange},
		{"no equivalents", nitric, Strength{ByNormality, 1e3}, ErrNoData},
		{"chlorine in nitric acid", nitric, Strength{ByAvailableChlorine, 0.1}, ErrNoData},
		{"no density", Solute{Name: "thing", MolarMass: 0.1}, Strength{ByMolarity, 1e3}, ErrNoData},
		{"no molar mass", Solute{Name: "thing", Density: 1e3}, Strength{ByMolarity, 1e3}, ErrNoData},
		{"heavier than itself", Solute{Name: "thing", MolarMass: 0.1, Density: 1e3}, Strength{ByMassConcentration, 1200}, ErrOutOfRange},
	}
	for _, c := range tests {
		w, err := c.s.MassFraction(c.from)
		if w != 0 || !errors.Is(err, c.want) {
			t.Errorf("%s: %v, %v; want %v", c.name, w, err, c.want)
		}
	}
}

// TestBlends checks that mixing doesn't mind the order, that dilution and back is
// where it began, and that solute is kept.
func TestBlends(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 8))
	for range 1000 {
		a, b := Portion{Mass(r.Float64()), Fraction(r.Float64())}, Portion{Mass(r.Float64()), Fraction(r.Float64())}
		ab, ba := Mixed(a, b), Mixed(b, a)
		if math.Abs(float64(ab.Strength-ba.Strength)) > 1e-15 || ab.Mass != ba.Mass {
			t.Fatalf("mixing %v and %v gives %v or %v", a, b, ab, ba)
		}
		blend, err := BlendTo(a.Strength, b.Strength, ab.Strength, ab.Mass)
		if err != nil {
			t.Fatal(err)
		}
		heavy := a
		if b.Strength > a.Strength {
			heavy = b
		}
		if math.Abs(float64(blend.Strong-heavy.Mass)) > 1e-9 && math.Abs(float64(a.Strength-b.Strength)) > 1e-6 {
			t.Fatalf("taking %v apart gives %v, want %v of the stronger", ab, blend, heavy)
		}
		d, err := Dilute(ab.Strength, ab.Strength*Fraction(r.Float64()), 1)
		if err != nil {
			t.Fatal(err)
		}
		back := Mixed(Portion{d.Stock, ab.Strength}, Portion{d.Water, 0})
		if math.Abs(float64(back.Mass-1)) > 1e-12 {
			t.Fatalf("a dilution to 1 kg weighs %v", back.Mass)
		}
	}
	if _, err := Dilute(0.5, 0.6, 1); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("diluting upwards: %v", err)
	}
}

// TestContraction checks ethanol and water, whose loss of volume is the classic: 50
// mL of each give about 96.5 to 97 mL at 20 °C (common practice).
func TestContraction(t *testing.T) {
	ethanol, water := Density(0.7893*GramPerMillilitre), Density(0.9982*GramPerMillilitre)
	lost, err := Contraction("64-17-5", Celsius(20), Portion{ethanol.Mass(50 * Millilitre), 1}, Portion{water.Mass(50 * Millilitre), 0})
	if err != nil || lost.Millilitres() < 2.8 || lost.Millilitres() > 4 {
		t.Errorf("50 mL ethanol and 50 mL water lose %v mL, %v; want 3 to 3.5", lost.Millilitres(), err)
	}
}

// TestDiluteWarm checks practice's figure: 1 kg of 96 % sulfuric acid run into much
// water gives about 640 kJ, which 1.9 kg of ice take up.
func TestDiluteWarm(t *testing.T) {
	d, err := DiluteWarm(sulfuricCAS, 98.072*GramPerMole, 0.96, 0.05, 0.96/0.05*Kilogram, Celsius(20))
	if err != nil || math.Abs(d.Heat.Kilojoules()-640) > 20 || math.Abs(float64(d.Stock-1)) > 1e-9 {
		t.Fatalf("1 kg of 96 %%: %v kg of stock, %v kJ, %v; want 1 kg, 640 kJ", d.Stock, d.Heat.Kilojoules(), err)
	}
	ice, enough := d.IceShare(Celsius(20), Celsius(20))
	if !enough || ice < 1.3 || ice > 1.9 {
		t.Errorf("ice to hold 20 °C: %v kg, %v; want under 1.9 kg, its water warming up as well", ice, enough)
	}
	// Equal masses of 96 % acid and water end above 100 °C uncooled (common practice:
	// it boils).
	hot, err := DiluteWarm(sulfuricCAS, 98.072*GramPerMole, 0.96, 0.60, 1, Celsius(20))
	if err != nil || hot.Temperature.Celsius() < 100 || hot.Temperature.Celsius() > 200 {
		t.Errorf("96 %% to 60 %%: %v °C, %v", hot.Temperature.Celsius(), err)
	}
}

// TestAgeing checks hypochlorite against the stock table for a second strength and
// other temperatures than the one that set the rate (read; 12.50 trade % at 70 and
// 80 °F after one and three months), and the maker's factors.
func TestAgeing(t *testing.T) {
	const perTrade = 0.1134 / 12.5 // mass fraction of NaOCl per trade per cent
	for _, c := range []struct{ celsius, days, left float64 }{
		{21.1, 30.4, 11.11}, {21.1, 91.3, 9.28}, {26.7, 30.4, 9.93}, {26.7, 91.3, 7.48}, {23.9, 182.6, 6.84},
	} {
		w, err := AgedFraction("hypochlorite", 0.1134, c.days, Celsius(c.celsius))
		if got := float64(w) / perTrade; err != nil || math.Abs(got-c.left) > 0.1*(12.5-c.left)+0.05 {
			t.Errorf("12.5 %% after %v days at %v °C: %.2f %%, %v; want %v", c.days, c.celsius, got, err, c.left)
		}
	}
	loss := func(w Fraction, t Temperature) float64 {
		left, _ := AgedFraction("hypochlorite", w, 0.01, t)
		return float64(w - left)
	}
	if f := loss(0.1, Celsius(30)) / loss(0.1, Celsius(20)); math.Abs(f-3.5) > 0.01 {
		t.Errorf("10 °C make the decay %v times faster, want 3.5 (maker's note)", f)
	}
	if f := loss(0.2, Celsius(20)) / loss(0.1, Celsius(20)); math.Abs(f-4) > 0.01 {
		t.Errorf("twice the strength decays %v times faster, want 4 (maker's note, without salt)", f)
	}
	for _, law := range AgeingLaws() {
		if same, err := AgedFraction(law, 0.1, 0, Celsius(20)); err != nil || same != 0.1 {
			t.Errorf("%s: after no time %v, %v", law, same, err)
		}
		if _, err := AgedFraction(law, 0.1, 1, Celsius(90)); !errors.Is(err, ErrOutOfRange) {
			t.Errorf("%s at 90 °C: %v", law, err)
		}
	}
	if _, err := AgedFraction("wine", 0.1, 1, Celsius(20)); err == nil {
		t.Error("wine ages")
	}
}

// TestHydrometer reads densities back into strengths: battery acid of 1.26 g/mL at 20 °C
// is 35 % (row 35 of the table: 1.2599), and sulfuric acid of 1.8355 is 96 % or beyond
// its maximum.
func TestHydrometer(t *testing.T) {
	got, err := FractionsOfDensity(sulfuricCAS, 1.2599*GramPerMillilitre, Celsius(20))
	if err != nil || len(got) != 1 || math.Abs(float64(got[0])-0.35) > 1e-4 {
		t.Errorf("1.2599 g/mL: %v, %v; want 35 %%", got, err)
	}
	got, err = FractionsOfDensity(sulfuricCAS, 1.8355*GramPerMillilitre, Celsius(20))
	if err != nil || len(got) != 2 || math.Abs(float64(got[0])-0.96) > 1e-4 || got[1] < 0.98 {
		t.Errorf("1.8355 g/mL: %v, %v; want 96 %% and one above 98 %%", got, err)
	}
	if got, err := FractionsOfDensity(sulfuricCAS, 2*GramPerMillilitre, Celsius(20)); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("2 g/mL: %v, %v", got, err)
	}
	for _, w := range []Fraction{0.1, 0.3, 0.6} {
		rho, _ := SolutionDensity("7697-37-2", w, Celsius(30))
		got, err := FractionsOfDensity("7697-37-2", rho, Celsius(30))
		if err != nil || len(got) != 1 || math.Abs(float64(got[0]-w)) > 1e-6 {
			t.Errorf("nitric acid of %v: %v, %v; want %v", rho, got, err, w)
		}
	}
}

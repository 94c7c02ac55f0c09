package chem

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

// TestBufferStandards checks the activity-corrected pH against the primary
// standards of pH at 25 °C (NIST SP 260-53 and IUPAC 2002, values from memory)
// with thermodynamic pKa from handbooks (from memory).
func TestBufferStandards(t *testing.T) {
	phosphoric := []float64{2.148, 7.198, 12.35}
	phthalic := []float64{2.950, 5.408}
	tests := []struct {
		name         string
		mix          []Protolyte
		strong, ions Concentration
		want, within float64
	}{
		{"0.05 mol/kg potassium hydrogen phthalate", []Protolyte{{PKa: phthalic, C: litre(0.04985)}}, litre(0.04985), litre(0.04985 / 2), 4.005, 0.04},
		{"0.025 mol/kg each of the phosphates", []Protolyte{{PKa: phosphoric, C: litre(0.0498)}}, litre(0.0747), litre(0.0747 / 2), 6.865, 0.04},
		{"0.01 mol/kg borax", []Protolyte{{PKa: []float64{9.237}, C: litre(0.0399)}}, litre(0.01995), litre(0.01995 / 2), 9.180, 0.04},
		{"0.025 mol/kg each of the carbonates", []Protolyte{{PKa: []float64{6.352, 10.329}, C: litre(0.0498)}}, litre(0.0747), litre(0.0747 / 2), 10.012, 0.04},
	}
	for _, c := range tests {
		got, err := PHDavies(c.mix, c.strong, c.ions, Celsius(25))
		if err != nil || math.Abs(got.PH-c.want) > c.within {
			t.Errorf("%s: pH %.3f at I = %.3f, %v; want %v", c.name, got.PH, got.IonicStrength.MolesPerLitre(), err, c.want)
		}
	}
}

// TestDavies checks the coefficient of 0.1 mol/L of a salt (Davies' own equation
// gives 0.78; measured NaCl 0.778, handbook, from memory), and that the correction
// vanishes in dilution.
func TestDavies(t *testing.T) {
	got, err := PHDavies(nil, 0, litre(0.1), Celsius(25))
	if err != nil || math.Abs(got.Gamma-0.778) > 0.01 {
		t.Errorf("γ(0.1 mol/L) = %v, %v; want 0.778", got.Gamma, err)
	}
	if a := debyeHueckelA(Celsius(25)); math.Abs(a-0.509) > 0.003 {
		t.Errorf("A at 25 °C = %v, want 0.509", a)
	}
	plain, _ := PH(nil, litre(1e-4), Celsius(25))
	dilute, err := PHDavies(nil, litre(1e-4), litre(0.5e-4), Celsius(25))
	if err != nil || math.Abs(plain-dilute.PH) > 0.01 {
		t.Errorf("1e-4 mol/L NaOH: %v without, %v with activities, %v", plain, dilute.PH, err)
	}
	if _, err := PHDavies(nil, 0, litre(0.8), Celsius(25)); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("0.8 mol/L: %v, want a refusal with the range", err)
	}
}

// random makes a mixture out of a source of chance.
func random(r *rand.Rand) ([]Protolyte, Concentration) {
	mix := make([]Protolyte, r.IntN(9))
	for i := range mix {
		mix[i].C = litre(math.Pow(10, -9*r.Float64()+0.5))
		mix[i].Charge = r.IntN(3)
		for range r.IntN(4) {
			mix[i].PKa = append(mix[i].PKa, -4+20*r.Float64())
		}
	}
	return mix, litre(4*r.Float64() - 2)
}

// TestChargeBalanceCloses checks the answer by putting it back.
func TestChargeBalanceCloses(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	for range 3000 {
		mix, strong := random(r)
		pH, err := PH(mix, strong, Celsius(25))
		if err != nil {
			t.Fatalf("%v, %v: %v", mix, strong, err)
		}
		checkBalance(t, mix, strong, pH)
	}
}

// checkBalance wants the net charge to change sign within the tolerance of a pH.
func checkBalance(t *testing.T, mix []Protolyte, strong Concentration, pH float64) {
	t.Helper()
	pKw, _ := PKw(Celsius(25))
	b := balance{mix: mix, strong: float64(strong), pKw: pKw}
	if above, below := b.at(pH-1e-9), b.at(pH+1e-9); above < 0 || below > 0 {
		if size := 1e-12 * (math.Abs(float64(strong)) + 1); math.Abs(above) > size && math.Abs(below) > size {
			t.Errorf("at pH %v the charges leave %v and %v", pH, above, below)
		}
	}
}

// TestPHRisesWithBase checks that more base never lowers a pH.
func TestPHRisesWithBase(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 4))
	for range 300 {
		mix, strong := random(r)
		last := math.Inf(-1)
		for step := range 20 {
			pH, err := PH(mix, strong+litre(0.05*float64(step)), Celsius(25))
			if err != nil {
				t.Fatal(err)
			}
			if pH < last-1e-9 {
				t.Fatalf("pH falls from %v to %v with base", last, pH)
			}
			last = pH
		}
	}
}

// TestThereAndBack checks that the amount to a pH brings the pH about.
func TestThereAndBack(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 6))
	for range 300 {
		mix, strong := random(r)
		start, err := PH(mix, strong, Celsius(25))
		if err != nil {
			t.Fatal(err)
		}
		target := start + 3*r.Float64()
		if target > 14 {
			continue
		}
		n, err := BaseToPH(mix, strong, 2*Litre, target, Celsius(25))
		if err != nil {
			t.Fatalf("to pH %v from %v: %v", target, start, err)
		}
		got, err := PH(mix, strong+Concentration(float64(n)/float64(2*Litre)), Celsius(25))
		if err != nil || math.Abs(got-target) > 1e-6 {
			t.Errorf("%v mol of base give pH %v, %v; want %v", n, got, err, target)
		}
		if _, err := AcidToPH(mix, strong, Litre, target+0.1, Celsius(25)); !errors.Is(err, ErrWrongWay) {
			t.Errorf("acid raises a pH: %v", err)
		}
	}
}

// TestBufferCapacity checks the formula against a finite step of base.
func TestBufferCapacity(t *testing.T) {
	mix := eight()
	for pH := 1.0; pH < 13; pH += 0.7 {
		beta, err := BufferCapacity(mix, pH, Celsius(25))
		if err != nil {
			t.Fatal(err)
		}
		pKw, _ := PKw(Celsius(25))
		b := balance{mix: mix, pKw: pKw}
		const step = 1e-4
		if slope := (b.at(pH-step) - b.at(pH+step)) / (2 * step); math.Abs(float64(beta)/slope-1) > 1e-5 {
			t.Errorf("at pH %.1f: β = %v, the slope of the balance is %v", pH, beta, slope)
		}
	}
}

// TestIonised checks that the shares add up and that half is ionised at the pKa.
func TestIonised(t *testing.T) {
	if s := Ionised([]float64{4.76}, 4.76); math.Abs(float64(s[0])-0.5) > 1e-12 {
		t.Errorf("at its pKa an acid is ionised to %v", s[1])
	}
	for pH := -3.0; pH < 18; pH += 0.5 {
		var sum Fraction
		for _, f := range Ionised([]float64{2.16, 7.21, 12.32}, pH) {
			sum += f
		}
		if math.Abs(float64(sum)-1) > 1e-12 {
			t.Errorf("at pH %v the shares add up to %v", pH, sum)
		}
	}
}

// TestDegas checks carbon dioxide: pure water under air's 0.0004 atm has pH 5.6
// (common practice), bicarbonate boiled out turns alkaline, acid frees what it
// should, and carbon is kept.
func TestDegas(t *testing.T) {
	rain, err := Solution{Volume: Litre, At: Celsius(25)}.Degas(1, 0.0004*Atmosphere)
	if err != nil || math.Abs(rain.PH-5.61) > 0.05 {
		t.Errorf("water under air: pH %v, %v; want 5.6", rain.PH, err)
	}
	// 1 mol NaHCO3 and 1 mol HCl in 1 L: all but the dissolved gas leaves.
	fizz, err := Solution{Volume: Litre, At: Celsius(25)}.Degas(1, Atmosphere)
	if err != nil || math.Abs(float64(fizz.Evolved)-0.966) > 0.002 {
		t.Errorf("1 mol/L bicarbonate acidified: %v mol CO2, %v; want 1 less 0.034", fizz.Evolved, err)
	}
	for _, strong := range []float64{-0.5, 0, 0.4, 0.9, 1.5} {
		d, err := Solution{Strong: litre(strong), Volume: 2 * Litre, At: Celsius(25)}.Degas(2, Atmosphere)
		if err != nil {
			t.Fatal(err)
		}
		if total := float64(d.Evolved) + float64(d.Left)*2e-3; math.Abs(total-2) > 1e-9 {
			t.Errorf("2 mol of carbonate become %v", total)
		}
	}
}

// FuzzPH wants an answer for every solution that can be, and an error, never NaN,
// for what can't.
func FuzzPH(f *testing.F) {
	f.Add(0.1, 0.05, -0.3, 4.76, 9.25, 2.0)
	f.Add(1e-12, 5.0, 10.0, -20.0, 50.0, 50.0)
	f.Add(math.Inf(1), math.NaN(), 0.0, 0.0, 0.0, 0.0)
	f.Fuzz(func(t *testing.T, c1, c2, strong, k1, k2, k3 float64) {
		mix := []Protolyte{{"a", []float64{k1}, 0, litre(c1)}, {"b", []float64{k2, k3}, 1, litre(c2)}}
		pH, err := PH(mix, litre(strong), Celsius(25))
		if err != nil {
			return
		}
		if !(pH >= lowestPH && pH <= highestPH) {
			t.Fatalf("pH %v", pH)
		}
		if c1 < 1e3 && c2 < 1e3 && math.Abs(strong) < 1e3 {
			checkBalance(t, mix, litre(strong), pH)
		}
	})
}

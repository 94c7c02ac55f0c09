package chem

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"
)

func near(got, want, relative float64) bool {
	return math.Abs(got-want) <= relative*math.Max(math.Abs(want), 1e-300)
}

// TestExtractionProperties checks over random cases that more portions of the
// same total leave less, that none falls below exp(−D·V/Vaq), that portions for
// a recovery are just enough, and that the cascade beats cross-current.
func TestExtractionProperties(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 5))
	for range 2000 {
		d := math.Exp(r.Float64()*8 - 3)
		aq, total := Volume(r.Float64()+1e-3)*Litre, Volume(r.Float64()+1e-3)*Litre
		floor := ExtractFloor(d, aq, total)
		last := Fraction(1)
		for n := 1; n <= 20; n++ {
			left := ExtractLeft(d, aq, total/Volume(n), n)
			if left >= last || float64(left) < float64(floor)*(1-1e-12) {
				t.Fatalf("D %v, %v of %v: %d portions leave %v, fewer %v, floor %v", d, total, aq, n, left, last, floor)
			}
			if counter := CounterCurrentLeft(d, aq, total/Volume(n), n); n > 1 && counter < 0 {
				t.Fatalf("counter-current left %v", counter)
			}
			last = left
		}
		recovery := Fraction(r.Float64() * 0.999)
		n, err := PortionsFor(d, aq, total, recovery)
		if err != nil {
			continue // more than 1000 portions
		}
		if got := 1 - ExtractLeft(d, aq, total, n); got < recovery-1e-9 {
			t.Fatalf("%d portions recover %v, want %v", n, got, recovery)
		}
		if n > 0 && 1-ExtractLeft(d, aq, total, n-1) > recovery+1e-9 {
			t.Fatalf("%d portions for %v are one too many", n, recovery)
		}
		each, err := PortionVolume(d, aq, 3, recovery)
		if err != nil || (recovery > 0 && math.Abs(float64(1-ExtractLeft(d, aq, each, 3)-recovery)) > 1e-9) {
			t.Fatalf("three portions of %v recover %v, want %v (%v)", each, 1-ExtractLeft(d, aq, each, 3), recovery, err)
		}
	}
}

// TestCounterCurrentByStages solves the cascade stage by stage as a linear
// system and compares with the Kremser equation.
func TestCounterCurrentByStages(t *testing.T) {
	for _, e := range []float64{0.3, 0.99999, 1, 1.00001, 2, 7} {
		for _, n := range []int{1, 2, 5, 12} {
			// x0 = 1 enters, y(n+1) = 0; x(i−1) + E·x(i+1) = (1 + E)·x(i): shoot from the end
			x, above := 1.0, 0.0 // x(n) taken as 1, x(n+1) = y(n+1)/D = 0
			for range n {
				x, above = (1+e)*x-e*above, x
			}
			want := 1 / x
			if got := CounterCurrentLeft(e, Litre, Litre, n); !near(float64(got), want, 1e-6) {
				t.Errorf("E %v, %d stages: left %v, want %v", e, n, got, want)
			}
		}
	}
}

func TestCounterCurrentStages(t *testing.T) {
	n, err := CounterCurrentStages(2, Litre, Litre, 0.99)
	if err != nil || CounterCurrentLeft(2, Litre, Litre, n) > 0.01 || CounterCurrentLeft(2, Litre, Litre, n-1) <= 0.01 {
		t.Errorf("stages = %d, %v", n, err)
	}
	if _, err := CounterCurrentStages(0.5, Litre, Litre, 0.99); !errors.Is(err, ErrImpossible) {
		t.Errorf("extraction factor 0.5 to 99 %%: %v, want impossible", err)
	}
}

func TestExtractionRefuses(t *testing.T) {
	for name, call := range map[string]func() error{
		"all of it":       func() error { _, err := PortionsFor(3, Litre, Litre, 1); return err },
		"more than all":   func() error { _, err := PortionsFor(3, Litre, Litre, 1.2); return err },
		"no distribution": func() error { _, err := PortionsFor(0, Litre, Litre, 0.5); return err },
		"not a number":    func() error { _, err := PortionsFor(math.NaN(), Litre, Litre, 0.5); return err },
		"no water":        func() error { _, err := PortionsFor(3, 0, Litre, 0.5); return err },
		"hopeless":        func() error { _, err := PortionsFor(1e-9, Litre, Litre, 0.5); return err },
	} {
		if err := call(); !errors.Is(err, ErrOutOfRange) && !errors.Is(err, ErrImpossible) {
			t.Errorf("%s: %v, want a refusal", name, err)
		}
	}
}

// TestAcidExtractionBalance checks that what was taken and what is left add up
// to what came in, and that the pH of the water is that which the general solver
// finds for what is left in it.
func TestAcidExtractionBalance(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 11))
	for range 300 {
		x := AcidExtraction{
			Acid: Amount(0.001 + r.Float64()), PKa: 2 + 4*r.Float64(), Partition: math.Exp(4*r.Float64() - 1),
			Aqueous: Volume(0.1+r.Float64()) * Litre, Organic: Volume(0.05+0.2*r.Float64()) * Litre, Portions: 1 + r.IntN(8),
			Strong: Amount(r.Float64()*0.4 - 0.2),
		}
		if r.IntN(2) == 0 {
			x.Dimer = 0.01 * r.Float64()
		}
		stages, err := x.Stages(nil)
		if err != nil {
			t.Fatal(err)
		}
		total := stages[len(stages)-1].Left
		for _, s := range stages {
			total += s.Taken
			mix := []Protolyte{{PKa: []float64{x.PKa}, C: Concentration(float64(s.Left) / float64(s.Aqueous))}}
			want, err := PH(mix, Concentration(float64(x.Strong)/float64(s.Aqueous)), Celsius(25))
			if err != nil || math.Abs(s.PH-want) > 0.005 {
				t.Fatalf("%+v: pH %v, want %v (%v)", x, s.PH, want, err)
			}
		}
		if !near(float64(total), float64(x.Acid), 1e-12) {
			t.Fatalf("%+v: %v taken and left, want %v", x, total, x.Acid)
		}
	}
}

// TestAcidExtractionLimits reduces the staged extraction to the closed forms.
func TestAcidExtractionLimits(t *testing.T) {
	x := AcidExtraction{Acid: 0.1, PKa: 4.8, Partition: 5, Aqueous: Litre, Organic: 200 * Millilitre, Portions: 4, FixedPH: true, PH: 5.3}
	stages, err := x.Stages(nil)
	if err != nil {
		t.Fatal(err)
	}
	d := DistributionRatio(5, 4.8, 5.3)
	if got, want := float64(stages[3].Left/x.Acid), float64(ExtractLeft(d, Litre, 200*Millilitre, 4)); !near(got, want, 1e-12) {
		t.Errorf("left %v, want %v", got, want)
	}
	x.IonPair = 0.2
	stages, err = x.Stages(stages[:0])
	if err != nil || !near(stages[0].Distribution, IonPairDistributionRatio(5, 0.2, 4.8, 5.3), 1e-12) {
		t.Errorf("with an ion pair D = %v, %v", stages[0].Distribution, err)
	}
	x.FixedPH = false
	if _, err := x.Stages(nil); !errors.Is(err, ErrNoData) {
		t.Errorf("ion pair without a pH: %v", err)
	}
}

// TestDimerPairing checks the quadratic against its own balance and that pairing
// takes more over.
func TestDimerPairing(t *testing.T) {
	alone := AcidExtraction{Acid: 0.5, PKa: 4.8, Partition: 1, Aqueous: Litre, Organic: Litre, Portions: 1, FixedPH: true, PH: 0}
	paired := alone
	paired.Dimer = 0.05
	a, err := alone.Stages(nil)
	if err != nil {
		t.Fatal(err)
	}
	b, err := paired.Stages(nil)
	if err != nil {
		t.Fatal(err)
	}
	if b[0].Taken <= a[0].Taken {
		t.Errorf("paired takes %v, alone %v", b[0].Taken, a[0].Taken)
	}
	m := float64(b[0].Left / 1e-3) // single acid in the solvent, P = 1, all neutral
	if got, want := float64(b[0].Taken), 1e-3*(m+2*0.05*m*m); !near(got, want, 1e-4) {
		t.Errorf("taken %v, want %v", got, want)
	}
}

// TestSolventLosses checks that the first portion saturates the water and later
// ones keep their volume.
func TestSolventLosses(t *testing.T) {
	x := AcidExtraction{Acid: 0.1, PKa: 4.8, Partition: 20, Aqueous: 500 * Millilitre, Organic: 100 * Millilitre, Portions: 3, SolventInWater: 0.1}
	stages, err := x.Stages(nil)
	if err != nil {
		t.Fatal(err)
	}
	for i, want := range []float64{50, 100, 100} {
		if got := stages[i].Organic.Millilitres(); !near(got, want, 1e-9) {
			t.Errorf("extract %d has %v mL, want %v", i+1, got, want)
		}
	}
	x.SolventInWater = 0.3
	if _, err := x.Stages(nil); !errors.Is(err, ErrImpossible) {
		t.Errorf("portion that dissolves whole: %v", err)
	}
}

func BenchmarkAcidExtractionTen(b *testing.B) {
	x := AcidExtraction{Acid: 0.5, PKa: 4.83, Partition: 26, Aqueous: Litre, Organic: 200 * Millilitre, Portions: 10, Strong: -0.01, SolventInWater: 0.09, WaterInSolvent: 0.03}
	stages := make([]ExtractionStage, 0, 10)
	b.ReportAllocs()
	for b.Loop() {
		var err error
		if stages, err = x.Stages(stages[:0]); err != nil {
			b.Fatal(err)
		}
	}
}

// TestPartitionEstimates compares the estimates from the octanol value with
// measured ether values (Collander, partition.csv) and the computed ones of
// ethyl acetate, within their stated spread twice over.
func TestPartitionEstimates(t *testing.T) {
	for _, solvent := range []string{"60-29-7", "141-78-6"} {
		for _, acid := range []string{"107-92-6", "109-52-4", "142-62-1"} {
			table, ok := partitions()[partitionKey{acid, solvent}]
			if !ok {
				t.Fatalf("no value for %s in %s", acid, solvent)
			}
			estimate, ok := estimatePartition(acid, solvent)
			if off := math.Log10(estimate.P / table.P); !ok || math.Abs(off) > 2*estimate.Spread {
				t.Errorf("%s in %s: estimate is off by %.2f in log10", nameOfCAS(acid), nameOfCAS(solvent), off)
			}
			if estimate.Measured {
				t.Error("an estimate says it was measured")
			}
		}
	}
	if p, err := PartitionOf("109-52-4", "60-29-7"); err != nil || !p.Measured || !near(math.Log10(p.P), 1.36, 1e-9) {
		t.Errorf("pentanoic acid in ether: %+v, %v", p, err)
	}
	if _, err := PartitionOf("50-00-0", "141-78-6"); !errors.Is(err, ErrNoData) {
		t.Errorf("unknown solute: %v", err)
	}
}

func TestMutualSolubility(t *testing.T) {
	// IUPAC-NIST Solubility Data Series 88 (mutual_solubility.csv)
	s, err := MutualSolubilityOf("141-78-6", Celsius(20))
	if err != nil || !near(s.SolventInWater.Percent(), 8.7, 1e-9) || !near(s.WaterInSolvent.Percent(), 3.3, 1e-9) {
		t.Errorf("ethyl acetate at 20 °C: %+v, %v", s, err)
	}
	s, err = MutualSolubilityOf("141-78-6", Celsius(22.5))
	if err != nil || !near(s.SolventInWater.Percent(), (8.7+8.15)/2, 1e-9) {
		t.Errorf("ethyl acetate at 22.5 °C: %+v, %v", s, err)
	}
	if lost, ok := s.LostToWater(100 * Gram); !ok || !near(lost.Grams(), 100*0.08425/(1-0.08425), 1e-9) {
		t.Errorf("lost to water: %v, %v", lost, ok)
	}
	if _, err := MutualSolubilityOf("141-78-6", Celsius(60)); !errors.Is(err, ErrOutOfRange) {
		t.Errorf("60 °C: %v", err)
	}
	if _, err := MutualSolubilityOf("67-56-1", Celsius(20)); !errors.Is(err, ErrNoData) {
		t.Errorf("methanol: %v", err)
	}
	if s, err := MutualSolubilityOf("75-09-2", Celsius(20)); err != nil || len(s.Notes) == 0 {
		t.Errorf("dichloromethane off its temperature: %+v, %v, want a note", s, err)
	}
}

func TestNeutralFractionBounds(t *testing.T) {
	for _, pH := range []float64{-1e6, -5, 0, 4.8, 7, 14, 400, 1e6} {
		f := NeutralFraction(pH, 4.8, 9.2)
		if !(f >= 0 && f <= 1) {
			t.Errorf("NeutralFraction(%v) = %v", pH, f)
		}
	}
}

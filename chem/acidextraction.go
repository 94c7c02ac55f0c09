package chem

import (
	"fmt"
	"math"
)

// An AcidExtraction is the repeated extraction of a weak acid from water, each
// portion of solvent shaken to equilibrium and run off.
type AcidExtraction struct {
	Acid      Amount  // in the water at the start, in all its forms
	PKa       float64 // of the acid in water
	Partition float64 // of the neutral acid, solvent over water
	// Dimer is the constant of pairing in the solvent, [HA·HA]/[HA]² in m³/mol;
	// 0 for a solvent that breaks the pairs, such as an alcohol or an ester.
	Dimer float64
	// IonPair is the partition of the anion with its cation; it needs a fixed pH.
	IonPair float64

	Aqueous  Volume // of the water layer at the start
	Organic  Volume // of each portion of fresh solvent
	Portions int

	// FixedPH says that the water is held at PH. Otherwise the pH follows from
	// the acid left and from Strong, the amount of strong cations less that of
	// strong anions in the water: below zero for an excess of strong acid.
	FixedPH bool
	PH      float64
	Strong  Amount

	// SolventInWater and WaterInSolvent are volumes of the one taken up by a
	// volume of the other at saturation; 0 leaves the layers as they are.
	SolventInWater, WaterInSolvent float64
}

// An ExtractionStage is the state after one portion.
type ExtractionStage struct {
	PH               float64 // of the water after the acid has moved
	Distribution     float64 // total acid in solvent over total acid in water
	Aqueous, Organic Volume  // of the settled layers
	Taken, Left      Amount  // acid in this extract, and in the water
}

// Stages appends the state after each portion to dst, so that a caller who
// passes a slice with room pays for no memory. In every portion the acid is
// shared between the layers,
//
//	n = V(aq)·a + V(org)·(m + 2·K2·m²),   m = P·a·h/(h + Ka)
//
// where a is the acid in the water in all its forms, m the single acid in the
// solvent and K2 the pairing constant, and, unless the pH is fixed, the charges
// in the water balance,
//
//	h + [strong] = Kw/h + a·Ka/(h + Ka)
//
// Concentrations stand for activities, pKw is 13.995 (25 °C). The first portion
// loses solvent to the water until it is saturated; each takes up water.
// Sources: Harvey, Analytical Chemistry, 7.7; Nichols, Organic Chemistry Lab
// Techniques, 4.5.
func (x AcidExtraction) Stages(dst []ExtractionStage) ([]ExtractionStage, error) {
	if err := x.check(); err != nil {
		return dst, err
	}
	solver := shareSolver{ka: math.Pow(10, 3-x.PKa), p: x.Partition, pair: x.IonPair, dimer: x.Dimer}
	acid, aqueous, dissolved := x.Acid, x.Aqueous, Volume(0)
	for range x.Portions {
		organic := x.Organic
		if lost := x.Aqueous*Volume(x.SolventInWater) - dissolved; lost > 0 {
			if lost >= organic {
				return dst, x.swallowed(lost)
			}
			organic -= lost
			aqueous += lost
			dissolved += lost
		}
		if taken := organic * Volume(x.WaterInSolvent); taken > 0 {
			organic += taken
			aqueous -= taken
		}
		if aqueous <= 0 {
			return dst, &DataError{Of: "extraction", Err: ErrImpossible, Limit: "the solvent takes up all the water", Remedy: "use less solvent"}
		}
		solver.n, solver.aq, solver.org = float64(acid), float64(aqueous), float64(organic)
		solver.strong = float64(x.Strong) / float64(aqueous)
		h := math.Pow(10, 3-x.PH)
		if !x.FixedPH {
			h = solver.proton()
		}
		left := Amount(solver.inWater(h) * float64(aqueous))
		stage := ExtractionStage{PH: 3 - math.Log10(h), Aqueous: aqueous, Organic: organic, Taken: acid - left, Left: left}
		if left > 0 {
			stage.Distribution = float64(stage.Taken/left) * float64(aqueous/organic)
		}
		dst = append(dst, stage)
		acid = left
	}
	return dst, nil
}

// check refuses numbers that no extraction has.
func (x AcidExtraction) check() error {
	of := "extraction"
	if err := firstError(
		mustBePositive(of, "amount of acid", x.Acid), mustBePositive(of, "partition", x.Partition),
		mustBePositive(of, "aqueous volume", x.Aqueous), mustBePositive(of, "organic volume", x.Organic),
	); err != nil {
		return err
	}
	for _, v := range [...]float64{x.PKa, x.PH, float64(x.Strong), x.Dimer, x.IonPair, x.SolventInWater, x.WaterInSolvent} {
		if !Finite(v) {
			return &DataError{Of: of, Err: ErrOutOfRange, Limit: "every input must be a number"}
		}
	}
	switch {
	case x.Portions < 1 || x.Portions > mostPortions:
		return &DataError{Of: of, Err: ErrOutOfRange, Limit: fmt.Sprintf("1 to %d portions", mostPortions), Remedy: "give the number of portions"}
	case x.Dimer < 0 || x.IonPair < 0 || x.SolventInWater < 0 || x.WaterInSolvent < 0:
		return &DataError{Of: of, Err: ErrOutOfRange, Limit: "pairing, ion pair and solubilities must not be below zero"}
	case x.IonPair > 0 && !x.FixedPH:
		return &DataError{Of: of, Err: ErrNoData, Limit: "an ion pair takes its cation along", Remedy: "give the pH at which the water is held"}
	case x.FixedPH && (x.PH < -2 || x.PH > 16):
		return &DataError{Of: of, Err: ErrOutOfRange, Limit: "pH -2 to 16", Remedy: "give the pH of the water"}
	case x.PKa < -10 || x.PKa > 20:
		return &DataError{Of: of, Err: ErrOutOfRange, Limit: "pKa -10 to 20", Remedy: "give the pKa in water"}
	}
	return nil
}

func (x AcidExtraction) swallowed(lost Volume) error {
	return &DataError{
		Of: "extraction", Err: ErrImpossible,
		Limit:  fmt.Sprintf("the water dissolves %.3g mL, the portion has %.3g mL", lost.Millilitres(), x.Organic.Millilitres()),
		Remedy: "use larger portions or salt the water out",
	}
}

// A shareSolver shares an acid between two layers. Concentrations are in mol/m³.
type shareSolver struct {
	ka, p, pair, dimer float64
	n, aq, org, strong float64
	guess              float64 // proton concentration after the last portion
}

// inWater returns the concentration of the acid in the water, all forms, at a
// proton concentration. Pairing makes the balance a quadratic in it, solved in
// the form that doesn't lose figures when pairing is weak.
func (s *shareSolver) inWater(h float64) float64 {
	neutral := h / (h + s.ka)
	linear := s.aq + s.org*(s.p*neutral+s.pair*(1-neutral))
	m := s.p * neutral
	square := 2 * s.dimer * m * m * s.org
	if square == 0 {
		return s.n / linear
	}
	return 2 * s.n / (linear + math.Sqrt(linear*linear+4*square*s.n))
}

// ionProduct is Kw at 25 °C in (mol/m³)², 10^(6 − 13.995) (pKw of pka.csv).
const ionProduct = 1.0115795e-8

// charge returns the charge balance of the water, which rises with h: protons
// and strong ions less hydroxide and anions.
func (s *shareSolver) charge(h float64) float64 {
	return h + s.strong - ionProduct/h - s.inWater(h)*s.ka/(h+s.ka)
}

// slope returns the derivative of charge over h. With pairing it leaves out how
// pairing changes, which only makes the steps towards the root shorter.
func (s *shareSolver) slope(h float64) float64 {
	free := s.aq*(h+s.ka) + s.org*(s.p*h+s.pair*s.ka)
	return 1 + ionProduct/(h*h) + s.n*s.ka*(s.aq+s.org*s.p)/(free*free)
}

// proton finds the proton concentration between pH 16 and −2 by Newton steps
// from the guess of the last portion, kept inside a bracket that shrinks with
// every step and is halved in its logarithm where a step leaves it, so that it
// always arrives.
func (s *shareSolver) proton() float64 {
	low, high := 1e-13, 1e5
	h := s.guess
	if h == 0 {
		h = 1e-1 // pH 4
	}
	for range 200 {
		f := s.charge(h)
		if f > 0 {
			high = h
		} else {
			low = h
		}
		next := h - f/s.slope(h)
		if !(next > low && next < high) {
			next = math.Sqrt(low * high)
		}
		if math.Abs(next-h) <= 1e-12*h {
			h = next
			break
		}
		h = next
	}
	s.guess = h
	return h
}

package chem

import (
	"fmt"
	"math"
)

// RelativeVolatility returns how much faster a component leaves a liquid than
// another, from the vapour pressures of the pure liquids and the activity
// coefficients in the mixture (1 in an ideal one),
//
//	α = γa · pa / (γb · pb)
//
// It is (ya/yb)/(xa/xb) and the same in moles or in masses.
func RelativeVolatility(pa, pb Pressure, gammaA, gammaB float64) (float64, error) {
	of := "relative volatility"
	if err := firstError(
		mustBePositive(of, "vapour pressure", pa), mustBePositive(of, "vapour pressure", pb),
		mustBePositive(of, "activity coefficient", gammaA), mustBePositive(of, "activity coefficient", gammaB),
	); err != nil {
		return 0, err
	}
	return gammaA * float64(pa) / (gammaB * float64(pb)), nil
}

// RayleighLeft returns the share of a component that is left in the pot when a
// share of the other component, b, is left there and all vapour is taken away,
//
//	a/a0 = (b/b0)^α
//
// where α is the relative volatility of the component over the other, constant
// over the distillation. Source: Rayleigh, Phil. Mag. 4 (1902) 521, as in
// Treybal, Mass-Transfer Operations (from memory).
func RayleighLeft(alpha float64, otherLeft Fraction) Fraction {
	if otherLeft <= 0 {
		return 0
	}
	return Fraction(math.Pow(float64(min(otherLeft, 1)), max(alpha, 0)))
}

// RayleighOtherLeft returns the share of the other component that is left when
// the named one is down to a share, the inverse of RayleighLeft.
func RayleighOtherLeft(alpha float64, left Fraction) (Fraction, error) {
	of := "Rayleigh distillation"
	if err := firstError(mustBePositive(of, "relative volatility", alpha), mustBePositive(of, "share left", left), mustBeShare(of, "share left", left, true)); err != nil {
		return 0, err
	}
	return Fraction(math.Pow(float64(left), 1/alpha)), nil
}

// SteamedLeft returns the share of a component left in a pot whose water is
// kept at its level (steam blown in, or water dropped in), after a mass of water
// has gone over,
//
//	a/a0 = exp(−α · m(distilled) / m(water in pot))
func SteamedLeft(alpha float64, distilled, pot Mass) Fraction {
	if !(pot > 0) || !(distilled > 0) {
		return 1
	}
	return Fraction(math.Exp(-max(alpha, 0) * float64(distilled/pot)))
}

// RaoultVapour returns the partial pressures over an ideal mixture and the
// amount fraction of the first component in the vapour,
//
//	p = x1 · p1 + x2 · p2,   y1 = x1 · p1 / p
//
// where x are amount fractions in the liquid, p1 and p2 the vapour pressures of
// the pure liquids at its temperature. A component without vapour pressure
// counts with 0.
func RaoultVapour(x1 Fraction, p1, p2 Pressure) (first, second Pressure, y1 Fraction, err error) {
	of := "vapour over an ideal mixture"
	if err := mustBeShare(of, "amount fraction", x1, true); err != nil {
		return 0, 0, 0, err
	}
	first, second = p1*Pressure(x1), p2*Pressure(1-x1)
	if !(first >= 0) || !(second >= 0) || !(first+second > 0) || !Finite(first+second) {
		return 0, 0, 0, &DataError{Of: of, Err: ErrOutOfRange, Limit: "one vapour pressure at least must be above zero", Remedy: "give the vapour pressures of the pure liquids"}
	}
	return first, second, Fraction(first / (first + second)), nil
}

// A Strip is the state at which a solvent stops leaving a product.
type Strip struct {
	// SolventLeft is the amount of solvent left per amount of product.
	SolventLeft float64
	// SolventFraction is the amount fraction of solvent in the residue.
	SolventFraction Fraction
	// ProductLost is the share of the product that goes with the solvent; it is
	// an ideal-mixture figure without a column.
	ProductLost Fraction
}

// StripEnd returns the end point of stripping a solvent off a product at a bath
// temperature and pressure: by Raoult's law the residue stops boiling where
//
//	x · p(solvent) + (1 − x) · p(product) = p
//
// and the product lost on the way follows Rayleigh with α = p(product) /
// p(solvent), starting from ratio moles of solvent per mole of product. Both
// vapour pressures are those at the bath's temperature. The error wraps
// ErrImpossible where the solvent doesn't boil at all there, or where the
// product itself boils.
func StripEnd(solvent, product, p Pressure, ratio float64) (Strip, error) {
	of := "end point of stripping"
	if err := firstError(mustBePositive(of, "vapour pressure of the solvent", solvent), mustBePositive(of, "pressure", p), mustBePositive(of, "solvent per product", ratio)); err != nil {
		return Strip{}, err
	}
	if !(product >= 0) || product >= p {
		return Strip{}, &DataError{Of: of, Err: ErrImpossible, Limit: "the product would boil itself", Remedy: "use a cooler bath or a higher pressure"}
	}
	x := float64((p - product) / (solvent - product))
	if solvent <= p || x/(1-x) >= ratio {
		return Strip{}, &DataError{
			Of: of, Err: ErrImpossible,
			Limit:  fmt.Sprintf("the solution has %.3g kPa at the bath's temperature, the pressure is %.3g kPa", float64(product+(solvent-product)*Pressure(ratio/(1+ratio)))/1e3, p.Kilopascals()),
			Remedy: "use a warmer bath or a lower pressure",
		}
	}
	left := x / (1 - x)
	return Strip{
		SolventLeft:     left,
		SolventFraction: Fraction(x),
		ProductLost:     1 - stripProductLeft(float64(product/solvent), ratio, left),
	}, nil
}

// stripProductLeft solves the Rayleigh relation for the share of product left,
// with the solvent per product going from before to after: with b = product
// left, solvent left = b^(1/α) of its amount, so b^(1/α − 1) = after/before.
func stripProductLeft(alpha, before, after float64) Fraction {
	if alpha == 0 {
		return 1
	}
	return Fraction(math.Pow(after/before, alpha/(1-alpha)))
}

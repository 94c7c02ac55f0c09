package chem

import "fmt"

// AtomEconomy returns the share of the mass of the reactants that a balanced
// equation puts into one product, coefficients counted, without excess and
// solvents (B. M. Trost, Science 254 (1991) 1471). product is a species of the
// right side as written. The equation has to be balanced, or it is refused.
func AtomEconomy(e Equation, product string) (Fraction, error) {
	want, err := ParseFormula(product)
	if err != nil {
		return 0, err
	}
	var in, out, all MolarMass
	for _, t := range e.Left {
		in += t.Formula.MolarMass() * MolarMass(t.Coefficient)
	}
	for _, t := range e.Right {
		all += t.Formula.MolarMass() * MolarMass(t.Coefficient)
		if t.Species == product || t.Formula.Hill() == want.Hill() {
			out += t.Formula.MolarMass() * MolarMass(t.Coefficient)
		}
	}
	switch {
	case out == 0:
		return 0, fmt.Errorf("atom economy: %q isn't on the right side of the equation", product)
	case !(in > 0) || all > in*(1+1e-6) || all < in*(1-1e-6):
		return 0, fmt.Errorf("atom economy: the equation doesn't balance; %.6g g/mol go in and %.6g g/mol come out",
			in.GramsPerMole(), all.GramsPerMole())
	}
	return Fraction(out / in), nil
}

// checkMasses refuses masses no metric can be made of.
func checkMasses(what string, inputs []Mass, product Mass) (Mass, error) {
	if !(product > 0) || !Finite(product) {
		return 0, fmt.Errorf("%s: mass of product is %v g; it must be above 0", what, product.Grams())
	}
	var sum Mass
	for i, m := range inputs {
		if !(m >= 0) || !Finite(m) {
			return 0, fmt.Errorf("%s: input %d is %v g; it must be 0 or more", what, i+1, m.Grams())
		}
		sum += m
	}
	if sum < product*(1-1e-9) {
		return 0, fmt.Errorf("%s: %.6g g of inputs can't give %.6g g of product; an input is missing",
			what, sum.Grams(), product.Grams())
	}
	return sum, nil
}

// ProcessMassIntensity returns the mass of all inputs per mass of product. Whether
// water is among the inputs is the caller's choice and has to be said beside the
// number.
func ProcessMassIntensity(inputs []Mass, product Mass) (float64, error) {
	sum, err := checkMasses("process mass intensity", inputs, product)
	return float64(sum) / float64(product), err
}

// EFactor returns the mass of waste per mass of product, inputs less product
// over product (R. A. Sheldon); it is one less than ProcessMassIntensity of the
// same inputs. Many published ones leave water out.
func EFactor(inputs []Mass, product Mass) (float64, error) {
	sum, err := checkMasses("E-factor", inputs, product)
	return float64(sum-product) / float64(product), err
}

// ReactionMassEfficiency returns the share of the mass of the reactants, as used,
// that is product (D. J. C. Constable, A. D. Curzons and V. L. Cunningham, Green
// Chem. 4 (2002) 521): auxiliaries and solvents don't count.
func ReactionMassEfficiency(reactants []Mass, product Mass) (Fraction, error) {
	sum, err := checkMasses("reaction mass efficiency", reactants, product)
	if err != nil {
		return 0, err
	}
	return Fraction(product / sum), nil
}

// SolventShare returns the share of the inputs that is solvent.
func SolventShare(solvents, inputs []Mass) (Fraction, error) {
	var solvent, all Mass
	for _, m := range solvents {
		solvent += m
	}
	for _, m := range inputs {
		all += m
	}
	if !(solvent >= 0 && all > 0 && solvent <= all*(1+1e-9)) || !Finite(all) {
		return 0, fmt.Errorf("solvent share: %v g of solvents among %v g of inputs; want a part of something", solvent.Grams(), all.Grams())
	}
	return Fraction(solvent / all), nil
}

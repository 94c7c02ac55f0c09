package chem

import (
	"errors"
	"math"
)

// A Protolyte is a weak acid or base, and with it all its forms.
type Protolyte struct {
	Name string
	// PKa are the dissociation constants by step, from the form with most
	// protons on, which has the charge Charge: 0 for acetic acid, +1 for the
	// ammonium ion. A strong acid may be given by a very negative pKa.
	PKa    []float64
	Charge int
	// C is the concentration of all forms together.
	C Concentration
}

// Limits of the search for a pH: beyond them no aqueous solution lies, whatever
// its strength.
const (
	lowestPH  = -3.0
	highestPH = 18.0
)

// errStrongIons is the cause where the charges can't be balanced by H⁺ or OH⁻.
var errStrongIons = errors.New("no pH from -3 to 18 balances the charges")

// PH returns the pH of a solution of weak acids and bases and of strong ions in
// water at temperature t, in concentrations (activities taken as one), from
// the charge balance
//
//	strong + [H] − Kw/[H] + Σ C·z(pH) = 0
//
// where strong is the sum of strong cations less strong anions in charges (Na⁺
// of a sodium salt, Cl⁻ of a hydrochloride) and z the mean charge of a
// protolyte's forms. The left side falls with pH throughout, so there is one
// answer, and it is found between -3 and 18 by a bracketed method that always
// ends. Above 0.1 mol/L of ions expect an error of 0.1 to 0.2; PHDavies
// corrects for it. The pKa are taken as they are given, whatever t; t decides
// Kw, from 0 to 100 °C.
//
// Method: OpenStax Chemistry 2e, 14.4 to 14.6; J. N. Butler, Ionic Equilibrium (Wiley, 1998), ch. 3.
func PH(mix []Protolyte, strong Concentration, t Temperature) (float64, error) {
	pKw, err := PKw(t)
	if err != nil {
		return 0, err
	}
	if err := checkMix(mix, strong); err != nil {
		return 0, err
	}
	b := balance{mix: mix, strong: float64(strong), pKw: pKw}
	return b.solve()
}

// mostConcentrated bounds a concentration in mol/m³: no liquid holds 1000 mol/L.
const mostConcentrated = 1e6

// checkMix refuses concentrations that are negative or no numbers, and pKa that
// no acid in water has.
func checkMix(mix []Protolyte, strong Concentration) error {
	if !(math.Abs(float64(strong)) <= mostConcentrated) {
		return outOfRange("pH", "charge of the strong ions", strong.MolesPerLitre(), -mostConcentrated/1e3, mostConcentrated/1e3, "mol/L", "")
	}
	for i := range mix {
		p := &mix[i]
		if !(p.C >= 0 && p.C <= mostConcentrated) {
			return outOfRange("pH", "concentration of "+p.Name, p.C.MolesPerLitre(), 0, mostConcentrated/1e3, "mol/L", "")
		}
		for _, pKa := range p.PKa {
			if !(pKa >= -20 && pKa <= 50) {
				return outOfRange("acid dissociation of "+p.Name, "pKa", pKa, -20, 50, "", "")
			}
		}
	}
	return nil
}

// balance is the charge balance of one solution, in mol/m³.
type balance struct {
	mix    []Protolyte
	strong float64
	pKw    float64
	// davies is −log10 of the activity coefficient of a singly charged ion, 0
	// where activities are taken as concentrations.
	davies float64
	// carbonDioxide is the concentration of dissolved CO2 where it is held by a
	// gas above the solution; its ions then grow with pH.
	carbonDioxide float64
	carbonPK      [2]float64
	// constants are the dissociation constants of all steps of the mix, in order, as
	// powers, where raised is set; else they are worked out as they are needed.
	constants [mostSteps]float64
	raised    bool
}

// mostSteps is how many dissociation steps solve keeps as powers without allocating;
// a longer mixture is solved as well, only slower.
const mostSteps = 48

// raise works out the constants of all steps as powers, where they fit.
func (b *balance) raise() {
	n := 0
	b.raised = false
	for i := range b.mix {
		p := &b.mix[i]
		for step, pKa := range p.PKa {
			if n == mostSteps {
				return
			}
			b.constants[n] = pow10(daviesShift(p.Charge-step, b.davies) - pKa)
			n++
		}
	}
	b.raised = true
}

// weakCharge returns the charge of all protolytes where inverse is 1/[H⁺]: meanCharge
// over the mix with its constants raised already.
func (b *balance) weakCharge(inverse float64) float64 {
	var charge float64
	next := 0
	for i := range b.mix {
		p := &b.mix[i]
		weight, sum, lost := 1.0, 1.0, 0.0
		for step := range p.PKa {
			weight *= b.constants[next] * inverse
			next++
			sum += weight
			lost += weight * float64(step+1)
			if sum > 1e100 {
				weight, sum, lost = weight/sum, 1, lost/sum
			}
		}
		charge += float64(p.C) * (float64(p.Charge) - lost/sum)
	}
	return charge
}

// at returns the net charge at a pH; it falls with pH throughout.
func (b *balance) at(pH float64) float64 {
	const litre = 1e3 // mol/L to mol/m³
	charge := b.strong +
		litre*pow10(b.davies-pH) - litre*pow10(pH-b.pKw+b.davies)
	if b.raised {
		charge += b.weakCharge(pow10(pH))
	} else {
		for i := range b.mix {
			p := &b.mix[i]
			charge += float64(p.C) * meanCharge(p.PKa, p.Charge, pH, b.davies)
		}
	}
	if b.carbonDioxide > 0 {
		one, two := b.carbonIons(pH)
		charge -= one + 2*two
	}
	return charge
}

// carbonIons returns the hydrogencarbonate and the carbonate, in mol/m³, beside
// dissolved CO2 that a gas holds.
func (b *balance) carbonIons(pH float64) (one, two float64) {
	one = b.carbonDioxide * pow10(pH-b.carbonPK[0]+daviesShift(0, b.davies))
	return one, one * pow10(pH-b.carbonPK[1]+daviesShift(-1, b.davies))
}

// daviesShift is what activities add to the logarithm of base over acid, for an
// acid of charge z: its own z² less that of its base, each as a multiple of the
// logarithm for one charge.
func daviesShift(z int, davies float64) float64 {
	return davies * float64((z-1)*(z-1)-z*z)
}

// meanCharge returns the mean charge of a protolyte's forms. davies is −log10 of
// the activity coefficient of a singly charged ion; a form of charge z has z²
// of it.
func meanCharge(pKa []float64, charge int, pH, davies float64) float64 {
	weight, sum, lost := 1.0, 1.0, 0.0
	for i, k := range pKa {
		weight *= pow10(pH - k + daviesShift(charge-i, davies))
		sum += weight
		lost += weight * float64(i+1)
		if sum > 1e100 { // keep long chains of steps from overflowing
			weight, sum, lost = weight/sum, 1, lost/sum
		}
	}
	return float64(charge) - lost/sum
}

// pow10 returns 10 to the power x.
func pow10(x float64) float64 { return math.Exp(x * math.Ln10) }

// pHTolerance is how closely a pH is found: far below any measurement, and far
// above what rounding of the charge balance can disturb.
const pHTolerance = 1e-11

// solve finds the pH where the charges balance, by the method of T. R.
// Chandrupatla, Adv. Eng. Software 28 (1997) 145: inverse quadratic
// interpolation where it is sound, halving where it isn't.
func (b *balance) solve() (float64, error) {
	b.raise()
	defer func() { b.raised = false }()
	x1, x2 := lowestPH, highestPH
	f1, f2 := b.at(x1), b.at(x2)
	if f1 < 0 || f2 > 0 {
		return 0, errStrongIons
	}
	x3, f3 := x1, f1
	share := 0.5
	for {
		x := x1 + share*(x2-x1)
		f := b.at(x)
		if (f > 0) == (f1 > 0) {
			x3, f3 = x1, f1
		} else {
			x3, f3, x2, f2 = x2, f2, x1, f1
		}
		x1, f1 = x, f
		width := math.Abs(x2 - x1)
		if f1 == 0 || width <= 2*pHTolerance {
			return nearer(x1, f1, x2, f2), nil
		}
		share = nextShare(x1, f1, x2, f2, x3, f3)
		least := pHTolerance / width
		share = min(max(share, least), 1-least)
	}
}

// nextShare returns how far from x1 to x2 to look next.
func nextShare(x1, f1, x2, f2, x3, f3 float64) float64 {
	xi := (x1 - x2) / (x3 - x2)
	phi := (f1 - f2) / (f3 - f2)
	if !(phi*phi < xi && (1-phi)*(1-phi) < 1-xi) {
		return 0.5
	}
	return f1/(f2-f1)*(f3/(f2-f3)) + (x3-x1)/(x2-x1)*(f1/(f3-f1))*(f2/(f3-f2))
}

// nearer returns the end of the bracket with the smaller imbalance.
func nearer(x1, f1, x2, f2 float64) float64 {
	if math.Abs(f2) < math.Abs(f1) {
		return x2
	}
	return x1
}

// Ionised returns the share of each form of an acid at a pH, from the form with
// all protons on to the one with none.
func Ionised(pKa []float64, pH float64) []Fraction {
	logs := make([]float64, len(pKa)+1)
	largest := 0.0
	for i, k := range pKa {
		logs[i+1] = logs[i] + pH - k
		largest = math.Max(largest, logs[i+1])
	}
	var sum float64
	for i := range logs {
		logs[i] = pow10(logs[i] - largest)
		sum += logs[i]
	}
	shares := make([]Fraction, len(logs))
	for i := range logs {
		shares[i] = Fraction(logs[i] / sum)
	}
	return shares
}

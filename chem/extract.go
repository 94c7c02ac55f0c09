package chem

import (
	"fmt"
	"math"
)

// mostPortions is the largest number of portions anyone would shake out; a
// count above it is refused, so that a hopeless distribution ratio says so.
const mostPortions = 1000

// ExtractLeft returns the share of a solute that stays in the water after a
// number of portions, each of volume org,
//
//	left = (Vaq / (Vaq + D · Vorg))^n
//
// where D is the distribution ratio, solvent over water. The volumes are those
// of the settled layers. It holds while D is constant: dilute, and the same pH
// in every portion. Left is 1 where nothing is extracted (D or org is zero).
// Source: Nichols, Organic Chemistry Lab Techniques, 4.5.
func ExtractLeft(d float64, aq, org Volume, portions int) Fraction {
	if portions <= 0 || !(d > 0) || !(org > 0) || !(aq > 0) {
		return 1
	}
	return Fraction(math.Exp(float64(portions) * logLeft(d, aq, org)))
}

// logLeft is the natural logarithm of the share one portion leaves.
func logLeft(d float64, aq, org Volume) float64 {
	return -math.Log1p(d * float64(org/aq))
}

// ExtractFloor returns the share that stays in the water if a total volume of
// solvent is used in ever smaller portions, exp(−D · V / Vaq). No split of the
// same volume leaves less in one water layer.
func ExtractFloor(d float64, aq, total Volume) Fraction {
	if !(d > 0) || !(total > 0) || !(aq > 0) {
		return 1
	}
	return Fraction(math.Exp(-d * float64(total/aq)))
}

// checkRecovery refuses what no extraction to a recovery can be.
func checkRecovery(of string, d float64, aq, org Volume, recovery Fraction) error {
	return firstError(
		mustBePositive(of, "distribution ratio", d),
		mustBePositive(of, "aqueous volume", aq),
		mustBePositive(of, "organic volume", org),
		mustBeShare(of, "recovery", recovery, false),
	)
}

// PortionsFor returns the smallest number of portions, each of volume org,
// that recovers a share of the solute. It refuses a recovery of one or more,
// and a distribution ratio that would need more than 1000 portions.
func PortionsFor(d float64, aq, org Volume, recovery Fraction) (int, error) {
	of := "number of portions"
	if err := checkRecovery(of, d, aq, org, recovery); err != nil {
		return 0, err
	}
	// a recovery that a whole number of portions meets exactly must not be
	// pushed up by the last bit of a logarithm, hence the 1e-12
	n := math.Ceil(math.Log1p(-float64(recovery))/logLeft(d, aq, org) - 1e-12)
	if n > mostPortions {
		return 0, &DataError{
			Of:     fmt.Sprintf("recovering %.4g %% with a distribution ratio of %.3g", recovery.Percent(), d),
			Err:    ErrImpossible,
			Limit:  fmt.Sprintf("%d portions give %.3g %%", mostPortions, 100*(1-float64(ExtractLeft(d, aq, org, mostPortions)))),
			Remedy: "change the pH, the solvent or the volume",
		}
	}
	return max(int(n), 0), nil
}

// PortionVolume returns the volume of each of n equal portions that together
// recover a share of the solute,
//
//	V = Vaq / D · ((1 − r)^(−1/n) − 1)
func PortionVolume(d float64, aq Volume, portions int, recovery Fraction) (Volume, error) {
	of := "volume of a portion"
	if err := firstError(
		mustBePositive(of, "distribution ratio", d),
		mustBePositive(of, "aqueous volume", aq),
		mustBePositive(of, "number of portions", float64(portions)),
		mustBeShare(of, "recovery", recovery, false),
	); err != nil {
		return 0, err
	}
	return Volume(float64(aq) / d * math.Expm1(-math.Log1p(-float64(recovery))/float64(portions))), nil
}

// A Split is a way to use a given volume of solvent in equal portions.
type Split struct {
	Portions  int
	Each      Volume
	Recovered Fraction
	// Limit is the share that endlessly many portions of the same total would recover.
	Limit Fraction
}

// BestSplit divides a total volume of solvent into equal portions, which is the
// best division of it, and stops where one portion more would recover less
// than worth (a share of the solute, such as 0.5 %) or where a portion would
// fall below smallest. More portions always recover more, but each costs time
// and a little product in the funnel.
func BestSplit(d float64, aq, total, smallest Volume, worth Fraction) (Split, error) {
	of := "best split"
	if err := firstError(
		mustBePositive(of, "distribution ratio", d),
		mustBePositive(of, "aqueous volume", aq),
		mustBePositive(of, "total volume", total),
		mustBePositive(of, "worth of one portion more", worth),
	); err != nil {
		return Split{}, err
	}
	n := 1
	left := ExtractLeft(d, aq, total, 1)
	for n < mostPortions {
		each := total / Volume(n+1)
		next := ExtractLeft(d, aq, each, n+1)
		if left-next < worth || each < smallest {
			break
		}
		n, left = n+1, next
	}
	return Split{Portions: n, Each: total / Volume(n), Recovered: 1 - left, Limit: 1 - ExtractFloor(d, aq, total)}, nil
}

// CounterCurrentLeft returns the share left in the water that leaves a
// counter-current cascade of n ideal stages fed with fresh solvent,
//
//	left = (E − 1) / (E^(n+1) − 1),   E = D · Vorg / Vaq
//
// and 1/(n+1) at E = 1; aq and org are the volumes (or flows) that pass.
// Source: Kremser equation, as in Treybal, Mass-Transfer Operations (from
// memory).
func CounterCurrentLeft(d float64, aq, org Volume, stages int) Fraction {
	if stages <= 0 || !(d > 0) || !(org > 0) || !(aq > 0) {
		return 1
	}
	e := d * float64(org/aq)
	if math.Abs(e-1) < 1e-9 { // both forms agree here to better than 1e-8
		return Fraction(1 / float64(stages+1))
	}
	log := math.Log(e)
	if log*float64(stages+1) > 700 { // beyond the range of the exponential
		return Fraction(math.Exp(math.Log(e-1) - log*float64(stages+1)))
	}
	return Fraction((e - 1) / math.Expm1(log*float64(stages+1)))
}

// CounterCurrentStages returns the smallest number of ideal stages that
// recovers a share. With E = D · Vorg / Vaq below one no number of stages
// recovers more than E, and the error names that limit.
func CounterCurrentStages(d float64, aq, org Volume, recovery Fraction) (int, error) {
	of := "number of counter-current stages"
	if err := checkRecovery(of, d, aq, org, recovery); err != nil {
		return 0, err
	}
	for n := range mostPortions + 1 {
		if 1-CounterCurrentLeft(d, aq, org, n) >= recovery-1e-12 {
			return n, nil
		}
	}
	e := d * float64(org/aq)
	return 0, &DataError{
		Of:     fmt.Sprintf("recovering %.4g %% counter-current", recovery.Percent()),
		Err:    ErrImpossible,
		Limit:  fmt.Sprintf("extraction factor %.3g; %d stages give %.4g %%", e, mostPortions, 100*(1-float64(CounterCurrentLeft(d, aq, org, mostPortions)))),
		Remedy: "use more solvent or a better distribution ratio",
	}
}

// firstError returns the first error that isn't nil.
func firstError(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}

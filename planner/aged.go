package planner

import (
	"errors"

	"stillroom/chem"
)

func agedFraction(law string, w0 chem.Fraction, days float64, t chem.Temperature) (chem.Fraction, error) {
	return 0, errors.New("no law " + law)
}

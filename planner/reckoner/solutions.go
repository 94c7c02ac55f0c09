package reckoner

// solutionSums are the sums on strengths, dilution, acids and bases.
func solutionSums() []Sum { return nil }

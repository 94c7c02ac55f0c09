package reckoner

// phaseSums are the sums on two phases, vapour and heat.
func phaseSums() []Sum { return nil }

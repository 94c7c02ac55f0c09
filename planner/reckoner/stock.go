package reckoner

// stockSums are the sums on stock and buying.
func stockSums() []Sum { return nil }

package chem

// HazardRecord is the classification of a substance as sold.
type HazardRecord struct {
	Classes, HCodes, EUH, Pictograms                       []string
	Signal, Basis, SCL, MFactor, Limits, SupplierAdditions string
	Unverified                                             bool
}

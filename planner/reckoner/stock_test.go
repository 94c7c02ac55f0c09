package reckoner

import (
	"context"
	"errors"
	"testing"

	"stillroom/chem"
)

// Rows L24, L25 and L26 of testdata/worked_examples.csv: integer programs solved
// two ways (dynamic programming and an integer-programming solver).
func TestPacks(t *testing.T) {
	for _, tc := range []struct {
		need, offers string
		cost         float64
	}{
		{"2600 mL", "100 mL@12; 500 mL@38; 1 L@65; 2.5 L@130", 142},
		{"3.3 L", "250 mL@21; 1 L@58; 2500 mL@149", 207},
		{"1350 mL", "100 mL@9.50; 250 mL@19; 500 mL@41; 1 L@74", 102.5},
		{"0.9 kg", "250 g@20; 1 kg@70", 70},
		{"130", "100@12; 50@7", 19},
	} {
		answer, err := packs(context.Background(), Args{"need": tc.need, "offers": tc.offers})
		if err != nil {
			t.Errorf("packs(%s of %s): %v", tc.need, tc.offers, err)
			continue
		}
		if got := answer.Results[0].Value; got != tc.cost {
			t.Errorf("packs(%s of %s) = %g, want %g", tc.need, tc.offers, got, tc.cost)
		}
	}
}

func TestPacksRefuses(t *testing.T) {
	for _, tc := range []struct {
		need, offers string
		kind         error
	}{
		{"", "1 L@65", ErrMissingKey},
		{"2 L", "", ErrMissingKey},
		{"0 L", "1 L@65", chem.ErrOutOfRange},
		{"1,234 g", "1 kg@65", chem.ErrAmbiguous},
		{"2 L", "1 kg@65", chem.ErrUnknownUnit},
		{"2 L", "1 L", chem.ErrSyntax},
		{"2 L", "1 L@-3", chem.ErrOutOfRange},
		{"2 L", "1 L@cheap", chem.ErrNoNumber},
		{"two litres", "1 L@65", chem.ErrNoNumber},
	} {
		if _, err := packs(context.Background(), Args{"need": tc.need, "offers": tc.offers}); !errors.Is(err, tc.kind) {
			t.Errorf("packs(%q of %q): %v, want %v", tc.need, tc.offers, err, tc.kind)
		}
	}
}

package views

import (
	"math"
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// What is expected follows from the rules of rounding to significant figures
// and from the prefixes of the SI; units stand after a narrow space that
// doesn't break.
func TestNumbersForPeople(t *testing.T) {
	tests := []struct{ got, want string }{
		{massText(63.5 * chem.Gram), "63.5_g"},
		{massText(999.6 * chem.Gram), "1.00_kg"},
		{massText(9.996 * chem.Gram), "10.0_g"},
		{massText(1.2345), "1.23_kg"},
		{massText(0.4 * chem.Milligram), "400_µg"},
		{massText(0), "0_g"},
		{massPlain(50 * chem.Gram), "50_g"},
		{volumeText(610 * chem.Millilitre), "610_mL"},
		{volumePlain(2 * chem.Litre), "2_L"},
		{amountText(0.72), "720_mmol"},
		{percentText(0.982), "98.2_%"},
		{chanceText(0.052), "5.2_%"},
		{chanceText(0.9999), "over 99_%"},
		{chanceText(0.00001), "under 0.1_%"},
		{chanceText(-1), "not assessed"},
		{celsiusText(chem.Celsius(-5)), "−5_°C"},
		{timeText(48 * chem.Minute), "48_min"},
		{timeText(2.5 * chem.Hour), "2_h 30_min"},
		{moneyText(1805, "EUR"), "18.05_EUR"},
		{stored(250_000, inventory.ByVolume), "250_mL"},
		{stored(1_500_000_000, inventory.ByMass), "1.50_kg"},
		{stored(3, inventory.ByCount), "3"},
		{figures(math.NaN(), 3), "–"},
		{numberText(1.9e-5), "1.9·10⁻⁵"},
		{numberText(297.9981), "298"},
		{numberText(0.5), "0.5"},
	}
	for _, tt := range tests {
		if want := strings.ReplaceAll(tt.want, "_", narrow); tt.got != want {
			t.Errorf("got %q, want %q", tt.got, want)
		}
	}
}

func TestReadDate(t *testing.T) {
	for _, s := range []string{"14 Jan 2027", "14 January 2027", "2027-01-14", "Thursday 14 January 2027"} {
		if d, err := readDate(s); err != nil || d.String() != "2027-01-14" {
			t.Errorf("readDate(%q) = %v, %v", s, d, err)
		}
	}
	for _, s := range []string{"03/04/2027", "3.4.2027", "tomorrow", "2027-01", "31 Feb 2027", ""} {
		if d, err := readDate(s); err == nil {
			t.Errorf("readDate(%q) = %v, want an error", s, d)
		}
	}
}

// Charges under one key with different reasons show all of them: what melts ice
// in three steps isn't said by the first step alone.
func TestReasonText(t *testing.T) {
	part := func(step int, why string) planner.HiddenPart { return planner.HiddenPart{Step: step, Why: why} }
	for _, tt := range []struct {
		parts []planner.HiddenPart
		want  string
	}{
		{[]planner.HiddenPart{part(2, "a")}, "a"},
		{[]planner.HiddenPart{part(2, "a"), part(3, "a")}, "a"},
		{[]planner.HiddenPart{part(2, "a"), part(3, "b")}, "step 2: a; step 3: b"},
	} {
		if got := reasonText(tt.parts); got != tt.want {
			t.Errorf("reasonText(%v) = %q, want %q", tt.parts, got, tt.want)
		}
	}
}

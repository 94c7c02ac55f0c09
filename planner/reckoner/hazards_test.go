package reckoner

import (
	"context"
	"strings"
	"testing"
)

// Row MX-13 of testdata/mixture_examples.csv and limits of CLP Annex VI (entries
// 607-002-00-6, 016-020-00-8, 017-011-00-1).
func TestClassify(t *testing.T) {
	for _, tc := range []struct{ mix, want, not string }{
		{"acetic acid: 12 % w/w; water: 88 % w/w", "Skin Irrit. 2 H315; Eye Irrit. 2 H319", "Skin Corr."},
		{"acetic acid: 30 % w/w; water: 70 % w/w", "Skin Corr. 1B H314", "1A"},
		{"sulfuric acid: 15 %; water: 85 %", "Skin Corr. 1A H314", "Skin Irrit."},
		{"sodium dichromate dihydrate: 5 %; sulfuric acid: 12 %; water: 83 %", "Acute Tox. 4 H302", "Aquatic Acute"},
		{"sodium dichromate dihydrate: 5 %; sulfuric acid: 12 %; water: 83 %", "STOT RE 2 H373", "STOT SE"},
		{"sodium hypochlorite: 3 %; water: 97 %", "Aquatic Chronic 2 H411", "Skin Corr."},
	} {
		answer, err := Reckon(context.Background(), "classify", Args{"mix": tc.mix})
		if err != nil {
			t.Errorf("classify %q: %v", tc.mix, err)
			continue
		}
		classes, _ := answer.Result("classes")
		if !strings.Contains(classes.Text, tc.want) || strings.Contains(classes.Text, tc.not) {
			t.Errorf("classify %q = %q, want %q and not %q", tc.mix, classes.Text, tc.want, tc.not)
		}
	}
}

func TestClassifyUnknown(t *testing.T) {
	answer, err := Reckon(context.Background(), "classify", Args{"mix": "an invented powder: 20 %; water: 80 %"})
	if err != nil {
		t.Fatal(err)
	}
	unknown, _ := answer.Result("unknown")
	if unknown.Value < 19.9 || !strings.Contains(strings.Join(answer.Notes, " "), "an invented powder") {
		t.Errorf("answer %+v, want 20 %% unknown and the ingredient named", answer)
	}
}

func TestCarriersSum(t *testing.T) {
	for _, tc := range []struct {
		args Args
		want float64
	}{
		{Args{"items": "a; b; c", "conflicts": "a-b; b-c"}, 2},
		{Args{"items": "a; b; c; d; e", "most": "2"}, 3},
		{Args{"items": "a: 3 kg; b: 3 kg; c: 3 kg", "weight": "6 kg"}, 2},
		{Args{"items": "1-pentanol; sodium dichromate; 1-hexanol", "conflicts": "1-pentanol-sodium dichromate; sodium dichromate - 1-hexanol"}, 2},
		// a 5-cycle needs three colours
		{Args{"items": "a; b; c; d; e", "conflicts": "a-b; b-c; c-d; d-e; e-a"}, 3},
	} {
		answer, err := Reckon(context.Background(), "carriers", tc.args)
		if err != nil {
			t.Errorf("carriers %v: %v", tc.args, err)
			continue
		}
		if got, _ := answer.Result("carriers"); got.Value != tc.want {
			t.Errorf("carriers %v = %v, want %v", tc.args, got.Value, tc.want)
		}
	}
	for _, bad := range []Args{{"items": "a; b", "conflicts": "a-x"}, {"items": "a; b", "most": "0"}, {"items": "a; b", "conflicts": "a-a"}, {"items": "a: 2 mL; b: 1 kg"}} {
		if _, err := Reckon(context.Background(), "carriers", bad); err == nil {
			t.Errorf("carriers %v: no error", bad)
		}
	}
}

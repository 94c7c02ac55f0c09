package views

import (
	"slices"
	"strings"
	"testing"

	"golang.org/x/net/html"
)

func TestBound(t *testing.T) {
	for text, want := range map[string]string{
		"3 × 53.9 mL of it":      "3 × 53.9_mL of it",
		"from 2.3 % to 0.16 %.":  "from 2.3_% to 0.16_%.",
		"below 15 °C, 96 kJ":     "below 15_°C, 96_kJ",
		"step 3 holds":           "step 3 holds",
		"4 for each batch, pH 8": "4 for each batch, pH 8",
		"a g of it":              "a g of it",
		"":                       "",
		"ends with 5 ":           "ends with 5 ",
	} {
		if got := bound(text); got != strings.ReplaceAll(want, "_", narrow) {
			t.Errorf("bound(%q) = %q, want %q", text, got, want)
		}
	}
}

func TestSentence(t *testing.T) {
	for text, want := range map[string]string{"": "", "no data": "No data.", "is it?": "Is it?", "µg are small": "µg are small.", "pH 2 is reached": "pH 2 is reached.", "Done.": "Done."} {
		if got := sentence(text); got != want {
			t.Errorf("sentence(%q) = %q, want %q", text, got, want)
		}
	}
}

// A hidden charge that is left out is gone from the plan of that address only,
// and can be put back.
func TestLeavingOutAHiddenNeed(t *testing.T) {
	s := newDemoServer(t)
	whole := parse(t, get(t, s, "/runs/1"))
	links := all(whole, "a.off")
	if len(links) == 0 {
		t.Fatal("no hidden need can be left out")
	}
	// The rinses are a part of the ethyl acetate that the extraction asks for too.
	rinses := slices.IndexFunc(links, func(n *html.Node) bool {
		href, _ := attribute(n, "href")
		return strings.Contains(href, "off=rinses") && strings.Contains(text(n), "ethyl acetate")
	})
	if rinses < 0 {
		t.Fatal("the rinses can't be left out of the ethyl acetate")
	}
	href, _ := attribute(links[rinses], "href")
	if n := len(all(parse(t, get(t, s, href)), "a.off")); n != len(links)-1 {
		t.Errorf("%d hidden charges without the rinses, want %d", n, len(links)-1)
	}
	if again := len(all(parse(t, get(t, s, "/runs/1")), "a.off")); again != len(links) {
		t.Errorf("the run as it is kept has %d hidden charges, want %d", again, len(links))
	}
}

package views

import (
	"slices"
	"strings"
	"testing"

	"stillroom/inventory"
)

// The shelf shows fifty rows to a page and says how many there are; a heading
// sorts by its column, and once more the other way round.
func TestShelfPages(t *testing.T) {
	s := newSampleServer(t)
	first := parse(t, get(t, s, "/shelf?sort=bottle"))
	rows := all(first, "tbody tr")
	if len(rows) != shelfRows {
		t.Fatalf("%d rows on the first page, want %d", len(rows), shelfRows)
	}
	next, _ := attribute(one(t, first, "a[rel=next]"), "href")
	second := parse(t, get(t, s, next))
	var codes []string
	for _, page := range []string{"/shelf?sort=bottle", next} {
		for _, n := range all(parse(t, get(t, s, page)), "tbody td .b a") {
			codes = append(codes, text(n))
		}
	}
	if !slices.IsSorted(codes) {
		t.Error("the codes aren't in order")
	}
	total := text(one(t, second, "#h-found span"))
	if want := len(codes); total != trimmed(float64(want), 6) {
		t.Errorf("the page says %s, its rows are %d", total, want)
	}
	heading := one(t, first, "th[aria-sort=ascending] a")
	back, _ := attribute(heading, "href")
	if w := get(t, s, back); len(all(parse(t, w), "th[aria-sort=descending]")) != 1 {
		t.Errorf("%s isn't sorted the other way round", back)
	}
}

func TestShelfFilters(t *testing.T) {
	s := newSampleServer(t)
	count := func(query string) int { return len(all(parse(t, get(t, s, "/shelf?"+query)), "tbody tr")) }
	if n, all := count("find=sulfuric"), count(""); n == 0 || n >= all {
		t.Errorf("%d rows for sulfuric", n)
	}
	for _, pair := range [][2]string{
		{"find=1-pentanol", "find=1+PENTANOL"},       // case and hyphen
		{"find=71-41-0", "find=1-pentanol"},          // its registry number, from memory
		{"find=sulfuric+acid", "find=acid+sulfuric"}, // order of words
	} {
		a, b := count(pair[0]), count(pair[1])
		if a == 0 || a != b {
			t.Errorf("%s finds %d, %s finds %d", pair[0], a, pair[1], b)
		}
	}
	doc := parse(t, get(t, s, "/shelf?find=sulfurc"))
	if got := text(one(t, doc, "p[role=status]")); !strings.Contains(got, "spelt nearly so") {
		t.Errorf("a slip is answered by %q", got)
	}
	if n := count("state=" + string(inventory.Sealed)); n == 0 {
		t.Error("no sealed bottle is found")
	}
	if n := count("store=Nowhere"); n != 0 {
		t.Errorf("%d bottles in a store that isn't there", n)
	}
}

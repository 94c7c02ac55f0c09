package planner

import (
	"strings"
	"testing"
)

func TestLintAsksForNumbers(t *testing.T) {
	text := `recipe: x
about: >-
  The alcohol is added slowly; usual work-up.
steps:
  - do: add
    name: add the acid slowly
    cautions: ["below 15 °C, slowly over 45 min", "stir overnight"]
    substance: overnight
`
	faults := Lint("x.yaml", text)
	want := []string{
		`x.yaml:3:24: "slowly" leaves it to the reader; expected a time or a rate, such as over 45 min`,
		`x.yaml:3:32: "usual work-up" leaves it to the reader; expected the steps themselves`,
		`x.yaml:6:24: "slowly" leaves it to the reader; expected a time or a rate, such as over 45 min`,
		`x.yaml:7:57: "overnight" leaves it to the reader; expected a time, such as 16 h`,
	}
	var got []string
	for _, f := range faults {
		got = append(got, f.Error())
	}
	if strings.Join(got, "\n") != strings.Join(want, "\n") {
		t.Errorf("Lint found\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
}

func TestDifference(t *testing.T) {
	var b strings.Builder
	for _, c := range Difference("a\nb\nc\nd", "a\nc\nx\nd") {
		switch {
		case c.Kept():
			b.WriteString(" " + c.Text)
		case c.Taken():
			b.WriteString(" -" + c.Text)
		default:
			b.WriteString(" +" + c.Text)
		}
	}
	if got, want := b.String(), " a -b c +x d"; got != want {
		t.Errorf("Difference =%s, want%s", got, want)
	}
}

func TestEmbeddedRecipesSayNumbers(t *testing.T) {
	for _, r := range Recipes() {
		for _, f := range Lint(r.Name+".yaml", r.Text) {
			t.Error(f.Error())
		}
	}
}

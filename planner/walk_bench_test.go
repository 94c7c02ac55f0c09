package planner

import (
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
)

// mustCompile compiles one of the recipes that come with the program.
func mustCompile(t testing.TB, name string) *Program {
	t.Helper()
	r, ok := RecipeByName(name)
	if !ok {
		t.Fatalf("no recipe %q", name)
	}
	p, err := Compile(r)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// labConditions are those of the demonstration lab at an amount of limiting reagent.
func labConditions(n chem.Amount) Conditions {
	today := inventory.NewDate(2026, 12, 1)
	return Conditions{Limiting: n, Policy: inventory.PolicyOf(inventory.PolicyDefaults(today)), Equipment: inventory.DemoLab(today).Equipment}
}

func BenchmarkRunOnce(b *testing.B) {
	p := mustCompile(b, "pentanoic-acid-dichromate")
	w := p.Workspace(labConditions(0.8))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := p.Run(w); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkSampleTenThousand(b *testing.B) {
	p := mustCompile(b, "pentanoic-acid-dichromate")
	b.ReportAllocs()
	for b.Loop() {
		p.SampleAll(labConditions(0.8), 10000, 1851, func(int, Outcome) {})
	}
}

func BenchmarkWalkReport(b *testing.B) {
	p := mustCompile(b, "pentanoic-acid-dichromate")
	in := labConditions(0.8)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := p.Walk(in); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkCompile(b *testing.B) {
	r, _ := RecipeByName("pentanoic-acid-dichromate")
	for b.Loop() {
		if _, err := Compile(r); err != nil {
			b.Fatal(err)
		}
	}
}

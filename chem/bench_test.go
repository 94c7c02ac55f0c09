package chem

import "testing"

// The targets are those of the project: a formula with its molar mass in under 2 µs,
// a redox reaction of seven species balanced in under 50 µs, a look-up in under 1 µs.
// Figures stand in the commit messages; nothing here fails on time.

func BenchmarkParseFormula(b *testing.B) {
	for _, text := range []string{"H2O", "Na2Cr2O7·2H2O", "(NH4)2Fe(SO4)2·6H2O", "[Fe(CN)6]^4-"} {
		b.Run(text, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				f, err := ParseFormula(text)
				if err != nil || f.MolarMass() <= 0 {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkBalance(b *testing.B) {
	e, err := ParseEquation("KMnO4 + FeSO4 + H2SO4 -> MnSO4 + Fe2(SO4)3 + K2SO4 + H2O")
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Balance(e); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParseAndBalance(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		e, err := ParseEquation("KMnO4 + FeSO4 + H2SO4 -> MnSO4 + Fe2(SO4)3 + K2SO4 + H2O")
		if err != nil {
			b.Fatal(err)
		}
		if _, err := Balance(e); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkElectrons(b *testing.B) {
	e, err := ParseEquation("2 KMnO4 + 10 FeSO4 + 8 H2SO4 -> 2 MnSO4 + 5 Fe2(SO4)3 + K2SO4 + 8 H2O")
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if n, err := e.Electrons(); err != nil || n != 10 {
			b.Fatal(n, err)
		}
	}
}

func BenchmarkLookupSubstance(b *testing.B) {
	Substances()
	for _, key := range []string{"ethyl acetate", "Ethyl Acetate", "Sodium Dichromate dihydrate", "7664-93-9", "no such thing"} {
		b.Run(key, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				LookupSubstance(key)
			}
		})
	}
}

func BenchmarkLoadSubstances(b *testing.B) {
	for b.Loop() {
		indexSubstances(loadSubstances())
	}
}

func BenchmarkParseMass(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := ParseMass("1,5 kg"); err != nil {
			b.Fatal(err)
		}
	}
}

package chem_test

import (
	"fmt"

	"stillroom/chem"
)

func ExampleParseFormula() {
	f, err := chem.ParseFormula("Na2Cr2O7·2H2O")
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%s %.3f g/mol, dry %.3f g/mol\n", f.Hill(), f.MolarMass().GramsPerMole(), f.Anhydrous().MolarMass().GramsPerMole())
	_, err = chem.ParseFormula("Na2Cr2O7·2H2Q")
	fmt.Println(err)
	// Output:
	// Cr2Na2O7·2H2O 297.995 g/mol, dry 261.965 g/mol
	// formula "Na2Cr2O7·2H2Q": unknown element "Q" at character 13; write a symbol of the periodic table
}

func ExampleBalance() {
	e, err := chem.ParseEquation("Cr2O7^2- + Fe^2+ + H^+ -> Cr^3+ + Fe^3+ + H2O")
	if err != nil {
		fmt.Println(err)
		return
	}
	balanced, err := chem.Balance(e)
	if err != nil {
		fmt.Println(err)
		return
	}
	n, err := balanced.Electrons()
	fmt.Println(balanced)
	fmt.Println(n, "electrons,", err)
	// Output:
	// Cr2O7^2- + 6 Fe^2+ + 14 H^+ -> 2 Cr^3+ + 6 Fe^3+ + 7 H2O
	// 6 electrons, <nil>
}

func ExampleLimitingReagent() {
	e, _ := chem.ParseEquation("2 H2 + O2 -> 2 H2O")
	l, err := chem.LimitingReagent(e, []chem.SpeciesAmount{{Species: "H2", Amount: 3}, {Species: "O2", Amount: 2}})
	fmt.Println(l.Reagent, l.Extent, l.Reagents[1].Left, err)
	// Output: H2 1.5 0.5 <nil>
}

func ExampleParseMass() {
	m, err := chem.ParseMass("1,5 kg")
	fmt.Println(m.Grams(), err)
	_, err = chem.ParseMass("1,234 g")
	fmt.Println(err)
	// Output:
	// 1500 <nil>
	// mass "1,234 g": the mark may be a decimal sign or part thousands; write 1.234 or 1234
}

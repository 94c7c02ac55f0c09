package chem_test

import (
	"fmt"

	"stillroom/chem"
)

func ExamplePH() {
	acetic := chem.Protolyte{Name: "acetic acid", PKa: []float64{4.756}, C: 0.2 * chem.MolePerLitre}
	sodium := 0.1 * chem.MolePerLitre
	pH, err := chem.PH([]chem.Protolyte{acetic}, sodium, chem.Celsius(25))
	fmt.Printf("%.2f %v\n", pH, err)
	// Output: 4.76 <nil>
}

func ExampleDilute() {
	d, err := chem.Dilute(96*chem.Percent, 30*chem.Percent, 500*chem.Gram)
	fmt.Printf("%.2f g of acid into %.2f g of water, %v\n", d.Stock.Grams(), d.Water.Grams(), err)
	// Output: 156.25 g of acid into 343.75 g of water, <nil>
}

func ExampleSolutionDensity() {
	_, err := chem.SolutionDensity("7664-93-9", 96*chem.Percent, chem.Celsius(60))
	fmt.Println(err)
	// Output: density of sulfuric acid in water at 96 % w/w, temperature 60 °C: outside the range (covered: 20 to 25 °C); give density= at this temperature
}

func ExampleFirstOrder() {
	mass, _ := chem.NewNormal(50, 0.5)        // g, weighed
	strength, _ := chem.NewNormal(0.96, 0.01) // titrated
	pure := func(x []float64) float64 { return x[0] * x[1] }
	mean, sd, shares, err := chem.FirstOrder(pure, []chem.Dist{mass, strength})
	fmt.Printf("%.1f ± %.1f g, %.0f %% of it from the strength, %v\n", mean, sd, 100*shares[1], err)
	// Output: 48.0 ± 0.7 g, 52 % of it from the strength, <nil>
}

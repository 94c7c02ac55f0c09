package chem

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"
)

// TestPreparations compares published masses with published amounts in the published
// procedures of testdata/preparations.csv, sources in the rows. METHODS allows 3 %;
// an amount printed with one figure may also be the rounded one.
func TestPreparations(t *testing.T) {
	compared := 0
	for _, p := range preparations(t) {
		want, err := strconv.ParseFloat(p["amount_mol"], 64)
		if err != nil {
			continue
		}
		n, ok := publishedAmount(t, p)
		if !ok {
			continue
		}
		compared++
		if math.Abs(n-want) <= 0.03*want || roundsTo(n, p["amount_mol"]) {
			continue
		}
		t.Errorf("%s, %s: %.4g mol, published %s mol (%s)", p["prep_id"], p["material"], n, p["amount_mol"], p["source"])
	}
	if compared < 20 {
		t.Errorf("only %d amounts compared", compared)
	}
}

// publishedAmount computes the amount from the mass, or the volume and the strength or
// density.
func publishedAmount(t *testing.T, p map[string]string) (float64, bool) {
	t.Helper()
	f := sure(ParseFormula(p["formula"]))(t)
	volume, volumeErr := strconv.ParseFloat(p["volume_mL"], 64)
	if strings.HasPrefix(p["purity"], "1 mol/L") && volumeErr == nil {
		return volume / 1000, true
	}
	mass, err := strconv.ParseFloat(p["mass_g"], 64)
	if err != nil {
		s, ok := SubstanceByCAS(p["cas"])
		if !ok || s.Density == 0 || volumeErr != nil {
			return 0, false
		}
		mass = s.Density.Mass(Volume(volume) * Millilitre).Grams()
	}
	if p["cas"] == "7664-93-9" {
		mass *= 0.955 // 95 to 96 % in the older procedures (METHODS, how to read the tables)
	}
	return float64(f.MolarMass().Of(Mass(mass) * Gram)), true
}

// roundsTo reports whether x, written with as many decimals, reads as the text, which
// has one significant figure.
func roundsTo(x float64, text string) bool {
	_, decimals, _ := strings.Cut(text, ".")
	figures := strings.TrimLeft(strings.ReplaceAll(text, ".", ""), "0")
	return len(figures) == 1 && strconv.FormatFloat(x, 'f', len(decimals), 64) == text
}

func preparations(t *testing.T) []map[string]string {
	t.Helper()
	file, err := os.Open("../testdata/preparations.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	records, err := csv.NewReader(file).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var list []map[string]string
	for _, fields := range records[1:] {
		p := map[string]string{}
		for i, column := range records[0] {
			p[column] = fields[i]
		}
		list = append(list, p)
	}
	return list
}

// Every formula in the published procedures parses, and the charges that name a
// substance of the table have the molar mass it has there.
func TestPreparationFormulas(t *testing.T) {
	for _, p := range preparations(t) {
		if p["formula"] == "" {
			continue
		}
		f, err := ParseFormula(p["formula"])
		if err != nil {
			t.Errorf("%s, %s: %v", p["prep_id"], p["material"], err)
			continue
		}
		s, ok := SubstanceByCAS(p["cas"])
		if ok && s.State != "liquid (solution)" && math.Abs(f.MolarMass().GramsPerMole()-s.MolarMass.GramsPerMole()) > 0.00051 {
			t.Errorf("%s, %s: M(%s) isn't that of %s", p["prep_id"], p["material"], f, s.Name)
		}
	}
}

package chem

import (
	"math"
	"os"
	"os/exec"
	"strconv"
	"strings"
	"testing"
)

// TestOpenBabel compares formula and molar mass of every structure of the table with
// Open Babel, a general-purpose library that reads the SMILES on its own way. Its
// atomic weights are older, hence 1 part in 5000.
func TestOpenBabel(t *testing.T) {
	program := openBabel(t)
	var input strings.Builder
	want := map[string]*Substance{}
	for _, s := range Substances() {
		if s.SMILES != "" && s.Formula != "" {
			input.WriteString(s.SMILES + "\t" + s.CAS + "\n")
			want[s.CAS] = s
		}
	}
	command := exec.Command(program, "-ismi", "-otxt", "--append", "formula MW")
	command.Stdin = strings.NewReader(input.String())
	output, err := command.Output()
	if err != nil {
		t.Fatalf("running Open Babel: %v", err)
	}
	compared := 0
	for line := range strings.Lines(string(output)) {
		fields := strings.Fields(line)
		if len(fields) != 3 || want[fields[0]] == nil {
			continue
		}
		compared++
		compareOpenBabel(t, want[fields[0]], fields[1], fields[2])
	}
	t.Logf("%d of %d structures compared", compared, len(want))
	if compared < len(want)*9/10 {
		t.Errorf("Open Babel read %d of %d structures", compared, len(want))
	}
}

// openBabel returns the program, or skips the test; where everything is to be checked,
// which the environment says by STILLROOM_CI, it has to be there.
func openBabel(t *testing.T) string {
	t.Helper()
	program, err := exec.LookPath("obabel")
	if err == nil {
		return program
	}
	if os.Getenv("STILLROOM_CI") == "1" {
		t.Fatal("Open Babel isn't installed, and all checks are compulsory here")
	}
	t.Skip("Open Babel isn't installed")
	return ""
}

func compareOpenBabel(t *testing.T, s *Substance, formula, mass string) {
	t.Helper()
	own, err := ParseFormula(s.Formula)
	if err != nil {
		t.Errorf("%s: %v", s.Name, err)
		return
	}
	if own.Variable() {
		own = own.Anhydrous()
	}
	theirs, err := ParseFormula(caretCharge(formula))
	if err != nil {
		t.Errorf("%s: Open Babel's formula: %v", s.Name, err)
		return
	}
	for _, e := range theirs.Elements() {
		if got := own.Count(e.Symbol); math.Abs(got-e.Count) > 1e-9 {
			t.Errorf("%s, %s: %v atoms of %s, Open Babel has %v", s.Name, s.Formula, got, e.Symbol, e.Count)
		}
	}
	m, err := strconv.ParseFloat(mass, 64)
	if err != nil || math.Abs(own.MolarMass().GramsPerMole()-m) > m/5000 {
		t.Errorf("M(%s, %s) = %.4f g/mol, Open Babel has %s", s.Name, s.Formula, own.MolarMass().GramsPerMole(), mass)
	}
}

// caretCharge writes the trailing signs of Open Babel's formulas as a charge.
func caretCharge(formula string) string {
	bare := strings.TrimRight(formula, "+-")
	if n := len(formula) - len(bare); n > 0 {
		return bare + "^" + strconv.Itoa(n) + formula[len(formula)-1:]
	}
	return formula
}

// TestOpenBabelNuclides compares the masses of nuclides with Open Babel's, which come
// from another compilation.
func TestOpenBabelNuclides(t *testing.T) {
	program := openBabel(t)
	for _, r := range readTable("nuclides.csv") {
		smiles := "[" + r.text("mass_number") + r.text("symbol") + "]"
		output, err := exec.Command(program, "-:"+smiles, "-otxt", "--append", "MW").Output()
		fields := strings.Fields(string(output))
		if err != nil || len(fields) == 0 {
			t.Fatalf("running Open Babel: %v", err)
		}
		theirs, err := strconv.ParseFloat(fields[0], 64)
		own, _ := r.number("mass")
		if err != nil || math.Abs(theirs-own) > 1e-4 {
			t.Errorf("mass of %s = %v, Open Babel has %s", smiles, own, fields[0])
		}
	}
}

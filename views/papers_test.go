package views

import (
	"bytes"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// paperTool finds a program that looks into papers. Without it the test is
// skipped, except where every tool is promised to be there.
func paperTool(t *testing.T, name string) string {
	t.Helper()
	path, err := exec.LookPath(name)
	if err == nil {
		return path
	}
	if os.Getenv("STILLROOM_CI") == "1" {
		t.Fatalf("%s is not installed", name)
	}
	t.Skipf("%s is not installed: poppler-utils, qpdf and zbar-tools look into papers", name)
	return ""
}

type paperMaker func(*planner.Plan, PaperOptions) ([]byte, error)

var paperMakers = map[string]paperMaker{"pick-list": PickList, "hazard-sheet": HazardSheet, "requisition": Requisition}

// writePaper makes a paper and writes it to a file.
func writePaper(t *testing.T, make paperMaker, p *planner.Plan, o PaperOptions) string {
	t.Helper()
	content, err := make(p, o)
	if err != nil {
		t.Fatal(err)
	}
	file := filepath.Join(t.TempDir(), "paper.pdf")
	if err := os.WriteFile(file, content, 0o644); err != nil {
		t.Fatal(err)
	}
	return file
}

// paperText reads a paper back. Lines and pages are joined, and the spaces that
// don't break are made plain ones.
func paperText(t *testing.T, file string) string {
	t.Helper()
	out, err := exec.Command(paperTool(t, "pdftotext"), "-layout", "-enc", "UTF-8", file, "-").Output()
	if err != nil {
		t.Fatalf("pdftotext: %v", err)
	}
	text := strings.NewReplacer("\u202f", " ", "\u00a0", " ").Replace(string(out))
	return strings.Join(strings.Fields(text), " ")
}

func wantText(t *testing.T, text string, wants ...string) {
	t.Helper()
	for _, want := range wants {
		want = strings.Join(strings.Fields(strings.NewReplacer("\u202f", " ", "\u00a0", " ").Replace(want)), " ")
		if !strings.Contains(text, want) {
			t.Errorf("the paper lacks %q", want)
		}
	}
}

func TestPickListReadsBack(t *testing.T) {
	p := paperPlan(t)
	text := paperText(t, writePaper(t, PickList, p, paperOptions()))
	for _, n := range p.Needs {
		for _, d := range n.Draws {
			if n.Count {
				wantText(t, text, n.Substance, d.Bottle.Code)
				continue
			}
			exact := n.Substance == p.Scale.Limiting
			wantText(t, text, d.Form.Name, d.Bottle.Code, measuredMass(d.Mass, exact, p.Tools).text, d.Place.String())
			if d.HasVolume {
				wantText(t, text, measuredVolume(d.Volume, p.Tools).text)
			}
			if d.Bottle.Expiry.Set() {
				wantText(t, text, d.Bottle.Expiry.Short())
			}
		}
	}
	for _, w := range p.Waste {
		wantText(t, text, w.Stream, w.Carboy)
	}
	wantText(t, text, "EXACT: limiting reagent", "Not ready: do not start", "sodium sulfate: short", p.Revision, "Run 12", "Printed Tuesday 1 December 2026 14:05 by L. Marten")
}

func TestHazardSheetReadsBack(t *testing.T) {
	p := paperPlan(t)
	text := paperText(t, writePaper(t, HazardSheet, p, paperOptions()))
	for _, n := range p.Hazards {
		for _, s := range n.Statements {
			code, _, _ := strings.Cut(s, " ")
			wantText(t, text, code)
		}
	}
	for _, s := range p.Steps {
		wantText(t, text, s.Name)
	}
	for _, part := range []string{"In an emergency", "Recognise: substances used", "formed on the way", "Recognise: pairs", "Assess: step by step", "Minimise: controls", "Prepare: waste", "signatures"} {
		at := strings.Index(text, part)
		if at < 0 {
			t.Fatalf("the sheet lacks %q", part)
		}
		text = text[at:] // the parts come in this order
	}
}

// What nobody knows is printed as unknown, never left blank.
func TestHazardSheetNoData(t *testing.T) {
	text := paperText(t, writePaper(t, HazardSheet, paperPlan(t), paperOptions()))
	wantText(t, text, "an additive without a record NO DATA: not assessed", "Exposure limits: no data", "time not assessed",
		"does not replace a heat measurement", "competent person", "read the supplier's sheet")
	bare := &planner.Plan{Recipe: &planner.Recipe{Title: "Nothing known"}, Revision: "00000000"}
	wantText(t, paperText(t, writePaper(t, HazardSheet, bare, paperOptions())), "No steps: not assessed", "No waste computed: not assessed", "no proven scale on record")
}

// 0.1 mol of sulfuric acid takes 0.2 mol of sodium hydrogencarbonate, 16.8 g
// (row WA-149 of waste_rules.csv: 1.713 g per g).
func TestCarbonateForAcid(t *testing.T) {
	got := carbonateForAcid(&planner.Plan{Needs: []planner.Need{{Substance: "sulfuric acid", Mass: 100 * chem.Gram}, {Substance: "ethyl acetate", Mass: 1}}})
	if g := got.Grams(); g < 171.2 || g > 171.4 {
		t.Errorf("carbonate for 100 g of sulfuric acid = %.1f g, want 171.3", g)
	}
}

func TestRequisitionReadsBack(t *testing.T) {
	p := paperPlan(t)
	text := paperText(t, writePaper(t, Requisition, p, paperOptions()))
	wantText(t, text, "sodium sulfate, anhydrous 99 %", "CAS 7757-82-6", "short by "+massText(38*chem.Gram), "Brackwater Supplies", "BS-4411",
		"1 × 500 g", "27.50 EUR", "Monday 4 January 2027", "approved by", "charge code")
	p.Buy, p.Needs = nil, p.Needs[:1]
	if _, err := Requisition(p, paperOptions()); !errors.Is(err, ErrNothingShort) {
		t.Errorf("Requisition with nothing short: error %v, want ErrNothingShort", err)
	}
}

func TestPapersAreWhole(t *testing.T) {
	qpdf := paperTool(t, "qpdf")
	for name, make := range paperMakers {
		for _, letter := range []bool{false, true} {
			o := paperOptions()
			o.Letter = letter
			out, err := exec.Command(qpdf, "--check", writePaper(t, make, paperPlan(t), o)).CombinedOutput()
			if err != nil || !strings.Contains(string(out), "No syntax or stream encoding errors") {
				t.Errorf("%s, letter %v: qpdf --check: %v\n%s", name, letter, err, out)
			}
		}
	}
}

// The codes are read from a rendering at the resolution of an office scanner.
func TestPaperCodesScan(t *testing.T) {
	zbar, pdftoppm := paperTool(t, "zbarimg"), paperTool(t, "pdftoppm")
	p := paperPlan(t)
	file := writePaper(t, PickList, p, paperOptions())
	images := filepath.Join(filepath.Dir(file), "page")
	if out, err := exec.Command(pdftoppm, "-r", "200", "-png", file, images).CombinedOutput(); err != nil {
		t.Fatalf("pdftoppm: %v\n%s", err, out)
	}
	pages, err := filepath.Glob(images + "*.png")
	if err != nil || len(pages) == 0 {
		t.Fatalf("no pages: %v", err)
	}
	// zbarimg complains about a missing message bus on its error output and may
	// exit with 4 for a page without a bar code.
	out, _ := exec.Command(zbar, append([]string{"-q"}, pages...)...).Output()
	for _, n := range p.Needs {
		for _, d := range n.Draws {
			if !n.Count && !strings.Contains(string(out), "CODE-128:"+d.Bottle.Code+"\n") {
				t.Errorf("no bar code read for %s", d.Bottle.Code)
			}
		}
	}
	back := "QR-Code:http://127.0.0.1:8087/runs/12?printed=7f3a12bc\n"
	if got := strings.Count(string(out), back); got != len(pages) {
		t.Errorf("%d of %d pages lead back to the run:\n%s", got, len(pages), out)
	}
}

func TestPapersAreReproducible(t *testing.T) {
	for name, make := range paperMakers {
		first, err := make(paperPlan(t), paperOptions())
		if err != nil {
			t.Fatal(err)
		}
		for range 5 {
			again, err := make(paperPlan(t), paperOptions())
			if err != nil || !bytes.Equal(first, again) {
				t.Fatalf("%s: the same plan gives other bytes (%v)", name, err)
			}
		}
	}
}

func TestPapersWithoutPlan(t *testing.T) {
	for name, make := range paperMakers {
		if _, err := make(nil, paperOptions()); err == nil {
			t.Errorf("%s of no plan: no error", name)
		}
	}
}

// A bottle that two needs draw from is fetched once, with both amounts.
func TestPickListOneBottleTwoNeeds(t *testing.T) {
	p := paperPlan(t)
	second := p.Needs[4]
	second.Draws = []planner.Draw{second.Draws[0]}
	second.Draws[0].Mass, second.Draws[0].Leaves = 16*chem.Gram, 50*chem.Gram
	second.Draws[0].Volume, second.Draws[0].LeavesVolume = 18*chem.Millilitre, 55*chem.Millilitre
	second.Draws[0].Steps = []planner.StepDraw{{Step: 8, Mass: 16 * chem.Gram, Volume: 18 * chem.Millilitre}}
	p.Needs = append(p.Needs, second)
	text := paperText(t, writePaper(t, PickList, p, paperOptions()))
	wantText(t, text, "about 850 g", "for step 8", "leaves "+massText(50*chem.Gram))
	if got := strings.Count(text, second.Draws[0].Bottle.Code); got != 1 {
		t.Errorf("bottle listed %d times, want once", got)
	}
}

// Every bottle says where it goes back to and which one to take instead; a
// sealed one has a box for the date.
func TestPickListSpareAndReturn(t *testing.T) {
	p := paperPlan(t)
	spare := p.Needs[0].Draws[0]
	p.Needs[0].Next = &planner.Spare{Bottle: inventory.Bottle{Code: inventory.MakeCode(inventory.BottleCode, 77)}, Form: spare.Form, Place: p.Needs[1].Draws[0].Place}
	text := paperText(t, writePaper(t, PickList, p, paperOptions()))
	wantText(t, text, "spare: "+inventory.MakeCode(inventory.BottleCode, 77)+", "+p.Needs[1].Draws[0].Place.String(), "return to this place")
	if got := strings.Count(text, "spare: none"); got != len(paperBottles)-1 {
		t.Errorf("%d bottles without a spare, want %d", got, len(paperBottles)-1)
	}
	if got := strings.Count(text, "open new bottle: write date"); got != 1 {
		t.Errorf("%d boxes for the date of opening, want one: one bottle is sealed", got)
	}
	if !strings.Contains(text, "empties the bottle, which does not go back") {
		t.Error("the bottle that is used up goes back")
	}
}

// A name longer than a line is broken, not cut off or run into the amount.
func TestPickListLongNames(t *testing.T) {
	p := paperPlan(t)
	long := "2,2,6,6-tetramethylpiperidine-1-oxyl, recrystallised, in a name that goes on and on"
	p.Needs[0].Draws[0].Form.Name = long
	p.Needs[1].Draws[0].Form.Name = strings.Repeat("tetra", 30)
	text := paperText(t, writePaper(t, PickList, p, paperOptions()))
	for word := range strings.FieldsSeq(long) {
		wantText(t, text, word)
	}
	joined := strings.ReplaceAll(text, " ", "")
	if got := strings.Count(joined, "tetra"); got < 30 {
		t.Errorf("%d of 30 pieces of a long word are printed", got)
	}
}

// Divisions of the demonstration lab's tools: bench balance 10 mg to 2 kg,
// platform balance 1 g, cylinders 1 mL at 100 mL and 10 mL at 1 L.
func TestMeasured(t *testing.T) {
	tools := paperPlan(t).Tools
	for _, tc := range []struct {
		got  measured
		want string
		tool string
	}{
		{measuredMass(63.5237*chem.Gram, true, tools), "63.52 g", "bench balance 2 kg"},
		{measuredMass(0.42337*chem.Gram, false, tools), "423.4 mg", "analytical balance 220 g"},
		{measuredMass(3456.7*chem.Gram, false, tools), "3.457 kg", "platform balance 15 kg"},
		{measuredVolume(77.97*chem.Millilitre, tools), "78 mL", "measuring cylinder 100 mL"},
		{measuredVolume(926.3*chem.Millilitre, tools), "930 mL", "measuring cylinder 1 L"},
		{measuredVolume(5*chem.Litre, tools), "5.000 L", ""},
		{measuredMass(63.5237*chem.Gram, true, nil), "63.52 g", ""},
	} {
		if text := strings.ReplaceAll(tc.got.text, narrow, " "); text != tc.want || tc.got.tool != tc.tool {
			t.Errorf("measured %q with %q, want %q with %q", text, tc.got.tool, tc.want, tc.tool)
		}
	}
}

// Every pictogram's paths can be traced and every name is known.
func TestPictograms(t *testing.T) {
	s, err := newSheet(paperPlan(t), paperOptions(), "Pictograms")
	if err != nil {
		t.Fatal(err)
	}
	for n := 1; n <= 9; n++ {
		code := fmt.Sprintf("GHS%02d", n)
		if len(pictogramShapes[code]) == 0 || pictogramName(code) == code {
			t.Errorf("%s has no drawing or no name", code)
		}
		s.drawPictogram(code, 20, 20, 20)
	}
	if err := s.pdf.Error(); err != nil {
		t.Error(err)
	}
}

func BenchmarkPapers(b *testing.B) {
	p := paperPlan(b)
	for b.Loop() {
		if _, err := PickList(p, paperOptions()); err != nil {
			b.Fatal(err)
		}
		if _, err := HazardSheet(p, paperOptions()); err != nil {
			b.Fatal(err)
		}
	}
}

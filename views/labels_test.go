package views

import (
	"bytes"
	"errors"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"stillroom/inventory"
	"stillroom/planner"
)

// demoLabels are labels for the first bottles of the demonstration lab.
func demoLabels(t testing.TB, n int) []BottleLabel {
	t.Helper()
	shelf := inventory.NewShelf(inventory.DemoLab(inventory.NewDate(2026, 12, 1)))
	var labels []BottleLabel
	for _, b := range shelf.Bottles {
		f, ok := shelf.Form(b.FormID)
		if !ok || f.Measure == inventory.ByCount {
			continue
		}
		sub, _ := shelf.SubstanceByID(f.SubstanceID)
		labels = append(labels, BottleLabel{Bottle: b, Form: f, Substance: sub, Owner: "Marrow Lane standards bench", URL: "http://127.0.0.1:8087/bottles/" + b.Code})
		if len(labels) == n {
			break
		}
	}
	return labels
}

func printLabels(labels []BottleLabel) paperMaker {
	return func(_ *planner.Plan, o PaperOptions) ([]byte, error) { return BottleLabels(labels, o) }
}

func TestBottleLabelsReadBack(t *testing.T) {
	labels := demoLabels(t, 10)
	text := paperText(t, writePaper(t, printLabels(labels), nil, paperOptions()))
	for _, l := range labels {
		wantText(t, text, l.Bottle.Code, l.Form.Name)
		note := planner.HazardOf(l.Substance, l.Form, l.Bottle)
		if note.Signal != "" {
			wantText(t, text, note.Signal)
		}
	}
}

// A label that must say much is two wide and says all of it.
func TestBottleLabelsSayEverything(t *testing.T) {
	var labels []BottleLabel
	for _, l := range demoLabels(t, 200) {
		if !isSmall(l) {
			labels = append(labels, l)
		}
	}
	text := paperText(t, writePaper(t, printLabels(labels), nil, paperOptions()))
	for _, l := range labels {
		for _, s := range planner.HazardOf(l.Substance, l.Form, l.Bottle).Statements {
			code, _, _ := strings.Cut(s, " ")
			wantText(t, text, code)
		}
	}
	if strings.Contains(text, "more on the bottle's page") {
		t.Error("a full label leaves statements out")
	}
}

func TestBottleLabelsScan(t *testing.T) {
	zbar, pdftoppm := paperTool(t, "zbarimg"), paperTool(t, "pdftoppm")
	labels := demoLabels(t, 8)
	file := writePaper(t, printLabels(labels), nil, paperOptions())
	images := filepath.Join(filepath.Dir(file), "page")
	if out, err := exec.Command(pdftoppm, "-r", "200", "-png", file, images).CombinedOutput(); err != nil {
		t.Fatalf("pdftoppm: %v\n%s", err, out)
	}
	pages, _ := filepath.Glob(images + "*.png")
	out, _ := exec.Command(zbar, append([]string{"-q"}, pages...)...).Output()
	for _, l := range labels {
		for _, want := range []string{"CODE-128:" + l.Bottle.Code + "\n", "QR-Code:" + l.URL + "\n"} {
			if !strings.Contains(string(out), want) {
				t.Errorf("not read: %q", want)
			}
		}
	}
}

func TestBottleLabelsBytes(t *testing.T) {
	if _, err := BottleLabels(nil, paperOptions()); !errors.Is(err, ErrNoLabels) {
		t.Errorf("no labels: error %v, want ErrNoLabels", err)
	}
	first, err := BottleLabels(demoLabels(t, 9), paperOptions())
	if err != nil {
		t.Fatal(err)
	}
	if again, _ := BottleLabels(demoLabels(t, 9), paperOptions()); !bytes.Equal(first, again) {
		t.Error("the same labels give other bytes")
	}
}

// A bottle without a record says so, a small one keeps what the law keeps.
func TestBottleLabelNoData(t *testing.T) {
	l := BottleLabel{Bottle: inventory.Bottle{Code: inventory.MakeCode(inventory.BottleCode, 3), Size: 500e6},
		Form: inventory.StockForm{Name: "an invented powder", Measure: inventory.ByMass}, Substance: inventory.Substance{Name: "an invented powder"}}
	text := paperText(t, writePaper(t, printLabels([]BottleLabel{l}), nil, paperOptions()))
	wantText(t, text, "NO DATA: not assessed", "use by no data")
	l.Bottle.Size = 25e6
	wantText(t, paperText(t, writePaper(t, printLabels([]BottleLabel{l}), nil, paperOptions())), "Small container", "NO DATA")
}

// A hydrate has its own CAS number: 7789-12-0 for sodium dichromate dihydrate
// (CLP Annex VI names 7789-12-0 beside the anhydrous 10588-01-9). A hydrate
// without a record keeps the anhydrous number, and the label says so.
func TestBottleLabelCASOfHydrate(t *testing.T) {
	dichromate := inventory.Substance{Name: "sodium dichromate", CAS: "10588-01-9"}
	invented := inventory.Substance{Name: "an invented salt", CAS: "7647-14-5"}
	for _, tc := range []struct {
		substance inventory.Substance
		form      inventory.StockForm
		want      string
	}{
		{dichromate, inventory.StockForm{Name: "sodium dichromate dihydrate ≥ 99.5 %", HydrateWaters: 2}, "CAS 7789-12-0"},
		{dichromate, inventory.StockForm{Name: "sodium dichromate ≥ 99 %"}, "CAS 10588-01-9"},
		{invented, inventory.StockForm{Name: "an invented salt dihydrate", HydrateWaters: 2}, "CAS 7647-14-5 (anhydrous)"},
		{inventory.Substance{Name: "an invented powder"}, inventory.StockForm{Name: "an invented powder"}, ""},
	} {
		if got := casText(BottleLabel{Form: tc.form, Substance: tc.substance}); got != tc.want {
			t.Errorf("%s: %q, want %q", tc.form.Name, got, tc.want)
		}
	}
}

func TestBottleLabelsAreWhole(t *testing.T) {
	qpdf := paperTool(t, "qpdf")
	for _, letter := range []bool{false, true} {
		o := paperOptions()
		o.Letter = letter
		out, err := exec.Command(qpdf, "--check", writePaper(t, printLabels(demoLabels(t, 20)), nil, o)).CombinedOutput()
		if err != nil || !strings.Contains(string(out), "No syntax or stream encoding errors") {
			t.Errorf("letter %v: qpdf --check: %v\n%s", letter, err, out)
		}
	}
}

func TestLabelPage(t *testing.T) {
	s := newSampleServer(t)
	l := demoLabels(t, 1)[0]
	page := get(t, s, "/shelf/bottles/"+l.Bottle.Code)
	if !strings.Contains(page.Body.String(), "/shelf/bottles/"+l.Bottle.Code+"/label.pdf") {
		t.Error("the bottle's page has no link to its label")
	}
	label := get(t, s, "/shelf/bottles/"+l.Bottle.Code+"/label.pdf")
	if label.Code != 200 || label.Header().Get("Content-Type") != "application/pdf" || !bytes.HasPrefix(label.Body.Bytes(), []byte("%PDF-")) {
		t.Errorf("label = %d, %s", label.Code, label.Header().Get("Content-Type"))
	}
	if missing := get(t, s, "/shelf/bottles/B00000/label.pdf"); missing.Code != 404 {
		t.Errorf("label of no bottle = %d, want 404", missing.Code)
	}
}

package views

import (
	"strings"
	"testing"
)

// The papers carry what the address asks and say what they are.
func TestPapers(t *testing.T) {
	s := newSampleServer(t)
	for _, file := range []string{"pick-list.pdf", "hazard-sheet.pdf", "requisition.pdf"} {
		w := get(t, s, "/runs/1/"+file)
		if kind := w.Header().Get("Content-Type"); w.Code != 200 || kind != "application/pdf" || !strings.HasPrefix(w.Body.String(), "%PDF-") {
			t.Errorf("%s = %d, %s", file, w.Code, kind)
		}
		if name := w.Header().Get("Content-Disposition"); !strings.Contains(name, `"run 1 `+file+`"`) {
			t.Errorf("%s is called %q", file, name)
		}
	}
}

// A sheet that was printed asks whether it still holds.
func TestPrintedSheet(t *testing.T) {
	s := newSampleServer(t)
	current := parse(t, get(t, s, "/runs/1?printed=7f3a12bc"))
	if got := text(one(t, current, "p[role=status]")); !strings.HasSuffix(got, "is current.") {
		t.Errorf("the page says %q", got)
	}
	old := parse(t, get(t, s, "/runs/1?printed=00000000"))
	if got := text(one(t, old, "p[role=status]")); !strings.Contains(got, "no longer current") {
		t.Errorf("the page says %q", got)
	}
}

func TestChangingARun(t *testing.T) {
	s := newSampleServer(t)
	tests := []struct {
		name, address string
		fields        []string
		status        int
		says          string
	}{
		{"nobody named", "/runs/1", []string{"wanted", "60 g", "on", "14 Jan 2027"}, 422, "Say who does this."},
		{"kept", "/runs/1", []string{"wanted", "60 g", "on", "14 Jan 2027", "who", "Ines", "version", "1", "key", "a"}, 303, ""},
		{"from an old page", "/runs/1", []string{"wanted", "70 g", "on", "14 Jan 2027", "who", "Ines", "version", "1", "key", "b"}, 409, "changed by somebody else"},
		{"cleared", "/runs/1/stand", []string{"to", "cleared", "who", "Ines", "key", "c"}, 303, ""},
		{"not a step", "/runs/1/stand", []string{"to", "closed", "who", "Ines", "key", "d"}, 422, "step by step"},
		{"promised", "/runs/1/promise", []string{"who", "Ines", "key", "e"}, 303, ""},
		{"freed", "/runs/1/release", []string{"who", "Ines", "key", "f"}, 303, ""},
		{"no recipe", "/runs/new", []string{"recipe", "alchemy", "wanted", "1 g", "on", "14 Jan 2027", "who", "Ines"}, 422, "Choose one of the recipes."},
		{"no such run", "/runs/99", []string{"wanted", "60 g"}, 404, "no run"},
	}
	for _, tt := range tests {
		w := post(t, s, tt.address, tt.fields...)
		if w.Code != tt.status || !strings.Contains(w.Body.String(), tt.says) {
			t.Errorf("%s: %d, want %d saying %q", tt.name, w.Code, tt.status, tt.says)
		}
	}
	if got := text(one(t, parse(t, get(t, s, "/runs/1")), "h1")); got != "60 g pentanoic acid" {
		t.Errorf("the run is %q", got)
	}
}

func TestCountingABottle(t *testing.T) {
	s := newSampleServer(t)
	at := "/shelf/bottles/" + s.firstBottle(t)
	holds := func() string { return text(one(t, parse(t, get(t, s, at)), "dd b")) }
	before := holds()
	for _, amount := range []string{"", "a handful", "-3 mL", "900 L"} {
		if w := post(t, s, at+"/count", "amount", amount, "by", "weighed", "who", "Ines", "key", "k"+amount); w.Code != 422 {
			t.Errorf("counting %q = %d, want 422", amount, w.Code)
		}
	}
	if after := holds(); after != before {
		t.Errorf("a refused count changed %s to %s", before, after)
	}
	if w := post(t, s, at+"/count", "amount", "300 mL", "by", "level", "who", "Ines", "key", "k"); w.Code != 303 {
		t.Fatalf("counting = %d", w.Code)
	}
	if after := holds(); after != "300 mL" {
		t.Errorf("it holds %s, want 300 mL", after)
	}
}

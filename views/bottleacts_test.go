package views

import (
	"strings"
	"testing"

	"stillroom/inventory"
)

// bottleLike returns the first bottle of the demonstration lab that fits.
func (s *Server) bottleLike(t testing.TB, what string, fits func(inventory.Bottle, inventory.StockForm) bool) inventory.Bottle {
	t.Helper()
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	for _, b := range shelf.Bottles {
		if form, _ := shelf.Form(b.FormID); fits(b, form) {
			return b
		}
	}
	t.Fatalf("the demonstration lab has no bottle that is %s", what)
	return inventory.Bottle{}
}

func (s *Server) promisedBottle(t testing.TB) inventory.Bottle {
	return s.bottleLike(t, "open, by volume and promised", func(b inventory.Bottle, f inventory.StockForm) bool {
		return b.State == inventory.Opened && b.Promised > 0 && b.Promised < b.Content && f.Measure == inventory.ByVolume
	})
}

func holdsOf(t testing.TB, s *Server, code string) int64 {
	t.Helper()
	return s.bottleLike(t, code, func(b inventory.Bottle, _ inventory.StockForm) bool { return b.Code == code }).Content
}

// refusedBeside wants a form back: the status, the fault beside the field, and
// what was typed.
func refusedBeside(t *testing.T, s *Server, status int, field, says, address string, fields ...string) {
	t.Helper()
	w := post(t, s, address, fields...)
	doc := parse(t, w)
	if w.Code != status || len(all(doc, "#"+field+"-fault")) != 1 {
		t.Errorf("POST %s %q = %d, want %d with a fault beside %s", address, fields, w.Code, status, field)
		return
	}
	if got := text(one(t, doc, "#"+field+"-fault")); !strings.Contains(got, says) {
		t.Errorf("POST %s %q: beside %s stands %q, want %q in it", address, fields, field, got, says)
	}
	typed := map[string]string{}
	for i := 0; i+1 < len(fields); i += 2 {
		typed[fields[i]] = fields[i+1]
	}
	form, _, _ := strings.Cut(field, "-")
	for name, value := range typed {
		for _, n := range all(doc, "input#"+form+"-"+name) {
			if kept, _ := attribute(n, "value"); kept != value && name != "sure" {
				t.Errorf("POST %s: %s came back as %q, want %q", address, name, kept, value)
			}
		}
	}
}

// refusedAtHead wants a page back that has no such form any more: what is wrong
// stands at its head and leads nowhere.
func refusedAtHead(t *testing.T, s *Server, status int, says, address string, fields ...string) {
	t.Helper()
	w := post(t, s, address, fields...)
	doc := parse(t, w)
	if got := text(one(t, doc, ".faults")); w.Code != status || !strings.Contains(got, says) || len(all(doc, ".faults a")) > 0 {
		t.Errorf("POST %s %q = %d saying %q, want %d saying %q", address, fields, w.Code, got, status, says)
	}
}

func mustGoTo(t *testing.T, s *Server, to, address string, fields ...string) {
	t.Helper()
	w := post(t, s, address, fields...)
	if got := w.Header().Get("Location"); w.Code != 303 || got != to {
		t.Fatalf("POST %s %q = %d to %q, want 303 to %q; %s", address, fields, w.Code, got, to, text(parse(t, w))[:min(400, len(text(parse(t, w))))])
	}
}

func TestDrawAndTakeBack(t *testing.T) {
	s := newSampleServer(t)
	b := s.promisedBottle(t)
	at := bottleAddress(b.Code)
	for _, tt := range []struct{ name, amount, field, says string }{
		{"nothing typed", "", "draw-amount", "Say how much"},
		{"no unit", "25", "draw-amount", "unit"},
		{"a date", "1,234 mL", "draw-amount", "1,234"},
		{"below nothing", "-3 mL", "draw-amount", ""},
		{"nothing", "0 mL", "draw-amount", "more than 0"},
		{"more than it holds", "90 L", "draw-amount", "it holds"},
	} {
		refusedBeside(t, s, 422, tt.field, tt.says, at+"/draw", "amount", tt.amount, "why", "a rinse", "who", "Ines", "key", tt.name)
	}
	refusedBeside(t, s, 422, "draw-why", "Say why", at+"/draw", "amount", "1 mL", "who", "Ines")
	refusedBeside(t, s, 422, "draw-who", "Say who", at+"/draw", "amount", "1 mL", "why", "a rinse")
	refusedBeside(t, s, 422, "draw-run", "isn’t over", at+"/draw", "amount", "1 mL", "run", "6", "who", "Ines")
	if got := holdsOf(t, s, b.Code); got != b.Content {
		t.Fatalf("refused draws changed %d to %d", b.Content, got)
	}

	mustGoTo(t, s, at+"#h-ledger", at+"/draw", "amount", "25 mL", "why", "a rinse", "who", "Ines", "key", "k1")
	mustGoTo(t, s, at+"#h-ledger", at+"/draw", "amount", "25 mL", "why", "a rinse", "who", "Ines", "key", "k1")
	if got := holdsOf(t, s, b.Code); got != b.Content-25_000 {
		t.Fatalf("25 mL drawn, sent twice: %d µL left of %d", got, b.Content)
	}
	entry, _ := attribute(one(t, parse(t, get(t, s, at)), "input[name=entry]"), "value")
	refusedBeside(t, s, 422, "back-why", "Say why", at+"/back", "entry", entry, "who", "Ines")
	refusedBeside(t, s, 422, "back-why", "isn’t in this bottle’s ledger", at+"/back", "entry", "999999", "why", "slip", "who", "Ines")
	mustGoTo(t, s, at+"#h-ledger", at+"/back", "entry", entry, "why", "wrong bottle", "who", "Ines", "key", "k2")
	mustGoTo(t, s, at+"#h-ledger", at+"/back", "entry", entry, "why", "wrong bottle", "who", "Ines", "key", "k2")
	if got := holdsOf(t, s, b.Code); got != b.Content {
		t.Errorf("taken back, sent twice: %d µL, want %d", got, b.Content)
	}
	refusedAtHead(t, s, 409, "taken back before", at+"/back", "entry", entry, "why", "once more", "who", "Ines", "key", "k3")
}

// What is promised to another run isn't drawn, and the page names that run and
// whose it is; the run itself may have it.
func TestDrawNamesTheOtherRun(t *testing.T) {
	s := newSampleServer(t)
	b := s.promisedBottle(t)
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	mark := shelf.EarmarksOn(b.ID)[0]
	run, _ := shelf.Run(mark.RunID)
	whole := strings.ReplaceAll(stored(b.Content, inventory.ByVolume), narrow, " ")
	at := bottleAddress(b.Code)
	for _, says := range []string{"run " + forRun(run.ID)[len("for run "):], run.Recipe, mark.Owner} {
		refusedBeside(t, s, 409, "draw-amount", says, at+"/draw", "amount", whole, "why", "a rinse", "who", "Rut", "key", says)
	}
	mustGoTo(t, s, at+"#h-ledger", at+"/draw", "amount", whole, "run", forRun(run.ID)[len("for run "):], "who", "Rut", "key", "own")
}

// What a count leaves too little for is said on the page that follows.
func TestCutPromisesAreSaid(t *testing.T) {
	s := newSampleServer(t)
	b := s.promisedBottle(t)
	at := bottleAddress(b.Code)
	w := post(t, s, at+"/count", "amount", "1 mL", "by", "level", "who", "Ines", "key", "k")
	to := w.Header().Get("Location")
	if w.Code != 303 || !strings.HasPrefix(to, at+"?cut=") {
		t.Fatalf("counting = %d to %q", w.Code, to)
	}
	if got := text(one(t, parse(t, get(t, s, to)), "p[role=status]")); !strings.Contains(got, "had of it was cut: tell ") {
		t.Errorf("the page says %q", got)
	}
	if n := len(all(parse(t, get(t, s, at+"?cut=77+x+%3Cb%3E")), "p[role=status]")); n != 0 {
		t.Error("runs that aren't there were said to be cut")
	}
}

func TestWeighOutAndIn(t *testing.T) {
	s := newSampleServer(t)
	b := s.bottleLike(t, "weighable", func(b inventory.Bottle, f inventory.StockForm) bool {
		return b.State == inventory.Opened && f.Measure == inventory.ByMass && b.TareUG > 0 && b.Promised == 0 && b.Content > 10e6
	})
	at := bottleAddress(b.Code)
	gross := func(ug int64) string {
		return strings.ReplaceAll(trimmed(float64(b.TareUG+ug)/1e6, 12), narrow, " ") + " g"
	}
	refusedBeside(t, s, 422, "out-gross", "what the balance shows", at+"/weigh-out", "who", "Ines")
	refusedBeside(t, s, 422, "out-gross", "less than its tare", at+"/weigh-out", "gross", "1 g", "who", "Ines")
	mustGoTo(t, s, at+"#h-weigh", at+"/weigh-out", "gross", gross(b.Content-1e6), "who", "Ines")
	if got := holdsOf(t, s, b.Code); got != b.Content-1e6 {
		t.Errorf("weighed a gram lighter, the ledger says %d µg, want %d", got, b.Content-1e6)
	}
	refusedBeside(t, s, 422, "in-gross", "it went out with", at+"/weigh-in", "gross", gross(b.Content), "who", "Ines")
	mustGoTo(t, s, at+"#h-ledger", at+"/weigh-in", "gross", gross(b.Content-6e6), "who", "Ines", "key", "in")
	if got := holdsOf(t, s, b.Code); got != b.Content-6e6 {
		t.Errorf("5 g less on the balance, the ledger says %d µg, want %d", got, b.Content-6e6)
	}
	refusedAtHead(t, s, 404, "weigh the bottle before", at+"/weigh-in", "gross", "1 g", "who", "Ines", "key", "again")
}

func TestForgettingAWeighOut(t *testing.T) {
	s := newSampleServer(t)
	at := bottleAddress(s.promisedBottle(t).Code)
	mustGoTo(t, s, at+"#h-weigh", at+"/weigh-out", "gross", "900 g", "who", "Ines")
	if n := len(all(parse(t, get(t, s, at)), "#in-gross")); n != 1 {
		t.Fatal("a bottle that is out can't be weighed in")
	}
	mustGoTo(t, s, at+"#h-weigh", at+"/weigh-forget", "who", "Ines")
	if n := len(all(parse(t, get(t, s, at)), "#in-gross")); n != 0 {
		t.Error("it is still out")
	}
}

func TestStatesOfABottle(t *testing.T) {
	s := newSampleServer(t)
	b := s.promisedBottle(t)
	at := bottleAddress(b.Code)
	stands := func() inventory.BottleState {
		return s.bottleLike(t, b.Code, func(x inventory.Bottle, _ inventory.StockForm) bool { return x.Code == b.Code }).State
	}
	refusedBeside(t, s, 422, "stands-to", "choose one of the list", at+"/state", "to", "sealed", "why", "x", "who", "Ines")
	refusedBeside(t, s, 422, "stands-why", "Say why", at+"/state", "to", "missing", "who", "Ines")
	for _, to := range []string{"missing", "open", "quarantined"} {
		mustGoTo(t, s, at+"#h-life", at+"/state", "to", to, "why", "<i>looked</i> for it", "who", "Ines & Rut")
		if got := stands(); string(got) != to {
			t.Errorf("it is %s, want %s", got, to)
		}
	}
	page := get(t, s, at)
	if strings.Contains(page.Body.String(), "<i>looked") {
		t.Error("a reason isn't escaped")
	}
	if first := text(all(parse(t, page), "section[aria-labelledby=h-life] tbody tr")[0]); !strings.Contains(first, "from open to quarantined <i>looked</i> for it Ines & Rut") {
		t.Errorf("the newest line of what was done is %q", first)
	}
	refusedBeside(t, s, 422, "discard-sure", "can’t be taken back", at+"/discard", "why", "spoilt", "who", "Ines")
	w := post(t, s, at+"/discard", "sure", "1", "why", "spoilt", "who", "Ines")
	if to := w.Header().Get("Location"); w.Code != 303 || !strings.HasPrefix(to, at+"?cut=") {
		t.Errorf("discarding what was promised = %d to %q, want the run named", w.Code, to)
	}
	if got := stands(); got != inventory.Discarded || holdsOf(t, s, b.Code) != 0 {
		t.Errorf("discarded, it is %s", got)
	}
}

func TestMoveAndPeroxideTest(t *testing.T) {
	s := newSampleServer(t)
	// Opened half a year ago and never tested: the interval counts from the opening.
	ether := s.bottleLike(t, "a peroxide former never tested", func(b inventory.Bottle, f inventory.StockForm) bool {
		return f.PeroxideTestDays == 180 && f.StorageClass == "flammable liquid" && !b.PeroxideTested.Set() && b.Opened.Set() && b.Opened.AddDays(180) < sampleToday
	})
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	place := func(fits func(inventory.Place) bool) string {
		for _, p := range shelf.Places {
			if p.ID != ether.PlaceID && fits(p) {
				return trimmed(float64(p.ID), 9)
			}
		}
		t.Fatal("no such place")
		return ""
	}
	at := bottleAddress(ether.Code)
	own := func(p inventory.Place) bool { return p.StoreID == ether.StoreID }
	oxidisers := place(func(p inventory.Place) bool { return own(p) && p.StorageClass == "oxidiser" })
	annex := place(func(p inventory.Place) bool { return !own(p) && p.StorageClass == "flammable liquid" })
	flammables := place(func(p inventory.Place) bool { return own(p) && p.StorageClass == "flammable liquid" })

	refusedBeside(t, s, 422, "move-place", "Choose a place", at+"/move", "why", "tidied", "who", "Ines")
	refusedBeside(t, s, 422, "move-place", "is for oxidiser; this bottle is flammable liquid", at+"/move", "place", oxidisers, "why", "tidied", "who", "Ines")
	refusedBeside(t, s, 422, "move-place", "another store", at+"/move", "place", annex, "why", "tidied", "who", "Ines")
	mustGoTo(t, s, at+"#h-life", at+"/move", "place", flammables, "why", "tidied", "who", "Ines")
	mustGoTo(t, s, at+"#h-life", at+"/move", "place", oxidisers, "despite", "1", "why", "while the cabinet is cleaned", "who", "Ines")

	cautions := func() string {
		var texts []string
		for _, n := range all(parse(t, get(t, s, at)), "section[aria-labelledby=h-draw] li.warning") {
			texts = append(texts, text(n))
		}
		return strings.Join(texts, " ")
	}
	due := ether.Opened.AddDays(180)
	if got := cautions(); !strings.Contains(got, "due since "+due.Short()) {
		t.Errorf("before a test the page cautions %q, want that one is due since %s", got, due.Short())
	}
	mustGoTo(t, s, at+"#h-life", at+"/peroxide", "ppm", "100", "who", "Ines")
	if got := cautions(); !strings.Contains(got, "found 100") || strings.Contains(got, "due since") {
		t.Errorf("after a test at the limit the page cautions %q", got)
	}
	refusedBeside(t, s, 422, "peroxide-ppm", "what the strip shows", at+"/peroxide", "ppm", "some", "who", "Ines")
	refusedBeside(t, s, 422, "peroxide-ppm", "0 or more", at+"/peroxide", "ppm", "-1", "who", "Ines")
	mustGoTo(t, s, at+"#h-life", at+"/peroxide", "ppm", "2.5 ppm", "who", "Ines")
	now := s.bottleLike(t, "the ether", func(b inventory.Bottle, _ inventory.StockForm) bool { return b.ID == ether.ID })
	if now.PeroxidePPM != 2.5 || now.PeroxideTested != sampleToday {
		t.Errorf("the test stands as %v ppm on %s", now.PeroxidePPM, now.PeroxideTested)
	}
	rows := all(parse(t, get(t, s, at)), "section[aria-labelledby=h-life] tbody tr")
	if len(rows) < 3 || !strings.Contains(text(rows[0])+text(rows[1])+text(rows[2]), "while the cabinet is cleaned") {
		t.Error("the move isn't among what was done")
	}
}

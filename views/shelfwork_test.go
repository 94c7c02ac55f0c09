package views

import (
	"math"
	"strings"
	"testing"

	"stillroom/inventory"
)

// madeBottles takes the codes of bottles that were taken in out of the address
// one goes on to, and returns the bottles.
func madeBottles(t *testing.T, s *Server, address string, fields ...string) []inventory.Bottle {
	t.Helper()
	w := post(t, s, address, fields...)
	codes, ok := strings.CutPrefix(w.Header().Get("Location"), "/shelf/receive?made=")
	if w.Code != 303 || !ok {
		t.Fatalf("POST %s %q = %d to %q", address, fields, w.Code, w.Header().Get("Location"))
	}
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	var bottles []inventory.Bottle
	for _, code := range strings.Split(codes, "+") {
		b, ok := shelf.BottleByCode(code)
		if !ok {
			t.Fatalf("no bottle %q", code)
		}
		bottles = append(bottles, b)
	}
	page := parse(t, get(t, s, w.Header().Get("Location")))
	if got := text(one(t, page, "div[role=status]")); !strings.Contains(got, bottles[0].Code) {
		t.Errorf("the page that follows says %q", got)
	}
	return bottles
}

func TestTakingABottleIn(t *testing.T) {
	s := newSampleServer(t)
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	var form inventory.StockForm
	for _, f := range shelf.Forms {
		if f.Measure == inventory.ByVolume && f.DensityGML > 0 && f.StorageClass == "flammable liquid" {
			form = f
		}
	}
	place := func(class string) string {
		for _, p := range shelf.Places {
			if p.StorageClass == class {
				return trimmed(float64(p.ID), 9)
			}
		}
		t.Fatalf("no place for %s", class)
		return ""
	}
	id := trimmed(float64(form.ID), 9)
	// whole is a form without a fault; the fields after it replace its own.
	whole := func(more ...string) []string {
		return append([]string{"form", id, "size", "1 L", "place", place("flammable liquid"), "lot", "L27<b>", "assay", "99.4 %", "expiry", "2028-02", "who", "Ines", "key", "a"}, more...)
	}
	for _, tt := range []struct{ field, typed, says string }{
		{"size", "", "Say how much"},
		{"size", "0 L", "more than nothing"},
		{"size", "two litres", ""},
		{"place", "", "Choose a place"},
		{"place", place("oxidiser"), "is for oxidiser"},
		{"assay", "140 %", ""},
		{"assay", "0 %", "no assay"},
		{"expiry", "03/04/2028", "read in two ways"},
		{"gross", "1 g", "less than its content"},
		{"who", "", "Say who"},
	} {
		refusedBeside(t, s, 422, "new-"+tt.field, tt.says, "/shelf/receive", whole(tt.field, tt.typed)...)
	}
	// 1 L at the density of the form and a bottle of 500 g.
	gross := trimmed(form.DensityGML*1000+500, 12) + " g"
	b := madeBottles(t, s, "/shelf/receive", whole("gross", gross)...)[0]
	again := madeBottles(t, s, "/shelf/receive", whole("gross", gross)...)[0]
	if again.ID != b.ID {
		t.Errorf("sent twice, it is bottles %s and %s", b.Code, again.Code)
	}
	if b.State != inventory.Sealed || b.Size != 1e6 || b.Content != 1e6 || math.Abs(b.LotAssay-.994) > 1e-12 || b.Received != sampleToday {
		t.Errorf("taken in as %+v", b)
	}
	if want := inventory.NewDate(2028, 2, 29); b.Expiry != want { // 2028 is a leap year
		t.Errorf("good until %s, want %s", b.Expiry, want)
	}
	if diff := b.TareUG - 500e6; diff < -1000 || diff > 1000 {
		t.Errorf("tare %d µg, want 500 g", b.TareUG)
	}
	if strings.Contains(get(t, s, bottleAddress(b.Code)).Body.String(), "L27<b>") {
		t.Error("a lot isn't escaped")
	}
}

func TestTakingAnOrderIn(t *testing.T) {
	s := newSampleServer(t)
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	var order inventory.Order
	for _, o := range shelf.Orders {
		if o.State == inventory.OrderUnderWay && o.Packs > 1 {
			order = o
		}
	}
	form, _ := shelf.Form(order.FormID)
	fields := []string{"order", trimmed(float64(order.ID), 9), "lot", "L28", "who", "Ines"}
	refusedBeside(t, s, 422, "new-place", "Choose a place", "/shelf/receive", fields...)
	for _, p := range shelf.Places {
		if p.StorageClass == form.StorageClass {
			fields = append(fields, "place", trimmed(float64(p.ID), 9))
			break
		}
	}
	bottles := madeBottles(t, s, "/shelf/receive", fields...)
	if int64(len(bottles)) != order.Packs {
		t.Errorf("%d bottles of %d packs", len(bottles), order.Packs)
	}
	if w := post(t, s, "/shelf/receive", fields...); w.Code != 404 {
		t.Errorf("the order taken in once more = %d, want 404", w.Code)
	}
	if shelf, _ = s.Lab.Load(t.Context()); len(ordersUnderWay(shelf, sampleToday)) == 0 {
		t.Error("the other order is gone as well")
	}
	for _, o := range shelf.OrdersOf(order.FormID) {
		if o.ID == order.ID && o.State != inventory.OrderReceived {
			t.Errorf("the order is %s", o.State)
		}
	}
}

func TestStockTakeFromTheList(t *testing.T) {
	s := newSampleServer(t)
	doc := parse(t, get(t, s, "/shelf/stock-take?who=Ines"))
	rows := all(doc, "tbody tr")
	if len(rows) < 2 {
		t.Fatalf("%d bottles on the list", len(rows))
	}
	for i, row := range rows {
		cells := all(row, "td")
		if rank := text(cells[0]); rank != trimmed(float64(i+1), 9) {
			t.Errorf("line %d has rank %s", i+1, rank)
		}
		if text(cells[len(cells)-1]) == "" {
			t.Errorf("line %d has no reason", i+1)
		}
	}
	if walk := parse(t, get(t, s, "/shelf/stock-take?by=walk")); len(all(walk, "tbody tr")) != len(rows) {
		t.Error("the other order has another number of bottles")
	}
	link := all(rows[0], "a")[0]
	code, to := text(link), ""
	to, _ = attribute(link, "href")
	if want := "/shelf/stock-take/" + code + "?who=Ines"; to != want {
		t.Fatalf("the first line leads to %q, want %q", to, want)
	}
	if w := get(t, s, "/shelf/stock-take?who=Ines&scan="+strings.ToLower(code)); w.Code != 303 || w.Header().Get("Location") != to {
		t.Errorf("scanning %s = %d to %q", code, w.Code, w.Header().Get("Location"))
	}
	if who, _ := attribute(one(t, parse(t, get(t, s, to)), "#take-who"), "value"); who != "Ines" {
		t.Errorf("the form asks again who counts; it says %q", who)
	}
	at := "/shelf/stock-take/" + code
	refusedBeside(t, s, 422, "take-amount", "Say how much", at, "who", "Ines", "by", "level", "do", "count")
	refusedBeside(t, s, 422, "take-amount", "check the amount", at, "amount", "900 kg", "who", "Ines", "by", "level", "do", "count")
	refusedBeside(t, s, 422, "take-who", "Say who", at, "amount", "1 g", "by", "level", "do", "count")
	w := post(t, s, at, "amount", "1 g", "by", "weighed", "who", "Ines", "do", "count", "order", "walk", "key", "k")
	to = w.Header().Get("Location")
	if w.Code != 303 || !strings.HasPrefix(to, "/shelf/stock-take?by=walk") || !strings.Contains(to, "done="+code) || !strings.HasSuffix(to, "who=Ines") {
		t.Fatalf("counting = %d to %q", w.Code, to)
	}
	after := parse(t, get(t, s, to))
	if got := text(one(t, after, "p[role=status]")); !strings.Contains(got, code) || !strings.Contains(got, "the ledger had") {
		t.Errorf("the list says %q", got)
	}
	for _, row := range all(after, "tbody tr") {
		if strings.Contains(text(row), code) {
			t.Error("what was counted is still on the list")
		}
	}
}

// A bottle that isn't there is noted as missing, and for a regulated one the
// page says that a loss may have to be reported.
func TestStockTakeFindsNothing(t *testing.T) {
	s := newSampleServer(t)
	regulated := s.bottleLike(t, "sulfuric acid", func(b inventory.Bottle, f inventory.StockForm) bool {
		return b.State == inventory.Opened && strings.HasPrefix(f.Name, "sulfuric acid 9")
	})
	w := post(t, s, "/shelf/stock-take/"+regulated.Code, "who", "Ines", "do", "missing")
	if w.Code != 303 {
		t.Fatalf("noting it as missing = %d", w.Code)
	}
	got := text(one(t, parse(t, get(t, s, w.Header().Get("Location"))), "p[role=status]"))
	if !strings.Contains(got, "stands as missing now") || !strings.Contains(got, "local law decides") {
		t.Errorf("the list says %q", got)
	}
}

func TestScannedCodes(t *testing.T) {
	s := newSampleServer(t)
	carboy := inventory.MakeCode(inventory.CarboyCode, 1)
	if w := get(t, s, "/shelf/stock-take?scan="+carboy); w.Header().Get("Location") != "/waste/"+carboy {
		t.Errorf("the code of a carboy leads to %q", w.Header().Get("Location"))
	}
	for scan, says := range map[string]string{
		inventory.MakeCode(inventory.PlaceCode, 1):       "code of a place",
		inventory.MakeCode(inventory.BottleCode, 900000): "no bottle has it",
		"<script>": "codes start with",
	} {
		w := get(t, s, "/shelf/stock-take?scan="+scan)
		if got := text(one(t, parse(t, w), "#take-scan-fault")); w.Code != 422 || !strings.Contains(got, says) {
			t.Errorf("scanning %q = %d, %q", scan, w.Code, got)
		}
		if strings.Contains(w.Body.String(), "<script>") {
			t.Error("what was scanned isn't escaped")
		}
	}
}

func TestPouringAndPickUp(t *testing.T) {
	s := newSampleServer(t)
	carboy := func() inventory.Carboy {
		shelf, err := s.Lab.Load(t.Context())
		if err != nil {
			t.Fatal(err)
		}
		for _, c := range shelf.Carboys {
			if strings.HasPrefix(c.Stream, "non-halogenated") {
				return c
			}
		}
		t.Fatal("no carboy for non-halogenated solvent")
		return inventory.Carboy{}
	}
	before := carboy()
	at := carboyAddress(before.Code)
	for _, tt := range []struct{ volume, parts, why, who, field, says string }{
		{"", "ethyl acetate", "run 6", "Ines", "pour-volume", "Say how much goes in"},
		{"0 mL", "ethyl acetate", "run 6", "Ines", "pour-volume", "more than nothing"},
		{"20 kg", "ethyl acetate", "run 6", "Ines", "pour-volume", ""},
		{"900 L", "ethyl acetate", "run 6", "Ines", "pour-volume", "room is left for"},
		{"20 mL", "", "run 6", "Ines", "pour-parts", "unknown content"},
		{"20 mL", "ethyl acetate: 60 %; water: 30 %", "run 6", "Ines", "pour-parts", "come to 90"},
		{"20 mL", "ethyl acetate: much; water", "run 6", "Ines", "pour-parts", "is no part"},
		{"20 mL", "ethyl acetate", "", "Ines", "pour-why", "Say why"},
		{"20 mL", "ethyl acetate", "run 6", "", "pour-who", "Say who"},
		{"20 mL", "potassium permanganate", "run 6", "Ines", "pour-volume", "must not meet"},
	} {
		refusedBeside(t, s, 422, tt.field, tt.says, at+"/pour", "volume", tt.volume, "parts", tt.parts, "why", tt.why, "who", tt.who, "key", tt.says)
	}
	if now := carboy(); now != before {
		t.Fatalf("refused pourings changed %+v to %+v", before, now)
	}
	for range 2 { // sent twice, poured once
		mustGoTo(t, s, at, at+"/pour", "volume", "20 mL", "parts", "ethyl acetate: 90 %; water: 10 %", "why", "washings <u>", "who", "Ines", "key", "k")
	}
	if now := carboy(); now.ContentUL != before.ContentUL+20_000 {
		t.Errorf("20 mL poured: %d µL after %d", now.ContentUL, before.ContentUL)
	}
	page := get(t, s, at)
	if first := text(all(parse(t, page), "section[aria-labelledby=h-life] tbody tr")[0]); !strings.Contains(first, "washings <u> Ines") || strings.Contains(page.Body.String(), "<u>") {
		t.Errorf("the newest line of what was done is %q", first)
	}
	oxidiser := []string{"volume", "1 mL", "parts", "potassium permanganate", "why", "a trace", "who", "Ines", "key", "o"}
	if w := post(t, s, at+"/pour", oxidiser...); w.Code != 422 || len(all(parse(t, w), "#pour-leave")) != 1 {
		t.Errorf("an oxidiser into solvent = %d, want 422 and who may let it in asked", w.Code)
	}
	mustGoTo(t, s, at, at+"/pour", append(oxidiser, "leave", "Rut")...)
	after := parse(t, get(t, s, at))
	if first := text(all(after, "section[aria-labelledby=h-life] tbody tr")[0]); !strings.Contains(first, "a trace; let in by Rut") {
		t.Errorf("let in, the newest line is %q", first)
	}
	if n := len(all(after, "li.warning")); n == 0 {
		t.Error("the page doesn't say what is together in the carboy")
	}
	refusedBeside(t, s, 422, "collect-sure", "can’t be taken back", at+"/collect", "why", "paper 12", "who", "Ines")
	mustGoTo(t, s, at, at+"/collect", "sure", "1", "why", "paper 12", "who", "Ines")
	if now := carboy(); now.ContentUL != 0 || now.Contains != "" {
		t.Errorf("picked up, it holds %d µL of %q", now.ContentUL, now.Contains)
	}
}

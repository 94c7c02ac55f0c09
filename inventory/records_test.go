package inventory

import (
	"context"
	"errors"
	"slices"
	"strings"
	"testing"
)

func TestPour(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		shelf, _ := s.Load(ctx)
		carboy := func(stream string) Carboy {
			for _, c := range shelf.Carboys {
				if c.Stream == stream {
					return c
				}
			}
			t.Fatalf("no carboy for %s", stream)
			return Carboy{}
		}
		full := carboy("chromium(III) aqueous after reduction") // 7.2 of 10 L, limit 75 %
		water := []Part{{"water", 1}}
		if _, err := s.Pour(ctx, Pouring{Carboy: full.Code, VolumeUL: mL(301), Parts: water}, clerk); !errors.Is(err, ErrInsufficient) {
			t.Errorf("over the fill limit: %v", err)
		}
		got, err := s.Pour(ctx, Pouring{Carboy: full.Code, VolumeUL: mL(300), Parts: water}, Act{By: "x", Key: "p"})
		if err != nil || got.FreeUL() != 0 {
			t.Errorf("up to the limit: %+v, %v", got, err)
		}
		if got, err = s.Pour(ctx, Pouring{Carboy: full.Code, VolumeUL: mL(300), Parts: water}, Act{By: "x", Key: "p"}); err != nil || got.ContentUL != mL(7500) {
			t.Errorf("the same request again: %+v, %v", got, err)
		}
		parts, err := got.Parts()
		sum := 0.0
		for _, p := range parts {
			sum += p.Share
		}
		// 0.88 · 7.2 L + 0.3 L of 7.5 L is 88.48 %.
		if err != nil || sum < .999999 || sum > 1.000001 || !strings.HasPrefix(got.Contains, "water: 88.48 %") {
			t.Errorf("contains %q, sum %v, %v", got.Contains, sum, err)
		}
		// An oxidising acid on solvents: EPA-600/2-80-076, groups 2 and 4.
		solvents := carboy("non-halogenated organic")
		nitric := Pouring{Carboy: solvents.Code, VolumeUL: mL(10), Parts: []Part{{"nitric acid", 1}}}
		if _, err := s.Pour(ctx, nitric, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("nitric acid into solvents: %v", err)
		}
		if _, err := s.Pour(ctx, Pouring{Carboy: solvents.Code, VolumeUL: mL(10), Parts: []Part{{"acetone", .5}}}, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("half of nothing said: %v", err)
		}
		if err := s.Collect(ctx, full.Code, clerk); err != nil {
			t.Fatal(err)
		}
		shelf, _ = s.Load(ctx)
		if after := carboy(full.Stream); after.ContentUL != 0 || after.Contains != "" {
			t.Errorf("after collection: %+v", after)
		}
	})
}

func TestMergeSubstances(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		table, err := ReadTable("m.csv", strings.NewReader("name,amount\nStench acid,1 L\n"))
		if err != nil {
			t.Fatal(err)
		}
		if _, err := s.Import(ctx, table, Match(table), ImportOptions{Act: clerk}); err != nil {
			t.Fatal(err)
		}
		shelf, _ := s.Load(ctx)
		from, _ := shelf.Substance("stench acid")
		into, _ := shelf.Substance("pentanoic acid")
		other, _ := shelf.Substance("hexanoic acid")
		if _, err := s.MergeSubstances(ctx, other.ID, into.ID, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("different numbers: %v", err)
		}
		if _, err := s.MergeSubstances(ctx, from.ID, into.ID, clerk); err != nil {
			t.Fatal(err)
		}
		shelf, _ = s.Load(ctx)
		found, ok := shelf.Substance("stench acid")
		if !ok || found.ID != into.ID || len(shelf.FormsOf(into.ID)) != 2 {
			t.Errorf("after the merge: %+v with %d forms", found, len(shelf.FormsOf(into.ID)))
		}
		mustCheck(t, s)
	})
}

func TestMergeBottles(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		kept := open1(t, s, "1-pentanol open") // 310 mL, 60 for run 3
		gone, err := s.Receive(ctx, Bottle{FormID: kept.FormID, PlaceID: kept.PlaceID, Size: mL(1000), Content: mL(400)}, clerk)
		if err != nil {
			t.Fatal(err)
		}
		for run, amount := range map[int64]int64{1: mL(200), 3: mL(100)} {
			if _, err := s.Earmark(ctx, run, Want{Bottle: gone.Code, Amount: amount}, clerk); err != nil {
				t.Fatal(err)
			}
		}
		cut, err := s.MergeBottles(ctx, gone.Code, kept.Code, clerk)
		if err != nil {
			t.Fatal(err)
		}
		var lost int64
		for _, p := range cut {
			lost += p.Amount
		}
		after, _ := s.Bottle(ctx, kept.Code)
		// 60 + 200 + 100 are promised of 310 mL: 50 don't fit.
		if lost != mL(50) || after.Promised != mL(310) || after.Content != mL(310) {
			t.Errorf("cut %+v, kept %+v", cut, after)
		}
		old, err := s.Bottle(ctx, gone.Code)
		if err != nil || old.MergedInto != kept.ID || old.State != Discarded || old.Content != 0 {
			t.Errorf("the other record: %+v, %v", old, err)
		}
		if _, err := s.Draw(ctx, Taking{gone.Code, 1, 0}, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("a draw from the other record: %v", err)
		}
		mustCheck(t, s)
	})
}

func TestOrders(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		o, err := s.PlaceOrder(ctx, 26, 3, 0, 0, Act{By: "x", Key: "o1"})
		if err != nil || o.Due < demoDay.AddDays(1) {
			t.Fatalf("PlaceOrder: %+v, %v", o, err)
		}
		if again, err := s.PlaceOrder(ctx, 26, 3, 0, 0, Act{By: "x", Key: "o1"}); err != nil || again.ID != o.ID {
			t.Errorf("the same request again: %+v, %v", again, err)
		}
		bottles, err := s.ReceiveOrder(ctx, o.ID, Bottle{PlaceID: 5, Lot: "L1"}, clerk)
		if err != nil || len(bottles) != 3 || bottles[0].State != Sealed || bottles[0].Content == 0 || bottles[0].Code == bottles[1].Code {
			t.Fatalf("ReceiveOrder: %+v, %v", bottles, err)
		}
		if _, err := s.ReceiveOrder(ctx, o.ID, Bottle{PlaceID: 5}, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("received twice: %v", err)
		}
		if err := s.CancelOrder(ctx, o.ID, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("cancelled after receipt: %v", err)
		}
		mustCheck(t, s)
	})
}

func TestAddRecords(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		sub, err := s.AddSubstance(ctx, Substance{CAS: "108-24-7"}, clerk)
		if err != nil || sub.Name != "acetic anhydride" || sub.Formula == "" || sub.Own {
			t.Fatalf("AddSubstance: %+v, %v", sub, err)
		}
		if _, err := s.AddSubstance(ctx, Substance{CAS: "108-24-7"}, clerk); !errors.Is(err, ErrDuplicate) {
			t.Errorf("the same again: %v", err)
		}
		if _, err := s.AddSubstance(ctx, Substance{Name: "acetone", CAS: "108-24-8"}, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("a slip in the number: %v", err)
		}
		form, err := s.AddForm(ctx, StockForm{SubstanceID: sub.ID, Name: "acetic anhydride ≥ 99 %", Measure: ByVolume, AssayLow: .99, AssayHigh: 1}, clerk)
		if err != nil {
			t.Fatal(err)
		}
		for _, bad := range []StockForm{{Name: "x"}, {Name: "x", Measure: ByMass, AssayLow: .9, AssayHigh: .8}, {Name: "x", Measure: ByMass, DensityGML: 1}} {
			bad.SubstanceID = sub.ID
			if _, err := s.AddForm(ctx, bad, clerk); !errors.Is(err, ErrInvalid) {
				t.Errorf("AddForm(%+v): %v", bad, err)
			}
		}
		place, err := s.AddPlace(ctx, Place{Store: "Third store", Cabinet: "Acids"}, clerk)
		if err != nil || place.StoreID != 3 || place.Walk <= 210 {
			t.Fatalf("AddPlace: %+v, %v", place, err)
		}
		b, err := s.Receive(ctx, Bottle{FormID: form.ID, PlaceID: place.ID, Size: mL(500), Content: mL(500)}, clerk)
		if err != nil || b.StoreID != 3 {
			t.Errorf("Receive: %+v, %v", b, err)
		}
		if c, err := s.AddCarboy(ctx, Carboy{Stream: "organic acid residue", SizeUL: mL(5000), FillLimit: .75, PlaceID: place.ID}, clerk); err != nil || c.Code != MakeCode(CarboyCode, 11) {
			t.Errorf("AddCarboy: %+v, %v", c, err)
		}
		if _, err := s.AddOffer(ctx, Offer{FormID: form.ID, Supplier: "Brackwater Reagents", Item: "AA-1", PackSize: mL(500), PriceMinor: 2000, Currency: "EUR"}, clerk); err != nil {
			t.Error(err)
		}
		if _, err := s.AddEquipment(ctx, Equipment{StoreID: 3, Kind: "beaker", Name: "beaker 50 mL", Size: mL(50), Count: 2}, clerk); err != nil {
			t.Error(err)
		}
		if err := s.SetPolicy(ctx, PolicyRow{Key: "risk.limit", Value: .02, Unit: "1"}, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("a policy without a source: %v", err)
		}
		if err := s.SetPolicy(ctx, PolicyRow{Key: "risk.limit", Value: .02, Unit: "1", Source: "house rule"}, clerk); err != nil {
			t.Error(err)
		}
		shelf, err := s.LoadFor(ctx, []string{"acetic anhydride", "MTBE"})
		if err != nil {
			t.Fatal(err)
		}
		if row := shelf.Policy["risk.limit"]; row.Value != .02 || row.SetBy != clerk.By || row.SetOn != demoDay {
			t.Errorf("policy row %+v", row)
		}
		if len(shelf.Bottles) != 3 || len(shelf.Forms) < 60 {
			t.Errorf("LoadFor: %d bottles, %d forms", len(shelf.Bottles), len(shelf.Forms))
		}
		mustCheck(t, s)
	})
}

func TestShortList(t *testing.T) {
	lab := DemoLab(demoDay)
	shelf := NewShelf(lab)
	list := shelf.ShortList(demoDay)
	if len(list) != 12 {
		t.Fatalf("%d bottles on the list, want 12", len(list))
	}
	promised := 0
	for i, c := range list {
		if i > 0 && c.Place.Walk < list[i-1].Place.Walk {
			t.Errorf("the list isn't in walking order at %d", i)
		}
		if strings.HasPrefix(c.Why[0], "promised") {
			promised++
		}
	}
	// Runs 2 and 4 lie within a fortnight: two bottles each.
	if promised != 4 {
		t.Errorf("%d promised bottles on the list, want 4", promised)
	}
}

// GHS label elements of the pure substances: Reg. (EC) 1272/2008, Annex VI,
// table 3; for the 50 % acid skin corrosion 1A from 15 % on (its specific limit).
func TestLabelOf(t *testing.T) {
	shelf := NewShelf(DemoLab(demoDay))
	labels := map[string]Label{}
	for _, b := range shelf.Bottles {
		l, err := shelf.LabelOf(b)
		if err != nil {
			t.Fatal(err)
		}
		labels[l.Name] = l
	}
	for name, want := range map[string]struct{ signal, pictogram, statement string }{
		"ethyl acetate ≥ 99.5 %":               {"Danger", "GHS02", "H225"},
		"sodium dichromate dihydrate ≥ 99.5 %": {"Danger", "GHS08", "H350"},
		"sulfuric acid 50 %":                   {"Danger", "GHS05", "H314"},
		"potassium permanganate ≥ 99 %":        {"Danger", "GHS03", "H272"},
	} {
		l := labels[name]
		if l.Signal != want.signal || !slices.Contains(l.Pictograms, want.pictogram) ||
			!slices.ContainsFunc(l.Statements, func(s string) bool { return strings.HasPrefix(s, want.statement) }) {
			t.Errorf("%s: %+v, want %+v", name, l, want)
		}
	}
	if l := labels["filter paper, 110 mm"]; l.Basis != "no data" || l.Signal != "" {
		t.Errorf("filter paper: %+v", l)
	}
	if l := labels["2,2,6,6-tetramethylpiperidine-1-oxyl ≥ 98 %"]; !l.Small {
		t.Errorf("10 g of TEMPO: %+v, want it small", l)
	}
}

package inventory

import (
	"cmp"
	"context"
	"fmt"
	"slices"
	"testing"
)

// A page of the database is the page that sorting and filtering the whole shelf
// gives, for every order, filter and search.
func TestBrowseAgreesWithTheWholeShelf(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		filled(t, s)
		ctx := context.Background()
		shelf, err := s.Load(ctx)
		if err != nil {
			t.Fatal(err)
		}
		found, err := s.Search(ctx, "acid")
		if err != nil || len(found.Substances) < 2 {
			t.Fatal(found.Substances, err)
		}
		class := shelf.Forms[0].StorageClass
		for _, q := range []Browse{{}, {Store: shelf.Places[0].Store}, {Store: "Nowhere"}, {Class: class}, {State: Sealed}, {State: Empty},
			{Answers: &found}, {Answers: &Found{}}, {Answers: &found, State: Opened}, {Store: shelf.Places[0].Store, Class: class, State: Opened}} {
			for _, sort := range append(BrowseOrders, "") {
				for _, down := range []bool{false, true} {
					q.Sort, q.Down, q.Rows = sort, down, 7
					if err := agrees(ctx, s, shelf, q); err != nil {
						t.Errorf("%+v: %v", q, err)
					}
				}
			}
		}
	})
}

func agrees(ctx context.Context, s *Store, shelf *Shelf, q Browse) error {
	want := browsedWhole(shelf, q)
	for q.Page = 1; ; q.Page++ {
		page, err := s.Browse(ctx, q)
		if err != nil {
			return err
		}
		if page.Total != len(want) || page.All != len(shelf.Bottles) {
			return fmt.Errorf("%d of %d bottles, want %d of %d", page.Total, page.All, len(want), len(shelf.Bottles))
		}
		from := (q.Page - 1) * q.Rows
		if from >= len(want) {
			if page.Page != max(q.Page-1, 1) {
				return fmt.Errorf("page %d, want the last, %d", page.Page, q.Page-1)
			}
			return nil
		}
		for i, b := range want[from:min(from+q.Rows, len(want))] {
			if i >= len(page.Bottles) || page.Bottles[i].Code != b.Code {
				return fmt.Errorf("page %d, row %d isn't %s", q.Page, i, b.Code)
			}
			if _, ok := page.Shelf.Form(b.FormID); !ok || len(page.Shelf.EarmarksOn(b.ID)) != len(shelf.EarmarksOn(b.ID)) {
				return fmt.Errorf("%s comes without its form or earmarks", b.Code)
			}
		}
	}
}

func browsedWhole(shelf *Shelf, q Browse) []Bottle {
	name := func(b Bottle) string {
		f, _ := shelf.Form(b.FormID)
		s, _ := shelf.SubstanceByID(f.SubstanceID)
		return s.Name
	}
	list := slices.DeleteFunc(slices.Clone(shelf.Bottles), func(b Bottle) bool {
		f, _ := shelf.Form(b.FormID)
		p, _ := shelf.Place(b.PlaceID)
		gone := q.State == "" && (b.State == Empty || b.State == Discarded) || q.State != "" && b.State != q.State
		return gone || q.Store != "" && p.Store != q.Store || q.Class != "" && f.StorageClass != q.Class || q.Answers != nil && !answers(q.Answers, b, f)
	})
	slices.SortFunc(list, func(a, b Bottle) int {
		if q.Down {
			a, b = b, a
		}
		pa, _ := shelf.Place(a.PlaceID)
		pb, _ := shelf.Place(b.PlaceID)
		first := 0
		switch q.Sort {
		case "bottle":
			first = cmp.Compare(a.Code, b.Code)
		case "place":
			first = cmp.Or(cmp.Compare(pa.Walk, pb.Walk), cmp.Compare(pa.ID, pb.ID))
		case "expiry":
			first = cmp.Compare(uint32(a.Expiry-1), uint32(b.Expiry-1)) // none, which is 0, last
		case "state":
			first = cmp.Compare(a.State, b.State)
		}
		return cmp.Or(first, cmp.Compare(name(a), name(b)), cmp.Compare(a.Code, b.Code))
	})
	return list
}

func answers(found *Found, b Bottle, f StockForm) bool {
	return slices.ContainsFunc(found.Bottles, func(x Bottle) bool { return x.ID == b.ID }) ||
		slices.ContainsFunc(found.Substances, func(x Substance) bool { return x.ID == f.SubstanceID }) ||
		slices.ContainsFunc(found.Places, func(x Place) bool { return x.ID == b.PlaceID })
}

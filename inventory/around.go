package inventory

import (
	"context"

	"gorm.io/gorm"
)

// LoadBottle reads one bottle by its code, typed or scanned, with what hangs on
// it: its form, substance and place, its earmarks and their runs. The shelf has
// nothing else. The error is ErrNotFound or a *CodeError where there is no such
// bottle.
func (s *Store) LoadBottle(ctx context.Context, code string) (b Bottle, shelf *Shelf, err error) {
	const doing = "look up"
	err = s.read(ctx, doing, func(tx *gorm.DB) error {
		if b, err = bottleByCode(tx, doing, code); err != nil {
			return err
		}
		shelf, err = shelfAround(tx, []Bottle{b})
		return err
	})
	return b, shelf, err
}

// shelfAround reads what a few bottles hang on and what hangs on them.
func shelfAround(tx *gorm.DB, bottles []Bottle) (*Shelf, error) {
	lab := Lab{Bottles: bottles}
	if len(bottles) == 0 {
		return NewShelf(lab), nil
	}
	bottleIDs := idsOf(bottles, func(b *Bottle) int64 { return b.ID })
	for _, list := range []struct {
		rows  any
		where string
		ids   func() []int64
	}{
		{&lab.Forms, "id IN ?", func() []int64 { return idsOf(bottles, func(b *Bottle) int64 { return b.FormID }) }},
		{&lab.Substances, "id IN ?", func() []int64 { return idsOf(lab.Forms, func(f *StockForm) int64 { return f.SubstanceID }) }},
		{&lab.Places, "id IN ?", func() []int64 { return idsOf(bottles, func(b *Bottle) int64 { return b.PlaceID }) }},
		{&lab.Earmarks, "bottle_id IN ?", func() []int64 { return bottleIDs }},
		{&lab.Runs, "id IN ?", func() []int64 { return idsOf(lab.Earmarks, func(e *Earmark) int64 { return e.RunID }) }},
	} {
		ids := list.ids()
		if len(ids) == 0 {
			continue
		}
		if err := tx.Where(list.where, ids).Find(list.rows).Error; err != nil {
			return nil, err
		}
	}
	return NewShelf(lab), nil
}

func idsOf[R any](rows []R, id func(*R) int64) (ids []int64) {
	seen := make(map[int64]bool, len(rows))
	for i := range rows {
		if k := id(&rows[i]); !seen[k] {
			seen[k] = true
			ids = append(ids, k)
		}
	}
	return ids
}

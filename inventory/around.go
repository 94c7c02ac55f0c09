package inventory

import (
	"context"

	"gorm.io/gorm"
)

// LoadBottle reads one bottle by its code, typed or scanned, with what its page
// needs: its form, substance and earmarks, the runs to come and those of its
// earmarks, without their recipes' texts, all places and the policy. The shelf
// has nothing else. The error is ErrNotFound or ErrBadCode where there is no
// such bottle.
func (s *Store) LoadBottle(ctx context.Context, code string) (b Bottle, shelf *Shelf, err error) {
	const doing = "look up"
	names, err := s.catalogue(ctx)
	if err != nil {
		return b, nil, err
	}
	err = s.read(ctx, doing, func(tx *gorm.DB) error {
		if b, err = bottleByCode(tx, doing, code); err != nil {
			return err
		}
		lab := Lab{Bottles: []Bottle{b}, Places: names.places}
		if err := lab.loadAround(tx); err != nil {
			return err
		}
		over := []RunState{Closed, Dropped}
		of := idsOf(lab.Earmarks, func(e *Earmark) int64 { return e.RunID })
		var policy []PolicyRow
		if err := tx.Find(&policy).Error; err != nil {
			return err
		}
		lab.Policy = PolicyOf(policy)
		if err := tx.Omit("recipe_text").Where("state NOT IN ? OR id IN ?", over, of).Find(&lab.Runs).Error; err != nil {
			return err
		}
		shelf = NewShelf(lab)
		return nil
	})
	return b, shelf, err
}

// loadAround reads the forms and substances of a few bottles and the earmarks
// on them.
func (lab *Lab) loadAround(tx *gorm.DB) error {
	if len(lab.Bottles) == 0 {
		return nil
	}
	if err := tx.Where("bottle_id IN ?", idsOf(lab.Bottles, func(b *Bottle) int64 { return b.ID })).Find(&lab.Earmarks).Error; err != nil {
		return err
	}
	if err := tx.Where("id IN ?", idsOf(lab.Bottles, func(b *Bottle) int64 { return b.FormID })).Find(&lab.Forms).Error; err != nil {
		return err
	}
	return tx.Where("id IN ?", idsOf(lab.Forms, func(f *StockForm) int64 { return f.SubstanceID })).Find(&lab.Substances).Error
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

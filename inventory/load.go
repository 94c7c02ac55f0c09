package inventory

import (
	"context"

	"gorm.io/gorm"
)

// Load reads everything the planner needs in one transaction, so that it is one
// moment of the database.
func (s *Store) Load(ctx context.Context) (*Shelf, error) {
	var lab Lab
	err := s.read(ctx, "load the shelf", func(tx *gorm.DB) error {
		var policy []PolicyRow
		for _, list := range []any{&lab.Substances, &lab.Forms, &lab.Places, &lab.Bottles, &lab.Earmarks, &lab.Offers,
			&lab.Orders, &lab.Carboys, &lab.Equipment, &lab.Runs, &policy} {
			if err := tx.Find(list).Error; err != nil {
				return err
			}
		}
		lab.Policy = PolicyOf(policy)
		return nil
	})
	if err != nil {
		return nil, err
	}
	return NewShelf(lab), nil
}

package inventory

import (
	"context"
	"fmt"
	"math"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"
)

// SetPolicy changes or adds a row. Its source must say where the value comes
// from; who and when are taken from the act and the clock.
func (s *Store) SetPolicy(ctx context.Context, row PolicyRow, act Act) error {
	const doing = "set the policy"
	if err := act.check(doing); err != nil {
		return err
	}
	switch {
	case row.Key == "":
		return invalid(doing, "", "no key", "name the row")
	case math.IsNaN(row.Value) || math.IsInf(row.Value, 0):
		return invalid(doing, row.Key, "the value is no number", "give a number in "+row.Unit)
	case row.Source == "":
		return invalid(doing, row.Key, "no source", "say which law, page or practice the value comes from")
	}
	row.SetBy, row.SetOn = act.By, s.today()
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		var was PolicyRow
		found := tx.Where("key = ?", row.Key).Limit(1).Find(&was)
		if found.Error != nil {
			return found.Error
		}
		before := ""
		if found.RowsAffected > 0 {
			before = fmt.Sprintf("%v %s, %s, set by %s on %s", was.Value, was.Unit, was.Source, was.SetBy, was.SetOn)
		}
		if err := tx.Save(&row).Error; err != nil {
			return err
		}
		return s.audit(tx, 0, act, doing, row.Key, before, fmt.Sprintf("%v %s, %s", row.Value, row.Unit, row.Source))
	})
}

// seedPolicy puts in the rows of the policy as delivered that the table doesn't
// have: all of them into a new store, and what a newer program asks for besides.
// Rows that are there are never touched.
func (s *Store) seedPolicy(ctx context.Context) error {
	if s.options.ReadOnly {
		return nil
	}
	var keys []string
	err := s.read(ctx, "open", func(tx *gorm.DB) error {
		return tx.Model(&PolicyRow{}).Pluck("key", &keys).Error
	})
	if err != nil {
		return err
	}
	there := make(map[string]bool, len(keys))
	for _, key := range keys {
		there[key] = true
	}
	var missing []PolicyRow
	for _, row := range PolicyDefaults(s.today()) {
		if !there[row.Key] {
			missing = append(missing, row)
		}
	}
	if len(missing) == 0 {
		return nil
	}
	return s.write(ctx, "open", func(tx *gorm.DB) error {
		// Another server may be doing the same.
		return createAll(tx.Clauses(clause.OnConflict{DoNothing: true}), missing)
	})
}

package inventory

import (
	"context"
	"fmt"
	"time"

	"gorm.io/gorm"
)

// storeroom is a row of the table of stores.
type storeroom struct {
	ID   int64
	Name string
}

// TableName names the table for gorm.
func (storeroom) TableName() string { return "stores" }

// Fill writes a lab into an empty store. Every bottle gets a ledger: what it was
// received with, and the difference to what it holds when it was measured.
func (s *Store) Fill(ctx context.Context, lab Lab, act Act) error {
	const doing = "fill"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		var there int64
		if err := tx.Model(&Substance{}).Count(&there).Error; err != nil {
			return err
		}
		if there > 0 {
			return &Error{Doing: doing, What: s.name(), Kind: ErrDuplicate, Why: "it holds a stock already", Would: "take an empty data folder"}
		}
		for _, step := range []func(*gorm.DB, Lab, Act) error{s.fillBasics, s.fillBottles, s.fillEarmarks, s.fillRest} {
			if err := step(tx, lab, act); err != nil {
				return err
			}
		}
		return s.setSequences(tx)
	})
}

// createAll inserts in parts, because an engine takes only so many parameters.
func createAll[R any](tx *gorm.DB, rows []R) error {
	if len(rows) == 0 {
		return nil
	}
	return tx.CreateInBatches(rows, 200).Error
}

func (s *Store) fillBasics(tx *gorm.DB, lab Lab, _ Act) error {
	var stores []storeroom
	seen := map[int64]bool{}
	for _, p := range lab.Places {
		if !seen[p.StoreID] {
			seen[p.StoreID] = true
			stores = append(stores, storeroom{p.StoreID, p.Store})
		}
	}
	for _, step := range []error{createAll(tx, stores), createAll(tx, lab.Substances), createAll(tx, lab.Forms),
		createAll(tx, lab.Places), createAll(tx, lab.Runs)} {
		if step != nil {
			return step
		}
	}
	return nil
}

func (s *Store) fillBottles(tx *gorm.DB, lab Lab, act Act) error {
	for _, b := range lab.Bottles {
		row := b
		row.Content, row.Promised = 0, 0
		if err := tx.Create(&row).Error; err != nil {
			return fmt.Errorf("bottle %s: %w", b.Code, err)
		}
		change := StateChange{StoreID: b.StoreID, BottleID: b.ID, State: b.State, ByWhom: act.By, At: s.stampOn(b.Received), Why: act.Why}
		if err := tx.Create(&change).Error; err != nil {
			return err
		}
		receipt := Entry{Kind: Receipt, Amount: b.Size, ByWhom: act.By, At: s.stampOn(b.Received)}
		if err := s.post(tx, &row, &receipt); err != nil {
			return err
		}
		if b.Content != b.Size {
			count := Entry{Kind: Counted, Amount: b.Content - b.Size, ByWhom: act.By, At: s.stampOn(b.MeasuredOn), Why: string(b.MeasuredBy)}
			if err := s.post(tx, &row, &count); err != nil {
				return err
			}
		}
		if err := tx.Exec("UPDATE bottles SET version = ? WHERE id = ?", b.Version, b.ID).Error; err != nil {
			return err
		}
	}
	return nil
}

// stampOn is nine in the morning UTC of a day, or now for no day.
func (s *Store) stampOn(day Date) Stamp {
	if !day.Set() {
		return s.stamp()
	}
	return StampOf(day.Time().Add(9 * time.Hour))
}

func (s *Store) fillEarmarks(tx *gorm.DB, lab Lab, _ Act) error {
	if err := createAll(tx, lab.Earmarks); err != nil {
		return err
	}
	promised := map[int64]int64{}
	for _, m := range lab.Earmarks {
		promised[m.BottleID] += m.Amount
	}
	for _, b := range lab.Bottles {
		if promised[b.ID] == 0 {
			continue
		}
		if err := setPromised(tx, &Bottle{ID: b.ID}, promised[b.ID]); err != nil {
			return err
		}
	}
	return nil
}

func (s *Store) fillRest(tx *gorm.DB, lab Lab, _ Act) error {
	if err := tx.Exec("DELETE FROM policy_rows").Error; err != nil { // as delivered, by Open
		return err
	}
	for _, step := range []error{createAll(tx, lab.Offers), createAll(tx, lab.Orders), createAll(tx, lab.Carboys),
		createAll(tx, lab.Equipment), createAll(tx, lab.Policy.Rows())} {
		if step != nil {
			return step
		}
	}
	return nil
}

// identityTables are those whose numbers PostgreSQL hands out.
var identityTables = []string{"stores", "substances", "stock_forms", "places", "bottles", "runs", "earmarks", "ledger",
	"bottle_states", "offers", "orders", "carboys", "equipment", "recipe_texts", "audit", "imports", "loans"}

// setSequences lets PostgreSQL go on counting after rows that came with their
// numbers.
func (s *Store) setSequences(tx *gorm.DB) error {
	if s.engine != onPostgres {
		return nil
	}
	for _, table := range identityTables {
		if there, err := s.hasTable(tx, table); err != nil {
			return err
		} else if !there { // of a later schema
			continue
		}
		query := fmt.Sprintf("SELECT setval(pg_get_serial_sequence('%s', 'id'), coalesce((SELECT max(id) FROM %s), 0) + 1, false)", table, table)
		if err := tx.Exec(query).Error; err != nil {
			return err
		}
	}
	return nil
}

package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"
)

// Receive takes a bottle into stock: its code, number and store are given here,
// its content is the first entry of its ledger. FormID, PlaceID, Size and
// Content must be set; State "" means sealed, MeasuredBy "" unopened.
func (s *Store) Receive(ctx context.Context, b Bottle, act Act) (Bottle, error) {
	const doing = "receive"
	if err := act.check(doing); err != nil {
		return Bottle{}, err
	}
	err := s.write(ctx, doing, func(tx *gorm.DB) error {
		place, err := placeByID(tx, doing, b.PlaceID)
		if err != nil {
			return err
		}
		b.StoreID = place.StoreID
		print := fingerprint(b)
		ref, err := done(tx, b.StoreID, act, doing, print)
		if err != nil {
			return err
		}
		if ref != 0 {
			return tx.Where("id = ?", ref).Take(&b).Error
		}
		if err := s.receive(tx, &b, act); err != nil {
			return err
		}
		return remember(tx, b.StoreID, act, doing, print, b.ID, s.stamp())
	})
	return b, err
}

func (s *Store) receive(tx *gorm.DB, b *Bottle, act Act) error {
	const doing = "receive"
	if b.Size <= 0 || b.Content < 0 || b.Content > b.Size {
		return invalid(doing, "the bottle", fmt.Sprintf("a content of %d in a bottle of %d", b.Content, b.Size), "give a size above 0 and a content between 0 and the size")
	}
	id, err := s.nextID(tx, "bottles")
	if err != nil {
		return err
	}
	content := b.Content
	b.ID, b.Code, b.Content, b.Promised, b.Version = id, MakeCode(BottleCode, id), 0, 0, 1
	if b.State == "" {
		b.State = Sealed
	}
	if b.MeasuredBy == "" {
		b.MeasuredBy = ByUnopened
	}
	if !b.Received.Set() {
		b.Received = s.today()
	}
	if !b.MeasuredOn.Set() {
		b.MeasuredOn = s.today()
	}
	if err := tx.Create(b).Error; err != nil {
		return err
	}
	first := StateChange{StoreID: b.StoreID, BottleID: b.ID, State: b.State, ByWhom: act.By, At: s.stamp(), Why: act.Why}
	if err := tx.Create(&first).Error; err != nil {
		return err
	}
	return s.post(tx, b, &Entry{Kind: Receipt, Amount: content, ByWhom: act.By, Why: act.Why})
}

// nextID takes the next identity of a table, for a record whose code is made
// from it.
func (s *Store) nextID(tx *gorm.DB, table string) (id int64, err error) {
	query := "SELECT coalesce(max(id), 0) + 1 FROM " + table
	if s.engine == onPostgres {
		query = "SELECT nextval(pg_get_serial_sequence('" + table + "', 'id'))"
	}
	return id, tx.Raw(query).Row().Scan(&id)
}

// nextIDs takes n identities of a table at once.
func (s *Store) nextIDs(tx *gorm.DB, table string, n int) ([]int64, error) {
	ids := make([]int64, n)
	if s.engine == onPostgres {
		err := tx.Raw("SELECT nextval(pg_get_serial_sequence('"+table+"', 'id')) FROM generate_series(1, ?)", n).Scan(&ids).Error
		return ids, err
	}
	first, err := s.nextID(tx, table)
	for i := range ids {
		ids[i] = first + int64(i)
	}
	return ids, err
}

package inventory

import (
	"context"
	"crypto/sha256"
	"encoding/binary"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"
)

// The ledger is the unit of truth: a bottle's content is the sum of its
// entries, entries are only ever added, and each carries a hash over itself and
// the entry before it in its store, so that a change or a gap shows.

// EntryKind says what an entry is about.
type EntryKind string

// The kinds of entries.
const (
	Receipt  EntryKind = "receipt"
	Drawn    EntryKind = "draw"
	Counted  EntryKind = "count" // the difference a stock-take or a weighing found
	Reversed EntryKind = "reversal"
	Discard  EntryKind = "discard"
	Merged   EntryKind = "merge"
)

// Entry is one line of the ledger.
type Entry struct {
	ID       int64 `gorm:"primaryKey"`
	StoreID  int64
	Seq      int64 // position in the store's chain, from 1 without gaps
	BottleID int64
	Kind     EntryKind
	// Amount changes the content, negative for what is taken out, in the unit
	// of the bottle; Content is what it makes of it.
	Amount, Content int64
	RunID           int64 // 0 for none
	ReversalOf      int64 // ID of the entry taken back; 0 for none
	ByWhom          string
	At              Stamp
	Why             string
	Hash            []byte // SHA-256, 32 bytes
}

// TableName names the table for gorm.
func (Entry) TableName() string { return "ledger" }

// chain is the head of a store's ledger.
type chain struct {
	StoreID int64 `gorm:"primaryKey;autoIncrement:false"`
	Seq     int64
	Hash    []byte
}

// TableName names the table for gorm.
func (chain) TableName() string { return "chains" }

// chainHash is the hash of an entry whose predecessor has the hash prev:
// SHA-256 over prev and the entry's fields but its ID and hash, whole numbers
// as eight bytes with the most significant first, texts after their length.
func chainHash(prev []byte, e *Entry) []byte {
	b := make([]byte, 0, 256)
	b = append(b, prev...)
	for _, n := range [...]int64{e.StoreID, e.Seq, e.BottleID, e.Amount, e.Content, e.RunID, e.ReversalOf} {
		b = binary.BigEndian.AppendUint64(b, uint64(n))
	}
	for _, text := range [...]string{string(e.Kind), e.ByWhom, e.At.String(), e.Why} {
		b = binary.BigEndian.AppendUint64(b, uint64(len(text)))
		b = append(b, text...)
	}
	sum := sha256.Sum256(b)
	return sum[:]
}

// lockBottle reads a bottle for a change. On PostgreSQL its row stays locked
// until the transaction ends; SQLite has one writer at a time anyway.
func lockBottle(tx *gorm.DB, doing, code string) (Bottle, StockForm, error) {
	code, err := NormalCode(code)
	if err != nil {
		return Bottle{}, StockForm{}, err
	}
	var b Bottle
	found := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("code = ?", code).Limit(1).Find(&b)
	if found.Error != nil {
		return b, StockForm{}, found.Error
	}
	if found.RowsAffected == 0 {
		return b, StockForm{}, notFound(doing, "bottle "+code, "check the code, or take the bottle into stock first")
	}
	if b.MergedInto != 0 {
		return b, StockForm{}, invalid(doing, "bottle "+code, "its record was merged into another", "look the bottle up again")
	}
	var form StockForm
	err = tx.Where("id = ?", b.FormID).Take(&form).Error
	return b, form, err
}

// lockBottles locks several bottles in order of their IDs, so that two
// transactions can't wait for each other.
func lockBottles(tx *gorm.DB, ids []int64) (map[int64]Bottle, error) {
	var rows []Bottle
	err := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("id IN ?", ids).Order("id").Find(&rows).Error
	m := make(map[int64]Bottle, len(rows))
	for _, b := range rows {
		m[b.ID] = b
	}
	return m, err
}

// post adds an entry for a bottle that is locked and brings the bottle's
// content along. What is promised must have been made to fit before.
func (s *Store) post(tx *gorm.DB, b *Bottle, e *Entry) error {
	var head chain
	found := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("store_id = ?", b.StoreID).Limit(1).Find(&head)
	if found.Error != nil {
		return found.Error
	}
	e.StoreID, e.BottleID = b.StoreID, b.ID
	e.Seq, e.Content = head.Seq+1, b.Content+e.Amount
	if e.At.IsZero() {
		e.At = s.stamp()
	}
	e.Hash = chainHash(head.Hash, e)
	if err := tx.Create(e).Error; err != nil {
		return err
	}
	if err := setHead(tx, found.RowsAffected == 0, chain{b.StoreID, e.Seq, e.Hash}); err != nil {
		return err
	}
	b.Content = e.Content
	b.Version++
	return tx.Exec("UPDATE bottles SET content = ?, version = ? WHERE id = ?", b.Content, b.Version, b.ID).Error
}

func setHead(tx *gorm.DB, first bool, head chain) error {
	if first {
		return tx.Create(&head).Error
	}
	return tx.Exec("UPDATE chains SET seq = ?, hash = ? WHERE store_id = ?", head.Seq, head.Hash, head.StoreID).Error
}

// Ledger returns a bottle's entries, the newest first, at most limit of them (0
// for all).
func (s *Store) Ledger(ctx context.Context, code string, limit int) (entries []Entry, err error) {
	code, err = NormalCode(code)
	if err != nil {
		return nil, err
	}
	if limit <= 0 {
		limit = -1
	}
	err = s.read(ctx, "read the ledger", func(tx *gorm.DB) error {
		return tx.Where("bottle_id = (SELECT id FROM bottles WHERE code = ?)", code).
			Order("id DESC").Limit(limit).Find(&entries).Error
	})
	return entries, err
}

// entryByID reads an entry inside a transaction.
func entryByID(tx *gorm.DB, doing string, id int64) (e Entry, err error) {
	found := tx.Where("id = ?", id).Limit(1).Find(&e)
	if found.Error == nil && found.RowsAffected == 0 {
		return e, notFound(doing, "that ledger entry", "look it up in the bottle's ledger")
	}
	return e, found.Error
}

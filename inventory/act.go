package inventory

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"strings"

	"gorm.io/gorm"
)

// Act says who does something and why. Every call that changes the store takes
// one.
type Act struct {
	By  string // a person or a program; must not be empty
	Why string
	// Key makes a repeat harmless: a second call with the same key and the same
	// content changes nothing and returns what the first returned; with other
	// content it is refused. "" means no protection.
	Key string
}

func (a Act) check(doing string) error {
	if strings.TrimSpace(a.By) == "" {
		return invalid(doing, "", "nobody is named as doing it", "give the name of the person")
	}
	return nil
}

// doneAct is a row of the table of acts that were carried out.
type doneAct struct {
	StoreID     int64
	Key         string
	What        string
	Fingerprint string
	Ref         int64
	At          Stamp
}

// TableName names the table for gorm.
func (doneAct) TableName() string { return "acts" }

// fingerprint sums up the content of an act.
func fingerprint(parts ...any) string {
	sum := sha256.Sum256([]byte(fmt.Sprintf("%#v", parts)))
	return hex.EncodeToString(sum[:8])
}

// done returns what an earlier act with the same key made, 0 if there was none.
func done(tx *gorm.DB, storeID int64, act Act, what, print string) (ref int64, err error) {
	if act.Key == "" {
		return 0, nil
	}
	var rows []doneAct
	if err := tx.Where("store_id = ? AND key = ?", storeID, act.Key).Limit(1).Find(&rows).Error; err != nil || len(rows) == 0 {
		return 0, err
	}
	if rows[0].What != what || rows[0].Fingerprint != print {
		return 0, &Error{Doing: what, Kind: ErrDuplicate, Why: fmt.Sprintf("the request key %q was used for something else", act.Key), Would: "take a new key for a new request"}
	}
	return rows[0].Ref, nil
}

// remember notes that an act was carried out.
func remember(tx *gorm.DB, storeID int64, act Act, what, print string, ref int64, at Stamp) error {
	if act.Key == "" {
		return nil
	}
	return tx.Create(&doneAct{storeID, act.Key, what, print, ref, at}).Error
}

// AuditRow is one change: who, when, what, old, new, why. Rows are never
// changed or deleted.
type AuditRow struct {
	ID      int64
	StoreID int64
	At      Stamp
	ByWhom  string
	What    string // "draw", "earmark cut", …
	Record  string // "bottle B7K2QM", "run 12"
	Was     string
	IsNow   string
	Why     string
}

// TableName names the table for gorm.
func (AuditRow) TableName() string { return "audit" }

func (s *Store) audit(tx *gorm.DB, storeID int64, act Act, what, record, was, now string) error {
	return tx.Create(&AuditRow{StoreID: storeID, At: s.stamp(), ByWhom: act.By, What: what, Record: record,
		Was: was, IsNow: now, Why: act.Why}).Error
}

// Audit returns what was done to a record, such as "run 12" or "bottle B7K2QM",
// or to all records for "", the newest first, at most limit rows.
func (s *Store) Audit(ctx context.Context, record string, limit int) (rows []AuditRow, err error) {
	err = s.read(ctx, "read the audit", func(tx *gorm.DB) error {
		if record != "" {
			tx = tx.Where("record = ? OR record LIKE ?", record, record+",%")
		}
		return tx.Order("id DESC").Limit(limit).Find(&rows).Error
	})
	return rows, err
}

package inventory

import (
	"bytes"
	"context"
	"fmt"

	"gorm.io/gorm"
)

// Fault is something that isn't as it must be.
type Fault struct {
	What  string // "ledger", "hash chain", "promises", "references", "file"
	Where string // "bottle B7K2QM", "store 1, entry 12"
	Why   string
}

// String says it in a line.
func (f Fault) String() string { return f.What + ", " + f.Where + ": " + f.Why }

// CheckReport is what a check went through and what it found.
type CheckReport struct {
	Bottles, Entries int64
	Faults           []Fault
}

func (r *CheckReport) add(what, where, why string, args ...any) {
	r.Faults = append(r.Faults, Fault{what, where, fmt.Sprintf(why, args...)})
}

// Check verifies the whole database at one moment: the file itself and its
// references, every bottle's content against the sum of its ledger, promises
// against earmarks, the hash chain of every store, and codes and registry
// numbers. Rows are read as they come: what is kept is one sum for each bottle,
// however long the ledger. The error is for what kept it from checking; a
// database too damaged to read gives ErrCorrupt.
func (s *Store) Check(ctx context.Context) (CheckReport, error) {
	var report CheckReport
	err := s.read(ctx, "check", func(tx *gorm.DB) error {
		steps := []func(*gorm.DB, *CheckReport) error{checkLedger, checkPromises, checkPlaces, checkNumbers}
		if s.engine == onSQLite {
			steps = append([]func(*gorm.DB, *CheckReport) error{checkFile}, steps...)
		}
		for _, step := range steps {
			if err := step(tx, &report); err != nil {
				return err
			}
		}
		return nil
	})
	return report, err
}

// checkFile asks SQLite for damage in the file and for references into nothing.
func checkFile(tx *gorm.DB, report *CheckReport) error {
	rows, err := tx.Raw("PRAGMA integrity_check(100)").Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		var line string
		if err := rows.Scan(&line); err != nil {
			return err
		}
		if line != "ok" {
			report.add("file", "database", "%s", line)
		}
	}
	if err := rows.Err(); err != nil {
		return err
	}
	return checkReferences(tx, report)
}

func checkReferences(tx *gorm.DB, report *CheckReport) error {
	rows, err := tx.Raw("PRAGMA foreign_key_check").Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		var table, parent string
		var row *int64
		var key int
		if err := rows.Scan(&table, &row, &parent, &key); err != nil {
			return err
		}
		report.add("references", "table "+table, "a row refers to no row of %s", parent)
	}
	return rows.Err()
}

// checkLedger goes through the ledger store by store in order, follows the hash
// chain, and sums up each bottle.
func checkLedger(tx *gorm.DB, report *CheckReport) error {
	var heads []chain
	if err := tx.Order("store_id").Find(&heads).Error; err != nil {
		return err
	}
	sums := map[int64]int64{}
	for _, head := range heads {
		if err := checkChain(tx, head, sums, report); err != nil {
			return err
		}
	}
	return checkContents(tx, sums, report)
}

func checkChain(tx *gorm.DB, head chain, sums map[int64]int64, report *CheckReport) error {
	rows, err := tx.Raw("SELECT seq, bottle_id, kind, amount, content, run_id, reversal_of, by_whom, at, why, hash FROM ledger WHERE store_id = ? ORDER BY seq", head.StoreID).Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	var last chain
	for rows.Next() {
		e := Entry{StoreID: head.StoreID}
		if err := rows.Scan(&e.Seq, &e.BottleID, &e.Kind, &e.Amount, &e.Content, &e.RunID, &e.ReversalOf, &e.ByWhom, &e.At, &e.Why, &e.Hash); err != nil {
			return err
		}
		where := fmt.Sprintf("store %d, entry %d", head.StoreID, e.Seq)
		if e.Seq != last.Seq+1 {
			report.add("hash chain", where, "entries %d to %d are gone", last.Seq+1, e.Seq-1)
		} else if !bytes.Equal(chainHash(last.Hash, &e), e.Hash) {
			report.add("hash chain", where, "the entry or the one before it was changed")
		}
		sums[e.BottleID] += e.Amount
		if sums[e.BottleID] != e.Content {
			report.add("ledger", where, "it makes the content %d, the entries sum up to %d", e.Content, sums[e.BottleID])
		}
		last = chain{head.StoreID, e.Seq, e.Hash}
		report.Entries++
	}
	if err := rows.Err(); err != nil {
		return err
	}
	if last.Seq != head.Seq || !bytes.Equal(last.Hash, head.Hash) {
		report.add("hash chain", fmt.Sprintf("store %d", head.StoreID), "the chain ends at entry %d, its head says %d", last.Seq, head.Seq)
	}
	return nil
}

func checkContents(tx *gorm.DB, sums map[int64]int64, report *CheckReport) error {
	rows, err := tx.Raw("SELECT id, code, content FROM bottles ORDER BY id").Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		var b Bottle
		if err := rows.Scan(&b.ID, &b.Code, &b.Content); err != nil {
			return err
		}
		report.Bottles++
		if sums[b.ID] != b.Content {
			report.add("ledger", "bottle "+b.Code, "it holds %d, its ledger sums up to %d", b.Content, sums[b.ID])
		}
	}
	return rows.Err()
}

func checkPromises(tx *gorm.DB, report *CheckReport) error {
	rows, err := tx.Raw(`SELECT b.code, b.content, b.promised, coalesce(e.sum, 0) FROM bottles b
		LEFT JOIN (SELECT bottle_id, sum(amount) AS sum FROM earmarks GROUP BY bottle_id) e ON e.bottle_id = b.id
		WHERE b.promised <> coalesce(e.sum, 0) OR b.promised > b.content ORDER BY b.id`).Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		var code string
		var content, promised, sum int64
		if err := rows.Scan(&code, &content, &promised, &sum); err != nil {
			return err
		}
		report.add("promises", "bottle "+code, "it holds %d, says that %d are promised, and its earmarks sum up to %d", content, promised, sum)
	}
	return rows.Err()
}

// checkPlaces looks for records whose store isn't that of what they refer to.
func checkPlaces(tx *gorm.DB, report *CheckReport) error {
	for _, q := range []struct{ where, query string }{
		{"bottle", "SELECT b.code FROM bottles b LEFT JOIN places p ON p.id = b.place_id WHERE p.id IS NULL OR p.store_id <> b.store_id"},
		{"bottle", "SELECT b.code FROM bottles b LEFT JOIN stock_forms f ON f.id = b.form_id WHERE f.id IS NULL"},
		{"form", "SELECT f.name FROM stock_forms f LEFT JOIN substances s ON s.id = f.substance_id WHERE s.id IS NULL"},
		{"bottle", "SELECT b.code FROM earmarks e JOIN bottles b ON b.id = e.bottle_id LEFT JOIN runs r ON r.id = e.run_id WHERE r.id IS NULL OR e.store_id <> b.store_id"},
		{"bottle", "SELECT b.code FROM ledger l JOIN bottles b ON b.id = l.bottle_id WHERE l.store_id <> b.store_id"},
		{"carboy", "SELECT c.code FROM carboys c LEFT JOIN places p ON p.id = c.place_id WHERE p.id IS NULL"},
	} {
		var names []string
		if err := tx.Raw(q.query).Scan(&names).Error; err != nil {
			return err
		}
		for _, name := range names {
			report.add("references", q.where+" "+name, "what it refers to is gone or belongs to another store")
		}
	}
	return nil
}

// checkNumbers tries the check symbols of codes and the check digits of
// registry numbers.
func checkNumbers(tx *gorm.DB, report *CheckReport) error {
	err := eachText(tx, "SELECT code FROM bottles UNION ALL SELECT code FROM carboys", func(code string) {
		if _, err := NormalCode(code); err != nil {
			report.add("codes", "bottle or carboy "+code, "%v", err)
		}
	})
	if err != nil {
		return err
	}
	return eachText(tx, "SELECT cas FROM substances WHERE cas <> '' UNION ALL SELECT cas FROM stock_forms WHERE cas <> ''", func(cas string) {
		if !ValidCAS(cas) {
			report.add("codes", "CAS "+cas, "the check digit doesn't fit")
		}
	})
}

// eachText calls f for every row of a query for one text, as they come.
func eachText(tx *gorm.DB, query string, f func(string)) error {
	rows, err := tx.Raw(query).Rows()
	if err != nil {
		return err
	}
	defer rows.Close()
	for rows.Next() {
		var text string
		if err := rows.Scan(&text); err != nil {
			return err
		}
		f(text)
	}
	return rows.Err()
}

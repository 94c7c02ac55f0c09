package inventory

import "gorm.io/gorm"

// Indexes that are built at once are built several times faster than those that
// are kept up row by row. An import that makes up most of what will be in stock
// therefore takes them down and builds them again, in its transaction, so that
// nobody ever sees the tables without them.

// bulkImport is from how many rows on that pays.
const bulkImport = 20_000

type indexDefinition struct{ Name, SQL string }

// withoutIndexes runs f, on SQLite without the secondary indexes of bottles and
// ledger if so many rows come in that building them again is cheaper.
func (s *Store) withoutIndexes(tx *gorm.DB, rows int, f func() error) error {
	var there int
	if s.engine != onSQLite || rows < bulkImport {
		return f()
	}
	if err := tx.Raw("SELECT count(*) FROM bottles").Row().Scan(&there); err != nil {
		return err
	}
	if there > rows/2 {
		return f()
	}
	var indexes []indexDefinition
	if err := tx.Raw("SELECT name, sql FROM sqlite_master WHERE type = 'index' AND tbl_name IN ('bottles', 'ledger') AND sql IS NOT NULL ORDER BY name").Scan(&indexes).Error; err != nil {
		return err
	}
	for _, index := range indexes {
		if err := tx.Exec("DROP INDEX " + index.Name).Error; err != nil {
			return err
		}
	}
	if err := f(); err != nil {
		return err
	}
	for _, index := range indexes {
		if err := tx.Exec(index.SQL).Error; err != nil {
			return err
		}
	}
	return nil
}

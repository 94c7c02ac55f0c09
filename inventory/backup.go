package inventory

import (
	"bytes"
	"context"
	"database/sql"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"

	"gorm.io/gorm"
)

// Backup writes a backup of one moment of the database, while others go on
// writing, and then reads it again to see that it is whole. A name that ends
// in .db makes a SQLite database (from SQLite only), any other the portable
// archive, which either engine can be restored from. An existing file is never
// overwritten.
func (s *Store) Backup(ctx context.Context, path string) error {
	const doing = "back up"
	if _, err := os.Stat(path); err == nil {
		return &Error{Doing: doing, What: path, Kind: ErrDuplicate, Would: "choose another name"}
	}
	part := path + ".part"
	defer os.Remove(part)
	if err := s.backupInto(ctx, path, part); err != nil {
		return translate(doing, err)
	}
	if err := syncFile(part); err != nil {
		return translate(doing, err)
	}
	return translate(doing, os.Rename(part, path))
}

func (s *Store) backupInto(ctx context.Context, path, part string) error {
	if strings.EqualFold(filepath.Ext(path), ".db") {
		if s.engine == onPostgres {
			return invalid("back up", path, "a PostgreSQL database can't be written as a .db file", "give another ending for the portable archive")
		}
		os.Remove(part)
		if err := s.vacuumInto(ctx, part); err != nil {
			return err
		}
		return wholeSQLite(ctx, part)
	}
	f, err := os.OpenFile(part, os.O_CREATE|os.O_TRUNC|os.O_WRONLY, 0o600)
	if err != nil {
		return err
	}
	if err := s.WriteArchive(ctx, f); err != nil {
		f.Close()
		return err
	}
	if err := f.Close(); err != nil {
		return err
	}
	return wholeArchive(ctx, part)
}

// vacuumInto copies on a connection of its own, so that neither the writer nor
// the readers wait for it.
func (s *Store) vacuumInto(ctx context.Context, path string) error {
	pool := s.pools[0] // in memory there is only the one
	if s.path != "" {
		own, err := sql.Open("sqlite", s.sqliteDSN("immediate"))
		if err != nil {
			return err
		}
		defer own.Close()
		pool = own
	}
	_, err := pool.ExecContext(ctx, "VACUUM INTO ?", path)
	return err
}

// wholeSQLite runs the engine's own integrity check over a backup.
func wholeSQLite(ctx context.Context, path string) error {
	copied := &Store{options: Options{ReadOnly: true, Dir: filepath.Dir(path), BusyTimeout: 1e9}, path: path}
	defer copied.Close()
	if err := copied.openSQLite(ctx); err != nil {
		return err
	}
	var verdict string
	if err := copied.pools[0].QueryRowContext(ctx, "PRAGMA quick_check(1)").Scan(&verdict); err != nil {
		return err
	}
	if verdict != "ok" {
		return &Error{Doing: "back up", What: path, Kind: ErrCorrupt, Why: verdict, Would: "check the database"}
	}
	return nil
}

// wholeArchive reads an archive to its end, with the checksum of gzip and the count of rows.
func wholeArchive(ctx context.Context, path string) error {
	f, err := os.Open(path)
	if err != nil {
		return err
	}
	defer f.Close()
	a, err := openArchive(f)
	if err != nil {
		return err
	}
	_, err = a.skim(ctx)
	return err
}

func syncFile(path string) error {
	f, err := os.OpenFile(path, os.O_RDWR, 0)
	if err != nil {
		return err
	}
	return errors.Join(f.Sync(), f.Close())
}

// Restore fills an empty database, on either engine, from a backup: an archive
// or a SQLite database. The schema is brought up to date and everything is
// checked; after an error the database is empty as before.
func Restore(ctx context.Context, from string, into Options) (rows int64, err error) {
	const doing = "restore"
	lite, err := isSQLite(from)
	if err != nil {
		return 0, translate(doing, err)
	}
	if !lite {
		f, err := os.Open(from)
		if err != nil {
			return 0, translate(doing, err)
		}
		defer f.Close()
		return restoreArchive(ctx, f, into)
	}
	source := &Store{options: Options{ReadOnly: true, Now: clockOr(into.Now), BusyTimeout: 5e9}, path: from}
	defer source.Close()
	if err := source.openSQLite(ctx); err != nil {
		return 0, translate(doing, err)
	}
	r, w := io.Pipe()
	go func() { w.CloseWithError(source.WriteArchive(ctx, w)) }()
	defer r.Close()
	return restoreArchive(ctx, r, into)
}

// isSQLite looks at the first bytes: www.sqlite.org/fileformat.html, 1.3.1.
func isSQLite(path string) (bool, error) {
	f, err := os.Open(path)
	if err != nil {
		return false, err
	}
	defer f.Close()
	head := make([]byte, 16)
	n, err := io.ReadFull(f, head)
	if err != nil && !errors.Is(err, io.ErrUnexpectedEOF) && err != io.EOF {
		return false, err
	}
	return bytes.Equal(head[:n], []byte("SQLite format 3\x00")), nil
}

func restoreArchive(ctx context.Context, r io.Reader, into Options) (rows int64, err error) {
	const doing = "restore"
	a, err := openArchive(r)
	if err != nil {
		return 0, translate(doing, err)
	}
	s, err := openAt(ctx, into, a.head.Schema)
	if err != nil {
		return 0, err
	}
	defer s.Close()
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		var there int64
		if err := tx.Raw("SELECT (SELECT count(*) FROM stores) + (SELECT count(*) FROM substances)").Row().Scan(&there); err != nil {
			return err
		}
		if there > 0 {
			return &Error{Doing: doing, What: s.name(), Kind: ErrDuplicate, Why: "it holds a stock already", Would: "restore into an empty folder or database"}
		}
		if err := tx.Exec("DELETE FROM policy_rows").Error; err != nil { // as delivered, by Open
			return err
		}
		if rows, err = a.load(s, tx); err != nil {
			return err
		}
		if err := s.setSequences(tx); err != nil {
			return err
		}
		return s.refuseFaults(tx)
	})
	if err != nil {
		return 0, err
	}
	return rows, translate(doing, s.upgrade(ctx))
}

func (s *Store) refuseFaults(tx *gorm.DB) error {
	var report CheckReport
	if err := checkLedger(tx, &report); err != nil {
		return err
	}
	if len(report.Faults) > 0 {
		return &Error{Doing: "restore", Kind: ErrCorrupt, Why: fmt.Sprintf("%d faults in the backup, the first: %s", len(report.Faults), report.Faults[0]), Would: "take an earlier backup"}
	}
	return nil
}

// backupOld copies a database of an earlier schema before it is changed.
func (s *Store) backupOld(ctx context.Context, base string) error {
	if s.options.Memory {
		return nil
	}
	if s.engine == onPostgres {
		return s.Backup(ctx, base+".archive")
	}
	return s.Backup(ctx, base+".db")
}

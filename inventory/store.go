package inventory

import (
	"context"
	"database/sql"
	"errors"
	"path/filepath"
	"strings"
	"sync/atomic"
	"time"

	"gorm.io/gorm"
)

// Options say where a Store keeps its data.
type Options struct {
	// Dir is the folder with the SQLite database and its backups; it is made if
	// it doesn't exist.
	Dir string
	// Database is the address of a PostgreSQL database, postgres://…; "" for SQLite.
	Database string
	// Memory keeps everything in memory and forgets it on Close; Dir and
	// Database are then not used.
	Memory bool
	// ReadOnly opens an existing database without changing it, its schema
	// included.
	ReadOnly bool
	// Now is the clock; nil means the system's.
	Now func() time.Time
	// BusyTimeout is how long a write waits for another program's write; 0
	// means five seconds.
	BusyTimeout time.Duration
}

// File is the name of the SQLite database in the data folder.
const File = "stillroom.db"

// A Store is an open database. Any number of goroutines may use it at once.
type Store struct {
	options Options
	engine  engine
	writer  *gorm.DB // on SQLite a single connection whose transactions take the write lock at once
	reader  *gorm.DB
	pools   []*sql.DB
	path    string // of the SQLite file; "" otherwise
	names   atomic.Pointer[catalogue]
	watcher *sql.DB // one connection that never writes; nil but for SQLite files
	loaded  atomic.Pointer[loadedShelf]
	parts   loadedParts
	counted atomic.Pointer[census]
}

type engine int

const (
	onSQLite engine = iota
	onPostgres
)

// Open opens the database, makes it if there is none, and brings its schema up
// to date after a backup. The error is ErrNewerSchema for a database written by
// a newer program, ErrCorrupt for a damaged one, ErrReadOnly, ErrBusy or
// ErrUnreachable.
func Open(ctx context.Context, o Options) (*Store, error) {
	o.Now = clockOr(o.Now)
	if o.BusyTimeout == 0 {
		o.BusyTimeout = defaultBusyTimeout
	}
	s := &Store{options: o}
	if err := s.open(ctx); err != nil {
		s.Close()
		return nil, err
	}
	if err := s.migrate(ctx); err != nil {
		s.Close()
		return nil, translate("open", err)
	}
	if err := s.seedPolicy(ctx); err != nil {
		s.Close()
		return nil, err
	}
	return s, nil
}

const defaultBusyTimeout = 5 * time.Second

func clockOr(now func() time.Time) func() time.Time {
	if now == nil {
		return time.Now
	}
	return now
}

func (s *Store) open(ctx context.Context) error {
	switch {
	case s.options.Memory:
		return translate("open", s.openMemory(ctx))
	case s.options.Database != "":
		if !strings.HasPrefix(s.options.Database, "postgres://") && !strings.HasPrefix(s.options.Database, "postgresql://") {
			return invalid("open", "", "the database address names no engine we know", "want postgres://user@host/name")
		}
		s.engine = onPostgres
		return translate("open", s.openPostgres(ctx))
	case s.options.Dir != "":
		s.path = filepath.Join(s.options.Dir, File)
		return translate("open", s.openSQLite(ctx))
	}
	return invalid("open", "", "no place for the data", "give a data folder or a postgres:// address")
}

// Close ends all connections. It may be called more than once.
func (s *Store) Close() error {
	var errs []error
	for _, pool := range s.pools {
		errs = append(errs, pool.Close())
	}
	s.pools = nil
	return translate("close", errors.Join(errs...))
}

// today is the civil date of the store's clock, in its own zone.
func (s *Store) today() Date { return DateOf(s.options.Now()) }

func (s *Store) stamp() Stamp { return StampOf(s.options.Now()) }

// write runs f in a transaction that may write. On SQLite there is one writer
// at a time; on PostgreSQL, where f locks the rows it decides on, it is repeated
// when the server gave it up for another's sake, so f must leave nothing behind
// outside tx. Inside f only tx may be used.
func (s *Store) write(ctx context.Context, doing string, f func(tx *gorm.DB) error) error {
	const attempts = 8
	var err error
	for range attempts {
		err = s.writer.WithContext(ctx).Transaction(f)
		if s.engine == onSQLite || !givenUp(err) {
			break
		}
	}
	return translate(doing, err)
}

func givenUp(err error) bool {
	_, kind := kindOf(err)
	return kind == ErrBusy
}

// read runs f in a transaction that sees one moment of the database.
func (s *Store) read(ctx context.Context, doing string, f func(tx *gorm.DB) error) error {
	options := &sql.TxOptions{ReadOnly: s.engine == onPostgres}
	if s.engine == onPostgres {
		options.Isolation = sql.LevelRepeatableRead
	}
	return translate(doing, s.reader.WithContext(ctx).Transaction(f, options))
}

package inventory

import (
	"context"
	"database/sql"
	"net/url"
	"os"
	"path/filepath"
	"strconv"

	_ "github.com/jackc/pgx/v5/stdlib" // the driver "pgx"
	"gorm.io/driver/postgres"
	"gorm.io/driver/sqlite"
	"gorm.io/gorm"
	"gorm.io/gorm/logger"
	_ "modernc.org/sqlite" // the driver "sqlite"
)

const (
	sqliteReaders      = 4
	postgresConns      = 16
	statementsPrepared = true
	// An import writes into a dozen indexes at random places: with SQLite's own
	// two megabytes the pages go to the disk and come back many times over.
	writerCacheKiB = 96 << 10
	readerCacheKiB = 8 << 10
)

func (s *Store) openSQLite(ctx context.Context) error {
	if !s.options.ReadOnly {
		if err := os.MkdirAll(s.options.Dir, 0o700); err != nil {
			return err
		}
	} else if _, err := os.Stat(s.path); err != nil {
		return notFound("open", s.path, "check the data folder")
	}
	if err := notEmptied(s.path); err != nil {
		return err
	}
	writer, err := sql.Open("sqlite", s.sqliteDSN("immediate"))
	if err != nil {
		return err
	}
	writer.SetMaxOpenConns(1)
	s.pools = append(s.pools, writer)
	if s.writer, err = openGorm(ctx, sqlite.New(sqlite.Config{Conn: writer}), writer); err != nil {
		return err
	}
	reader, err := sql.Open("sqlite", s.sqliteDSN("deferred"))
	if err != nil {
		return err
	}
	reader.SetMaxOpenConns(sqliteReaders)
	s.pools = append(s.pools, reader)
	if s.reader, err = openGorm(ctx, sqlite.New(sqlite.Config{Conn: reader}), reader); err != nil {
		return err
	}
	return s.openWatcher()
}

// openWatcher keeps one connection for good, because the number it is asked for
// means something only on the same connection.
func (s *Store) openWatcher() error {
	watcher, err := sql.Open("sqlite", s.sqliteDSN("deferred"))
	if err != nil {
		return err
	}
	watcher.SetMaxOpenConns(1)
	watcher.SetMaxIdleConns(1)
	s.pools, s.watcher = append(s.pools, watcher), watcher
	return nil
}

// notEmptied refuses a database file without a byte in it beside a write-ahead
// log: SQLite would take it for a new one and drop the log.
func notEmptied(path string) error {
	info, err := os.Stat(path)
	if err != nil || info.Size() > 0 {
		return nil
	}
	if wal, err := os.Stat(path + "-wal"); err == nil && wal.Size() > 0 {
		return &Error{Doing: "open", What: path, Kind: ErrCorrupt, Why: "the file is empty but its log isn't", Would: "restore the latest backup; keep the file and its -wal"}
	}
	return nil
}

// sqliteDSN puts into the address what SQLite keeps for each connection.
func (s *Store) sqliteDSN(lock string) string {
	q := url.Values{}
	q.Add("_pragma", "busy_timeout("+strconv.FormatInt(s.options.BusyTimeout.Milliseconds(), 10)+")")
	q.Add("_pragma", "foreign_keys(1)")
	q.Add("_pragma", "synchronous(FULL)")
	q.Add("_pragma", "trusted_schema(0)")
	q.Add("_pragma", "cell_size_check(1)")
	q.Add("_pragma", "temp_store(2)") // journals of single statements stay in memory
	q.Add("_txlock", lock)
	cache := writerCacheKiB
	if lock == "deferred" {
		cache = readerCacheKiB
	}
	q.Add("_pragma", "cache_size(-"+strconv.Itoa(cache)+")")
	if s.options.ReadOnly {
		q.Add("mode", "ro")
		q.Add("_pragma", "query_only(1)")
	} else {
		q.Add("_pragma", "journal_mode(WAL)")
		if lock == "deferred" {
			q.Add("_pragma", "query_only(1)")
		}
	}
	path := filepath.ToSlash(s.path)
	return (&url.URL{Scheme: "file", Opaque: url.PathEscape(path), RawQuery: q.Encode()}).String()
}

// openMemory keeps one connection, because a database in memory belongs to its
// connection. A reader therefore waits for the writer.
func (s *Store) openMemory(ctx context.Context) error {
	pool, err := sql.Open("sqlite", "file::memory:?_pragma=foreign_keys(1)&_pragma=trusted_schema(0)&_txlock=immediate")
	if err != nil {
		return err
	}
	pool.SetMaxOpenConns(1)
	pool.SetMaxIdleConns(1)
	pool.SetConnMaxLifetime(0)
	s.pools = append(s.pools, pool)
	s.writer, err = openGorm(ctx, sqlite.New(sqlite.Config{Conn: pool}), pool)
	s.reader = s.writer
	return err
}

func (s *Store) openPostgres(ctx context.Context) error {
	pool, err := sql.Open("pgx", s.options.Database)
	if err != nil {
		return err
	}
	pool.SetMaxOpenConns(postgresConns)
	pool.SetMaxIdleConns(postgresConns)
	s.pools = append(s.pools, pool)
	s.writer, err = openGorm(ctx, postgres.New(postgres.Config{Conn: pool}), pool)
	s.reader = s.writer
	return err
}

func openGorm(ctx context.Context, dialector gorm.Dialector, pool *sql.DB) (*gorm.DB, error) {
	if err := pool.PingContext(ctx); err != nil {
		return nil, err
	}
	return gorm.Open(dialector, &gorm.Config{
		SkipDefaultTransaction: true,
		PrepareStmt:            statementsPrepared,
		Logger:                 logger.Discard,
		DisableAutomaticPing:   true,
	})
}

package inventory

import (
	"context"
	"embed"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/pressly/goose/v3"
)

// A migration that has shipped is never edited; the next number is added, for
// both engines.
//
//go:embed migrations/sqlite/*.sql migrations/postgres/*.sql
var migrations embed.FS

// schemaTable is where the numbers of the migrations that ran are kept.
const schemaTable = "schema_versions"

func (s *Store) migrator() (*goose.Provider, error) {
	dialect, folder := goose.DialectSQLite3, "migrations/sqlite"
	if s.engine == onPostgres {
		dialect, folder = goose.DialectPostgres, "migrations/postgres"
	}
	files, err := fs.Sub(migrations, folder)
	if err != nil {
		return nil, err
	}
	return goose.NewProvider(dialect, s.pools[0], files,
		goose.WithTableName(schemaTable), goose.WithDisableGlobalRegistry(true), goose.WithLogger(goose.NopLogger()))
}

// migrate refuses a newer schema, makes a backup of an older one that holds
// anything, and runs what is missing, each file in a transaction of its own.
func (s *Store) migrate(ctx context.Context) error {
	has, err := s.schemaVersion(ctx)
	if err != nil {
		return err
	}
	m, err := s.migrator()
	if err != nil {
		return err
	}
	sources := m.ListSources()
	wants := sources[len(sources)-1].Version
	switch {
	case has > wants:
		return &Error{Doing: "open", What: s.name(), Kind: ErrNewerSchema,
			Why:   fmt.Sprintf("its schema is number %d, this program knows up to %d", has, wants),
			Would: "use the newer program, or restore a backup from before the change"}
	case has == wants:
		return nil
	case s.options.ReadOnly:
		return &Error{Doing: "open", What: s.name(), Kind: ErrReadOnly,
			Why:   fmt.Sprintf("its schema is number %d and %d is needed", has, wants),
			Would: "open it once for writing"}
	}
	if has > 0 {
		if err := s.backupBefore(ctx, has); err != nil {
			return err
		}
	}
	_, err = m.Up(ctx)
	return err
}

// upgrade runs what is missing without a backup.
func (s *Store) upgrade(ctx context.Context) error {
	m, err := s.migrator()
	if err != nil {
		return err
	}
	_, err = m.Up(ctx)
	return err
}

// openAt opens a database for a restore: one without a schema is brought to the
// schema of the backup, so that its rows fit, and upgraded afterwards.
func openAt(ctx context.Context, o Options, version int64) (*Store, error) {
	const doing = "restore"
	s := &Store{options: o}
	s.options.Now = clockOr(o.Now)
	if o.BusyTimeout == 0 {
		s.options.BusyTimeout = defaultBusyTimeout
	}
	if err := s.open(ctx); err != nil {
		s.Close()
		return nil, err
	}
	if err := s.migrateTo(ctx, version); err != nil {
		s.Close()
		return nil, translate(doing, err)
	}
	return s, nil
}

func (s *Store) migrateTo(ctx context.Context, version int64) error {
	m, err := s.migrator()
	if err != nil {
		return err
	}
	sources := m.ListSources()
	if last := sources[len(sources)-1].Version; version > last {
		return &Error{Doing: "restore", Kind: ErrNewerSchema, Why: fmt.Sprintf("the backup's schema is number %d, this program knows up to %d", version, last), Would: "use the newer program"}
	}
	has, err := s.schemaVersion(ctx)
	if err != nil || has >= version {
		return err
	}
	_, err = m.UpTo(ctx, version)
	return err
}

// schemaVersion returns the highest migration that ran, 0 for a new database.
func (s *Store) schemaVersion(ctx context.Context) (int64, error) {
	var there int
	query := "SELECT count(*) FROM sqlite_master WHERE type = 'table' AND name = ?"
	if s.engine == onPostgres {
		query = "SELECT count(*) FROM information_schema.tables WHERE table_schema = current_schema() AND table_name = $1"
	}
	if err := s.pools[0].QueryRowContext(ctx, query, schemaTable).Scan(&there); err != nil || there == 0 {
		return 0, err
	}
	var version int64
	err := s.pools[0].QueryRowContext(ctx, "SELECT coalesce(max(version_id), 0) FROM "+schemaTable).Scan(&version)
	return version, err
}

// name says which database this is, without a password.
func (s *Store) name() string {
	switch {
	case s.path != "":
		return s.path
	case s.engine == onPostgres:
		return "the PostgreSQL database"
	}
	return "the database in memory"
}

// backupDir is where automatic backups go: the data folder's, or for a database
// elsewhere a folder in the working directory.
func (s *Store) backupDir() string {
	if s.options.Dir != "" {
		return filepath.Join(s.options.Dir, "backups")
	}
	return "stillroom-backups"
}

func (s *Store) backupBefore(ctx context.Context, version int64) error {
	dir := s.backupDir()
	if err := os.MkdirAll(dir, 0o700); err != nil {
		return err
	}
	name := fmt.Sprintf("before-schema-after-%d-%s", version, s.options.Now().UTC().Format("20060102-150405"))
	return s.backupOld(ctx, filepath.Join(dir, name))
}

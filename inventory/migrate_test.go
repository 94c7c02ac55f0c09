package inventory

import (
	"context"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"testing"
)

var update = flag.Bool("update", false, "write the archives of earlier schemas that are missing in testdata")

// lastSchema is the number of the newest migration.
func lastSchema(t *testing.T, s *Store) int64 {
	t.Helper()
	m, err := s.migrator()
	if err != nil {
		t.Fatal(err)
	}
	sources := m.ListSources()
	return sources[len(sources)-1].Version
}

// A filled database of every earlier schema is brought up to date, after a
// backup, with everything in it.
func TestMigrateFromEverySchema(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		last, o := lastSchema(t, s), s.options
		if o.Database != "" {
			s.Close()
		}
		for version := int64(1); version < last; version++ {
			o.Dir = t.TempDir()
			if o.Database != "" {
				o.Database = postgresAddress(t)
			}
			ctx := context.Background()
			old, err := openAt(ctx, o, version)
			if err != nil {
				t.Fatal(err)
			}
			used(t, old)
			entries := entriesOf(t, old)
			old.Close()
			s, err := Open(ctx, o)
			if err != nil {
				t.Fatalf("from schema %d: %v", version, err)
			}
			if got := entriesOf(t, s); len(got) != len(entries) {
				t.Errorf("from schema %d: %d entries, want %d", version, len(got), len(entries))
			}
			mustCheck(t, s)
			if found, err := s.Search(ctx, "titrate"); err != nil || len(found.Bottles) == 0 {
				t.Errorf("from schema %d: notes aren't found: %v", version, err)
			}
			s.Close()
			restoreTheBackup(t, o.Dir, entries)
		}
	})
}

// restoreTheBackup opens the backup that was made before the change.
func restoreTheBackup(t *testing.T, dir string, entries []Entry) {
	t.Helper()
	backups, err := filepath.Glob(filepath.Join(dir, "backups", "*"))
	if err != nil || len(backups) != 1 {
		t.Fatalf("backups %v, %v", backups, err)
	}
	into := Options{Dir: t.TempDir(), Now: noon}
	if _, err := Restore(context.Background(), backups[0], into); err != nil {
		t.Fatal(err)
	}
	s := openIn(t, into.Dir)
	if got := entriesOf(t, s); len(got) != len(entries) {
		t.Errorf("the backup has %d entries, want %d", len(got), len(entries))
	}
	mustCheck(t, s)
}

// Archives that earlier schemas wrote are kept in testdata and can always be
// restored, on either engine.
func TestRestoreEarlierArchives(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		for version := int64(1); version <= lastSchema(t, s); version++ {
			path := filepath.Join("testdata", "earlier", fmt.Sprintf("schema-%d.archive", version))
			if _, err := os.Stat(path); err != nil && *update {
				writeEarlier(t, path, version)
			}
			into := Options{Dir: t.TempDir(), Now: noon}
			if s.engine == onPostgres {
				into.Database = postgresAddress(t)
			}
			if _, err := Restore(context.Background(), path, into); err != nil {
				t.Errorf("schema %d: %v", version, err)
				continue
			}
			back, err := Open(context.Background(), into)
			if err != nil {
				t.Fatal(err)
			}
			report := mustCheck(t, back)
			// The demonstration lab of the day it was written: 88 bottles.
			if report.Bottles != 88 || report.Entries < 200 {
				t.Errorf("schema %d: %d bottles and %d entries", version, report.Bottles, report.Entries)
			}
			back.Close()
		}
	})
}

func writeEarlier(t *testing.T, path string, version int64) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
		t.Fatal(err)
	}
	old, err := openAt(context.Background(), Options{Dir: t.TempDir(), Now: noon}, version)
	if err != nil {
		t.Fatal(err)
	}
	defer old.Close()
	if err := used(t, old).Backup(context.Background(), path); err != nil {
		t.Fatal(err)
	}
}

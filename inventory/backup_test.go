package inventory

import (
	"bytes"
	"context"
	"errors"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"
	"time"
)

// used puts some life into the demonstration lab.
func used(t testing.TB, s *Store) *Store {
	t.Helper()
	ctx := context.Background()
	filled(t, s)
	shelf, err := s.Load(ctx)
	if err != nil {
		t.Fatal(err)
	}
	for _, b := range shelf.Bottles {
		if b.State == Opened && b.Content-b.Promised > 10 {
			if _, err := s.Draw(ctx, Taking{b.Code, 7, 0}, Act{By: "Rut Halvard", Why: "“α” & <test>", Key: b.Code}); err != nil {
				t.Fatal(err)
			}
		}
	}
	return s
}

func entriesOf(t testing.TB, s *Store) (entries []Entry) {
	t.Helper()
	if err := s.reader.Order("store_id, seq").Find(&entries).Error; err != nil {
		t.Fatal(err)
	}
	return entries
}

func mustCheck(t testing.TB, s *Store) CheckReport {
	t.Helper()
	report, err := s.Check(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range report.Faults {
		t.Error(f)
	}
	return report
}

func same(t testing.TB, got, want *Store) {
	t.Helper()
	if !reflect.DeepEqual(entriesOf(t, got), entriesOf(t, want)) {
		t.Error("the ledgers differ")
	}
	a, err := got.Load(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	b, err := want.Load(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(a, b) {
		t.Error("the shelves differ")
	}
	if report := mustCheck(t, got); report.Entries == 0 || report.Bottles == 0 {
		t.Errorf("checked %+v", report)
	}
}

// A backup of either kind and of either engine carries every row and hash.
func TestBackupAndRestore(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		used(t, s)
		ctx := context.Background()
		dir := t.TempDir()
		names := []string{"stock.archive"}
		if s.engine == onSQLite {
			names = append(names, "stock.db")
		}
		for _, name := range names {
			path := filepath.Join(dir, name)
			if err := s.Backup(ctx, path); err != nil {
				t.Fatal(err)
			}
			if err := s.Backup(ctx, path); !errors.Is(err, ErrDuplicate) {
				t.Errorf("over an existing file: %v", err)
			}
			into := Options{Dir: filepath.Join(dir, "from-"+name), Now: noon}
			rows, err := Restore(ctx, path, into)
			if err != nil || rows == 0 {
				t.Fatalf("Restore(%s): %d rows, %v", name, rows, err)
			}
			same(t, openIn(t, into.Dir), s)
			if _, err := Restore(ctx, path, into); !errors.Is(err, ErrDuplicate) {
				t.Errorf("into a stock: %v", err)
			}
		}
	})
}

func TestRestoreSQLiteIntoPostgres(t *testing.T) {
	address := postgresAddress(t)
	lite := used(t, openIn(t, t.TempDir()))
	ctx := context.Background()
	path := filepath.Join(t.TempDir(), "stock.db")
	if err := lite.Backup(ctx, path); err != nil {
		t.Fatal(err)
	}
	if _, err := Restore(ctx, path, Options{Database: address, Now: noon}); err != nil {
		t.Fatal(err)
	}
	post, err := Open(ctx, Options{Database: address, Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	defer post.Close()
	same(t, post, lite)
	// The new engine goes on where the old one ended.
	b := open1(t, post, "permanganate open")
	if _, err := post.Draw(ctx, Taking{b.Code, 1, 0}, clerk); err != nil {
		t.Error(err)
	}
	mustCheck(t, post)
}

func TestRestoreRefusesDamage(t *testing.T) {
	ctx := context.Background()
	s := used(t, openIn(t, t.TempDir()))
	dir := t.TempDir()
	path := filepath.Join(dir, "stock.archive")
	if err := s.Backup(ctx, path); err != nil {
		t.Fatal(err)
	}
	whole, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	flipped := slices.Clone(whole)
	flipped[len(flipped)/2] ^= 0x10
	for name, data := range map[string][]byte{
		"cut": whole[:len(whole)/2], "cut at the end": whole[:len(whole)-6], "flipped": flipped, "empty": {}, "other": []byte("name,cas\n"),
	} {
		bad := filepath.Join(dir, name)
		if err := os.WriteFile(bad, data, 0o600); err != nil {
			t.Fatal(err)
		}
		into := Options{Dir: filepath.Join(dir, "into "+name), Now: noon}
		if _, err := Restore(ctx, bad, into); !errors.Is(err, ErrCorrupt) {
			t.Errorf("%s: %v, want ErrCorrupt", name, err)
		}
		if left, err := openIn(t, into.Dir).Load(ctx); err != nil || len(left.Bottles) > 0 {
			t.Errorf("%s: %d bottles left behind, %v", name, len(left.Bottles), err)
		}
	}
}

func TestBackupDuringWrites(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		used(t, s)
		ctx := context.Background()
		b := open1(t, s, "permanganate open")
		stop, stopped := make(chan bool), make(chan bool)
		go func() {
			defer close(stopped)
			for {
				select {
				case <-stop:
					return
				default:
					if _, err := s.Draw(ctx, Taking{b.Code, 1, 0}, clerk); err != nil {
						t.Error(err)
						return
					}
				}
			}
		}()
		for i, name := range []string{"a.archive", "b.archive", "c.archive"} {
			path := filepath.Join(t.TempDir(), name)
			if err := s.Backup(ctx, path); err != nil {
				t.Fatal(err)
			}
			into := Options{Dir: filepath.Join(t.TempDir(), name), Now: noon}
			if _, err := Restore(ctx, path, into); err != nil {
				t.Errorf("backup %d: %v", i, err)
			}
			mustCheck(t, openIn(t, into.Dir))
		}
		close(stop)
		<-stopped
	})
}

// Whoever gets round the triggers is found out.
func TestCheckFindsTampering(t *testing.T) {
	for _, c := range []struct{ query, what string }{
		{"UPDATE ledger SET amount = amount - 1, content = content - 1 WHERE seq = 20", "hash chain"},
		{"UPDATE ledger SET by_whom = 'somebody else' WHERE seq = 20", "hash chain"},
		{"DELETE FROM ledger WHERE seq = 20", "hash chain"},
		{"DELETE FROM ledger WHERE store_id = 1 AND seq = (SELECT max(seq) FROM ledger WHERE store_id = 1)", "hash chain"},
		{"UPDATE bottles SET content = content + 1 WHERE id = 3", "ledger"},
		{"UPDATE bottles SET promised = promised + 1 WHERE id = 3", "promises"},
		{"DELETE FROM earmarks WHERE run_id = 2", "promises"},
		{"UPDATE bottles SET code = 'B00000' WHERE id = 3", "codes"},
		{"UPDATE substances SET cas = '71-41-1' WHERE cas = '71-41-0'", "codes"},
		{"UPDATE bottles SET place_id = 21 WHERE id = 3", "references"},
	} {
		s := filled(t, openIn(t, t.TempDir()))
		for _, q := range []string{"DROP TRIGGER ledger_no_update", "DROP TRIGGER ledger_no_delete", c.query} {
			if err := s.writer.Exec(q).Error; err != nil {
				t.Fatalf("%s: %v", q, err)
			}
		}
		report, err := s.Check(context.Background())
		if err != nil {
			t.Fatal(err)
		}
		if !slices.ContainsFunc(report.Faults, func(f Fault) bool { return f.What == c.what }) {
			t.Errorf("%s: found %v, want a fault of the %s", c.query, report.Faults, c.what)
		}
	}
}

func TestNewerSchemaIsRefused(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		if err := s.writer.Exec("INSERT INTO "+schemaTable+" (version_id, is_applied) VALUES (9999, ?)", true).Error; err != nil {
			t.Fatal(err)
		}
		again, err := Open(context.Background(), Options{Dir: s.options.Dir, Database: s.options.Database})
		if !errors.Is(err, ErrNewerSchema) {
			t.Errorf("Open: %v, want ErrNewerSchema", err)
		}
		if err == nil {
			again.Close()
		}
	})
}

// Numbers with wrong digits from the CAS pages' own kind: water is 7732-18-5
// (CAS, "Check Digit Verification of CAS Registry Numbers").
func TestValidCAS(t *testing.T) {
	for cas, want := range map[string]bool{
		"7732-18-5": true, "7789-12-0": true, "71-41-0": true, "10588-01-9": true, "61790-53-2": true,
		"7732-18-4": false, "7732-81-5": false, "7732185": false, "": false, "1-1-1": false, "773-218-5": false, "77a2-18-5": false,
	} {
		if got := ValidCAS(cas); got != want {
			t.Errorf("ValidCAS(%q) = %v, want %v", cas, got, want)
		}
	}
}

func TestArchiveHasEveryTable(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		query := "SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite_%'"
		if s.engine == onPostgres {
			query = "SELECT table_name FROM information_schema.tables WHERE table_schema = current_schema()"
		}
		var tables []string
		if err := s.reader.Raw(query).Scan(&tables).Error; err != nil {
			t.Fatal(err)
		}
		for _, table := range tables {
			if table != schemaTable && table != "catalogue" && !strings.HasPrefix(table, "search") && !knownTable(table) {
				t.Errorf("table %s isn't in the archive", table)
			}
		}
		var out bytes.Buffer
		if err := s.WriteArchive(context.Background(), &out); err != nil || out.Len() == 0 {
			t.Errorf("an empty stock: %d bytes, %v", out.Len(), err)
		}
	})
}

func TestStampKeepsItsWidth(t *testing.T) {
	for _, at := range []time.Time{noon(), noon().Add(5 * time.Millisecond), noon().Add(123456789)} {
		if got := StampOf(at).String(); len(got) != len(stampLayout) {
			t.Errorf("%q is %d long", got, len(got))
		}
	}
}

package inventory

import (
	"context"
	"errors"
	"math/rand/v2"
	"os"
	"path/filepath"
	"reflect"
	"testing"
	"time"
)

func TestDiskFull(t *testing.T) {
	s := filled(t, openIn(t, t.TempDir()))
	ctx := context.Background()
	b := open1(t, s, "permanganate open")
	var pages int
	if err := s.writer.Raw("PRAGMA page_count").Row().Scan(&pages); err != nil {
		t.Fatal(err)
	}
	// The engine's own limit gives the same code as a full disk.
	if err := s.writer.Exec("PRAGMA max_page_count = 1").Error; err != nil {
		t.Fatal(err)
	}
	taken := 0
	var err error
	for range 2000 {
		if _, err = s.Draw(ctx, Taking{b.Code, 1, 0}, Act{By: "x", Why: string(make([]byte, 200))}); err != nil {
			break
		}
		taken++
	}
	if !errors.Is(err, ErrFull) {
		t.Fatalf("after %d draws: %v, want ErrFull", taken, err)
	}
	after, err := s.Bottle(ctx, b.Code)
	if err != nil || after.Content != b.Content-int64(taken) {
		t.Errorf("%d draws and a content of %d from %d, %v", taken, after.Content, b.Content, err)
	}
	mustCheck(t, s)
	if err := s.writer.Exec("PRAGMA max_page_count = 1000000").Error; err != nil {
		t.Fatal(err)
	}
	if _, err := s.Draw(ctx, Taking{b.Code, 1, 0}, clerk); err != nil {
		t.Errorf("with space again: %v", err)
	}
}

func TestReadOnly(t *testing.T) {
	dir := t.TempDir()
	filled(t, openIn(t, dir)).Close()
	ctx := context.Background()
	s, err := Open(ctx, Options{Dir: dir, ReadOnly: true, Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	mustCheck(t, s)
	b := open1(t, s, "permanganate open")
	if _, err := s.Draw(ctx, Taking{b.Code, 1, 0}, clerk); !errors.Is(err, ErrReadOnly) {
		t.Errorf("Draw: %v, want ErrReadOnly", err)
	}
}

func TestLocked(t *testing.T) {
	dir := t.TempDir()
	filled(t, openIn(t, dir)).Close()
	ctx := context.Background()
	one, err := Open(ctx, Options{Dir: dir, Now: noon, BusyTimeout: 50 * time.Millisecond})
	if err != nil {
		t.Fatal(err)
	}
	defer one.Close()
	two := openIn(t, dir)
	other := two.writer.Begin()
	if other.Error != nil {
		t.Fatal(other.Error)
	}
	b := open1(t, one, "permanganate open")
	if _, err := one.Draw(ctx, Taking{b.Code, 1, 0}, clerk); !errors.Is(err, ErrBusy) {
		t.Errorf("Draw: %v, want ErrBusy", err)
	}
	if _, err := one.Load(ctx); err != nil {
		t.Errorf("a reader waits for the writer: %v", err)
	}
	other.Rollback()
	if _, err := one.Draw(ctx, Taking{b.Code, 1, 0}, clerk); err != nil {
		t.Errorf("after the lock: %v", err)
	}
}

// wholeFile returns a filled database as one file without a log.
func wholeFile(t *testing.T) (data []byte, entries []Entry, shelf *Shelf) {
	t.Helper()
	s := used(t, openIn(t, t.TempDir()))
	path := filepath.Join(t.TempDir(), "whole.db")
	if err := s.Backup(context.Background(), path); err != nil {
		t.Fatal(err)
	}
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if shelf, err = s.Load(context.Background()); err != nil {
		t.Fatal(err)
	}
	return data, entriesOf(t, s), shelf
}

// examine opens a damaged file and says whether that, loading or checking found
// anything.
func examine(t *testing.T, data []byte) (found bool, entries []Entry, shelf *Shelf) {
	t.Helper()
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, File), data, 0o600); err != nil {
		t.Fatal(err)
	}
	ctx := context.Background()
	s, err := Open(ctx, Options{Dir: dir, Now: noon})
	if err != nil {
		return true, nil, nil
	}
	defer s.Close()
	report, err := s.Check(ctx)
	if err != nil || len(report.Faults) > 0 {
		return true, nil, nil
	}
	if shelf, err = s.Load(ctx); err != nil {
		return true, nil, nil
	}
	if err := s.reader.Order("store_id, seq").Find(&entries).Error; err != nil {
		return true, nil, nil
	}
	return false, entries, shelf
}

func TestTruncated(t *testing.T) {
	data, entries, shelf := wholeFile(t)
	for _, size := range []int{50, 100, 4096, 5000, len(data) / 2, len(data) - 4096, len(data) - 1} {
		found, gotEntries, gotShelf := examine(t, data[:size])
		if !found && !(reflect.DeepEqual(gotEntries, entries) && reflect.DeepEqual(gotShelf, shelf)) {
			t.Errorf("%d of %d bytes: something is lost, and it wasn't found", size, len(data))
		}
	}
}

func TestTruncatedToNothingBesideItsLog(t *testing.T) {
	dir := t.TempDir()
	for name, data := range map[string]string{File: "", File + "-wal": "something"} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(data), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	if s, err := Open(context.Background(), Options{Dir: dir}); !errors.Is(err, ErrCorrupt) {
		t.Errorf("Open: %v, want ErrCorrupt", err)
		if err == nil {
			s.Close()
		}
	}
}

// A flipped bit is found, or it hit nothing that counts: the ledger and the
// whole shelf are then as they were.
func TestBitFlips(t *testing.T) {
	data, entries, shelf := wholeFile(t)
	random := rand.New(rand.NewPCG(7, 11))
	flips, foundFlips := 250, 0
	if testing.Short() {
		flips = 20
	}
	for range flips {
		at, bit := random.IntN(len(data)), random.IntN(8)
		bad := append([]byte(nil), data...)
		bad[at] ^= 1 << bit
		found, gotEntries, gotShelf := examine(t, bad)
		if found {
			foundFlips++
			continue
		}
		if !reflect.DeepEqual(gotEntries, entries) {
			t.Errorf("bit %d of byte %d changed the ledger and wasn't found", bit, at)
		}
		for i := range gotShelf.Bottles {
			gotShelf.Bottles[i].Version = shelf.Bottles[i].Version // only a count of changes, and not guarded
		}
		if !reflect.DeepEqual(gotShelf, shelf) {
			t.Errorf("bit %d of byte %d changed the shelf and wasn't found", bit, at)
		}
	}
	t.Logf("%d of %d flips found", foundFlips, flips)
}

package inventory

import (
	"bytes"
	"context"
	"database/sql"
	"flag"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
	"time"
)

// How many bottles the benchmarks have in stock, and how many ledger entries
// for each of them.
var (
	benchBottles = flag.Int("bottles", 10_000, "bottles in stock in benchmarks")
	benchEntries = flag.Int("entries", 1, "ledger entries for each bottle in benchmarks")
)

// benchList is a stock list of n bottles over some hundred substances.
func benchList(n int) string {
	shelf := NewShelf(DemoLab(demoDay))
	var b strings.Builder
	b.WriteString("Name,CAS,Purity,Size,Remaining,Location,Lot,Own number,Received,Note\n")
	for i := range n {
		from := shelf.Bottles[i%len(shelf.Bottles)]
		form, _ := shelf.Form(from.FormID)
		substance, _ := shelf.SubstanceByID(form.SubstanceID)
		unit := map[Measure]string{ByMass: "g", ByVolume: "mL", ByCount: "pcs"}[form.Measure]
		note := ""
		if i%50 == 0 {
			note = fmt.Sprintf("batch %d of the pilot", i)
		}
		fmt.Fprintf(&b, "\"%s\",%s,,%d %s,%d %s,Main store > Room %d > Cabinet %d > shelf %d,L%05d,N-%07d,2026-01-%02d,%s\n",
			substance.Name, substance.CAS, 1000, unit, 100+i%900, unit, i%7, i%40, i%5, i%20000, i, 1+i%28, note)
	}
	return b.String()
}

// stocked returns a store with n bottles; it is made once for each n.
func stocked(b *testing.B, n int) *Store {
	b.Helper()
	s, ok := benchStores[n]
	if ok {
		return s
	}
	dir, err := os.MkdirTemp("", "stillroom-bench")
	if err != nil {
		b.Fatal(err)
	}
	benchDirs = append(benchDirs, dir)
	s, err = Open(context.Background(), Options{Dir: dir, Now: noon})
	if err != nil {
		b.Fatal(err)
	}
	importList(b, s, benchList(n))
	moreEntries(b, s, *benchEntries)
	benchStores[n] = s
	return s
}

var (
	benchStores = map[int]*Store{}
	benchDirs   []string
)

func importList(b *testing.B, s *Store, list string) ImportReport {
	b.Helper()
	table, err := ReadTable("bench.csv", strings.NewReader(list))
	if err != nil {
		b.Fatal(err)
	}
	report, err := s.Import(context.Background(), table, Match(table), ImportOptions{Act: clerk})
	if err != nil || len(report.Refused) > 0 {
		b.Fatal(err, len(report.Refused), " refused")
	}
	return report
}

// moreEntries gives every bottle further entries, in one transaction.
func moreEntries(b *testing.B, s *Store, each int) {
	b.Helper()
	if each < 2 {
		return
	}
	tx := s.writer.Begin()
	var bottles []Bottle
	if err := tx.Order("id").Find(&bottles).Error; err != nil {
		b.Fatal(err)
	}
	heads := map[int64]*chain{}
	out := newBulk(tx, s.engine, "ledger", "store_id", "seq", "bottle_id", "kind", "amount", "content", "by_whom", "at", "why", "hash")
	for range each - 1 {
		for i := range bottles {
			row := &bottles[i]
			head := heads[row.StoreID]
			if head == nil {
				head = &chain{}
				if err := tx.Where("store_id = ?", row.StoreID).Take(head).Error; err != nil {
					b.Fatal(err)
				}
				heads[row.StoreID] = head
			}
			row.Content--
			e := Entry{StoreID: row.StoreID, Seq: head.Seq + 1, BottleID: row.ID, Kind: Drawn, Amount: -1, Content: row.Content, ByWhom: "bench", At: s.stamp()}
			e.Hash = chainHash(head.Hash, &e)
			head.Seq, head.Hash = e.Seq, e.Hash
			if err := out.add(e.StoreID, e.Seq, e.BottleID, string(e.Kind), e.Amount, e.Content, e.ByWhom, e.At.String(), "", e.Hash); err != nil {
				b.Fatal(err)
			}
		}
	}
	if err := out.flush(); err != nil {
		b.Fatal(err)
	}
	for _, head := range heads {
		if err := tx.Save(head).Error; err != nil {
			b.Fatal(err)
		}
	}
	if err := tx.Exec("UPDATE bottles SET content = content - ?", each-1).Error; err != nil {
		b.Fatal(err)
	}
	if err := tx.Commit().Error; err != nil {
		b.Fatal(err)
	}
}

// growth reports the exponent of a time between a tenth of the size and the
// whole: 1 is in proportion.
func growth(b *testing.B, small, large time.Duration) {
	b.ReportMetric(math.Log10(float64(large)/float64(small)), "exponent")
}

func BenchmarkImport(b *testing.B) {
	one := func(n int) time.Duration {
		list := benchList(n)
		s, err := Open(context.Background(), Options{Dir: b.TempDir(), Now: noon})
		if err != nil {
			b.Fatal(err)
		}
		defer s.Close()
		from := time.Now()
		importList(b, s, list)
		return time.Since(from)
	}
	for b.Loop() {
		small, large := one(*benchBottles/10), one(*benchBottles)
		bare := bareImport(b, b.TempDir(), *benchBottles)
		b.ReportMetric(float64(*benchBottles)/large.Seconds(), "rows/s")
		b.ReportMetric(float64(*benchBottles)/bare.Seconds(), "bare/s")
		b.ReportMetric(bare.Seconds()/large.Seconds(), "share")
		growth(b, small, large)
	}
}

// bareImport is what the engine does alone with as many rows: the same pragmas,
// a row with a unique code into a table like that of the bottles and one into a
// table like the ledger, each by a prepared statement, all in one transaction.
func bareImport(b *testing.B, dir string, n int) time.Duration {
	b.Helper()
	pool := bareEngine(b, dir, "CREATE TABLE b (id INTEGER PRIMARY KEY, c TEXT UNIQUE, f INTEGER, p INTEGER, l TEXT, a INTEGER) STRICT",
		"CREATE TABLE l (id INTEGER PRIMARY KEY, b INTEGER, a INTEGER, t TEXT, h BLOB) STRICT")
	from := time.Now()
	tx, err := pool.Begin()
	if err != nil {
		b.Fatal(err)
	}
	bottle, err := tx.Prepare("INSERT INTO b (id, c, f, p, l, a) VALUES (?, ?, ?, ?, ?, ?)")
	if err != nil {
		b.Fatal(err)
	}
	entry, err := tx.Prepare("INSERT INTO l (b, a, t, h) VALUES (?, ?, ?, ?)")
	if err != nil {
		b.Fatal(err)
	}
	hash := make([]byte, 32)
	for i := range int64(n) {
		if _, err := bottle.Exec(i, MakeCode(BottleCode, i), i%100, i%1400, "L00001", i); err != nil {
			b.Fatal(err)
		}
		if _, err := entry.Exec(i, i, "2026-12-01T12:00:00.000Z", hash); err != nil {
			b.Fatal(err)
		}
	}
	if err := tx.Commit(); err != nil {
		b.Fatal(err)
	}
	return time.Since(from)
}

// bareEngine opens a database of its own with the pragmas of a Store's writer.
func bareEngine(b *testing.B, dir string, tables ...string) *sql.DB {
	b.Helper()
	bare := &Store{options: Options{Dir: dir, BusyTimeout: time.Second}, path: filepath.Join(dir, "bare.db")}
	pool, err := sql.Open("sqlite", bare.sqliteDSN("immediate"))
	if err != nil {
		b.Fatal(err)
	}
	b.Cleanup(func() { pool.Close() })
	pool.SetMaxOpenConns(1)
	for _, q := range tables {
		if _, err := pool.Exec(q); err != nil {
			b.Fatal(err)
		}
	}
	return pool
}

// bareDraws is what the engine does alone: the same pragmas, one row into a
// table like the ledger and one changed in each transaction.
func bareDraws(b *testing.B, dir string, n int) time.Duration {
	b.Helper()
	pool := bareEngine(b, dir, "CREATE TABLE l (id INTEGER PRIMARY KEY, b INTEGER, a INTEGER, t TEXT, h BLOB) STRICT",
		"CREATE TABLE b (id INTEGER PRIMARY KEY, c INTEGER) STRICT", "INSERT INTO b VALUES (1, 0)")
	defer pool.Close()
	insert, err := pool.Prepare("INSERT INTO l (b, a, t, h) VALUES (1, -1, ?, ?)")
	if err != nil {
		b.Fatal(err)
	}
	change, err := pool.Prepare("UPDATE b SET c = c + 1 WHERE id = 1")
	if err != nil {
		b.Fatal(err)
	}
	from := time.Now()
	for range n {
		tx, err := pool.Begin()
		if err != nil {
			b.Fatal(err)
		}
		if _, err := tx.Stmt(insert).Exec("2026-12-01T12:00:00.000Z", make([]byte, 32)); err != nil {
			b.Fatal(err)
		}
		if _, err := tx.Stmt(change).Exec(); err != nil {
			b.Fatal(err)
		}
		if err := tx.Commit(); err != nil {
			b.Fatal(err)
		}
	}
	return time.Since(from)
}

// BenchmarkDraw sets durable draws beside the bare engine's transactions.
func BenchmarkDraw(b *testing.B) {
	s := stocked(b, *benchBottles)
	ctx := context.Background()
	var code string
	if err := s.reader.Raw("SELECT code FROM bottles WHERE content > 100000000 ORDER BY id LIMIT 1").Row().Scan(&code); err != nil {
		b.Fatal(err)
	}
	const n = 500
	var ours, bare time.Duration
	for b.Loop() {
		from := time.Now()
		for range n {
			if _, err := s.Draw(ctx, Taking{code, 1, 0}, clerk); err != nil {
				b.Fatal(err)
			}
		}
		ours += time.Since(from)
		bare += bareDraws(b, b.TempDir(), n)
	}
	all := float64(n * b.N)
	b.ReportMetric(all/ours.Seconds(), "draws/s")
	b.ReportMetric(all/bare.Seconds(), "bare/s")
	b.ReportMetric(bare.Seconds()/ours.Seconds(), "share")
}

func BenchmarkSearch(b *testing.B) {
	s := stocked(b, *benchBottles)
	ctx := context.Background()
	queries := []string{"e", "et", "eth", "ethyl", "ethyl ac", "ethyl acetate", "sodum dichr", "L00123", "N-0000", "N-0004711", "cabinet 12", "pilot", "batch 50", "141-78", "Na2", "B0"}
	var times []time.Duration
	for b.Loop() {
		for i := range 20 * len(queries) {
			q := queries[i%len(queries)]
			from := time.Now()
			if _, err := s.Search(ctx, q); err != nil {
				b.Fatal(err)
			}
			times = append(times, time.Since(from))
		}
	}
	slices.Sort(times)
	b.ReportMetric(float64(times[len(times)*99/100].Microseconds())/1000, "p99-ms")
	b.ReportMetric(float64(times[len(times)/2].Microseconds())/1000, "median-ms")
}

// BenchmarkBottlePage reads what the page of a bottle shows.
func BenchmarkBottlePage(b *testing.B) {
	s := stocked(b, *benchBottles)
	ctx := context.Background()
	code := MakeCode(BottleCode, int64(*benchBottles/2))
	for b.Loop() {
		if _, _, err := s.LoadBottle(ctx, code); err != nil {
			b.Fatal(err)
		}
		if _, err := s.Ledger(ctx, code, 50); err != nil {
			b.Fatal(err)
		}
		if _, err := s.States(ctx, code); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkOpen opens a database that is there, as a start does.
func BenchmarkOpen(b *testing.B) {
	dir := stocked(b, *benchBottles).options.Dir
	for b.Loop() {
		s, err := Open(context.Background(), Options{Dir: dir, Now: noon})
		if err != nil {
			b.Fatal(err)
		}
		s.Close()
	}
}

func BenchmarkLoad(b *testing.B) {
	large, small := stocked(b, *benchBottles), stocked(b, *benchBottles/10)
	load := func(s *Store) time.Duration {
		from := time.Now()
		if _, err := s.load(context.Background()); err != nil {
			b.Fatal(err)
		}
		return time.Since(from)
	}
	for b.Loop() {
		growth(b, load(small), load(large))
	}
	var m runtime.MemStats
	runtime.ReadMemStats(&m)
	b.ReportMetric(float64(m.Sys)/1e6, "MB")
}

// BenchmarkLoadAgain loads when nothing was written since.
func BenchmarkLoadAgain(b *testing.B) {
	s := stocked(b, *benchBottles)
	for b.Loop() {
		if _, err := s.Load(context.Background()); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkBackup(b *testing.B) {
	s := stocked(b, *benchBottles)
	for b.Loop() {
		var out bytes.Buffer
		if err := s.WriteArchive(context.Background(), &out); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkCheck(b *testing.B) {
	large, small := stocked(b, *benchBottles), stocked(b, *benchBottles/10)
	check := func(s *Store) time.Duration {
		from := time.Now()
		report, err := s.Check(context.Background())
		if err != nil || len(report.Faults) > 0 {
			b.Fatal(report, err)
		}
		return time.Since(from)
	}
	for b.Loop() {
		growth(b, check(small), check(large))
	}
}

// BenchmarkBrowse reads a page of the shelf in the usual order, once after a
// write and again without one, and by date, which looks at every bottle.
func BenchmarkBrowse(b *testing.B) {
	s := stocked(b, *benchBottles)
	ctx := context.Background()
	browse := func(q Browse) float64 {
		from := time.Now()
		page, err := s.Browse(ctx, q)
		if err != nil || len(page.Bottles) != 50 {
			b.Fatal(len(page.Bottles), err)
		}
		return float64(time.Since(from).Microseconds()) / 1000
	}
	for b.Loop() {
		s.counted.Store(nil)
		b.ReportMetric(browse(Browse{Page: 2, Rows: 50}), "counting-ms")
		b.ReportMetric(browse(Browse{Page: 2, Rows: 50}), "again-ms")
		b.ReportMetric(browse(Browse{Sort: "expiry", Rows: 50}), "by-date-ms")
	}
}

package inventory

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"net/url"
	"os"
	"reflect"
	"strings"
	"sync"
	"testing"
	"time"
)

// clerk is who does things in tests.
var clerk = Act{By: "Rut Halvard", Why: "test"}

// noon of the demonstration day is the tests' clock.
func noon() time.Time { return demoDay.Time().Add(12 * time.Hour) }

// onEngines runs a test on an empty store of each engine.
func onEngines(t *testing.T, f func(t *testing.T, s *Store)) {
	t.Helper()
	t.Run("sqlite", func(t *testing.T) {
		f(t, openIn(t, t.TempDir()))
	})
	t.Run("postgres", func(t *testing.T) {
		f(t, openPostgresTest(t))
	})
}

func openIn(t testing.TB, dir string) *Store {
	t.Helper()
	s, err := Open(context.Background(), Options{Dir: dir, Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { s.Close() })
	return s
}

// postgresAddress returns the address of an empty schema of the server in
// STILLROOM_POSTGRES.
func postgresAddress(t testing.TB) string {
	t.Helper()
	address := os.Getenv("STILLROOM_POSTGRES")
	if address == "" {
		if os.Getenv("STILLROOM_CI") == "1" {
			t.Fatal("STILLROOM_POSTGRES is not set, and here it must be")
		}
		t.Skip("no PostgreSQL to test on: set STILLROOM_POSTGRES to its address")
	}
	pool, err := sql.Open("pgx", address)
	if err != nil {
		t.Fatal(err)
	}
	schema := fmt.Sprintf("stillroom_test_%d_%d", os.Getpid(), time.Now().UnixNano())
	if _, err := pool.Exec("CREATE SCHEMA " + schema); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() {
		if _, err := pool.Exec("DROP SCHEMA " + schema + " CASCADE"); err != nil {
			t.Error(err)
		}
		pool.Close()
	})
	u, err := url.Parse(address)
	if err != nil {
		t.Fatal(err)
	}
	q := u.Query()
	q.Set("search_path", schema)
	u.RawQuery = q.Encode()
	return u.String()
}

func openPostgresTest(t testing.TB) *Store {
	t.Helper()
	s, err := Open(context.Background(), Options{Database: postgresAddress(t), Dir: t.TempDir(), Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { s.Close() })
	return s
}

// filled writes the demonstration lab into a store.
func filled(t testing.TB, s *Store) *Store {
	t.Helper()
	if err := s.Fill(context.Background(), DemoLab(demoDay), clerk); err != nil {
		t.Fatal(err)
	}
	return s
}

// What is written comes back, record by record.
func TestFillAndLoad(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		filled(t, s)
		got, err := s.Load(context.Background())
		if err != nil {
			t.Fatal(err)
		}
		want := NewShelf(DemoLab(demoDay))
		for i := range want.Bottles {
			if i < len(got.Bottles) && !reflect.DeepEqual(got.Bottles[i], want.Bottles[i]) {
				t.Errorf("bottle\n got %+v\nwant %+v", got.Bottles[i], want.Bottles[i])
			}
		}
		if !reflect.DeepEqual(got, want) {
			t.Error("the shelf loaded isn't the one filled in")
		}
		err = s.Fill(context.Background(), DemoLab(demoDay), clerk)
		if !errors.Is(err, ErrDuplicate) {
			t.Errorf("a second Fill: %v, want ErrDuplicate", err)
		}
	})
}

// A new store has the policy as delivered; what a site sets is kept, what is
// missing is put in again.
func TestPolicyOfANewStore(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		want := len(PolicyDefaults(demoDay))
		shelf, err := s.Load(ctx)
		if err != nil || len(shelf.Policy) != want {
			t.Fatalf("%d rows of policy, %v, want %d", len(shelf.Policy), err, want)
		}
		if err := s.SetPolicy(ctx, PolicyRow{Key: "fill.waste", Value: .9, Unit: "1", Source: "house rule"}, clerk); err != nil {
			t.Fatal(err)
		}
		if err := s.writer.Exec("DELETE FROM policy_rows WHERE key = 'heel.share'").Error; err != nil {
			t.Fatal(err)
		}
		again, err := Open(ctx, Options{Dir: s.options.Dir, Database: s.options.Database, Now: noon})
		if err != nil {
			t.Fatal(err)
		}
		defer again.Close()
		if shelf, err = again.Load(ctx); err != nil || len(shelf.Policy) != want || shelf.Policy["fill.waste"].Value != .9 {
			t.Errorf("%d rows of policy, waste fill %+v, %v", len(shelf.Policy), shelf.Policy["fill.waste"], err)
		}
		// A backup also goes into a store that was opened once.
		path := t.TempDir() + "/p.archive"
		if err := s.Backup(ctx, path); err != nil {
			t.Fatal(err)
		}
		into := Options{Dir: t.TempDir(), Now: noon}
		openIn(t, into.Dir).Close()
		if _, err := Restore(ctx, path, into); err != nil {
			t.Error(err)
		}
	})
}

func TestMemory(t *testing.T) {
	s, err := Open(context.Background(), Options{Memory: true, Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	filled(t, s)
	var wait sync.WaitGroup
	for range 8 {
		wait.Go(func() {
			if shelf, err := s.Load(context.Background()); err != nil || len(shelf.Bottles) == 0 {
				t.Errorf("load: %v", err)
			}
		})
	}
	wait.Wait()
}

// A shelf that is loaded again is the same one until somebody writes, be it
// through another store on the same file.
func TestLoadAgain(t *testing.T) {
	ctx := context.Background()
	dir := t.TempDir()
	file, other := filled(t, openIn(t, dir)), openIn(t, dir)
	memory, err := Open(ctx, Options{Memory: true, Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	defer memory.Close()
	filled(t, memory)
	for _, c := range []struct{ reads, writes *Store }{{file, file}, {file, other}, {memory, memory}} {
		first, err := c.reads.Load(ctx)
		if err != nil {
			t.Fatal(err)
		}
		if again, _ := c.reads.Load(ctx); again != first {
			t.Error("nothing was written and another shelf is loaded")
		}
		b := open1(t, c.writes, "permanganate open")
		if _, err := c.writes.Draw(ctx, Taking{b.Code, 1, 0}, clerk); err != nil {
			t.Fatal(err)
		}
		after, err := c.reads.Load(ctx)
		if err != nil {
			t.Fatal(err)
		}
		if got, _ := after.BottleByCode(b.Code); got.Content != b.Content-1 {
			t.Errorf("content %d after the draw, want %d", got.Content, b.Content-1)
		}
	}
}

func open1(t *testing.T, s *Store, key string) Bottle {
	t.Helper()
	d := demo{today: demoDay, forms: map[string]int64{}, places: map[string]int64{}, bottles: map[string]int64{}}
	d.addPlaces()
	d.addSubstances()
	d.addForms()
	d.addBottles()
	b, err := s.Bottle(context.Background(), MakeCode(BottleCode, d.bottle(key)))
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func TestDraw(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b := open1(t, s, "1-hexanol open")
		e, err := s.Draw(ctx, Taking{b.Code, mL(10), 0}, clerk)
		if err != nil || e.Content != b.Content-mL(10) {
			t.Fatalf("Draw: %+v, %v", e, err)
		}
		if got, _ := s.Bottle(ctx, strings.ToLower(b.Code)); got.Content != e.Content {
			t.Errorf("content %d, want %d", got.Content, e.Content)
		}
		var short *ShortError
		if _, err := s.Draw(ctx, Taking{b.Code, mL(1000), 0}, clerk); !errors.As(err, &short) || short.Content != e.Content {
			t.Errorf("too much: %v", err)
		}
		// 380 mL are left, run 2 has 60 of them.
		var promised *PromiseError
		if _, err := s.Draw(ctx, Taking{b.Code, mL(321), 0}, clerk); !errors.As(err, &promised) || promised.Others[0].Run != 2 {
			t.Errorf("somebody else's: %v", err)
		}
		if _, err := s.Draw(ctx, Taking{b.Code, mL(321), 2}, clerk); err != nil {
			t.Errorf("the run's own: %v", err)
		}
		after, _ := s.Bottle(ctx, b.Code)
		if after.Promised != 0 || after.Content != mL(59) {
			t.Errorf("after the run's draw: %+v", after)
		}
		if _, err := s.Draw(ctx, Taking{b.Code, mL(59), 0}, clerk); err != nil {
			t.Fatal(err)
		}
		if after, _ = s.Bottle(ctx, b.Code); after.State != Empty {
			t.Errorf("drawn to nothing and %s", after.State)
		}
		back, _, err := s.Correct(ctx, e.ID, clerk)
		if err != nil || back.Amount != mL(10) || back.Content != mL(10) {
			t.Errorf("Correct: %+v, %v", back, err)
		}
		if _, _, err := s.Correct(ctx, e.ID, clerk); !errors.Is(err, ErrDuplicate) {
			t.Errorf("corrected twice: %v", err)
		}
		if after, _ = s.Bottle(ctx, b.Code); after.State != Opened || after.Content != mL(10) {
			t.Errorf("after the correction: %+v", after)
		}
	})
}

func TestDrawRefuses(t *testing.T) {
	s := filled(t, openIn(t, t.TempDir()))
	ctx := context.Background()
	b := open1(t, s, "1-hexanol open")
	for _, c := range []struct {
		name string
		take Taking
		act  Act
		want error
	}{
		{"nothing", Taking{b.Code, 0, 0}, clerk, ErrInvalid},
		{"less than nothing", Taking{b.Code, -1, 0}, clerk, ErrInvalid},
		{"nobody", Taking{b.Code, 1, 0}, Act{}, ErrInvalid},
		{"a misread code", Taking{"B0000A", 1, 0}, clerk, ErrBadCode},
		{"no such bottle", Taking{MakeCode(BottleCode, 99999), 1, 0}, clerk, ErrNotFound},
	} {
		if _, err := s.Draw(ctx, c.take, c.act); !errors.Is(err, c.want) {
			t.Errorf("%s: %v, want %v", c.name, err, c.want)
		}
	}
	if err := s.SetBottleState(ctx, b.Code, Quarantined, clerk); err != nil {
		t.Fatal(err)
	}
	if _, err := s.Draw(ctx, Taking{b.Code, 1, 0}, clerk); !errors.Is(err, ErrInvalid) {
		t.Errorf("from a quarantined bottle: %v", err)
	}
}

func TestRequestKey(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b := open1(t, s, "permanganate open")
		act := Act{By: "Tobias Quayle", Key: "k-1"}
		first, err := s.Draw(ctx, Taking{b.Code, g(5), 0}, act)
		if err != nil {
			t.Fatal(err)
		}
		again, err := s.Draw(ctx, Taking{b.Code, g(5), 0}, act)
		if err != nil || again.ID != first.ID {
			t.Errorf("the same request again: %+v, %v", again, err)
		}
		if got, _ := s.Bottle(ctx, b.Code); got.Content != b.Content-g(5) {
			t.Errorf("content %d after the same request twice, want %d", got.Content, b.Content-g(5))
		}
		if _, err := s.Draw(ctx, Taking{b.Code, g(6), 0}, act); !errors.Is(err, ErrDuplicate) {
			t.Errorf("the key for another request: %v", err)
		}
	})
}

func TestLedgerIsAppendOnly(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		filled(t, s)
		for _, query := range []string{
			"UPDATE ledger SET amount = 0 WHERE id = 1", "DELETE FROM ledger WHERE id = 1",
			"UPDATE audit SET what = ''", "DELETE FROM audit",
			"UPDATE bottle_states SET state = 'open'", "DELETE FROM bottle_states", "DELETE FROM bottles WHERE id = 1",
		} {
			if err := s.audit(s.writer, 1, clerk, "test", "test", "", ""); err != nil {
				t.Fatal(err)
			}
			if err := translate("test", s.writer.Exec(query).Error); !errors.Is(err, ErrAppendOnly) {
				t.Errorf("%s: %v, want ErrAppendOnly", query, err)
			}
		}
		// The schema itself refuses what no code should do.
		if err := translate("test", s.writer.Exec("UPDATE bottles SET content = promised - 1 WHERE promised > 0").Error); !errors.Is(err, ErrInvalid) {
			t.Errorf("content below promises: %v, want ErrInvalid", err)
		}
	})
}

func TestEarmark(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b := open1(t, s, "1-pentanol open") // 310 mL, 60 of them for run 3
		var promised *PromiseError
		if _, err := s.Earmark(ctx, 1, Want{Bottle: b.Code, Amount: mL(251)}, clerk); !errors.As(err, &promised) {
			t.Fatalf("more than is free: %v", err)
		}
		if o := promised.Others; len(o) != 1 || o[0].Run != 3 || o[0].Recipe != "pentyl-pentanoate" || promised.Free != mL(250) {
			t.Errorf("the conflict says %+v", promised)
		}
		mark, err := s.Earmark(ctx, 1, Want{Bottle: b.Code, Amount: mL(250)}, clerk)
		if err != nil || mark.Ends != demoDay.AddDays(9+14) {
			t.Errorf("Earmark: %+v, %v", mark, err)
		}
		if mark, err = s.Earmark(ctx, 1, Want{Bottle: b.Code, Amount: mL(100)}, clerk); err != nil || mark.Amount != mL(100) {
			t.Errorf("a smaller one: %+v, %v", mark, err)
		}
		if got, _ := s.Bottle(ctx, b.Code); got.Promised != mL(160) {
			t.Errorf("promised %d, want %d", got.Promised, mL(160))
		}
		if lapsed, err := s.Lapse(ctx, clerk); err != nil || len(lapsed) != 1 || lapsed[0].RunID != 5 {
			t.Errorf("Lapse: %+v, %v", lapsed, err)
		}
		if err := s.Reconfirm(ctx, 3, demoDay.AddDays(60), clerk); err != nil {
			t.Error(err)
		}
		if err := s.Reconfirm(ctx, 3, demoDay.AddDays(-1), clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("reconfirmed until yesterday: %v", err)
		}
		// Lapsed earmarks give way: run 5 has 300 of 480 mL, but not for long.
		if _, err := s.Earmark(ctx, 5, Want{Bottle: open1(t, s, "ethyl acetate litre").Code, Amount: mL(300), Ends: demoDay.AddDays(-1)}, clerk); err != nil {
			t.Error(err)
		}
		lapsed := open1(t, s, "ethyl acetate litre")
		if _, err := s.Earmark(ctx, 1, Want{Bottle: lapsed.Code, Amount: mL(480)}, clerk); err != nil {
			t.Errorf("over a lapsed earmark: %v", err)
		}
		// A stock-take that finds less cuts the youngest earmark.
		_, cut, err := s.StockTake(ctx, Count{b.Code, mL(100), ByWeighing}, clerk)
		if err != nil || len(cut) != 1 || cut[0].Run != 1 || cut[0].Amount != mL(60) {
			t.Errorf("StockTake: cut %+v, %v", cut, err)
		}
		for _, other := range DemoLab(demoDay).Bottles {
			if other.StoreID == demoAnnex && other.State == Sealed {
				if _, err := s.Earmark(ctx, 1, Want{Bottle: other.Code, Amount: 1}, clerk); !errors.Is(err, ErrInvalid) {
					t.Errorf("a bottle of another store: %v", err)
				}
				break
			}
		}
		if _, err := s.SetState(ctx, 1, Dropped, 0, clerk); err != nil {
			t.Fatal(err)
		}
		if got, _ := s.Bottle(ctx, b.Code); got.Promised != mL(60) || got.Content != mL(100) {
			t.Errorf("after the run was dropped: %+v", got)
		}
		if _, err := s.Earmark(ctx, 1, Want{Bottle: b.Code, Amount: 1}, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("for a dropped run: %v", err)
		}
	})
}

func TestEarmarkRunIsAllOrNothing(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b, c := open1(t, s, "1-pentanol open"), open1(t, s, "dichromate open")
		if _, err := s.EarmarkRun(ctx, 1, []Want{{Bottle: c.Code, Amount: g(100)}, {Bottle: b.Code, Amount: mL(90)}}, clerk); err != nil {
			t.Fatal(err)
		}
		if _, err := s.EarmarkRun(ctx, 1, []Want{{Bottle: c.Code, Amount: g(50)}, {Bottle: b.Code, Amount: mL(900)}}, clerk); !errors.Is(err, ErrInsufficient) {
			t.Fatalf("too much: %v", err)
		}
		shelf, err := s.Load(ctx)
		if err != nil {
			t.Fatal(err)
		}
		for _, m := range shelf.EarmarksOn(c.ID) {
			if m.RunID == 1 && m.Amount != g(100) {
				t.Errorf("half of a refused set was written: %+v", m)
			}
		}
		if err := s.Release(ctx, 1, clerk); err != nil {
			t.Fatal(err)
		}
		if got, _ := s.Bottle(ctx, c.Code); got.Promised != 0 {
			t.Errorf("promised %d after release", got.Promised)
		}
	})
}

func TestParallelEarmarks(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b := open1(t, s, "1-hexanol open") // 390 mL, 60 of them for run 2
		const people = 1000
		rows := make([]Run, people)
		for i := range rows {
			rows[i] = Run{StoreID: 1, Recipe: "hexanoic-acid-permanganate", TargetUG: g(1), On: demoDay.AddDays(3), State: Pencilled, Made: s.stamp(), Version: 1}
		}
		if err := createAll(s.writer, rows); err != nil {
			t.Fatal(err)
		}
		var mu sync.Mutex
		var got, conflicts int
		var wait sync.WaitGroup
		for _, run := range rows {
			wait.Go(func() {
				_, err := s.Earmark(ctx, run.ID, Want{Bottle: b.Code, Amount: mL(1)}, clerk)
				mu.Lock()
				defer mu.Unlock()
				switch {
				case err == nil:
					got++
				case errors.Is(err, ErrConflict):
					conflicts++
				default:
					t.Errorf("earmark: %v", err)
				}
			})
		}
		wait.Wait()
		after, err := s.Bottle(ctx, b.Code)
		if err != nil {
			t.Fatal(err)
		}
		if got != 330 || conflicts != people-330 || after.Promised != after.Content {
			t.Errorf("%d promised, %d refused, bottle %+v; want 330 and %d", got, conflicts, after, people-330)
		}
	})
}

func TestReceiveAndDiscard(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b, err := s.Receive(ctx, Bottle{FormID: 1, PlaceID: 13, Size: mL(500), Content: mL(500), Lot: "L99"}, Act{By: "x", Key: "r1"})
		if err != nil || b.Content != mL(500) || b.State != Sealed || b.StoreID != 1 {
			t.Fatalf("Receive: %+v, %v", b, err)
		}
		again, err := s.Receive(ctx, Bottle{FormID: 1, PlaceID: 13, Size: mL(500), Content: mL(500), Lot: "L99"}, Act{By: "x", Key: "r1"})
		if err != nil || again.Code != b.Code {
			t.Errorf("the same receipt again: %+v, %v", again, err)
		}
		if _, err := s.Draw(ctx, Taking{b.Code, mL(1), 0}, clerk); err != nil {
			t.Fatal(err)
		}
		opened, _ := s.Bottle(ctx, b.Code)
		if opened.State != Opened || opened.Opened != demoDay || opened.MeasuredBy != ByLedger {
			t.Errorf("after the first draw: %+v", opened)
		}
		if _, err := s.Discard(ctx, b.Code, clerk); err != nil {
			t.Fatal(err)
		}
		gone, _ := s.Bottle(ctx, b.Code)
		if gone.State != Discarded || gone.Content != 0 {
			t.Errorf("after discarding: %+v", gone)
		}
		entries, err := s.Ledger(ctx, b.Code, 0)
		if err != nil || len(entries) != 3 || entries[0].Kind != Discard {
			t.Errorf("ledger: %+v, %v", entries, err)
		}
		states, err := s.States(ctx, b.Code)
		if err != nil || len(states) != 3 {
			t.Errorf("states: %+v, %v", states, err)
		}
	})
}

// A draw by weighing out and in: 390 mL of 1-hexanol at 0.8136 g/mL in a bottle
// of 412.6 g weigh 729.904 g; 81.36 g less are 100 mL.
func TestWeighOutAndIn(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		b := open1(t, s, "1-hexanol open")
		if _, err := s.WeighOut(ctx, b.Code, 0.729904, 2, clerk); err != nil {
			t.Fatal(err)
		}
		e, err := s.WeighIn(ctx, b.Code, 0.729904-0.08136, clerk)
		if err != nil || e.Amount != -mL(100) || e.RunID != 2 {
			t.Fatalf("WeighIn: %+v, %v", e, err)
		}
		after, _ := s.Bottle(ctx, b.Code)
		if after.Content != mL(290) || after.MeasuredBy != ByWeighing || after.Promised != 0 {
			t.Errorf("after weighing in: %+v", after)
		}
		if _, err := s.WeighIn(ctx, b.Code, 0.5, clerk); !errors.Is(err, ErrNotFound) {
			t.Errorf("weighed in twice: %v", err)
		}
		if _, err := s.WeighOut(ctx, b.Code, 0.1, 0, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("lighter than its tare: %v", err)
		}
	})
}

func TestRuns(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		filled(t, s)
		r, err := s.AddRun(ctx, Run{StoreID: 1, Recipe: "pentyl-pentanoate", TargetUG: g(10), On: demoDay.AddDays(4)}, clerk)
		if err != nil || r.ID != 9 || r.State != Pencilled || r.Owner != clerk.By {
			t.Fatalf("AddRun: %+v, %v", r, err)
		}
		if r, err = s.SetState(ctx, r.ID, Cleared, r.Version, clerk); err != nil || r.State != Cleared {
			t.Fatalf("SetState: %+v, %v", r, err)
		}
		if _, err := s.SetTarget(ctx, r.ID, g(20), r.On, 1, clerk); !errors.Is(err, ErrStale) {
			t.Errorf("from an old version: %v", err)
		}
		if r, err = s.SetTarget(ctx, r.ID, g(20), r.On, r.Version, clerk); err != nil || r.State != Pencilled || r.TargetUG != g(20) {
			t.Errorf("SetTarget: %+v, %v", r, err)
		}
		if _, err := s.SetState(ctx, r.ID, Closed, 0, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("pencilled to closed: %v", err)
		}
		if _, err := s.SetTarget(ctx, r.ID, 0, r.On, 0, clerk); !errors.Is(err, ErrInvalid) {
			t.Errorf("no target: %v", err)
		}
		if _, err := s.Run(ctx, 4711); !errors.Is(err, ErrNotFound) {
			t.Errorf("no such run: %v", err)
		}
		got, err := s.Run(ctx, r.ID)
		if err != nil || got != r {
			t.Errorf("Run: %+v, %v, want %+v", got, err, r)
		}
		if rows, err := s.Audit(ctx, "run 9", 10); err != nil || len(rows) != 3 || rows[0].What != "change" || rows[0].ByWhom != clerk.By {
			t.Errorf("audit of the run: %+v, %v", rows, err)
		}
		runs, err := s.Runs(ctx)
		if err != nil || len(runs) != 9 || runs[0].On > runs[1].On {
			t.Errorf("Runs: %v, %v", runs, err)
		}
	})
}

func TestOpenRefuses(t *testing.T) {
	for _, c := range []struct {
		options Options
		want    error
	}{
		{Options{}, ErrInvalid},
		{Options{Database: "mysql://x/y"}, ErrInvalid},
		{Options{Database: "postgres://nobody@127.0.0.1:1/none?connect_timeout=1"}, ErrUnreachable},
		{Options{Dir: "/dev/null/x"}, ErrUnreachable},
		{Options{Dir: t.TempDir(), ReadOnly: true}, ErrNotFound},
	} {
		s, err := Open(context.Background(), c.options)
		if !errors.Is(err, c.want) {
			t.Errorf("Open(%+v): %v, want %v", c.options, err, c.want)
		}
		if err == nil {
			s.Close()
		}
	}
}

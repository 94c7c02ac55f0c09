package inventory

import (
	"context"
	"errors"
	"fmt"
	"math/rand/v2"
	"os"
	"sync"
	"testing"
)

// model is what a bottle must be by the rules alone, kept beside the store.
type model struct {
	content int64
	size    int64
	marks   map[int64]int64 // run → amount
	order   []int64         // runs in the order of their earmarks
}

func (m *model) promised() (sum int64) {
	for _, amount := range m.marks {
		sum += amount
	}
	return sum
}

// Random draws, earmarks, counts, corrections and releases leave the store as a
// simple model of the rules says: 2,000 of them, 10,000 where STILLROOM_CI is 1.
func TestRandomOperations(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		steps := 2000
		switch {
		case os.Getenv("STILLROOM_CI") == "1" && !raced:
			steps = 10000
		case testing.Short() || s.engine == onPostgres:
			steps = 300
		}
		filled(t, s)
		ctx := context.Background()
		shelf, err := s.Load(ctx)
		if err != nil {
			t.Fatal(err)
		}
		random := rand.New(rand.NewPCG(3, 5))
		r := &randomRun{t: t, s: s, random: random, models: map[string]*model{}, byID: map[int64]*model{}}
		for _, b := range shelf.Bottles {
			if b.State == Opened && b.Promised == 0 && b.StoreID == demoMain && len(r.codes) < 8 {
				r.codes = append(r.codes, b.Code)
				r.models[b.Code] = &model{b.Content, b.Size, map[int64]int64{}, nil}
				r.byID[b.ID] = r.models[b.Code]
			}
		}
		for i := range steps {
			if r.step(ctx, i); t.Failed() {
				t.Fatalf("at step %d", i)
			}
		}
		mustCheck(t, s)
	})
}

type randomRun struct {
	t       *testing.T
	s       *Store
	random  *rand.Rand
	codes   []string
	models  map[string]*model
	entries []Entry // draws that may be corrected
	byID    map[int64]*model
}

func (r *randomRun) step(ctx context.Context, i int) {
	code := r.codes[r.random.IntN(len(r.codes))]
	m := r.models[code]
	run := 1 + r.random.Int64N(4)
	amount := 1 + r.random.Int64N(m.size/4)
	act := Act{By: "test", Key: fmt.Sprint("k", i)}
	switch r.random.IntN(6) {
	case 0, 1:
		r.draw(ctx, code, m, amount, run, act)
	case 2:
		_, err := r.s.Earmark(ctx, run, Want{Bottle: code, Amount: amount, Ends: demoDay.AddDays(99)}, act)
		fits := amount <= m.content-(m.promised()-m.marks[run])
		if fits != (err == nil) {
			r.t.Errorf("earmark of %d for run %d on %+v: %v", amount, run, m, err)
		}
		if fits {
			m.mark(run, amount)
		}
	case 3:
		if _, _, err := r.s.StockTake(ctx, Count{code, amount, ByWeighing}, act); err != nil {
			r.t.Error(err)
		}
		m.content = amount
		m.cut()
	case 4:
		r.correct(ctx, act)
	case 5:
		if err := r.s.ReleaseBottle(ctx, run, code, act); err != nil {
			r.t.Error(err)
		}
		delete(m.marks, run)
	}
	got, err := r.s.Bottle(ctx, code)
	if err != nil || got.Content != m.content || got.Promised != m.promised() {
		r.t.Errorf("bottle %s holds %d of which %d promised, want %d and %d, %v", code, got.Content, got.Promised, m.content, m.promised(), err)
	}
}

func (r *randomRun) draw(ctx context.Context, code string, m *model, amount, run int64, act Act) {
	e, err := r.s.Draw(ctx, Taking{code, amount, run}, act)
	fits := m.content > 0 && amount <= m.content-(m.promised()-m.marks[run])
	if fits != (err == nil) {
		r.t.Errorf("draw of %d for run %d from %+v: %v", amount, run, m, err)
	}
	if !fits {
		return
	}
	m.content -= amount
	if m.marks[run] -= amount; m.marks[run] <= 0 {
		delete(m.marks, run)
	}
	if m.content > 0 { // an empty bottle is corrected in another test
		r.entries = append(r.entries, e)
	}
}

func (r *randomRun) correct(ctx context.Context, act Act) {
	if len(r.entries) == 0 {
		return
	}
	i := r.random.IntN(len(r.entries))
	e := r.entries[i]
	r.entries = append(r.entries[:i], r.entries[i+1:]...)
	if _, _, err := r.s.Correct(ctx, e.ID, act); err != nil {
		r.t.Errorf("correct %+v: %v", e, err)
	}
	r.byID[e.BottleID].content -= e.Amount
}

// mark promises, keeping the place in the order if the run had an earmark.
func (m *model) mark(run, amount int64) {
	if _, ok := m.marks[run]; !ok {
		m.order = append(m.order, run)
	}
	m.marks[run] = amount
}

// cut shrinks the youngest promises until they fit.
func (m *model) cut() {
	for i := len(m.order) - 1; i >= 0; i-- {
		run := m.order[i]
		if _, ok := m.marks[run]; !ok {
			m.order = append(m.order[:i], m.order[i+1:]...)
			continue
		}
		if over := m.promised() - m.content; over > 0 {
			m.marks[run] -= min(over, m.marks[run])
			if m.marks[run] == 0 {
				delete(m.marks, run)
				m.order = append(m.order[:i], m.order[i+1:]...)
			}
		}
	}
}

// Two servers on one PostgreSQL promise no more than one does.
func TestTwoServers(t *testing.T) {
	address := postgresAddress(t)
	ctx := context.Background()
	var servers [2]*Store
	for i := range servers {
		s, err := Open(ctx, Options{Database: address, Dir: t.TempDir(), Now: noon})
		if err != nil {
			t.Fatal(err)
		}
		defer s.Close()
		servers[i] = s
	}
	filled(t, servers[0])
	b := open1(t, servers[1], "1-hexanol open") // 390 mL, 60 of them for run 2
	var mu sync.Mutex
	var wait sync.WaitGroup
	drawn, taken := 0, 0
	for i := range 100 {
		s := servers[i%2]
		wait.Go(func() {
			_, err := s.Draw(ctx, Taking{b.Code, mL(5), 0}, Act{By: "x", Key: fmt.Sprint("d", i/2)}) // each request comes twice
			if err != nil && !errors.Is(err, ErrConflict) {
				t.Errorf("draw: %v", err)
			}
			mu.Lock()
			defer mu.Unlock()
			if err == nil {
				drawn++
			}
		})
	}
	wait.Wait()
	entries, err := servers[0].Ledger(ctx, b.Code, 0)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries {
		if e.Kind == Drawn {
			taken++
		}
	}
	after, err := servers[0].Bottle(ctx, b.Code)
	if err != nil || taken != 50 || drawn != 100 || after.Content != mL(390-250) {
		t.Errorf("%d draws acknowledged, %d in the ledger, content %d, %v; want 100, 50 and %d", drawn, taken, after.Content, err, mL(140))
	}
	mustCheck(t, servers[1])
}

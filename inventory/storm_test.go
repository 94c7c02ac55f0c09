package inventory

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"io"
	"math/rand/v2"
	"os"
	"os/exec"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"
)

// The storm: a process that draws, earmarks and counts as fast as it can and
// says on its standard output what was acknowledged, and is killed at any
// moment. What it acknowledged must be there once, and nothing may be torn.

const stormDir = "STILLROOM_TEST_STORM"

func TestMain(m *testing.M) {
	if dir := os.Getenv(stormDir); dir != "" {
		storm(dir)
		os.Exit(0)
	}
	if dir := os.Getenv(weighDir); dir != "" {
		if err := serveForWeighing(dir); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
		os.Exit(0)
	}
	status := m.Run()
	for _, s := range benchStores {
		s.Close()
	}
	for _, dir := range benchDirs {
		os.RemoveAll(dir)
	}
	os.Exit(status)
}

// An ack is an acknowledged act: its key, and the ledger entry or run it made.
type ack struct {
	what, key string
	ref       int64
}

func storm(dir string) {
	ctx := context.Background()
	s, err := Open(ctx, Options{Dir: dir, Now: noon})
	if err != nil {
		fmt.Println("failed", err)
		return
	}
	shelf, err := s.Load(ctx)
	if err != nil {
		fmt.Println("failed", err)
		return
	}
	var mu sync.Mutex
	var wait sync.WaitGroup
	for worker := range 4 {
		random := rand.New(rand.NewPCG(uint64(os.Getpid()), uint64(worker)))
		wait.Go(func() {
			for i := 0; ; i++ {
				key := fmt.Sprintf("%d-%d-%d", os.Getpid(), worker, i)
				what, ref, err := stormAct(ctx, s, shelf, random, key)
				if err != nil && !errors.Is(err, ErrConflict) && !errors.Is(err, ErrInsufficient) && !errors.Is(err, ErrInvalid) {
					fmt.Println("failed", err)
					return
				}
				if err == nil {
					mu.Lock()
					fmt.Println("ack", what, key, ref)
					mu.Unlock()
				}
			}
		})
	}
	wait.Wait()
}

func stormAct(ctx context.Context, s *Store, shelf *Shelf, random *rand.Rand, key string) (what string, ref int64, err error) {
	b := shelf.Bottles[random.IntN(len(shelf.Bottles))]
	act := Act{By: "storm", Key: key}
	switch random.IntN(4) {
	case 0:
		run := shelf.Runs[random.IntN(5)].ID
		_, err = s.Earmark(ctx, run, Want{Bottle: b.Code, Amount: 1 + random.Int64N(1+b.Size/8)}, act)
		return "earmark", run, err
	case 1:
		e, _, err := s.StockTake(ctx, Count{b.Code, 1 + random.Int64N(b.Size), ByWeighing}, act)
		return "count", e.ID, err
	}
	e, err := s.Draw(ctx, Taking{b.Code, 1 + random.Int64N(1+b.Size/50), 0}, act)
	return "draw", e.ID, err
}

// TestKillStorm goes through 20 kills, or 200 where STILLROOM_CI is 1.
func TestKillStorm(t *testing.T) {
	rounds := 20
	if os.Getenv("STILLROOM_CI") == "1" && !raced {
		rounds = 200
	}
	if testing.Short() {
		rounds = 3
	}
	dir := t.TempDir()
	filled(t, openIn(t, dir)).Close()
	total := 0
	for round := range rounds {
		acks := stormUntilKilled(t, dir, time.Duration(20+13*(round%10))*time.Millisecond)
		s := openIn(t, dir)
		mustCheck(t, s)
		for _, a := range acks {
			checkAck(t, s, a)
		}
		total += len(acks)
		s.Close()
		if t.Failed() {
			t.Fatalf("in round %d", round)
		}
	}
	if total < rounds {
		t.Errorf("only %d acts acknowledged in %d rounds: the storm was a calm", total, rounds)
	}
	t.Logf("%d acts acknowledged in %d rounds", total, rounds)
}

// stormUntilKilled runs the storm, kills it some time after its first
// acknowledgement, and returns what it acknowledged.
func stormUntilKilled(t *testing.T, dir string, after time.Duration) (acks []ack) {
	t.Helper()
	cmd := exec.Command(os.Args[0])
	cmd.Env = append(os.Environ(), stormDir+"="+dir)
	out, err := cmd.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	var kill sync.Once
	in := bufio.NewReader(out)
	for {
		line, err := in.ReadString('\n')
		if err != nil { // a line cut by the kill is no acknowledgement
			if err != io.EOF && !errors.Is(err, os.ErrClosed) {
				t.Error(err)
			}
			break
		}
		parts := strings.Fields(line)
		if parts[0] != "ack" {
			t.Error(line)
			continue
		}
		ref, _ := strconv.ParseInt(parts[3], 10, 64)
		acks = append(acks, ack{parts[1], parts[2], ref})
		kill.Do(func() { time.AfterFunc(after, func() { cmd.Process.Kill() }) })
	}
	cmd.Wait()
	return acks
}

// checkAck looks for an acknowledged act: noted once, with its ledger entry.
func checkAck(t *testing.T, s *Store, a ack) {
	t.Helper()
	var noted []doneAct
	if err := s.reader.Where("key = ?", a.key).Find(&noted).Error; err != nil {
		t.Fatal(err)
	}
	if len(noted) != 1 || noted[0].Ref != a.ref || noted[0].What != a.what {
		t.Errorf("acknowledged %+v, the store has %+v", a, noted)
		return
	}
	if a.what == "earmark" {
		return
	}
	var e Entry
	if err := s.reader.Where("id = ?", a.ref).Take(&e).Error; err != nil || e.ByWhom != "storm" {
		t.Errorf("acknowledged %+v, the ledger has %+v, %v", a, e, err)
	}
}

// After a kill the caller doesn't know whether its last act was carried out,
// and repeats it: it is there once either way.
func TestRepeatAfterKill(t *testing.T) {
	dir := t.TempDir()
	filled(t, openIn(t, dir)).Close()
	acks := stormUntilKilled(t, dir, 100*time.Millisecond)
	s := openIn(t, dir)
	ctx := context.Background()
	for _, a := range acks {
		if a.what != "draw" {
			continue
		}
		var e Entry
		if err := s.reader.Where("id = ?", a.ref).Take(&e).Error; err != nil {
			t.Fatal(err)
		}
		var code string
		if err := s.reader.Raw("SELECT code FROM bottles WHERE id = ?", e.BottleID).Row().Scan(&code); err != nil {
			t.Fatal(err)
		}
		again, err := s.Draw(ctx, Taking{code, -e.Amount, 0}, Act{By: "storm", Key: a.key})
		if err != nil || again.ID != e.ID {
			t.Errorf("repeated %+v: entry %d, %v", a, again.ID, err)
		}
	}
	mustCheck(t, s)
}

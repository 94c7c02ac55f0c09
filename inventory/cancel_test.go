package inventory

import (
	"context"
	"errors"
	"math/rand/v2"
	"sync"
	"testing"
	"time"
)

// A request that is given up halfway leaves nothing behind and takes nothing
// with it: not the stock in memory, which lives in one connection.
func TestCancelledRequests(t *testing.T) {
	memory, err := Open(context.Background(), Options{Memory: true, Now: noon})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { memory.Close() })
	for name, s := range map[string]*Store{"memory": memory, "file": openIn(t, t.TempDir())} {
		t.Run(name, func(t *testing.T) {
			filled(t, s)
			b := open1(t, s, "permanganate open")
			var mu sync.Mutex
			var wait sync.WaitGroup
			drawn := int64(0)
			for worker := range 4 {
				random := rand.New(rand.NewPCG(1, uint64(worker)))
				wait.Go(func() {
					for range 150 {
						ctx, stop := context.WithTimeout(context.Background(), time.Duration(random.IntN(1500))*time.Microsecond)
						_, err := s.Draw(ctx, Taking{b.Code, 1, 0}, clerk)
						if err == nil {
							mu.Lock()
							drawn++
							mu.Unlock()
						}
						_, errLoad := s.Load(ctx)
						for _, err := range []error{err, errLoad} {
							if err != nil && !errors.Is(err, context.DeadlineExceeded) && ctx.Err() == nil {
								t.Errorf("while nobody gave up: %v", err)
							}
						}
						stop()
					}
				})
			}
			wait.Wait()
			after, err := s.Bottle(context.Background(), b.Code)
			if err != nil {
				t.Fatal(err)
			}
			// What was acknowledged is there; what wasn't may be, if it was
			// given up after the commit.
			if after.Content > b.Content-drawn {
				t.Errorf("%d draws acknowledged, %d taken", drawn, b.Content-after.Content)
			}
			mustCheck(t, s)
			t.Logf("%d of 600 draws acknowledged", drawn)
		})
	}
}

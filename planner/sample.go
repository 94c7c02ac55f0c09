package planner

import (
	"runtime"
	"sync"

	"stillroom/chem"
)

// SampleAll walks the recipe through n times with common random numbers of a
// seed and hands each outcome to keep, which may be called from several
// goroutines at once, each draw once. Draw i has the same luck whatever the
// number of draws, of goroutines and the conditions: number i of the stream of
// each quantity's name.
func (p *Program) SampleAll(in Conditions, n int, seed uint64, keep func(draw int, o Outcome)) {
	streams := make([]chem.Stream, len(p.factors))
	for i := range streams {
		streams[i] = chem.NewStream(seed, p.factors[i].name)
	}
	workers := max(1, min(runtime.GOMAXPROCS(0), n/minDraws))
	var wait sync.WaitGroup
	for k := range workers {
		wait.Add(1)
		go func() {
			defer wait.Done()
			w := p.Workspace(in)
			u := make([]float64, len(p.factors))
			for draw := k; draw < n; draw += workers {
				for i := range streams {
					u[i] = streams[i].Uniform(draw)
				}
				keep(draw, p.Sample(w, u))
			}
		}()
	}
	wait.Wait()
}

// minDraws is the least number of draws worth a goroutine.
const minDraws = 64

package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// fitAndMatch chooses the batches with the stock as the recipe asks for it, and
// looks again once it is known what is drawn: a weaker stock fills more.
func (p *planning) fitAndMatch() error {
	for p.batches = max(1, p.req.Batches); ; p.batches++ {
		if err := p.chooseBatches(); err != nil {
			return err
		}
		if err := p.matchAndWalk(); err != nil {
			return err
		}
		tooBig, big := findingOf(p.walk, noVesselFits)
		if !big {
			p.saySplit()
			return nil
		}
		if p.req.Batches > 0 || p.batches >= mostBatches {
			return p.noVessel(tooBig)
		}
		p.tooBig = tooBig
	}
}

// saySplit says why a run that wasn't asked for in batches is planned in some.
func (p *planning) saySplit() {
	if p.batches == max(1, p.req.Batches) {
		return
	}
	p.found = append(p.found, Finding{
		Kind: "split", Severity: Warning, Step: p.tooBig.Step,
		Text:  fmt.Sprintf("planned as %d equal batches; with one fewer, %s", p.batches, p.tooBig.Text),
		Would: "a larger vessel would take it in fewer; strips, filter papers, rinses and the time come with every batch",
	})
}

// mostBatches is how far a run is split by itself: a batch a day for two working
// weeks. Beyond it somebody has to ask for more batches or less product.
const mostBatches = 10

// noVesselFits is the kind of finding that says that a step needs ware the lab
// doesn't own.
const noVesselFits = "no-vessel-fits"

// chooseBatches takes the number asked for, or the fewest from p.batches on that
// the ware can hold.
func (p *planning) chooseBatches() error {
	for ; ; p.batches++ {
		walk, err := p.program.Walk(p.conditions())
		if err != nil {
			return err
		}
		tooBig, big := findingOf(walk, noVesselFits)
		if !big {
			p.walk = walk
			return nil
		}
		if p.req.Batches > 0 || p.batches >= mostBatches {
			return p.noVessel(tooBig)
		}
		p.tooBig = tooBig
	}
}

func findingOf(walk *Walk, kind string) (Finding, bool) {
	for _, f := range walk.Findings {
		if f.Kind == kind {
			return f, true
		}
	}
	return Finding{}, false
}

// noVessel refuses a target that the lab's ware can't hold, and says what it
// could.
func (p *planning) noVessel(f Finding) error {
	e := &RequestError{Field: "target", Got: massText(p.req.Target), What: fmt.Sprintf("no vessel fits in %s: %s", batchesText(p.batches), f.Text), Would: f.Would, Err: ErrNoVessel}
	asked := max(1, p.req.Batches)
	most := p.largestThatFits(asked)
	if most <= 0 {
		return e
	}
	e.Would = fmt.Sprintf("at most %s fits in %s", massText(most), batchesText(asked))
	if n := p.batchesThatFit(int(math.Ceil(float64(asked) * float64(p.req.Target/most)))); n > 0 {
		e.Would += fmt.Sprintf("; ask for %s or for less product", batchesText(n))
	}
	return e
}

func batchesText(n int) string {
	if n == 1 {
		return "one batch"
	}
	return fmt.Sprintf("%d batches", n)
}

// fits reports whether the ware holds a share of the run in so many batches.
func (p *planning) fits(share float64, batches int) bool {
	in := p.conditions()
	in.Limiting *= chem.Amount(share)
	in.Batches = batches
	walk, err := p.program.Walk(in)
	if err != nil {
		return false
	}
	_, big := findingOf(walk, noVesselFits)
	return !big
}

// largestThatFits halves the interval between nothing and the target.
func (p *planning) largestThatFits(batches int) chem.Mass {
	low, high := 0.0, 1.0
	for range int(p.policy.value("slate.steps")) {
		if mid := (low + high) / 2; p.fits(mid, batches) {
			low = mid
		} else {
			high = mid
		}
	}
	return p.req.Target * chem.Mass(low)
}

// batchesThatFit is the least number from n on that does, if one of the next
// few does and may be asked for, because not all that is in a vessel scales with
// the batch; else 0.
func (p *planning) batchesThatFit(n int) int {
	for end := min(n+3, mostAsked); n <= end; n++ {
		if p.fits(1, n) {
			return n
		}
	}
	return 0
}

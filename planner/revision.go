package planner

import (
	"crypto/sha256"
	"fmt"
	"hash"
	"strconv"
)

// revisionOf is the fingerprint of what a chemist would act on: recipe, target,
// day, needs, draws, steps, last safe start, carriers, waste and hazards. Reasons, chances,
// prices and today's date don't count, so that a paper stays current until
// something on it changes. Numbers enter with nine figures.
func revisionOf(p *Plan) string {
	h := sha256.New()
	put(h, "recipe", p.Recipe.Name, p.Recipe.Version, p.Recipe.Text)
	put(h, "target", p.Target.Substance, float64(p.Target.Mass), p.On.String(), float64(p.Scale.Amount), p.Scale.Batches)
	for i := range p.Needs {
		putNeed(h, &p.Needs[i])
	}
	for i := range p.Steps {
		putStep(h, &p.Steps[i])
	}
	if len(p.Budget.Stretches) > 0 {
		s := p.Budget.Stretches[0]
		put(h, "begin", float64(s.LastStart), float64(p.Budget.Day.End), s.Fits)
	}
	for _, c := range p.Carriers {
		put(h, "carrier", c.N, fmt.Sprintf("%q", c.Bottles), c.Note)
	}
	for _, w := range p.Waste {
		put(h, "waste", w.Stream, float64(w.Mass), float64(w.Volume), w.Carboy, w.Fits)
	}
	for _, z := range p.Hazards {
		put(h, "hazard", z.At, z.What, fmt.Sprintf("%q", z.Statements), z.Signal, z.Basis)
	}
	return fmt.Sprintf("%x", h.Sum(nil)[:4])
}

func putNeed(h hash.Hash, n *Need) {
	put(h, "need", n.Substance, n.State.String(), float64(n.Mass), n.Pieces, float64(n.Short), n.ShortPieces)
	for _, d := range n.Draws {
		put(h, "draw", d.Bottle.Code, d.Form.Name, d.Place.String(), float64(d.Mass), float64(d.Volume), d.Pieces, d.Bottle.Expiry.String())
		for _, s := range d.Steps {
			put(h, "part", s.Step, float64(s.Mass), s.Pieces)
		}
	}
	for _, s := range n.Spares {
		put(h, "spare", s.Bottle.Code)
	}
}

func putStep(h hash.Hash, s *StepReport) {
	put(h, "step", s.N, s.Do, s.Name, s.Vessel.Name, s.Vessel.Ware, float64(s.Vessel.Size), float64(s.Temperature), float64(s.Time), float64(s.Shortest))
	for _, a := range s.Adds {
		put(h, "add", a.Substance, a.Form, float64(a.Mass), float64(a.Volume), a.Pieces)
	}
	put(h, "cautions", fmt.Sprintf("%q", s.Cautions))
}

// put writes one record, each part with its length, so that no two plans write
// the same text.
func put(h hash.Hash, parts ...any) {
	var line []byte
	for _, part := range parts {
		text := recordText(part)
		line = append(strconv.AppendInt(line, int64(len(text)), 10), ':')
		line = append(append(line, text...), ';')
	}
	h.Write(append(line, '\n'))
}

func recordText(part any) string {
	switch x := part.(type) {
	case string:
		return x
	case float64:
		return strconv.FormatFloat(x, 'g', 9, 64)
	}
	return fmt.Sprint(part)
}

package planner

import (
	"fmt"
	"math"
	"slices"
)

// separateOp parts two layers: one leaves for another vessel.
type separateOp struct {
	layer  string // the layer that leaves
	to     string
	target int
	phase  int
}

var layerNames = []string{"aqueous", "organic"}

// readLayer reads the name of a liquid layer.
func readLayer(f *fields, key string) string {
	layer := f.text(key, true)
	if layer != "" && !slices.Contains(layerNames, layer) {
		f.faultAt(f.values[key], fmt.Sprintf("%s %q", key, layer), "aqueous or organic")
	}
	return layer
}

func (o *separateOp) read(f *fields) {
	o.layer = readLayer(f, "move")
	o.to = f.text("to", true)
}

func (o *separateOp) names(visit func(kind, name string, at place)) {
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o separateOp) compile(c *compiler) (runner, error) {
	o.target, o.phase = c.place[o.to], slices.Index(phaseNames, o.layer)
	return &o, nil
}

func (o *separateOp) run(w *Workspace) error {
	v := w.step.vessel
	w.settle(v)
	if err := w.needLayers(v); err != nil {
		return err
	}
	w.fullest(v)
	if w.report != nil {
		w.say("%.3g mL aqueous, %.3g mL organic; the %s layer goes to %s", w.volume(v, aqueous)*1e6, w.volume(v, organic)*1e6, o.layer, w.p.places[o.target])
		w.sayUpper(v)
	}
	w.parted(v, o.target, o.phase)
	w.settle(o.target)
	w.fullest(o.target)
	return nil
}

// droplets is the volume of water that stays as droplets in a layer parted from
// it in a funnel, over the layer's own: about a hundredth (common practice,
// from memory). A drying agent has to bind it.
const droplets = 0.01

// parted carries one layer of place v to another place. Droplets of water stay
// with the organic layer, wherever that is.
func (w *Workspace) parted(v, to, phase int) {
	org, aq := w.volume(v, organic), w.volume(v, aqueous)
	if org == 0 || aq == 0 {
		w.movePhase(v, to, phase, 1)
		return
	}
	share := math.Min(1, droplets*org/aq)
	if phase == aqueous {
		w.movePhase(v, to, aqueous, 1-share)
		return
	}
	w.movePhase(v, to, aqueous, share)
	w.movePhase(v, to, organic, 1)
}

// sayUpper says which layer is the upper one, by their densities.
func (w *Workspace) sayUpper(v int) {
	aq := w.mass(v, aqueous) / w.volume(v, aqueous)
	org := w.mass(v, organic) / w.volume(v, organic)
	upper := "organic"
	if org > aq {
		upper = "aqueous"
	}
	w.say("the %s layer is the upper one (aqueous %.3g g/mL, organic %.3g g/mL)", upper, aq/1e3, org/1e3)
}

package views

import (
	"fmt"
	"html"
	"html/template"
	"math"
	"slices"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// The material flow is drawn from top to bottom: the steps down the middle,
// what comes from the shelf from the left, what leaves as waste or product to
// the right. The width of a ribbon is its mass.

const (
	flowWidth  = 920.0
	flowLeft   = 400.0 // where the ribbons from the shelf begin
	flowMiddle = 520.0
	flowRight  = 660.0 // where the ribbons to waste and product end
	flowSpine  = 110.0 // width of the widest step
	flowLine   = 19.0  // height of a line of text
)

// flowNode is a place in the material flow: a step, or an end of it.
type flowNode struct {
	name       string
	in, out    []int // ribbons, in the order of the plan
	inside     bool  // has both
	throughput float64
	y          float64
}

// flowRibbon is what goes from one node to another, all substances together.
type flowRibbon struct {
	from, to  int
	mass      chem.Mass
	substance string // the first
	mixed     bool   // there are others
}

// flowGraph sums the flows between the same two places. What comes from outside
// keeps its substances apart, because those are what people look for.
type flowGraph struct {
	nodes   []flowNode
	ribbons []flowRibbon
}

func newFlowGraph(flows []planner.Flow) *flowGraph {
	g := &flowGraph{}
	index := map[string]int{}
	node := func(name string) int {
		i, ok := index[name]
		if !ok {
			i = len(g.nodes)
			index[name] = i
			g.nodes = append(g.nodes, flowNode{name: name})
		}
		return i
	}
	type way struct{ from, to, substance string }
	between := map[way]int{}
	entered := enteredPlaces(flows)
	for _, f := range flows {
		if !(f.Mass > 0) {
			continue
		}
		w := way{f.From, f.To, ""}
		if !entered[f.From] {
			w.substance = f.Substance
		}
		i, ok := between[w]
		if !ok {
			i = len(g.ribbons)
			between[w] = i
			g.ribbons = append(g.ribbons, flowRibbon{from: node(f.From), to: node(f.To)})
		}
		g.ribbons[i].take(f)
	}
	for i, r := range g.ribbons {
		g.nodes[r.from].out = append(g.nodes[r.from].out, i)
		g.nodes[r.to].in = append(g.nodes[r.to].in, i)
	}
	for i := range g.nodes {
		n := &g.nodes[i]
		n.inside = len(n.in) > 0 && len(n.out) > 0
		n.throughput = math.Max(g.sum(n.in), g.sum(n.out))
	}
	return g
}

// enteredPlaces are those that something flows into.
func enteredPlaces(flows []planner.Flow) map[string]bool {
	entered := map[string]bool{}
	for _, f := range flows {
		if f.Mass > 0 {
			entered[f.To] = true
		}
	}
	return entered
}

// take adds a flow. The same substance in several portions is still one.
func (r *flowRibbon) take(f planner.Flow) {
	r.mass += f.Mass
	switch r.substance {
	case "":
		r.substance = f.Substance
	case f.Substance:
	default:
		r.mixed = true
	}
}

func (g *flowGraph) sum(ribbons []int) float64 {
	s := 0.0
	for _, i := range ribbons {
		s += float64(g.ribbons[i].mass)
	}
	return s
}

// outerIn lists the ribbons into a node that begin outside of the steps.
func (g *flowGraph) outerIn(n flowNode) (outer []int) {
	for _, i := range n.in {
		if !g.nodes[g.ribbons[i].from].inside {
			outer = append(outer, i)
		}
	}
	return outer
}

// outerOut lists the ribbons out of a node that end outside of the steps.
func (g *flowGraph) outerOut(n flowNode) (outer []int) {
	for _, i := range n.out {
		if !g.nodes[g.ribbons[i].to].inside {
			outer = append(outer, i)
		}
	}
	return outer
}

// innerIn lists the ribbons into a node that come from other steps.
func (g *flowGraph) innerIn(n flowNode) (inner []int) {
	for _, i := range n.in {
		if g.nodes[g.ribbons[i].from].inside {
			inner = append(inner, i)
		}
	}
	return inner
}

// innerOut lists the ribbons out of a node that go to other steps.
func (g *flowGraph) innerOut(n flowNode) (inner []int) {
	for _, i := range n.out {
		if g.nodes[g.ribbons[i].to].inside {
			inner = append(inner, i)
		}
	}
	return inner
}

// drawFlow draws the material flow of a run; nothing where there is none.
func drawFlow(flows []planner.Flow) template.HTML {
	g := newFlowGraph(flows)
	widest := 0.0
	for _, n := range g.nodes {
		if n.inside {
			widest = math.Max(widest, n.throughput)
		}
	}
	if widest == 0 {
		return ""
	}
	d := &flowDrawing{flowGraph: g, perKilogram: flowSpine / widest, place: map[[2]int]float64{}}
	height := d.layOut()
	for i := range g.ribbons {
		d.ribbon(i)
	}
	for i := range g.nodes {
		d.node(&g.nodes[i])
	}
	return template.HTML(fmt.Sprintf(`<svg role="img" aria-label="Material flow of the run: what goes into every step, what leaves it, as in the table below" viewBox="0 0 %.0f %.0f">%s</svg>`,
		flowWidth, height, d.b.String()))
}

// flowDrawing collects the picture. Its place gives, for a ribbon and an end of
// it (0 where it begins, 1 where it ends), the position along the bar of the
// step.
type flowDrawing struct {
	*flowGraph
	perKilogram float64
	place       map[[2]int]float64
	b           strings.Builder
}

// layOut gives every step its height in the picture and every ribbon its place
// on the bars, and returns the height of the whole.
func (d *flowDrawing) layOut() float64 {
	y := 6.0
	for i := range d.nodes {
		n := &d.nodes[i]
		if !n.inside {
			continue
		}
		entering, leaving := d.outerIn(*n), d.outerOut(*n)
		y += math.Max(d.room(entering), 16) + 10
		n.y = y
		y += math.Max(d.room(leaving), 6) + 18
		// What comes from the left lies left on the bar, the lowest line first,
		// and what leaves to the right lies right, so that no two cross.
		slices.Reverse(entering)
		slices.Reverse(leaving)
		d.spread(append(entering, d.innerIn(*n)...), 1, n)
		d.spread(append(d.innerOut(*n), leaving...), 0, n)
	}
	return y + 8
}

// room is the height that ribbons at one side of a step take.
func (d *flowDrawing) room(ribbons []int) float64 {
	h := 0.0
	for _, i := range ribbons {
		h += d.thick(i)
	}
	return h
}

// thick is the height of a ribbon's line at the side: never less than its text.
func (d *flowDrawing) thick(i int) float64 { return math.Max(flowLine, d.width(i)+3) }

func (d *flowDrawing) width(i int) float64 {
	return math.Max(0.8, float64(d.ribbons[i].mass)*d.perKilogram)
}

// spread places ribbons side by side along the bar of a step.
func (d *flowDrawing) spread(ribbons []int, end int, n *flowNode) {
	x := flowMiddle - n.throughput*d.perKilogram/2
	for _, i := range ribbons {
		w := float64(d.ribbons[i].mass) * d.perKilogram
		d.place[[2]int{i, end}] = x + w/2
		x += w
	}
}

// ribbon draws what flows between two steps, into a step or out of one. It
// leaves and enters a bar upright and a side line level.
func (d *flowDrawing) ribbon(i int) {
	r := d.ribbons[i]
	from, to := d.nodes[r.from], d.nodes[r.to]
	x0, x1 := d.place[[2]int{i, 0}], d.place[[2]int{i, 1}]
	switch {
	case from.inside && to.inside:
		bend := (to.y - from.y) / 2
		d.path("", d.width(i), "M%.1f %.1fC%.1f %.1f %.1f %.1f %.1f %.1f", x0, from.y, x0, from.y+bend, x1, to.y-bend, x1, to.y)
	case to.inside:
		y := d.lineBefore(i, to)
		d.path("in", d.width(i), "M%.1f %.1fC%.1f %.1f %.1f %.1f %.1f %.1f", flowLeft, y, (flowLeft+2*x1)/3, y, x1, y, x1, to.y)
		d.text(flowLeft-8, y+4.5, "end", r.label(from.name, true))
	case from.inside:
		y := d.lineAfter(i, from)
		d.path(endClass(to.name), d.width(i), "M%.1f %.1fC%.1f %.1f %.1f %.1f %.1f %.1f", x0, from.y, x0, y, (flowRight+2*x0)/3, y, flowRight, y)
		d.text(flowRight+8, y+4.5, "start", r.label(to.name, false))
	}
}

// lineBefore is the height of the line on which a ribbon enters from the left.
func (d *flowDrawing) lineBefore(i int, n flowNode) float64 {
	y := n.y - 8
	outer := d.outerIn(n)
	for k := len(outer) - 1; k >= 0; k-- {
		h := d.thick(outer[k])
		if outer[k] == i {
			return y - h/2
		}
		y -= h
	}
	return y
}

// lineAfter is the height of the line on which a ribbon leaves to the right.
func (d *flowDrawing) lineAfter(i int, n flowNode) float64 {
	y := n.y + 8
	for _, o := range d.outerOut(n) {
		h := d.thick(o)
		if o == i {
			return y + h/2
		}
		y += h
	}
	return y
}

// label names what flows and its mass: the substance of what comes in, the place
// of what goes out, because that is what people look for.
func (r flowRibbon) label(end string, coming bool) string {
	what := strings.TrimPrefix(end, "waste: ")
	if !r.mixed && (coming || end == "product") {
		what = r.substance
	}
	return what + " " + massText(r.mass)
}

func endClass(name string) string {
	if name == "product" {
		return "product"
	}
	return "waste"
}

func (d *flowDrawing) path(class string, width float64, format string, at ...any) {
	fmt.Fprintf(&d.b, `<path class="ribbon %s" stroke-width="%.1f" d="`+format+`"/>`, append([]any{class, width}, at...)...)
}

func (d *flowDrawing) text(x, y float64, anchor, words string) {
	fmt.Fprintf(&d.b, `<text x="%.1f" y="%.1f" text-anchor="%s">%s</text>`, x, y, anchor, html.EscapeString(words))
}

// node draws the bar of a step and its name at the left edge.
func (d *flowDrawing) node(n *flowNode) {
	if !n.inside {
		return
	}
	half := math.Max(n.throughput*d.perKilogram/2, 6)
	fmt.Fprintf(&d.b, `<path class="bar-line" d="M%.1f %.1fH%.1f"/>`, flowMiddle-half, n.y, flowMiddle+half)
	fmt.Fprintf(&d.b, `<text class="step" x="0" y="%.1f">%s</text>`, n.y+4.5, html.EscapeString(n.name))
}

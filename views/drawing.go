package views

import (
	"fmt"
	"html"
	"html/template"
	"math"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// A layer is one phase in a drawn vessel, lowest first. Its share is of the
// vessel's nominal volume.
type layer struct {
	phase string // "solid", "aqueous", "organic"
	share float64
}

// drawVessel draws an outline with layers at their real heights, size units
// high. The limit, a share of the nominal volume, is drawn as a broken line;
// zero draws none. The name says in words what the picture shows.
func drawVessel(p profile, layers []layer, limit, size float64, name string) template.HTML {
	const edge = 1.5
	w, h := 2*p.widest()+2*edge, p.height()+2*edge
	x := w / 2
	var b strings.Builder
	fmt.Fprintf(&b, `<svg role="img" aria-label="%s" viewBox="0 0 %.1f %.1f" width="%.0f" height="%.0f">`,
		html.EscapeString(name), w, h, size*w/h, size)
	filled, from := 0.0, 0.0
	for _, l := range layers {
		if l.share <= 0 {
			continue
		}
		filled += l.share
		to := p.level(filled)
		fmt.Fprintf(&b, `<path class="%s" d="%s"/>`, l.phase, p.between(from, to, x, edge))
		r := p.radius(to)
		fmt.Fprintf(&b, `<path class="edge" d="M%.1f %.1fH%.1f"/>`, x-r, edge+p.height()-to, x+r)
		from = to
	}
	if limit > 0 {
		at := p.level(limit)
		r := p.radius(at)
		fmt.Fprintf(&b, `<path class="limit" d="M%.1f %.1fH%.1f"/>`, x-r, edge+p.height()-at, x+r)
	}
	fmt.Fprintf(&b, `<path class="line" d="%s"/></svg>`, p.between(0, p.height(), x, edge))
	return template.HTML(b.String())
}

// drawStep draws the vessel of a step with its contents. Larger vessels are
// drawn larger, by the cube root of their size, so that a strip of them reads
// like the bench.
func drawStep(s planner.StepReport, largest chem.Volume) template.HTML {
	size := 112.0
	if s.Vessel.Size > 0 && largest > 0 {
		size = math.Max(58, 112*math.Cbrt(float64(s.Vessel.Size/largest)))
	}
	return drawVessel(wareProfile(s.Vessel.Kind), layersOf(s), 0, size, stepPicture(s))
}

// layersOf sums the contents of a step by phase and lays them solid, then the
// denser liquid, then the lighter one. The shares are those of the contents'
// volumes, brought to the fill that the walk-through reports.
func layersOf(s planner.StepReport) []layer {
	type sum struct {
		v chem.Volume
		m chem.Mass
	}
	sums := map[string]sum{}
	var all chem.Volume
	for _, c := range s.Contents {
		if c.Phase == "gas" {
			continue
		}
		t := sums[c.Phase]
		t.v += c.Volume
		t.m += c.Mass
		sums[c.Phase] = t
		all += c.Volume
	}
	if !(all > 0) {
		return nil
	}
	order := []string{"solid", "aqueous", "organic"}
	if o, a := sums["organic"], sums["aqueous"]; o.v > 0 && a.v > 0 && float64(o.m)/float64(o.v) > float64(a.m)/float64(a.v) {
		order = []string{"solid", "organic", "aqueous"}
	}
	var layers []layer
	for _, phase := range order {
		if v := sums[phase].v; v > 0 {
			layers = append(layers, layer{phase, float64(s.Vessel.Fill) * float64(v/all)})
		}
	}
	return layers
}

// stepPicture says in words what the drawing of a step shows.
func stepPicture(s planner.StepReport) string {
	kind := s.Vessel.Kind
	if kind == "" {
		kind = "vessel"
	}
	text := "step " + fmt.Sprint(s.N) + ": " + kind
	if s.Vessel.Size > 0 {
		text += " of " + volumePlain(s.Vessel.Size) + ", " + fillText(s.Vessel.Fill) + " full"
	}
	layers := layersOf(s)
	if len(layers) == 0 {
		return text
	}
	var parts []string
	for i := len(layers) - 1; i >= 0; i-- {
		parts = append(parts, layers[i].phase)
	}
	return text + "; from the top: " + strings.Join(parts, ", ")
}

// drawBottle draws a bottle with its fill: a narrow-necked one for what is
// measured by volume, a jar for the rest.
func drawBottle(b inventory.Bottle, f inventory.StockForm, size float64) template.HTML {
	p, phase := wideJar(), "solid"
	if f.Measure == inventory.ByVolume {
		p, phase = narrowBottle(), "aqueous"
		if f.Diluent != "water" {
			phase = "organic"
		}
	}
	fill := fillOf(b)
	name := "bottle " + b.Code + ", " + fillText(chem.Fraction(fill)) + " full"
	if b.Size <= 0 {
		name = "bottle " + b.Code + ", size not known"
	}
	return drawVessel(p, []layer{{phase, fill}}, 0, size, name)
}

// fillOf returns the share of a bottle that is filled, or zero where its size
// isn't known.
func fillOf(b inventory.Bottle) float64 {
	if b.Size <= 0 {
		return 0
	}
	return math.Min(float64(b.Content)/float64(b.Size), 1.2)
}

// drawCarboy draws a waste container with its content and its fill limit.
func drawCarboy(c inventory.Carboy, size float64) template.HTML {
	fill := 0.0
	if c.SizeUL > 0 {
		fill = float64(c.ContentUL) / float64(c.SizeUL)
	}
	name := "carboy " + c.Code + ", " + fillText(chem.Fraction(fill)) + " full"
	return drawVessel(carboyCan(), []layer{{"aqueous", fill}}, c.FillLimit, size, name)
}

// stateShapes are the five shapes of the need states, by their words. The shape
// says it without colour; the word stands beside it.
var stateShapes = map[string]string{
	"covered": `<rect x="1" y="1" width="11" height="11" fill="currentColor"/>`,
	"tight":   `<rect x="1.5" y="1.5" width="10" height="10" fill="none" stroke="currentColor"/><path d="M1 1h5.5v11H1z" fill="currentColor"/>`,
	"late":    `<path d="M2 1.5h9L2 11.5h9z" fill="none" stroke="currentColor" stroke-width="1.2" stroke-linejoin="round"/><path d="M3.4 10.8 6.5 7.4l3.1 3.4z" fill="currentColor"/>`,
	"unfit":   `<rect x="1.5" y="1.5" width="10" height="10" fill="none" stroke="currentColor"/><path d="M2 2l9 9M11 2l-9 9" stroke="currentColor"/>`,
	"short":   `<rect x="1.5" y="1.5" width="10" height="10" fill="none" stroke="currentColor"/>`,
}

// stateMark gives the shape and the word of a need state.
func stateMark(word string) template.HTML {
	return template.HTML(`<span class="state"><svg viewBox="0 0 13 13" aria-hidden="true">` +
		stateShapes[word] + `</svg>` + html.EscapeString(word) + `</span>`)
}

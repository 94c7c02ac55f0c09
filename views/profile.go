package views

import (
	"fmt"
	"math"
	"strings"
)

// The drawings of bottles and vessels are data: a vessel is a body of
// revolution given by its outline, and the level of what is in it is where the
// volume below equals the volume inside, not where the picture looks half full.

// A profile is the outline of a vessel from its bottom to its mouth. Heights and
// radii are in units of the drawing; radii are joined by straight lines.
type profile struct {
	points []outlinePoint
	// mark is the height up to which the vessel holds its nominal volume.
	mark float64
}

// An outlinePoint is the inner radius of a vessel at a height.
type outlinePoint struct{ h, r float64 }

// height returns the height of the mouth.
func (p profile) height() float64 { return p.points[len(p.points)-1].h }

// widest returns the largest radius.
func (p profile) widest() float64 {
	w := 0.0
	for _, q := range p.points {
		w = math.Max(w, q.r)
	}
	return w
}

// radius returns the radius at a height between bottom and mouth.
func (p profile) radius(h float64) float64 {
	for i := 1; i < len(p.points); i++ {
		a, b := p.points[i-1], p.points[i]
		if h <= b.h {
			if b.h == a.h {
				return b.r
			}
			return a.r + (b.r-a.r)*(h-a.h)/(b.h-a.h)
		}
	}
	return p.points[len(p.points)-1].r
}

// volume returns the volume below a height, in cubic units of the drawing: the
// sum of the frustums
//
//	V = π·Δh·(a² + a·b + b²)/3
//
// of radii a and b between the points of the outline.
func (p profile) volume(h float64) float64 {
	sum := 0.0
	for i := 1; i < len(p.points); i++ {
		a, b := p.points[i-1], p.points[i]
		if h <= a.h {
			break
		}
		top, r := b.h, b.r
		if h < b.h {
			top, r = h, p.radius(h)
		}
		sum += math.Pi * (top - a.h) * (a.r*a.r + a.r*r + r*r) / 3
	}
	return sum
}

// level returns the height at which the contents stand when they fill the share
// given of the nominal volume; never above the mouth. It halves the interval
// until the height is known to a thousandth of a drawing unit.
func (p profile) level(fill float64) float64 {
	want := fill * p.volume(p.mark)
	low, high := 0.0, p.height()
	if want >= p.volume(high) {
		return high
	}
	for high-low > 1e-3 {
		if mid := (low + high) / 2; p.volume(mid) < want {
			low = mid
		} else {
			high = mid
		}
	}
	return (low + high) / 2
}

// between returns the part of the outline between two heights, as points of a
// closed path around the axis at x, in a picture whose mouth is at y = top.
func (p profile) between(from, to, x, top float64) string {
	inside := []outlinePoint{{from, p.radius(from)}}
	for _, q := range p.points {
		if q.h > from && q.h < to {
			inside = append(inside, q)
		}
	}
	inside = append(inside, outlinePoint{to, p.radius(to)})
	var b strings.Builder
	bottom := top + p.height()
	for i, q := range inside {
		fmt.Fprintf(&b, "%c%.1f %.1f", letter(i), x+q.r, bottom-q.h)
	}
	for i := len(inside) - 1; i >= 0; i-- {
		fmt.Fprintf(&b, "L%.1f %.1f", x-inside[i].r, bottom-inside[i].h)
	}
	b.WriteByte('Z')
	return b.String()
}

func letter(i int) byte {
	if i == 0 {
		return 'M'
	}
	return 'L'
}

// arc adds points of a circle around (h, 0) between two angles, measured from
// the downward direction, in steps fine enough to look round.
func arc(points []outlinePoint, h, r, from, to float64) []outlinePoint {
	const steps = 18
	for i := 0; i <= steps; i++ {
		a := from + (to-from)*float64(i)/steps
		points = append(points, outlinePoint{h - r*math.Cos(a), r * math.Sin(a)})
	}
	return points
}

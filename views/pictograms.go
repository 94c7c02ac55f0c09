package views

import (
	"fmt"
	"strconv"
	"strings"

	"github.com/jung-kurt/gofpdf"
)

// The nine hazard pictograms of UN GHS Annex 1: a black symbol on white in a
// red square set on a point. They are drawn from paths in a field of 100 by 100
// whose corners are the frame's, so that they are sharp at any size.

// A stroke of the pen: a path in the commands M, L, C and Z with absolute
// coordinates, filled in ink or in white, or drawn as a line of a width.
type pictogramShape struct {
	path  string
	white bool
	line  float64 // width; 0 fills
}

// pictogramName is the standard's name of a pictogram's symbol.
func pictogramName(code string) string {
	if name, ok := pictogramNames[code]; ok {
		return name
	}
	return code
}

var pictogramNames = map[string]string{
	"GHS01": "exploding bomb",
	"GHS02": "flame",
	"GHS03": "flame over circle",
	"GHS04": "gas cylinder",
	"GHS05": "corrosion",
	"GHS06": "skull and crossbones",
	"GHS07": "exclamation mark",
	"GHS08": "health hazard",
	"GHS09": "environment",
}

// drawPictogram draws a pictogram with its frame into a square of side at x, y.
// An unknown code is written out, never left blank.
func (s *sheet) drawPictogram(code string, x, y, side float64) {
	shapes, ok := pictogramShapes[code]
	if !ok {
		s.put(family, "B", textSize, x, y+side/2-2, code)
		return
	}
	unit := side / 100
	at := func(px, py float64) gofpdf.PointType {
		return gofpdf.PointType{X: x + px*unit, Y: y + py*unit}
	}
	s.pdf.SetFillColor(255, 255, 255)
	// The red of the standard's frame; its width is a fifteenth of the side of the square.
	s.pdf.SetDrawColor(225, 0, 15)
	s.pdf.SetLineWidth(5.2 * unit)
	s.pdf.SetLineJoinStyle("miter")
	s.tracePath("M 50 4 L 96 50 L 50 96 L 4 50 Z", at)
	s.pdf.DrawPath("B")
	size := 1.0
	if shrink, ok := pictogramSize[code]; ok {
		size = shrink
	}
	inside := func(px, py float64) gofpdf.PointType { return at(50+(px-50)*size, 50+(py-50)*size) }
	for _, shape := range shapes {
		s.drawShape(shape, inside, unit*size)
	}
	s.pdf.SetDrawColor(0, 0, 0)
	s.pdf.SetFillColor(0, 0, 0)
	s.pdf.SetLineCapStyle("butt")
}

func (s *sheet) drawShape(shape pictogramShape, at func(x, y float64) gofpdf.PointType, unit float64) {
	ink := 0
	if shape.white {
		ink = 255
	}
	s.pdf.SetFillColor(ink, ink, ink)
	s.pdf.SetDrawColor(ink, ink, ink)
	s.pdf.SetLineWidth(shape.line * unit)
	s.pdf.SetLineCapStyle("round")
	s.pdf.SetLineJoinStyle("round")
	s.tracePath(shape.path, at)
	if shape.line > 0 {
		s.pdf.DrawPath("D")
		return
	}
	s.pdf.DrawPath("f*")
}

// tracePath follows a path. It panics on a path that isn't one, which a test
// would have shown.
func (s *sheet) tracePath(path string, at func(x, y float64) gofpdf.PointType) {
	words := strings.Fields(path)
	for i := 0; i < len(words); {
		command, count := words[i], map[string]int{"M": 2, "L": 2, "C": 6, "Z": 0}[words[i]]
		var n [6]float64
		for k := range count {
			x, err := strconv.ParseFloat(words[i+1+k], 64)
			if err != nil {
				panic(fmt.Sprintf("views: pictogram path %q: %v", path, err))
			}
			n[k] = x
		}
		i += 1 + count
		p, q, r := at(n[0], n[1]), at(n[2], n[3]), at(n[4], n[5])
		switch command {
		case "M":
			s.pdf.MoveTo(p.X, p.Y)
		case "L":
			s.pdf.LineTo(p.X, p.Y)
		case "C":
			s.pdf.CurveBezierCubicTo(p.X, p.Y, q.X, q.Y, r.X, r.Y)
		case "Z":
			s.pdf.ClosePath()
		default:
			panic("views: pictogram path command " + command)
		}
	}
}

// disc is the path of a circle; k is the usual length of the handles of four
// cubic arcs, 4/3·(√2 − 1).
func disc(cx, cy, r float64) string {
	const k = 0.5522847498
	f := func(n ...float64) string {
		var words []string
		for _, x := range n {
			words = append(words, strconv.FormatFloat(x, 'f', 2, 64))
		}
		return strings.Join(words, " ")
	}
	return "M " + f(cx+r, cy) +
		" C " + f(cx+r, cy+k*r, cx+k*r, cy+r, cx, cy+r) +
		" C " + f(cx-k*r, cy+r, cx-r, cy+k*r, cx-r, cy) +
		" C " + f(cx-r, cy-k*r, cx-k*r, cy-r, cx, cy-r) +
		" C " + f(cx+k*r, cy-r, cx+r, cy-k*r, cx+r, cy) + " Z"
}

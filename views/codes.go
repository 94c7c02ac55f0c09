package views

import (
	"fmt"

	"github.com/boombuler/barcode"
	"github.com/boombuler/barcode/code128"
	"github.com/boombuler/barcode/qr"
)

// codeMatrix is a code as dark and light modules, row by row; a bar code has
// one row.
type codeMatrix struct {
	side int // modules in a row
	rows [][]bool
}

// quietQR and quiet128 are the light margins the standards ask for, in modules
// (ISO/IEC 18004 and 15417).
const (
	quietQR  = 4
	quiet128 = 10
	leastX   = 0.25 // mm, narrowest module for a hand scanner (practice for Code 128)
)

// qrCode encodes text with level Q, so that a quarter of it may be soiled, or
// with level M if it is long.
func qrCode(text string) (codeMatrix, error) {
	level := qr.Q
	if len(text) > 100 {
		level = qr.M
	}
	code, err := qr.Encode(text, level, qr.Auto)
	if err != nil {
		return codeMatrix{}, fmt.Errorf("code for %q: %w", text, err)
	}
	return matrixOf(code), nil
}

// code128 encodes text as Code 128.
func code128Bars(text string) (codeMatrix, error) {
	code, err := code128.Encode(text)
	if err != nil {
		return codeMatrix{}, fmt.Errorf("bar code for %q: %w", text, err)
	}
	return matrixOf(code), nil
}

func matrixOf(code barcode.Barcode) codeMatrix {
	b := code.Bounds()
	m := codeMatrix{side: b.Dx()}
	for y := b.Min.Y; y < b.Max.Y; y++ {
		row := make([]bool, b.Dx())
		for x := range row {
			r, _, _, _ := code.At(b.Min.X+x, y).RGBA()
			row[x] = r < 0x8000
		}
		m.rows = append(m.rows, row)
	}
	return m
}

// drawMatrix draws a square code with its quiet zone inside side.
func (s *sheet) drawMatrix(m codeMatrix, x, y, side float64) {
	module := side / float64(m.side+2*quietQR)
	for j, row := range m.rows {
		s.drawRun(row, x+quietQR*module, y+(float64(j)+quietQR)*module, module, module)
	}
}

// drawBars draws a bar code whose quiet zones end at x and x+width; it is
// narrower than width if its bars would be wider than they need to be.
func (s *sheet) drawBars(m codeMatrix, x, y, width, height float64) {
	module := max(min(width/float64(m.side+2*quiet128), 0.4), leastX)
	s.drawRun(m.rows[0], x+quiet128*module, y, module, height)
}

// drawRun fills the dark modules of one row, neighbours as one rectangle.
func (s *sheet) drawRun(row []bool, x, y, module, height float64) {
	s.pdf.SetFillColor(0, 0, 0)
	for i := 0; i < len(row); i++ {
		if !row[i] {
			continue
		}
		from := i
		for i < len(row) && row[i] {
			i++
		}
		s.pdf.Rect(x+float64(from)*module, y, float64(i-from)*module, height, "F")
	}
}

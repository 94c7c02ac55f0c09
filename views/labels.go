package views

import (
	"bytes"
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/jung-kurt/gofpdf"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// ErrNoLabels says that a sheet of labels was asked for without a bottle.
var ErrNoLabels = errors.New("no bottle to label")

// BottleLabel is what one label says.
type BottleLabel struct {
	Bottle    inventory.Bottle
	Form      inventory.StockForm
	Substance inventory.Substance
	Owner     string // lab or person responsible, with how to reach them; short
	URL       string // address of the bottle's page, for the code
}

// smallPack is the size below which a label may drop statements: identifier,
// pictograms, signal word and a pointer to the full label stay (29 CFR
// 1910.1200(f)(12) for 100 mL and less; CLP Annex I 1.5.2 for less than 125 mL).
// Which law holds is the site's to say; the stricter size is taken.
const smallPack = 100 * chem.Millilitre

// BottleLabels prints labels with the label elements of GHS, eight to a sheet
// of 105 by 74 mm on A4: name, strength, pictograms, signal word, hazard and at
// most six precautionary statements, dates, code as text, bar code and QR. A
// substance without a record says "no data". Content by law differs: what is
// printed is a full label, and local rules decide whether it suffices.
func BottleLabels(labels []BottleLabel, o PaperOptions) ([]byte, error) {
	if len(labels) == 0 {
		return nil, ErrNoLabels
	}
	size := "A4"
	if o.Letter {
		size = "Letter"
	}
	pdf := gofpdf.New("P", "mm", size, "")
	s := &sheet{pdf: pdf, options: o, kind: "Labels", widths: map[typeface]map[rune]float64{}}
	s.width, s.height = pdf.GetPageSize()
	s.setUp("Bottle labels")
	if err := s.fonts(); err != nil {
		return nil, err
	}
	cell := 0 // the next free one
	for _, l := range labels {
		b := box{w: s.width / labelColumns, h: s.height / labelRows}
		wide := s.needsTwo(l, b.w)
		if wide && cell%labelColumns > 0 {
			cell++
		}
		if cell%(labelColumns*labelRows) == 0 {
			pdf.AddPage()
			s.cutMarks(labelColumns, labelRows)
			cell = 0
		}
		b.x, b.y = float64(cell%labelColumns)*b.w, float64(cell/labelColumns)*b.h
		cell++
		if wide {
			b.w = s.width
			cell++
		}
		if err := s.label(l, b); err != nil {
			return nil, err
		}
	}
	var out bytes.Buffer
	if err := pdf.Output(&out); err != nil {
		return nil, fmt.Errorf("labels: %w", err)
	}
	return out.Bytes(), nil
}

// A sheet has so many labels.
const labelColumns, labelRows = 2, 4

// needsTwo reports that the hazard statements don't fit beside everything else
// on one label, which then is two wide.
func (s *sheet) needsTwo(l BottleLabel, width float64) bool {
	if isSmall(l) {
		return false
	}
	const room, nameCost = 5, 2 // lines of statements under a name of one line; lines that each further line of it costs
	inside := width - 2*labelInset
	note := planner.HazardOf(l.Substance, l.Form, l.Bottle)
	names := len(s.split(family, "B", 12, l.Form.Name, inside)) + len(s.split(family, "", labelText, identity(l), inside)) - 2
	return len(s.split(family, "", labelText, labelStatementText(note), inside)) > room-nameCost*names
}

// labelStatementText is what a full label must say.
func labelStatementText(note planner.HazardNote) string {
	text := statementsText(note)
	if strings.Contains(note.Basis, "from memory") {
		text += " Classification unverified: read the supplier's sheet."
	}
	return text
}

// box is a rectangle on the page in millimetres.
type box struct{ x, y, w, h float64 }

// cutMarks are short hairlines where the cuts cross the page's edges.
func (s *sheet) cutMarks(columns, rows int) {
	const mark = 4.0
	s.pdf.SetDrawColor(0, 0, 0)
	s.pdf.SetLineWidth(hairline)
	for c := 1; c < columns; c++ {
		x := float64(c) * s.width / float64(columns)
		s.pdf.Line(x, 0, x, mark)
		s.pdf.Line(x, s.height-mark, x, s.height)
	}
	for r := 1; r < rows; r++ {
		y := float64(r) * s.height / float64(rows)
		s.pdf.Line(0, y, mark, y)
		s.pdf.Line(s.width-mark, y, s.width, y)
	}
}

// Sizes on a label. The small text has an x-height of 1.45 mm, over the 1.4 mm
// that CLP asks for up to 3 L.
const (
	labelText   = 8.5
	labelLine   = 3.5
	labelInset  = 6.0
	labelSign   = 16.0 // pictograms, the size CLP asks for if possible
	labelQR     = 17.0
	labelHeight = 9.0 // of the bar code
)

// label fills one box.
func (s *sheet) label(l BottleLabel, b box) error {
	bars, err := code128Bars(l.Bottle.Code)
	if err != nil {
		return err
	}
	left, right := b.x+labelInset, b.x+b.w-labelInset
	note := planner.HazardOf(l.Substance, l.Form, l.Bottle)
	y := b.y + labelInset
	for _, line := range s.split(family, "B", 12, l.Form.Name, right-left) {
		s.put(family, "B", 12, left, y, line)
		y += 5
	}
	for _, line := range s.split(family, "", labelText, identity(l), right-left) {
		s.put(family, "", labelText, left, y, line)
		y += labelLine
	}
	y++
	// The signal word keeps its room beside the pictograms: five of them shrink.
	side := min(labelSign, (right-left-22)/float64(max(len(note.Pictograms), 1))-1)
	for i, code := range note.Pictograms {
		s.drawPictogram(code, left+float64(i)*(side+1), y, side)
	}
	if note.Signal != "" {
		s.putRight(family, "B", 13, right, y, note.Signal)
	}
	signs := float64(len(note.Pictograms)) * (side + 1)
	owner := s.split(family, "", labelText, l.Owner, max(right-left-signs-2, 30))
	if signs > right-left-32 {
		owner = nil // five pictograms leave no room; the owner stands on the bottle's page
	}
	for i, line := range owner {
		s.putRight(family, "", labelText, right, y+6+float64(i)*labelLine, line)
	}
	if len(note.Pictograms) > 0 {
		y += side + 1
	} else {
		y += 7 + float64(len(owner))*labelLine
	}
	foot := b.y + b.h - labelInset - labelQR
	s.labelStatements(l, note, box{left, y, right - left, foot - 1 - y})
	return s.labelFoot(l, bars, left, right, foot)
}

func identity(l BottleLabel) string {
	words := []string{}
	if cas := casText(l); cas != "" {
		words = append(words, cas)
	}
	words = append(words, storedPlain(l.Bottle.Size, l.Form.Measure))
	if l.Bottle.Lot != "" {
		words = append(words, "lot "+l.Bottle.Lot)
	}
	if l.Form.Additive != "" {
		words = append(words, "stabilised with "+l.Form.Additive)
	}
	return strings.Join(words, "; ")
}

// casText is the CAS number of what is in the bottle: a hydrate has its own.
// Where that isn't known, the number is said to be that of the anhydrous
// substance.
func casText(l BottleLabel) string {
	if hydrate, ok := planner.HydrateOf(l.Substance, l.Form); ok {
		return "CAS " + hydrate.CAS
	}
	switch {
	case l.Substance.CAS == "":
		return ""
	case l.Form.HydrateWaters > 0:
		return "CAS " + l.Substance.CAS + " (anhydrous)"
	}
	return "CAS " + l.Substance.CAS
}

// labelStatements writes the statements into a box, and as many of six
// precautionary ones as fit. What doesn't fit is said to be missing, never cut
// off in silence.
func (s *sheet) labelStatements(l BottleLabel, note planner.HazardNote, b box) {
	text := labelStatementText(note)
	if isSmall(l) {
		text = "Small container: the full label is on the outer pack or the bottle's page."
		if strings.HasPrefix(note.Basis, "no data") {
			text = "NO DATA: not assessed. " + text
		}
	}
	most := max(int(b.h/labelLine), 1)
	lines := s.split(family, "", labelText, text, b.w)
	if !isSmall(l) {
		for _, code := range sixOf(note.P) {
			longer := text + " " + sentence(chem.StatementLine(code))
			if more := s.split(family, "", labelText, longer, b.w); len(more) <= most {
				text, lines = longer, more
			}
		}
	}
	if len(lines) > most {
		lines = append(lines[:most-1], "… more on the bottle's page: scan the code.")
	}
	for i, line := range lines {
		s.put(family, "", labelText, b.x, b.y+float64(i)*labelLine, line)
	}
}

func isSmall(l BottleLabel) bool {
	return l.Form.Measure == inventory.ByVolume && chem.Volume(l.Bottle.Size)*chem.Microlitre <= smallPack ||
		l.Form.Measure == inventory.ByMass && chem.Mass(l.Bottle.Size)*chem.Microgram <= 100*chem.Gram
}

// labelP lists precautionary statements by how much they matter on a bottle in
// a lab; a label has six at most (CLP Art. 28(3)). The order is this program's
// choice.
var labelP = []string{"P280", "P201", "P210", "P220", "P260", "P261", "P305+P351+P338", "P303+P361+P353", "P301+P330+P331",
	"P304+P340", "P308+P313", "P310", "P231+P232", "P273", "P370+P378", "P403+P235", "P405", "P501"}

func sixOf(codes []string) []string {
	var chosen []string
	for _, code := range labelP {
		if slices.Contains(codes, code) && len(chosen) < 6 {
			chosen = append(chosen, code)
		}
	}
	return chosen
}

// labelFoot has the codes and dates.
func (s *sheet) labelFoot(l BottleLabel, bars codeMatrix, left, right, y float64) error {
	address := l.URL
	if address == "" {
		address = l.Bottle.Code
	}
	qr, err := qrCode(address)
	if err != nil {
		return err
	}
	s.drawMatrix(qr, right-labelQR, y, labelQR)
	s.drawBars(bars, left-4, y, 50, labelHeight)
	s.put(family, "B", 13, left, y+labelHeight+0.5, l.Bottle.Code)
	x := left + 26
	s.put(family, "", labelText, x, y+labelHeight+0.8, "received "+orUnknown(l.Bottle.Received))
	s.put(family, "", labelText, x, y+labelHeight+0.8+labelLine, "use by "+orUnknown(l.Bottle.Expiry))
	opened := "opened _________"
	if l.Bottle.Opened.Set() {
		opened = "opened " + dateText(l.Bottle.Opened)
	}
	if l.Form.PeroxideTestDays > 0 {
		opened += "  peroxide test _________"
	}
	s.put(family, "", labelText, left, y+labelHeight+1+2*labelLine, opened)
	return nil
}

func orUnknown(d inventory.Date) string {
	if !d.Set() {
		return "no data"
	}
	return dateText(d)
}

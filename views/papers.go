package views

import (
	"bytes"
	"fmt"
	"strings"
	"time"

	"github.com/jung-kurt/gofpdf"

	"stillroom/inventory"
	"stillroom/planner"
	"stillroom/static"
)

// The papers are set for a hood: black on white, nothing under 11 points,
// hairlines instead of boxes, a narrow margin for ticks and numbers. Every page
// says which plan it belongs to and carries a code that leads back to the run.

// PaperOptions say how a paper is printed.
type PaperOptions struct {
	Letter  bool   // paper of North America instead of A4
	RunURL  string // address of the run, for the code on every page; the plan's revision is added to it
	RunName string // "run 12"; empty for a plan that isn't on the slate
	// PrintedBy and PrintedAt are printed, and PrintedAt is the file's creation
	// date: the same plan with the same options gives the same bytes.
	PrintedBy string
	PrintedAt time.Time
	// Tools are the lab's balances and cylinders, to whose divisions amounts are
	// rounded; empty takes the plan's.
	Tools []inventory.Equipment
	// Plain leaves the file uncompressed, for looking into it.
	Plain bool
}

// Sizes in points and lengths in millimetres.
const (
	textSize   = 11.0
	amountSize = 15.0 // amounts are read at arm's length
	titleSize  = 24.0
	lineHeight = 4.6 // of text
	marginLeft = 12.0
	textLeft   = 27.0 // the margin column holds ticks, numbers and codes
	qrSide     = 21.0 // of the code on the first page
	qrSmall    = 16.0 // on the others
	tickSide   = 7.0
	hairline   = 0.2
	ruleWidth  = 0.5
)

// sheet is a paper under way: a cursor y that only moves down, on one page
// after another.
type sheet struct {
	pdf           *gofpdf.Fpdf
	plan          *planner.Plan
	options       PaperOptions
	kind          string // "Pick list"
	width, height float64
	right, bottom float64
	y             float64
	end           float64 // where the last line written ended
	continued     string  // heading repeated on the next page
	qr            codeMatrix
	widths        map[typeface]map[rune]float64
}

// typeface is a family with its style. The widths of its characters are kept at
// size 1, because text is measured far more often than it is written.
type typeface struct{ family, style string }

// newSheet opens a paper with its first page.
func newSheet(p *planner.Plan, o PaperOptions, kind string) (*sheet, error) {
	if p == nil || p.Recipe == nil {
		return nil, fmt.Errorf("%s: there is no plan to print", strings.ToLower(kind))
	}
	size := "A4"
	if o.Letter {
		size = "Letter"
	}
	pdf := gofpdf.New("P", "mm", size, "")
	s := &sheet{pdf: pdf, plan: p, options: o, kind: kind, widths: map[typeface]map[rune]float64{}}
	s.width, s.height = pdf.GetPageSize()
	s.right, s.bottom = s.width-marginLeft, s.height-18
	qr, err := qrCode(s.backAddress())
	if err != nil {
		return nil, err
	}
	s.qr = qr
	s.setUp(kind + ": " + p.Recipe.Title)
	if err := s.fonts(); err != nil {
		return nil, err
	}
	s.page()
	return s, nil
}

// setUp settles everything that would make the bytes of the file depend on when
// and where it is made.
func (s *sheet) setUp(title string) {
	s.pdf.SetCompression(!s.options.Plain)
	s.pdf.SetCatalogSort(true)
	s.pdf.SetCreationDate(s.options.PrintedAt.UTC())
	s.pdf.SetModificationDate(s.options.PrintedAt.UTC())
	s.pdf.SetAutoPageBreak(false, 0)
	s.pdf.SetCellMargin(0)
	s.pdf.SetTitle(title, true)
	s.pdf.SetProducer("Stillroom", true)
	s.pdf.SetCreator("Stillroom", true)
}

// The weights of the typeface.
const (
	family      = "text"
	familyLight = "light"
)

func (s *sheet) fonts() error {
	for _, f := range []struct{ family, style, file string }{
		{family, "", "font/source-sans-3-regular.ttf"},
		{family, "B", "font/source-sans-3-semibold.ttf"},
		{familyLight, "", "font/source-sans-3-light.ttf"},
	} {
		content, err := static.Read(f.file)
		if err != nil {
			return fmt.Errorf("papers: typeface %s: %w", f.file, err)
		}
		s.pdf.AddUTF8FontFromBytes(f.family, f.style, content)
	}
	return s.pdf.Error()
}

// backAddress is what the code on the paper holds: the run's address with the
// revision printed, so that the page can say what has changed since.
func (s *sheet) backAddress() string {
	address := s.options.RunURL
	if address == "" {
		return "revision " + s.plan.Revision
	}
	join := "?"
	if strings.Contains(address, "?") {
		join = "&"
	}
	return address + join + "printed=" + s.plan.Revision
}

// page starts a page with its head. The first one has the title, the others a
// line that says what goes on.
func (s *sheet) page() {
	s.pdf.AddPage()
	s.pdf.SetTextColor(0, 0, 0)
	first := s.pdf.PageNo() == 1
	side := qrSmall
	s.y = 9
	if first {
		side = qrSide
		s.y = 12
	}
	s.drawMatrix(s.qr, s.right-side, s.y-2, side)
	below := s.y + side
	if first {
		s.put(familyLight, "", titleSize, marginLeft, s.y, s.kind)
		s.y += 12
	} else {
		s.put(family, "B", textSize, marginLeft, s.y, s.kind)
		s.y += lineHeight
	}
	limit := s.right - qrSide - 4 - marginLeft
	for _, line := range s.headLines() {
		for _, part := range s.split(family, "", textSize, line, limit) {
			s.put(family, "", textSize, marginLeft, s.y, part)
			s.y += lineHeight
		}
	}
	s.y = max(s.y, below-1) + 1
	s.rule(ruleWidth)
	s.y += 3
	if !first && s.continued != "" {
		s.put(family, "B", textSize, marginLeft, s.y, s.continued+", continued")
		s.y += lineHeight + 2
	}
}

func (s *sheet) headLines() []string {
	p := s.plan
	what := p.Recipe.Title
	if p.Recipe.Version != "" {
		what += ", recipe version " + p.Recipe.Version
	}
	run := fmt.Sprintf("%s of %s on %s", massPlain(p.Target.Mass), p.Target.Substance, p.On.Long())
	if s.options.RunName != "" {
		run = s.options.RunName + ": " + run
	}
	return []string{what, run, "Plan revision " + p.Revision + "; the code opens the run and says whether this sheet is current"}
}

// finish writes the foot of every page, which needs the number of pages, and
// returns the file.
func (s *sheet) finish() ([]byte, error) {
	pages := s.pdf.PageCount()
	printed := "Printed " + s.options.PrintedAt.Format("Monday 2 January 2006 15:04")
	if s.options.PrintedBy != "" {
		printed += " by " + s.options.PrintedBy
	}
	for n := 1; n <= pages; n++ {
		s.pdf.SetPage(n)
		s.y = s.bottom + 4
		s.rule(hairline)
		s.put(family, "", textSize, marginLeft, s.y+1.5, printed)
		s.putRight(family, "", textSize, s.right, s.y+1.5, fmt.Sprintf("page %d of %d", n, pages))
		s.put(family, "", textSize, marginLeft, s.y+1.5+lineHeight, "Not valid if the code shows a later revision than "+s.plan.Revision)
	}
	var out bytes.Buffer
	if err := s.pdf.Output(&out); err != nil {
		return nil, fmt.Errorf("%s: %w", strings.ToLower(s.kind), err)
	}
	return out.Bytes(), nil
}

// room starts a new page if less than h is left on this one. It reports
// whether it did.
func (s *sheet) room(h float64) bool {
	if s.y+h <= s.bottom {
		return false
	}
	s.page()
	return true
}

// put writes one line whose top is at y.
func (s *sheet) put(family, style string, size, x, y float64, text string) {
	s.pdf.SetFont(family, style, size)
	// The base line lies three quarters of the size below the top.
	s.pdf.Text(x, y+size*0.75*25.4/72, text)
}

func (s *sheet) putRight(family, style string, size, x, y float64, text string) {
	s.put(family, style, size, x-s.measure(family, style, size, text), y, text)
}

// measure returns the width of a line. The typeface is set without kerning, so
// it is the sum of its characters.
func (s *sheet) measure(family, style string, size float64, text string) float64 {
	face := typeface{family, style}
	widths := s.widths[face]
	if widths == nil {
		widths = map[rune]float64{}
		s.widths[face] = widths
	}
	sum := 0.0
	for _, r := range text {
		w, ok := widths[r]
		if !ok {
			const large = 1000
			s.pdf.SetFont(family, style, large)
			w = s.pdf.GetStringWidth(string(r)) / large
			widths[r] = w
		}
		sum += w
	}
	return sum * size
}

// split breaks text into lines no wider than limit, at blanks only: a number
// and its unit are joined by a space that doesn't break. A word wider than the
// line is broken at its end, never cut off.
func (s *sheet) split(family, style string, size float64, text string, limit float64) []string {
	var lines []string
	for {
		line, rest := s.firstLine(family, style, size, text, limit)
		lines = append(lines, line)
		if rest == "" {
			return lines
		}
		text = rest
	}
}

// firstLine takes as many words as fit and returns them and what is left.
func (s *sheet) firstLine(family, style string, size float64, text string, limit float64) (line, rest string) {
	blank := s.measure(family, style, size, " ")
	width, end := 0.0, 0 // of the words taken
	for start := 0; start < len(text); {
		next := strings.IndexByte(text[start:], ' ')
		if next < 0 {
			next = len(text) - start
		}
		word := s.measure(family, style, size, text[start:start+next])
		switch {
		case start == 0 && word > limit:
			head, tail := s.breakWord(family, style, size, text[:next], limit)
			return head, tail + text[next:]
		case start > 0 && width+blank+word > limit:
			return text[:end], text[start:]
		case start > 0:
			width += blank
		}
		width += word
		end = start + next
		start = end + 1
	}
	return text[:end], ""
}

func (s *sheet) breakWord(family, style string, size float64, word string, limit float64) (head, rest string) {
	runes := []rune(word)
	n := len(runes) - 1
	if n < 1 {
		return word, ""
	}
	for n > 1 && s.measure(family, style, size, string(runes[:n])) > limit {
		n--
	}
	return string(runes[:n]), string(runes[n:])
}

// paragraph writes text from x to the right edge, with page breaks between
// lines but never leaving one line alone.
func (s *sheet) paragraph(style string, x, limit float64, text string) {
	lines := s.split(family, style, textSize, text, limit)
	s.room(float64(min(len(lines), 2)) * lineHeight)
	for i, line := range lines {
		if i > 0 && i < len(lines)-1 {
			s.room(2 * lineHeight)
		}
		s.put(family, style, textSize, x, s.y, line)
		s.y += lineHeight
	}
}

// heading starts a section and keeps at least follow with it.
func (s *sheet) heading(text string, follow float64) {
	s.continued = ""
	s.y += 3
	s.room(9 + follow)
	s.put(familyLight, "", 16, marginLeft, s.y, text)
	s.y += 7
	s.rule(hairline)
	s.y += 2
	s.continued = text
}

// rule draws a line across the page at y.
func (s *sheet) rule(width float64) {
	s.pdf.SetDrawColor(0, 0, 0)
	s.pdf.SetLineWidth(width)
	s.pdf.Line(marginLeft, s.y, s.right, s.y)
}

// blank draws a line to write on, with its label before it, and returns where
// it ends.
func (s *sheet) blank(x, y, length float64, label string) float64 {
	s.put(family, "", textSize, x, y, label)
	from := x + s.measure(family, "", textSize, label) + 1.5
	s.pdf.SetDrawColor(0, 0, 0)
	s.pdf.SetLineWidth(hairline)
	s.pdf.Line(from, y+4.4, from+length, y+4.4)
	return from + length + 4
}

// tick draws an empty box to tick, tickSide wide.
func (s *sheet) tick(x, y float64) {
	s.pdf.SetDrawColor(0, 0, 0)
	s.pdf.SetLineWidth(0.35)
	s.pdf.Rect(x, y, tickSide, tickSide, "D")
}

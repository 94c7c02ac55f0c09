package views

import (
	"bytes"
	"encoding/base64"
	"io"
	"net/http"
	"slices"
	"strconv"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
)

// Bringing a stock list in goes in two sendings: the file, which is answered by
// a try that changes nothing, and the same list again with the columns as they
// were matched or put right. The list travels in the form between the two, so
// that nothing is kept on the server for a page that may never come back.

// mostListBytes is the largest list a page takes; longer ones go by the command
// line.
const mostListBytes = 4 << 20

// tooLong is said of a list that is too long, or was sent as no form sends it.
const tooLong = "The list is longer than this page takes, or didn’t arrive whole; use the command: stillroom import --data DIR FILE."

// importPage is the form for a stock list and what a try of it found.
type importPage struct {
	frame
	Who      string
	Name     string // of the file
	Content  string // of the file, in base64; "" before one was sent
	Columns  []importColumn
	DayFirst string
	Asked    []string // what somebody has to answer
	Report   *inventory.ImportReport
	Taken    bool // the rows are on the shelf
	Before   []inventory.StockImport
}

// importColumn is a column of the list with what it was matched with.
type importColumn struct {
	I       int
	Heading string
	Sample  string
	Field   inventory.Field
}

// Fields lists what a column may be about.
func (p *importPage) Fields() []inventory.Field { return inventory.Fields }

// showImport answers /shelf/import.
func (s *Server) showImport(c *gin.Context) error {
	p, err := s.importPage(c)
	if err != nil {
		return err
	}
	return s.render(c, http.StatusOK, "import", p)
}

func (s *Server) importPage(c *gin.Context) (*importPage, error) {
	p := &importPage{}
	p.Title, p.Section = "Bring in a stock list", "/shelf"
	var err error
	p.Before, err = s.Lab.Imports(c.Request.Context())
	return p, err
}

// takeImport answers the sendings of the form: "try" shows what would be taken,
// "take" takes it, "refused" sends the rows that can't be taken.
func (s *Server) takeImport(c *gin.Context) error {
	p, err := s.importPage(c)
	if err != nil {
		return err
	}
	c.Request.Body = http.MaxBytesReader(c.Writer, c.Request.Body, 2*mostListBytes)
	if err := c.Request.ParseMultipartForm(2 * mostListBytes); err != nil {
		p.Faults.add("list", tooLong)
		return s.render(c, http.StatusUnprocessableEntity, "import", p)
	}
	act := actOf(c, "stock list", &p.Faults)
	p.Who = act.By
	table := p.readList(c)
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "import", p)
	}
	mapping := p.match(c, table)
	take := c.PostForm("do") == "take"
	report, err := s.Lab.Import(c.Request.Context(), table, mapping, inventory.ImportOptions{Act: act, Preview: !take})
	if err != nil {
		wrong, ok := refusalFault(err)
		if !ok {
			return err
		}
		p.Faults = append(p.Faults, wrong)
		return s.render(c, refusalStatus(err), "import", p)
	}
	if c.PostForm("do") == "refused" {
		return sendRefused(c, report)
	}
	p.Report, p.Taken = &report, take
	return s.render(c, http.StatusOK, "import", p)
}

// sendRefused sends the rows that aren't taken, with their reasons, as a list to
// mend and send again.
func sendRefused(c *gin.Context, report inventory.ImportReport) error {
	var b bytes.Buffer
	if err := report.WriteRefused(&b); err != nil {
		return err
	}
	c.Header("Content-Disposition", `attachment; filename="rows not taken.csv"`)
	c.Data(http.StatusOK, "text/csv; charset=utf-8; header=present", b.Bytes())
	return nil
}

// readList reads the file that was chosen, or the list that travelled in the
// form.
func (p *importPage) readList(c *gin.Context) inventory.Table {
	var content []byte
	if head, err := c.FormFile("list"); err == nil {
		p.Name = head.Filename
		f, err := head.Open()
		if err == nil {
			content, err = io.ReadAll(io.LimitReader(f, mostListBytes+1))
			f.Close()
		}
		if err != nil {
			p.Faults.add("list", "The file could not be read; choose it once more.")
			return inventory.Table{}
		}
	} else {
		p.Name = c.PostForm("name")
		content, err = base64.StdEncoding.DecodeString(c.PostForm("content"))
		if err != nil || len(content) == 0 {
			p.Faults.add("list", "Choose a file: CSV, or XLSX as spreadsheets save it.")
			return inventory.Table{}
		}
	}
	if len(content) > mostListBytes {
		p.Faults.add("list", tooLong)
		return inventory.Table{}
	}
	table, err := inventory.ReadTable(p.Name, bytes.NewReader(content))
	if err != nil {
		p.Faults.add("list", sentence(err.Error()))
		return table
	}
	p.Content = base64.StdEncoding.EncodeToString(content)
	return table
}

// match matches the columns by their headings and puts in what the form says
// otherwise.
func (p *importPage) match(c *gin.Context, t inventory.Table) inventory.Mapping {
	m := inventory.Match(t)
	if p.DayFirst = c.PostForm("day-first"); p.DayFirst != "" {
		m.DayFirst = p.DayFirst
	}
	for i := range t.Header {
		typed, ok := c.GetPostForm("column-" + strconv.Itoa(i))
		if !ok {
			continue
		}
		for field, at := range m.Columns {
			if at == i {
				delete(m.Columns, field)
			}
		}
		if field := inventory.Field(typed); slices.Contains(inventory.Fields, field) {
			m.Columns[field] = i
		}
	}
	p.Asked = m.Questions
	for i, heading := range t.Header {
		column := importColumn{I: i, Heading: heading, Sample: sampleOf(t, i)}
		for field, at := range m.Columns {
			if at == i {
				column.Field = field
			}
		}
		p.Columns = append(p.Columns, column)
	}
	return m
}

// sampleOf is the first thing that stands in a column.
func sampleOf(t inventory.Table, i int) string {
	for _, row := range t.Rows {
		if i < len(row) && strings.TrimSpace(row[i]) != "" {
			return row[i]
		}
	}
	return ""
}

// undoImport answers the form that takes an import back.
func (s *Server) undoImport(c *gin.Context) error {
	p, err := s.importPage(c)
	if err != nil {
		return err
	}
	act := actOf(c, "taken back", &p.Faults)
	id, _ := strconv.ParseInt(c.Param("id"), 10, 64)
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "import", p)
	}
	if err := s.Lab.UndoImport(c.Request.Context(), id, act); err != nil {
		wrong, ok := refusalFault(err)
		if !ok {
			return err
		}
		p.Faults = append(p.Faults, wrong)
		return s.render(c, refusalStatus(err), "import", p)
	}
	return s.goTo(c, "/shelf/import")
}

package inventory

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"path/filepath"
	"strings"
	"unicode/utf16"
	"unicode/utf8"
)

// Table is a stock list as somebody keeps it: a header and rows of cells.
type Table struct {
	Name   string // of the file
	Header []string
	Rows   [][]string
	// Lines are the lines, or the rows of the sheet, that Rows stand on, from 1.
	Lines []int
	// Serial is set where a whole number in a date column is a day count of a
	// spreadsheet.
	Serial bool
	// Notes say how the file was read: its sheet, its encoding, lines above the header.
	Notes []string
}

// mostTableBytes bounds an upload.
const mostTableBytes = 1 << 30

// ReadTable reads a stock list: XLSX by its content, anything else as text with
// commas, semicolons or tabs between the cells (RFC 4180), in UTF-8, UTF-16 or
// Windows-1252. The name is used in messages and for refusing what is no list.
// The header is the first line with at least two headings that are known, or
// else the first line with text.
func ReadTable(name string, r io.Reader) (Table, error) {
	data, err := io.ReadAll(io.LimitReader(r, mostTableBytes+1))
	if err != nil {
		return Table{}, fmt.Errorf("reading %s: %w", name, err)
	}
	if len(data) > mostTableBytes {
		return Table{}, invalid("read", name, "it is larger than 1 GiB", "split the list")
	}
	var t Table
	if bytes.HasPrefix(data, []byte("PK\x03\x04")) {
		t, err = readXLSX(name, data)
	} else {
		t, err = readText(name, data)
	}
	if err != nil {
		return Table{}, err
	}
	return t.headed()
}

func readText(name string, data []byte) (Table, error) {
	if ext := strings.ToLower(filepath.Ext(name)); ext == ".xls" || ext == ".ods" || ext == ".pdf" {
		return Table{}, invalid("read", name, "lists with the ending "+ext+" can't be read", "save it as .xlsx or .csv")
	}
	text, note, err := decodeText(data)
	if err != nil {
		return Table{}, invalid("read", name, err.Error(), "save it as .csv in UTF-8, or as .xlsx")
	}
	t := Table{Name: name}
	if note != "" {
		t.Notes = append(t.Notes, note)
	}
	in := csv.NewReader(strings.NewReader(text))
	in.FieldsPerRecord = -1
	in.Comma = separatorOf(text)
	for {
		row, err := in.Read()
		if err == io.EOF {
			return t, nil
		}
		if err != nil {
			var at *csv.ParseError
			if errors.As(err, &at) {
				return Table{}, invalid("read", name, fmt.Sprintf("line %d, column %d: %v", at.StartLine, at.Column, at.Err), "quote cells as RFC 4180 says: \"a \"\"b\"\"\"")
			}
			return Table{}, err
		}
		line, _ := in.FieldPos(0)
		t.Rows = append(t.Rows, row)
		t.Lines = append(t.Lines, line)
	}
}

// decodeText makes UTF-8 of what spreadsheets write.
func decodeText(data []byte) (text, note string, err error) {
	switch {
	case bytes.HasPrefix(data, []byte("\xef\xbb\xbf")):
		data = data[3:]
	case bytes.HasPrefix(data, []byte("\xff\xfe")):
		return decodeUTF16(data[2:], 1), "read as UTF-16", nil
	case bytes.HasPrefix(data, []byte("\xfe\xff")):
		return decodeUTF16(data[2:], 0), "read as UTF-16", nil
	}
	if bytes.IndexByte(data, 0) >= 0 {
		return "", "", errors.New("it holds bytes that no text has")
	}
	if utf8.Valid(data) {
		return string(data), "", nil
	}
	return decode1252(data), "read as Windows-1252, because it isn't UTF-8: look at letters with accents", nil
}

func decodeUTF16(data []byte, high int) string {
	units := make([]uint16, len(data)/2)
	for i := range units {
		units[i] = uint16(data[2*i+high])<<8 | uint16(data[2*i+1-high])
	}
	return string(utf16.Decode(units))
}

// windows1252 are the code points of the bytes 0x80 to 0x9F (WHATWG Encoding
// Standard, index windows-1252); the rest of the upper half are Latin-1.
var windows1252 = [32]rune{'€', 0x81, '‚', 'ƒ', '„', '…', '†', '‡', 'ˆ', '‰', 'Š', '‹', 'Œ', 0x8d, 'Ž', 0x8f,
	0x90, '‘', '’', '“', '”', '•', '–', '—', '˜', '™', 'š', '›', 'œ', 0x9d, 'ž', 'Ÿ'}

func decode1252(data []byte) string {
	var b strings.Builder
	b.Grow(len(data) + len(data)/8)
	for _, c := range data {
		if c >= 0x80 && c < 0xa0 {
			b.WriteRune(windows1252[c-0x80])
			continue
		}
		b.WriteRune(rune(c))
	}
	return b.String()
}

// separatorOf takes the sign that the first lines have most evenly, outside of
// quotes: tab before semicolon before comma, because commas also stand in numbers.
func separatorOf(text string) rune {
	lines := strings.SplitN(text, "\n", 12)
	best, bestScore := ',', 0
	for _, sign := range []rune{'\t', ';', ','} {
		score := 0
		for _, line := range lines[:min(10, len(lines))] {
			if n := countOutside(line, sign); n > 0 {
				score += 10 + min(n, 9)
			}
		}
		if score > bestScore {
			best, bestScore = sign, score
		}
	}
	return best
}

func countOutside(line string, sign rune) (n int) {
	quoted := false
	for _, r := range line {
		switch {
		case r == '"':
			quoted = !quoted
		case r == sign && !quoted:
			n++
		}
	}
	return n
}

// headed finds the header and drops what stands above it and empty rows.
func (t Table) headed() (Table, error) {
	at := -1
	for i, row := range t.Rows[:min(20, len(t.Rows))] {
		if knownHeadings(row) >= 2 {
			at = i
			break
		}
	}
	for i := 0; at < 0 && i < len(t.Rows); i++ {
		if !blank(t.Rows[i]) {
			at = i
		}
	}
	if at < 0 {
		return Table{}, invalid("read", t.Name, "it is empty", "give a list with a line of headings")
	}
	if at > 0 {
		t.Notes = append(t.Notes, fmt.Sprintf("headings on line %d; what stands above is not read", t.Lines[at]))
	}
	t.Header = t.Rows[at]
	rows, lines := t.Rows[at+1:], t.Lines[at+1:]
	t.Rows, t.Lines = nil, nil
	for i, row := range rows {
		if !blank(row) {
			t.Rows, t.Lines = append(t.Rows, row), append(t.Lines, lines[i])
		}
	}
	if len(t.Rows) == 0 {
		return Table{}, invalid("read", t.Name, "there are no rows under the headings", "give a list with a row for each bottle")
	}
	return t, nil
}

func blank(row []string) bool {
	for _, cell := range row {
		if strings.TrimSpace(cell) != "" {
			return false
		}
	}
	return true
}

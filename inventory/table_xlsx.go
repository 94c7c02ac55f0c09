package inventory

import (
	"bytes"
	"fmt"

	"github.com/xuri/excelize/v2"
)

// mostUnzipped bounds what an XLSX file may unfold to, against files made to
// fill the memory.
const mostUnzipped = 2 << 30

// readXLSX reads the first sheet with anything in it, its values as they are
// stored and not as they are shown: a date is then a count of days, which can't
// be mistaken for another order of day and month.
func readXLSX(name string, data []byte) (Table, error) {
	f, err := excelize.OpenReader(bytes.NewReader(data), excelize.Options{RawCellValue: true, UnzipSizeLimit: mostUnzipped})
	if err != nil {
		return Table{}, &Error{Doing: "read", What: name, Kind: ErrInvalid, Why: "it is no whole XLSX workbook", Would: "save it again as .xlsx without a password", Cause: err}
	}
	defer f.Close()
	sheets := f.GetSheetList()
	for _, sheet := range sheets {
		t, err := readSheet(f, name, sheet)
		if err != nil {
			return Table{}, err
		}
		if len(t.Rows) == 0 {
			continue
		}
		if len(sheets) > 1 {
			t.Notes = append(t.Notes, fmt.Sprintf("read from the sheet %q; the others are not read", sheet))
		}
		return t, nil
	}
	return Table{}, invalid("read", name, "no sheet has anything in it", "give a list with a line of headings")
}

func readSheet(f *excelize.File, name, sheet string) (Table, error) {
	t := Table{Name: name, Serial: true}
	rows, err := f.Rows(sheet)
	if err != nil {
		return t, &Error{Doing: "read", What: name, Kind: ErrInvalid, Why: "the sheet " + sheet + " can't be read", Cause: err}
	}
	defer rows.Close()
	for line := 1; rows.Next(); line++ {
		row, err := rows.Columns(excelize.Options{RawCellValue: true})
		if err != nil {
			return t, &Error{Doing: "read", What: name, Kind: ErrInvalid, Why: fmt.Sprintf("row %d of the sheet %s can't be read", line, sheet), Cause: err}
		}
		if !blank(row) {
			t.Rows, t.Lines = append(t.Rows, row), append(t.Lines, line)
		}
	}
	return t, rows.Error()
}

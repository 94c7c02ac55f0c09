package inventory

import (
	"encoding/csv"
	"encoding/json"
	"io"
	"strings"

	"github.com/xuri/excelize/v2"

	"stillroom/chem"
)

// exportHeader are the columns of an exported stock list; an import knows them
// all again.
var exportHeader = []string{"bottle", "own number", "name", "CAS number", "formula", "form", "strength", "grade", "additive",
	"size", "content", "unit", "state", "measured by", "measured on", "store", "room", "cabinet", "shelf", "lot", "supplier",
	"received", "opened", "expiry", "note"}

// exportRow writes a bottle as texts; amounts are exact decimals in g, mL or
// pieces.
func exportRow(s *Shelf, b Bottle) []string {
	form, _ := s.Form(b.FormID)
	substance, _ := s.SubstanceByID(form.SubstanceID)
	place, _ := s.Place(b.PlaceID)
	name, cas, formula := substance.Name, substance.CAS, substance.Formula
	if hydrate, ok := chem.SubstanceByCAS(form.CAS); ok {
		name, cas, formula = hydrate.Name, hydrate.CAS, hydrate.Formula
	}
	strength := ""
	if form.AssayHigh > 0 {
		strength = strengthCell{form.AssayLow, form.AssayHigh}.String()
	}
	size, unit := exportAmount(b.Size, form.Measure)
	content, _ := exportAmount(b.Content, form.Measure)
	return []string{b.Code, b.Mark, name, cas, formula, form.Name, strength, form.Grade, form.Additive, size, content, unit,
		string(b.State), string(b.MeasuredBy), b.MeasuredOn.String(), place.Store, place.Room, place.Cabinet, place.Shelf, b.Lot,
		b.Supplier, b.Received.String(), b.Opened.String(), b.Expiry.String(), b.Note}
}

func exportAmount(n int64, m Measure) (amount, unit string) {
	text, unit, _ := strings.Cut(amountText(n, m), " ")
	if m == ByCount {
		unit = "pieces"
	}
	return text, unit
}

// ExportCSV writes the stock list as CSV (RFC 4180, UTF-8). Cells that a
// spreadsheet would take for a formula have an apostrophe before them.
func ExportCSV(w io.Writer, s *Shelf) error {
	out := csv.NewWriter(w)
	out.UseCRLF = true
	if err := out.Write(exportHeader); err != nil {
		return err
	}
	for _, b := range s.Bottles {
		row := exportRow(s, b)
		for i := range row {
			row[i] = plainCell(row[i])
		}
		if err := out.Write(row); err != nil {
			return err
		}
	}
	out.Flush()
	return out.Error()
}

// plainCell keeps a spreadsheet from running a cell (OWASP, "CSV injection").
func plainCell(cell string) string {
	if cell != "" && strings.ContainsRune("=+-@\t\r", rune(cell[0])) {
		return "'" + cell
	}
	return cell
}

// ExportXLSX writes the stock list as a workbook (ISO/IEC 29500) with one sheet;
// all cells are texts, so that none is a formula and no number is rounded.
func ExportXLSX(w io.Writer, s *Shelf) error {
	f := excelize.NewFile()
	defer f.Close()
	const sheet = "stock"
	if err := f.SetSheetName("Sheet1", sheet); err != nil {
		return err
	}
	out, err := f.NewStreamWriter(sheet)
	if err != nil {
		return err
	}
	write := func(line int, row []string) error {
		cells := make([]any, len(row))
		for i, cell := range row {
			cells[i] = cell
		}
		at, err := excelize.CoordinatesToCellName(1, line)
		if err != nil {
			return err
		}
		return out.SetRow(at, cells)
	}
	if err := write(1, exportHeader); err != nil {
		return err
	}
	for i, b := range s.Bottles {
		if err := write(i+2, exportRow(s, b)); err != nil {
			return err
		}
	}
	if err := out.Flush(); err != nil {
		return err
	}
	return f.Write(w)
}

// exportBottle is a bottle in the JSON stock list; amounts are in the unit named,
// null is no data.
type exportBottle struct {
	Bottle      string      `json:"bottle"`
	OwnNumber   string      `json:"own_number,omitempty"`
	Substance   string      `json:"substance"`
	CAS         string      `json:"cas,omitempty"`
	Formula     string      `json:"formula,omitempty"`
	Form        string      `json:"form"`
	FormCAS     string      `json:"form_cas,omitempty"`
	Waters      float64     `json:"hydrate_waters"`
	AssayLow    *float64    `json:"assay_low"`
	AssayHigh   *float64    `json:"assay_high"`
	DensityGML  *float64    `json:"density_g_mL"`
	Size        json.Number `json:"size"`
	Content     json.Number `json:"content"`
	Promised    json.Number `json:"promised"`
	Unit        string      `json:"unit"`
	State       BottleState `json:"state"`
	MeasuredBy  MeasuredBy  `json:"measured_by"`
	MeasuredOn  string      `json:"measured_on,omitempty"`
	Store       string      `json:"store"`
	Room        string      `json:"room,omitempty"`
	Cabinet     string      `json:"cabinet,omitempty"`
	Shelf       string      `json:"shelf,omitempty"`
	Lot         string      `json:"lot,omitempty"`
	LotAssay    *float64    `json:"lot_assay"`
	Supplier    string      `json:"supplier,omitempty"`
	Received    string      `json:"received,omitempty"`
	Opened      string      `json:"opened,omitempty"`
	Expiry      string      `json:"expiry,omitempty"`
	PeroxideOn  string      `json:"peroxide_tested,omitempty"`
	PeroxidePPM *float64    `json:"peroxide_ppm"`
	Note        string      `json:"note,omitempty"`
}

// ExportJSON writes the stock list as a JSON array with an object for each
// bottle (RFC 8259).
func ExportJSON(w io.Writer, s *Shelf) error {
	list := make([]exportBottle, len(s.Bottles))
	for i, b := range s.Bottles {
		list[i] = exportJSONRow(s, b)
	}
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", "  ")
	return enc.Encode(list)
}

func exportJSONRow(s *Shelf, b Bottle) exportBottle {
	form, _ := s.Form(b.FormID)
	substance, _ := s.SubstanceByID(form.SubstanceID)
	place, _ := s.Place(b.PlaceID)
	size, unit := exportAmount(b.Size, form.Measure)
	content, _ := exportAmount(b.Content, form.Measure)
	promised, _ := exportAmount(b.Promised, form.Measure)
	row := exportBottle{Bottle: b.Code, OwnNumber: b.Mark, Substance: substance.Name, CAS: substance.CAS, Formula: substance.Formula,
		Form: form.Name, FormCAS: form.CAS, Waters: form.HydrateWaters, DensityGML: orNil(form.DensityGML),
		Size: json.Number(size), Content: json.Number(content), Promised: json.Number(promised), Unit: unit, State: b.State,
		MeasuredBy: b.MeasuredBy, MeasuredOn: b.MeasuredOn.String(), Store: place.Store, Room: place.Room, Cabinet: place.Cabinet,
		Shelf: place.Shelf, Lot: b.Lot, LotAssay: orNil(b.LotAssay), Supplier: b.Supplier, Received: b.Received.String(),
		Opened: b.Opened.String(), Expiry: b.Expiry.String(), PeroxideOn: b.PeroxideTested.String(), Note: b.Note}
	if form.AssayHigh > 0 {
		row.AssayLow, row.AssayHigh = &form.AssayLow, &form.AssayHigh
	}
	if b.PeroxideTested.Set() {
		row.PeroxidePPM = &b.PeroxidePPM
	}
	return row
}

func orNil(x float64) *float64 {
	if x == 0 {
		return nil
	}
	return &x
}

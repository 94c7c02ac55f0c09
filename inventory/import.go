package inventory

import (
	"context"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"strings"

	"gorm.io/gorm"
)

// ImportOptions say who imports and into which store.
type ImportOptions struct {
	Act Act
	// Store is the storeroom for rows that name none; "" means the first one,
	// or "Main store" if there is none yet.
	Store string
	// Preview goes through everything and then leaves the stock as it was.
	Preview bool
	// Progress, if set, is told how many rows of how many are done.
	Progress func(done, total int)
}

// ImportReport is what an import took and what it didn't.
type ImportReport struct {
	Import  int64 // number for an undo; 0 for a preview
	Rows    int   // read
	Taken   int   // rows
	Bottles int
	Refused []RefusedRow
	// Filled says what was taken from the embedded table, NoData what is
	// missing in both.
	Filled, NoData []string
	// NewSubstances, NewForms and NewPlaces are names of records that were added.
	NewSubstances, NewForms, NewPlaces []string
	Notes                              []string
	header                             []string
}

// RefusedRow is a row that wasn't taken.
type RefusedRow struct {
	Line  int // of the file, from 1
	Why   []string
	Cells []string
}

// WriteRefused writes just the rows that weren't taken, with their lines and
// reasons in front, as CSV (RFC 4180) that a spreadsheet can't take for formulas.
func (r ImportReport) WriteRefused(w io.Writer) error {
	out := csv.NewWriter(w)
	out.UseCRLF = true
	if err := out.Write(append([]string{"line", "why not taken"}, r.header...)); err != nil {
		return err
	}
	for _, row := range r.Refused {
		cells := []string{fmt.Sprint(row.Line), plainCell(strings.Join(row.Why, "; "))}
		for _, cell := range row.Cells {
			cells = append(cells, plainCell(cell))
		}
		if err := out.Write(cells); err != nil {
			return err
		}
	}
	out.Flush()
	return out.Error()
}

// Import takes the rows of a stock list into stock, all those that are good in
// one transaction. Rows that aren't are in the report with their reasons, and
// nothing of them is taken. The same list again is refused with ErrDuplicate
// until the first import is undone.
func (s *Store) Import(ctx context.Context, t Table, m Mapping, o ImportOptions) (ImportReport, error) {
	const doing = "import"
	report := ImportReport{Rows: len(t.Rows), header: t.Header, Notes: t.Notes}
	if err := o.Act.check(doing); err != nil {
		return report, err
	}
	if err := m.usable(t); err != nil {
		return report, err
	}
	err := s.write(ctx, doing, func(tx *gorm.DB) error {
		again := report
		in := &importer{store: s, tx: tx, options: o, report: &again, table: t, mapping: m}
		if err := in.run(ctx); err != nil {
			return err
		}
		report = again
		if o.Preview {
			return errPreview
		}
		return nil
	})
	if errors.Is(err, errPreview) {
		report.Import = 0
		return report, nil
	}
	return report, err
}

// errPreview makes a transaction end without leaving anything.
var errPreview = errors.New("preview")

func (m Mapping) usable(t Table) error {
	for field, i := range m.Columns {
		if i < 0 || i >= len(t.Header) {
			return invalid("import", t.Name, fmt.Sprintf("column %d for the %s isn't in the list", i+1, field), "choose one of its columns")
		}
	}
	_, name := m.Columns[FieldName]
	_, cas := m.Columns[FieldCAS]
	_, size := m.Columns[FieldSize]
	if !name && !cas || !size {
		return invalid("import", t.Name, "columns for the name or CAS number and for the amount are needed", "say which columns they are; the headings are "+strings.Join(t.Header, ", "))
	}
	return nil
}

// StockImport is an import that was made.
type StockImport struct {
	ID          int64
	At          Stamp
	ByWhom      string
	Name        string
	Fingerprint string
	RowsRead    int
	Taken       int
	Bottles     int
	Undone      *Stamp
	UndoneBy    string
}

// TableName names the table for gorm.
func (StockImport) TableName() string { return "imports" }

// Imports lists the imports that were made, the newest first.
func (s *Store) Imports(ctx context.Context) (list []StockImport, err error) {
	err = s.read(ctx, "list the imports", func(tx *gorm.DB) error {
		return tx.Order("id DESC").Find(&list).Error
	})
	return list, err
}

// UndoImport takes an import back: its bottles' receipts are reversed and the
// bottles discarded, so that the history stays. Substances, forms and places it
// added remain. It is refused with ErrInUse when anything was done with one of
// the bottles since.
func (s *Store) UndoImport(ctx context.Context, id int64, act Act) error {
	const doing = "undo the import"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		var in StockImport
		found := tx.Where("id = ?", id).Limit(1).Find(&in)
		if found.Error != nil {
			return found.Error
		}
		what := fmt.Sprintf("import %d", id)
		if found.RowsAffected == 0 {
			return notFound(doing, what, "choose one of the list of imports")
		}
		if in.Undone != nil {
			return &Error{Doing: doing, What: what, Kind: ErrDuplicate, Why: "it was undone by " + in.UndoneBy}
		}
		if err := refuseUsed(tx, id, what); err != nil {
			return err
		}
		act.Why = strings.TrimSpace(what + " undone: " + act.Why)
		if err := s.undoBottles(tx, id, act); err != nil {
			return err
		}
		now := s.stamp()
		return tx.Exec("UPDATE imports SET undone = ?, undone_by = ? WHERE id = ?", now, act.By, id).Error
	})
}

func refuseUsed(tx *gorm.DB, id int64, what string) error {
	var used []string
	err := tx.Raw(`SELECT code FROM bottles b WHERE import_id = ? AND (promised > 0 OR EXISTS
		(SELECT 1 FROM ledger l WHERE l.bottle_id = b.id AND l.kind <> 'receipt')) ORDER BY code LIMIT 5`, id).Scan(&used).Error
	if err == nil && len(used) > 0 {
		return &Error{Doing: "undo the import", What: what, Kind: ErrInUse,
			Why: "bottles were used or promised since, such as " + strings.Join(used, ", "), Would: "correct single bottles instead"}
	}
	return err
}

func (s *Store) undoBottles(tx *gorm.DB, id int64, act Act) error {
	var bottles []Bottle
	if err := tx.Where("import_id = ?", id).Order("id").Find(&bottles).Error; err != nil {
		return err
	}
	for i := range bottles {
		b := &bottles[i]
		var receipt Entry
		if err := tx.Where("bottle_id = ? AND kind = ?", b.ID, Receipt).Take(&receipt).Error; err != nil {
			return err
		}
		e := Entry{Kind: Reversed, Amount: -receipt.Amount, ReversalOf: receipt.ID, ByWhom: act.By, Why: act.Why}
		if err := s.post(tx, b, &e); err != nil {
			return err
		}
		if err := s.setState(tx, b, Discarded, act); err != nil {
			return err
		}
	}
	return nil
}

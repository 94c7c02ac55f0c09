package inventory

import (
	"fmt"
	"math"
	"strings"
)

// draft is a row of a list as bottles to be: what it says, resolved but not yet
// matched with the stock.
type draft struct {
	line    int
	id      identity
	form    StockForm // without IDs
	place   Place     // by words; StoreID 0
	bottle  Bottle    // Size, Content, dates, lot, …; without IDs
	bottles int64
}

// rowReader reads rows of one table. It remembers what it has resolved, because
// the same names and amounts come again and again.
type rowReader struct {
	table  Table
	m      Mapping
	orders map[Field]string
	ids    map[[3]string]identified
	sizes  map[[2]string]sized
}

type identified struct {
	id  identity
	err error
}

type sized struct {
	a   amountCell
	err error
}

func newRowReader(t Table, m Mapping) *rowReader {
	r := &rowReader{table: t, m: m, orders: map[Field]string{}, ids: map[[3]string]identified{}, sizes: map[[2]string]sized{}}
	for _, field := range []Field{FieldReceived, FieldOpened, FieldExpiry} {
		r.orders[field] = m.DayFirst
		if i, ok := m.Columns[field]; ok && m.DayFirst == "" {
			r.orders[field], _ = orderOfDates(t, i)
		}
	}
	return r
}

// cell returns what a row says about a field; "" for nothing. An apostrophe that
// protects a spreadsheet from a formula is taken off.
func (r *rowReader) cell(row []string, f Field) string {
	i, ok := r.m.Columns[f]
	if !ok || i >= len(row) {
		return ""
	}
	text := strings.TrimSpace(row[i])
	if len(text) > 1 && text[0] == '\'' && strings.ContainsRune("=+-@", rune(text[1])) {
		text = text[1:]
	}
	switch strings.ToLower(text) {
	case "-", "–", "—", "n/a", "na", "none", "unknown", "?":
		return ""
	}
	return text
}

// read makes a draft of row i, or says everything that is wrong with it.
func (r *rowReader) read(i int) (d draft, faults []string) {
	row := r.table.Rows[i]
	d.line = r.table.Lines[i]
	fault := func(err error) {
		if err != nil {
			faults = append(faults, err.Error())
		}
	}
	var err error
	d.id, err = r.identity(row)
	fault(err)
	fault(r.strength(row, &d))
	fault(r.amounts(row, &d))
	fault(r.dates(row, &d))
	d.place = r.place(row)
	d.bottle.Mark, d.bottle.Lot = r.cell(row, FieldMark), r.cell(row, FieldLot)
	d.bottle.Supplier, d.bottle.Note = r.cell(row, FieldSupplier), r.cell(row, FieldNote)
	if len(faults) > 0 {
		return d, faults
	}
	d.finish()
	return d, nil
}

func (r *rowReader) identity(row []string) (identity, error) {
	key := [3]string{r.cell(row, FieldName), r.cell(row, FieldCAS), r.cell(row, FieldFormula)}
	got, ok := r.ids[key]
	if !ok {
		got.id, got.err = identify(key[0], key[1], key[2])
		r.ids[key] = got
	}
	return got.id, got.err
}

func (r *rowReader) strength(row []string, d *draft) error {
	strength := d.id.strength
	if cell := r.cell(row, FieldStrength); cell != "" {
		s, err := parseStrength(cell, r.m.Units[FieldStrength])
		if err != nil {
			return err
		}
		if strength != (strengthCell{}) && strength != s {
			return fmt.Errorf("the name says %s, the strength says %s", strength, s)
		}
		strength = s
	}
	d.form.AssayLow, d.form.AssayHigh = strength.low, strength.high
	d.form.Grade = strings.TrimSpace(strings.Join([]string{r.cell(row, FieldGrade), d.id.grade}, " "))
	d.form.Additive = r.cell(row, FieldAdditive)
	return nil
}

func (r *rowReader) amount(row []string, f Field) (amountCell, error) {
	unit := r.m.Units[f]
	if unit == "" {
		unit = r.cell(row, FieldUnit)
	}
	key := [2]string{r.cell(row, f), unit}
	got, ok := r.sizes[key]
	if !ok {
		got.a, got.err = parseAmount(key[0], key[1])
		r.sizes[key] = got
	}
	return got.a, got.err
}

// amounts reads size, content and number of bottles.
func (r *rowReader) amounts(row []string, d *draft) error {
	if r.cell(row, FieldSize) == "" {
		return fmt.Errorf("no amount")
	}
	size, err := r.amount(row, FieldSize)
	if err != nil {
		return err
	}
	if !math.IsNaN(size.share) {
		return fmt.Errorf("amount %q is a share, and of what isn't said", r.cell(row, FieldSize))
	}
	if size.units <= 0 {
		return fmt.Errorf("amount %q: want more than 0", r.cell(row, FieldSize))
	}
	d.form.Measure = size.measure
	d.bottle.Size, d.bottle.Content, d.bottles = size.units, size.units, size.count
	d.bottle.MeasuredBy = ByUnopened
	if size.about {
		d.bottle.MeasuredBy = ByGuess
	}
	if r.cell(row, FieldContent) != "" {
		if err := r.content(row, d, size); err != nil {
			return err
		}
	}
	return r.count(row, d)
}

func (r *rowReader) content(row []string, d *draft, size amountCell) error {
	cell := r.cell(row, FieldContent)
	c, err := r.amount(row, FieldContent)
	switch {
	case err != nil:
		return err
	case !math.IsNaN(c.share):
		d.bottle.Content = int64(math.Round(c.share * float64(size.units)))
		d.bottle.MeasuredBy = ByLevel
	case c.measure != size.measure:
		return fmt.Errorf("content %q and size %q aren't measured alike", cell, r.cell(row, FieldSize))
	case c.units > size.units:
		return fmt.Errorf("content %q is more than the size %q", cell, r.cell(row, FieldSize))
	default:
		d.bottle.Content = c.units
		d.bottle.MeasuredBy = ByLedger
	}
	if c.about {
		d.bottle.MeasuredBy = ByGuess
	}
	return nil
}

func (r *rowReader) count(row []string, d *draft) error {
	cell := r.cell(row, FieldCount)
	if cell == "" {
		return nil
	}
	a, err := parseAmount(cell, "pcs")
	if err != nil || a.measure != ByCount || a.units < 1 || a.units > 1000 {
		return fmt.Errorf("number of bottles %q: want 1 to 1000", cell)
	}
	if d.bottles > 1 && d.bottles != a.units {
		return fmt.Errorf("%d bottles in the amount, %d in their own column", d.bottles, a.units)
	}
	d.bottles = a.units
	if d.bottles > 1 && r.cell(row, FieldMark) != "" {
		return fmt.Errorf("%d bottles with one number, %q", d.bottles, r.cell(row, FieldMark))
	}
	return nil
}

func (r *rowReader) dates(row []string, d *draft) error {
	for _, f := range []struct {
		field Field
		into  *Date
	}{{FieldReceived, &d.bottle.Received}, {FieldOpened, &d.bottle.Opened}, {FieldExpiry, &d.bottle.Expiry}} {
		cell := r.cell(row, f.field)
		if cell == "" {
			continue
		}
		date, err := parseDateCell(cell, r.orders[f.field], r.table.Serial)
		if err != nil {
			return err
		}
		*f.into = date
	}
	b := d.bottle
	if b.Opened.Set() && b.Received.Set() && b.Opened < b.Received {
		return fmt.Errorf("opened on %s, before it was received on %s", b.Opened, b.Received)
	}
	return nil
}

// place reads where a bottle stands, from columns of its own or from one cell
// that parts store, room, cabinet and shelf by › > / or a comma.
func (r *rowReader) place(row []string) Place {
	p := Place{Store: r.cell(row, FieldStore), Room: r.cell(row, FieldRoom), Cabinet: r.cell(row, FieldCabinet), Shelf: r.cell(row, FieldShelf)}
	parts := strings.FieldsFunc(r.cell(row, FieldPlace), func(c rune) bool { return strings.ContainsRune("›>/,;|", c) })
	var into []*string
	for _, slot := range []*string{&p.Store, &p.Room, &p.Cabinet, &p.Shelf} {
		if *slot == "" {
			into = append(into, slot)
		}
	}
	if n := len(parts); n < len(into) { // the last words are the nearest ones
		into = into[len(into)-n:]
	}
	for i, part := range parts {
		if i < len(into) {
			*into[i] = strings.TrimSpace(part)
		} else {
			p.Shelf += ", " + strings.TrimSpace(part)
		}
	}
	return p
}

// finish fills in what follows from the rest.
func (d *draft) finish() {
	b := &d.bottle
	switch {
	case b.Content == 0:
		b.State = Empty
	case b.Opened.Set() || b.Content < b.Size:
		b.State = Opened
		if b.MeasuredBy == ByUnopened {
			b.MeasuredBy = ByLedger
		}
	default:
		b.State = Sealed
	}
	fillForm(d)
}

package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm/clause"
)

// importWriter inserts bottles with their first ledger entry, which also says
// who took them in, when and why.
type importWriter struct {
	in              *importer
	bottles, ledger *bulk
	heads           map[int64]*chain
	ids             []int64 // taken in advance
	last            int64   // the last of those taken
	stamp           Stamp
	today           Date
	why             string
	done            int
}

// bottles reads and writes all rows of the list.
func (in *importer) bottles(ctx context.Context) error {
	ctx, stop := context.WithCancel(ctx)
	defer stop()
	s := in.store
	stamp, today, why := s.stamp(), s.today(), "import of "+in.table.Name // once: the hashes are over them
	// Bottles and ledger are flushed together, so that no entry comes before its
	// bottle.
	w := &importWriter{in: in, heads: map[int64]*chain{}, stamp: stamp, today: today, why: why,
		bottles: newBulk(in.tx, s.engine, "bottles", "measured_on", "import_id", "id", "store_id", "code", "mark", "form_id", "place_id", "state", "lot", "content",
			"size", "received", "opened", "expiry", "measured_by", "supplier", "note").fix(orNull(today), in.id),
		ledger: newBulk(in.tx, s.engine, "ledger", "kind", "by_whom", "at", "why", "store_id", "seq", "bottle_id", "amount", "content", "hash").
			fix(string(Receipt), in.options.Act.By, stamp.String(), why),
	}
	for part := range readAll(ctx, in.table, in.mapping) {
		for i := range part {
			if err := w.take(&part[i]); err != nil {
				return err
			}
		}
		if in.options.Progress != nil {
			in.options.Progress(part[len(part)-1].row+1, len(in.table.Rows))
		}
	}
	if err := ctx.Err(); err != nil {
		return err
	}
	in.report.Bottles = w.done
	return w.end()
}

// take writes a row that was read, or refuses it.
func (w *importWriter) take(r *reading) error {
	mark := r.draft.bottle.Mark
	if code, there := w.in.marks[mark]; there && mark != "" {
		r.faults = append(r.faults, fmt.Sprintf("the number %q is on bottle %s already", mark, code))
	}
	if len(r.faults) > 0 {
		w.in.report.Refused = append(w.in.report.Refused, RefusedRow{w.in.table.Lines[r.row], r.faults, w.in.table.Rows[r.row]})
		return nil
	}
	w.in.report.Taken++
	return w.write(&r.draft)
}

// nextID hands out identities of bottles, of which it takes some hundred at a
// time.
func (w *importWriter) nextID() (int64, error) {
	if len(w.ids) == 0 {
		ids, err := w.in.store.nextIDs(w.in.tx, "bottles", bulkRows)
		if err != nil {
			return 0, err
		}
		if w.last >= ids[0] { // what was handed out isn't in the table yet
			for i := range ids {
				ids[i] = w.last + 1 + int64(i)
			}
		}
		w.ids, w.last = ids, ids[len(ids)-1]
	}
	id := w.ids[0]
	w.ids = w.ids[1:]
	return id, nil
}

func (w *importWriter) write(d *draft) error {
	form, err := w.in.form(d)
	if err != nil {
		return err
	}
	place, err := w.in.place(d)
	if err != nil {
		return err
	}
	for range d.bottles {
		b := d.bottle
		b.StoreID, b.FormID, b.PlaceID = place.StoreID, form.ID, place.ID
		if b.ID, err = w.nextID(); err != nil {
			return err
		}
		b.Code, b.MeasuredOn = MakeCode(BottleCode, b.ID), w.today
		w.done++
		if err := w.add(&b); err != nil {
			return err
		}
	}
	return nil
}

func (w *importWriter) add(b *Bottle) error {
	head, err := w.head(b.StoreID)
	if err != nil {
		return err
	}
	e := Entry{StoreID: b.StoreID, Seq: head.Seq + 1, BottleID: b.ID, Kind: Receipt, Amount: b.Content, Content: b.Content,
		ByWhom: w.in.options.Act.By, At: w.stamp, Why: w.why}
	e.Hash = chainHash(head.Hash, &e)
	head.Seq, head.Hash = e.Seq, e.Hash
	if err := w.bottles.add(b.ID, b.StoreID, b.Code, b.Mark, b.FormID, b.PlaceID, string(b.State), b.Lot, b.Content, b.Size,
		orNull(b.Received), orNull(b.Opened), orNull(b.Expiry), string(b.MeasuredBy), b.Supplier, b.Note); err != nil {
		return err
	}
	return w.ledger.add(e.StoreID, e.Seq, e.BottleID, e.Amount, e.Content, e.Hash)
}

// orNull stores a date, or NULL for none.
func orNull(d Date) any {
	if !d.Set() {
		return nil
	}
	return d.String()
}

func (w *importWriter) head(store int64) (*chain, error) {
	if head, ok := w.heads[store]; ok {
		return head, nil
	}
	head := &chain{StoreID: store}
	err := w.in.tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("store_id = ?", store).Limit(1).Find(head).Error
	head.StoreID = store
	w.heads[store] = head
	return head, err
}

func (w *importWriter) end() error {
	for _, b := range []*bulk{w.bottles, w.ledger} {
		if err := b.flush(); err != nil {
			return err
		}
	}
	for _, head := range w.heads {
		if err := w.in.tx.Save(head).Error; err != nil {
			return err
		}
	}
	return nil
}

package inventory

import "gorm.io/gorm/clause"

// importWriter inserts bottles with their first ledger entry, which also says
// who took them in, when and why.
type importWriter struct {
	in              *importer
	bottles, ledger *bulk
	heads           map[int64]*chain
	ids             []int64 // taken in advance
	stamp           Stamp
	today           Date
	why             string
	done            int
}

// bottles writes all drafts.
func (in *importer) bottles(drafts []draft) error {
	total := 0
	for _, d := range drafts {
		total += int(d.bottles)
	}
	ids, err := in.store.nextIDs(in.tx, "bottles", total)
	if err != nil {
		return err
	}
	s := in.store
	w := &importWriter{in: in, ids: ids, heads: map[int64]*chain{}, stamp: s.stamp(), today: s.today(), why: "import of " + in.table.Name,
		bottles: newBulk(in.tx, s.engine, "bottles", "id", "store_id", "code", "mark", "form_id", "place_id", "state", "lot", "content",
			"size", "received", "opened", "expiry", "measured_by", "measured_on", "supplier", "note", "import_id"),
		ledger: newBulk(in.tx, s.engine, "ledger", "store_id", "seq", "bottle_id", "kind", "amount", "content", "by_whom", "at", "why", "hash"),
	}
	// Bottles and ledger are flushed together, so that no entry comes before its
	// bottle.
	for i := range drafts {
		if err := w.write(&drafts[i]); err != nil {
			return err
		}
		if in.options.Progress != nil && (i%1000 == 999 || i == len(drafts)-1) {
			in.options.Progress(i+1, len(drafts))
		}
	}
	in.report.Bottles = w.done
	return w.end()
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
		b.ID, b.StoreID, b.FormID, b.PlaceID = w.ids[w.done], place.StoreID, form.ID, place.ID
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
	at := e.At.String()
	if err := w.bottles.add(b.ID, b.StoreID, b.Code, b.Mark, b.FormID, b.PlaceID, string(b.State), b.Lot, b.Content, b.Size,
		orNull(b.Received), orNull(b.Opened), orNull(b.Expiry), string(b.MeasuredBy), orNull(b.MeasuredOn), b.Supplier, b.Note, w.in.id); err != nil {
		return err
	}
	return w.ledger.add(e.StoreID, e.Seq, e.BottleID, string(e.Kind), e.Amount, e.Content, e.ByWhom, at, e.Why, e.Hash)
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

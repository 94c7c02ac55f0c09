package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"
)

// Taking is what is to be drawn from a bottle.
type Taking struct {
	Bottle string // its code
	Amount int64  // more than 0, in the unit of the bottle
	Run    int64  // the run it is for, whose earmark it uses up; 0 for none
}

// Draw takes an amount out of a bottle. The first draw opens a sealed bottle,
// the last leaves it empty. It fails with a *ShortError if the bottle holds less,
// with a *PromiseError if what is left is promised to other runs, and with
// ErrInvalid for a bottle that nothing may be taken from.
func (s *Store) Draw(ctx context.Context, t Taking, act Act) (e Entry, err error) {
	const doing = "draw"
	if err := act.check(doing); err != nil {
		return e, err
	}
	if t.Amount <= 0 {
		return e, invalid(doing, "bottle "+t.Bottle, "the amount must be more than 0", "")
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		e, err = s.draw(tx, t, act)
		return err
	})
	return e, err
}

func (s *Store) draw(tx *gorm.DB, t Taking, act Act) (e Entry, err error) {
	const doing = "draw"
	b, form, err := lockBottle(tx, doing, t.Bottle)
	if err != nil {
		return e, err
	}
	print := fingerprint(b.ID, t.Amount, t.Run)
	if ref, err := done(tx, b.StoreID, act, doing, print); err != nil || ref != 0 {
		return orEntry(tx, doing, ref, err)
	}
	if b.State != Sealed && b.State != Opened {
		return e, invalid(doing, "bottle "+b.Code, "it is "+string(b.State), "set it back to open if that is wrong")
	}
	if t.Amount > b.Content {
		return e, &ShortError{b.Code, form.Measure, t.Amount, b.Content}
	}
	if err := s.useEarmark(tx, &b, form, t, act); err != nil {
		return e, err
	}
	e = Entry{Kind: Drawn, Amount: -t.Amount, RunID: t.Run, ByWhom: act.By, Why: act.Why}
	if err := s.post(tx, &b, &e); err != nil {
		return e, err
	}
	if err := s.afterDraw(tx, &b, act); err != nil {
		return e, err
	}
	return e, remember(tx, b.StoreID, act, doing, print, e.ID, e.At)
}

func orEntry(tx *gorm.DB, doing string, ref int64, err error) (Entry, error) {
	if err != nil {
		return Entry{}, err
	}
	return entryByID(tx, doing, ref)
}

// useEarmark takes the draw off the run's own earmark and refuses what would
// come out of somebody else's.
func (s *Store) useEarmark(tx *gorm.DB, b *Bottle, form StockForm, t Taking, act Act) error {
	marks, err := s.liveEarmarks(tx, b, t.Run)
	if err != nil {
		return err
	}
	own, others := splitEarmarks(marks, t.Run)
	if free := b.Content - total(others); t.Amount > free {
		return promiseError(tx, b, form, t.Amount, free, others)
	}
	if own == nil {
		return nil
	}
	used := min(t.Amount, own.Amount)
	if err := shrinkEarmark(tx, own, used); err != nil {
		return err
	}
	return setPromised(tx, b, b.Promised-used)
}

// afterDraw opens a sealed bottle and marks one that is empty now. What was
// full because nobody had opened it is known from the ledger from now on.
func (s *Store) afterDraw(tx *gorm.DB, b *Bottle, act Act) error {
	if b.State == Sealed {
		opened := s.today()
		if err := tx.Exec("UPDATE bottles SET opened = ?, measured_by = ? WHERE id = ?", opened, ByLedger, b.ID).Error; err != nil {
			return err
		}
		if err := s.setState(tx, b, Opened, act); err != nil {
			return err
		}
	}
	if b.Content == 0 {
		return s.setState(tx, b, Empty, act)
	}
	return nil
}

// Correct takes an entry back by adding its reversal. An entry can be reversed
// once, and a reversal not at all. Earmarks that no longer fit are cut, the
// youngest first, and returned.
func (s *Store) Correct(ctx context.Context, entry int64, act Act) (e Entry, cut []Promise, err error) {
	const doing = "correct"
	if err := act.check(doing); err != nil {
		return e, nil, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		e, cut, err = s.correct(tx, entry, act)
		return err
	})
	return e, cut, err
}

func (s *Store) correct(tx *gorm.DB, entry int64, act Act) (e Entry, cut []Promise, err error) {
	const doing = "correct"
	old, err := entryByID(tx, doing, entry)
	if err != nil {
		return e, nil, err
	}
	bottles, err := lockBottles(tx, []int64{old.BottleID})
	if err != nil {
		return e, nil, err
	}
	b := bottles[old.BottleID]
	what := fmt.Sprintf("entry %d of bottle %s", entry, b.Code)
	print := fingerprint(entry)
	if ref, err := done(tx, b.StoreID, act, doing, print); err != nil || ref != 0 {
		e, err = orEntry(tx, doing, ref, err)
		return e, nil, err
	}
	if old.Kind == Reversed || old.Kind == Merged {
		return e, nil, invalid(doing, what, "it is a "+string(old.Kind), "write the amount anew")
	}
	var earlier int64
	if err := tx.Model(&Entry{}).Where("reversal_of = ?", entry).Count(&earlier).Error; err != nil {
		return e, nil, err
	}
	if earlier > 0 {
		return e, nil, &Error{Doing: doing, What: what, Kind: ErrDuplicate, Why: "it was taken back before"}
	}
	if b.Content < old.Amount {
		return e, nil, invalid(doing, what, "less is left in the bottle than it brought", "count the bottle instead")
	}
	if cut, err = s.cutEarmarks(tx, &b, b.Content-old.Amount, act); err != nil {
		return e, nil, err
	}
	e = Entry{Kind: Reversed, Amount: -old.Amount, RunID: old.RunID, ReversalOf: entry, ByWhom: act.By, Why: act.Why}
	if err := s.post(tx, &b, &e); err != nil {
		return e, nil, err
	}
	if b.State == Empty && b.Content > 0 {
		if err := s.setState(tx, &b, Opened, act); err != nil {
			return e, nil, err
		}
	}
	return e, cut, remember(tx, b.StoreID, act, doing, print, e.ID, e.At)
}

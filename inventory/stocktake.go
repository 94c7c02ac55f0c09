package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"
)

// Count is what a stock-take found in a bottle.
type Count struct {
	Bottle  string // its code
	Content int64  // in the unit of the bottle
	By      MeasuredBy
}

// StockTake writes down what is really in a bottle. The ledger gets the
// difference, and an entry even if there is none, because it was looked at.
// Earmarks that no longer fit are cut, the youngest first, and returned. A
// bottle that was missing is found by it.
func (s *Store) StockTake(ctx context.Context, c Count, act Act) (e Entry, cut []Promise, err error) {
	const doing = "count"
	if err := act.check(doing); err != nil {
		return e, nil, err
	}
	if c.Content < 0 {
		return e, nil, invalid(doing, "bottle "+c.Bottle, "a content below nothing", "")
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		b, form, err := lockBottle(tx, doing, c.Bottle)
		if err != nil {
			return err
		}
		print := fingerprint(b.ID, c.Content, c.By)
		if ref, err := done(tx, b.StoreID, act, doing, print); err != nil || ref != 0 {
			e, err = orEntry(tx, doing, ref, err)
			return err
		}
		if e, cut, err = s.count(tx, &b, form, c, act); err != nil {
			return err
		}
		return remember(tx, b.StoreID, act, doing, print, e.ID, e.At)
	})
	return e, cut, err
}

func (s *Store) count(tx *gorm.DB, b *Bottle, form StockForm, c Count, act Act) (e Entry, cut []Promise, err error) {
	const doing = "count"
	if b.State == Discarded {
		return e, nil, invalid(doing, "bottle "+b.Code, "it was discarded", "take it into stock as a new bottle")
	}
	if most := b.Size + b.Size/10; c.Content > most {
		return e, nil, invalid(doing, "bottle "+b.Code, fmt.Sprintf("%s in a bottle of %s", amountText(c.Content, form.Measure), amountText(b.Size, form.Measure)), "check the amount and its unit")
	}
	switch c.By {
	case ByWeighing, ByLevel, ByGuess, ByUnopened:
	default:
		return e, nil, invalid(doing, "bottle "+b.Code, fmt.Sprintf("%q is no way to measure", c.By), "weighed, level, guessed or unopened")
	}
	if cut, err = s.cutEarmarks(tx, b, c.Content, act); err != nil {
		return e, nil, err
	}
	e = Entry{Kind: Counted, Amount: c.Content - b.Content, ByWhom: act.By, Why: act.Why}
	if err := s.post(tx, b, &e); err != nil {
		return e, nil, err
	}
	if err := tx.Exec("UPDATE bottles SET measured_by = ?, measured_on = ? WHERE id = ?", c.By, s.today(), b.ID).Error; err != nil {
		return e, nil, err
	}
	b.MeasuredBy, b.MeasuredOn = c.By, s.today()
	return e, cut, s.stateAfterCount(tx, b, act)
}

func (s *Store) stateAfterCount(tx *gorm.DB, b *Bottle, act Act) error {
	back := Opened
	if !b.Opened.Set() {
		back = Sealed
	}
	switch {
	case b.Content == 0 && b.State != Empty:
		return s.setState(tx, b, Empty, act)
	case b.Content > 0 && (b.State == Missing || b.State == Empty):
		return s.setState(tx, b, back, act)
	}
	return nil
}

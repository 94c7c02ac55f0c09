package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"

	"stillroom/chem"
)

// Weighing is a bottle that was weighed before something is taken from it.
type Weighing struct {
	BottleID int64 `gorm:"primaryKey"`
	StoreID  int64
	GrossUG  int64 // bottle with content, µg
	RunID    int64
	ByWhom   string
	At       Stamp
}

// WeighOut notes the mass of a bottle with its content before a draw. If its
// tare is known, the content is corrected to what the balance says first, and
// earmarks that no longer fit are cut and returned.
func (s *Store) WeighOut(ctx context.Context, code string, gross chem.Mass, run int64, act Act) (cut []Promise, err error) {
	const doing = "weigh out"
	if err := act.check(doing); err != nil {
		return nil, err
	}
	ug, ok := UnitsNear(gross)
	if !ok || ug == 0 {
		return nil, invalid(doing, "bottle "+code, "the balance can't have shown that", "give the mass of the bottle with its content")
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		b, form, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		if form.Measure == ByCount {
			return invalid(doing, "bottle "+b.Code, "its content is counted in pieces", "count them")
		}
		if cut, err = s.countWeighed(tx, &b, form, ug, act); err != nil {
			return err
		}
		w := Weighing{BottleID: b.ID, StoreID: b.StoreID, GrossUG: ug, RunID: run, ByWhom: act.By, At: s.stamp()}
		return tx.Save(&w).Error
	})
	return cut, err
}

// countWeighed corrects the content of a bottle of known tare.
func (s *Store) countWeighed(tx *gorm.DB, b *Bottle, form StockForm, grossUG int64, act Act) ([]Promise, error) {
	if b.TareUG == 0 {
		return nil, nil
	}
	if grossUG < b.TareUG {
		return nil, invalid("weigh", "bottle "+b.Code, fmt.Sprintf("it weighs less than its tare of %s", amountText(b.TareUG, ByMass)), "check the code and the tare")
	}
	content, ok := form.unitsWeighed(grossUG - b.TareUG)
	if !ok {
		return nil, nil // a volume without a density: the balance can't tell
	}
	_, cut, err := s.count(tx, b, form, Count{b.Code, content, ByWeighing}, act)
	return cut, err
}

// unitsWeighed returns the ledger units in a weighed mass, to the nearest.
func (f StockForm) unitsWeighed(ug int64) (int64, bool) {
	if f.Measure == ByMass {
		return ug, true
	}
	d, ok := f.Density()
	if !ok || f.Measure != ByVolume {
		return 0, false
	}
	return UnitsNear(d.Volume(MassUnits(ug)))
}

// WeighIn notes the mass of the bottle after the draw and draws the difference
// to WeighOut for the same run.
func (s *Store) WeighIn(ctx context.Context, code string, gross chem.Mass, act Act) (e Entry, err error) {
	const doing = "weigh in"
	if err := act.check(doing); err != nil {
		return e, err
	}
	ug, ok := UnitsNear(gross)
	if !ok || ug == 0 {
		return e, invalid(doing, "bottle "+code, "the balance can't have shown that", "give the mass of the bottle with its content")
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		e, err = s.weighIn(tx, code, ug, act)
		return err
	})
	return e, err
}

func (s *Store) weighIn(tx *gorm.DB, code string, ug int64, act Act) (e Entry, err error) {
	const doing = "weigh in"
	b, form, err := lockBottle(tx, doing, code)
	if err != nil {
		return e, err
	}
	print := fingerprint(b.ID, ug)
	if ref, err := done(tx, b.StoreID, act, doing, print); err != nil || ref != 0 {
		return orEntry(tx, doing, ref, err)
	}
	var w Weighing
	found := tx.Where("bottle_id = ?", b.ID).Limit(1).Find(&w)
	if found.Error != nil {
		return e, found.Error
	}
	if found.RowsAffected == 0 {
		return e, notFound(doing, "a weigh-out of bottle "+b.Code, "weigh the bottle before taking anything out")
	}
	if ug >= w.GrossUG {
		return e, invalid(doing, "bottle "+b.Code, fmt.Sprintf("it went out with %s", amountText(w.GrossUG, ByMass)), "check the balance; if nothing was taken, cancel the weigh-out")
	}
	units, ok := form.unitsWeighed(w.GrossUG - ug)
	if !ok {
		return e, invalid(doing, "bottle "+b.Code, "its volume can't be told from its mass without a density", "give the form's density")
	}
	if e, err = s.draw(tx, Taking{b.Code, min(units, b.Content), w.RunID}, Act{By: act.By, Why: act.Why}); err != nil {
		return e, err
	}
	if err := tx.Exec("DELETE FROM weighings WHERE bottle_id = ?", b.ID).Error; err != nil {
		return e, err
	}
	return e, remember(tx, b.StoreID, act, doing, print, e.ID, e.At)
}

// WeighedOut returns the weigh-out of a bottle that hasn't been weighed in yet,
// if there is one.
func (s *Store) WeighedOut(ctx context.Context, code string) (w Weighing, out bool, err error) {
	const doing = "look up the weigh-out of"
	err = s.read(ctx, doing, func(tx *gorm.DB) error {
		b, err := bottleByCode(tx, doing, code)
		if err != nil {
			return err
		}
		found := tx.Where("bottle_id = ?", b.ID).Limit(1).Find(&w)
		out = found.RowsAffected > 0
		return found.Error
	})
	return w, out, err
}

// CancelWeighOut forgets a weigh-out after which nothing was taken.
func (s *Store) CancelWeighOut(ctx context.Context, code string, act Act) error {
	const doing = "cancel the weigh-out of"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		b, _, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		return tx.Exec("DELETE FROM weighings WHERE bottle_id = ?", b.ID).Error
	})
}

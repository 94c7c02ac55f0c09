package inventory

import (
	"cmp"
	"context"
	"fmt"
	"slices"

	"gorm.io/gorm"
)

// Want is an amount of a bottle that a run is to be promised.
type Want struct {
	Bottle string // its code
	Amount int64  // more than 0, in the unit of the bottle
	// Ends is the day after which the earmark lapses; no date means the
	// policy's earmark.days after the run's date.
	Ends Date
}

// Earmark promises an amount of a bottle to a run; a run's earlier earmark on
// the same bottle is replaced. Lapsed earmarks of other runs give way. The
// error is a *PromiseError that names the runs in the way. A bottle of another
// store has to be lent first.
func (s *Store) Earmark(ctx context.Context, run int64, want Want, act Act) (Earmark, error) {
	marks, err := s.earmarks(ctx, run, []Want{want}, false, act)
	if err != nil || len(marks) == 0 {
		return Earmark{}, err
	}
	return marks[0], nil
}

// EarmarkRun makes the wants all the earmarks a run has: all of them or, if one
// can't be had, none is changed.
func (s *Store) EarmarkRun(ctx context.Context, run int64, wants []Want, act Act) ([]Earmark, error) {
	return s.earmarks(ctx, run, wants, true, act)
}

func (s *Store) earmarks(ctx context.Context, run int64, wants []Want, replace bool, act Act) (marks []Earmark, err error) {
	const doing = "earmark"
	if err := act.check(doing); err != nil {
		return nil, err
	}
	for _, w := range wants {
		if w.Amount <= 0 {
			return nil, invalid(doing, "bottle "+w.Bottle, "the amount must be more than 0", "")
		}
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		marks = marks[:0]
		r, err := lockRun(tx, doing, run)
		if err != nil {
			return err
		}
		if r.State == Closed || r.State == Dropped {
			return invalid(doing, fmt.Sprintf("run %d", run), "it is "+string(r.State), "plan a new run")
		}
		print := fingerprint(run, wants, replace)
		if ref, err := done(tx, r.StoreID, act, doing, print); err != nil || ref != 0 {
			return orElse(err, func() error { return tx.Where("run_id = ?", run).Order("bottle_id").Find(&marks).Error })
		}
		wants, err := inLockOrder(tx, doing, wants)
		if err != nil {
			return err
		}
		if replace {
			if err := s.releaseRun(tx, run, act); err != nil {
				return err
			}
		}
		for _, w := range wants {
			mark, err := s.earmark(tx, r, w, act)
			if err != nil {
				return err
			}
			marks = append(marks, mark)
		}
		return remember(tx, r.StoreID, act, doing, print, run, s.stamp())
	})
	return marks, err
}

// orElse returns err, or what f returns if there is none.
func orElse(err error, f func() error) error {
	if err != nil {
		return err
	}
	return f()
}

// inLockOrder sorts the wants by the bottles' IDs.
func inLockOrder(tx *gorm.DB, doing string, wants []Want) ([]Want, error) {
	if len(wants) < 2 {
		return wants, nil
	}
	ids := make(map[string]int64, len(wants))
	for _, w := range wants {
		b, err := bottleByCode(tx, doing, w.Bottle)
		if err != nil {
			return nil, err
		}
		ids[w.Bottle] = b.ID
	}
	wants = slices.Clone(wants)
	slices.SortStableFunc(wants, func(a, b Want) int { return cmp.Compare(ids[a.Bottle], ids[b.Bottle]) })
	return wants, nil
}

func (s *Store) earmark(tx *gorm.DB, run Run, want Want, act Act) (mark Earmark, err error) {
	const doing = "earmark"
	b, form, err := lockBottle(tx, doing, want.Bottle)
	if err != nil {
		return mark, err
	}
	switch b.State {
	case Sealed, Opened, OnLoan:
	default:
		return mark, invalid(doing, "bottle "+b.Code, "it is "+string(b.State), "choose another bottle")
	}
	if b.StoreID != run.StoreID {
		return mark, invalid(doing, "bottle "+b.Code, "it belongs to another store than the run", "have it lent first")
	}
	marks, err := s.liveEarmarks(tx, &b, run.ID)
	if err != nil {
		return mark, err
	}
	own, others := splitEarmarks(marks, run.ID)
	if want.Amount > b.Content {
		return mark, &ShortError{b.Code, form.Measure, want.Amount, b.Content}
	}
	if free := b.Content - total(others); want.Amount > free {
		return mark, promiseError(tx, &b, form, want.Amount, free, others)
	}
	ends, err := endsOf(tx, run, want)
	if err != nil {
		return mark, err
	}
	mark = Earmark{StoreID: b.StoreID, BottleID: b.ID, RunID: run.ID, Amount: want.Amount, Owner: run.Owner,
		ForDate: run.On, Ends: ends, Made: s.stamp()}
	was := ""
	if own != nil {
		mark.ID, mark.Made, was = own.ID, own.Made, amountText(own.Amount, form.Measure)
	}
	if err := tx.Save(&mark).Error; err != nil {
		return mark, err
	}
	if err := setPromised(tx, &b, total(others)+want.Amount); err != nil {
		return mark, err
	}
	return mark, s.audit(tx, b.StoreID, act, doing, fmt.Sprintf("bottle %s, run %d", b.Code, run.ID), was, amountText(want.Amount, form.Measure))
}

func endsOf(tx *gorm.DB, run Run, want Want) (Date, error) {
	if want.Ends.Set() {
		return want.Ends, nil
	}
	var row PolicyRow
	found := tx.Where("key = ?", "earmark.days").Limit(1).Find(&row)
	if found.Error == nil && found.RowsAffected == 0 {
		return 0, invalid("earmark", "", "no end given and the policy has no earmark.days", "give the day on which it ends")
	}
	return run.On.AddDays(int(row.Value)), found.Error
}

// liveEarmarks returns a bottle's earmarks by ID after lapsed ones of other
// runs have been released.
func (s *Store) liveEarmarks(tx *gorm.DB, b *Bottle, keep int64) ([]Earmark, error) {
	var marks []Earmark
	if b.Promised == 0 {
		return nil, nil
	}
	if err := tx.Where("bottle_id = ?", b.ID).Order("id").Find(&marks).Error; err != nil {
		return nil, err
	}
	live := marks[:0]
	for _, m := range marks {
		if m.RunID == keep || m.Ends >= s.today() {
			live = append(live, m)
			continue
		}
		act := Act{By: "stillroom", Why: fmt.Sprintf("lapsed after %s", m.Ends)}
		if err := s.release(tx, b, m, act); err != nil {
			return nil, err
		}
	}
	return live, nil
}

// release deletes an earmark of a bottle that is locked.
func (s *Store) release(tx *gorm.DB, b *Bottle, m Earmark, act Act) error {
	if err := tx.Exec("DELETE FROM earmarks WHERE id = ?", m.ID).Error; err != nil {
		return err
	}
	if err := setPromised(tx, b, b.Promised-m.Amount); err != nil {
		return err
	}
	return s.audit(tx, b.StoreID, act, "release", fmt.Sprintf("bottle %s, run %d", b.Code, m.RunID), fmt.Sprint(m.Amount), "0")
}

// cutEarmarks makes the promises fit a content that turned out smaller: lapsed
// ones go, then the youngest are cut. It returns what was taken away.
func (s *Store) cutEarmarks(tx *gorm.DB, b *Bottle, content int64, act Act) (cut []Promise, err error) {
	if b.Promised <= content {
		return nil, nil
	}
	marks, err := s.liveEarmarks(tx, b, 0)
	if err != nil {
		return nil, err
	}
	for i := len(marks) - 1; i >= 0 && b.Promised > content; i-- {
		m := marks[i]
		by := min(m.Amount, b.Promised-content)
		if err := shrinkEarmark(tx, &m, by); err != nil {
			return nil, err
		}
		if err := setPromised(tx, b, b.Promised-by); err != nil {
			return nil, err
		}
		p, err := promiseOf(tx, m)
		if err != nil {
			return nil, err
		}
		p.Amount = by
		cut = append(cut, p)
		if err := s.audit(tx, b.StoreID, act, "cut earmark", fmt.Sprintf("bottle %s, run %d", b.Code, m.RunID), fmt.Sprint(m.Amount+by), fmt.Sprint(m.Amount)); err != nil {
			return nil, err
		}
	}
	return cut, nil
}

// shrinkEarmark takes an amount off an earmark and deletes it when nothing is left.
func shrinkEarmark(tx *gorm.DB, m *Earmark, by int64) error {
	m.Amount -= by
	if m.Amount <= 0 {
		return tx.Exec("DELETE FROM earmarks WHERE id = ?", m.ID).Error
	}
	return tx.Exec("UPDATE earmarks SET amount = ? WHERE id = ?", m.Amount, m.ID).Error
}

func setPromised(tx *gorm.DB, b *Bottle, promised int64) error {
	if promised == b.Promised {
		return nil
	}
	b.Promised = promised
	return tx.Exec("UPDATE bottles SET promised = ? WHERE id = ?", promised, b.ID).Error
}

// splitEarmarks tells a run's own earmark, nil if it has none, from the others.
func splitEarmarks(marks []Earmark, run int64) (own *Earmark, others []Earmark) {
	for i := range marks {
		if run != 0 && marks[i].RunID == run {
			own = &marks[i]
			continue
		}
		others = append(others, marks[i])
	}
	return own, others
}

func total(marks []Earmark) (sum int64) {
	for _, m := range marks {
		sum += m.Amount
	}
	return sum
}

func promiseError(tx *gorm.DB, b *Bottle, form StockForm, wanted, free int64, others []Earmark) error {
	e := &PromiseError{Bottle: b.Code, Measure: form.Measure, Wanted: wanted, Free: free, Content: b.Content}
	promises, err := promisesOf(tx, others)
	if err != nil {
		return err
	}
	e.Others = promises
	return e
}

func promiseOf(tx *gorm.DB, m Earmark) (Promise, error) {
	promises, err := promisesOf(tx, []Earmark{m})
	if err != nil {
		return Promise{}, err
	}
	return promises[0], nil
}

// promisesOf names the runs of earmarks, in one query for all of them.
func promisesOf(tx *gorm.DB, marks []Earmark) ([]Promise, error) {
	ids := make([]int64, len(marks))
	for i, m := range marks {
		ids[i] = m.RunID
	}
	var runs []Run
	if err := tx.Select("id", "recipe").Where("id IN ?", ids).Find(&runs).Error; err != nil {
		return nil, err
	}
	recipes := make(map[int64]string, len(runs))
	for _, r := range runs {
		recipes[r.ID] = r.Recipe
	}
	promises := make([]Promise, len(marks))
	for i, m := range marks {
		promises[i] = Promise{Run: m.RunID, Recipe: recipes[m.RunID], On: m.ForDate, Owner: m.Owner, Amount: m.Amount, Ends: m.Ends}
	}
	return promises, nil
}

// Reconfirm moves the end of all a run's earmarks.
func (s *Store) Reconfirm(ctx context.Context, run int64, ends Date, act Act) error {
	const doing = "reconfirm"
	if err := act.check(doing); err != nil {
		return err
	}
	if ends < s.today() {
		return invalid(doing, fmt.Sprintf("run %d", run), "the new end "+ends.String()+" is past", "give today or a later day")
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		r, err := lockRun(tx, doing, run)
		if err != nil {
			return err
		}
		if err := tx.Exec("UPDATE earmarks SET ends = ? WHERE run_id = ?", ends, run).Error; err != nil {
			return err
		}
		return s.audit(tx, r.StoreID, act, doing, fmt.Sprintf("run %d", run), "", ends.String())
	})
}

// Release frees everything a run was promised.
func (s *Store) Release(ctx context.Context, run int64, act Act) error {
	const doing = "release"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		if _, err := lockRun(tx, doing, run); err != nil {
			return err
		}
		return s.releaseRun(tx, run, act)
	})
}

// ReleaseBottle frees what a run was promised of one bottle.
func (s *Store) ReleaseBottle(ctx context.Context, run int64, code string, act Act) error {
	const doing = "release"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		b, _, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		var m Earmark
		found := tx.Where("bottle_id = ? AND run_id = ?", b.ID, run).Limit(1).Find(&m)
		if found.Error != nil || found.RowsAffected == 0 {
			return found.Error
		}
		return s.release(tx, &b, m, act)
	})
}

func (s *Store) releaseRun(tx *gorm.DB, run int64, act Act) error {
	_, err := s.releaseWhere(tx, act, "run_id = ?", run)
	return err
}

// releaseWhere deletes the earmarks that fit a condition. Their bottles are
// locked first, as in every change of an earmark, and only then are the earmarks
// read for good.
func (s *Store) releaseWhere(tx *gorm.DB, act Act, condition string, arg any) (marks []Earmark, err error) {
	var ids []int64
	if err := tx.Model(&Earmark{}).Where(condition, arg).Distinct().Pluck("bottle_id", &ids).Error; err != nil || len(ids) == 0 {
		return nil, err
	}
	bottles, err := lockBottles(tx, ids)
	if err != nil {
		return nil, err
	}
	if err := tx.Where(condition, arg).Where("bottle_id IN ?", ids).Order("bottle_id, id").Find(&marks).Error; err != nil {
		return nil, err
	}
	for _, m := range marks {
		b := bottles[m.BottleID]
		if err := s.release(tx, &b, m, act); err != nil {
			return nil, err
		}
		bottles[m.BottleID] = b
	}
	return marks, nil
}

// Lapse releases every earmark that has lapsed and returns them.
func (s *Store) Lapse(ctx context.Context, act Act) (marks []Earmark, err error) {
	const doing = "lapse"
	if err := act.check(doing); err != nil {
		return nil, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		marks, err = s.releaseWhere(tx, act, "ends < ?", s.today())
		return err
	})
	return marks, err
}

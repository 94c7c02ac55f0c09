package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"
)

// AddRun puts a run on the slate, pencilled. Its store must be set; the ID, the
// state and the time are given here.
func (s *Store) AddRun(ctx context.Context, r Run, act Act) (Run, error) {
	const doing = "add a run"
	if err := act.check(doing); err != nil {
		return Run{}, err
	}
	if r.StoreID == 0 {
		r.StoreID = 1
	}
	if r.Owner == "" {
		r.Owner = act.By
	}
	if err := checkTarget(doing, r.TargetUG, r.On); err != nil {
		return Run{}, err
	}
	if r.Recipe == "" {
		return Run{}, invalid(doing, "", "no recipe", "name one")
	}
	err := s.write(ctx, doing, func(tx *gorm.DB) error {
		print := fingerprint(r.StoreID, r.Recipe, r.TargetUG, r.On)
		ref, err := done(tx, r.StoreID, act, doing, print)
		if err != nil {
			return err
		}
		if ref != 0 {
			return tx.Where("id = ?", ref).Take(&r).Error
		}
		r.ID, r.State, r.Made, r.Version = 0, Pencilled, s.stamp(), 1
		if err := tx.Create(&r).Error; err != nil {
			return err
		}
		if err := s.audit(tx, r.StoreID, act, doing, fmt.Sprintf("run %d", r.ID), "", runText(r)); err != nil {
			return err
		}
		return remember(tx, r.StoreID, act, doing, print, r.ID, r.Made)
	})
	return r, err
}

func checkTarget(doing string, targetUG int64, on Date) error {
	if targetUG <= 0 {
		return invalid(doing, "", "the target must be more than 0", "give a mass such as 50 g")
	}
	if !on.Set() {
		return invalid(doing, "", "no date", "give the day of the run")
	}
	return nil
}

func runText(r Run) string {
	return fmt.Sprintf("%s, %s on %s, %s", r.Recipe, amountText(r.TargetUG, ByMass), r.On, r.State)
}

// Runs returns all runs in order of date, then ID.
func (s *Store) Runs(ctx context.Context) (runs []Run, err error) {
	err = s.read(ctx, "list the runs", func(tx *gorm.DB) error {
		return tx.Order("on_date, id").Find(&runs).Error
	})
	return runs, err
}

// Run returns a run, or ErrNotFound.
func (s *Store) Run(ctx context.Context, id int64) (r Run, err error) {
	err = s.read(ctx, "look up", func(tx *gorm.DB) error {
		r, err = runByID(tx, "look up", id)
		return err
	})
	return r, err
}

func runByID(tx *gorm.DB, doing string, id int64) (r Run, err error) {
	found := tx.Where("id = ?", id).Limit(1).Find(&r)
	if found.Error == nil && found.RowsAffected == 0 {
		return r, notFound(doing, fmt.Sprintf("run %d", id), "choose one of the slate")
	}
	return r, found.Error
}

func lockRun(tx *gorm.DB, doing string, id int64) (Run, error) {
	return runByID(tx.Clauses(clause.Locking{Strength: "UPDATE"}), doing, id)
}

// SetTarget changes what a run is to make and when. Version is the one the
// change was made from (0 for whichever is there); the error is ErrStale if
// somebody changed the run meanwhile. A cleared run is pencilled again. Its
// earmarks stay, for the new date.
func (s *Store) SetTarget(ctx context.Context, id, targetUG int64, on Date, version int64, act Act) (Run, error) {
	const doing = "change"
	if err := checkTarget(doing, targetUG, on); err != nil {
		return Run{}, err
	}
	return s.changeRun(ctx, doing, id, version, act, func(tx *gorm.DB, r *Run) error {
		if r.State != Pencilled && r.State != Cleared {
			return invalid(doing, fmt.Sprintf("run %d", id), "it is "+string(r.State), "add another run")
		}
		r.TargetUG, r.On, r.State = targetUG, on, Pencilled
		return tx.Exec("UPDATE earmarks SET for_date = ? WHERE run_id = ?", on, id).Error
	})
}

// runMoves lists where a run may go from each state.
var runMoves = map[RunState][]RunState{
	Pencilled: {Cleared, Dropped},
	Cleared:   {Pencilled, Picked, Dropped},
	Picked:    {Cleared, Closed, Dropped},
	Closed:    {},
	Dropped:   {Pencilled},
}

// SetState moves a run along: pencilled → cleared → picked → closed, or
// dropped. Closing and dropping release its earmarks. Version is as for
// SetTarget.
func (s *Store) SetState(ctx context.Context, id int64, state RunState, version int64, act Act) (Run, error) {
	const doing = "change"
	return s.changeRun(ctx, doing, id, version, act, func(tx *gorm.DB, r *Run) error {
		if r.State == state {
			return nil
		}
		allowed := false
		for _, next := range runMoves[r.State] {
			allowed = allowed || next == state
		}
		if !allowed {
			return invalid(doing, fmt.Sprintf("run %d", id), fmt.Sprintf("%s can't become %s", r.State, state), "go step by step: pencilled, cleared, picked, closed")
		}
		r.State = state
		if state == Closed || state == Dropped {
			return s.releaseRun(tx, id, act)
		}
		return nil
	})
}

// SetRunRecipe stores the text a run is planned with.
func (s *Store) SetRunRecipe(ctx context.Context, id int64, text string, act Act) (Run, error) {
	return s.changeRun(ctx, "change", id, 0, act, func(_ *gorm.DB, r *Run) error {
		r.RecipeText = text
		return nil
	})
}

func (s *Store) changeRun(ctx context.Context, doing string, id, version int64, act Act, change func(*gorm.DB, *Run) error) (r Run, err error) {
	if err := act.check(doing); err != nil {
		return r, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		if r, err = lockRun(tx, doing, id); err != nil {
			return err
		}
		if version != 0 && version != r.Version {
			return &Error{Doing: doing, What: fmt.Sprintf("run %d", id), Kind: ErrStale,
				Why: "it is now " + runText(r), Would: "look at it again and repeat the change"}
		}
		was := r
		if err := change(tx, &r); err != nil {
			return err
		}
		if r == was {
			return nil
		}
		r.Version++
		if err := tx.Save(&r).Error; err != nil {
			return err
		}
		return s.audit(tx, r.StoreID, act, doing, fmt.Sprintf("run %d", id), runText(was), runText(r))
	})
	return r, err
}

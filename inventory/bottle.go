package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"
)

// StateChange is one step in the life of a bottle.
type StateChange struct {
	ID       int64
	StoreID  int64
	BottleID int64
	Was      BottleState // "" at receipt
	State    BottleState
	ByWhom   string
	At       Stamp
	Why      string
}

// TableName names the table for gorm.
func (StateChange) TableName() string { return "bottle_states" }

// bottleByCode reads a bottle without locking it.
func bottleByCode(tx *gorm.DB, doing, code string) (b Bottle, err error) {
	if code, err = NormalCode(code); err != nil {
		return b, err
	}
	found := tx.Where("code = ?", code).Limit(1).Find(&b)
	if found.Error == nil && found.RowsAffected == 0 {
		return b, notFound(doing, "bottle "+code, "check the code, or take the bottle into stock first")
	}
	return b, found.Error
}

// Bottle reads a bottle by its code, typed or scanned.
func (s *Store) Bottle(ctx context.Context, code string) (b Bottle, err error) {
	err = s.read(ctx, "look up", func(tx *gorm.DB) error {
		b, err = bottleByCode(tx, "look up", code)
		return err
	})
	return b, err
}

// bottleMoves lists where a bottle may go from each state. Empty and discarded
// come about by draws and Discard; a bottle may be found again or refilled.
var bottleMoves = map[BottleState][]BottleState{
	Sealed:      {Opened, Quarantined, Missing, OnLoan},
	Opened:      {Quarantined, Missing, OnLoan, Empty},
	Quarantined: {Sealed, Opened, Missing},
	Missing:     {Sealed, Opened, Quarantined, Empty},
	OnLoan:      {Sealed, Opened, Quarantined, Missing, Empty},
	Empty:       {Opened, Missing},
	Discarded:   {},
}

// SetBottleState moves a bottle to another state. Discard is its own call,
// because it takes the content out of the ledger.
func (s *Store) SetBottleState(ctx context.Context, code string, state BottleState, act Act) error {
	const doing = "set the state of"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		b, _, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		if b.State == state {
			return nil
		}
		if !mayMove(b.State, state) {
			return invalid(doing, "bottle "+b.Code, fmt.Sprintf("%s can't become %s", b.State, state), "")
		}
		if state == Empty && b.Content > 0 {
			return invalid(doing, "bottle "+b.Code, "the ledger says that it isn't empty", "count it as 0 first")
		}
		if state == Opened && !b.Opened.Set() {
			if err := tx.Exec("UPDATE bottles SET opened = ? WHERE id = ?", s.today(), b.ID).Error; err != nil {
				return err
			}
		}
		if state == Sealed && b.Opened.Set() {
			return invalid(doing, "bottle "+b.Code, "it has been opened", "")
		}
		return s.setState(tx, &b, state, act)
	})
}

// NextStates lists the states that SetBottleState may bring a bottle to as it
// is now. A loan and a discard have calls of their own and aren't among them.
func (b Bottle) NextStates() []BottleState {
	var next []BottleState
	for _, state := range bottleMoves[b.State] {
		switch {
		case state == OnLoan, state == Sealed && b.Opened.Set(), state == Empty && b.Content > 0:
		default:
			next = append(next, state)
		}
	}
	return next
}

func mayMove(from, to BottleState) bool {
	for _, state := range bottleMoves[from] {
		if state == to {
			return true
		}
	}
	return false
}

func (s *Store) setState(tx *gorm.DB, b *Bottle, state BottleState, act Act) error {
	change := StateChange{StoreID: b.StoreID, BottleID: b.ID, Was: b.State, State: state, ByWhom: act.By, At: s.stamp(), Why: act.Why}
	if err := tx.Create(&change).Error; err != nil {
		return err
	}
	b.State = state
	b.Version++
	return tx.Exec("UPDATE bottles SET state = ?, version = ? WHERE id = ?", state, b.Version, b.ID).Error
}

// States returns the life of a bottle, the newest change first. A bottle that
// came with an import begins with its receipt in the ledger.
func (s *Store) States(ctx context.Context, code string) (changes []StateChange, err error) {
	err = s.read(ctx, "look up", func(tx *gorm.DB) error {
		b, err := bottleByCode(tx, "look up", code)
		if err != nil {
			return err
		}
		if err := tx.Where("bottle_id = ?", b.ID).Order("id DESC").Find(&changes).Error; err != nil {
			return err
		}
		if n := len(changes); n > 0 && changes[n-1].Was == "" {
			return nil
		}
		var receipt Entry
		if err := tx.Where("bottle_id = ? AND kind = ?", b.ID, Receipt).Take(&receipt).Error; err != nil {
			return err
		}
		first := b.State
		if n := len(changes); n > 0 {
			first = changes[n-1].Was
		}
		changes = append(changes, StateChange{StoreID: b.StoreID, BottleID: b.ID, State: first, ByWhom: receipt.ByWhom, At: receipt.At, Why: receipt.Why})
		return nil
	})
	return changes, err
}

// Discard takes what is left of a bottle out of the ledger for good. Its
// earmarks are released and returned.
func (s *Store) Discard(ctx context.Context, code string, act Act) (cut []Promise, err error) {
	const doing = "discard"
	if err := act.check(doing); err != nil {
		return nil, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		b, _, err := lockBottle(tx, doing, code)
		if err != nil || b.State == Discarded {
			return err
		}
		cut, err = s.discard(tx, &b, act)
		return err
	})
	return cut, err
}

func (s *Store) discard(tx *gorm.DB, b *Bottle, act Act) (cut []Promise, err error) {
	if cut, err = s.cutEarmarks(tx, b, 0, act); err != nil {
		return nil, err
	}
	if b.Content > 0 {
		e := Entry{Kind: Discard, Amount: -b.Content, ByWhom: act.By, Why: act.Why}
		if err := s.post(tx, b, &e); err != nil {
			return nil, err
		}
	}
	return cut, s.setState(tx, b, Discarded, act)
}

// MoveBottle puts a bottle in another place of its store. A move to another
// store is a loan and has its own calls.
func (s *Store) MoveBottle(ctx context.Context, code string, placeID int64, act Act) error {
	const doing = "move"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		b, _, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		place, err := placeByID(tx, doing, placeID)
		if err != nil {
			return err
		}
		if place.StoreID != b.StoreID {
			return invalid(doing, "bottle "+b.Code, place.String()+" is in another store", "lend it instead")
		}
		from, err := placeByID(tx, doing, b.PlaceID)
		if err != nil {
			return err
		}
		if err := tx.Exec("UPDATE bottles SET place_id = ?, version = version + 1 WHERE id = ?", placeID, b.ID).Error; err != nil {
			return err
		}
		return s.audit(tx, b.StoreID, act, doing, "bottle "+b.Code, from.String(), place.String())
	})
}

func placeByID(tx *gorm.DB, doing string, id int64) (p Place, err error) {
	found := tx.Where("id = ?", id).Limit(1).Find(&p)
	if found.Error == nil && found.RowsAffected == 0 {
		return p, notFound(doing, fmt.Sprintf("place %d", id), "choose a place of the list")
	}
	return p, found.Error
}

// NotePeroxideTest writes down a peroxide test of today.
func (s *Store) NotePeroxideTest(ctx context.Context, code string, ppm float64, act Act) error {
	const doing = "note a peroxide test of"
	if err := act.check(doing); err != nil {
		return err
	}
	if !(ppm >= 0 && ppm < 1e6) {
		return invalid(doing, "bottle "+code, fmt.Sprintf("%v ppm is no content", ppm), "give 0 or more")
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		b, _, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		if err := tx.Exec("UPDATE bottles SET peroxide_tested = ?, peroxide_ppm = ?, version = version + 1 WHERE id = ?", s.today(), ppm, b.ID).Error; err != nil {
			return err
		}
		return s.audit(tx, b.StoreID, act, doing, "bottle "+b.Code, fmt.Sprint(b.PeroxidePPM, " ppm"), fmt.Sprint(ppm, " ppm"))
	})
}

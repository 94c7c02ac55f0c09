package inventory

import (
	"context"
	"fmt"
	"strings"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"
)

// A loan takes a bottle from one store to another. It has two phases, each a
// transaction of one store, because the stores may lie in different databases
// one day: the lender sends, which takes the content out of its ledger, and the
// borrower takes in, which puts it into its own. In between the content is on
// its way and stands in the loan alone. Taking in is safe to repeat, so a
// program that died between its two steps only has to be asked again.

// Loan is a bottle lent to another store.
type Loan struct {
	ID       int64
	StoreID  int64 // of the lender
	BottleID int64
	ToStore  int64
	Amount   int64  // in the unit of the bottle
	State    string // "on its way", "arrived"
	ToBottle int64  // the borrower's record; 0 while it is on its way
	ByWhom   string
	At       Stamp
	Why      string
}

// The states of a loan.
const (
	LoanOnItsWay = "on its way"
	LoanArrived  = "arrived"
)

// Lend sends a bottle with all its content to another store. It is refused with
// a *PromiseError while runs were promised some of it.
func (s *Store) Lend(ctx context.Context, code string, toStore int64, act Act) (loan Loan, err error) {
	const doing = "lend"
	if err := act.check(doing); err != nil {
		return loan, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		b, form, err := lockBottle(tx, doing, code)
		if err != nil {
			return err
		}
		print := fingerprint(b.ID, toStore)
		ref, err := done(tx, b.StoreID, act, doing, print)
		if err != nil {
			return err
		}
		if ref != 0 {
			return tx.Where("id = ?", ref).Take(&loan).Error
		}
		if err := s.mayLend(tx, &b, form, toStore); err != nil {
			return err
		}
		loan = Loan{StoreID: b.StoreID, BottleID: b.ID, ToStore: toStore, Amount: b.Content, State: LoanOnItsWay, ByWhom: act.By, At: s.stamp(), Why: act.Why}
		if err := tx.Create(&loan).Error; err != nil {
			return err
		}
		act.Why = strings.TrimSpace(fmt.Sprintf("loan %d %s", loan.ID, act.Why))
		if err := s.post(tx, &b, &Entry{Kind: Drawn, Amount: -b.Content, ByWhom: act.By, Why: act.Why}); err != nil {
			return err
		}
		if err := s.setState(tx, &b, OnLoan, act); err != nil {
			return err
		}
		return remember(tx, b.StoreID, act, doing, print, loan.ID, loan.At)
	})
	return loan, err
}

func (s *Store) mayLend(tx *gorm.DB, b *Bottle, form StockForm, toStore int64) error {
	const doing = "lend"
	what := "bottle " + b.Code
	if b.State != Sealed && b.State != Opened || b.Content == 0 {
		return invalid(doing, what, "it is "+string(b.State), "only a bottle that is there can be lent")
	}
	if toStore == b.StoreID {
		return invalid(doing, what, "it belongs to that store", "move it instead")
	}
	var store storeroom
	found := tx.Where("id = ?", toStore).Limit(1).Find(&store)
	if found.Error != nil {
		return found.Error
	}
	if found.RowsAffected == 0 {
		return notFound(doing, fmt.Sprintf("store %d", toStore), "choose one of the stores")
	}
	marks, err := s.liveEarmarks(tx, b, 0)
	if err != nil || len(marks) == 0 {
		return err
	}
	return promiseError(tx, b, form, b.Content, b.Content-total(marks), marks)
}

// TakeIn puts a bottle that is on its way on a shelf of the store it was lent to
// and returns it: under a code of that store, or if it comes back to the store
// it was borrowed from, under its old one.
func (s *Store) TakeIn(ctx context.Context, loanID, placeID int64, act Act) (b Bottle, err error) {
	const doing = "take in"
	if err := act.check(doing); err != nil {
		return b, err
	}
	var loan Loan
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		found := tx.Where("id = ?", loanID).Limit(1).Find(&loan)
		if found.Error != nil {
			return found.Error
		}
		if found.RowsAffected == 0 {
			return notFound(doing, fmt.Sprintf("loan %d", loanID), "choose one of the list")
		}
		b, err = s.takeIn(tx, loan, placeID, act)
		return err
	})
	if err != nil {
		return b, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		return tx.Exec("UPDATE loans SET state = ?, to_bottle = ? WHERE id = ?", LoanArrived, b.ID, loan.ID).Error
	})
	return b, err
}

// takeIn is the borrower's half. Its key is the loan's, so that a second taking
// in finds the first.
func (s *Store) takeIn(tx *gorm.DB, loan Loan, placeID int64, act Act) (b Bottle, err error) {
	const doing = "take in"
	once := Act{By: act.By, Why: strings.TrimSpace(fmt.Sprintf("loan %d %s", loan.ID, act.Why)), Key: fmt.Sprintf("loan %d", loan.ID)}
	ref, err := done(tx, loan.ToStore, once, doing, "")
	if err != nil {
		return b, err
	}
	if ref != 0 {
		return b, tx.Where("id = ?", ref).Take(&b).Error
	}
	place, err := placeByID(tx, doing, placeID)
	if err != nil {
		return b, err
	}
	if place.StoreID != loan.ToStore {
		return b, invalid(doing, fmt.Sprintf("loan %d", loan.ID), place.String()+" isn't in the store it was lent to", "choose a place of that store")
	}
	var sent Bottle
	if err := tx.Where("id = ?", loan.BottleID).Take(&sent).Error; err != nil {
		return b, err
	}
	if b, err = s.homecoming(tx, loan, place, once); err != nil {
		return b, err
	}
	if b.ID == 0 {
		b = sent
		b.StoreID, b.PlaceID, b.Content = loan.ToStore, placeID, loan.Amount
		b.State = openOrSealed(sent)
		b.Note = strings.TrimSpace(fmt.Sprintf("on loan, there bottle %s. %s", sent.Code, sent.Note))
		if err := s.receive(tx, &b, once); err != nil {
			return b, err
		}
	}
	return b, remember(tx, loan.ToStore, once, doing, "", b.ID, s.stamp())
}

func openOrSealed(b Bottle) BottleState {
	if b.Opened.Set() {
		return Opened
	}
	return Sealed
}

// homecoming puts the content back under the record the bottle had before it was
// borrowed; the bottle returned has no ID if it comes from elsewhere.
func (s *Store) homecoming(tx *gorm.DB, loan Loan, place Place, act Act) (b Bottle, err error) {
	var out Loan
	found := tx.Where("to_bottle = ? AND store_id = ?", loan.BottleID, loan.ToStore).Order("id DESC").Limit(1).Find(&out)
	if found.Error != nil || found.RowsAffected == 0 {
		return b, found.Error
	}
	if err := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("id = ?", out.BottleID).Take(&b).Error; err != nil {
		return b, err
	}
	var borrowed Bottle
	if err := tx.Where("id = ?", loan.BottleID).Take(&borrowed).Error; err != nil {
		return b, err
	}
	b.Opened, b.PlaceID, b.MeasuredBy, b.MeasuredOn = borrowed.Opened, place.ID, borrowed.MeasuredBy, borrowed.MeasuredOn
	if err := tx.Exec("UPDATE bottles SET opened = ?, place_id = ?, measured_by = ?, measured_on = ? WHERE id = ?", b.Opened, b.PlaceID, b.MeasuredBy, b.MeasuredOn, b.ID).Error; err != nil {
		return b, err
	}
	if err := s.post(tx, &b, &Entry{Kind: Receipt, Amount: loan.Amount, ByWhom: act.By, Why: act.Why}); err != nil {
		return b, err
	}
	return b, s.setState(tx, &b, openOrSealed(b), act)
}

// Loans lists all loans, the newest first.
func (s *Store) Loans(ctx context.Context) (loans []Loan, err error) {
	err = s.read(ctx, "list the loans", func(tx *gorm.DB) error {
		return tx.Order("id DESC").Find(&loans).Error
	})
	return loans, err
}

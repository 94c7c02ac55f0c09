package inventory

import (
	"context"
	"fmt"
	"time"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"
)

// The states of an order.
const (
	OrderUnderWay  = "under way"
	OrderReceived  = "received"
	OrderCancelled = "cancelled"
)

// PlaceOrder writes down that packs of an offer were ordered today. Due is when
// they are expected; no date means the offer's median lead time from today, of
// which weekends are part; one that ends on a weekend ends on the Monday after it.
func (s *Store) PlaceOrder(ctx context.Context, offer, packs, run int64, due Date, act Act) (o Order, err error) {
	const doing = "order"
	if err := act.check(doing); err != nil {
		return o, err
	}
	if packs < 1 {
		return o, invalid(doing, "", "no packs", "order at least one")
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		var of Offer
		found := tx.Where("id = ?", offer).Limit(1).Find(&of)
		if found.Error != nil {
			return found.Error
		}
		if found.RowsAffected == 0 {
			return notFound(doing, fmt.Sprintf("offer %d", offer), "choose one of the form's offers")
		}
		print := fingerprint(offer, packs, run, due)
		ref, err := done(tx, 0, act, doing, print)
		if err != nil {
			return err
		}
		if ref != 0 {
			return tx.Where("id = ?", ref).Take(&o).Error
		}
		if !due.Set() {
			due = workday(s.today().AddDays(of.LeadDays))
		}
		o = Order{OfferID: offer, FormID: of.FormID, Packs: packs, Ordered: s.today(), Due: due, State: OrderUnderWay, RunID: run}
		if err := tx.Create(&o).Error; err != nil {
			return err
		}
		if err := s.audit(tx, 0, act, doing, fmt.Sprintf("order %d", o.ID), "", fmt.Sprintf("%d × %s %s", packs, of.Supplier, of.Item)); err != nil {
			return err
		}
		return remember(tx, 0, act, doing, print, o.ID, s.stamp())
	})
	return o, err
}

// ReceiveOrder puts the packs of an order on the shelf, one sealed bottle each,
// all alike but for their codes. The bottle given says the place, the lot and
// the expiry; without one the offer's shelf life from today counts.
func (s *Store) ReceiveOrder(ctx context.Context, order int64, like Bottle, act Act) (bottles []Bottle, err error) {
	const doing = "receive"
	err = s.changeOrder(ctx, doing, order, OrderReceived, act, func(tx *gorm.DB, o Order) error {
		var of Offer
		if err := tx.Where("id = ?", o.OfferID).Take(&of).Error; err != nil {
			return err
		}
		place, err := placeByID(tx, doing, like.PlaceID)
		if err != nil {
			return err
		}
		bottles = bottles[:0]
		for range o.Packs {
			b := like
			b.StoreID, b.FormID, b.Size, b.Content, b.Supplier = place.StoreID, o.FormID, of.PackSize, of.PackSize, of.Supplier
			b.State, b.MeasuredBy, b.Received = Sealed, ByUnopened, s.today()
			if !b.Expiry.Set() && of.ShelfLifeDays > 0 {
				b.Expiry = s.today().AddDays(of.ShelfLifeDays)
			}
			if err := s.receive(tx, &b, act); err != nil {
				return err
			}
			bottles = append(bottles, b)
		}
		return nil
	})
	return bottles, err
}

// CancelOrder writes down that an order won't come.
func (s *Store) CancelOrder(ctx context.Context, order int64, act Act) error {
	return s.changeOrder(ctx, "cancel", order, OrderCancelled, act, func(*gorm.DB, Order) error { return nil })
}

func (s *Store) changeOrder(ctx context.Context, doing string, order int64, state string, act Act, f func(*gorm.DB, Order) error) error {
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		what := fmt.Sprintf("order %d", order)
		var o Order
		found := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("id = ?", order).Limit(1).Find(&o)
		if found.Error != nil {
			return found.Error
		}
		if found.RowsAffected == 0 {
			return notFound(doing, what, "choose one of the list")
		}
		if o.State != OrderUnderWay {
			return invalid(doing, what, "it is "+o.State, "")
		}
		if err := f(tx, o); err != nil {
			return err
		}
		if err := tx.Exec("UPDATE orders SET state = ? WHERE id = ?", state, order).Error; err != nil {
			return err
		}
		return s.audit(tx, 0, act, doing, what, o.State, state)
	})
}

// Late reports whether an order that is under way should have come by a day.
func (o Order) Late(today Date) bool {
	return o.State == OrderUnderWay && o.Due.Set() && o.Due < today
}

// workday moves a date that falls on a weekend to the Monday after it.
func workday(d Date) Date {
	switch d.Time().Weekday() {
	case time.Saturday:
		return d.AddDays(2)
	case time.Sunday:
		return d.AddDays(1)
	}
	return d
}

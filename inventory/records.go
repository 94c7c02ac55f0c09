package inventory

import (
	"context"
	"fmt"
	"strings"

	"gorm.io/gorm"
)

// AddSubstance adds a substance by its name or registry number. What the
// embedded table knows is filled in, and Source says so; otherwise it is the
// lab's own, with what was given and no more.
func (s *Store) AddSubstance(ctx context.Context, r Substance, act Act) (Substance, error) {
	const doing = "add a substance"
	if err := act.check(doing); err != nil {
		return r, err
	}
	id, err := identify(r.Name, r.CAS, r.Formula)
	if err != nil {
		return r, invalid(doing, r.Name, err.Error(), "correct the name or the number")
	}
	added := id.substance
	if r.Synonyms != "" && added.Synonyms == "" {
		added.Synonyms = r.Synonyms
	}
	err = s.add(ctx, doing, act, 0, &added, func() string { return "substance " + added.Name })
	return added, err
}

// AddForm adds a stock form of a substance in stock.
func (s *Store) AddForm(ctx context.Context, f StockForm, act Act) (StockForm, error) {
	const doing = "add a form"
	switch {
	case f.Measure != ByMass && f.Measure != ByVolume && f.Measure != ByCount:
		return f, invalid(doing, f.Name, fmt.Sprintf("%q is no measure", f.Measure), "mass, volume or count")
	case !(f.AssayLow >= 0 && f.AssayLow <= f.AssayHigh && f.AssayHigh <= 1):
		return f, invalid(doing, f.Name, fmt.Sprintf("a strength from %v to %v", f.AssayLow, f.AssayHigh), "give fractions of one, the lower end first")
	case !(f.DensityGML >= 0 && f.DensityGML < 25) || !(f.HydrateWaters >= 0 && f.HydrateWaters <= 24):
		return f, invalid(doing, f.Name, fmt.Sprintf("density %v g/mL, %v waters", f.DensityGML, f.HydrateWaters), "leave at 0 what isn't known")
	case f.DensityGML > 0 && f.DensitySource == "":
		return f, invalid(doing, f.Name, "a density without a source", "say where it comes from")
	}
	f.ID = 0
	err := s.add(ctx, doing, act, 0, &f, func() string { return "form " + f.Name })
	return f, err
}

// AddPlace adds a place to a store, at the end of the walk unless Walk is set. A
// store of a new name is added with it.
func (s *Store) AddPlace(ctx context.Context, p Place, act Act) (Place, error) {
	const doing = "add a place"
	if err := act.check(doing); err != nil {
		return p, err
	}
	if strings.TrimSpace(p.Store) == "" || p.Room+p.Cabinet+p.Shelf == "" {
		return p, invalid(doing, "", "a place needs a store and a cabinet or shelf", "name them")
	}
	err := s.write(ctx, doing, func(tx *gorm.DB) error {
		store := storeroom{Name: p.Store}
		if err := tx.Where("name = ?", p.Store).Limit(1).Find(&store).Error; err != nil {
			return err
		}
		if store.ID == 0 {
			if err := tx.Create(&store).Error; err != nil {
				return err
			}
		}
		if p.Walk == 0 {
			if err := tx.Raw("SELECT coalesce(max(walk), 0) + 10 FROM places").Row().Scan(&p.Walk); err != nil {
				return err
			}
		}
		p.ID, p.StoreID = 0, store.ID
		if err := tx.Create(&p).Error; err != nil {
			return err
		}
		return s.audit(tx, p.StoreID, act, doing, "place "+p.String(), "", "")
	})
	return p, err
}

// AddEquipment adds a piece of ware.
func (s *Store) AddEquipment(ctx context.Context, e Equipment, act Act) (Equipment, error) {
	const doing = "add equipment"
	if e.Kind == "" || e.Name == "" || e.Size < 0 || e.Count < 0 {
		return e, invalid(doing, e.Name, "it needs a kind, a name, and no number below 0", "")
	}
	e.ID = 0
	err := s.add(ctx, doing, act, e.StoreID, &e, func() string { return "equipment " + e.Name })
	return e, err
}

// AddCarboy adds an empty waste carboy; its code is given here.
func (s *Store) AddCarboy(ctx context.Context, c Carboy, act Act) (Carboy, error) {
	const doing = "add a carboy"
	if err := act.check(doing); err != nil {
		return c, err
	}
	if c.Stream == "" || c.SizeUL <= 0 || !(c.FillLimit > 0 && c.FillLimit <= 1) {
		return c, invalid(doing, "", "it needs a waste stream, a size, and a fill limit above 0 and up to 1", "")
	}
	err := s.write(ctx, doing, func(tx *gorm.DB) error {
		place, err := placeByID(tx, doing, c.PlaceID)
		if err != nil {
			return err
		}
		if c.ID, err = s.nextID(tx, "carboys"); err != nil {
			return err
		}
		c.StoreID, c.Code, c.ContentUL, c.Contains = place.StoreID, MakeCode(CarboyCode, c.ID), 0, ""
		if err := tx.Create(&c).Error; err != nil {
			return err
		}
		return s.audit(tx, c.StoreID, act, doing, "carboy "+c.Code, "", c.Stream)
	})
	return c, err
}

// AddOffer adds a supplier's offer for a form.
func (s *Store) AddOffer(ctx context.Context, o Offer, act Act) (Offer, error) {
	const doing = "add an offer"
	if o.Supplier == "" || o.PackSize <= 0 || o.PriceMinor < 0 || len(o.Currency) != 3 {
		return o, invalid(doing, o.Item, "it needs a supplier, a pack above 0, a price and a currency of three letters", "such as EUR")
	}
	o.ID = 0
	err := s.add(ctx, doing, act, 0, &o, func() string { return "offer " + o.Supplier + " " + o.Item })
	return o, err
}

// add creates one row and notes it in the audit.
func (s *Store) add(ctx context.Context, doing string, act Act, storeID int64, row any, name func() string) error {
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		if err := tx.Create(row).Error; err != nil {
			return err
		}
		return s.audit(tx, storeID, act, doing, name(), "", fmt.Sprintf("%+v", row))
	})
}

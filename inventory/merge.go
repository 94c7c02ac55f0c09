package inventory

import (
	"context"
	"fmt"
	"strings"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"
)

// MergeSubstances makes one of two records of the same substance: forms move to
// the one kept, the other's names become its synonyms. Records with different
// registry numbers are refused, because they are different substances.
func (s *Store) MergeSubstances(ctx context.Context, from, into int64, act Act) (kept Substance, err error) {
	const doing = "merge"
	if err := act.check(doing); err != nil {
		return kept, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		gone, err := lockSubstance(tx, doing, from)
		if err != nil {
			return err
		}
		if kept, err = lockSubstance(tx, doing, into); err != nil {
			return err
		}
		switch {
		case from == into:
			return invalid(doing, gone.Name, "it is the same record", "choose another")
		case gone.CAS != "" && kept.CAS != "" && gone.CAS != kept.CAS:
			return invalid(doing, gone.Name, fmt.Sprintf("its CAS number is %s, that of %s is %s", gone.CAS, kept.Name, kept.CAS), "correct the number first if they are the same substance")
		}
		if err := tx.Exec("UPDATE stock_forms SET substance_id = ? WHERE substance_id = ?", into, from).Error; err != nil {
			return err
		}
		if err := tx.Exec("DELETE FROM substances WHERE id = ?", from).Error; err != nil {
			return err
		}
		was := fmt.Sprintf("%+v", kept)
		kept.absorb(gone)
		if err := tx.Save(&kept).Error; err != nil {
			return err
		}
		if err := s.audit(tx, 0, act, doing, "substance "+kept.Name, was, fmt.Sprintf("%+v", kept)); err != nil {
			return err
		}
		return s.audit(tx, 0, act, doing, "substance "+gone.Name, fmt.Sprintf("%+v", gone), "merged into "+kept.Name)
	})
	return kept, err
}

// absorb takes over what the other record knows and this one doesn't.
func (s *Substance) absorb(other Substance) {
	names := map[string]bool{nameKey(s.Name): true}
	var synonyms []string
	for _, name := range append(append(strings.Split(s.Synonyms, ";"), other.Name), strings.Split(other.Synonyms, ";")...) {
		if name = strings.TrimSpace(name); name != "" && !names[nameKey(name)] {
			names[nameKey(name)] = true
			synonyms = append(synonyms, name)
		}
	}
	s.Synonyms = strings.Join(synonyms, "; ")
	if s.CAS == "" {
		s.CAS = other.CAS
	}
	if s.Formula == "" {
		s.Formula = other.Formula
	}
}

func lockSubstance(tx *gorm.DB, doing string, id int64) (r Substance, err error) {
	found := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("id = ?", id).Limit(1).Find(&r)
	if found.Error == nil && found.RowsAffected == 0 {
		return r, notFound(doing, fmt.Sprintf("substance %d", id), "choose one of the list")
	}
	return r, found.Error
}

// MergeBottles makes one of two records of the same physical bottle. The content
// of the one kept holds; the other's is taken out of the ledger, its record stays
// and points to the one kept, and its earmarks move there as far as they fit.
// What didn't fit is returned.
func (s *Store) MergeBottles(ctx context.Context, from, into string, act Act) (cut []Promise, err error) {
	const doing = "merge"
	if err := act.check(doing); err != nil {
		return nil, err
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		gone, kept, err := lockTwo(tx, doing, from, into)
		if err != nil {
			return err
		}
		switch {
		case gone.ID == kept.ID:
			return invalid(doing, "bottle "+gone.Code, "it is the same record", "choose another")
		case gone.FormID != kept.FormID:
			return invalid(doing, "bottle "+gone.Code, "it holds another form than bottle "+kept.Code, "correct the form first")
		case gone.StoreID != kept.StoreID:
			return invalid(doing, "bottle "+gone.Code, "it belongs to another store than bottle "+kept.Code, "merge records of one store")
		}
		if cut, err = s.moveEarmarks(tx, &gone, &kept, act); err != nil {
			return err
		}
		e := Entry{Kind: Merged, Amount: -gone.Content, ByWhom: act.By, Why: strings.TrimSpace("the same as bottle " + kept.Code + " " + act.Why)}
		if err := s.post(tx, &gone, &e); err != nil {
			return err
		}
		if err := s.setState(tx, &gone, Discarded, act); err != nil {
			return err
		}
		return tx.Exec("UPDATE bottles SET merged_into = ? WHERE id = ?", kept.ID, gone.ID).Error
	})
	return cut, err
}

// lockTwo locks two bottles in order of their IDs.
func lockTwo(tx *gorm.DB, doing, from, into string) (gone, kept Bottle, err error) {
	if gone, err = bottleByCode(tx, doing, from); err != nil {
		return gone, kept, err
	}
	if kept, err = bottleByCode(tx, doing, into); err != nil {
		return gone, kept, err
	}
	locked, err := lockBottles(tx, []int64{gone.ID, kept.ID})
	if err != nil {
		return gone, kept, err
	}
	gone, kept = locked[gone.ID], locked[kept.ID]
	if gone.MergedInto != 0 || kept.MergedInto != 0 {
		return gone, kept, invalid(doing, "bottles "+gone.Code+" and "+kept.Code, "one of them was merged before", "look them up again")
	}
	return gone, kept, nil
}

func (s *Store) moveEarmarks(tx *gorm.DB, gone, kept *Bottle, act Act) (cut []Promise, err error) {
	var marks []Earmark
	if err := tx.Where("bottle_id = ?", gone.ID).Order("id").Find(&marks).Error; err != nil {
		return nil, err
	}
	for _, m := range marks {
		if err := s.release(tx, gone, m, act); err != nil {
			return nil, err
		}
		fits := min(m.Amount, kept.Content-kept.Promised)
		if fits < m.Amount {
			p, err := promiseOf(tx, m)
			if err != nil {
				return nil, err
			}
			p.Amount = m.Amount - fits
			cut = append(cut, p)
		}
		if fits > 0 {
			if err := s.addToEarmark(tx, kept, m, fits); err != nil {
				return nil, err
			}
		}
	}
	return cut, nil
}

// addToEarmark promises more of a bottle to a run, on top of what it has of it.
func (s *Store) addToEarmark(tx *gorm.DB, b *Bottle, m Earmark, amount int64) error {
	var own Earmark
	found := tx.Where("bottle_id = ? AND run_id = ?", b.ID, m.RunID).Limit(1).Find(&own)
	if found.Error != nil {
		return found.Error
	}
	if found.RowsAffected == 0 {
		own = m
		own.ID, own.BottleID, own.Amount = 0, b.ID, 0
	}
	own.Amount += amount
	if err := tx.Save(&own).Error; err != nil {
		return err
	}
	return setPromised(tx, b, b.Promised+amount)
}

package inventory

import (
	"context"
	"slices"
	"strings"
	"sync"

	"gorm.io/gorm"
)

// Load reads everything the planner needs in one transaction, so that it is one
// moment of the database. As long as nothing was written, the same shelf is
// returned again, which is safe because a shelf never changes.
func (s *Store) Load(ctx context.Context) (*Shelf, error) {
	version, known, err := s.version(ctx)
	if err != nil {
		return nil, translate("load the shelf", err)
	}
	if last := s.loaded.Load(); known && last != nil && last.version == version {
		return last.shelf, nil
	}
	shelf, err := s.load(ctx)
	if err == nil && known {
		s.loaded.Store(&loadedShelf{version, shelf})
	}
	return shelf, err
}

// loadedShelf is the last shelf loaded and the version of the database before
// that; a write in between makes the next Load read again.
type loadedShelf struct {
	version int64
	shelf   *Shelf
}

// version returns a number that changes with every write by whatever process:
// SQLite's own count, as seen by a connection that never writes. In memory,
// where there is one connection, it is the count of rows changed. PostgreSQL
// has no such number that is cheap, so there it isn't known.
func (s *Store) version(ctx context.Context) (n int64, known bool, err error) {
	switch {
	case s.engine == onPostgres:
		return 0, false, nil
	case s.watcher != nil:
		// Never cancelled: a connection given up for that would count anew.
		err = s.watcher.QueryRowContext(context.WithoutCancel(ctx), "PRAGMA data_version").Scan(&n)
	default:
		err = s.pools[0].QueryRowContext(ctx, "SELECT total_changes()").Scan(&n)
	}
	return n, err == nil, err
}

func (s *Store) load(ctx context.Context) (*Shelf, error) {
	var lab Lab
	err := s.read(ctx, "load the shelf", func(tx *gorm.DB) error {
		if err := loadRest(tx, &lab); err != nil {
			return err
		}
		if err := tx.Order("form_id, code").Find(&lab.Bottles).Error; err != nil {
			return err
		}
		return tx.Find(&lab.Earmarks).Error
	})
	if err != nil {
		return nil, err
	}
	return shelfOf(lab), nil
}

// LoadFor is Load with the bottles of only some substances, by name, synonym or
// registry number, without those that are empty or discarded; everything else
// is whole. Substances that may be put in another's place have to be named too.
// A site with a million bottles plans with it. As long as nothing was written,
// the same names give the same shelf.
func (s *Store) LoadFor(ctx context.Context, substances []string) (*Shelf, error) {
	const doing = "load a part of the shelf"
	version, known, err := s.version(ctx)
	if err != nil {
		return nil, translate(doing, err)
	}
	names := slices.Compact(slices.Sorted(slices.Values(substances)))
	if shelf, ok := s.parts.get(version, names); known && ok {
		return shelf, nil
	}
	shelf, err := s.loadFor(ctx, doing, names)
	if err == nil && known {
		s.parts.put(version, names, shelf)
	}
	return shelf, err
}

func (s *Store) loadFor(ctx context.Context, doing string, names []string) (*Shelf, error) {
	var lab Lab
	err := s.read(ctx, doing, func(tx *gorm.DB) error {
		if err := loadRest(tx, &lab); err != nil {
			return err
		}
		if err := tx.Find(&lab.Earmarks).Error; err != nil {
			return err
		}
		ids := formsNamed(lab, names)
		if len(ids) == 0 {
			return nil
		}
		return tx.Where("form_id IN ? AND state NOT IN ?", ids, []BottleState{Discarded, Empty}).Order("form_id, code").Find(&lab.Bottles).Error
	})
	if err != nil {
		return nil, err
	}
	return shelfOf(lab), nil
}

// loadedParts are the parts of the shelf loaded since the last write, by the
// names of their substances.
type loadedParts struct {
	mu      sync.Mutex
	version int64
	shelves map[string]*Shelf
}

// mostParts bounds the parts kept: the slate's, and those of a few recipes that
// aren't on it.
const mostParts = 4

func (p *loadedParts) get(version int64, names []string) (*Shelf, bool) {
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.version != version {
		return nil, false
	}
	shelf, ok := p.shelves[strings.Join(names, "\n")]
	return shelf, ok
}

func (p *loadedParts) put(version int64, names []string, shelf *Shelf) {
	p.mu.Lock()
	defer p.mu.Unlock()
	if p.version != version || len(p.shelves) >= mostParts || p.shelves == nil {
		p.version, p.shelves = version, map[string]*Shelf{}
	}
	p.shelves[strings.Join(names, "\n")] = shelf
}

// loadRest reads all lists but those that grow with the bottles.
func loadRest(tx *gorm.DB, lab *Lab) error {
	var policy []PolicyRow
	for _, list := range []any{&lab.Substances, &lab.Forms, &lab.Places, &lab.Offers, &lab.Orders, &lab.Carboys, &lab.Equipment, &lab.Runs, &policy} {
		if err := tx.Find(list).Error; err != nil {
			return err
		}
	}
	lab.Policy = PolicyOf(policy)
	return nil
}

func formsNamed(lab Lab, names []string) (ids []int64) {
	shelf := NewShelf(lab)
	for _, name := range names {
		substance, ok := shelf.Substance(name)
		if !ok {
			continue
		}
		for _, form := range shelf.FormsOf(substance.ID) {
			ids = append(ids, form.ID)
		}
	}
	return ids
}

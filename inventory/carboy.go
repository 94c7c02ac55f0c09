package inventory

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"gorm.io/gorm"
	"gorm.io/gorm/clause"

	"stillroom/chem"
)

// Part is a share of what is in a carboy, by volume as it was poured in.
type Part struct {
	Name  string
	Share float64 // fraction of one
}

// Parts reads what a carboy contains. The shares of a carboy with anything in it
// sum up to one.
func (c Carboy) Parts() ([]Part, error) {
	var parts []Part
	for _, text := range strings.Split(c.Contains, ";") {
		if text = strings.TrimSpace(text); text == "" {
			continue
		}
		name, share, ok := cutLast(text, ":")
		percent, err := strconv.ParseFloat(strings.TrimSpace(strings.TrimSuffix(strings.TrimSpace(share), "%")), 64)
		if !ok || err != nil || !(percent >= 0 && percent <= 100) {
			return nil, invalid("read", "carboy "+c.Code, fmt.Sprintf("%q is no part", text), "want name: share %")
		}
		parts = append(parts, Part{strings.TrimSpace(name), percent / 100})
	}
	return parts, nil
}

func cutLast(s, sep string) (before, after string, found bool) {
	if i := strings.LastIndex(s, sep); i >= 0 {
		return s[:i], s[i+len(sep):], true
	}
	return s, "", false
}

// FreeUL is what may still go in, in µL: up to the fill limit.
func (c Carboy) FreeUL() int64 {
	return max(0, int64(float64(c.SizeUL)*c.FillLimit)-c.ContentUL)
}

// Clashes returns what must never meet among a carboy's content and things to
// be poured in, by the compatibility chart. Names that the embedded table
// doesn't know are returned as not assessed: that is no leave to mix them.
func (c Carboy) Clashes(names []string) (pairs []chem.Incompatibility, notAssessed []string, err error) {
	parts, err := c.Parts()
	if err != nil {
		return nil, nil, err
	}
	var there []*chem.Substance
	seen := map[string]bool{}
	for _, p := range parts {
		names = append(slices.Clip(names), p.Name)
	}
	for _, name := range names {
		if seen[nameKey(name)] {
			continue
		}
		seen[nameKey(name)] = true
		if s, ok := chem.LookupSubstance(name); ok {
			there = append(there, s)
		} else {
			notAssessed = append(notAssessed, name)
		}
	}
	return chem.IncompatiblePairs(there), notAssessed, nil
}

// newClashes are those that the pouring would bring about: what is together
// already isn't made worse by more of it.
func (c Carboy) newClashes(names []string) (pairs []chem.Incompatibility, notAssessed []string, err error) {
	all, notAssessed, err := c.Clashes(names)
	if err != nil {
		return nil, nil, err
	}
	there, _, err := c.Clashes(nil)
	if err != nil {
		return nil, nil, err
	}
	for _, p := range all {
		if !slices.ContainsFunc(there, func(q chem.Incompatibility) bool { return q.A == p.A && q.B == p.B || q.A == p.B && q.B == p.A }) {
			pairs = append(pairs, p)
		}
	}
	return pairs, notAssessed, nil
}

// Pouring is what is to go into a carboy.
type Pouring struct {
	Carboy   string // its code
	VolumeUL int64
	Parts    []Part // shares that sum up to one
	// Despite lets it in although the compatibility chart names pairs that must
	// not meet. The reason stands in the act and in the audit.
	Despite bool
}

// Pour notes that waste went into a carboy. It is refused when the carboy would
// be over its fill limit, when the shares don't sum up to one, and when the
// chart names a pair that must not meet. The chart is no assessment: a
// competent person decides what goes together.
func (s *Store) Pour(ctx context.Context, p Pouring, act Act) (c Carboy, err error) {
	const doing = "pour into"
	if err := act.check(doing); err != nil {
		return c, err
	}
	sum := 0.0
	for _, part := range p.Parts {
		sum += part.Share
	}
	if p.VolumeUL <= 0 || math.Abs(sum-1) > 1e-6 {
		return c, invalid(doing, "carboy "+p.Carboy, fmt.Sprintf("%s in shares that sum up to %.4g", amountText(p.VolumeUL, ByVolume), sum), "give a volume and shares of 100 % together")
	}
	err = s.write(ctx, doing, func(tx *gorm.DB) error {
		if c, err = lockCarboy(tx, doing, p.Carboy); err != nil {
			return err
		}
		print := fingerprint(c.ID, p)
		if ref, err := done(tx, c.StoreID, act, doing, print); err != nil || ref != 0 {
			return err
		}
		if err := s.pour(tx, &c, p, act); err != nil {
			return err
		}
		return remember(tx, c.StoreID, act, doing, print, c.ID, s.stamp())
	})
	return c, err
}

func (s *Store) pour(tx *gorm.DB, c *Carboy, p Pouring, act Act) error {
	const doing = "pour into"
	if p.VolumeUL > c.FreeUL() {
		return &Error{Doing: doing, What: "carboy " + c.Code, Kind: ErrInsufficient,
			Why:   fmt.Sprintf("%s is to go in, room is left for %s", amountText(p.VolumeUL, ByVolume), amountText(c.FreeUL(), ByVolume)),
			Would: "have it collected, or take another carboy"}
	}
	names := make([]string, len(p.Parts))
	for i, part := range p.Parts {
		names[i] = part.Name
	}
	pairs, _, err := c.newClashes(names)
	if err != nil {
		return err
	}
	if len(pairs) > 0 && !p.Despite {
		return invalid(doing, "carboy "+c.Code, fmt.Sprintf("%s and %s must not meet: %s", pairs[0].A, pairs[0].B, pairs[0].Consequences), "take another carboy, or ask the person in charge")
	}
	was := carboyText(*c)
	if err := c.mix(p); err != nil {
		return err
	}
	if !c.Opened.Set() {
		c.Opened = s.today()
	}
	if err := tx.Save(c).Error; err != nil {
		return err
	}
	return s.audit(tx, c.StoreID, act, "pour", "carboy "+c.Code, was, carboyText(*c))
}

// mix brings what a carboy contains along, volumes taken as additive.
func (c *Carboy) mix(p Pouring) error {
	parts, err := c.Parts()
	if err != nil {
		return err
	}
	volumes := map[string]float64{}
	for _, part := range parts {
		volumes[part.Name] += part.Share * float64(c.ContentUL)
	}
	for _, part := range p.Parts {
		volumes[part.Name] += part.Share * float64(p.VolumeUL)
	}
	c.ContentUL += p.VolumeUL
	c.Contains = partsText(volumes, float64(c.ContentUL))
	return nil
}

// partsText writes shares with two decimals of a per cent that sum up to exactly
// 100: the largest takes what rounding leaves.
func partsText(volumes map[string]float64, total float64) string {
	type share struct {
		name string
		of   int64 // hundredths of a per cent
	}
	shares := make([]share, 0, len(volumes))
	for name, v := range volumes {
		shares = append(shares, share{name, int64(math.Round(v / total * 1e4))})
	}
	slices.SortFunc(shares, func(a, b share) int { return cmp.Or(cmp.Compare(b.of, a.of), cmp.Compare(a.name, b.name)) })
	left := int64(1e4)
	for _, sh := range shares[1:] {
		left -= sh.of
	}
	shares[0].of = left
	texts := make([]string, len(shares))
	for i, sh := range shares {
		texts[i] = sh.name + ": " + decimalText(sh.of, 2) + " %"
	}
	return strings.Join(texts, "; ")
}

func carboyText(c Carboy) string {
	return amountText(c.ContentUL, ByVolume) + ": " + c.Contains
}

// Collect notes that a carboy was taken away full and stands there empty again.
func (s *Store) Collect(ctx context.Context, code string, act Act) error {
	const doing = "collect"
	if err := act.check(doing); err != nil {
		return err
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		c, err := lockCarboy(tx, doing, code)
		if err != nil {
			return err
		}
		was := carboyText(c)
		c.ContentUL, c.Contains, c.Opened = 0, "", 0
		if err := tx.Save(&c).Error; err != nil {
			return err
		}
		return s.audit(tx, c.StoreID, act, doing, "carboy "+c.Code, was, carboyText(c))
	})
}

func lockCarboy(tx *gorm.DB, doing, code string) (c Carboy, err error) {
	if code, err = NormalCode(code); err != nil {
		return c, err
	}
	found := tx.Clauses(clause.Locking{Strength: "UPDATE"}).Where("code = ?", code).Limit(1).Find(&c)
	if found.Error == nil && found.RowsAffected == 0 {
		return c, notFound(doing, "carboy "+code, "check the code")
	}
	return c, found.Error
}

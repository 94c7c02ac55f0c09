package inventory

import (
	"database/sql/driver"
	"fmt"
	"strconv"
	"strings"
)

// PriceBreak is the price of a pack when at least From packs are ordered.
type PriceBreak struct {
	From       int64 // packs
	PriceMinor int64 // a pack, whole minor units
}

// PriceBreaks are stored as text, "5@2150; 10@1990", rising by number.
type PriceBreaks []PriceBreak

// PriceFor returns the price of one pack when so many are ordered.
func (o Offer) PriceFor(packs int64) int64 {
	price := o.PriceMinor
	for _, b := range o.Breaks {
		if packs >= b.From {
			price = b.PriceMinor
		}
	}
	return price
}

// String writes the breaks as they are stored.
func (p PriceBreaks) String() string {
	parts := make([]string, len(p))
	for i, b := range p {
		parts[i] = fmt.Sprintf("%d@%d", b.From, b.PriceMinor)
	}
	return strings.Join(parts, "; ")
}

// Value stores the breaks as text.
func (p PriceBreaks) Value() (driver.Value, error) { return p.String(), nil }

// Scan reads stored breaks.
func (p *PriceBreaks) Scan(v any) error {
	*p = nil
	text, ok := v.(string)
	if b, isBytes := v.([]byte); isBytes {
		text, ok = string(b), true
	}
	if !ok && v != nil {
		return fmt.Errorf("price breaks column holds a %T", v)
	}
	for _, part := range strings.Split(text, ";") {
		if part = strings.TrimSpace(part); part == "" {
			continue
		}
		b, err := parsePriceBreak(part)
		if err != nil {
			return err
		}
		*p = append(*p, b)
	}
	return nil
}

func parsePriceBreak(part string) (PriceBreak, error) {
	from, price, _ := strings.Cut(part, "@")
	n, errN := strconv.ParseInt(from, 10, 64)
	minor, errP := strconv.ParseInt(price, 10, 64)
	if errN != nil || errP != nil || n < 1 || minor < 0 {
		return PriceBreak{}, fmt.Errorf("price break %q: want packs@price in minor units, such as 5@2150", part)
	}
	return PriceBreak{n, minor}, nil
}

// GormDataType names the column type for gorm.
func (PriceBreaks) GormDataType() string { return "text" }

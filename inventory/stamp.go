package inventory

import (
	"database/sql/driver"
	"fmt"
	"time"
)

// Stamp is an instant in UTC to the millisecond, as it is stored: text of fixed
// width, which sorts as the instants do and is the same on both engines.
type Stamp struct{ time.Time }

const stampLayout = "2006-01-02T15:04:05.000Z"

// StampOf returns the instant of t, cut to the millisecond.
func StampOf(t time.Time) Stamp { return Stamp{t.UTC().Truncate(time.Millisecond)} }

// String returns the stamp as it is stored.
func (s Stamp) String() string { return s.UTC().Format(stampLayout) }

// Value stores the stamp as text.
func (s Stamp) Value() (driver.Value, error) { return s.String(), nil }

// Scan reads a stored stamp.
func (s *Stamp) Scan(v any) error {
	text, ok := v.(string)
	if b, isBytes := v.([]byte); isBytes {
		text, ok = string(b), true
	}
	if !ok {
		return fmt.Errorf("stamp column holds a %T", v)
	}
	t, err := time.Parse(stampLayout, text)
	if err != nil {
		return fmt.Errorf("stored stamp %q: want it as %s", text, stampLayout)
	}
	s.Time = t
	return nil
}

// GormDataType names the column type for gorm.
func (Stamp) GormDataType() string { return "text" }

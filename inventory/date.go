package inventory

import (
	"database/sql/driver"
	"fmt"
	"time"
)

// Date is a civil date without a clock or a zone, as days since 1 January
// 1970. The zero value means "no date": that day itself is of no use to a
// stockroom.
type Date int32

const isoDate = "2006-01-02"

// NewDate returns the date of a year, month and day; days out of range carry
// over as in time.Date.
func NewDate(year int, month time.Month, day int) Date {
	return DateOf(time.Date(year, month, day, 0, 0, 0, 0, time.UTC))
}

// DateOf returns the civil date of t in t's own zone.
func DateOf(t time.Time) Date {
	y, m, d := t.Date()
	return Date(time.Date(y, m, d, 0, 0, 0, 0, time.UTC).Unix() / 86400)
}

// ParseDate reads an ISO 8601 calendar date, 2027-01-14. A month alone,
// 2027-01, means its last day, as on the label of a bottle.
func ParseDate(s string) (Date, error) {
	if t, err := time.Parse(isoDate, s); err == nil {
		return DateOf(t), nil
	}
	if t, err := time.Parse("2006-01", s); err == nil {
		return DateOf(t.AddDate(0, 1, -1)), nil
	}
	return 0, fmt.Errorf("date %q: want year-month-day, such as 2027-01-14", s)
}

// Time returns midnight UTC of the date.
func (d Date) Time() time.Time { return time.Unix(int64(d)*86400, 0).UTC() }

// Set reports whether d is a date at all.
func (d Date) Set() bool { return d != 0 }

// AddDays returns the date n days later.
func (d Date) AddDays(n int) Date { return d + Date(n) }

// String returns the date as 2027-01-14, or "" for no date.
func (d Date) String() string {
	if !d.Set() {
		return ""
	}
	return d.Time().Format(isoDate)
}

// Long returns the date with its weekday, "Thursday 14 January 2027", or "" for
// no date.
func (d Date) Long() string {
	if !d.Set() {
		return ""
	}
	return d.Time().Format("Monday 2 January 2006")
}

// Short returns the date as "14 Jan 2027", or "" for no date.
func (d Date) Short() string {
	if !d.Set() {
		return ""
	}
	return d.Time().Format("2 Jan 2006")
}

// MarshalText writes the ISO date.
func (d Date) MarshalText() ([]byte, error) { return []byte(d.String()), nil }

// UnmarshalText reads what MarshalText wrote; empty text is no date.
func (d *Date) UnmarshalText(b []byte) error {
	if len(b) == 0 {
		*d = 0
		return nil
	}
	v, err := ParseDate(string(b))
	*d = v
	return err
}

// Value stores the date as ISO text, which sorts as the dates do, or NULL.
func (d Date) Value() (driver.Value, error) {
	if !d.Set() {
		return nil, nil
	}
	return d.String(), nil
}

// Scan reads a stored date.
func (d *Date) Scan(v any) error {
	switch v := v.(type) {
	case nil:
		*d = 0
		return nil
	case time.Time:
		*d = DateOf(v)
		return nil
	case string:
		return d.UnmarshalText([]byte(v))
	case []byte:
		return d.UnmarshalText(v)
	}
	return fmt.Errorf("date column holds a %T", v)
}

// GormDataType names the column type for gorm.
func (Date) GormDataType() string { return "text" }

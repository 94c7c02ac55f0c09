package inventory

import (
	"context"
	"crypto/sha256"
	"fmt"
	"io"
	"strings"
)

// reading is a row that was read: a draft, or the reasons against it.
type reading struct {
	row    int
	draft  draft
	faults []string
}

// readings are handed over in parts of this many rows.
const readingPart = 256

// readAll reads the rows of a table in order while others write what has been
// read, and ends early when the context does.
func readAll(ctx context.Context, t Table, m Mapping) <-chan []reading {
	out := make(chan []reading, 4)
	go func() {
		defer close(out)
		reader, seen := newRowReader(t, m), newSeenRows(len(t.Rows))
		for from := 0; from < len(t.Rows); from += readingPart {
			part := make([]reading, 0, readingPart)
			for i := from; i < min(from+readingPart, len(t.Rows)); i++ {
				d, faults := reader.read(i)
				part = append(part, reading{i, d, append(faults, seen.faults(t, i, d.bottle.Mark)...)})
			}
			select {
			case out <- part:
			case <-ctx.Done():
				return
			}
		}
	}()
	return out
}

// seenRows remembers rows and own numbers, to refuse what says the same twice.
type seenRows struct {
	rows  map[[16]byte]int // hash → line
	marks map[string]int   // → line
}

func newSeenRows(n int) *seenRows {
	return &seenRows{make(map[[16]byte]int, n), make(map[string]int, n)}
}

func (s *seenRows) faults(t Table, i int, mark string) (faults []string) {
	row, line := t.Rows[i], t.Lines[i]
	if len(row) > len(t.Header) && !blank(row[len(t.Header):]) {
		faults = append(faults, fmt.Sprintf("%d cells under %d headings; quote a cell that holds a comma", len(row), len(t.Header)))
	}
	sum := rowSum(row)
	if at, seen := s.rows[sum]; seen {
		return append(faults, fmt.Sprintf("the same as line %d; give each bottle its own number, or their count", at))
	}
	s.rows[sum] = line
	if mark == "" {
		return faults
	}
	if at, seen := s.marks[mark]; seen {
		return append(faults, fmt.Sprintf("the number %q is on line %d too", mark, at))
	}
	s.marks[mark] = line
	return faults
}

func rowSum(row []string) (sum [16]byte) {
	full := sha256.Sum256([]byte(strings.Join(row, "\x00")))
	copy(sum[:], full[:])
	return sum
}

// fingerprint sums up the content of a table.
func (t Table) fingerprint() string {
	h := sha256.New()
	sum := rowSum(t.Header)
	h.Write(sum[:])
	for _, row := range t.Rows {
		io.WriteString(h, strings.Join(row, "\x00"))
		h.Write([]byte{'\n'})
	}
	return fmt.Sprintf("%x", h.Sum(nil))
}

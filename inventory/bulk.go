package inventory

import (
	"strconv"
	"strings"

	"gorm.io/gorm"
)

// bulk inserts many rows into one table, some hundred with each statement.
type bulk struct {
	tx      *gorm.DB
	engine  engine
	head    string // INSERT INTO … VALUES
	columns int
	batch   int // rows with each statement
	args    []any
	full    string // the statement for a whole batch
}

// bulkRows is how many rows go into a statement: past some hundred the gain is
// small, and SQLite takes 32766 parameters.
const bulkRows = 200

func newBulk(tx *gorm.DB, engine engine, table string, columns ...string) *bulk {
	b := &bulk{tx: tx, engine: engine, columns: len(columns), batch: bulkRows,
		head: "INSERT INTO " + table + " (" + strings.Join(columns, ", ") + ") VALUES "}
	b.args = make([]any, 0, b.columns*b.batch)
	b.full = b.statement(b.batch)
	return b
}

func (b *bulk) statement(rows int) string {
	var s strings.Builder
	s.WriteString(b.head)
	n := 0
	for row := range rows {
		if row > 0 {
			s.WriteByte(',')
		}
		s.WriteByte('(')
		for c := range b.columns {
			if c > 0 {
				s.WriteByte(',')
			}
			n++
			if b.engine == onPostgres {
				s.WriteByte('$')
				s.WriteString(strconv.Itoa(n))
			} else {
				s.WriteByte('?')
			}
		}
		s.WriteByte(')')
	}
	return s.String()
}

func (b *bulk) add(values ...any) error {
	b.args = append(b.args, values...)
	if len(b.args) < b.columns*b.batch {
		return nil
	}
	return b.exec(b.full)
}

// flush inserts what is left.
func (b *bulk) flush() error {
	if len(b.args) == 0 {
		return nil
	}
	return b.exec(b.statement(len(b.args) / b.columns))
}

func (b *bulk) exec(statement string) error {
	_, err := b.tx.Statement.ConnPool.ExecContext(b.tx.Statement.Context, statement, b.args...)
	b.args = b.args[:0]
	return err
}

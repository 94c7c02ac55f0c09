package inventory

import (
	"database/sql"
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
	batch   int   // rows with each statement
	fixed   []any // values of the first columns, the same in all rows
	args    []any
	full    *sql.Stmt // for a whole batch; nil until the first
}

// bulkRows is how many rows go into a statement: past some hundred the gain is
// small, and SQLite takes 32766 parameters.
const bulkRows = 200

func newBulk(tx *gorm.DB, engine engine, table string, columns ...string) *bulk {
	b := &bulk{tx: tx, engine: engine, columns: len(columns), batch: bulkRows,
		head: "INSERT INTO " + table + " (" + strings.Join(columns, ", ") + ") VALUES "}
	b.args = make([]any, 0, b.columns*b.batch)
	return b
}

// fix gives the first columns their values once for all rows, before any is
// added; add then takes the rest.
func (b *bulk) fix(values ...any) *bulk {
	for i, v := range values {
		if b.engine == onSQLite {
			v = sql.Named(fixedName(i), v)
		}
		b.fixed = append(b.fixed, v)
	}
	b.columns -= len(values)
	return b
}

func fixedName(i int) string { return "fixed" + strconv.Itoa(i) }

func (b *bulk) statement(rows int) string {
	var s strings.Builder
	s.WriteString(b.head)
	n := len(b.fixed)
	for row := range rows {
		if row > 0 {
			s.WriteByte(',')
		}
		s.WriteByte('(')
		for c := range len(b.fixed) + b.columns {
			if c > 0 {
				s.WriteByte(',')
			}
			at := c + 1
			if c >= len(b.fixed) {
				n++
				at = n
			}
			switch {
			case b.engine == onPostgres:
				s.WriteString("$" + strconv.Itoa(at))
			case c < len(b.fixed):
				s.WriteString(":" + fixedName(c))
			default:
				s.WriteByte('?')
			}
		}
		s.WriteByte(')')
	}
	return s.String()
}

func (b *bulk) add(values ...any) error {
	if len(b.args) == 0 {
		b.args = append(b.args, b.fixed...)
	}
	b.args = append(b.args, values...)
	if len(b.args) < len(b.fixed)+b.columns*b.batch {
		return nil
	}
	pool, ctx := b.tx.Statement.ConnPool, b.tx.Statement.Context
	if b.full == nil {
		full, err := pool.PrepareContext(ctx, b.statement(b.batch))
		if err != nil {
			return err
		}
		b.full = full
	}
	_, err := b.full.ExecContext(ctx, b.args...)
	b.args = b.args[:0]
	return err
}

// flush inserts what is left.
func (b *bulk) flush() error {
	if b.full != nil {
		defer b.full.Close()
	}
	if len(b.args) == 0 {
		return nil
	}
	_, err := b.tx.Statement.ConnPool.ExecContext(b.tx.Statement.Context, b.statement((len(b.args)-len(b.fixed))/b.columns), b.args...)
	b.args = b.args[:0]
	return err
}

package inventory

import (
	"context"
	"errors"
	"io/fs"
	"net"

	"github.com/jackc/pgx/v5/pgconn"
	"gorm.io/gorm"
	"modernc.org/sqlite"
	sqlite3 "modernc.org/sqlite/lib"
)

// What the engines say becomes one of our kinds here and nowhere else. gorm's
// sqlite dialect reads codes only from a C driver, so its own translation is
// left off.

// translate wraps an engine's error with what was being done. Errors of this
// package and of a context pass as they are.
func translate(doing string, err error) error {
	if err == nil || ours(err) || errors.Is(err, context.Canceled) || errors.Is(err, context.DeadlineExceeded) {
		return err
	}
	kind, would := kindOf(err)
	if kind == nil {
		return &Error{Doing: doing, Kind: errors.New("the database refused"), Cause: err}
	}
	return &Error{Doing: doing, Kind: kind, Would: would, Cause: err}
}

func ours(err error) bool {
	var e *Error
	var promise *PromiseError
	var short *ShortError
	var code *CodeError
	return errors.As(err, &e) || errors.As(err, &promise) || errors.As(err, &short) || errors.As(err, &code)
}

func kindOf(err error) (kind error, would string) {
	var lite *sqlite.Error
	var post *pgconn.PgError
	switch {
	case errors.Is(err, gorm.ErrRecordNotFound):
		return ErrNotFound, ""
	case errors.As(err, &lite):
		return sqliteKind(lite.Code())
	case errors.As(err, &post):
		return postgresKind(post.Code)
	case errors.Is(err, fs.ErrPermission):
		return ErrReadOnly, "let the program write to the data folder"
	}
	var file *fs.PathError
	if errors.As(err, &file) {
		return ErrUnreachable, "check that the folder exists and can be read and written"
	}
	var dial *pgconn.ConnectError
	var network net.Error
	if errors.As(err, &dial) || errors.As(err, &network) {
		return ErrUnreachable, "start the database server, or check its address and password"
	}
	return nil, ""
}

// sqliteKind reads SQLite's extended result codes, www.sqlite.org/rescode.html.
func sqliteKind(code int) (kind error, would string) {
	switch code {
	case sqlite3.SQLITE_CONSTRAINT_UNIQUE, sqlite3.SQLITE_CONSTRAINT_PRIMARYKEY:
		return ErrDuplicate, ""
	case sqlite3.SQLITE_CONSTRAINT_FOREIGNKEY:
		return ErrInUse, ""
	case sqlite3.SQLITE_CONSTRAINT_TRIGGER:
		return ErrAppendOnly, "correct with a reversal"
	}
	switch code & 0xff {
	case sqlite3.SQLITE_CONSTRAINT, sqlite3.SQLITE_MISMATCH, sqlite3.SQLITE_TOOBIG:
		return ErrInvalid, ""
	case sqlite3.SQLITE_BUSY, sqlite3.SQLITE_LOCKED, sqlite3.SQLITE_PROTOCOL:
		return ErrBusy, "close the other program that has the database open, and try again"
	case sqlite3.SQLITE_READONLY, sqlite3.SQLITE_PERM:
		return ErrReadOnly, "let the program write to the database file and its folder"
	case sqlite3.SQLITE_FULL:
		return ErrFull, "free some space on the disk; nothing of this was written"
	case sqlite3.SQLITE_CORRUPT, sqlite3.SQLITE_NOTADB:
		return ErrCorrupt, "restore the latest backup; keep the damaged file"
	case sqlite3.SQLITE_CANTOPEN:
		return ErrUnreachable, "check that the data folder exists and can be read and written"
	case sqlite3.SQLITE_IOERR:
		return ErrUnreachable, "check the disk the data folder is on; nothing of this was written"
	}
	return nil, ""
}

// postgresKind reads SQLSTATEs, PostgreSQL documentation, appendix A.
func postgresKind(code string) (kind error, would string) {
	switch code {
	case "23505":
		return ErrDuplicate, ""
	case "23503":
		return ErrInUse, ""
	case "SR001": // our own trigger, migrations/postgres
		return ErrAppendOnly, "correct with a reversal"
	case "25006":
		return ErrReadOnly, "connect to the primary server"
	case "53100", "53200":
		return ErrFull, "free some space on the database server; nothing of this was written"
	case "XX001", "XX002":
		return ErrCorrupt, "restore the latest backup; keep the damaged cluster"
	case "40001", "40P01", "55P03":
		return ErrBusy, "try again"
	case "3D000", "28P01", "28000", "57P03":
		return ErrUnreachable, "check the database's name, user and password"
	}
	switch code[:2] {
	case "22", "23":
		return ErrInvalid, ""
	case "08", "53", "57", "58":
		return ErrUnreachable, "check the database server"
	}
	return nil, ""
}

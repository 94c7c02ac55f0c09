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
	would, kind := kindOf(err)
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

func kindOf(err error) (would string, kind error) {
	var lite *sqlite.Error
	var post *pgconn.PgError
	switch {
	case errors.Is(err, gorm.ErrRecordNotFound):
		return "", ErrNotFound
	case errors.As(err, &lite):
		return sqliteKind(lite.Code())
	case errors.As(err, &post):
		return postgresKind(post.Code)
	case errors.Is(err, fs.ErrPermission):
		return "let the program write to the data folder", ErrReadOnly
	}
	var file *fs.PathError
	if errors.As(err, &file) {
		return "check that the folder exists and can be read and written", ErrUnreachable
	}
	var dial *pgconn.ConnectError
	var network net.Error
	if errors.As(err, &dial) || errors.As(err, &network) {
		return "start the database server, or check its address and password", ErrUnreachable
	}
	return "", nil
}

// sqliteKind reads SQLite's extended result codes, www.sqlite.org/rescode.html.
func sqliteKind(code int) (would string, kind error) {
	switch code {
	case sqlite3.SQLITE_CONSTRAINT_UNIQUE, sqlite3.SQLITE_CONSTRAINT_PRIMARYKEY:
		return "", ErrDuplicate
	case sqlite3.SQLITE_CONSTRAINT_FOREIGNKEY:
		return "", ErrInUse
	case sqlite3.SQLITE_CONSTRAINT_TRIGGER:
		return "correct with a reversal", ErrAppendOnly
	}
	switch code & 0xff {
	case sqlite3.SQLITE_CONSTRAINT, sqlite3.SQLITE_MISMATCH, sqlite3.SQLITE_TOOBIG:
		return "", ErrInvalid
	case sqlite3.SQLITE_BUSY, sqlite3.SQLITE_LOCKED, sqlite3.SQLITE_PROTOCOL:
		return "close the other program that has the database open, and try again", ErrBusy
	case sqlite3.SQLITE_READONLY, sqlite3.SQLITE_PERM:
		return "let the program write to the database file and its folder", ErrReadOnly
	case sqlite3.SQLITE_FULL:
		return "free some space on the disk; nothing of this was written", ErrFull
	case sqlite3.SQLITE_CORRUPT, sqlite3.SQLITE_NOTADB:
		return "restore the latest backup; keep the damaged file", ErrCorrupt
	case sqlite3.SQLITE_CANTOPEN:
		return "check that the data folder exists and can be read and written", ErrUnreachable
	case sqlite3.SQLITE_IOERR:
		return "check the disk the data folder is on; nothing of this was written", ErrUnreachable
	}
	return "", nil
}

// postgresKind reads SQLSTATEs, PostgreSQL documentation, appendix A.
func postgresKind(code string) (would string, kind error) {
	switch code {
	case "23505":
		return "", ErrDuplicate
	case "23503":
		return "", ErrInUse
	case "SR001": // our own trigger, migrations/postgres
		return "correct with a reversal", ErrAppendOnly
	case "25006":
		return "connect to the primary server", ErrReadOnly
	case "53100", "53200":
		return "free some space on the database server; nothing of this was written", ErrFull
	case "XX001", "XX002":
		return "restore the latest backup; keep the damaged cluster", ErrCorrupt
	case "40001", "40P01", "55P03":
		return "try again", ErrBusy
	case "3D000", "28P01", "28000", "57P03":
		return "check the database's name, user and password", ErrUnreachable
	}
	switch code[:2] {
	case "22", "23":
		return "", ErrInvalid
	case "08", "53", "57", "58":
		return "check the database server", ErrUnreachable
	}
	return "", nil
}

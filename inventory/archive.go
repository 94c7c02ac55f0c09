package inventory

import (
	"bufio"
	"compress/gzip"
	"context"
	"database/sql"
	"encoding/hex"
	"encoding/json"
	"fmt"
	"io"
	"strings"

	"gorm.io/gorm"
)

// The archive is the portable backup: every row of every table, the same from
// either engine. It is gzip over lines of JSON (RFC 1952, RFC 8259). The first
// line is the head; then for each table a line that names it, its columns and
// the count of its rows, and a line for each row with its values in the order
// of the columns; the last line is the count of all rows, by which a cut file
// shows. Bytes are in hexadecimal.

const archiveKind = "stillroom archive"

type archiveHead struct {
	Kind   string `json:"kind"`
	Form   int    `json:"form"` // of the archive; 1
	Schema int64  `json:"schema"`
	Made   Stamp  `json:"made"`
}

type archiveTable struct {
	Table   string   `json:"table"`
	Columns []string `json:"columns"`
	Rows    int64    `json:"rows"`
}

type archiveEnd struct {
	End  bool  `json:"end"`
	Rows int64 `json:"rows"`
}

// archiveTables are all tables with data, each after those it refers to. What
// isn't here can be made again out of these: search indexes, schema versions.
var archiveTables = []string{"stores", "substances", "stock_forms", "places", "bottles", "runs", "earmarks", "ledger",
	"chains", "bottle_states", "weighings", "offers", "orders", "carboys", "equipment", "policy_rows", "recipe_texts",
	"acts", "audit", "imports", "loans"}

// WriteArchive writes the archive of one moment of the database.
func (s *Store) WriteArchive(ctx context.Context, w io.Writer) error {
	const doing = "back up"
	version, err := s.schemaVersion(ctx)
	if err != nil {
		return translate(doing, err)
	}
	zip := gzip.NewWriter(w)
	out := bufio.NewWriterSize(zip, 1<<16)
	err = s.read(ctx, doing, func(tx *gorm.DB) error {
		return s.writeTables(tx, out, archiveHead{archiveKind, 1, version, s.stamp()})
	})
	if err == nil {
		err = out.Flush()
	}
	if err == nil {
		err = zip.Close()
	}
	return translate(doing, err)
}

func (s *Store) writeTables(tx *gorm.DB, w io.Writer, head archiveHead) error {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	if err := enc.Encode(head); err != nil {
		return err
	}
	var all int64
	for _, table := range archiveTables {
		there, err := s.hasTable(tx, table)
		if err != nil {
			return err
		}
		if !there { // of a later schema than this database's
			continue
		}
		n, err := writeTable(tx, enc, table)
		if err != nil {
			return err
		}
		all += n
	}
	return enc.Encode(archiveEnd{true, all})
}

func (s *Store) hasTable(tx *gorm.DB, table string) (bool, error) {
	query := "SELECT count(*) FROM sqlite_master WHERE type = 'table' AND name = ?"
	if s.engine == onPostgres {
		query = "SELECT count(*) FROM information_schema.tables WHERE table_schema = current_schema() AND table_name = ?"
	}
	var n int
	err := tx.Raw(query, table).Row().Scan(&n)
	return n > 0, err
}

func writeTable(tx *gorm.DB, enc *json.Encoder, table string) (int64, error) {
	var n int64
	if err := tx.Raw("SELECT count(*) FROM " + table).Row().Scan(&n); err != nil {
		return 0, err
	}
	rows, err := tx.Raw("SELECT * FROM " + table + " ORDER BY 1, 2").Rows()
	if err != nil {
		return 0, err
	}
	defer rows.Close()
	columns, err := rows.Columns()
	if err != nil {
		return 0, err
	}
	if err := enc.Encode(archiveTable{table, columns, n}); err != nil {
		return 0, err
	}
	values := make([]any, len(columns))
	into := make([]any, len(columns))
	for i := range values {
		into[i] = &values[i]
	}
	for rows.Next() {
		if err := rows.Scan(into...); err != nil {
			return 0, err
		}
		for i, v := range values {
			if b, ok := v.([]byte); ok {
				values[i] = hex.EncodeToString(b)
			}
		}
		if err := enc.Encode(values); err != nil {
			return 0, err
		}
	}
	return n, rows.Err()
}

// archiveReader reads an archive line by line.
type archiveReader struct {
	dec  *json.Decoder
	head archiveHead
}

func openArchive(r io.Reader) (*archiveReader, error) {
	zip, err := gzip.NewReader(r)
	if err != nil {
		return nil, notArchive(err)
	}
	a := &archiveReader{dec: json.NewDecoder(bufio.NewReaderSize(zip, 1<<16))}
	a.dec.UseNumber()
	if err := a.dec.Decode(&a.head); err != nil || a.head.Kind != archiveKind || a.head.Form != 1 {
		return nil, notArchive(err)
	}
	return a, nil
}

func notArchive(cause error) error {
	return &Error{Doing: "restore", Kind: ErrCorrupt, Why: "the file is no archive of this program or is damaged", Would: "take another backup", Cause: cause}
}

// load inserts all rows into empty tables.
func (a *archiveReader) load(s *Store, tx *gorm.DB) (rows int64, err error) {
	for {
		var line json.RawMessage
		if err := a.dec.Decode(&line); err != nil {
			return rows, notArchive(err)
		}
		var end archiveEnd
		if json.Unmarshal(line, &end) == nil && end.End {
			if end.Rows != rows {
				return rows, notArchive(fmt.Errorf("%d rows, its end says %d", rows, end.Rows))
			}
			return rows, a.atEnd()
		}
		var table archiveTable
		if err := json.Unmarshal(line, &table); err != nil || !knownTable(table.Table) {
			return rows, notArchive(err)
		}
		if err := a.loadTable(s, tx, table); err != nil {
			return rows, fmt.Errorf("table %s: %w", table.Table, err)
		}
		rows += table.Rows
	}
}

func knownTable(name string) bool {
	for _, table := range archiveTables {
		if table == name {
			return true
		}
	}
	return false
}

func (a *archiveReader) loadTable(s *Store, tx *gorm.DB, table archiveTable) error {
	kinds, err := s.columnKinds(tx, table)
	if err != nil {
		return err
	}
	const most = 5000 // parameters of one statement; SQLite takes 32766
	batch := max(1, most/len(table.Columns))
	args := make([]any, 0, batch*len(table.Columns))
	flush := func() error {
		if len(args) == 0 {
			return nil
		}
		err := tx.Exec(insertStatement(table, len(args)/len(table.Columns)), args...).Error
		args = args[:0]
		return err
	}
	for range table.Rows {
		var row []any
		if err := a.dec.Decode(&row); err != nil || len(row) != len(kinds) {
			return notArchive(err)
		}
		for i, v := range row {
			value, err := fromArchive(v, kinds[i])
			if err != nil {
				return notArchive(err)
			}
			args = append(args, value)
		}
		if len(args) >= batch*len(table.Columns) {
			if err := flush(); err != nil {
				return err
			}
		}
	}
	return flush()
}

func insertStatement(table archiveTable, rows int) string {
	row := "(?" + strings.Repeat(", ?", len(table.Columns)-1) + ")"
	return "INSERT INTO " + table.Table + ` ("` + strings.Join(table.Columns, `", "`) + `") VALUES ` +
		row + strings.Repeat(", "+row, rows-1)
}

// columnKinds asks the target for the types of the columns and refuses one that
// it doesn't have.
func (s *Store) columnKinds(tx *gorm.DB, table archiveTable) ([]string, error) {
	rows, err := tx.Raw("SELECT * FROM " + table.Table + " LIMIT 0").Rows()
	if err != nil {
		return nil, err
	}
	defer rows.Close()
	types, err := rows.ColumnTypes()
	if err != nil {
		return nil, err
	}
	byName := map[string]*sql.ColumnType{}
	for _, t := range types {
		byName[t.Name()] = t
	}
	kinds := make([]string, len(table.Columns))
	for i, c := range table.Columns {
		t, ok := byName[c]
		if !ok {
			return nil, notArchive(fmt.Errorf("column %s isn't known", c))
		}
		kinds[i] = t.DatabaseTypeName()
	}
	return kinds, rows.Err()
}

// fromArchive makes a value the target's driver takes for a column type.
func fromArchive(v any, kind string) (any, error) {
	switch v := v.(type) {
	case nil, string:
		text, _ := v.(string)
		if kind == "BLOB" || kind == "BYTEA" {
			return hex.DecodeString(text)
		}
		return v, nil
	case bool:
		if kind == "BOOL" {
			return v, nil
		}
		if v {
			return int64(1), nil
		}
		return int64(0), nil
	case json.Number:
		switch kind {
		case "BOOL":
			return v.String() != "0", nil
		case "REAL", "FLOAT8":
			return v.Float64()
		}
		return v.Int64()
	}
	return nil, fmt.Errorf("a %T in a row", v)
}

// skim reads an archive to its end without keeping anything.
func (a *archiveReader) skim(ctx context.Context) (rows int64, err error) {
	for ctx.Err() == nil {
		var line json.RawMessage
		if err := a.dec.Decode(&line); err != nil {
			return rows, notArchive(err)
		}
		var end archiveEnd
		if json.Unmarshal(line, &end) == nil && end.End {
			if end.Rows != rows {
				return rows, notArchive(fmt.Errorf("%d rows, its end says %d", rows, end.Rows))
			}
			return rows, a.atEnd()
		}
		if len(line) > 0 && line[0] == '[' {
			rows++
		}
	}
	return rows, ctx.Err()
}

// atEnd reads on to the checksum, which comes after the last line.
func (a *archiveReader) atEnd() error {
	if _, err := a.dec.Token(); err != io.EOF {
		return notArchive(err)
	}
	return nil
}

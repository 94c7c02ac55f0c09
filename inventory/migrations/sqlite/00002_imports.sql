-- +goose Up
CREATE TABLE imports (
    id          INTEGER PRIMARY KEY,
    at          TEXT NOT NULL,
    by_whom     TEXT NOT NULL,
    name        TEXT NOT NULL,
    fingerprint TEXT NOT NULL,
    rows_read   INTEGER NOT NULL,
    taken       INTEGER NOT NULL,
    bottles     INTEGER NOT NULL,
    undone      TEXT,
    undone_by   TEXT NOT NULL DEFAULT ''
) STRICT;
CREATE UNIQUE INDEX imports_once ON imports (fingerprint) WHERE undone IS NULL;

ALTER TABLE bottles ADD COLUMN import_id INTEGER NOT NULL DEFAULT 0;
CREATE INDEX bottles_import ON bottles (import_id) WHERE import_id > 0;

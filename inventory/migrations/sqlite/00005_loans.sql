-- +goose Up
CREATE TABLE loans (
    id         INTEGER PRIMARY KEY,
    store_id   INTEGER NOT NULL REFERENCES stores (id),
    bottle_id  INTEGER NOT NULL REFERENCES bottles (id),
    to_store   INTEGER NOT NULL REFERENCES stores (id),
    amount     INTEGER NOT NULL CHECK (amount > 0),
    state      TEXT NOT NULL CHECK (state IN ('on its way', 'arrived')),
    to_bottle  INTEGER NOT NULL DEFAULT 0,
    by_whom    TEXT NOT NULL,
    at         TEXT NOT NULL,
    why        TEXT NOT NULL DEFAULT '',
    CHECK (to_store <> store_id)
) STRICT;
CREATE INDEX loans_bottle ON loans (bottle_id);
CREATE INDEX loans_to_bottle ON loans (to_bottle) WHERE to_bottle > 0;

-- +goose Up
CREATE INDEX bottles_mark_plain ON bottles (lower(replace(replace(mark, '-', ''), ' ', ''))) WHERE mark <> '';
CREATE INDEX bottles_lot_plain ON bottles (lower(replace(replace(lot, '-', ''), ' ', ''))) WHERE lot <> '';

CREATE VIRTUAL TABLE search_notes USING fts5 (note, content = 'bottles', content_rowid = 'id',
    tokenize = 'unicode61 remove_diacritics 0', prefix = '2 3');
INSERT INTO search_notes (rowid, note) SELECT id, note FROM bottles WHERE note <> '';

-- What the catalogue of names in memory was read from: it is read again when n
-- has changed.
CREATE TABLE catalogue (
    id INTEGER PRIMARY KEY CHECK (id = 1),
    n  INTEGER NOT NULL
) STRICT;
INSERT INTO catalogue (id, n) VALUES (1, 1);

-- +goose StatementBegin
CREATE TRIGGER bottles_note_new AFTER INSERT ON bottles WHEN NEW.note <> ''
BEGIN INSERT INTO search_notes (rowid, note) VALUES (NEW.id, NEW.note); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER bottles_note_changed AFTER UPDATE OF note ON bottles WHEN NEW.note <> OLD.note
BEGIN
    INSERT INTO search_notes (search_notes, rowid, note) SELECT 'delete', OLD.id, OLD.note WHERE OLD.note <> '';
    INSERT INTO search_notes (rowid, note) SELECT NEW.id, NEW.note WHERE NEW.note <> '';
END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER substances_insert_catalogue AFTER INSERT ON substances
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER substances_update_catalogue AFTER UPDATE ON substances
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER substances_delete_catalogue AFTER DELETE ON substances
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER stock_forms_insert_catalogue AFTER INSERT ON stock_forms
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER stock_forms_update_catalogue AFTER UPDATE ON stock_forms
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER stock_forms_delete_catalogue AFTER DELETE ON stock_forms
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER places_insert_catalogue AFTER INSERT ON places
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER places_update_catalogue AFTER UPDATE ON places
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER places_delete_catalogue AFTER DELETE ON places
BEGIN UPDATE catalogue SET n = n + 1; END;
-- +goose StatementEnd

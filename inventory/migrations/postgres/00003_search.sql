-- +goose Up
CREATE INDEX bottles_mark_plain ON bottles (lower(replace(replace(mark, '-', ''), ' ', '') COLLATE "C")) WHERE mark <> '';
CREATE INDEX bottles_lot_plain ON bottles (lower(replace(replace(lot, '-', ''), ' ', '') COLLATE "C")) WHERE lot <> '';
CREATE INDEX bottles_note_words ON bottles USING gin (to_tsvector('simple', note)) WHERE note <> '';

-- What the catalogue of names in memory was read from: it is read again when n
-- has changed.
CREATE TABLE catalogue (
    id BIGINT PRIMARY KEY CHECK (id = 1),
    n  BIGINT NOT NULL
);
INSERT INTO catalogue (id, n) VALUES (1, 1);

-- +goose StatementBegin
CREATE FUNCTION stillroom_catalogue() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
    UPDATE catalogue SET n = n + 1;
    RETURN NULL;
END $$;
-- +goose StatementEnd
CREATE TRIGGER substances_catalogue AFTER INSERT OR UPDATE OR DELETE ON substances
    FOR EACH STATEMENT EXECUTE FUNCTION stillroom_catalogue();
CREATE TRIGGER stock_forms_catalogue AFTER INSERT OR UPDATE OR DELETE ON stock_forms
    FOR EACH STATEMENT EXECUTE FUNCTION stillroom_catalogue();
CREATE TRIGGER places_catalogue AFTER INSERT OR UPDATE OR DELETE ON places
    FOR EACH STATEMENT EXECUTE FUNCTION stillroom_catalogue();

-- +goose Up
CREATE TABLE stores (
    id   INTEGER PRIMARY KEY,
    name TEXT NOT NULL UNIQUE CHECK (name <> '')
) STRICT;

CREATE TABLE substances (
    id       INTEGER PRIMARY KEY,
    name     TEXT NOT NULL UNIQUE CHECK (name <> ''),
    synonyms TEXT NOT NULL DEFAULT '',
    cas      TEXT NOT NULL DEFAULT '',
    formula  TEXT NOT NULL DEFAULT '',
    own      INTEGER NOT NULL DEFAULT 0,
    source   TEXT NOT NULL DEFAULT ''
) STRICT;
CREATE UNIQUE INDEX substances_cas ON substances (cas) WHERE cas <> '';

CREATE TABLE stock_forms (
    id                 INTEGER PRIMARY KEY,
    substance_id       INTEGER NOT NULL REFERENCES substances (id),
    name               TEXT NOT NULL UNIQUE CHECK (name <> ''),
    cas                TEXT NOT NULL DEFAULT '',
    hydrate_waters     REAL NOT NULL DEFAULT 0 CHECK (hydrate_waters >= 0),
    assay_low          REAL NOT NULL DEFAULT 0 CHECK (assay_low >= 0),
    assay_high         REAL NOT NULL DEFAULT 0 CHECK (assay_high >= assay_low AND assay_high <= 1),
    diluent            TEXT NOT NULL DEFAULT '',
    grade              TEXT NOT NULL DEFAULT '',
    additive           TEXT NOT NULL DEFAULT '',
    measure            TEXT NOT NULL CHECK (measure IN ('mass', 'volume', 'count')),
    density_gml        REAL NOT NULL DEFAULT 0 CHECK (density_gml >= 0),
    density_source     TEXT NOT NULL DEFAULT '',
    storage_class      TEXT NOT NULL DEFAULT '',
    ageing             TEXT NOT NULL DEFAULT '',
    shelf_life_days    INTEGER NOT NULL DEFAULT 0,
    open_life_days     INTEGER NOT NULL DEFAULT 0,
    peroxide_test_days INTEGER NOT NULL DEFAULT 0
) STRICT;
CREATE INDEX stock_forms_substance ON stock_forms (substance_id);

CREATE TABLE places (
    id            INTEGER PRIMARY KEY,
    store_id      INTEGER NOT NULL REFERENCES stores (id),
    store         TEXT NOT NULL,
    room          TEXT NOT NULL DEFAULT '',
    cabinet       TEXT NOT NULL DEFAULT '',
    shelf         TEXT NOT NULL DEFAULT '',
    walk          INTEGER NOT NULL DEFAULT 0,
    storage_class TEXT NOT NULL DEFAULT '',
    limit_ul      INTEGER NOT NULL DEFAULT 0 CHECK (limit_ul >= 0),
    UNIQUE (store_id, room, cabinet, shelf)
) STRICT;

CREATE TABLE bottles (
    id              INTEGER PRIMARY KEY,
    store_id        INTEGER NOT NULL REFERENCES stores (id),
    code            TEXT NOT NULL UNIQUE CHECK (code <> ''),
    mark            TEXT NOT NULL DEFAULT '',
    form_id         INTEGER NOT NULL REFERENCES stock_forms (id),
    place_id        INTEGER NOT NULL REFERENCES places (id),
    state           TEXT NOT NULL CHECK (state IN ('sealed', 'open', 'quarantined', 'missing', 'on loan', 'empty', 'discarded')),
    lot             TEXT NOT NULL DEFAULT '',
    lot_assay       REAL NOT NULL DEFAULT 0 CHECK (lot_assay BETWEEN 0 AND 1),
    content         INTEGER NOT NULL DEFAULT 0 CHECK (content >= 0),
    promised        INTEGER NOT NULL DEFAULT 0 CHECK (promised >= 0),
    size            INTEGER NOT NULL CHECK (size > 0),
    tare_ug         INTEGER NOT NULL DEFAULT 0 CHECK (tare_ug >= 0),
    received        TEXT,
    opened          TEXT,
    expiry          TEXT,
    peroxide_tested TEXT,
    peroxide_ppm    REAL NOT NULL DEFAULT 0 CHECK (peroxide_ppm >= 0),
    measured_by     TEXT NOT NULL CHECK (measured_by IN ('unopened', 'weighed', 'ledger', 'level', 'guessed')),
    measured_on     TEXT,
    supplier        TEXT NOT NULL DEFAULT '',
    note            TEXT NOT NULL DEFAULT '',
    merged_into     INTEGER NOT NULL DEFAULT 0,
    version         INTEGER NOT NULL DEFAULT 1,
    CHECK (promised <= content)
) STRICT;
CREATE INDEX bottles_form ON bottles (form_id);
CREATE INDEX bottles_place ON bottles (place_id);

CREATE TABLE runs (
    id          INTEGER PRIMARY KEY,
    store_id    INTEGER NOT NULL REFERENCES stores (id),
    recipe      TEXT NOT NULL CHECK (recipe <> ''),
    recipe_text TEXT NOT NULL DEFAULT '',
    target_ug   INTEGER NOT NULL CHECK (target_ug > 0),
    on_date     TEXT NOT NULL,
    state       TEXT NOT NULL CHECK (state IN ('pencilled', 'cleared', 'picked', 'closed', 'dropped')),
    owner       TEXT NOT NULL DEFAULT '',
    made        TEXT NOT NULL,
    version     INTEGER NOT NULL DEFAULT 1
) STRICT;
CREATE INDEX runs_date ON runs (store_id, on_date);

CREATE TABLE earmarks (
    id        INTEGER PRIMARY KEY,
    store_id  INTEGER NOT NULL REFERENCES stores (id),
    bottle_id INTEGER NOT NULL REFERENCES bottles (id),
    run_id    INTEGER NOT NULL REFERENCES runs (id),
    amount    INTEGER NOT NULL CHECK (amount > 0),
    owner     TEXT NOT NULL DEFAULT '',
    for_date  TEXT,
    ends      TEXT NOT NULL,
    made      TEXT NOT NULL,
    UNIQUE (bottle_id, run_id)
) STRICT;
CREATE INDEX earmarks_run ON earmarks (run_id);

CREATE TABLE ledger (
    id          INTEGER PRIMARY KEY,
    store_id    INTEGER NOT NULL REFERENCES stores (id),
    seq         INTEGER NOT NULL CHECK (seq > 0),
    bottle_id   INTEGER NOT NULL REFERENCES bottles (id),
    kind        TEXT NOT NULL CHECK (kind IN ('receipt', 'draw', 'count', 'reversal', 'discard', 'merge')),
    amount      INTEGER NOT NULL,
    content     INTEGER NOT NULL CHECK (content >= 0),
    run_id      INTEGER NOT NULL DEFAULT 0,
    reversal_of INTEGER NOT NULL DEFAULT 0,
    by_whom     TEXT NOT NULL,
    at          TEXT NOT NULL,
    why         TEXT NOT NULL DEFAULT '',
    hash        BLOB NOT NULL CHECK (length(hash) = 32),
    UNIQUE (store_id, seq)
) STRICT;
CREATE INDEX ledger_bottle ON ledger (bottle_id, id);
CREATE UNIQUE INDEX ledger_reversal ON ledger (reversal_of) WHERE reversal_of > 0;

CREATE TABLE chains (
    store_id INTEGER PRIMARY KEY REFERENCES stores (id),
    seq      INTEGER NOT NULL,
    hash     BLOB NOT NULL
) STRICT;

CREATE TABLE bottle_states (
    id        INTEGER PRIMARY KEY,
    store_id  INTEGER NOT NULL,
    bottle_id INTEGER NOT NULL REFERENCES bottles (id),
    was       TEXT NOT NULL,
    state     TEXT NOT NULL,
    by_whom   TEXT NOT NULL,
    at        TEXT NOT NULL,
    why       TEXT NOT NULL DEFAULT ''
) STRICT;
CREATE INDEX bottle_states_bottle ON bottle_states (bottle_id, id);

CREATE TABLE weighings (
    bottle_id INTEGER PRIMARY KEY REFERENCES bottles (id),
    store_id  INTEGER NOT NULL,
    gross_ug  INTEGER NOT NULL CHECK (gross_ug > 0),
    run_id    INTEGER NOT NULL DEFAULT 0,
    by_whom   TEXT NOT NULL,
    at        TEXT NOT NULL
) STRICT;

CREATE TABLE offers (
    id              INTEGER PRIMARY KEY,
    form_id         INTEGER NOT NULL REFERENCES stock_forms (id),
    supplier        TEXT NOT NULL CHECK (supplier <> ''),
    item            TEXT NOT NULL DEFAULT '',
    pack_size       INTEGER NOT NULL CHECK (pack_size > 0),
    price_minor     INTEGER NOT NULL CHECK (price_minor >= 0),
    currency        TEXT NOT NULL CHECK (length(currency) = 3),
    order_fee       INTEGER NOT NULL DEFAULT 0,
    surcharge       INTEGER NOT NULL DEFAULT 0,
    lead_days       INTEGER NOT NULL DEFAULT 0,
    lead_days90     INTEGER NOT NULL DEFAULT 0,
    shelf_life_days INTEGER NOT NULL DEFAULT 0,
    min_order       INTEGER NOT NULL DEFAULT 0,
    breaks          TEXT NOT NULL DEFAULT '',
    UNIQUE (supplier, item, pack_size)
) STRICT;
CREATE INDEX offers_form ON offers (form_id);

CREATE TABLE orders (
    id       INTEGER PRIMARY KEY,
    offer_id INTEGER NOT NULL REFERENCES offers (id),
    form_id  INTEGER NOT NULL REFERENCES stock_forms (id),
    packs    INTEGER NOT NULL CHECK (packs > 0),
    ordered  TEXT,
    due      TEXT,
    state    TEXT NOT NULL CHECK (state IN ('under way', 'received', 'cancelled')),
    run_id   INTEGER NOT NULL DEFAULT 0
) STRICT;
CREATE INDEX orders_form ON orders (form_id);

CREATE TABLE carboys (
    id         INTEGER PRIMARY KEY,
    store_id   INTEGER NOT NULL REFERENCES stores (id),
    code       TEXT NOT NULL UNIQUE CHECK (code <> ''),
    stream     TEXT NOT NULL CHECK (stream <> ''),
    place_id   INTEGER NOT NULL REFERENCES places (id),
    size_ul    INTEGER NOT NULL CHECK (size_ul > 0),
    content_ul INTEGER NOT NULL DEFAULT 0 CHECK (content_ul >= 0),
    fill_limit REAL NOT NULL CHECK (fill_limit > 0 AND fill_limit <= 1),
    contains   TEXT NOT NULL DEFAULT '',
    opened     TEXT,
    CHECK (content_ul <= size_ul)
) STRICT;

CREATE TABLE equipment (
    id        INTEGER PRIMARY KEY,
    store_id  INTEGER NOT NULL REFERENCES stores (id),
    kind      TEXT NOT NULL,
    name      TEXT NOT NULL,
    size      INTEGER NOT NULL DEFAULT 0,
    count     INTEGER NOT NULL DEFAULT 1 CHECK (count >= 0),
    cooling_w REAL NOT NULL DEFAULT 0,
    step      INTEGER NOT NULL DEFAULT 0
) STRICT;

CREATE TABLE policy_rows (
    key     TEXT PRIMARY KEY,
    value   REAL NOT NULL,
    unit    TEXT NOT NULL DEFAULT '',
    meaning TEXT NOT NULL DEFAULT '',
    source  TEXT NOT NULL DEFAULT '',
    set_by  TEXT NOT NULL DEFAULT '',
    set_on  TEXT
) STRICT;

CREATE TABLE recipe_texts (
    id    INTEGER PRIMARY KEY,
    name  TEXT NOT NULL,
    text  TEXT NOT NULL,
    made  TEXT NOT NULL,
    by_whom TEXT NOT NULL
) STRICT;
CREATE INDEX recipe_texts_name ON recipe_texts (name, id);

-- An act is a request that was carried out; its key makes a repeat harmless.
CREATE TABLE acts (
    store_id    INTEGER NOT NULL,
    key         TEXT NOT NULL,
    what        TEXT NOT NULL,
    fingerprint TEXT NOT NULL,
    ref         INTEGER NOT NULL,
    at          TEXT NOT NULL,
    PRIMARY KEY (store_id, key)
) STRICT;

CREATE TABLE audit (
    id       INTEGER PRIMARY KEY,
    store_id INTEGER NOT NULL,
    at       TEXT NOT NULL,
    by_whom  TEXT NOT NULL,
    what     TEXT NOT NULL,
    record   TEXT NOT NULL,
    was      TEXT NOT NULL DEFAULT '',
    is_now   TEXT NOT NULL DEFAULT '',
    why      TEXT NOT NULL DEFAULT ''
) STRICT;
CREATE INDEX audit_record ON audit (record, id);

-- +goose StatementBegin
CREATE TRIGGER ledger_no_update BEFORE UPDATE ON ledger
BEGIN SELECT RAISE(ABORT, 'the ledger is append-only'); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER ledger_no_delete BEFORE DELETE ON ledger
BEGIN SELECT RAISE(ABORT, 'the ledger is append-only'); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER audit_no_update BEFORE UPDATE ON audit
BEGIN SELECT RAISE(ABORT, 'the audit is append-only'); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER audit_no_delete BEFORE DELETE ON audit
BEGIN SELECT RAISE(ABORT, 'the audit is append-only'); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER bottle_states_no_update BEFORE UPDATE ON bottle_states
BEGIN SELECT RAISE(ABORT, 'the history of states is append-only'); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER bottle_states_no_delete BEFORE DELETE ON bottle_states
BEGIN SELECT RAISE(ABORT, 'the history of states is append-only'); END;
-- +goose StatementEnd
-- +goose StatementBegin
CREATE TRIGGER bottles_no_delete BEFORE DELETE ON bottles
BEGIN SELECT RAISE(ABORT, 'bottles are never deleted'); END;
-- +goose StatementEnd

-- +goose Up
-- SQLite keeps no checksums of its pages. These indexes hold the records a
-- second time, so that its integrity check, which compares each row with its
-- index entries, finds a bit that was flipped in either. The ledger has its
-- hashes, contents and promises have their sums.
CREATE INDEX substances_mirror ON substances (id, name, synonyms, cas, formula, own, source);
CREATE INDEX stock_forms_mirror ON stock_forms (id, substance_id, name, cas, hydrate_waters, assay_low, assay_high, diluent,
    grade, additive, measure, density_gml, density_source, storage_class, ageing, shelf_life_days, open_life_days, peroxide_test_days);
CREATE INDEX places_mirror ON places (id, store_id, store, room, cabinet, shelf, walk, storage_class, limit_ul);
CREATE INDEX bottles_mirror ON bottles (id, store_id, code, mark, form_id, place_id, state, lot, lot_assay, size, tare_ug,
    received, opened, expiry, peroxide_tested, peroxide_ppm, measured_by, measured_on, supplier, note, merged_into);
CREATE INDEX runs_mirror ON runs (id, store_id, recipe, recipe_text, target_ug, on_date, state, owner, made, version);
CREATE INDEX earmarks_mirror ON earmarks (id, store_id, bottle_id, run_id, amount, owner, for_date, ends, made);
CREATE INDEX offers_mirror ON offers (id, form_id, supplier, item, pack_size, price_minor, currency, order_fee, surcharge,
    lead_days, lead_days90, shelf_life_days, min_order, breaks);
CREATE INDEX orders_mirror ON orders (id, offer_id, form_id, packs, ordered, due, state, run_id);
CREATE INDEX carboys_mirror ON carboys (id, store_id, code, stream, place_id, size_ul, content_ul, fill_limit, contains, opened);
CREATE INDEX equipment_mirror ON equipment (id, store_id, kind, name, size, count, cooling_w, step);
CREATE INDEX policy_rows_mirror ON policy_rows (key, value, unit, meaning, source, set_by, set_on);

-- +goose Up
-- A search takes the first bottles of a form in the order in which they came,
-- which bottles_standing doesn't keep.
CREATE INDEX bottles_form ON bottles (form_id);

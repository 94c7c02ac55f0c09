-- +goose Up
-- How many bottles of a form stand in each storeroom in each state is counted
-- from the index alone.
DROP INDEX bottles_form;
CREATE INDEX bottles_standing ON bottles (form_id, store_id, state);

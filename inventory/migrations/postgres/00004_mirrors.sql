-- +goose Up
-- Nothing to do here: PostgreSQL can keep checksums of its pages itself
-- (initdb --data-checksums). The number keeps the schemas of both engines alike.
SELECT 1;

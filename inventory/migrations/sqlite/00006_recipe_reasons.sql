-- +goose Up
ALTER TABLE recipe_texts ADD COLUMN why TEXT NOT NULL DEFAULT '';

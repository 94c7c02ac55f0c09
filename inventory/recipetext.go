package inventory

import (
	"context"

	"gorm.io/gorm"
)

// RecipeText is a version of a recipe as it was saved. The store doesn't read
// it.
type RecipeText struct {
	ID     int64
	Name   string
	Text   string
	Made   Stamp
	ByWhom string
}

// SaveRecipe stores a new version of a recipe's text; the same text again
// changes nothing.
func (s *Store) SaveRecipe(ctx context.Context, name, text string, act Act) error {
	const doing = "save the recipe"
	if err := act.check(doing); err != nil {
		return err
	}
	if name == "" {
		return invalid(doing, "", "it has no name", "name it")
	}
	return s.write(ctx, doing, func(tx *gorm.DB) error {
		var last RecipeText
		found := tx.Where("name = ?", name).Order("id DESC").Limit(1).Find(&last)
		if found.Error != nil || (found.RowsAffected > 0 && last.Text == text) {
			return found.Error
		}
		return tx.Create(&RecipeText{Name: name, Text: text, Made: s.stamp(), ByWhom: act.By}).Error
	})
}

// RecipeTexts returns the latest version of every recipe saved, by name.
func (s *Store) RecipeTexts(ctx context.Context) (texts []RecipeText, err error) {
	err = s.read(ctx, "list the recipes", func(tx *gorm.DB) error {
		return tx.Where("id IN (SELECT max(id) FROM recipe_texts GROUP BY name)").Order("name").Find(&texts).Error
	})
	return texts, err
}

package inventory

import (
	"context"
	"fmt"

	"gorm.io/gorm"
)

// RecipeText is a version of a recipe as it was saved. The store doesn't read
// it. Versions are never changed or deleted.
type RecipeText struct {
	ID     int64
	Name   string
	Text   string
	Made   Stamp
	ByWhom string
	Why    string
}

// SaveRecipe stores a new version of a recipe's text; the same text again
// changes nothing.
func (s *Store) SaveRecipe(ctx context.Context, name, text string, act Act) error {
	return s.saveRecipe(ctx, name, text, act, nil)
}

// SaveRecipeAfter is SaveRecipe for a text that was written from a version: its
// ID, or 0 where none had been saved. The error is ErrStale if somebody saved
// another version meanwhile.
func (s *Store) SaveRecipeAfter(ctx context.Context, from int64, name, text string, act Act) error {
	return s.saveRecipe(ctx, name, text, act, &from)
}

func (s *Store) saveRecipe(ctx context.Context, name, text string, act Act, from *int64) error {
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
		if from != nil && *from != last.ID {
			return &Error{Doing: doing, What: name, Kind: ErrStale,
				Why:   fmt.Sprintf("%s saved another version at %s", last.ByWhom, last.Made.Format("15:04 on 2 Jan 2006")),
				Would: "look at the difference and put your change into that version"}
		}
		now := RecipeText{Name: name, Text: text, Made: s.stamp(), ByWhom: act.By, Why: act.Why}
		if err := tx.Create(&now).Error; err != nil {
			return err
		}
		return s.audit(tx, 0, act, doing, "recipe "+name, versionText(last), versionText(now))
	})
}

// versionText names a version in the audit; the text itself is never lost.
func versionText(r RecipeText) string {
	if r.ID == 0 {
		return ""
	}
	return fmt.Sprintf("saved version %d, %d bytes", r.ID, len(r.Text))
}

// RecipeTexts returns the latest version of every recipe saved, by name.
func (s *Store) RecipeTexts(ctx context.Context) (texts []RecipeText, err error) {
	err = s.read(ctx, "list the recipes", func(tx *gorm.DB) error {
		return tx.Where("id IN (SELECT max(id) FROM recipe_texts GROUP BY name)").Order("name").Find(&texts).Error
	})
	return texts, err
}

// RecipeVersions returns every saved version of a recipe, the latest first; none
// if nobody has saved one.
func (s *Store) RecipeVersions(ctx context.Context, name string) (texts []RecipeText, err error) {
	err = s.read(ctx, "list the versions of a recipe", func(tx *gorm.DB) error {
		return tx.Where("name = ?", name).Order("id DESC").Find(&texts).Error
	})
	return texts, err
}

package inventory

import (
	"context"
	"errors"
	"testing"
)

// Versions are kept in order with who saved them and why; what somebody else
// saved meanwhile isn't written over.
func TestRecipeVersions(t *testing.T) {
	onEngines(t, func(t *testing.T, s *Store) {
		ctx := context.Background()
		save := func(from int64, text, by, why string) error {
			return s.SaveRecipeAfter(ctx, from, "an-acid", text, Act{By: by, Why: why})
		}
		if err := save(0, "one", "Ines", "first"); err != nil {
			t.Fatal(err)
		}
		versions, err := s.RecipeVersions(ctx, "an-acid")
		if err != nil || len(versions) != 1 {
			t.Fatalf("versions %+v, %v; want one", versions, err)
		}
		first := versions[0].ID
		if err := save(first, "two", "Rut", "more water"); err != nil {
			t.Fatal(err)
		}
		if err := save(first, "three", "Tobias", "less water"); !errors.Is(err, ErrStale) {
			t.Errorf("saved over another version: %v, want ErrStale", err)
		}
		if err := save(first, "two", "Tobias", "the same"); err != nil {
			t.Errorf("the same text again: %v, want nothing to happen", err)
		}
		if err := save(0, "four", "", "nobody"); err == nil {
			t.Error("nobody could save a recipe")
		}
		versions, err = s.RecipeVersions(ctx, "an-acid")
		if err != nil || len(versions) != 2 {
			t.Fatalf("versions %+v, %v; want two", versions, err)
		}
		if v := versions[0]; v.Text != "two" || v.ByWhom != "Rut" || v.Why != "more water" {
			t.Errorf("latest version %+v, want that of Rut", v)
		}
		latest, err := s.RecipeTexts(ctx)
		if err != nil || len(latest) != 1 || latest[0].Text != "two" {
			t.Errorf("latest %+v, %v", latest, err)
		}
		mustCheck(t, s)
	})
}

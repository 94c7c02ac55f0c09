package views

import (
	"cmp"
	"context"
	"slices"
	"sync"

	"stillroom/planner"
)

// recipeBook reads the recipes saved in the lab. A text is read once: the same
// text is always the same recipe.
type recipeBook struct {
	mu   sync.Mutex
	read map[string]*planner.Recipe // by text
}

// recipes returns the recipes that come with the program and those saved in the
// lab, by name. A saved one takes the place of one that came with the program. A
// saved text that this version of the program can't read is left out, and the
// log says so.
func (s *Server) recipes(ctx context.Context) ([]*planner.Recipe, error) {
	texts, err := s.Lab.RecipeTexts(ctx)
	if err != nil {
		return nil, err
	}
	if len(texts) == 0 {
		return s.Recipes, nil
	}
	byName := map[string]*planner.Recipe{}
	for _, r := range s.Recipes {
		byName[r.Name] = r
	}
	for _, t := range texts {
		r, err := s.book.recipe(t.Name, t.Text)
		if err != nil {
			s.Log.Warn("a saved recipe can't be read", "recipe", t.Name, "cause", err)
			continue
		}
		byName[r.Name] = r
	}
	all := make([]*planner.Recipe, 0, len(byName))
	for _, r := range byName {
		all = append(all, r)
	}
	slices.SortFunc(all, func(a, b *planner.Recipe) int { return cmp.Compare(a.Name, b.Name) })
	return all, nil
}

func (b *recipeBook) recipe(name, text string) (*planner.Recipe, error) {
	b.mu.Lock()
	defer b.mu.Unlock()
	if r, ok := b.read[text]; ok {
		return r, nil
	}
	r, err := planner.ParseRecipe(name, []byte(text))
	if err != nil {
		return nil, err
	}
	if b.read == nil {
		b.read = map[string]*planner.Recipe{}
	}
	b.read[text] = r
	return r, nil
}

// recipeNamed returns a recipe by its name, or a *missing.
func (s *Server) recipeNamed(ctx context.Context, name string) (*planner.Recipe, error) {
	all, err := s.recipes(ctx)
	if err != nil {
		return nil, err
	}
	for _, r := range all {
		if r.Name == name {
			return r, nil
		}
	}
	return nil, &missing{"recipe", name, "All recipes are listed on their own page."}
}

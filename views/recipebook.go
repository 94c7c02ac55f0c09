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
// saved text that this version of the program can't read is left out.
func (s *Server) recipes(ctx context.Context) ([]*planner.Recipe, error) {
	all, _, err := s.readRecipes(ctx)
	return all, err
}

// readRecipes returns the recipes, and the names of those whose saved text can't
// be read: what came with the program isn't put in their place.
func (s *Server) readRecipes(ctx context.Context) (all []*planner.Recipe, unread []string, err error) {
	texts, err := s.Lab.RecipeTexts(ctx)
	if err != nil || len(texts) == 0 {
		return s.Recipes, nil, err
	}
	byName := map[string]*planner.Recipe{}
	for _, r := range s.Recipes {
		byName[r.Name] = r
	}
	for _, t := range texts {
		r, err := s.book.recipe(fileOf(t.Name), t.Text)
		if err != nil {
			delete(byName, t.Name)
			unread = append(unread, t.Name)
			continue
		}
		byName[r.Name] = r
	}
	for _, r := range byName {
		all = append(all, r)
	}
	slices.SortFunc(all, func(a, b *planner.Recipe) int { return cmp.Compare(a.Name, b.Name) })
	return all, unread, nil
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
	all, unread, err := s.readRecipes(ctx)
	if err != nil {
		return nil, err
	}
	return named(all, unread, name)
}

// named looks a recipe up among those read, or says why it isn't there.
func named(all []*planner.Recipe, unread []string, name string) (*planner.Recipe, error) {
	for _, r := range all {
		if r.Name == name {
			return r, nil
		}
	}
	if slices.Contains(unread, name) {
		return nil, &missing{"readable recipe", name, "A text is saved under that name, but this version of the program can’t read it. Mend it at /recipes/" + name + "/edit."}
	}
	return nil, &missing{"recipe", name, "All recipes are listed on their own page."}
}

// newerVersion is the number of the latest version of a recipe, or "" if that is
// the one given.
func (s *Server) newerVersion(ctx context.Context, r *planner.Recipe) (string, error) {
	all, err := s.recipes(ctx)
	if err != nil {
		return "", err
	}
	for _, latest := range all {
		if latest.Name == r.Name && latest.Text != r.Text {
			return latest.Version, nil
		}
	}
	return "", nil
}

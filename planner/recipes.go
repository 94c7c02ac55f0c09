package planner

import (
	"embed"
	"fmt"
	"io/fs"
	"strings"
	"sync"
)

//go:embed recipes/*.yaml
var recipeFiles embed.FS

// embedded parses the recipes that come with the program. It panics on a fault,
// because they are part of the program and a test reads every one.
var embedded = sync.OnceValue(func() []*Recipe {
	names, err := fs.Glob(recipeFiles, "recipes/*.yaml")
	if err != nil {
		panic(fmt.Sprintf("planner: recipes: %v", err))
	}
	var list []*Recipe
	for _, name := range names {
		text, err := recipeFiles.ReadFile(name)
		if err != nil {
			panic(fmt.Sprintf("planner: %s: %v", name, err))
		}
		r, err := ParseRecipe(strings.TrimPrefix(name, "recipes/"), text)
		if err != nil {
			panic(fmt.Sprintf("planner: %v", err))
		}
		list = append(list, r)
	}
	return list
})

// Recipes returns the recipes that come with the program, by name.
func Recipes() []*Recipe { return embedded() }

// RecipeByName finds one of them.
func RecipeByName(name string) (*Recipe, bool) {
	for _, r := range embedded() {
		if r.Name == name {
			return r, true
		}
	}
	return nil, false
}

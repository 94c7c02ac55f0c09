package views

import (
	"context"

	"stillroom/inventory"
	"stillroom/planner"
)

// shelfFor reads the shelf that runs are planned against: everything of the lab
// but the bottles, and of these the ones that the recipes of the runs to come
// and the recipe given, if any, may draw on. A run's page asks for the same
// shelf as the slate, so that they share their plans.
func (s *Server) shelfFor(ctx context.Context, recipe *planner.Recipe) (*inventory.Shelf, error) {
	lists, err := s.Lab.LoadFor(ctx, nil)
	if err != nil {
		return nil, err
	}
	runs, _, err := s.slateRuns(ctx, lists)
	if err != nil {
		return nil, err
	}
	names := substancesOf(recipe)
	for _, r := range runs {
		if !isOver(r.Run) {
			names = append(names, substancesOf(r.Recipe)...)
		}
	}
	return s.Lab.LoadFor(ctx, names)
}

// substancesOf lists what a recipe may draw on; nothing for one that can't be
// read or compiled, which isn't planned either.
func substancesOf(recipe *planner.Recipe) []string {
	if recipe == nil {
		return nil
	}
	names, err := planner.SubstancesOf(recipe)
	if err != nil {
		return nil
	}
	return names
}

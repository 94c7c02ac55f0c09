package planner

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
)

// RecipeFault is one thing wrong with a recipe file.
type RecipeFault struct {
	File         string
	Line, Column int // from 1
	// What is wrong, with the text at fault quoted.
	What string
	// Expected says what would do; it may be empty.
	Expected string
}

// Error returns the fault as file:line:column: what; expected ….
func (f RecipeFault) Error() string {
	s := fmt.Sprintf("%s:%d:%d: %s", f.File, f.Line, f.Column, f.What)
	if f.Expected != "" {
		s += "; expected " + f.Expected
	}
	return s
}

// RecipeErrors holds every fault of a recipe file, in the order of the file.
type RecipeErrors struct{ Faults []RecipeFault }

// Error returns the faults, one on each line.
func (e *RecipeErrors) Error() string {
	lines := make([]string, len(e.Faults))
	for i, f := range e.Faults {
		lines[i] = f.Error()
	}
	return strings.Join(lines, "\n")
}

// sorted returns e in the order of the file, or nil if there are no faults.
func (e *RecipeErrors) sorted() error {
	if len(e.Faults) == 0 {
		return nil
	}
	slices.SortStableFunc(e.Faults, func(a, b RecipeFault) int {
		return cmp.Or(cmp.Compare(a.Line, b.Line), cmp.Compare(a.Column, b.Column))
	})
	return e
}

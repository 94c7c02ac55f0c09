package planner

import (
	"cmp"
	"errors"
	"slices"
)

// FaultsOf turns what is wrong with a recipe text into places in its file. It
// takes the error of ParseRecipe, and with the recipe also that of Compile or
// Walk: a fault of a step stands where the step begins, one of the whole recipe
// at its head. It returns nil for no error.
func FaultsOf(file string, r *Recipe, err error) []RecipeFault {
	if err == nil {
		return nil
	}
	var parsed *RecipeErrors
	if errors.As(err, &parsed) {
		return parsed.Faults
	}
	var faults []RecipeFault
	for _, one := range unjoined(err) {
		f := RecipeFault{File: file, Line: 1, Column: 1, What: one.Error()}
		if step := IsStep(one); step != nil {
			f.What, f.Expected = step.What, step.Would
			if r != nil && step.Step >= 1 && step.Step <= len(r.Steps) {
				at := r.Steps[step.Step-1].at
				f.Line, f.Column = at.line, at.column
			}
		}
		faults = append(faults, f)
	}
	slices.SortStableFunc(faults, func(a, b RecipeFault) int {
		return cmp.Or(cmp.Compare(a.Line, b.Line), cmp.Compare(a.Column, b.Column))
	})
	return faults
}

// unjoined returns the errors in what errors.Join made, or err itself.
func unjoined(err error) []error {
	if joined, ok := err.(interface{ Unwrap() []error }); ok {
		return joined.Unwrap()
	}
	return []error{err}
}

// Line is the line of the recipe file on which the step begins.
func (s Step) Line() int { return s.at.line }

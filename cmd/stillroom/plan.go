package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"time"

	"github.com/spf13/cobra"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
	"stillroom/views"
)

// planOptions are what "stillroom plan" is told.
type planOptions struct {
	target, on string
	data       dataOptions
	json       bool
	papers     string
	letter     bool
	batches    int
}

func newPlan(today func() inventory.Date) *cobra.Command {
	var o planOptions
	cmd := &cobra.Command{
		Use:   "plan RECIPE --target 50g [--on 2027-01-14] [--data DIR] [--json] [--papers DIR]",
		Short: "Plan a run: what it needs, which bottles, what is short",
		Long: `Plan a run of a recipe against the shelf and say what every step needs, which
bottles it is drawn from, what is short and what to buy.

RECIPE is the name of a recipe or a recipe file. Without --data the plan is made
against the demonstration lab.

Recipes that come with the program: ` + strings.Join(recipeNames(nil), ", ") + ".",
		Args: exactly(1, "a recipe"),
		RunE: func(cmd *cobra.Command, args []string) error {
			return o.run(cmd.Context(), args[0], today(), cmd.OutOrStdout())
		},
	}
	f := cmd.Flags()
	f.StringVar(&o.target, "target", "", "mass of product wanted, such as 50g")
	f.StringVar(&o.on, "on", "", "day of the run, such as 2027-01-14 (default: a fortnight from now)")
	f.BoolVar(&o.json, "json", false, "print the plan as JSON")
	f.StringVar(&o.papers, "papers", "", "folder to write pick-list.pdf, hazard-sheet.pdf and requisition.pdf into")
	f.BoolVar(&o.letter, "letter", false, "print the papers on Letter instead of A4")
	f.IntVar(&o.batches, "batches", 0, "number of equal batches (default: as many as the ware asks for)")
	o.data.register(f)
	return cmd
}

// daysAhead is how far ahead a run is planned when no day is given.
const daysAhead = 14

func (o *planOptions) run(ctx context.Context, recipe string, today inventory.Date, out io.Writer) error {
	request, err := o.request(recipe, today)
	if err != nil {
		return err
	}
	shelf, saved, err := o.data.stock(ctx, today)
	if err != nil {
		return err
	}
	if request.Recipe, err = findRecipe(recipe, saved); err != nil {
		return err
	}
	plan, err := planner.MakePlan(request, shelf)
	if err != nil {
		return planError(err)
	}
	if err := o.show(plan, out); err != nil {
		return err
	}
	if plan.Verdict > planner.Tight {
		return errBlocked
	}
	return nil
}

// request reads the command line into a planner's request that has no recipe yet.
func (o *planOptions) request(recipe string, today inventory.Date) (planner.Request, error) {
	if o.target == "" {
		return planner.Request{}, usagef("plan %s: --target is missing; give the mass of product wanted, such as --target 50g", recipe)
	}
	target, err := chem.ParseMass(o.target)
	if err != nil {
		return planner.Request{}, usagef("--target: %w", err)
	}
	on := today.AddDays(daysAhead)
	if o.on != "" {
		if on, err = inventory.ParseDate(o.on); err != nil {
			return planner.Request{}, usagef("--on: %w", err)
		}
	}
	return planner.Request{Target: target, On: on, Today: today, Batches: o.batches}, nil
}

// findRecipe takes a recipe by its name, the saved one before the one that comes
// with the program, or reads a file.
func findRecipe(name string, saved []inventory.RecipeText) (*planner.Recipe, error) {
	for _, s := range saved {
		if s.Name == name {
			return readRecipe(name+".yaml", []byte(s.Text))
		}
	}
	if r, ok := planner.RecipeByName(name); ok {
		return r, nil
	}
	text, err := os.ReadFile(name)
	if errors.Is(err, os.ErrNotExist) {
		return nil, usagef("no recipe %q and no file of that name: want one of %s, or a recipe file", name, strings.Join(recipeNames(saved), ", "))
	}
	if err != nil {
		return nil, usagef("recipe: %w", err)
	}
	return readRecipe(name, text)
}

func readRecipe(file string, text []byte) (*planner.Recipe, error) {
	r, err := planner.ParseRecipe(file, text)
	if err != nil {
		return nil, usageError{err}
	}
	return r, nil
}

// recipeNames lists the recipes there are, by name.
func recipeNames(saved []inventory.RecipeText) []string {
	var names []string
	for _, r := range planner.Recipes() {
		names = append(names, r.Name)
	}
	for _, s := range saved {
		names = append(names, s.Name)
	}
	slices.Sort(names)
	return slices.Compact(names)
}

// show prints the plan and writes the papers.
func (o *planOptions) show(plan *planner.Plan, out io.Writer) error {
	if o.papers != "" {
		if err := o.writePapers(plan); err != nil {
			return err
		}
	}
	if !o.json {
		return views.WritePlanText(out, plan)
	}
	text, err := views.PlanJSON(plan)
	if err != nil {
		return err
	}
	_, err = out.Write(text)
	return err
}

// writePapers writes the papers into the folder. A requisition of an earlier
// plan is removed when nothing is short any more.
func (o *planOptions) writePapers(plan *planner.Plan) error {
	if err := os.MkdirAll(o.papers, 0o755); err != nil {
		return usagef("--papers: %w", err)
	}
	options := views.PaperOptions{Letter: o.letter, PrintedAt: time.Now()}
	for _, paper := range []struct {
		name string
		make func(*planner.Plan, views.PaperOptions) ([]byte, error)
		due  bool
	}{
		{"pick-list.pdf", views.PickList, true},
		{"hazard-sheet.pdf", views.HazardSheet, true},
		{"requisition.pdf", views.Requisition, plan.Verdict > planner.Tight},
	} {
		file := filepath.Join(o.papers, paper.name)
		if !paper.due {
			if err := os.Remove(file); err != nil && !errors.Is(err, os.ErrNotExist) {
				return fmt.Errorf("removing an old paper: %w", err)
			}
			continue
		}
		pdf, err := paper.make(plan, options)
		if err != nil {
			return fmt.Errorf("%s: %w", paper.name, err)
		}
		if err := os.WriteFile(file, pdf, 0o644); err != nil {
			return fmt.Errorf("writing a paper: %w", err)
		}
	}
	return nil
}

// planError tells a mistake in the request or the recipe from a fault of ours.
func planError(err error) error {
	var request *planner.RequestError
	var step *planner.StepError
	if errors.As(err, &request) || errors.As(err, &step) {
		return usageError{err}
	}
	return err
}

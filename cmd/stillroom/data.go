package main

import (
	"context"
	"errors"
	"os"

	"github.com/spf13/pflag"

	"stillroom/inventory"
)

// dataOptions say where the stock is kept.
type dataOptions struct {
	dir, database string
}

func (o *dataOptions) register(f *pflag.FlagSet) {
	f.StringVar(&o.dir, "data", "", "folder with the lab's data")
	f.StringVar(&o.database, "database", "", "postgres://… of a shared server, instead of the database in the folder")
}

func (o *dataOptions) given() bool { return o.dir != "" || o.database != "" }

// open opens the stock for a command that can't do without one.
func (o *dataOptions) open(ctx context.Context, command string) (*inventory.Store, error) {
	if !o.given() {
		return nil, usagef("%s: --data is missing; give the folder with the lab's data, such as --data lab", command)
	}
	return inventory.Open(ctx, inventory.Options{Dir: o.dir, Database: o.database})
}

// openExisting is open for a command that only reads: it makes no new database.
func (o *dataOptions) openExisting(ctx context.Context, command string) (*inventory.Store, error) {
	if o.database == "" && o.dir != "" {
		if _, err := os.Stat(o.dir); errors.Is(err, os.ErrNotExist) {
			return nil, usagef("%s: no folder %s; give the folder that serve or import was given", command, o.dir)
		}
	}
	return o.open(ctx, command)
}

// stock reads the shelf and the recipes saved beside it, or takes the
// demonstration lab when no data is named.
func (o *dataOptions) stock(ctx context.Context, today inventory.Date) (*inventory.Shelf, []inventory.RecipeText, error) {
	if !o.given() {
		return inventory.NewShelf(inventory.DemoLab(today)), nil, nil
	}
	store, err := o.openExisting(ctx, "plan")
	if err != nil {
		return nil, nil, err
	}
	defer store.Close()
	saved, err := store.RecipeTexts(ctx)
	if err != nil {
		return nil, nil, err
	}
	shelf, err := store.Load(ctx)
	return shelf, saved, err
}

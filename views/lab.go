package views

import (
	"context"

	"stillroom/inventory"
)

// Lab is what the pages ask of the stock records; *inventory.Store is one.
type Lab interface {
	Load(ctx context.Context) (*inventory.Shelf, error)
	LoadFor(ctx context.Context, substances []string) (*inventory.Shelf, error)
	LoadBottle(ctx context.Context, code string) (inventory.Bottle, *inventory.Shelf, error)
	Browse(ctx context.Context, q inventory.Browse) (inventory.Browsed, error)
	Search(ctx context.Context, query string) (inventory.Found, error)
	Ledger(ctx context.Context, code string, limit int) ([]inventory.Entry, error)

	RecipeTexts(ctx context.Context) ([]inventory.RecipeText, error)
	RecipeVersions(ctx context.Context, name string) ([]inventory.RecipeText, error)
	SaveRecipeAfter(ctx context.Context, from int64, name, text string, act inventory.Act) error

	Import(ctx context.Context, t inventory.Table, m inventory.Mapping, o inventory.ImportOptions) (inventory.ImportReport, error)
	Imports(ctx context.Context) ([]inventory.StockImport, error)
	UndoImport(ctx context.Context, id int64, act inventory.Act) error

	AddRun(ctx context.Context, r inventory.Run, act inventory.Act) (inventory.Run, error)
	SetTarget(ctx context.Context, id, targetUG int64, on inventory.Date, version int64, act inventory.Act) (inventory.Run, error)
	SetState(ctx context.Context, id int64, state inventory.RunState, version int64, act inventory.Act) (inventory.Run, error)

	EarmarkRun(ctx context.Context, run int64, wants []inventory.Want, act inventory.Act) ([]inventory.Earmark, error)
	Release(ctx context.Context, run int64, act inventory.Act) error
	shelfWork
	StockTake(ctx context.Context, c inventory.Count, act inventory.Act) (inventory.Entry, []inventory.Promise, error)
}

package views

import (
	"context"

	"stillroom/chem"
	"stillroom/inventory"
)

// shelfWork is the part of Lab that the daily work at the shelf asks for.
type shelfWork interface {
	Draw(ctx context.Context, t inventory.Taking, act inventory.Act) (inventory.Entry, error)
	Correct(ctx context.Context, entry int64, act inventory.Act) (inventory.Entry, []inventory.Promise, error)
	WeighOut(ctx context.Context, code string, gross chem.Mass, run int64, act inventory.Act) ([]inventory.Promise, error)
	WeighIn(ctx context.Context, code string, gross chem.Mass, act inventory.Act) (inventory.Entry, error)
	WeighedOut(ctx context.Context, code string) (inventory.Weighing, bool, error)
	CancelWeighOut(ctx context.Context, code string, act inventory.Act) error

	SetBottleState(ctx context.Context, code string, state inventory.BottleState, act inventory.Act) error
	Discard(ctx context.Context, code string, act inventory.Act) ([]inventory.Promise, error)
	MoveBottle(ctx context.Context, code string, placeID int64, act inventory.Act) error
	NotePeroxideTest(ctx context.Context, code string, ppm float64, act inventory.Act) error
	States(ctx context.Context, code string) ([]inventory.StateChange, error)
	Audit(ctx context.Context, record string, limit int) ([]inventory.AuditRow, error)

	Receive(ctx context.Context, b inventory.Bottle, act inventory.Act) (inventory.Bottle, error)
	ReceiveOrder(ctx context.Context, order int64, like inventory.Bottle, act inventory.Act) ([]inventory.Bottle, error)

	Pour(ctx context.Context, p inventory.Pouring, act inventory.Act) (inventory.Carboy, error)
	Collect(ctx context.Context, code string, act inventory.Act) error
}

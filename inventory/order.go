package inventory

// The states of an order.
const (
	OrderUnderWay  = "under way"
	OrderReceived  = "received"
	OrderCancelled = "cancelled"
)

package views

import (
	"errors"
	"net/http"

	"stillroom/inventory"
)

// refusalStatuses maps the kinds of refusals of the stock records to statuses.
var refusalStatuses = []struct {
	kind   error
	status int
}{
	{inventory.ErrNotFound, http.StatusNotFound},
	{inventory.ErrBadCode, http.StatusNotFound},
	{inventory.ErrInvalid, http.StatusUnprocessableEntity},
	{inventory.ErrInsufficient, http.StatusUnprocessableEntity},
	{inventory.ErrConflict, http.StatusConflict},
	{inventory.ErrStale, http.StatusConflict},
	{inventory.ErrDuplicate, http.StatusConflict},
	{inventory.ErrInUse, http.StatusConflict},
	{inventory.ErrBusy, http.StatusServiceUnavailable},
	{inventory.ErrReadOnly, http.StatusServiceUnavailable},
	{inventory.ErrFull, http.StatusServiceUnavailable},
}

// refusalStatus gives the status of a refusal, or 500 for what is none.
func refusalStatus(err error) int {
	for _, r := range refusalStatuses {
		if errors.Is(err, r.kind) {
			return r.status
		}
	}
	return http.StatusInternalServerError
}

// refusalFault makes a fault of a form out of a refusal that a person can do
// something about.
func refusalFault(err error) (fault, bool) {
	if s := refusalStatus(err); s == http.StatusInternalServerError || s == http.StatusServiceUnavailable {
		return fault{}, false
	}
	return fault{Text: sentence(err.Error())}, true
}

package planner

import (
	"fmt"
	"slices"
	"sync"

	"stillroom/inventory"
)

// policyTable reads the policy of a shelf. A row that the shelf's table lacks
// is taken from the table a new store starts with, and that is said in the
// plan: nothing is replaced in silence.
type policyTable struct {
	rows    inventory.Policy
	missing map[string]bool
}

var deliveredPolicy = sync.OnceValue(func() inventory.Policy {
	return inventory.PolicyOf(inventory.PolicyDefaults(0))
})

func newPolicyTable(rows inventory.Policy) *policyTable {
	return &policyTable{rows: rows, missing: map[string]bool{}}
}

// value returns a row's value. It panics if neither table has the key, which
// is a programmer's mistake.
func (t *policyTable) value(key string) float64 {
	if v, ok := t.rows.Value(key); ok {
		return v
	}
	v, ok := deliveredPolicy().Value(key)
	if !ok {
		panic("planner: no policy row " + key)
	}
	t.missing[key] = true
	return v
}

// findings says which rows were missing, in order of key.
func (t *policyTable) findings() []Finding {
	keys := make([]string, 0, len(t.missing))
	for key := range t.missing {
		keys = append(keys, key)
	}
	slices.Sort(keys)
	var found []Finding
	for _, key := range keys {
		row := deliveredPolicy()[key]
		found = append(found, Finding{
			Kind: "policy-row-missing", Severity: Note,
			Text:  fmt.Sprintf("the policy table has no row %q (%s); %g %s was taken, %s", key, row.Meaning, row.Value, row.Unit, row.Source),
			Would: "set the row in the policy table",
		})
	}
	return found
}

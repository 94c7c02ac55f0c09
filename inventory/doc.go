// Package inventory keeps what a lab has: substances, stock forms, bottles in
// their places, the ledger of draws, earmarks, offers, orders, waste carboys
// and equipment. It is the only package that knows the database; what leaves
// it are plain values.
package inventory

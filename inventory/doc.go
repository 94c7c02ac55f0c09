// Package inventory keeps what a lab has: substances, stock forms, bottles in
// their places, the ledger of draws, earmarks, offers, orders, waste carboys
// and equipment. It is the only package that knows the database; what leaves
// it are plain values.
//
// # Values and the store
//
// A [Lab] is everything a lab has as values, a [Shelf] the same indexed for the
// planner; neither changes once made. A [Store] is an open database, on SQLite
// or PostgreSQL. Load makes a Shelf of one moment of it. Every call that changes
// something takes an [Act], which says who and why, and whose key makes a repeat
// of the call harmless.
//
// # The ledger
//
// A bottle's content is the sum of its ledger entries at all times. Entries are
// whole numbers of micrograms, microlitres or pieces and are only ever added: a
// mistake is corrected by a reversal. Within a store each entry carries a hash
// over itself and the entry before it, so that Check finds what was changed or
// taken out behind the program's back. The content kept beside the ledger is
// changed in the same transaction, under the same lock.
//
// # Earmarks
//
// What a bottle's earmarks promise is never more than it holds: the rule is
// checked in the transaction that promises, with the bottle's row locked, and
// the schema repeats it. An earmark that has lapsed gives way as soon as
// somebody else wants the amount. A count that finds less than was promised is
// the truth; the youngest promises are cut and named.
//
// # Two engines
//
// SQLite has one writer, whose transactions take the lock at once; readers see
// one moment each and never wait. PostgreSQL locks the rows it decides on,
// bottles in order of their IDs and then the head of the store's chain, so that
// no two transactions wait for each other in a circle; several servers may
// share one database. The same tests run on both.
//
// # Spread over several databases
//
// Stores can be spread over a distributed PostgreSQL by their store_id. Small
// tables that all stores read and few write are copied everywhere: substances,
// stock_forms, offers, policy_rows, recipe_texts, stores. The rest carries its
// store: places, bottles, ledger, chains, bottle_states, weighings, earmarks,
// runs, carboys, equipment, acts, audit, loans. These are the queries of the
// daily work, each with the key it goes by:
//
//	a bottle              bottles by code (unique), or by id
//	its ledger, states    ledger and bottle_states by (bottle_id, id), newest first
//	a draw, count, weighing, receipt
//	                      the bottle's row, the chain's row by store_id, one row into
//	                      ledger; acts by (store_id, key)
//	an earmark            the run's row, bottles by id in order, earmarks by
//	                      (bottle_id, run_id)
//	the slate             runs by (store_id, on_date); earmarks by run_id
//	the shelf of a plan   bottles by form_id; earmarks, which are no more than the runs
//	                      to come ask for, whole
//	a page of the shelf   bottles counted by (form_id, store_id, state), then those of
//	                      the page by form_id and code; earmarks by bottle_id
//	search                names in memory, bottles by the plain spelling of number or
//	                      lot, by code from a beginning on, by words of notes, by
//	                      form_id and place_id
//	check                 ledger by (store_id, seq) from one end to the other
//
// None touches two stores. A run's earmarks are on bottles of its own store, and
// a bottle of another store is lent first: a loan is two transactions, one in
// each store, of which the second may be repeated.
package inventory

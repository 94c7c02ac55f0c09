//go:build race

package inventory

// raced is set when the race detector slows everything down tenfold; the long
// tests are then as short as outside of continuous integration.
const raced = true

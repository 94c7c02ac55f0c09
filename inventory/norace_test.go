//go:build !race

package inventory

// raced is set in the tests of the race detector.
const raced = false

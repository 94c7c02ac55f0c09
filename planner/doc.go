// Package planner turns a recipe, a target and a shelf into a plan: it walks
// the recipe through vessel by vessel, sums what every step needs, matches the
// needs with the bottles that are on the shelf, and says what is short, what to
// buy and how likely it is that everything suffices.
//
// Its heart is a function of values: no database, no clock, no HTTP. The same
// recipe, shelf, policy and dates give the same plan, byte for byte.
package planner

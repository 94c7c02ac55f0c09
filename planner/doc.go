// Package planner turns a recipe, a target and a shelf into a plan: it walks
// the recipe through vessel by vessel, sums what every step needs, matches the
// needs with the bottles that are on the shelf, and says what is short, what to
// buy and how likely it is that everything suffices.
//
// Its heart is a function of values: no database, no clock, no HTTP. The same
// recipe, shelf, policy and dates give the same plan, byte for byte.
//
// # The walk-through
//
// ParseRecipe reads a recipe and Compile looks its names up; Program.Walk then
// carries its steps out on vessels with four phases (aqueous, organic, solid,
// gas) that hold amounts of every component. A step is a physical model: what
// the run needs, how full the ware gets, heat, gas, waste and product come out
// of the same pass. After each step mass, charge and every element are compared
// with what came from the shelf; a relative error above 1e-9 is a refusal.
//
// Components are whole substances. Acids and bases react as far as they can,
// the strongest acid first, whenever they meet; how much of one brings a vessel
// to a pH follows from the charge balance at that pH. An organic substance
// divides itself between two layers by its partition coefficient, or by the
// ratio of its solubilities, with salting out; free acids and their salts are
// separate components, which is how the pH enters. Only the pure substance and
// the water of a stock go into a vessel: impurities aren't followed.
//
// # The yield
//
// The recipe states its isolated yield as a distribution, because that is what a
// lab knows and what close-outs correct. The steps compute what arrives at the
// last isolation: conversion, selectivity, what stays in layers, cakes and pots.
// The product is the smaller of the two; what arrives beyond the yield stays
// where it is isolated and is booked as a loss there (hold-up, intermediate
// fractions, residue). A yield beyond what arrives is a warning. Nothing is typed
// beside it: the run is scaled on a cautious percentile of that distribution, and
// the expected mass is its mean.
//
// # Uncertainty
//
// Program.Sample walks through with every uncertain quantity at a quantile of its
// distribution; SampleAll does so with common random numbers of a seed. What is
// weighed out by the plan stays as planned; what a step asks for by what it finds
// (acid to a pH, drying agent, reductant, a second solvent charge) follows the
// draw.
package planner

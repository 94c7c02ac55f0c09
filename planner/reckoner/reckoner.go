// Package reckoner holds the bench sums: each is one function with named
// inputs, shared by the command line and the pages.
//
// Sums lists them all, Reckon runs one. What a person types comes in as Args,
// whose getters turn text into quantities and whose errors name the key. Each
// group of sums has a file of its own.
package reckoner

import (
	"context"

	"stillroom/chem"
)

// Sum is one bench sum.
type Sum struct {
	Name  string // as on the command line, "molar-mass"
	Title string // as on the page, "Molar mass"
	Group string // heading under which the page lists it
	About string // one sentence: what it answers
	Keys  []Key
	Gives []string // names of the results
	// Example is a full set of inputs that works; a test runs it.
	Example []string // "formula=Na2Cr2O7·2H2O"
	Range   string   // validity range in words
	Source  string
	Run     func(context.Context, Args) (Answer, error)
}

// Key is one input of a sum.
type Key struct {
	Name     string
	Label    string
	Hint     string // an example of a value: "50 g"
	Optional bool
}

// Answer is what a sum gives.
type Answer struct {
	Sum        string
	Results    []Result
	Notes      []string
	Derivation chem.Derivation
}

// Result is one named number, or a text, with its unit. Exactly one of Value
// and Text counts: Text where IsText is set.
type Result struct {
	Name   string
	Value  float64
	Text   string
	IsText bool
	Unit   string
}

// Args are the inputs of a sum as typed, by key.
type Args map[string]string

// Sums returns all sums in the order in which they are listed.
func Sums() []Sum {
	var all []Sum
	for _, group := range [][]Sum{formulaSums(), solutionSums(), phaseSums(), hazardSums(), stockSums()} {
		all = append(all, group...)
	}
	return all
}

// SumByName returns the sum of a name.
func SumByName(name string) (Sum, bool) {
	for _, s := range Sums() {
		if s.Name == name {
			return s, true
		}
	}
	return Sum{}, false
}

// Number returns a result that is a number.
func Number(name string, value float64, unit string) Result {
	return Result{Name: name, Value: value, Unit: unit}
}

// Text returns a result that is a text.
func Text(name, text string) Result { return Result{Name: name, Text: text, IsText: true} }

package chem

import (
	"fmt"
	"math"
	"strings"
	"sync"
)

// A Partition is the ratio of the concentrations of a solute's neutral
// molecule in the solvent and in water at equilibrium, both in mol/L.
type Partition struct {
	P        float64
	Measured bool        // false for a computed estimate
	Spread   float64     // standard deviation in log10 units that the source states; 0 if it states none
	At       Temperature // temperature of the value
	Species  string      // what the value holds for
	Source   string
}

// partitionKey names a pair by CAS numbers.
type partitionKey struct{ solute, solvent string }

// solventCAS gives the CAS number of the organic phases of partition.csv
// (numbers as in lab_substances.csv).
var solventCAS = map[string]string{
	"1-octanol":               "111-87-5",
	"ethyl acetate":           "141-78-6",
	"diethyl ether":           "60-29-7",
	"tert-butyl methyl ether": "1634-04-4",
	"dichloromethane":         "75-09-2",
	"toluene":                 "108-88-3",
	"hexane":                  "110-54-3",
}

var partitions = sync.OnceValue(func() map[partitionKey]Partition {
	table := make(map[partitionKey]Partition)
	for _, row := range readTable("partition.csv") {
		value := Partition{
			P:        math.Pow(10, row.must("value")),
			Measured: row.text("quantity") != "log10_K_monomer",
			At:       Celsius(row.must("temperature_C")),
			Species:  row.text("species"),
			Source:   row.text("source"),
		}
		if strings.Contains(value.Source, "+/-0.3") {
			value.Spread = 0.3
		}
		key := partitionKey{row.text("cas"), solventCAS[row.text("organic_phase")]}
		if kept, ok := table[key]; ok && (kept.Measured || !value.Measured) {
			continue // the first measured row wins, else the first computed one
		}
		table[key] = value
	}
	return table
})

// PartitionOf returns the partition of a solute between a solvent and water,
// both by CAS number. A measured value comes before a computed one; where the
// table has neither, the octanol value of the solute is carried over by the
// linear relation of estimatePartition, and Measured is false. The error wraps
// ErrNoData where nothing of that kind exists.
func PartitionOf(solute, solvent string) (Partition, error) {
	if value, ok := partitions()[partitionKey{solute, solvent}]; ok {
		return value, nil
	}
	if value, ok := estimatePartition(solute, solvent); ok {
		return value, nil
	}
	return Partition{}, &DataError{
		Of:     fmt.Sprintf("partition of %s between %s and water", nameOfCAS(solute), nameOfCAS(solvent)),
		Err:    ErrNoData,
		Remedy: "give partition= as the ratio of the concentrations in solvent and water",
	}
}

// A carryOver is a line log10 P = Slope * log10 Kow + Offset.
type carryOver struct {
	Slope, Offset, Spread float64
}

// carryOvers are the relations between octanol/water and another solvent/water
// partition for solutes that give a hydrogen bond (acids, alcohols, phenols).
// Coefficients: Leo, Hansch, Elkins, Chem. Rev. 71 (1971) 525, table of
// solvent regression equations, from memory; standard deviations as the table
// has them, about 0.15 to 0.2, from memory.
var carryOvers = map[string]carryOver{
	"141-78-6": {0.932, 0.052, 0.2},   // ethyl acetate
	"60-29-7":  {1.130, -0.170, 0.2},  // diethyl ether
	"108-88-3": {1.135, -1.777, 0.2},  // toluene
	"71-43-2":  {1.015, -1.402, 0.2},  // benzene
	"67-66-3":  {1.126, -1.343, 0.2},  // chloroform
	"142-82-5": {1.056, -2.851, 0.25}, // heptane
	"110-82-7": {0.675, -1.842, 0.25}, // cyclohexane
	"71-36-3":  {0.697, 0.381, 0.15},  // 1-butanol
}

// estimatePartition carries an octanol/water value over to another solvent by
//
//	log10 P = a · log10 Kow + b
//
// where a and b belong to the solvent. It holds for solutes that give a
// hydrogen bond, at room temperature, to about 0.2 in log10.
func estimatePartition(solute, solvent string) (Partition, bool) {
	octanol, ok := partitions()[partitionKey{solute, solventCAS["1-octanol"]}]
	line, known := carryOvers[solvent]
	if !ok || !known {
		return Partition{}, false
	}
	log := line.Slope*math.Log10(octanol.P) + line.Offset
	return Partition{
		P:       math.Pow(10, log),
		Spread:  line.Spread,
		At:      octanol.At,
		Species: "neutral, estimate for a solute that gives a hydrogen bond",
		Source: fmt.Sprintf("estimate: log10 P = %g · %.2f + %g from the octanol value (Leo, Hansch, Elkins, Chem. Rev. 71 (1971) 525, coefficients from memory); octanol value: %s",
			line.Slope, math.Log10(octanol.P), line.Offset, octanol.Source),
	}, true
}

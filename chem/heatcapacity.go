package chem

import (
	"math"
	"sync"
)

// waterHeatCapacity is the specific heat of liquid water in J/(kg K) at 25 °C
// and one atmosphere (common handbook value, 4.18 J/(g K); it stays within 1 %
// of it from 0 to 100 °C).
const waterHeatCapacity = 4181.3

// heatCapacityAt is the temperature at which the model is read: heat capacities
// of solutions change by under 0.2 % a kelvin, and most coefficients hold at
// 25 °C only.
const heatCapacityAt = ZeroCelsius + 25

// heatTable is what is known of the heat capacity of one solute's solutions.
type heatTable struct {
	name  string
	curve *curve // J/(kg K) over mass fraction; nil where there is none
	model *heatModel
}

var heatTables = sync.OnceValue(loadHeatCapacities)

// loadHeatCapacities reads the model and the rows for strengths it lacks.
func loadHeatCapacities() map[string]*heatTable {
	tables := make(map[string]*heatTable)
	for _, r := range readTable("solution_model.csv") {
		if m := newHeatModel(r); m != nil {
			tables[r.text("cas")] = &heatTable{name: r.text("solute"), model: m}
		}
	}
	ws, cps := make(map[string][]float64), make(map[string][]float64)
	for _, r := range readTable("solution_heat_capacity.csv") {
		cas := r.text("cas")
		w, _ := r.number("w_w_percent")
		cp, _ := r.number("specific_heat_J_gK")
		ws[cas], cps[cas] = append(ws[cas], w/100), append(cps[cas], cp*1e3)
		if tables[cas] == nil {
			tables[cas] = &heatTable{name: r.text("solute")}
		}
	}
	for cas := range ws {
		tables[cas].curve = newCurve(ws[cas], cps[cas])
	}
	return tables
}

// SolutionHeatCapacity returns the specific heat of an aqueous solution of the
// solute with this CAS number at mass fraction w, near room temperature. Where
// both a model and handbook rows cover the strength the model is taken; where
// a strength lies between the two it is read off in proportion. Strengths
// beyond both are refused with a *DataError, unknown solutes with a
// *DataError.
func SolutionHeatCapacity(cas string, w Fraction) (SpecificHeat, error) {
	if err := checkFraction("strength of a solution", w); err != nil {
		return 0, err
	}
	if w == 0 || cas == waterCAS {
		return waterHeatCapacity, nil
	}
	table := heatTables()[cas]
	if table == nil {
		return 0, noData("heat capacity", "solutions of "+soluteName(cas), "give heat_capacity=")
	}
	x := float64(w)
	switch {
	case table.model != nil && x <= table.model.most:
		return table.modelled(x), nil
	case table.curve != nil && table.curve.covers(x):
		return SpecificHeat(table.curve.at(x)), nil
	case table.curve != nil && table.model != nil && x < table.curve.low():
		low, high := table.model.most, table.curve.low()
		from, to := table.modelled(low), SpecificHeat(table.curve.at(high))
		return from + (to-from)*SpecificHeat((x-low)/(high-low)), nil
	}
	return 0, outOfRange("heat capacity of "+table.name+" in water", "strength", w.Percent(), 0, table.most()*100, "% w/w", "give heat_capacity=")
}

// modelled reads the model at the temperature of its data nearest to 25 °C.
func (t *heatTable) modelled(w float64) SpecificHeat {
	at := max(t.model.low, min(t.model.high, heatCapacityAt))
	return SpecificHeat(t.model.at(w, at))
}

// most returns the highest mass fraction that is covered.
func (t *heatTable) most() float64 {
	var most float64
	if t.model != nil {
		most = t.model.most
	}
	if t.curve != nil {
		most = math.Max(most, t.curve.high())
	}
	return most
}

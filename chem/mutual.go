package chem

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
	"sync"
)

// MutualSolubility says how much of each of two layers is the other liquid, as
// mass fractions of the saturated layers.
type MutualSolubility struct {
	WaterInSolvent, SolventInWater Fraction
	// HasWaterInSolvent and HasSolventInWater are false where the table has no value.
	HasWaterInSolvent, HasSolventInWater bool
	Source                               string
	Notes                                []string
}

// solubilityReach is how far from a tabulated temperature the nearest value
// still serves. Near room temperature these solubilities change by a few
// hundredths of themselves in 5 K (ethyl acetate in water 8.7 % at 20 °C,
// 8.15 % at 25 °C in the table).
const solubilityReach Temperature = 10

type solubilityPoint struct {
	at     Temperature
	value  Fraction
	source string
	rank   int
}

type solubilityTable struct{ waterInSolvent, solventInWater []solubilityPoint }

var mutualSolubilities = sync.OnceValue(func() map[string]*solubilityTable {
	tables := make(map[string]*solubilityTable)
	for _, row := range withMore("mutual_solubility") {
		table := tables[row.text("cas")]
		if table == nil {
			table = &solubilityTable{}
			tables[row.text("cas")] = table
		}
		point := solubilityPoint{at: Celsius(row.must("temperature_C")), source: row.text("source"), rank: solubilityRank(row)}
		if w, ok := row.number("water_in_solvent_w_w_percent"); ok {
			point.value = Fraction(w) * Percent
			table.waterInSolvent = append(table.waterInSolvent, point)
		}
		if w, ok := row.number("solvent_in_water_w_w_percent"); ok {
			point.value = Fraction(w) * Percent
			table.solventInWater = append(table.solventInWater, point)
		}
	}
	for _, table := range tables {
		table.waterInSolvent = bestPoints(table.waterInSolvent)
		table.solventInWater = bestPoints(table.solventInWater)
	}
	return tables
})

// solubilityRank puts evaluated data first, then handbook layers, then pairs
// from memory, then single solubilities without the other layer.
func solubilityRank(r row) int {
	switch source := r.text("source"); {
	case strings.Contains(source, "IUPAC"):
		return 0
	case strings.Contains(source, "Lange"):
		return 1
	case r.text("water_in_solvent_w_w_percent") != "":
		return 2
	default:
		return 3
	}
}

// bestPoints keeps the best-ranked point of each temperature, in order of temperature.
func bestPoints(points []solubilityPoint) []solubilityPoint {
	slices.SortStableFunc(points, func(a, b solubilityPoint) int {
		return cmp.Or(cmp.Compare(a.at, b.at), cmp.Compare(a.rank, b.rank))
	})
	return slices.CompactFunc(points, func(a, b solubilityPoint) bool { return a.at == b.at })
}

// MutualSolubilityOf returns how much water a solvent takes up and how much of
// the solvent goes into water at a temperature, between tabulated temperatures
// by a straight line. Up to 10 K outside them the nearest value is taken and a
// note says so; further away the error wraps ErrOutOfRange. It wraps
// ErrNoData where the solvent has no row. Salt in the water lowers both.
func MutualSolubilityOf(solvent string, t Temperature) (MutualSolubility, error) {
	table, ok := mutualSolubilities()[solvent]
	if !ok {
		return MutualSolubility{}, &DataError{Of: mutualSolubilityOf(solvent), Err: ErrNoData, Remedy: "give the water in the solvent and the solvent in water as % w/w"}
	}
	var s MutualSolubility
	var errWater, errSolvent error
	s.WaterInSolvent, s.HasWaterInSolvent, errWater = s.read(solvent, table.waterInSolvent, t)
	s.SolventInWater, s.HasSolventInWater, errSolvent = s.read(solvent, table.solventInWater, t)
	return s, firstError(errWater, errSolvent)
}

// mutualSolubilityOf names the quantity for a message.
func mutualSolubilityOf(solvent string) string {
	return "mutual solubility of water and " + nameOfCAS(solvent)
}

// read interpolates in one column and adds the source and note of the value.
func (s *MutualSolubility) read(solvent string, points []solubilityPoint, t Temperature) (Fraction, bool, error) {
	if len(points) == 0 {
		return 0, false, nil
	}
	low, high := points[0].at, points[len(points)-1].at
	if !(t >= low-solubilityReach && t <= high+solubilityReach) {
		return 0, false, &DataError{
			Of: fmt.Sprintf("%s at %.1f °C", mutualSolubilityOf(solvent), t.Celsius()), Err: ErrOutOfRange,
			Limit:  fmt.Sprintf("%.0f to %.0f °C", (low - solubilityReach).Celsius(), (high + solubilityReach).Celsius()),
			Remedy: "let the layers come to room temperature or give the solubilities",
		}
	}
	i := slices.IndexFunc(points, func(p solubilityPoint) bool { return p.at >= t })
	switch {
	case i < 0:
		return s.nearest(points[len(points)-1])
	case points[i].at == t:
		s.cite(points[i].source)
		return points[i].value, true, nil
	case i == 0:
		return s.nearest(points[0])
	}
	a, b := points[i-1], points[i]
	s.cite(a.source)
	share := Fraction((t - a.at) / (b.at - a.at))
	return a.value + share*(b.value-a.value), true, nil
}

func (s *MutualSolubility) nearest(p solubilityPoint) (Fraction, bool, error) {
	s.cite(p.source)
	note := fmt.Sprintf("value at %.0f °C taken, the nearest in the table", p.at.Celsius())
	if !slices.Contains(s.Notes, note) {
		s.Notes = append(s.Notes, note)
	}
	return p.value, true, nil
}

func (s *MutualSolubility) cite(source string) {
	switch {
	case s.Source == "":
		s.Source = source
	case !strings.Contains(s.Source, source):
		s.Source += " | " + source
	}
}

// LostToWater returns the mass of solvent that a mass of water carries off once
// saturated, w/(1 − w) of it. It refuses where the table has no value.
func (s MutualSolubility) LostToWater(water Mass) (Mass, bool) {
	if !s.HasSolventInWater {
		return 0, false
	}
	return water * Mass(s.SolventInWater/(1-s.SolventInWater)), true
}

// WaterTaken returns the mass of water that a mass of solvent takes up once
// saturated; false where the table has no value.
func (s MutualSolubility) WaterTaken(solvent Mass) (Mass, bool) {
	if !s.HasWaterInSolvent {
		return 0, false
	}
	return solvent * Mass(s.WaterInSolvent/(1-s.WaterInSolvent)), true
}

package chem

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"sync"
)

// A dilutionTable is the heat that one mole of a solute still gives off when
// its solution is diluted without end, over the water it is in already. The
// curve runs over ln(1 + r), r being mol water per mol solute, in which
// handbook tables are nearly straight.
type dilutionTable struct {
	name      string
	molarMass float64 // kg/mol
	low, high float64 // r
	curve     *curve  // J/mol over ln(1 + r)
	rows      []dilutionPoint
}

// dilutionPoint is one row: r, and the heat in J/mol.
type dilutionPoint struct {
	r, heat float64
	source  string
}

var dilutionTables = sync.OnceValue(loadDilutionHeats)

const (
	// sulfuricCAS is sulfuric acid, whose heats stand in formation_enthalpy.csv.
	sulfuricCAS = "7664-93-9"
	// waterMolarMass is in kg/mol (abridged atomic weights, IUPAC 2021).
	waterMolarMass = 18.015e-3
	// sulfuricPure is the formation enthalpy of liquid sulfuric acid in kJ/mol
	// to which the rows of its solutions are added, as they say.
	sulfuricPure = -813.99
)

// dilutedMolarMasses are the molar masses in kg/mol that turn a mass fraction
// into mol water per mol (abridged atomic weights, IUPAC 2021).
var dilutedMolarMasses = map[string]float64{
	sulfuricCAS: 98.072e-3,
	"7647-01-0": 36.458e-3,
	"7697-37-2": 63.012e-3,
	"7664-38-2": 97.994e-3,
	"1310-73-2": 39.997e-3,
	"64-19-7":   60.052e-3,
}

// loadDilutionHeats reads both tables.
func loadDilutionHeats() map[string]*dilutionTable {
	points := map[string][]dilutionPoint{sulfuricCAS: sulfuricSeries()}
	tables := map[string]*dilutionTable{sulfuricCAS: {name: "sulfuric acid"}}
	for _, r := range readTable("dilution_heat.csv") {
		cas := r.text("cas")
		ratio, _ := r.number("mol_water_per_mol")
		heat, _ := r.number("heat_to_infinite_dilution_kJ_mol")
		points[cas] = append(points[cas], dilutionPoint{ratio, heat * 1e3, r.text("source")})
		if tables[cas] == nil {
			tables[cas] = &dilutionTable{name: r.text("solute")}
		}
	}
	for cas, ps := range points {
		tables[cas].fit(ps, dilutedMolarMasses[cas])
	}
	return tables
}

// sulfuricSeries turns the formation enthalpies of sulfuric acid in n mol water
// into heats that are left, counted to the most dilute row.
func sulfuricSeries() []dilutionPoint {
	const source = "heats of solution from memory (textbook table of the age of NBS Circular 500), see formation_enthalpy.csv"
	points := []dilutionPoint{{0, sulfuricPure * 1e3, source}}
	for _, r := range readTable("formation_enthalpy.csv") {
		var ratio float64
		if _, err := fmt.Sscanf(r.text("species"), "sulfuric acid in %g mol water", &ratio); err != nil {
			continue
		}
		formation, _ := r.number("delta_f_H_kJ_mol")
		points = append(points, dilutionPoint{ratio, formation * 1e3, source})
	}
	last := points[len(points)-1].heat
	for i := range points {
		points[i].heat -= last
	}
	return points
}

// fit sorts the rows and makes the curve.
func (d *dilutionTable) fit(ps []dilutionPoint, molarMass float64) {
	slices.SortFunc(ps, func(a, b dilutionPoint) int { return cmp.Compare(a.r, b.r) })
	var xs, ys []float64
	for _, p := range ps {
		xs, ys = append(xs, math.Log1p(p.r)), append(ys, p.heat)
	}
	d.curve, d.molarMass = newCurve(xs, ys), molarMass
	d.rows = ps
	d.low, d.high = ps[0].r, ps[len(ps)-1].r
}

// waters is the amount of water per amount of solute at mass fraction w.
func (d *dilutionTable) waters(w Fraction) float64 {
	return (1/float64(w) - 1) * d.molarMass / waterMolarMass
}

// left returns the heat in J/mol that is still to come at mass fraction w.
func (d *dilutionTable) left(w Fraction) (float64, error) {
	r := d.waters(w)
	if w > 0 && r >= d.low*(1-1e-9) && r <= d.high {
		return d.curve.at(math.Log1p(max(r, d.low))), nil
	}
	strength := func(r float64) float64 { return 100 / (1 + r*waterMolarMass/d.molarMass) }
	return 0, outOfRange("heat of diluting "+d.name, "strength", w.Percent(), strength(d.high), strength(d.low), "% w/w", "measure it")
}

// DilutionHeat returns the heat given off at 25 °C when a solution holding n of
// the solute is diluted with water from one mass fraction to another; it is
// negative where heat is taken up. Sulfuric, hydrochloric, nitric, phosphoric
// and acetic acid and sodium hydroxide are known, each over the strengths of
// its table; outside it the error is a *DataError, for other solutes a
// *DataError. A strength that rises is refused: water doesn't leave by
// itself. Hydrochloric and nitric acid are good to 1 %, sulfuric acid and
// sodium hydroxide to 3 %, phosphoric acid is an estimate to 30 %.
func DilutionHeat(cas string, n Amount, from, to Fraction) (Energy, error) {
	d := dilutionTables()[cas]
	if d == nil {
		return 0, noData("heat of dilution", soluteName(cas), "measure it")
	}
	if err := errors.Join(checkFraction("strength before", from), checkFraction("strength after", to)); err != nil {
		return 0, err
	}
	if !(n >= 0) || !Finite(n) {
		return 0, fmt.Errorf("heat of diluting %s: amount %v mol must be 0 or more", d.name, float64(n))
	}
	if to > from*(1+1e-12) {
		return 0, fmt.Errorf("heat of diluting %s: %.7g %% is stronger than %.7g %%; a dilution goes down", d.name, to.Percent(), from.Percent())
	}
	before, err := d.left(from)
	if err != nil {
		return 0, err
	}
	after, err := d.left(to)
	if err != nil {
		return 0, err
	}
	return Energy(float64(n) * (before - after)), nil
}

// DilutionHeatSource says where a solute's heats of dilution come from, every source
// once; ok is false for a solute without any.
func DilutionHeatSource(cas string) (source string, ok bool) {
	d := dilutionTables()[cas]
	if d == nil {
		return "", false
	}
	sources := make([]string, len(d.rows))
	for i, p := range d.rows {
		sources[i] = p.source
	}
	return strings.Join(unique(sources), "; "), true
}

// DilutionHeatSourceAt is DilutionHeatSource of the row nearest to a strength.
func DilutionHeatSourceAt(cas string, w Fraction) (source string, ok bool) {
	d := dilutionTables()[cas]
	if d == nil {
		return "", false
	}
	nearest := math.Inf(1)
	for _, p := range d.rows {
		if off := math.Abs(math.Log1p(p.r) - math.Log1p(d.waters(w))); off < nearest {
			nearest, source = off, p.source
		}
	}
	return source, true
}

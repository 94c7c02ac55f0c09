package chem

import (
	"fmt"
	"math"
	"sort"
	"sync"
)

// Density of aqueous solutions, from two kinds of knowledge: tables of density
// over strength at one temperature (data/solution_density.csv and, of further
// sources, data/solution_density_more.csv), and a
// published model over strength and temperature (data/solution_model.csv).
// At a tabulated temperature the table is right. Elsewhere the model moves the
// table by its own change with temperature, so that both agree where they
// meet; strengths the table lacks come from the model alone. Outside what
// either covers the density is refused.

// hypochloriteCAS is sodium hypochlorite, whose density rows come from makers'
// products with different excess of alkali and so have to be pooled.
const hypochloriteCAS = "7681-52-9"

// sameTemperature is how far, in kelvins, a temperature may be from a table's
// and still be its: solutions swell by less than 0.1 % over it.
const sameTemperature = 0.5

// densityTable is what is known of one solute's solutions in water.
type densityTable struct {
	name   string
	curves []densityCurve // by rising temperature; may be empty
	model  *densityModel  // nil where there is none
}

// densityCurve is density in kg/m³ over mass fraction at one temperature.
type densityCurve struct {
	at      Temperature
	ws      []float64 // of the rows
	sources []string
	*curve
}

var densityTables = sync.OnceValue(loadDensities)

// loadDensities reads both tables.
func loadDensities() map[string]*densityTable {
	tables := make(map[string]*densityTable)
	table := func(r row) *densityTable {
		cas := r.text("cas")
		if tables[cas] == nil {
			tables[cas] = &densityTable{name: r.text("solute")}
		}
		return tables[cas]
	}
	for _, r := range readTable("solution_model.csv") {
		table(r).model = newDensityModel(r)
	}
	type series struct {
		ws, rhos []float64
		sources  []string
	}
	points := make(map[string]map[float64]*series)
	for _, r := range append(readTable("solution_density.csv"), readTable("solution_density_more.csv")...) {
		table(r)
		w, _ := r.number("w_w_percent")
		t, _ := r.number("temperature_C")
		rho, _ := r.number("density_g_mL")
		cas := r.text("cas")
		if points[cas] == nil {
			points[cas] = make(map[float64]*series)
		}
		s := points[cas][t]
		if s == nil {
			s = &series{}
			points[cas][t] = s
		}
		s.ws, s.rhos = append(s.ws, w/100), append(s.rhos, rho*1e3)
		s.sources = append(s.sources, r.text("source"))
	}
	for cas, byTemperature := range points {
		for t, s := range byTemperature {
			if cas == hypochloriteCAS {
				s.rhos = pooled(s.rhos)
			}
			tables[cas].curves = append(tables[cas].curves,
				densityCurve{Celsius(t), s.ws, s.sources, newCurve(s.ws, s.rhos)})
		}
		curves := tables[cas].curves
		sort.Slice(curves, func(i, j int) bool { return curves[i].at < curves[j].at })
	}
	return tables
}

// SolutionDensity returns the density of an aqueous solution of the solute
// with this CAS number at mass fraction w and temperature t. A strength or a
// temperature outside the tables is refused with a *DataError that names what
// is covered, an unknown solute with a *DataError. Rows of different sources
// disagree by up to 0.0015 g/mL; those of sodium hypochlorite, which are
// makers' products with salt and alkali in them, by 0.006 g/mL.
func SolutionDensity(cas string, w Fraction, t Temperature) (Density, error) {
	if err := checkFraction("strength of a solution", w); err != nil {
		return 0, err
	}
	if w == 0 || cas == waterCAS {
		return WaterDensity(t)
	}
	table := densityTables()[cas]
	if table == nil {
		return 0, noData("density", "solutions of "+soluteName(cas)+" in water", "give density=")
	}
	if !Finite(t) {
		return 0, fmt.Errorf("density of %s: temperature is no number", table.name)
	}
	if rho, ok := table.tabulated(float64(w), t); ok {
		return Density(rho), nil
	}
	if rho, ok := table.moved(float64(w), t); ok {
		return Density(rho), nil
	}
	if c := table.nearest(float64(w), t); c != nil && math.Abs(float64(t-c.at)) <= sameTemperature {
		return Density(c.rho(float64(w))), nil
	}
	return 0, table.refuse(w, t)
}

// soluteName names a solute for a message, also one that has no number.
func soluteName(cas string) string {
	if cas == "" {
		return "the solute"
	}
	return nameOfCAS(cas)
}

// SolutionDensitySource says where the density that SolutionDensity gives comes from:
// the row nearest in strength of the table that is read, the model, or both; "" where
// there is none.
func SolutionDensitySource(cas string, w Fraction, t Temperature) string {
	const model = "model of Laliberté 2009"
	d := densityTables()[cas]
	switch {
	case w == 0 || cas == waterCAS:
		return "Kell 1975"
	case d == nil:
		return ""
	}
	c := d.nearest(float64(w), t)
	if c == nil {
		return model
	}
	if _, ok := d.tabulated(float64(w), t); ok {
		return c.sourceAt(float64(w))
	}
	switch {
	case !d.model.covers(float64(w), t):
		return c.sourceAt(float64(w))
	case d.model.covers(float64(w), c.at):
		return c.sourceAt(float64(w)) + "; carried to this temperature by the " + model
	}
	return model
}

// sourceAt is the source of the row nearest to w.
func (c *densityCurve) sourceAt(w float64) string {
	best, source := math.Inf(1), ""
	for i, at := range c.ws {
		if off := math.Abs(at - w); off < best {
			best, source = off, c.sources[i]
		}
	}
	return source
}

// tabulated reads the table at one of its temperatures, or in proportion
// between two of them.
func (d *densityTable) tabulated(w float64, t Temperature) (float64, bool) {
	var below, above *densityCurve
	for i := range d.curves {
		c := &d.curves[i]
		switch {
		case !c.covers(w):
		case c.at <= t:
			below = c
		case above == nil:
			above = c
		}
	}
	switch {
	case below != nil && below.at == t:
		return below.rho(w), true
	case below != nil && above != nil:
		share := float64((t - below.at) / (above.at - below.at))
		return below.rho(w) + share*(above.rho(w)-below.rho(w)), true
	}
	return 0, false
}

// rho returns the density at mass fraction w.
func (c *densityCurve) rho(w float64) float64 { return c.curve.at(w) }

// moved carries the nearest tabulated temperature over to t by the model's own
// change, or takes the model alone where the table lacks the strength.
func (d *densityTable) moved(w float64, t Temperature) (float64, bool) {
	if !d.model.covers(w, t) {
		return 0, false
	}
	rho := d.model.at(w, t)
	if c := d.nearest(w, t); c != nil && d.model.covers(w, c.at) {
		return rho + c.rho(w) - d.model.at(w, c.at), true
	}
	return rho, true
}

// nearest returns the tabulated temperature closest to t that covers w, the
// lower of two equally close; nil if none does.
func (d *densityTable) nearest(w float64, t Temperature) *densityCurve {
	var best *densityCurve
	for i := range d.curves {
		c := &d.curves[i]
		if c.covers(w) && (best == nil || math.Abs(float64(c.at-t)) < math.Abs(float64(best.at-t))) {
			best = c
		}
	}
	return best
}

// refuse says whether it is the temperature or the strength that isn't covered.
func (d *densityTable) refuse(w Fraction, t Temperature) error {
	what := "density of " + d.name + " in water"
	if low, high, ok := d.temperatures(float64(w)); ok {
		return outOfRange(what+" at "+number(w.Percent())+" % w/w", "temperature", t.Celsius(), low.Celsius(), high.Celsius(), "°C", "give density= at this temperature")
	}
	low, high := d.strengths()
	return outOfRange(what, "strength", w.Percent(), low*100, high*100, "% w/w", "give density=")
}

// temperatures returns the range that is covered at mass fraction w.
func (d *densityTable) temperatures(w float64) (low, high Temperature, ok bool) {
	low, high = Temperature(math.Inf(1)), Temperature(math.Inf(-1))
	for _, c := range d.curves {
		if c.covers(w) {
			low, high, ok = min(low, c.at), max(high, c.at), true
		}
	}
	if d.model != nil && w <= d.model.most {
		low, high, ok = min(low, d.model.low), max(high, d.model.high), true
	}
	return low, high, ok
}

// strengths returns the mass fractions that some temperature covers.
func (d *densityTable) strengths() (low, high float64) {
	low = 1
	if d.model != nil {
		low, high = 0, d.model.most
	}
	for _, c := range d.curves {
		low, high = min(low, c.low()), max(high, c.high())
	}
	return low, high
}

// DensityRange returns the strengths of which the density of an aqueous
// solution is known at temperature t; ok is false where none is.
func DensityRange(cas string, t Temperature) (low, high Fraction, ok bool) {
	d := densityTables()[cas]
	if d == nil {
		return 0, 0, false
	}
	least, most := 1.0, 0.0
	for _, c := range d.curves {
		if math.Abs(float64(c.at-t)) <= sameTemperature || d.between(t) {
			least, most = min(least, c.low()), max(most, c.high())
		}
	}
	if d.model != nil && t >= d.model.low && t <= d.model.high {
		least, most = 0, max(most, d.model.most)
	}
	for most > least {
		if _, err := SolutionDensity(cas, Fraction(most), t); err == nil {
			break
		}
		most -= 0.001
	}
	return Fraction(least), Fraction(most), most > least
}

// between reports whether t lies between two tabulated temperatures.
func (d *densityTable) between(t Temperature) bool {
	return len(d.curves) > 1 && t >= d.curves[0].at && t <= d.curves[len(d.curves)-1].at
}

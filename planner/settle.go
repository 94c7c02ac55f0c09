package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// mutualOf is what a solvent and water hold of each other, as kg per kg of the
// other; known is false where there is no value.
type mutualOf struct {
	inWater, waterIn           float64
	inWaterKnown, waterInKnown bool
}

// addPhases looks up mutual solubilities and partition coefficients of all
// organic components. What has to be estimated is noted.
func (c *compiler) addPhases() {
	n := len(c.p.matter)
	c.p.mutual = make([]mutualOf, n)
	c.p.salting = make([]float64, n)
	c.p.partition = make([][]float64, n)
	for i := range c.p.matter {
		c.p.partition[i] = make([]float64, n)
		c.p.mutual[i] = mutualFor(&c.p.matter[i])
		c.p.salting[i] = saltingFor(&c.p.matter[i])
		for j := range c.p.matter {
			c.p.partition[i][j] = math.NaN()
		}
	}
	for i := range c.p.matter {
		for j := range c.p.matter {
			if i != j && c.p.matter[j].home == organic && c.p.matter[j].cas != "" && c.p.matter[i].distributes() {
				c.p.partition[i][j] = partitionFor(&c.p.matter[i], &c.p.matter[j])
			}
		}
	}
}

// distributes reports whether a component goes between two layers at all:
// organic ones do, and organic liquids that mix with water.
func (m *matter) distributes() bool {
	if m.home == organic {
		return true
	}
	return m.home == aqueous && m.miscible && m.cas != waterNumber && m.formula.Count("C") > 0
}

func mutualFor(m *matter) mutualOf {
	if m.home != organic {
		return mutualOf{}
	}
	var s mutualOf
	both, err := chem.MutualSolubilityOf(m.cas, chem.Celsius(roomCelsius))
	if err == nil {
		s.inWater, s.inWaterKnown = overRest(both.SolventInWater), both.HasSolventInWater
		s.waterIn, s.waterInKnown = overRest(both.WaterInSolvent), both.HasWaterInSolvent
	}
	if !s.inWaterKnown && m.soluble >= 0 && !m.miscible {
		s.inWater, s.inWaterKnown = m.soluble, true
	}
	return s
}

// saltingFor is the salting-out constant k of an organic substance by sodium
// chloride in L/mol,
//
//	k = 0.040 log10 P(octanol) + 0.114
//
// (N. Ni and S. H. Yalkowsky, Int. J. Pharm. 254 (2003) 167, from memory). Where
// the octanol value isn't known the constant term alone is taken.
func saltingFor(m *matter) float64 {
	if !m.distributes() {
		return 0
	}
	const octanol = "111-87-5"
	p, err := chem.PartitionOf(m.cas, octanol)
	if err != nil || p.P < 1 {
		return 0.114
	}
	return steady(0.114 + 0.040*math.Log10(p.P))
}

// mostSalt is the amount concentration of sodium chloride in its saturated
// solution, about 5.4 mol/L at 20 °C (26.4 % w/w, 1.2 g/mL): salting out isn't
// reckoned beyond it.
const mostSalt = 5.4

// saltedOut is the factor by which the salt of the aqueous phase lowers the
// solubility of a substance there, 10^(−k c), with c the amount of single
// charges of cations per litre.
func (w *Workspace) saltedOut(v, component int) float64 {
	k := w.p.salting[component]
	if k == 0 {
		return 1
	}
	charges := 0.0
	for c, n := range w.in(v, aqueous) {
		if n > 0 {
			charges += float64(n * w.p.matter[c].protons.cationCharge)
		}
	}
	if charges == 0 {
		return 1
	}
	litres := w.volume(v, aqueous) * 1e3
	return chem.Exp10(-k * math.Min(charges/litres, mostSalt))
}

// overRest turns a mass fraction into mass over the mass of the rest.
func overRest(w chem.Fraction) float64 { return steady(float64(w / (1 - w))) }

// partitionFor is the measured or computed partition coefficient, else the
// ratio of solubilities (Harvey, Analytical Chemistry, 7.7): a liquid solute mixes with the solvent, so
// that its own concentration stands for its solubility there.
func partitionFor(solute, solvent *matter) float64 {
	p, err := chem.PartitionOf(solute.cas, solvent.cas)
	if err == nil {
		return steady(p.P)
	}
	if solute.soluble > 0 && !math.IsInf(solute.soluble, 1) && solute.density > 0 {
		return steady(solute.density / (solute.soluble * waterDensity))
	}
	return math.NaN()
}

// settle lets acids and bases react and the liquids part into an aqueous and an
// organic layer: each takes up what it dissolves of the other, and every
// organic solute divides itself by its distribution ratio.
func (w *Workspace) settle(v int) {
	w.exchangeAll(v)
	w.part(v)
	w.dirty[v] = true
}

// part divides the liquids of a place between its two layers.
func (w *Workspace) part(v int) {
	w.gather(v)
	main := w.mainOrganic(v)
	water := w.amounts[w.at(v, aqueous, w.p.water)] * w.p.matter[w.p.water].molar
	if main < 0 {
		return
	}
	if water == 0 {
		w.intoOrganic(v)
		return
	}
	if !w.mixMains(v, main, water) {
		return
	}
	for range 2 { // the second pass takes the volumes the first one found
		w.distribute(v, main)
	}
}

// gather puts water and salts into the aqueous phase and organic liquids into
// the organic one, as if nothing dissolved in the other.
func (w *Workspace) gather(v int) {
	aq, org := w.in(v, aqueous), w.in(v, organic)
	for c := range aq {
		switch m := &w.p.matter[c]; m.home {
		case organic:
			org[c] += aq[c]
			aq[c] = 0
		case aqueous:
			if org[c] != 0 {
				aq[c] += org[c]
				org[c] = 0
			}
		}
	}
}

// mainOrganic returns the organic liquid there is most of by volume, -1 for none.
func (w *Workspace) mainOrganic(v int) int {
	best, most := -1, 0.0
	for c, n := range w.in(v, organic) {
		m := &w.p.matter[c]
		if n <= 0 || m.home != organic {
			continue
		}
		if x := m.volumeOf(n*m.molar, 0); x > most {
			best, most = c, x
		}
	}
	return best
}

// intoOrganic puts miscible liquids into the only layer there is.
func (w *Workspace) intoOrganic(v int) {
	aq, org := w.in(v, aqueous), w.in(v, organic)
	for c := range aq {
		if w.p.matter[c].distributes() {
			org[c] += aq[c]
			aq[c] = 0
		}
	}
}

// mixMains dissolves water and the main organic liquid in each other as far as
// they go. It is false where one of them vanishes and one layer is left.
func (w *Workspace) mixMains(v, main int, water float64) bool {
	s := w.p.mutual[main]
	m := &w.p.matter[main]
	liquid := float64(w.amounts[w.at(v, organic, main)] * m.molar)
	into := float64(s.inWater * water * w.saltedOut(v, main))
	if into >= liquid {
		w.dissolveAll(v)
		return false
	}
	w.shift(v, organic, aqueous, main, into/m.molar)
	wet := s.waterIn * (liquid - into)
	if wet >= water {
		w.shift(v, aqueous, organic, w.p.water, water/w.p.matter[w.p.water].molar)
		w.intoOrganic(v)
		return false
	}
	w.shift(v, aqueous, organic, w.p.water, wet/w.p.matter[w.p.water].molar)
	return true
}

// dissolveAll puts every organic liquid into the water, up to its own
// solubility: what is beyond stays as an organic layer.
func (w *Workspace) dissolveAll(v int) {
	water := w.amounts[w.at(v, aqueous, w.p.water)] * w.p.matter[w.p.water].molar
	for c := range w.p.matter {
		n := w.amounts[w.at(v, organic, c)]
		if n <= 0 {
			continue
		}
		s := w.p.mutual[c]
		most := n
		if s.inWaterKnown {
			most = math.Min(n, s.inWater*water*w.saltedOut(v, c)/w.p.matter[c].molar)
		}
		w.shift(v, organic, aqueous, c, most)
	}
}

func (w *Workspace) shift(v, from, to, c int, n float64) {
	w.amounts[w.at(v, from, c)] -= n
	w.amounts[w.at(v, to, c)] += n
}

// distribute divides the organic solutes between the layers,
//
//	n(org)/n = P V(org) / (P V(org) + V(aq))
//
// where P is the partition coefficient of the free substance; salts of acids
// are components of their own and stay in the water, so that the pH has been
// taken into account where acids and bases were exchanged.
func (w *Workspace) distribute(v, main int) {
	aqVolume, orgVolume := w.volume(v, aqueous), w.volume(v, organic)
	aq, org := w.in(v, aqueous), w.in(v, organic)
	for c := range aq {
		n := aq[c] + org[c]
		if n <= 0 || c == main || c == w.p.water {
			continue
		}
		p := w.p.partition[c][main]
		if math.IsNaN(p) {
			continue // stays where it belongs; noted when the program was made
		}
		p *= w.spread / w.saltedOut(v, c)
		share := float64(p*orgVolume) / (float64(p*orgVolume) + aqVolume)
		org[c] = float64(n * share)
		aq[c] = n - float64(org[c])
	}
}

// needLayers refuses a place that doesn't hold two liquid layers.
func (w *Workspace) needLayers(v int) error {
	aq, org := w.volume(v, aqueous), w.volume(v, organic)
	if aq > 0 && org > trace*aq && aq > trace*org {
		return nil
	}
	only := "aqueous"
	if org > aq {
		only = "organic"
	}
	if aq == 0 && org == 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("%s is empty", w.p.places[v]), "fill it in an earlier step")
	}
	return w.refuse(ErrOnePhase, plainf("%s holds one layer only: %.3g mL, %s", w.p.places[v], (aq+org)*1e6, only),
		"add water or a solvent that doesn't mix with it before parting")
}

// trace is the share of the other layer below which a layer can't be seen in
// the ware: a drop in a litre (common practice).
const trace = 1e-5

// needContents refuses an empty place.
func (w *Workspace) needContents(v int) error {
	if w.massIn(v) > 0 {
		return nil
	}
	return w.refuse(ErrEmptyVessel, fmt.Sprintf("%s is empty", w.p.places[v]), "fill it in an earlier step, or name another vessel")
}

// refuse makes a *StepError of the step being walked.
func (w *Workspace) refuse(kind error, what, would string) error {
	return &StepError{Recipe: w.p.Recipe.Name, Step: w.step.N, Name: w.step.Name, What: what, Would: would, Err: kind}
}

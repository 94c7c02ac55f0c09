package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// titration brings a place to a pH with an acid or a base.
type titration struct {
	component int
	cations   float64 // positive charges a mole brings
	acid      int     // index of its acid, -1 for a hydroxide
	acids     float64 // moles of that acid in a mole
}

func (c *compiler) titration(component int) (titration, error) {
	m := &c.p.matter[component]
	if !m.electro {
		return titration{}, c.refuse(ErrNoData, fmt.Sprintf("nothing is known of %s as an acid or a base", m.name), "use one of the acids and bases of the table of electrolytes, such as sodium hydroxide or sulfuric acid")
	}
	return titration{component, m.protons.cationCharge, c.p.acidIndex[component], m.protons.acids}, nil
}

// charges returns the strong positive charges in a place and the charge its
// acids would carry at a pH, in mol, with the carbonic acid left out.
func (w *Workspace) charges(v int, pH float64) (cations, anions, carbonic float64) {
	for c := range w.p.matter {
		m := &w.p.matter[c]
		if !m.electro {
			continue
		}
		n := w.amounts[w.at(v, aqueous, c)] + w.amounts[w.at(v, organic, c)]
		if n <= 0 {
			continue
		}
		if pKa, ok := metalProtons[m.protons.cation]; ok {
			ions := n * m.protons.cationCharge / 3
			cations += float64(ions * (3 - anionCharge(pKa, pH)))
		} else {
			cations += float64(n * m.protons.cationCharge)
		}
		if k := w.p.acidIndex[c]; k >= 0 {
			if w.p.acids[k].number == carbonicAcid {
				carbonic += float64(n * m.protons.acids)
				continue
			}
			anions += float64(n * m.protons.acids * anionCharge(w.p.acids[k].pKa, pH))
		}
	}
	return cations, anions, carbonic
}

// ionProduct is that of water at 25 °C as pKw (CODATA-based value in pka.csv: 13.995).
const ionProduct = 13.995

// freeCharge is [OH⁻] − [H⁺] at a pH in mol/m3.
func freeCharge(pH float64) float64 {
	return 1e3 * (chem.Exp10(pH-ionProduct) - chem.Exp10(-pH))
}

// carbonDioxideInWater is what water holds of carbon dioxide under its own gas at
// 101.325 kPa, in mol/m3: 0.03 to 0.04 mol/L (from memory).
const carbonDioxideInWater = 34

// acidFor returns the amount of acid that brings place v to pH, from the charge
// balance
//
//	cations = Σ n(acid) z(pH) + n · z(pH) + V ([OH] − [H])
//
// where the volume grows with the water the acid brings. It is negative if the
// place is below that pH already.
func (w *Workspace) acidFor(t titration, v int, pH, waterPerMole float64) float64 {
	cations, anions, _ := w.charges(v, pH)
	z := float64(t.acids * anionCharge(w.p.acids[t.acid].pKa, pH))
	volume, free := w.volume(v, aqueous), freeCharge(pH)
	return (cations - anions - float64(volume*free)) / (z + float64(waterPerMole*free)/waterDensity)
}

// baseFor returns the amount of base that brings place v to pH. Carbonate gives
// off carbon dioxide; stays is the share of what water holds under its own gas
// that is still dissolved when the pH is read. It is +Inf where the base can't
// reach the pH.
func (w *Workspace) baseFor(t titration, v int, pH, stays float64) float64 {
	cations, anions, carbonic := w.charges(v, pH)
	volume := w.volume(v, aqueous)
	short := anions + float64(volume*freeCharge(pH)) - cations
	if t.acid < 0 {
		return short/t.cations + w.carbonicCharge(carbonic, volume, pH, stays)/t.cations
	}
	perMole := float64(t.acids * anionCharge(w.p.acids[t.acid].pKa, pH))
	if all := (short + float64(carbonic*anionCharge(w.p.acids[t.acid].pKa, pH))) / (t.cations - perMole); t.cations > perMole && (carbonic+float64(all*t.acids)) <= w.carbonicKept(volume, pH, stays) {
		return all // so little carbonate that all of it stays dissolved
	}
	if perMole >= t.cations {
		return math.Inf(1)
	}
	kept := w.carbonicKept(volume, pH, stays)
	return (short + float64(kept*anionCharge(w.p.acids[t.acid].pKa, pH))) / t.cations
}

// carbonicKept is the carbonic acid in all its forms that stays in the water.
func (w *Workspace) carbonicKept(volume, pH, stays float64) float64 {
	k := w.p.carbonic
	if k < 0 {
		return 0
	}
	pKa := w.p.acids[k].pKa
	free := 1 + chem.Exp10(pH-pKa[0]) + chem.Exp10(float64(2*pH)-pKa[0]-pKa[1])
	return carbonDioxideInWater * stays * volume * free
}

func (w *Workspace) carbonicCharge(carbonic, volume, pH, stays float64) float64 {
	k := w.p.carbonic
	if k < 0 || carbonic == 0 {
		return 0
	}
	return math.Min(carbonic, w.carbonicKept(volume, pH, stays)) * anionCharge(w.p.acids[k].pKa, pH)
}

// pH returns that of the aqueous phase of a place; known is false where there is
// none or nothing in it is an electrolyte.
func (w *Workspace) pH(v int) (pH float64, known bool) {
	volume := w.volume(v, aqueous)
	if !(volume > 0) {
		return 0, false
	}
	for i := range w.mix {
		w.mix[i].C = 0
	}
	strong := 0.0
	for c := range w.p.matter {
		m := &w.p.matter[c]
		n := w.amounts[w.at(v, aqueous, c)]
		if !m.electro || n <= 0 {
			continue
		}
		known = true
		if k := w.p.metalIndex(m.protons.cation); k >= 0 {
			w.mix[k].C += chem.Concentration(n * m.protons.cationCharge / 3 / volume)
		} else {
			strong += n * m.protons.cationCharge / volume
		}
		if k := w.p.acidIndex[c]; k >= 0 {
			w.mix[k].C += chem.Concentration(n * m.protons.acids / volume)
		}
	}
	if !known {
		return 0, false
	}
	pH, err := chem.PH(w.mix, chem.Concentration(strong), chem.Celsius(25))
	return pH, err == nil
}

func (p *Program) metalIndex(cation string) int {
	if _, ok := metalProtons[cation]; !ok {
		return -1
	}
	for i := range p.acids {
		if p.acids[i].number == cation {
			return i
		}
	}
	return -1
}

package planner

import (
	"cmp"
	"slices"

	"stillroom/chem"
)

// acidOf is an acid of the program with its dissociation constants.
type acidOf struct {
	name   string
	number string // CAS
	pKa    []float64
	charge int // of the form with most protons
}

// exchange is an acid giving its protons to the salt of a weaker one, or to a
// hydroxide: a reaction that runs as far as it can whenever both meet.
type exchange struct {
	reactionOf
	strong, weak float64 // pKa of the giver and of the taker
	// protonHeat is given off for each mole of protons, in J/mol; 0 where it is
	// not known or small.
	protonHeat       float64
	protonHeatSource string
}

// waterPKa puts hydroxides below every acid: pKa of water, 14 at 25 °C, is for
// order only.
const waterPKa = 14

// metalProtons are the steps by which chromium(III) lets go of protons in water:
// the first is the hydrolysis constant of the hexaaqua ion (4.0, from memory),
// the others stand for the fall of the hydroxide, which is over before pH 7
// (Beukes et al., Water SA 25 (1999) 363; it goes back into solution above 11, which isn't modelled).
var metalProtons = map[string][]float64{"chromium(III)": {4.0, 4.5, 5.0}}

// metalHydroxides are the hydroxides that metal salts fall as.
var metalHydroxides = map[string]string{"chromium(III)": "chromium(III) hydroxide"}

// addExchanges enters the acids of the program, the salts they may form and the
// exchanges between them. Salts of sodium and potassium that no step names are
// entered when their acid and their cation are both there.
func (c *compiler) addExchanges() {
	cations := c.cations()
	for i := 0; i < len(c.p.matter); i++ {
		m := c.p.matter[i]
		if !m.electro {
			continue
		}
		for _, cation := range cations {
			for _, charge := range []float64{1, 2} {
				if salt, ok := saltOf(m.protons.acid, cation, charge); ok && m.protons.acid != "" {
					c.enterSalt(salt)
				}
			}
		}
	}
	c.enterAcids()
	c.pairUp(cations)
	c.precipitates(cations)
	c.hydrogenSalts()
	c.exchangeHeats()
	slices.SortStableFunc(c.p.exchanges, func(a, b exchange) int {
		return cmp.Or(cmp.Compare(a.strong, b.strong), -cmp.Compare(a.weak, b.weak))
	})
}

// cations returns the cations of bases there are.
func (c *compiler) cations() []string {
	var list []string
	for _, m := range c.p.matter {
		if cation := m.protons.cation; m.electro && (cation == "sodium" || cation == "potassium") && !slices.Contains(list, cation) {
			list = append(list, cation)
		}
	}
	slices.Sort(list)
	return list
}

func (c *compiler) enterSalt(salt constitution) {
	for _, m := range c.p.matter {
		if m.cas == salt.cas {
			return
		}
	}
	if _, err := c.component(salt.name); err != nil {
		return // a salt without a record is simply never formed
	}
}

// find returns the component with a CAS number, or -1.
func (c *compiler) find(cas string) int {
	return slices.IndexFunc(c.p.matter, func(m matter) bool { return m.cas == cas })
}

// enterAcids lists the acids and says for every component which it belongs to.
func (c *compiler) enterAcids() {
	c.p.acidIndex = make([]int, len(c.p.matter))
	for i := range c.p.matter {
		m := &c.p.matter[i]
		c.p.acidIndex[i] = -1
		if !m.electro || m.protons.acid == "" {
			continue
		}
		k := slices.IndexFunc(c.p.acids, func(a acidOf) bool { return a.number == m.protons.acid })
		if k < 0 {
			pKa, _, err := chem.PKaOf(m.protons.acid)
			if err != nil {
				pKa = otherPKa[m.protons.acid]
			}
			if pKa == nil {
				continue
			}
			k = len(c.p.acids)
			c.p.acids = append(c.p.acids, acidOf{name: m.name, number: m.protons.acid, pKa: pKa})
		}
		c.p.acidIndex[i] = k
	}
	c.p.carbonic = slices.IndexFunc(c.p.acids, func(a acidOf) bool { return a.number == carbonicAcid })
	for cation, pKa := range metalProtons {
		if slices.ContainsFunc(c.p.matter, func(m matter) bool { return m.electro && m.protons.cation == cation }) {
			c.p.acids = append(c.p.acids, acidOf{name: cation, number: cation, pKa: pKa, charge: 3})
		}
	}
}

// otherPKa are dissociation constants at 25 °C that the table lacks, from
// memory (standard handbook values): acetic, heptanoic, 4-toluenesulfonic acid.
var otherPKa = map[string][]float64{
	"64-19-7":  {4.76},
	"111-14-8": {4.89},
	"104-15-4": {-2.8},
}

// pKaFor returns the constant that governs a salt giving or taking its last
// protons: of the z-th step.
func (c *compiler) pKaFor(acid string, z int) (float64, bool) {
	k := slices.IndexFunc(c.p.acids, func(a acidOf) bool { return a.number == acid })
	if k < 0 || z < 1 {
		return 0, false
	}
	pKa := c.p.acids[k].pKa
	return pKa[min(z, len(pKa))-1], true
}

// anionCharge returns the mean number of protons an acid has given up at a pH.
// It allocates nothing.
func anionCharge(pKa []float64, pH float64) float64 {
	ratio, sum, weighted := 1.0, 1.0, 0.0
	for i, k := range pKa {
		ratio = float64(ratio * chem.Exp10(pH-k))
		sum += ratio
		weighted += float64(float64(i+1) * ratio)
	}
	return weighted / sum
}

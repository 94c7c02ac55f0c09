package planner

import (
	"cmp"
	"math"
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
// (METHODS j; it goes back into solution above 11, which isn't modelled).
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

// strongAcid is the pKa below which the salts of an acid are left as they are:
// which of two strong acids a cation is booked with makes no difference.
const strongAcid = 2.5

// taker is something that binds protons: a hydroxide or the salt of an acid.
type taker struct {
	component int
	cation    string
	protons   float64 // bound by one mole
	pKa       float64
	gives     []reactionTerm // formed from one mole, besides the cation
}

// takers lists what binds protons.
func (c *compiler) takers() []taker {
	var list []taker
	for i := range c.p.matter {
		m := &c.p.matter[i]
		s := m.protons
		if !m.electro || (s.cation != "sodium" && s.cation != "potassium") {
			continue
		}
		if s.acid == "" {
			list = append(list, taker{i, s.cation, s.cationCharge, waterPKa, []reactionTerm{{c.p.water, 1}}})
			continue
		}
		list = append(list, c.takerOf(i, s)...)
	}
	return list
}

// takerOf is the salt of an acid as a taker; a salt with two cations first
// takes one proton where the salt with one is known too.
func (c *compiler) takerOf(i int, s constitution) []taker {
	free := c.freeAcid(s.acid)
	pKa, ok := c.pKaFor(s.acid, int(s.cationCharge))
	if !ok {
		return nil
	}
	if s.cationCharge == 2 {
		if half, known := saltOf(s.acid, s.cation, 1); known && c.find(half.cas) >= 0 {
			return []taker{{i, s.cation, 1, pKa, []reactionTerm{{c.find(half.cas), 1}}}}
		}
	}
	if free == nil {
		return nil
	}
	return []taker{{i, s.cation, s.cationCharge, pKa, free}}
}

// carbonicAcid is CO2 in water, which leaves as carbon dioxide.
const carbonicAcid = "463-79-6"

// freeAcid returns what an acid is when it is set free.
func (c *compiler) freeAcid(acid string) []reactionTerm {
	if acid == carbonicAcid {
		i, err := c.component("carbon dioxide")
		if err != nil {
			return nil
		}
		c.grow()
		return []reactionTerm{{i, 1}, {c.p.water, 1}}
	}
	if i := c.find(acid); i >= 0 {
		return []reactionTerm{{i, 1}}
	}
	return nil
}

// grow keeps the list of acids as long as that of components.
func (c *compiler) grow() {
	for len(c.p.acidIndex) < len(c.p.matter) {
		c.p.acidIndex = append(c.p.acidIndex, -1)
	}
}

// pairUp enters the exchange of every acid with every weaker taker whose cation
// it forms a salt with.
func (c *compiler) pairUp(cations []string) {
	for _, t := range c.takers() {
		if t.pKa < strongAcid {
			continue
		}
		for i := 0; i < len(c.p.matter); i++ {
			m := c.p.matter[i]
			if !m.electro || m.protons.cationCharge != 0 || m.protons.acid == carbonicAcid {
				continue
			}
			for _, z := range []float64{2, 1} {
				salt, ok := saltOf(m.protons.acid, t.cation, z)
				pKa, known := c.pKaFor(m.protons.acid, int(z))
				if !ok || !known || !(pKa < t.pKa) || c.find(salt.cas) < 0 {
					continue
				}
				c.addExchange(i, c.find(salt.cas), z, pKa, t)
				break
			}
		}
	}
}

// addExchange enters acid + taker → salt + what the taker gives, per proton.
// Where the taker keeps a cation, as carbonate turning into hydrogencarbonate
// does, only the other goes into the salt.
func (c *compiler) addExchange(acid, salt int, z, pKa float64, t taker) {
	x := exchange{strong: pKa, weak: t.pKa}
	x.add(acid, -1/z)
	x.add(salt, 1/z)
	x.add(t.component, -1/t.protons)
	for _, g := range t.gives {
		x.add(g.component, g.number/t.protons)
	}
	x.name, x.key = "exchange", acid
	if c.checkBalance(&x.reactionOf) == nil {
		c.p.exchanges = append(c.p.exchanges, x)
	}
}

// precipitates enters the fall of a metal as its hydroxide with every strong base.
func (c *compiler) precipitates(cations []string) {
	for i := 0; i < len(c.p.matter); i++ {
		m := c.p.matter[i]
		name, ok := metalHydroxides[m.protons.cation]
		if !m.electro || !ok {
			continue
		}
		hydroxide, err := c.component(name)
		if err != nil {
			continue
		}
		c.grow()
		for _, cation := range cations {
			c.precipitate(i, hydroxide, m.protons, cation)
		}
	}
}

func (c *compiler) precipitate(salt, hydroxide int, s constitution, cation string) {
	other, ok := saltOf(s.acid, cation, 2)
	if !ok || c.find(other.cas) < 0 {
		return
	}
	for _, t := range c.takers() {
		if t.cation != cation || t.pKa != waterPKa {
			continue
		}
		x := exchange{strong: metalProtons[s.cation][0], weak: t.pKa}
		protons := s.cationCharge
		x.add(salt, -1/protons)
		x.add(t.component, -1)
		x.add(c.find(other.cas), s.acids/protons)
		x.add(hydroxide, protons/3/protons)
		x.name, x.key = "precipitation", salt
		if c.checkBalance(&x.reactionOf) == nil {
			c.p.exchanges = append(c.p.exchanges, x)
		}
	}
}

// hydrogenSalts enters salts that still hold a proton, such as
// hydrogencarbonate, giving it up to a hydroxide.
func (c *compiler) hydrogenSalts() {
	takers := c.takers()
	for i := 0; i < len(c.p.matter); i++ {
		s := c.p.matter[i].protons
		if !c.p.matter[i].electro || s.acid == "" || s.cationCharge == 0 || s.cationCharge != s.acids {
			continue
		}
		full, ok := saltOf(s.acid, s.cation, 2)
		pKa, known := c.pKaFor(s.acid, 2)
		if !ok || !known || c.find(full.cas) < 0 {
			continue
		}
		for _, t := range takers {
			if t.cation == s.cation && t.pKa == waterPKa && pKa < t.pKa {
				c.addGiver(i, c.find(full.cas), t.component, s.acids, pKa)
			}
		}
	}
}

// addGiver enters salt/k + hydroxide → full salt + water, with as much water as
// balances the hydrogen.
func (c *compiler) addGiver(salt, full, hydroxide int, acids, pKa float64) {
	x := exchange{strong: pKa, weak: waterPKa}
	x.add(salt, -1/acids)
	x.add(hydroxide, -1)
	x.add(full, 1)
	hydrogen := 0.0
	for _, t := range x.terms {
		hydrogen -= t.number * c.p.matter[t.component].formula.Count("H")
	}
	x.add(c.p.water, hydrogen/2)
	x.name, x.key = "exchange", hydroxide
	if c.checkBalance(&x.reactionOf) == nil {
		c.p.exchanges = append(c.p.exchanges, x)
	}
}

// exchangeHeats enters the enthalpies of exchanges whose heat is that of water
// forming from its ions, or of hydrogencarbonate giving off carbon dioxide; that
// of the acid giving its proton is small beside it (a few kJ/mol for carboxylic
// acids, from memory) and left out, as are heats of dissolving and precipitating.
func (c *compiler) exchangeHeats() {
	neutral, source, err := ionicEnthalpy([]Term{{Substance: "H+", Number: 1}, {Substance: "OH-", Number: 1}}, []Term{{Substance: "water(l)", Number: 1}})
	if err != nil {
		return
	}
	bubbles, more, err := ionicEnthalpy([]Term{{Substance: "H+", Number: 1}, {Substance: "HCO3-", Number: 1}}, []Term{{Substance: "carbon dioxide(g)", Number: 1}, {Substance: "water(l)", Number: 1}})
	if err != nil {
		return
	}
	for i := range c.p.exchanges {
		x := &c.p.exchanges[i]
		switch {
		case x.weak == waterPKa:
			x.protonHeat, x.protonHeatSource = -neutral, source
		case x.gives(c.find("124-38-9")):
			x.protonHeat, x.protonHeatSource = -bubbles, more
		}
	}
}

func (x *exchange) gives(component int) bool { return component >= 0 && x.numberOf(component) > 0 }

// exchangeAll lets acids and bases in place v react as far as they can, and
// adds the heat to the step's.
func (w *Workspace) exchangeAll(v int) {
	for i := range w.p.exchanges {
		x := &w.p.exchanges[i]
		extent, _ := w.mostExtent(&x.reactionOf, v)
		if !(extent > 0) {
			continue
		}
		w.react(&x.reactionOf, v, extent)
		w.heat += extent * x.protonHeat
	}
}

// anionCharge returns the mean number of protons an acid has given up at a pH.
// It allocates nothing.
func anionCharge(pKa []float64, pH float64) float64 {
	ratio, sum, weighted := 1.0, 1.0, 0.0
	for i, k := range pKa {
		ratio *= math.Pow(10, pH-k)
		sum += ratio
		weighted += float64(i+1) * ratio
	}
	return weighted / sum
}

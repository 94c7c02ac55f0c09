package planner

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
		w.heat += float64(extent * x.protonHeat)
	}
}

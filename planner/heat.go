package planner

import (
	"stillroom/chem"
)

// figuresOf takes out of the policy what the walk needs on its way.
func figuresOf(p *policyTable) policyFigures {
	return policyFigures{
		heatU: p.value("heat.u"), heatGap: p.value("heat.gap"), iceSpare: p.value("heat.ice-spare"),
		stillLeave: p.value("still.leave"), emulsionExtra: p.value("prior.emulsion.extra"), emulsionChance: p.value("prior.emulsion.chance"),
		scaleWarn: p.value("scale.warn"),
	}
}

// dilutionSteps is the number of strengths at which heats of dilution are kept.
const dilutionSteps = 100

// dilutionOf holds the heat given off by a mole of a solute on its way from the
// strongest solution of the table to each strength, in J/mol.
type dilutionOf struct {
	component int
	heat      [dilutionSteps + 1]float64
	source    string
}

// addDilutions tabulates heats of dilution of the components that have them.
func (c *compiler) addDilutions() {
	for i := range c.p.matter {
		m := &c.p.matter[i]
		source, ok := chem.DilutionHeatSource(m.cas)
		if !ok || m.home != aqueous {
			continue
		}
		if d, ok := dilutionFor(i, m.cas); ok {
			d.source = source
			c.p.dilutions = append(c.p.dilutions, d)
		}
	}
}

func dilutionFor(component int, cas string) (dilutionOf, bool) {
	d := dilutionOf{component: component}
	top := -1
	for i := dilutionSteps; i >= 1; i-- {
		if top < 0 {
			if _, err := chem.DilutionHeat(cas, 1, chem.Fraction(i)/dilutionSteps, chem.Fraction(i)/dilutionSteps); err == nil {
				top = i
			}
			continue
		}
		q, err := chem.DilutionHeat(cas, 1, chem.Fraction(top)/dilutionSteps, chem.Fraction(i)/dilutionSteps)
		if err != nil {
			d.heat[i] = d.heat[i+1]
			continue
		}
		d.heat[i] = steady(float64(q))
	}
	d.heat[0] = d.heat[1]
	return d, top > 0
}

// dilutionHeat returns the heat the solutes of a place have given off since
// they were as strong as the tables go, in J; differences of it are heats of
// mixing.
func (w *Workspace) dilutionHeat(v int) float64 {
	sum := 0.0
	water := w.amounts[w.at(v, aqueous, w.p.water)] * w.p.matter[w.p.water].molar
	for i := range w.p.dilutions {
		d := &w.p.dilutions[i]
		n := w.amounts[w.at(v, aqueous, d.component)]
		if n <= 0 {
			continue
		}
		mass := n * w.p.matter[d.component].molar
		sum += float64(n * d.at(mass/(float64(mass)+float64(water))))
	}
	return sum
}

// at reads the table between its strengths.
func (d *dilutionOf) at(w float64) float64 {
	x := float64(w * dilutionSteps)
	i := min(int(x), dilutionSteps-1)
	return d.heat[i] + float64((x-float64(i))*(d.heat[i+1]-d.heat[i]))
}

// stockDilution returns dilutionHeat of n mol of a component at the strength of
// its stock.
func (w *Workspace) stockDilution(component, ask int, n float64) float64 {
	for i := range w.p.dilutions {
		if d := &w.p.dilutions[i]; d.component == component {
			s := &w.stocks[ask]
			if s.pure+s.water <= 0 {
				return 0
			}
			return n * d.at(s.pure/(s.pure+s.water))
		}
	}
	return 0
}

// heatCapacity returns that of everything in a place in J/K. A substance without
// a value, such as a dissolved salt, counts as nothing beside its water, which
// for sodium chloride is right to 2 % at any strength (CRC Handbook: 20 % has
// 3.37 J/(g K), its water alone 3.35).
func (w *Workspace) heatCapacity(v int) float64 {
	sum := 0.0
	for phase := range gas {
		for c, n := range w.in(v, phase) {
			if n > 0 {
				sum += float64(n * w.p.matter[c].molar * w.p.matter[c].cp)
			}
		}
	}
	return sum
}

// deriveRise explains the temperature without cooling.
func (w *Workspace) deriveRise(cp float64) chem.Derivation {
	start := w.celsius[w.step.vessel]
	return chem.Derivation{
		Of: "temperature if cooling is lost", Formula: "T = T0 + q / Σ m·cp",
		Inserted: plainf("%.3g °C + %.5g kJ / %.4g kJ/K = %.4g °C", start, w.heat/1e3, cp/1e3, start+w.heat/cp),
		Inputs: []chem.Input{
			{Symbol: "T0", Name: "temperature of the contents", Value: start, Unit: "°C", Source: "recipe"},
			{Symbol: "q", Name: "heat of reactions, dilution and neutralisation", Value: w.heat / 1e3, Unit: "kJ", Source: "heat balance of the step"},
			{Symbol: "Σ m·cp", Name: "heat capacity of the contents, dissolved salts as nothing beside their water", Value: cp / 1e3, Unit: "kJ/K", Source: "heat capacities of the table of substances"},
		},
		Value: start + w.heat/cp, Unit: "°C", Range: "no heat to the room, no boiling", Source: "Stoessel, Thermal Safety of Chemical Processes; OpenStax Chemistry 2e, 5.2",
	}
}

// mixTemperature sets the temperature of place v to that of its contents mixed
// with those of another place.
func (w *Workspace) mixTemperature(from, v int) {
	a, b := w.heatCapacity(from), w.heatCapacity(v)
	if a+b > 0 {
		w.celsius[v] = (float64(a*w.celsius[from]) + float64(b*w.celsius[v])) / (a + b)
	}
}

// sayHeat says the heat of the step and how far it would warm the contents.
func (w *Workspace) sayHeat() {
	if w.report == nil || w.heat == 0 {
		return
	}
	w.say("%s", heatText(chem.Energy(w.heat)))
	cp := w.heatCapacity(w.step.vessel)
	if w.heat <= 0 || cp <= 0 {
		return
	}
	w.derive(func() chem.Derivation { return w.deriveRise(cp) })
	rise := w.heat / cp
	w.report.step.IfCoolingLost = chem.Celsius(w.celsius[w.step.vessel] + rise)
	if rise > 10 {
		w.say("uncooled it would warm by %.3g K", rise)
	}
	if w.report.step.IfCoolingLost > chem.Celsius(100) && w.volume(w.step.vessel, aqueous) > 0 {
		w.caution("if cooling is lost it boils before it gets that warm: a condenser must take the vapour")
	}
}

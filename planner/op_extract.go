package planner

import (
	"fmt"
	"math"

	"stillroom/chem"
)

// extractOp takes the product out of the aqueous layer with portions of a
// solvent, which go to another vessel.
type extractOp struct {
	solvent  charge
	what     string // the substance extracted; "" for the product
	portions int
	recovery chem.Fraction // wanted; 0 if only portions are stated
	to       string

	dose     dose
	solute   int
	target   int
	emulsion int
	chance   int
	loss     int
	spread   int
}

// mostPortions is more extractions than anybody makes by hand.
const mostPortions = 20

func (o *extractOp) read(f *fields) {
	if g := f.inner("solvent", true); g != nil {
		o.solvent = readCharge(g, true)
		g.done()
	}
	o.what = f.text("of", false)
	o.portions, _ = take(f, "portions", false, readCount, "how many portions, such as 5")
	o.recovery, _ = take(f, "recovery", false, chem.ParseFraction, "the share to be taken out, such as 98 %")
	if o.portions > mostPortions {
		f.faultAt(f.values["portions"], fmt.Sprintf("%d portions", o.portions), fmt.Sprintf("1 to %d", mostPortions))
	}
	if o.portions == 0 && o.recovery == 0 && f.values["portions"] == nil && f.values["recovery"] == nil {
		f.fault(f.at, f.what+" says neither portions nor recovery", "portions: 5 or recovery: 98 %")
	}
	o.to = f.text("to", true)
}

func (o *extractOp) names(visit func(kind, name string, at place)) {
	visit("substance", o.solvent.substance, o.solvent.pos)
	if o.what != "" {
		visit("substance", o.what, o.solvent.pos)
	}
	if o.to != "" {
		visit("vessel", o.to, place{})
	}
}

func (o extractOp) compile(c *compiler) (runner, error) {
	var err error
	if o.dose, err = c.dose(o.solvent); err != nil {
		return nil, err
	}
	if c.p.matter[o.dose.component].home != organic {
		return nil, c.refuse(ErrOnePhase, o.solvent.substance+" mixes with water: there is nothing to part", "take a solvent that doesn't, such as ethyl acetate")
	}
	if !(c.p.matter[o.dose.component].density > 0) {
		return nil, c.refuse(ErrNoData, "no density of "+o.solvent.substance, "state density: under substances:")
	}
	o.solute = c.p.product
	if o.what != "" {
		o.solute = c.index[o.what]
	}
	o.target = c.place[o.to]
	o.emulsion = c.ask(o.dose.component, o.dose.accept, byLoad, "emulsion", false)
	o.chance, o.loss, o.spread = c.emulsion(), c.solventLoss(), c.partitionFactor(o.solute, o.dose.component)
	return &o, nil
}

func (o *extractOp) run(w *Workspace) error {
	v := w.step.vessel
	if err := w.needContents(v); err != nil {
		return err
	}
	w.settle(v)
	there := w.total(v, o.solute)
	if there <= 0 {
		return w.refuse(ErrEmptyVessel, fmt.Sprintf("there is no %s in %s", w.p.matter[o.solute].name, w.p.places[v]), "set it free in an earlier step")
	}
	first := w.amountOf(&o.dose, v)
	w.spread = w.value(o.spread)
	done, err := o.shake(w, v, first, there)
	w.spread = 1
	if err != nil {
		return err
	}
	w.settle(o.target)
	w.fullest(o.target)
	w.spare(o.emulsion, o.dose.component, o.chance, first*w.p.matter[o.dose.component].molar)
	if w.report != nil {
		o.tell(w, v, done, there, first)
	}
	return nil
}

// shake makes the portions one after the other and returns how many there were.
func (o *extractOp) shake(w *Workspace, v int, portion, there float64) (int, error) {
	most := o.portions
	if most == 0 {
		most = mostPortions
	}
	reached := 0
	for i := range mostPortions {
		left := w.total(v, o.solute) / there
		if i >= o.portions && (o.recovery == 0 || left <= float64(1-o.recovery)) {
			return i, nil
		}
		if i == most {
			reached = i
			break
		}
		w.pour(&o.dose, v, portion)
		w.settle(v)
		w.fullest(v)
		if err := w.needLayers(v); err != nil {
			return 0, err
		}
		lost := w.value(o.loss) * w.amounts[w.at(v, organic, o.dose.component)]
		w.move(v, organic, w.p.air(), gas, o.dose.component, math.Min(lost, w.amounts[w.at(v, organic, o.dose.component)]))
		w.parted(v, o.target, organic)
	}
	return reached, o.outOfReach(w, v, portion, there)
}

// outOfReach says what the stated portions give and how many would do.
func (o *extractOp) outOfReach(w *Workspace, v int, portion, there float64) error {
	got := 100 * (1 - w.total(v, o.solute)/there)
	made := o.portions
	if made == 0 {
		made = mostPortions
	}
	volume := portion * w.p.matter[o.dose.component].molar / w.p.matter[o.dose.component].density * 1e6
	what := plainf("%.3g %% needs more than %d portions of %.3g mL; %d give %.3g %%", o.recovery.Percent(), mostPortions, volume, made, got)
	would := plainf("ask for %.3g %% or take larger portions", math.Floor(got))
	for n := made + 1; n <= mostPortions; n++ {
		w.pour(&o.dose, v, portion)
		w.settle(v)
		w.movePhase(v, o.target, organic, 1)
		if w.total(v, o.solute)/there <= float64(1-o.recovery) {
			what = plainf("%.3g %% needs %d portions of %.3g mL; %d give %.3g %%", o.recovery.Percent(), n, volume, made, got)
			would = plainf("take %d portions, or ask for %.3g %%", n, math.Floor(got))
			break
		}
	}
	return w.refuse(ErrRecovery, what, would)
}

// tell says what the extraction gives, and what ten portions would add.
func (o *extractOp) tell(w *Workspace, v, done int, there, portion float64) {
	solute, solvent := &w.p.matter[o.solute], &w.p.matter[o.dose.component]
	left := w.total(v, o.solute) / there
	w.say("%d × %.3g mL of %s take out %.2f %% of the %s", done, portion*solvent.molar/solvent.density*1e6, solvent.name, 100*(1-left), solute.name)
	if done < practicePortions && left > 0 {
		each := math.Pow(left, 1/float64(done))
		more := left - math.Pow(each, practicePortions)
		w.say("%d portions, as some make them (common practice), would add %.2g %%, %.2g g", practicePortions, 100*more, more*there*solute.molar*1e3)
	}
	water := w.volume(v, aqueous)
	w.say("%.3g g of %s stays dissolved in %.3g mL of water", w.amounts[w.at(v, aqueous, o.dose.component)]*solvent.molar*1e3, solvent.name, water*1e6)
	if p := w.p.partition[o.solute][o.dose.component]; !math.IsNaN(p) {
		w.derive(func() chem.Derivation { return o.derive(w, v, done, there, portion, left, p) })
	}
}

// practicePortions is how often the freed acid is extracted by some, with a
// fifth of the volume each time (common practice).
const practicePortions = 10

func (o *extractOp) derive(w *Workspace, v, done int, there, portion, left, p float64) chem.Derivation {
	solute, solvent := &w.p.matter[o.solute], &w.p.matter[o.dose.component]
	source := "ratio of solubilities"
	if q, err := chem.PartitionOf(solute.cas, solvent.cas); err == nil {
		source = q.Source
	}
	return chem.Derivation{
		Of: "share of " + solute.name + " left in the water", Formula: "q = V(aq) / (V(aq) + P·V(org)), n times",
		Inserted: plainf("%.4g after %d portions, each layer taking up what it dissolves of the other", left, done),
		Inputs: []chem.Input{
			{Symbol: "P", Name: "partition coefficient, " + solvent.name + " over water", Value: p, Source: source},
			{Symbol: "V(aq)", Name: "aqueous volume at the end", Value: w.volume(v, aqueous) * 1e6, Unit: "mL", Source: "contents of the vessel"},
			{Symbol: "V(org)", Name: "one portion", Value: portion * solvent.molar / solvent.density * 1e6, Unit: "mL", Source: "recipe, " + ruleWords[o.dose.rule]},
		},
		Value: left, Range: "dilute; salting out by Setschenow's law; dimers of the acid would leave less", Source: "Harvey, Analytical Chemistry, 7.7; Nichols, Organic Chemistry Lab Techniques, 4.5",
	}
}

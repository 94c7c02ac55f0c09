package reckoner

import (
	"context"
	"fmt"
	"math"
	"strings"

	"stillroom/chem"
)

// phaseSums are the sums on two phases, vapour and heat.
func phaseSums() []Sum {
	return []Sum{extractSum(), distributionSum(), drySum(), boilSum(), vapourSum(), steamSum(), heatSum(), doseSum(), quenchSum()}
}

const phaseGroup = "Two phases"

// A solute and a solvent may stand in place of the partition and the pKa.
var (
	soluteKey  = Key{"solute", "Substance extracted, to look up its partition and pKa", "pentanoic acid", true}
	solventKey = Key{"solvent", "Solvent, to look up the partition", "ethyl acetate", true}
)

func extractSum() Sum {
	return Sum{
		Name: "extract", Title: "Extraction", Group: phaseGroup,
		About: "Gives the share that a number of portions of solvent takes out of water, or the portions that a recovery needs.",
		Keys: []Key{
			{"partition", "Distribution ratio, solvent over water; with pKa and pH the partition of the neutral form", "4.07", true},
			{"aqueous", "Volume of the water layer", "150 mL", false},
			{"organic", "Volume of each portion of solvent", "50 mL", false},
			{"portions", "Number of portions", "3", true},
			{"recovery", "Recovery wanted, in place of the portions", "98 %", true},
			{"pka", "pKa of an acid to be extracted", "4.83", true},
			{"ph", "pH of the water after the acid has moved", "2", true},
			soluteKey, solventKey,
		},
		Gives:   []string{"recovered", "left", "portions"},
		Example: []string{"partition=4.07", "aqueous=150 mL", "organic=50 mL", "portions=3"},
		Range:   "dilute solutions, settled layers, the same distribution ratio in every portion",
		Source:  "Nichols, Organic Chemistry Lab Techniques, 4.5; Harvey, Analytical Chemistry, 7.7",
		Run:     runExtract,
	}
}

func runExtract(_ context.Context, args Args) (Answer, error) {
	d, inputs, notes, err := distributionOf(args)
	if err != nil {
		return Answer{}, err
	}
	aqueous, err := positive(args, "aqueous", args.Volume)
	if err != nil {
		return Answer{}, err
	}
	organic, err := positive(args, "organic", args.Volume)
	if err != nil {
		return Answer{}, err
	}
	portions, err := portionsOf(args, d, aqueous, organic)
	if err != nil {
		return Answer{}, err
	}
	left := chem.ExtractLeft(d, aqueous, organic, portions)
	total := organic * chem.Volume(portions)
	answer := Answer{
		Results: []Result{Number("recovered", float64(1-left), ""), Number("left", float64(left), ""), Number("portions", float64(portions), "")},
		Notes: append(notes,
			fmt.Sprintf("the same %.4g mL in endlessly many portions would recover %.4g %%", total.Millilitres(), 100*(1-float64(chem.ExtractFloor(d, aqueous, total)))),
			"salt in the water raises the ratio; a carboxylic acid pairs up in a non-polar solvent, so the ratio then rises with its concentration"),
	}
	answer.Derivation = chem.Derivation{
		Of: "share left in the water", Formula: "left = (V(aq) / (V(aq) + D · V(org)))^n",
		Inserted: fmt.Sprintf("(%.6g / (%.6g + %.6g · %.6g))^%d = %.6g", aqueous.Millilitres(), aqueous.Millilitres(), d, organic.Millilitres(), portions, float64(left)),
		Inputs: append(inputs, chem.Input{Symbol: "V(aq)", Name: "water layer", Value: aqueous.Millilitres(), Unit: "mL", Source: given},
			chem.Input{Symbol: "V(org)", Name: "each portion", Value: organic.Millilitres(), Unit: "mL", Source: given},
			chem.Input{Symbol: "n", Name: "portions", Value: float64(portions), Source: portionSource(args)}),
		Value: float64(left), Range: extractSum().Range, Source: extractSum().Source,
	}
	return answer, nil
}

// positive reads a quantity and refuses nought.
func positive[Q ~float64](args Args, key string, read func(string) (Q, error)) (Q, error) {
	value, err := read(key)
	if err == nil && value <= 0 {
		return 0, &KeyError{Key: key, Text: args[key], What: "not above nought", Wanted: "give a positive value", Cause: chem.ErrOutOfRange}
	}
	return value, err
}

// distributionOf reads the distribution ratio, from a partition and pH where
// these are given.
func distributionOf(args Args) (float64, []chem.Input, []string, error) {
	p, notes, err := partitionOf(args)
	if err != nil {
		return 0, nil, nil, err
	}
	if !args.Has("pka") && !args.Has("ph") {
		return p.Value, []chem.Input{{Symbol: "D", Name: "distribution ratio", Value: p.Value, Source: p.Source}}, notes, nil
	}
	pKa, pH, err := acidity(args)
	if err != nil {
		return 0, nil, nil, err
	}
	d := p.Value * float64(chem.NeutralFraction(pH, pKa...))
	if d <= 0 {
		return 0, nil, nil, &KeyError{Key: "ph", Text: args["ph"], What: "the acid is wholly ionised", Wanted: "give a pH below the pKa", Cause: chem.ErrOutOfRange}
	}
	return d, []chem.Input{p, {Symbol: "D", Name: "distribution ratio at the pH", Value: d, Source: "P · neutral fraction"}}, notes, nil
}

// partitionOf reads the partition, or looks up that of a solute and a solvent
// and notes where it comes from.
func partitionOf(args Args) (chem.Input, []string, error) {
	input := chem.Input{Symbol: "P", Name: "partition of the neutral form", Source: given}
	if args.Has("partition") || !args.Has("solute") {
		var err error
		if !args.Has("partition") {
			return input, nil, &KeyError{Key: "partition", What: "missing", Wanted: `give partition="4.07", or solute= and solvent=`, Cause: ErrMissingKey}
		}
		input.Value, err = args.Positive("partition")
		return input, nil, err
	}
	solute, err := args.Substance("solute")
	if err != nil {
		return input, nil, err
	}
	solvent, err := args.Substance("solvent")
	if err != nil {
		return input, nil, err
	}
	p, err := chem.PartitionOf(solute.CAS, solvent.CAS)
	if err != nil {
		return input, nil, err
	}
	input.Value, input.Source = p.P, p.Source
	note := fmt.Sprintf("partition %.4g, measured at %.0f °C, %s", p.P, p.At.Celsius(), p.Species)
	if !p.Measured {
		note = fmt.Sprintf("partition %.4g is an estimate, good to a factor of %.2g either way: %s", p.P, math.Pow(10, p.Spread), p.Source)
	}
	return input, []string{note}, nil
}

// acidity reads pka, one or several parted by ";", or that of the solute, and ph.
func acidity(args Args) ([]float64, float64, error) {
	pKa, err := pKaOf(args)
	if err != nil {
		return nil, 0, err
	}
	pH, err := args.Number("ph")
	if err != nil {
		return nil, 0, err
	}
	if pH < -3 || pH > 18 {
		return nil, 0, &KeyError{Key: "ph", Text: args["ph"], What: "no pH of water", Wanted: "give -3 to 18", Cause: chem.ErrOutOfRange}
	}
	return pKa, pH, nil
}

func pKaOf(args Args) ([]float64, error) {
	if args.Has("pka") || !args.Has("solute") {
		return args.Numbers("pka")
	}
	solute, err := args.Substance("solute")
	if err != nil {
		return nil, err
	}
	if acid, ok := chem.AcidByCAS(solute.CAS); ok && acid.Charge != 0 {
		return nil, &KeyError{Key: "solute", Text: solute.Name, What: "its neutral form is a base", Wanted: "give pka= of the protonated form, with kind=base in the sum distribution", Cause: chem.ErrNoData}
	}
	pKa, _, err := chem.PKaOf(solute.CAS)
	return pKa, err
}

func portionsOf(args Args, d float64, aqueous, organic chem.Volume) (int, error) {
	switch {
	case args.Has("portions") && args.Has("recovery"):
		return 0, &KeyError{Key: "recovery", Text: args["recovery"], What: "given together with portions", Wanted: "give one of them", Cause: ErrUnknownKey}
	case args.Has("portions"):
		return args.Whole("portions")
	case !args.Has("recovery"):
		return 0, &KeyError{Key: "portions", What: "missing", Wanted: `give portions="3" or recovery="98 %"`, Cause: ErrMissingKey}
	}
	recovery, err := args.Fraction("recovery")
	if err != nil {
		return 0, err
	}
	return chem.PortionsFor(d, aqueous, organic, recovery)
}

func portionSource(args Args) string {
	if args.Has("recovery") {
		return "fewest that recover " + args["recovery"] + ": n = ceil(ln(1 − r) / ln q)"
	}
	return given
}

func distributionSum() Sum {
	return Sum{
		Name: "distribution", Title: "Distribution with pH", Group: phaseGroup,
		About: "Gives the distribution ratio of an acid or base at a pH, and the share of it that is neutral.",
		Keys: []Key{
			{"partition", "Partition of the neutral form, solvent over water", "3.00", true},
			{"pka", "pKa of the acid (several steps parted by ;), or of the protonated base", "5.00", true},
			{"ph", "pH of the water", "7.00", false},
			{"kind", "acid or base; acid if left out", "acid", true},
			{"ion_pair", "Partition of the ion with its partner, if it goes over", "0.01", true},
			soluteKey, solventKey,
		},
		Gives:   []string{"distribution_ratio", "neutral_fraction"},
		Example: []string{"partition=3.00", "pka=5.00", "ph=7.00"},
		Range:   "concentrations for activities, pKa at the temperature of the extraction; an ion that isn't given a partition stays in the water",
		Source:  "Harvey, Analytical Chemistry, 7.7",
		Run:     runDistribution,
	}
}

func runDistribution(_ context.Context, args Args) (Answer, error) {
	input, notes, err := partitionOf(args)
	if err != nil {
		return Answer{}, err
	}
	pKa, pH, err := acidity(args)
	if err != nil {
		return Answer{}, err
	}
	p, ion := input.Value, 0.0
	if args.Has("ion_pair") {
		if ion, err = args.Positive("ion_pair"); err != nil {
			return Answer{}, err
		}
	}
	formula, neutral := "f = 1 / (1 + 10^(pH − pKa)); D = P · f + P(ion) · (1 − f)", chem.NeutralFraction(pH, pKa...)
	switch strings.ToLower(args["kind"]) {
	case "", "acid":
		if len(pKa) > 1 {
			formula = "f = 1 / (1 + 10^(pH − pKa1) + 10^(2 pH − pKa1 − pKa2) + …); D = P · f + P(ion) · (1 − f)"
		}
	case "base":
		if len(pKa) > 1 {
			return Answer{}, &KeyError{Key: "pka", Text: args["pka"], What: "several pKa for a base", Wanted: "give the one of its protonated form", Cause: chem.ErrAmbiguous}
		}
		formula, neutral = "f = 1 / (1 + 10^(pKa − pH)); D = P · f + P(ion) · (1 − f)", chem.NeutralFraction(pKa[0], pH)
	default:
		return Answer{}, &KeyError{Key: "kind", Text: args["kind"], What: "neither acid nor base", Wanted: "write acid or base", Cause: chem.ErrSyntax}
	}
	d := p*float64(neutral) + ion*float64(1-neutral)
	s := distributionSum()
	return Answer{
		Results: []Result{Number("distribution_ratio", d, ""), Number("neutral_fraction", float64(neutral), "")},
		Notes:   append(notes, "take the pH of the water after the substance has moved"),
		Derivation: chem.Derivation{
			Of: "distribution ratio", Formula: formula,
			Inserted: fmt.Sprintf("f = %.6g; D = %.6g · %.6g + %.6g · %.6g = %.6g", float64(neutral), p, float64(neutral), ion, float64(1-neutral), d),
			Inputs: []chem.Input{input,
				{Symbol: "pKa", Name: "pKa", Value: pKa[0], Source: given}, {Symbol: "pH", Name: "pH of the water", Value: pH, Source: given}},
			Value: d, Range: s.Range, Source: s.Source,
		},
	}, nil
}

func drySum() Sum {
	return Sum{
		Name: "dry", Title: "Drying agent", Group: phaseGroup,
		About: "Gives the drying agent for a load of water, at its best, in the middle and at its worst.",
		Keys: []Key{
			{"water", "Water to be bound, as a mass", "5 g", false},
			{"agent", "Drying agent", "magnesium sulfate", false},
			{"product", "Product or its class, to check the pair", "carboxylic acid", true},
			{"capacity", "Capacity in g water per g agent, in place of the table's", "0.4", true},
		},
		Gives:   []string{"agent_mass_low", "agent_mass_typical", "agent_mass_high"},
		Example: []string{"water=5 g", "agent=magnesium sulfate", "product=carboxylic acid"},
		Range:   "practical capacities are common practice: add agent until it flows freely",
		Source:  "practical capacities in drying_agents.csv: common practice; ceiling from the hydrate; Robertson, Laboratory Practice of Organic Chemistry, 3rd ed., pp. 147-152",
		Run:     runDry,
	}
}

func runDry(_ context.Context, args Args) (Answer, error) {
	water, err := args.Mass("water")
	if err != nil {
		return Answer{}, err
	}
	agent, err := agentOf(args)
	if err != nil {
		return Answer{}, err
	}
	need, err := agent.For(water)
	if err != nil {
		return Answer{}, err
	}
	answer := Answer{
		Results: []Result{
			Number("agent_mass_low", need.Low.Grams(), "g"), Number("agent_mass_typical", need.Typical.Grams(), "g"), Number("agent_mass_high", need.High.Grams(), "g"),
		},
		Notes: dryingNotes(args, agent),
	}
	capacity := float64(water / need.Typical)
	if water == 0 {
		capacity = (agent.Low + agent.High) / 2
	}
	s := drySum()
	answer.Derivation = chem.Derivation{
		Of: "mass of " + agent.Name, Formula: "m = m(water) / capacity",
		Inserted: fmt.Sprintf("%.6g g / %.6g g/g = %.6g g", water.Grams(), capacity, need.Typical.Grams()),
		Inputs: []chem.Input{{Symbol: "m(water)", Name: "water", Value: water.Grams(), Unit: "g", Source: given},
			{Symbol: "capacity", Name: "middle of the practical range", Value: capacity, Unit: "g/g", Source: agent.Source}},
		Value: need.Typical.Grams(), Unit: "g", Range: s.Range, Source: s.Source, Notes: answer.Notes,
	}
	return answer, nil
}

// agentOf reads the agent; with a capacity given it may be one the table lacks.
func agentOf(args Args) (chem.DryingAgent, error) {
	name, err := args.Text("agent")
	if err != nil {
		return chem.DryingAgent{}, err
	}
	agent, err := chem.DryingAgentOf(name)
	if !args.Has("capacity") {
		return agent, err
	}
	capacity, wrong := args.Positive("capacity")
	if wrong != nil {
		return chem.DryingAgent{}, wrong
	}
	if err != nil {
		agent = chem.DryingAgent{Name: name}
	}
	agent.Low, agent.High, agent.Theoretical, agent.Source = capacity, capacity, 0, given
	return agent, nil
}

func dryingNotes(args Args, agent chem.DryingAgent) []string {
	var notes []string
	if args.Has("product") {
		if reason, bad := agent.UnsuitableFor(args["product"]); bad {
			notes = append(notes, "don't use it: "+reason)
		} else {
			notes = append(notes, fmt.Sprintf("the table names no conflict between %s and %s; that is no proof that there is none", agent.Name, args["product"]))
		}
	}
	if agent.Theoretical > 0 {
		notes = append(notes, fmt.Sprintf("the hydrate %s holds at most %.3g g/g", agent.Hydrate, agent.Theoretical))
	}
	if agent.HasResidual {
		notes = append(notes, fmt.Sprintf("it leaves about %.3g mg of water per litre of dried air", agent.Residual))
	}
	if agent.Notes != "" {
		notes = append(notes, agent.Notes)
	}
	return notes
}

package reckoner

import (
	"context"
	"errors"
	"fmt"
	"strings"

	"stillroom/chem"
)

const heatGroup = "Heat"

var (
	massKey         = Key{"mass", "Mass of the contents, for the rise", "1.5 kg", true}
	heatCapacityKey = Key{"heat_capacity", "Heat capacity of the contents, for the rise", "3.0 J/(g K)", true}
)

func heatSum() Sum {
	return Sum{
		Name: "heat", Title: "Heat of a reaction", Group: heatGroup,
		About: "Gives the enthalpy of a reaction at 25 °C, the heat an extent of it gives off, and how far that would warm the contents.",
		Keys: []Key{
			{"equation", "Reaction, with states in brackets where they matter", "H^+ + OH^- -> H2O(l)", false},
			{"amount", "Extent of the reaction as printed in the answer", "0.5 mol", false},
			massKey, heatCapacityKey,
			{"formation", "Enthalpies of formation the table lacks, or the isomer that is meant", "C5H12O: 1-pentanol; C5H10O2: -559.4 kJ/mol", true},
		},
		Gives:   []string{"enthalpy", "heat"},
		Example: []string{"equation=H^+ + OH^- -> H2O(l)", "amount=0.5 mol", "mass=1.0 kg", "heat_capacity=4.18 J/(g K)"},
		Range:   "25 °C and standard states; heat of mixing and change of temperature left out",
		Source:  "Hess's law (OpenStax Chemistry 2e, 5.3); enthalpies in formation_enthalpy.csv, each with its source",
		Run:     runHeat,
	}
}

func runHeat(_ context.Context, args Args) (Answer, error) {
	e, err := args.Equation("equation")
	if err != nil {
		return Answer{}, err
	}
	extent, err := positive(args, "amount", args.Amount)
	if err != nil {
		return Answer{}, err
	}
	own, err := formationsGiven(args)
	if err != nil {
		return Answer{}, err
	}
	reaction, err := chem.ReactionEnthalpy(e, own)
	if err != nil {
		return Answer{}, heatRefusal(args, err)
	}
	heat := reaction.Of(extent)
	answer := Answer{
		Results: []Result{Number("enthalpy", float64(reaction.Enthalpy/chem.KilojoulePerMole), "kJ/mol"), Number("heat", heat.Kilojoules(), "kJ")},
		Notes:   []string{"per mole of " + reaction.Equation.AsWritten(), "heat is above nought where the reaction warms its surroundings"},
	}
	s := heatSum()
	answer.Derivation = chem.Derivation{
		Of: "enthalpy of reaction", Formula: "ΔH = Σ ν · ΔfH(products) − Σ ν · ΔfH(reactants); Q = −ΔH · ξ",
		Inserted: fmt.Sprintf("%s; Q = %.6g · %.6g = %.6g kJ", reaction.Inserted(), -float64(reaction.Enthalpy)/1e3, float64(extent), heat.Kilojoules()),
		Value:    float64(reaction.Enthalpy / chem.KilojoulePerMole), Unit: "kJ/mol", Range: s.Range, Source: s.Source,
	}
	for _, part := range reaction.Parts {
		f := part.Formation
		answer.Derivation.Inputs = append(answer.Derivation.Inputs, chem.Input{
			Symbol: "ΔfH(" + part.Species + ")", Name: fmt.Sprintf("enthalpy of formation of %s (%s)", f.Species, f.State),
			Value: float64(f.Enthalpy / chem.KilojoulePerMole), Unit: "kJ/mol", Source: f.Source,
		})
	}
	answer.Notes = append(answer.Notes, speciesTaken(reaction)...)
	return answer, answer.addRise(args, heat)
}

// speciesTaken says which substance and state each formula was read as.
func speciesTaken(r chem.ReactionHeat) []string {
	var taken []string
	for _, part := range r.Parts {
		if part.Formation.State == "" {
			taken = append(taken, part.Species+" as given")
			continue
		}
		taken = append(taken, fmt.Sprintf("%s as %s (%s)", part.Species, part.Formation.Species, part.Formation.State))
	}
	return []string{"taken: " + strings.Join(taken, ", ")}
}

// addRise adds the adiabatic rise where the mass and heat capacity are given.
func (a *Answer) addRise(args Args, heat chem.Energy) error {
	if !args.Has("mass") && !args.Has("heat_capacity") {
		return nil
	}
	mass, err := args.Mass("mass")
	if err != nil {
		return err
	}
	cp, err := args.SpecificHeat("heat_capacity")
	if err != nil {
		return err
	}
	rise, err := chem.AdiabaticRise(heat, mass, cp)
	if err != nil {
		return err
	}
	a.Results = append(a.Results, Number("adiabatic_rise", float64(rise), "K"))
	a.Notes = append(a.Notes, fmt.Sprintf("a rise of that size is called %s (four-level scale of Stoessel)", chem.SeverityOf(rise)))
	a.Derivation.Formula += "; ΔT = Q / (m · cp)"
	a.Derivation.Inserted += fmt.Sprintf("; ΔT = %.6g kJ / (%.6g kg · %.6g kJ/(kg K)) = %.6g K", heat.Kilojoules(), float64(mass), float64(cp)/1e3, float64(rise))
	return nil
}

// formationsGiven reads the key formation: "C5H12O: 1-pentanol; X: -12 kJ/mol".
func formationsGiven(args Args) (map[string]chem.FormationGiven, error) {
	if !args.Has("formation") {
		return nil, nil
	}
	pairs, err := args.Pairs("formation")
	if err != nil {
		return nil, err
	}
	own := make(map[string]chem.FormationGiven, len(pairs))
	for _, p := range pairs {
		h, err := chem.ParseMolarEnergy(p.Value)
		if err == nil {
			own[p.Name] = chem.FormationGiven{Enthalpy: h}
			continue
		}
		if strings.ContainsAny(p.Value[:1], "0123456789+-−.") && strings.Contains(p.Value, "J") {
			return nil, &KeyError{Key: "formation", Text: p.Name, Cause: err}
		}
		own[p.Name] = chem.FormationGiven{Name: p.Value}
	}
	return own, nil
}

// heatRefusal says which key would fill the gap.
func heatRefusal(args Args, err error) error {
	if errors.Is(err, chem.ErrNoData) {
		return &KeyError{Key: "formation", Text: args["formation"], What: err.Error(), Wanted: "give formation=\"formula: value in kJ/mol\" or \"formula: name\"", Cause: err}
	}
	return &KeyError{Key: "equation", Text: args["equation"], Cause: err}
}

func doseSum() Sum {
	return Sum{
		Name: "dose", Title: "Shortest addition time", Group: heatGroup,
		About: "Gives the shortest time over which a reaction may be dosed so that the cooling keeps up.",
		Keys: []Key{
			{"heat", "Heat of all that is dosed", "360 kJ", false},
			{"cooling", "Cooling power, or power per kelvin between contents and bath", "75 W", false},
			{"rise", "With cooling in W/K: contents above the bath; otherwise the rise that is allowed", "25 K", true},
			massKey, heatCapacityKey,
		},
		Gives:   []string{"shortest_time"},
		Example: []string{"heat=360 kJ", "cooling=2.5 W/K", "rise=25 K"},
		Range:   "while the reaction keeps up with the dosing; what accumulates goes on reacting afterwards",
		Source:  "t = Q / q, q = UA · ΔT (Stoessel, Thermal Safety of Chemical Processes)",
		Run:     runDose,
	}
}

func runDose(_ context.Context, args Args) (Answer, error) {
	heat, err := args.Energy("heat")
	if err != nil {
		return Answer{}, err
	}
	power, perKelvin, err := coolingOf(args)
	if err != nil {
		return Answer{}, err
	}
	removed, stored, err := storedHeat(args, heat, perKelvin)
	if err != nil {
		return Answer{}, err
	}
	time, err := chem.ShortestDose(removed, power)
	if err != nil {
		return Answer{}, err
	}
	s := doseSum()
	answer := Answer{
		Results: []Result{Number("shortest_time", time.Minutes(), "min")},
		Notes: []string{
			"check by temperature that the reaction follows the dosing; stop the addition when the temperature rises",
			"a figure for planning: a heat measurement and a competent person's assessment come first",
		},
		Derivation: chem.Derivation{
			Of: "shortest addition time", Formula: "t = Q / q",
			Inserted: fmt.Sprintf("%.6g kJ / %.6g W = %.6g min", removed.Kilojoules(), float64(power), time.Minutes()),
			Inputs: []chem.Input{{Symbol: "Q", Name: "heat to be taken away", Value: removed.Kilojoules(), Unit: "kJ", Source: given},
				{Symbol: "q", Name: "cooling power", Value: float64(power), Unit: "W", Source: given}},
			Value: time.Minutes(), Unit: "min", Range: s.Range, Source: s.Source,
		},
	}
	if stored > 0 {
		answer.Notes = append(answer.Notes, fmt.Sprintf("%.4g kJ of %.4g kJ goes into the allowed rise", stored.Kilojoules(), heat.Kilojoules()))
	} else if !perKelvin && args.Has("rise") {
		answer.Notes = append(answer.Notes, "the allowed rise isn't counted, as the mass and heat capacity aren't given: all heat has to be taken away")
	}
	return answer, nil
}

// coolingOf reads the cooling as a power, or as a power per kelvin times rise.
func coolingOf(args Args) (power chem.Power, perKelvin bool, err error) {
	text, perKelvin := cutPerKelvin(args["cooling"])
	if !perKelvin {
		power, err = positive(args, "cooling", args.Power)
		return power, false, err
	}
	if power, err = chem.ParsePower(text); err != nil {
		return 0, true, &KeyError{Key: "cooling", Text: args["cooling"], Cause: err}
	}
	gap, err := positive(args, "rise", args.TemperatureStep)
	if err != nil {
		return 0, true, err
	}
	if power <= 0 {
		return 0, true, &KeyError{Key: "cooling", Text: args["cooling"], What: "not above nought", Wanted: "give a positive value", Cause: chem.ErrOutOfRange}
	}
	return power * chem.Power(gap), true, nil
}

// cutPerKelvin takes "per kelvin" off a unit.
func cutPerKelvin(text string) (string, bool) {
	text = strings.ReplaceAll(text, " ", "")
	for _, per := range []string{"/K", "/°C", "·K^-1", "K^-1", "K⁻¹"} {
		if rest, ok := strings.CutSuffix(text, per); ok {
			return rest, true
		}
	}
	return text, false
}

// storedHeat takes off the heat what warms the contents by an allowed rise.
func storedHeat(args Args, heat chem.Energy, perKelvin bool) (removed, stored chem.Energy, err error) {
	if perKelvin || !args.Has("mass") && !args.Has("heat_capacity") {
		return heat, 0, nil
	}
	rise, err := positive(args, "rise", args.TemperatureStep)
	if err != nil {
		return 0, 0, err
	}
	mass, err := positive(args, "mass", args.Mass)
	if err != nil {
		return 0, 0, err
	}
	cp, err := positive(args, "heat_capacity", args.SpecificHeat)
	if err != nil {
		return 0, 0, err
	}
	stored = min(chem.SensibleHeat(mass, cp, rise), heat)
	return heat - stored, stored, nil
}

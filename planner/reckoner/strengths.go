package reckoner

import (
	"context"
	"errors"
	"fmt"

	"stillroom/chem"
)

func strengthSum() Sum {
	return Sum{
		Name: "strength", Title: "Strength of a solution", Group: solutionGroup,
		About: "States one strength in every other way.",
		Keys: []Key{
			{"substance", "Solute", "sulfuric acid", false},
			{"from", "Strength, or the word density to read it off the density", "98 % w/w, 18.4 mol/L, 2 mol/kg, 50 g/L, 40 % v/v, 36 N, 20 vol", false},
			{"density", "Density of the solution, in place of the table's", "1.84 g/mL", true},
			temperatureKey, molarMassKey,
			{"pure_density", "Density of the pure liquid, for % v/v", "0.789 g/mL", true},
			{"equivalents", "Protons or electrons that one formula gives, for normality", "2", true},
		},
		Gives:   []string{"mass_fraction", "molarity", "molality", "mass_concentration", "density", "mole_fraction", "others that the solute has"},
		Example: []string{"substance=sulfuric acid", "from=98 % w/w"},
		Range:   "the strengths and temperatures of the density tables, else with density=; aqueous solutions",
		Source:  "c = w ρ / M, b = w / (M (1 − w)) (OpenStax Chemistry 2e, 3.3, 3.4, 11.4); CRC Handbook densities, Laliberté 2009",
		Run:     runStrength,
	}
}

func runStrength(_ context.Context, args Args) (Answer, error) {
	s, err := args.Substance("substance")
	if err != nil {
		return Answer{}, err
	}
	if _, err := NeedMolarMass(s); err != nil {
		return Answer{}, err
	}
	t, notes, err := temperatureOr20(args)
	if err != nil {
		return Answer{}, err
	}
	solute := soluteOf(s, t)
	if args.Has("equivalents") {
		if solute.Equivalents, err = args.Positive("equivalents"); err != nil {
			return Answer{}, err
		}
	}
	if args.Has("pure_density") {
		if solute.PureDensity, err = args.Density("pure_density"); err != nil {
			return Answer{}, err
		}
	}
	w, err := strengthAt(args, "from", "density", solute)
	if err != nil {
		return Answer{}, err
	}
	density, source, err := densityAt(args, "density", solute, w)
	if err != nil {
		return Answer{}, err
	}
	solute.Density = density
	all, err := solute.At(w)
	if err != nil {
		return Answer{}, err
	}
	return Answer{
		Results:    strengthResults(all, w),
		Notes:      append(notes, "density "+figures(density.GramsPerMillilitre())+" g/mL: "+source),
		Derivation: solute.DeriveMolarity(all, s.Sources["molar_mass"], source),
	}, nil
}

// strengthResults lists what the solute has a measure for.
func strengthResults(all chem.Strengths, w chem.Fraction) []Result {
	results := []Result{
		Number("mass_fraction", w.Percent(), "% w/w"),
		Number("molarity", all.Molarity.MolesPerLitre(), "mol/L"),
	}
	if w < 1 { // a pure solute has no solvent to count by
		results = append(results, Number("molality", float64(all.Molality), "mol/kg"))
	}
	results = append(results,
		Number("mass_concentration", float64(all.MassConcentration), "g/L"),
		Number("density", all.Density.GramsPerMillilitre(), "g/mL"),
		Number("mole_fraction", all.MoleFraction.Percent(), "mol %"))
	for _, other := range []Result{
		Number("volume_fraction", all.VolumeFraction.Percent(), "% v/v"),
		Number("normality", all.Normality.MolesPerLitre(), "eq/L"),
		Number("available_chlorine", all.AvailableChlorine.Percent(), "% w/w"),
		Number("available_chlorine_concentration", float64(all.AvailableChlorineVolume), "g/L"),
		Number("volume_strength", all.PeroxideVolume, "vol"),
	} {
		if other.Value > 0 {
			results = append(results, other)
		}
	}
	return results
}

func diluteSum() Sum {
	return Sum{
		Name: "dilute", Title: "Dilution with water", Group: solutionGroup,
		About: "Gives the stock and the water for a weaker solution, the heat set free and how warm it would get uncooled.",
		Keys: []Key{
			{"substance", "Solute", "sulfuric acid", false},
			{"from", "Strength of the stock", "96 % w/w", false},
			{"to", "Strength wanted", "30 % w/w", false},
			makeKey, temperatureKey,
			{"density", "Density of the stock, in place of the table's", "1.84 g/mL", true},
			{"to_density", "Density of the solution wanted, in place of the table's", "1.22 g/mL", true},
			molarMassKey,
		},
		Gives:   []string{"stock_mass", "stock_volume", "water_mass", "heat", "adiabatic_temperature"},
		Example: []string{"substance=sulfuric acid", "from=96 % w/w", "to=30 % w/w", "make=500 g"},
		Range:   "heat for sulfuric, hydrochloric, nitric, phosphoric and acetic acid and sodium hydroxide; volumes by the density tables or density=",
		Source:  "m1 w1 = m2 w2 (OpenStax Chemistry 2e, 3.4); integral heats of solution, CRC Handbook and NBS Circular 500 as each row says",
		Run:     runDilute,
	}
}

func runDilute(_ context.Context, args Args) (Answer, error) {
	s, solute, notes, err := soluteToMix(args)
	if err != nil {
		return Answer{}, err
	}
	if byVolume, ok := dilutedByVolume(args); ok && !args.Has("density") {
		if _, err := strengthAt(args, "from", "density", solute); errors.Is(err, chem.ErrNoData) {
			return byVolume, nil
		}
	}
	from, err := strengthAt(args, "from", "density", solute)
	if err != nil {
		return Answer{}, err
	}
	to, err := strengthAt(args, "to", "to_density", solute)
	if err != nil {
		return Answer{}, err
	}
	make, err := massToMake(args, func() (chem.Density, string, error) { return densityAt(args, "to_density", solute, to) })
	if err != nil {
		return Answer{}, err
	}
	d, err := chem.Dilute(from, to, make)
	if err != nil {
		return Answer{}, &KeyError{Key: "to", Text: args["to"], Cause: err}
	}
	answer := Answer{Notes: append(notes, acidIntoWater), Derivation: chem.DeriveDilution(s.Name, from, to, make, d)}
	answer.Results = append(answer.Results, Number("stock_mass", d.Stock.Grams(), "g"))
	answer.addVolume("stock_volume", args, "density", solute, from, d.Stock)
	answer.Results = append(answer.Results, Number("water_mass", d.Water.Grams(), "g"))
	answer.addDilutionHeat(solute, from, to, make)
	return answer, nil
}

// soluteToMix reads the substance and the temperature of a dilution or a blend.
func soluteToMix(args Args) (chem.Substance, chem.Solute, []string, error) {
	s, err := namedSubstance(args, "substance")
	if err != nil {
		return s, chem.Solute{}, nil, err
	}
	t, notes, err := temperatureOr20(args)
	return s, soluteOf(s, t), notes, err
}

// dilutedByVolume dilutes by volume alone, for solutions without any density: both
// strengths per volume in the same measure, and a volume to make.
func dilutedByVolume(args Args) (Answer, bool) {
	from, err1 := get(args, "from", chem.ParseStrength)
	to, err2 := get(args, "to", chem.ParseStrength)
	make, err3 := args.Volume("make")
	if errors.Join(err1, err2, err3) != nil || from.Kind != to.Kind || !from.PerVolume() || !(from.Value > 0) || to.Value > from.Value {
		return Answer{}, false
	}
	stock := make * chem.Volume(to.Value/from.Value)
	return Answer{
		Results: []Result{Number("stock_volume", stock.Millilitres(), "mL")},
		Notes: []string{acidIntoWater, "no density: masses, water and heat aren't known; fill up to the volume",
			"heat not known doesn't mean that there is none"},
		Derivation: chem.Derivation{
			Of: args["substance"] + ", stock to dilute", Formula: "V(stock) = V · c / c(stock)",
			Inserted: fmt.Sprintf("V(stock) = %s mL · %s / %s = %s mL", figures(make.Millilitres()), args["to"], args["from"], figures(stock.Millilitres())),
			Inputs:   []chem.Input{{Symbol: "V", Name: "volume to make", Value: make.Millilitres(), Unit: "mL", Source: given}},
			Value:    stock.Millilitres(), Unit: "mL", Range: "fill up to the mark; volumes don't add up", Source: "OpenStax Chemistry 2e, 3.3",
		},
	}, true
}

// addVolume adds a volume where the density is known, and says so where it isn't.
func (a *Answer) addVolume(name string, args Args, key string, solute chem.Solute, w chem.Fraction, m chem.Mass) {
	rho, source, err := densityAt(args, key, solute, w)
	if err != nil {
		a.Notes = append(a.Notes, name+": "+err.Error())
		return
	}
	a.Results = append(a.Results, Number(name, rho.Volume(m).Millilitres(), "mL"))
	a.Notes = append(a.Notes, fmt.Sprintf("%s with density %s g/mL: %s", name, figures(rho.GramsPerMillilitre()), source))
}

// addDilutionHeat adds the heat and where it would lead, as far as both are known.
func (a *Answer) addDilutionHeat(solute chem.Solute, from, to chem.Fraction, make chem.Mass) {
	warm, err := chem.DiluteWarm(solute.CAS, solute.MolarMass, from, to, make, solute.Temperature)
	if err != nil {
		a.Notes = append(a.Notes, "heat not known, which doesn't mean that there is none: "+err.Error())
		return
	}
	source, _ := chem.DilutionHeatSourceAt(solute.CAS, from)
	a.Results = append(a.Results,
		Number("heat", warm.Heat.Kilojoules(), "kJ"),
		Number("adiabatic_temperature", warm.Temperature.Celsius(), "°C"))
	a.Notes = append(a.Notes, "heat of dilution: "+source)
	if warm.Temperature > chem.Celsius(100) {
		a.Notes = append(a.Notes, "uncooled it would boil and spit: cool from the outside, or put ice in place of water")
	}
	if warm.Temperature <= solute.Temperature {
		return
	}
	ice, enough := warm.IceShare(solute.Temperature, solute.Temperature)
	a.Results = append(a.Results, Number("ice_mass", ice.Grams(), "g"))
	if enough {
		a.Notes = append(a.Notes, "ice_mass of the water put in as ice at 0 °C holds the starting temperature")
	} else {
		a.Notes = append(a.Notes, "even all water as ice doesn't hold the starting temperature: cool from the outside as well")
	}
}

func blendSum() Sum {
	return Sum{
		Name: "blend", Title: "Blend of two strengths", Group: solutionGroup,
		About: "Gives the masses of two strengths that make a third.",
		Keys: []Key{
			{"substance", "Solute", "nitric acid", true},
			{"strong", "Stronger stock", "65 % w/w", false},
			{"weak", "Weaker stock", "20 % w/w", false},
			{"to", "Strength wanted", "40 % w/w", false},
			makeKey, temperatureKey,
			{"strong_density", "Density of the stronger, in place of the table's", "1.39 g/mL", true},
			{"weak_density", "Density of the weaker, in place of the table's", "1.11 g/mL", true},
			{"to_density", "Density of the blend, in place of the table's", "1.25 g/mL", true},
			molarMassKey,
		},
		Gives:   []string{"strong_mass", "weak_mass"},
		Example: []string{"substance=nitric acid", "strong=65 % w/w", "weak=20 % w/w", "to=40 % w/w", "make=1 kg"},
		Range:   "a target between the two strengths",
		Source:  "cross rule m1/m2 = (w − w2)/(w1 − w) (OpenStax Chemistry 2e, 3.4)",
		Run:     runBlend,
	}
}

func runBlend(_ context.Context, args Args) (Answer, error) {
	s, solute, notes, err := soluteToMix(args)
	if err != nil {
		return Answer{}, err
	}
	var w [3]chem.Fraction
	for i, key := range []string{"strong", "weak", "to"} {
		if w[i], err = strengthAt(args, key, key+"_density", solute); err != nil {
			return Answer{}, err
		}
	}
	make, err := massToMake(args, func() (chem.Density, string, error) { return densityAt(args, "to_density", solute, w[2]) })
	if err != nil {
		return Answer{}, err
	}
	b, err := chem.BlendTo(w[0], w[1], w[2], make)
	if err != nil {
		return Answer{}, &KeyError{Key: "to", Text: args["to"], Cause: err}
	}
	if w[0] < w[1] {
		b.Strong, b.Weak = b.Weak, b.Strong
		notes = append(notes, "strong is the weaker of the two as given; the masses are those of the bottles named so")
	}
	answer := Answer{
		Results:    []Result{Number("strong_mass", b.Strong.Grams(), "g"), Number("weak_mass", b.Weak.Grams(), "g")},
		Notes:      append(notes, acidIntoWater),
		Derivation: chem.DeriveBlend(s.Name, w[0], w[1], w[2], make, b),
	}
	answer.addVolume("strong_volume", args, "strong_density", solute, w[0], b.Strong)
	answer.addVolume("weak_volume", args, "weak_density", solute, w[1], b.Weak)
	if heat, err := chem.BlendHeat(solute.CAS, s.MolarMass, chem.Portion{Mass: b.Strong, Strength: w[0]}, chem.Portion{Mass: b.Weak, Strength: w[1]}); err == nil {
		answer.Results = append(answer.Results, Number("heat", heat.Kilojoules(), "kJ"))
	} else {
		answer.Notes = append(answer.Notes, "heat not known, which doesn't mean that there is none: "+err.Error())
	}
	return answer, nil
}

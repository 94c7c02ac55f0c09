package reckoner

import (
	"context"
	"fmt"
	"slices"

	"stillroom/chem"
)

func steamSum() Sum {
	return Sum{
		Name: "steam", Title: "Steam distillation", Group: vapourGroup,
		About: "Gives the temperature at which a liquid that doesn't mix with water boils together with it, and what comes over.",
		Keys: []Key{
			{"substance", "Substance", "1-hexanol", false}, {"pressure", "Pressure", "101.325 kPa", true}, altitudeKey,
			vapourAntoineKey(), rangeKey, molarMassKey,
		},
		Gives:   []string{"temperature", "mass_ratio"},
		Example: []string{"substance=1-hexanol", "pressure=101.325 kPa"},
		Range:   "liquids that hardly mix with water; for others use the azeotrope or the relative volatility",
		Source:  "p(substance) + p(water) = p; OpenStax Chemistry 2e, 10.3 and 11.4",
		Run:     runSteam,
	}
}

func runSteam(_ context.Context, args Args) (Answer, error) {
	p, notes, err := boilingPressure(args)
	if err != nil {
		return Answer{}, err
	}
	l, err := liquidOf(args)
	if err != nil {
		return Answer{}, err
	}
	molar, err := NeedMolarMass(l.substance)
	if err != nil {
		return Answer{}, err
	}
	if err := l.mustNotMix(); err != nil {
		return Answer{}, err
	}
	d, e, err := l.steam(molar, p)
	if err != nil {
		return Answer{}, err
	}
	if a, ok := chem.AzeotropeWithWater(l.cas); ok {
		notes = append(notes, fmt.Sprintf("tabulated azeotrope: %.1f °C, %.3g g per g water (%s)", a.Temperature.Celsius(), float64(a.PartnerCarried(1)), a.Source))
	}
	s := steamSum()
	return Answer{
		Results: []Result{Number("temperature", d.Temperature.Celsius(), "°C"), Number("mass_ratio", d.MassPerMassWater, "g per g water")},
		Notes:   slices.Concat(notes, l.notes, []string{e.Range()}),
		Derivation: chem.Derivation{
			Of: l.name + " carried by water", Formula: "m/m(water) = p(substance) · M / (p(water) · M(water))",
			Inserted: fmt.Sprintf("%.6g kPa · %.6g g/mol / (%.6g kPa · 18.015 g/mol) = %.6g at %.5g °C", d.Substance.Kilopascals(), molar.GramsPerMole(), d.Water.Kilopascals(), d.MassPerMassWater, d.Temperature.Celsius()),
			Inputs: []chem.Input{{Symbol: "p", Name: "total pressure", Value: p.Kilopascals(), Unit: "kPa", Source: given},
				{Symbol: "M", Name: "molar mass of " + l.name, Value: molar.GramsPerMole(), Unit: "g/mol", Source: l.substance.Sources["molar_mass"]}},
			Value: d.MassPerMassWater, Unit: "g per g water", Range: s.Range, Source: e.Source + "; " + s.Source,
		},
	}, nil
}

// waterCAS is the number of water.
const waterCAS = "7732-18-5"

// mustNotMix refuses liquids that mix with water: then there are no two vapour
// pressures to add up. It says what their azeotrope is.
func (l liquid) mustNotMix() error {
	a, known := chem.AzeotropeWithWater(l.cas)
	wanted := "use its azeotrope or relative volatility with water"
	switch {
	case l.cas == waterCAS:
		return &KeyError{Key: "substance", Text: l.name, What: "it is the water", Wanted: "name the other liquid", Cause: chem.ErrImpossible}
	case known && a.Forms && !a.Heterogeneous:
		wanted = fmt.Sprintf("it boils with water at %.1f °C at %.4g kPa as %.4g %% w/w %s (%s)", a.Temperature.Celsius(), a.Pressure.Kilopascals(), a.PartnerFraction.Percent(), l.name, a.Source)
	case known && !a.Forms:
		wanted = "it has no azeotrope with water: rectify it, or use its relative volatility"
	case known || !l.substance.Miscible():
		return nil
	}
	return &KeyError{Key: "substance", Text: l.name, What: "it mixes with water, so that the pressures of two separate liquids don't add up", Wanted: wanted, Cause: chem.ErrImpossible}
}

func (l liquid) steam(molar chem.MolarMass, p chem.Pressure) (chem.SteamDistillation, chem.VapourEquation, error) {
	var err error
	for _, e := range l.equations {
		var d chem.SteamDistillation
		if d, err = e.SteamDistilling(molar, p); err == nil {
			return d, e, nil
		}
	}
	if err == nil {
		_, err = chem.SteamDistilling(l.cas, p)
	}
	return chem.SteamDistillation{}, chem.VapourEquation{}, err
}

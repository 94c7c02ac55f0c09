package chem

// ParseStrength reads how much of a solute is in a solution:
//
//	98 %   98 % w/w   0.98          mass fraction
//	50 g/L   5 % w/v                mass concentration
//	0.5 mol/L   0.5 M               molarity
//	2 mol/kg                        molality
//	12 mol%                         amount fraction
//	40 % v/v                        volume fraction
//	36 N   2 eq/L                   normality
//	12 % available chlorine   120 g/L available chlorine
//	20 vol                          volume strength of peroxide
//
// The error is a *QuantityError; a share above the whole is refused here already.
func ParseStrength(text string) (Strength, error) {
	n := readNumber(text)
	u := plainUnit(n.rest)
	kind, factor, ok := strengthUnit(u)
	wrong := func(what string, cause error) (Strength, error) {
		return Strength{}, &QuantityError{"strength", text, what,
			"write it as 98 % w/w, 0.5 mol/L, 2 mol/kg, 50 g/L, 40 % v/v, 2 eq/L or 20 vol", cause}
	}
	switch {
	case n.err == ErrAmbiguous:
		return wrong("the mark may be a decimal sign or part thousands", ErrAmbiguous)
	case n.err != nil:
		return wrong("no number", n.err)
	case !ok:
		return wrong(unknownUnit(u, n.rest), ErrUnknownUnit)
	case n.value < 0:
		return wrong("less than nought", ErrOutOfRange)
	}
	s := Strength{kind, n.value * factor}
	switch kind {
	case ByMassFraction, ByMoleFraction, ByVolumeFraction, ByAvailableChlorine:
		if u == "" && s.Value > 1 {
			return wrong("no unit, and more than the whole", ErrNoUnit)
		}
		if s.Value > 1 {
			return wrong("more than the whole: covered are 0 to 100 %", ErrOutOfRange)
		}
	}
	return s, nil
}

// strengthUnit returns the kind of a unit and its factor to the coherent one.
func strengthUnit(u string) (StrengthKind, float64, bool) {
	if f, ok := fractionUnit(u); ok {
		return ByMassFraction, float64(f), true
	}
	if c, ok := concentrationUnit(u); ok {
		return ByMolarity, float64(c), true
	}
	if c, ok := massConcentrationUnit(u); ok {
		return ByMassConcentration, float64(c), true
	}
	if b, ok := molalityUnit(u); ok {
		return ByMolality, float64(b), true
	}
	switch u {
	case "%v/v", "v/v%", "vol%", "%vol", "vol-%":
		return ByVolumeFraction, 0.01, true
	case "v/v":
		return ByVolumeFraction, 1, true
	case "mol%", "mole%", "%mol", "mol-%":
		return ByMoleFraction, 0.01, true
	case "mol/mol":
		return ByMoleFraction, 1, true
	case "N", "eq/L", "eq/l", "equiv/L", "val/L":
		return ByNormality, 1e3, true
	case "mN", "meq/L", "meq/l":
		return ByNormality, 1, true
	case "vol", "volume", "volumes":
		return ByPeroxideVolume, 1, true
	case "%availablechlorine", "%w/wavailablechlorine", "%activechlorine", "%avCl":
		return ByAvailableChlorine, 0.01, true
	case "g/Lavailablechlorine", "g/lavailablechlorine", "g/Lactivechlorine", "g/LavCl":
		return ByAvailableChlorineVolume, 1, true
	case "%w/vavailablechlorine":
		return ByAvailableChlorineVolume, 10, true
	}
	return 0, 0, false
}

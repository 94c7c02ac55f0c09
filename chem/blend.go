package chem

import "fmt"

// A Dilution is how to make a solution of one strength from a stronger one and
// water, by mass.
type Dilution struct {
	Stock Mass // of the stronger solution
	Water Mass
}

// Dilute returns the masses of stock and water that give a mass of solution:
//
//	m(stock) = m · w / w(stock)
//
// A target above the stock's strength is refused with a *DataError.
func Dilute(stock, target Fraction, make Mass) (Dilution, error) {
	b, err := BlendTo(stock, 0, target, make)
	if err != nil {
		return Dilution{}, err
	}
	return Dilution{b.Strong, b.Weak}, nil
}

// A Blend is how much of two strengths of one solute gives a third.
type Blend struct {
	Strong, Weak Mass
}

// BlendTo returns the masses of a stronger and a weaker solution that give a
// mass of the strength between them (cross rule):
//
//	m(strong)/m(weak) = (w − w(weak)) / (w(strong) − w)
//
// A target outside the two has no answer and is refused with a *DataError.
func BlendTo(strong, weak, target Fraction, make Mass) (Blend, error) {
	for _, f := range []Fraction{strong, weak, target} {
		if err := checkFraction("strength", f); err != nil {
			return Blend{}, err
		}
	}
	if !(make >= 0) || !Finite(make) {
		return Blend{}, fmt.Errorf("blend: mass to make is %v g; it must be 0 or more", make.Grams())
	}
	if strong < weak {
		strong, weak = weak, strong
	}
	if !(target >= weak && target <= strong) {
		return Blend{}, outOfRange("blend", "strength", target.Percent(), weak.Percent(), strong.Percent(), "% w/w", "take a stock on the other side of the target")
	}
	if strong == weak {
		return Blend{Strong: make}, nil
	}
	heavy := make * Mass((target-weak)/(strong-weak))
	return Blend{heavy, make - heavy}, nil
}

// A Portion is a mass of a solution of some strength.
type Portion struct {
	Mass     Mass
	Strength Fraction
}

// Mixed returns the mass and the strength of portions of one solute put
// together; their order doesn't matter.
func Mixed(portions ...Portion) Portion {
	var whole, solute Mass
	for _, p := range portions {
		whole += p.Mass
		solute += p.Mass * Mass(p.Strength)
	}
	if whole == 0 {
		return Portion{}
	}
	return Portion{whole, Fraction(solute / whole)}
}

// Contraction returns the volume that is lost when portions of an aqueous
// solution of one solute are put together at temperature t: the sum of their
// volumes less the volume of the blend. It is negative where the blend swells.
func Contraction(cas string, t Temperature, portions ...Portion) (Volume, error) {
	var apart Volume
	for _, p := range portions {
		rho, err := SolutionDensity(cas, p.Strength, t)
		if err != nil {
			return 0, err
		}
		apart += rho.Volume(p.Mass)
	}
	whole := Mixed(portions...)
	rho, err := SolutionDensity(cas, whole.Strength, t)
	if err != nil {
		return 0, err
	}
	return apart - rho.Volume(whole.Mass), nil
}

// BlendHeat returns the heat given off at 25 °C when two strengths of one solute are
// put together, by their heats of dilution:
//
//	Q = n(strong)·L(strong) + n(weak)·L(weak) − n·L
//
// where L is the heat that one mole still gives off on endless dilution.
func BlendHeat(cas string, molarMass MolarMass, strong, weak Portion) (Energy, error) {
	if !(molarMass > 0) {
		return 0, noData("molar mass", soluteName(cas), "give molar_mass=")
	}
	if strong.Strength < weak.Strength {
		strong, weak = weak, strong
	}
	whole := Mixed(strong, weak)
	out, err := DilutionHeat(cas, molarMass.Of(strong.Mass*Mass(strong.Strength)), strong.Strength, whole.Strength)
	if err != nil || weak.Strength == 0 {
		return out, err
	}
	back, err := DilutionHeat(cas, molarMass.Of(weak.Mass*Mass(weak.Strength)), whole.Strength, weak.Strength)
	return out - back, err
}

// A WarmDilution is what happens when a stock is run into water without cooling.
type WarmDilution struct {
	Dilution
	Heat Energy // given off
	// Temperature is where the mixture would end with no heat lost: the uncooled
	// end, which may lie above the boiling point.
	Temperature  Temperature
	HeatCapacity SpecificHeat // of the mixture
}

// meltingHeat is the heat in J/kg that ice takes up on melting at 0 °C (common
// handbook value, 333.55 J/g), and iceTemperature where it does.
const (
	meltingHeat    = 333.55e3
	iceTemperature = ZeroCelsius
)

// DiluteWarm returns the heat and the uncooled end temperature of a dilution by
// mass with both liquids at temperature start:
//
//	T = T(start) + Q / (m · cp)
//
// with the heat of dilution at 25 °C and the heat capacity of the mixture near
// room temperature, so that far rises are good to some 10 %.
func DiluteWarm(cas string, molarMass MolarMass, stock, target Fraction, make Mass, start Temperature) (WarmDilution, error) {
	d, err := Dilute(stock, target, make)
	if err != nil {
		return WarmDilution{}, err
	}
	if !(molarMass > 0) {
		return WarmDilution{}, noData("molar mass", soluteName(cas), "give molar_mass=")
	}
	heat, err := DilutionHeat(cas, molarMass.Of(d.Stock*Mass(stock)), stock, target)
	if err != nil {
		return WarmDilution{}, err
	}
	cp, err := SolutionHeatCapacity(cas, target)
	if err != nil {
		return WarmDilution{}, err
	}
	end := start
	if make > 0 {
		end += Temperature(float64(heat) / (float64(make) * float64(cp)))
	}
	return WarmDilution{d, heat, end, cp}, nil
}

// IceShare returns how much of the water of a dilution has to be put in as ice
// at 0 °C so that the mixture ends at temperature end: ice takes up its heat of
// melting and the warmth of its water, 0 °C being where it starts. If even all
// water as ice isn't enough, enough is false and the outside has to cool.
func (d WarmDilution) IceShare(start, end Temperature) (ice Mass, enough bool) {
	surplus := float64(d.Stock+d.Water) * float64(d.HeatCapacity) * float64(d.Temperature-end)
	if surplus <= 0 {
		return 0, true
	}
	perKilogram := meltingHeat + waterHeatCapacity*float64(start-iceTemperature)
	ice = Mass(surplus / perKilogram)
	if ice > d.Water {
		return d.Water, false
	}
	return ice, true
}

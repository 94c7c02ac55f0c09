package chem

import "math"

// WettedArea returns the wall area of a round flask below the liquid's surface,
//
//	A = 2 π R h,   V(liquid) = π h² (3R − h)/3,   V(flask) = 4 π R³/3
//
// where h is the height of the liquid in a sphere. fill is the volume of the
// liquid over that of the flask.
func WettedArea(vessel Volume, fill Fraction) (Area, error) {
	of := "cooling area of a flask"
	if err := firstError(mustBePositive(of, "volume of the vessel", vessel), mustBeShare(of, "fill", fill, true)); err != nil {
		return 0, err
	}
	radius := math.Cbrt(3 * float64(vessel) / (4 * math.Pi))
	// h²(3R − h) = 4R³·fill has the root h/R = 1 + 2 cos((2π − arccos(1 − 2 fill))/3)
	height := radius * (1 + 2*math.Cos((2*math.Pi-math.Acos(1-2*float64(fill)))/3))
	return Area(2 * math.Pi * radius * min(max(height, 0), 2*radius)), nil
}

// CoolingPower returns the heat a bath takes out of a round flask,
//
//	q = U · A · (T − T(bath))
//
// where A is the wetted area of WettedArea, gap the difference of temperatures
// and u the overall heat transfer in W/(m² K). It refuses a gap or u that isn't
// above zero.
func CoolingPower(vessel Volume, fill Fraction, gap Temperature, u float64) (Power, error) {
	of := "cooling power"
	area, err := WettedArea(vessel, fill)
	if err := firstError(err, mustBePositive(of, "temperature difference", gap), mustBePositive(of, "heat transfer", u)); err != nil {
		return 0, err
	}
	return Power(u * float64(area) * float64(gap)), nil
}

// Heat transfer through the wall of a stirred glass flask in W/(m² K), common
// practice: slow through air, better in a liquid bath, best where ice or a fast
// stream touches the glass all over.
const (
	HeatTransferAir     = 10.0  // still air of the room
	HeatTransferBath    = 150.0 // stirred flask in a still water bath
	HeatTransferIceBath = 200.0 // stirred flask in crushed ice and water
	HeatTransferJacket  = 250.0 // glass jacket with a pumped coolant
)

// CoolingAfterScaling returns the cooling power per volume at a larger scale,
// relative to that at the smaller one: vessels of one shape have
//
//	(A/V)2 / (A/V)1 = (V2/V1)^(−1/3)
//
// so that ten times the volume has 0.46 times the cooling per litre.
func CoolingAfterScaling(from, to Volume) (float64, error) {
	of := "effect of scale on cooling"
	if err := firstError(mustBePositive(of, "volume", from), mustBePositive(of, "volume", to)); err != nil {
		return 0, err
	}
	return math.Pow(float64(to/from), -1.0/3), nil
}

// heatOfFusionIce is the latent heat of fusion of ice at 0 °C, 334 J/g (OpenStax
// Chemistry 2e, 10.3: 6.01 kJ/mol, which is 333.6 J/g).
const heatOfFusionIce = 334e3 // J/kg

// heatCapacityWater is the heat capacity of liquid water, 4.184 J/(g K)
// (OpenStax Chemistry 2e, 5.1).
const heatCapacityWater SpecificHeat = 4184

// IceFor returns the ice at 0 °C whose melting takes up a heat; the melt water
// stays at 0 °C.
func IceFor(heat Energy) Mass {
	if !(heat > 0) || !Finite(heat) {
		return 0
	}
	return Mass(float64(heat) / heatOfFusionIce)
}

// IceTo returns the ice at 0 °C that takes up a heat by melting and by the melt
// water warming to a final temperature above 0 °C.
func IceTo(heat Energy, final Temperature) Mass {
	warming := max(0, final.Celsius()) * float64(heatCapacityWater)
	if !(heat > 0) || !Finite(heat) || !Finite(final) {
		return 0
	}
	return Mass(float64(heat) / (heatOfFusionIce + warming))
}

// CoolantFlow returns the mass of water (or another coolant) per second that
// carries a power away while it warms by rise.
func CoolantFlow(power Power, cp SpecificHeat, rise Temperature) (float64, error) {
	of := "coolant flow"
	if err := firstError(mustBePositive(of, "power", power), mustBePositive(of, "heat capacity", cp), mustBePositive(of, "rise", rise)); err != nil {
		return 0, err
	}
	return float64(power) / (float64(cp) * float64(rise)), nil
}

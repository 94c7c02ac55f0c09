package views

import (
	"math"
	"strconv"

	"stillroom/chem"
	"stillroom/inventory"
)

// A measured amount is rounded to the division of the tool it will be measured
// with.
type measured struct {
	text string
	tool string // "bench balance 2 kg", or "" if the lab has none for it
}

// fineEnough is the share of an amount that the division of its balance may be:
// half a per cent, a thousandth where it must be exact (common practice).
const (
	fineEnough = 5e-3
	fineExact  = 1e-3
)

// measuredMass rounds a mass to the coarsest balance that carries it and is fine
// enough, or to the finest that carries it. A mass no balance is known for keeps
// four figures.
func measuredMass(m chem.Mass, exact bool, tools []inventory.Equipment) measured {
	share := fineEnough
	if exact {
		share = fineExact
	}
	if t, ok := balanceFor(float64(m/chem.Microgram), share, tools); ok {
		return measured{stepped(float64(m/chem.Microgram), float64(t.Step), float64(m), massUnits), t.Name}
	}
	return measured{scaled(float64(m), massUnits, func(x float64, _ int) string { return figures(x, 4) }), ""}
}

func balanceFor(amount, share float64, tools []inventory.Equipment) (inventory.Equipment, bool) {
	var best inventory.Equipment
	for _, t := range tools {
		if t.Kind != "balance" || t.Step <= 0 || float64(t.Size) < amount {
			continue
		}
		fine, bestFine := float64(t.Step) <= share*amount, float64(best.Step) <= share*amount
		switch {
		case best.Step == 0, fine && !bestFine, fine && bestFine && t.Step > best.Step, !fine && !bestFine && t.Step < best.Step:
			best = t
		}
	}
	return best, best.Step > 0
}

// measuredVolume does the same with cylinders.
func measuredVolume(v chem.Volume, tools []inventory.Equipment) measured {
	if t, ok := cylinderFor(float64(v/chem.Microlitre), tools); ok {
		return measured{stepped(float64(v/chem.Microlitre), float64(t.Step), float64(v), volumeUnits), t.Name}
	}
	return measured{scaled(float64(v), volumeUnits, func(x float64, _ int) string { return figures(x, 4) }), ""}
}

// cylinderFor returns the smallest cylinder that holds a volume in microlitres.
func cylinderFor(amount float64, tools []inventory.Equipment) (inventory.Equipment, bool) {
	var best inventory.Equipment
	for _, t := range tools {
		if t.Kind == "cylinder" && t.Step > 0 && float64(t.Size) >= amount && (best.Size == 0 || t.Size < best.Size) {
			best = t
		}
	}
	return best, best.Size > 0
}

// stepped rounds an amount in micro-units to a step and writes it with the
// decimals that the step has in the unit chosen. What would round to nothing is
// written with two figures instead.
func stepped(micro, step, coherent float64, units []scaledUnit) string {
	rounded := math.Round(micro/step) * step
	if rounded == 0 && micro > 0 {
		return scaled(coherent, units, func(x float64, _ int) string { return figures(x, 2) })
	}
	perMicro := coherent / micro // coherent units in one micro-unit
	if micro == 0 {
		return scaled(0, units, figures)
	}
	for _, u := range units {
		if rounded*perMicro < 0.9995*u.size && u != units[len(units)-1] {
			continue
		}
		inUnit := rounded * perMicro / u.size
		decimals := max(0, -int(math.Floor(math.Log10(step*perMicro/u.size)+1e-9)))
		return with(strconv.FormatFloat(inUnit, 'f', decimals, 64), u.name)
	}
	return ""
}

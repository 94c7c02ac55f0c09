package planner

import (
	"fmt"
	"math"
	"sort"
	"strconv"
	"strings"

	"stillroom/chem"
	"stillroom/inventory"
)

// unitDensity stands in for the density of a waste whose volume the
// walk-through doesn't know; the lot says so.
const unitDensity = 1 * chem.GramPerMillilitre

// mildestStream is where contents belong that nothing speaks against. A lot that
// a recipe sends into a stricter stream stays there.
const mildestStream = "aqueous bicarbonate or brine wash"

// SortWaste puts what the steps discard into lots, one for each stream in the
// order in which the run first feeds it, and finds each lot the carboy of its
// stream that can take it: enough room under the fill limit and nothing in it
// that must not meet the lot. Of several, the fullest that still has room is
// taken, ties by code, so that carboys are finished. fillLimit holds for
// carboys without one of their own; 0 means that there is none.
//
// A lot that no carboy takes names the nearest one, doesn't fit, and says what
// is in the way. A lot in a stream that its contents don't belong into says so.
func SortWaste(discards []Discard, carboys []inventory.Carboy, fillLimit float64) []WasteLot {
	var lots []WasteLot
	index := map[string]int{}
	for _, d := range discards {
		i, ok := index[d.Stream]
		if !ok {
			i = len(lots)
			index[d.Stream] = i
			lots = append(lots, WasteLot{Stream: d.Stream})
		}
		lots[i].take(d)
	}
	for i := range lots {
		lots[i].derive(discards)
		lots[i].judgeStream()
		lots[i].findCarboy(carboys, fillLimit)
	}
	return lots
}

// derive shows the sum over the steps that discard into the stream.
func (w *WasteLot) derive(discards []Discard) {
	w.Derivation = chem.Derivation{Of: w.Stream, Formula: "m = Σ mᵢ over the steps that discard into it",
		Inserted: plainf("m = %.4g g", w.Mass.Grams()),
		Value:    w.Mass.Grams(), Unit: "g", Source: "material balance of the walk-through"}
	for _, d := range discards {
		if d.Stream == w.Stream {
			w.Derivation.Inputs = append(w.Derivation.Inputs, chem.Input{Symbol: "m", Name: d.StepName, Value: d.Mass.Grams(),
				Unit: "g", Source: fmt.Sprintf("step %d: what was left in its vessel", d.Step)})
		}
	}
}

// take adds a discard, component by component.
func (w *WasteLot) take(d Discard) {
	w.Mass += d.Mass
	w.Volume += d.Volume
	if d.PH != 0 && (w.PH == 0 || math.Abs(d.PH-7) > math.Abs(w.PH-7)) {
		w.PH = d.PH
	}
	if d.Volume == 0 && d.Mass > 0 {
		w.Volume += unitDensity.Volume(d.Mass)
		w.say("volume not known, taken as of density 1 g/mL")
	}
	for _, c := range d.Contents {
		w.addContent(c)
	}
}

func (w *WasteLot) addContent(c Content) {
	for i := range w.Contains {
		have := &w.Contains[i]
		if have.Substance == c.Substance && have.Phase == c.Phase {
			have.Mass += c.Mass
			have.Amount += c.Amount
			have.Volume += c.Volume
			return
		}
	}
	w.Contains = append(w.Contains, c)
}

func (w *WasteLot) say(note string) {
	if strings.Contains(w.Note, note) {
		return
	}
	if w.Note != "" {
		w.Note += "; "
	}
	w.Note += note
}

// judgeStream compares the stream named with the one the contents belong into.
func (w *WasteLot) judgeStream() {
	var shares []chem.WasteShare
	for _, c := range w.Contains {
		shares = append(shares, chem.WasteShare{Reactant: reactant(c.Substance, c.Formula), Mass: c.Mass, Solid: c.Phase == "solid"})
	}
	stream, why, ok := chem.WasteStreamOf(shares)
	switch {
	case !ok:
		w.say("stream not assessed: " + why)
	case stream.Name == mildestStream && w.Stream != "":
		// What was cleaned up before stays in its own stream until a test shows it clean.
	case !strings.EqualFold(stream.Name, w.Stream):
		w.say(fmt.Sprintf("by its contents it belongs to %q (%s): ask the safety officer", stream.Name, why))
	}
}

// findCarboy picks the carboy for a lot.
func (w *WasteLot) findCarboy(carboys []inventory.Carboy, fillLimit float64) {
	var sameStream []inventory.Carboy
	for _, c := range carboys {
		if strings.EqualFold(c.Stream, w.Stream) {
			sameStream = append(sameStream, c)
		}
	}
	if len(sameStream) == 0 {
		w.say("no carboy for this stream: set one up and label it before the run")
		return
	}
	sort.SliceStable(sameStream, func(i, j int) bool {
		a, b := sameStream[i], sameStream[j]
		if ra, rb := carboyRoom(a, fillLimit), carboyRoom(b, fillLimit); ra != rb {
			return ra < rb
		}
		return a.Code < b.Code
	})
	var clash string
	for _, c := range sameStream {
		if carboyRoom(c, fillLimit) < w.Volume {
			continue
		}
		if clash = w.clashesWith(c); clash == "" {
			w.Carboy, w.Fits = c.Code, true
			return
		}
	}
	nearest := sameStream[len(sameStream)-1]
	w.Carboy = nearest.Code
	if clash != "" {
		w.say(clash + ": use a carboy of its own")
		return
	}
	w.say(plainf("needs %.3g L, %s has room for %.3g L: ask for a pick-up or set up another carboy",
		w.Volume.Litres(), nearest.Code, max(carboyRoom(nearest, fillLimit), 0).Litres()))
}

// carboyRoom is what a carboy may still take; none if no fill limit is known.
func carboyRoom(c inventory.Carboy, fillLimit float64) chem.Volume {
	limit := c.FillLimit
	if limit <= 0 {
		limit = fillLimit
	}
	return chem.Volume(float64(c.SizeUL)*limit-float64(c.ContentUL)) * chem.Microlitre
}

// clashesWith names the gravest reason why a lot must not go into a carboy.
// Components under one per cent of the carboy's content are passed over.
// Dissolving, dilution heat and innocuous gas are no bar within one stream.
func (w *WasteLot) clashesWith(c inventory.Carboy) string {
	for _, in := range carboyContents(c.Contains) {
		for _, new := range w.Contains {
			if new.Mass < w.Mass/100 || strings.EqualFold(new.Substance, in) {
				continue
			}
			a, b := reactant(new.Substance, new.Formula), reactant(in, "")
			if !a.Assessed || !b.Assessed {
				continue // the lot's stream note says what wasn't assessed
			}
			for _, pair := range chem.IncompatibleReactants([]chem.Reactant{a, b}) {
				for _, code := range pair.Codes {
					if code == "E" || code == "F" || code == "GT" || code == "GF" || code == "X" {
						return fmt.Sprintf("%s must not meet %s in %s (%s)", new.Substance, in, c.Code, pair.Consequences)
					}
				}
			}
		}
	}
	return ""
}

// carboyContents reads "name: share %; name: share %" into the names of what is
// there at one per cent or more, or at a share nobody wrote down.
func carboyContents(text string) []string {
	var names []string
	for item := range strings.SplitSeq(text, ";") {
		name, share, _ := strings.Cut(item, ":")
		name = strings.TrimSpace(name)
		percent, err := strconv.ParseFloat(strings.TrimSpace(strings.TrimSuffix(strings.TrimSpace(share), "%")), 64)
		if name != "" && (err != nil || percent >= 1) {
			names = append(names, name)
		}
	}
	return names
}

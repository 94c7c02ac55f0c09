package chem

import (
	"fmt"
	"strings"
	"sync"
)

// WasteStream is a class of waste that is collected by itself.
type WasteStream struct {
	Name   string
	When   string // what puts waste into it
	CodeUS string // characteristic and listed codes that usually apply, 40 CFR 261
	CodeEU string // entries of the European list of waste
	How    string // container and treatment
	Never  string // what must not come into it
	Source string
}

// WasteStreams returns the streams in the order of the table of waste rules.
// Codes and rules are a starting point: local law and the disposal contractor
// decide.
func WasteStreams() []WasteStream { return wasteStreams() }

var wasteStreams = sync.OnceValue(func() []WasteStream {
	var streams []WasteStream
	for _, row := range readTable("waste_rules.csv") {
		if row.text("category") == "stream" {
			streams = append(streams, WasteStream{row.text("stream_or_item"), row.text("applies_when"), row.text("code_us"), row.text("code_eu"),
				row.text("text"), row.text("caution"), row.text("source")})
		}
	}
	return streams
})

// WasteStreamNamed returns the stream of a name.
func WasteStreamNamed(name string) (WasteStream, bool) {
	for _, s := range wasteStreams() {
		if strings.EqualFold(s.Name, name) {
			return s, true
		}
	}
	return WasteStream{}, false
}

// WasteShare is one component of a waste with its mass.
type WasteShare struct {
	Reactant Reactant
	Mass     Mass
	Solid    bool
}

// Streams of the table that the sorting below names.
const (
	streamChromiumVI      = "chromium(VI) aqueous, acidic"
	streamChromiumIII     = "chromium(III) aqueous after reduction"
	streamChromiumSludge  = "chromium hydroxide sludge"
	streamHalogenated     = "halogenated organic"
	streamOrganic         = "non-halogenated organic"
	streamOrganicAcid     = "organic acid residue"
	streamWash            = "aqueous bicarbonate or brine wash"
	streamDryingAgent     = "spent drying agent"
	streamSolidOxidiser   = "solid oxidiser waste"
	chromiumVITrace       = 1e-6 // mass share from which chromium(VI) decides: 1 mg/kg, this program's choice
	unknownTrace          = 0.01 // mass share below which what nobody assessed doesn't decide, this program's choice
	organicShareOfAqueous = 0.5  // from here on a liquid counts as organic, this program's choice
)

// WasteStreamOf names the stream that contents belong into, with the reason.
// Chromium(VI) decides first, because it must never meet organics; then
// halogenated solvents, chromium(III), solids, acids, and what is left. It
// reports false where no stream of the table takes the contents: then a
// competent person has to say where they go.
func WasteStreamOf(shares []WasteShare) (stream WasteStream, why string, ok bool) {
	name, why := sortWaste(shares)
	stream, ok = WasteStreamNamed(name)
	return stream, why, ok
}

func sortWaste(shares []WasteShare) (name, why string) {
	w := weighWaste(shares)
	switch {
	case w.total <= 0:
		return "", "nothing to sort"
	case w.share(w.chromiumVI) > chromiumVITrace:
		return streamChromiumVI, fmt.Sprintf("chromium(VI) compounds, %.3g %%", 100*w.share(w.chromiumVI))
	case w.share(w.halogenated) > 0.001: // 0.1 %, common practice
		return streamHalogenated, fmt.Sprintf("halogenated solvent, %.3g %%", 100*w.share(w.halogenated))
	case w.share(w.unknownMass) >= unknownTrace:
		return "", fmt.Sprintf("%s was not assessed (%.3g %%): ask the safety officer", w.unknown, 100*w.share(w.unknownMass))
	case w.oxidiser > 0 && w.share(w.solid) > 0.1:
		return streamSolidOxidiser, "a solid with an oxidiser"
	case w.chromiumIII > 0 && w.share(w.solid) > 0.1:
		return streamChromiumSludge, "a solid with chromium(III)"
	case w.chromiumIII > 0:
		return streamChromiumIII, "chromium(III) and no chromium(VI)"
	case w.share(w.solid) > 0.5:
		return streamDryingAgent, "a solid salt"
	case w.share(w.acid) > 0.2: // common practice: an acid residue, not a solvent with traces of it
		return streamOrganicAcid, fmt.Sprintf("carboxylic acids, %.3g %%", 100*w.share(w.acid))
	case w.share(w.organic+w.acid) > organicShareOfAqueous:
		return streamOrganic, fmt.Sprintf("organic liquid, %.3g %%", 100*w.share(w.organic+w.acid))
	case w.oxidiser > 0:
		return "", "an aqueous oxidiser that isn't chromium(VI): destroy what is left of it first"
	}
	return streamWash, "aqueous, no heavy metal"
}

// wasteMasses are the masses that decide, in kilograms.
type wasteMasses struct {
	total, chromiumVI, chromiumIII, halogenated, oxidiser, solid, acid, organic, unknownMass float64
	unknown                                                                                  string // the last one
}

func (w wasteMasses) share(m float64) float64 { return m / w.total }

func weighWaste(shares []WasteShare) wasteMasses {
	var w wasteMasses
	for _, s := range shares {
		m := float64(s.Mass)
		if m <= 0 {
			continue
		}
		w.total += m
		r := s.Reactant
		switch {
		case isChromateVI(r):
			w.chromiumVI += m
		case named(r, "chromium"):
			w.chromiumIII += m
		case inGroup(r, 17):
			w.halogenated += m
		case inGroup(r, 104):
			w.oxidiser += m
		case inGroup(r, 3):
			w.acid += m
		case inGroup(r, 4, 5, 13, 14, 16, 19, 28, 29, 101):
			w.organic += m
		case !r.Assessed:
			w.unknown = r.Name
			w.unknownMass += m
		}
		if s.Solid {
			w.solid += m
		}
	}
	return w
}

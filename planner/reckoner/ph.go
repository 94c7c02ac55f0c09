package reckoner

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"stillroom/chem"
)

func phSum() Sum {
	return Sum{
		Name: "ph", Title: "pH of a mixture", Group: solutionGroup,
		About: "Gives the pH of any mixture of acids, bases and salts in water, and every species in it.",
		Keys: []Key{
			{"mix", "Substances with their concentrations", "acetic acid: 0.1 mol/L; sodium acetate: 0.05 mol/L", false},
			{"temperature", "Temperature; 25 °C if none is given", "25 °C", true},
			{"pka", "pKa of what the table lacks, steps parted by a slash, with the name where several are meant", "4.76, or malonic acid: 2.85/5.70", true},
			{"carbon_dioxide", "Pressure of carbon dioxide above the solution, where it may leave: 101.325 kPa while it bubbles, 0.04 kPa in air", "101.325 kPa", true},
			{"charge", "Charge of what the table lacks when all its protons are on: 0 for an acid, 1 for an amine", "0", true},
		},
		Gives:   []string{"pH", "one row for each species"},
		Example: []string{"mix=acetic acid: 0.1 mol/L; sodium acetate: 0.05 mol/L"},
		Range:   "0 to 100 °C; activities as concentrations, so 0.1 to 0.2 off above 0.1 mol/L; pKa moved from 25 °C where their enthalpies are known; pH_activity up to an ionic strength of 0.5 mol/L",
		Source:  "charge balance (OpenStax Chemistry 2e, 14.4 to 14.6); Kw: Marshall and Franck 1981; activities: Davies 1962",
		Run:     runPH,
	}
}

// mixture is what a list of substances becomes in water.
type mixture struct {
	acids        []chem.Protolyte
	strong, ions chem.Concentration
	sources      []string
}

func runPH(_ context.Context, args Args) (Answer, error) {
	t, notes := chem.Celsius(25), []string{"no temperature given: 25 °C"}
	if args.Has("temperature") {
		given, err := args.Temperature("temperature")
		if err != nil {
			return Answer{}, err
		}
		t, notes = given, nil
	}
	mix, err := readMixture(args, t)
	if err != nil {
		return Answer{}, err
	}
	var gas []Result
	if args.Has("carbon_dioxide") {
		if gas, err = mix.degas(args, t); err != nil {
			return Answer{}, err
		}
	}
	pH, err := chem.PH(mix.acids, mix.strong, t)
	if err != nil {
		return Answer{}, err
	}
	answer := Answer{Notes: append(notes, mix.sources...), Derivation: chem.DerivePH(mix.acids, mix.strong, t, pH)}
	answer.Results = append([]Result{Number("pH", pH, "")}, speciesRows(mix, pH, t)...)
	answer.Results = append(answer.Results, gas...)
	if beta, err := chem.BufferCapacity(mix.acids, pH, t); err == nil {
		answer.Results = append(answer.Results, Number("buffer_capacity", beta.MolesPerLitre(), "mol/L per pH"))
	}
	switch active, err := chem.PHDavies(mix.acids, mix.strong, mix.ions, t); {
	case err == nil:
		answer.Results = append(answer.Results, Number("pH_activity", active.PH, ""),
			Number("ionic_strength", active.IonicStrength.MolesPerLitre(), "mol/L"))
	default:
		answer.Notes = append(answer.Notes, err.Error())
	}
	return answer, nil
}

// carbonicAcid is the name under which carbonates are in the mixture.
const carbonicAcid = "carbonic acid"

// degas lets carbon dioxide leave until the rest is in equilibrium with its pressure,
// and says how much left.
func (m *mixture) degas(args Args, t chem.Temperature) ([]Result, error) {
	p, err := args.Pressure("carbon_dioxide")
	if err != nil {
		return nil, err
	}
	open := chem.Solution{Strong: m.strong, Volume: chem.Litre, At: t}
	var carbon *chem.Protolyte
	for i := range m.acids {
		if m.acids[i].Name == carbonicAcid {
			carbon = &m.acids[i]
			continue
		}
		open.Mix = append(open.Mix, m.acids[i])
	}
	if carbon == nil {
		return nil, &KeyError{Key: "carbon_dioxide", Text: args["carbon_dioxide"], What: "there is no carbonate in the mixture", Wanted: "leave it out", Cause: chem.ErrNoData}
	}
	out, err := open.Degas(chem.Amount(carbon.C)*chem.Amount(chem.Litre), p)
	if err != nil {
		return nil, err
	}
	carbon.C = out.Left
	return []Result{
		Number("carbon_dioxide_given_off", float64(out.Evolved), "mol per litre"),
		Number("gas_volume", chem.GasVolume(out.Evolved, t, chem.Atmosphere).Litres(), "L per litre"),
	}, nil
}

// speciesRows gives the concentration of every form at the pH.
func speciesRows(mix mixture, pH float64, t chem.Temperature) []Result {
	h, oh := chem.WaterIons(pH, t)
	rows := []Result{Number("H^+", h.MolesPerLitre(), "mol/L"), Number("OH^-", oh.MolesPerLitre(), "mol/L")}
	for _, p := range mix.acids {
		for i, share := range chem.Ionised(p.PKa, pH) {
			name := fmt.Sprintf("%s (%s)", p.Name, chargeText(p.Charge-i))
			rows = append(rows, Number(name, float64(share)*p.C.MolesPerLitre(), "mol/L"))
		}
	}
	return rows
}

// chargeText writes a charge as on an ion: "0", "1+", "2-".
func chargeText(z int) string {
	switch {
	case z > 0:
		return fmt.Sprintf("%d+", z)
	case z < 0:
		return fmt.Sprintf("%d-", -z)
	}
	return "0"
}

// mostConcentrated is more than pure water, of which most molecules fit in a litre.
const mostConcentrated = 60 * chem.MolePerLitre

// readMixture reads the key mix; forms of one acid are put together.
func readMixture(args Args, t chem.Temperature) (mixture, error) {
	pairs, err := args.Pairs("mix")
	if err != nil {
		return mixture{}, err
	}
	own, err := ownConstants(args, pairs)
	if err != nil {
		return mixture{}, err
	}
	var mix mixture
	for _, pair := range pairs {
		c, err := ReadPair("mix", pair, chem.ParseConcentration)
		if err != nil {
			return mixture{}, err
		}
		if c > mostConcentrated {
			return mixture{}, &KeyError{Key: "mix", Text: pair.Name + ": " + pair.Value, What: "more than a litre holds", Wanted: "give at most 60 mol/L", Cause: chem.ErrOutOfRange}
		}
		if p, ok := own[strings.ToLower(pair.Name)]; ok {
			mix.addOwn(p, c)
			continue
		}
		if err := mix.dissolve(pair.Name, c, t); err != nil {
			return mixture{}, &KeyError{Key: "mix", Text: pair.Name, Cause: err}
		}
	}
	return mix, nil
}

// add puts an acid to its other forms, if they are there already.
func (m *mixture) add(p chem.Protolyte, source string) {
	for i := range m.acids {
		if m.acids[i].Name == p.Name {
			m.acids[i].C += p.C
			return
		}
	}
	m.acids = append(m.acids, p)
	m.sources = append(m.sources, source)
}

// addOwn adds an acid, or its salt, with constants that were given. A salt's metal ions
// count as many acids as it takes to hold them.
func (m *mixture) addOwn(p chem.Protolyte, c chem.Concentration) {
	formula := p.Name
	if s, ok := chem.LookupSubstance(p.Name); ok {
		formula = s.Formula
	}
	count := 1.0
	if f, err := chem.ParseFormula(formula); err == nil {
		charge, ions := chem.StrongIonsOf(f)
		m.strong += c * chem.Concentration(charge)
		m.ions += c * chem.Concentration(ions)
		count = max(1, math.Ceil(charge/float64(len(p.PKa))))
	}
	p.C = c * chem.Concentration(count)
	m.add(p, "pKa of "+p.Name+": given")
}

// dissolve adds a substance of the table, or a formula.
func (m *mixture) dissolve(name string, c chem.Concentration, t chem.Temperature) error {
	e, err := electrolyteOf(name)
	if err != nil {
		return err
	}
	m.strong += c * chem.Concentration(e.Strong)
	m.ions += c * chem.Concentration(e.Ions)
	for _, a := range e.Acids {
		pKa, moved := a.Acid.PKaAt(t)
		note := "pKa of " + a.Acid.Name + " " + joinNumbers(pKa) + ": " + strings.Join(slices.Compact(slices.Clone(a.Acid.Sources)), "; ")
		if d := t.Celsius() - 25; !moved && (d > 5 || d < -5) {
			note += "; at 25 °C, as its enthalpy of dissociation isn't known"
		}
		m.add(chem.Protolyte{Name: a.Acid.Name, PKa: pKa, Charge: a.Acid.Charge, C: c * chem.Concentration(a.Count)}, note)
	}
	return nil
}

// electrolyteOf takes a substance of the table, a formula or a salt by name apart.
func electrolyteOf(name string) (chem.Electrolyte, error) {
	if s, ok := chem.LookupSubstance(name); ok {
		f, _ := chem.ParseFormula(s.Formula)
		e, err := chem.ElectrolyteOf(s.Name, s.CAS, f)
		if err == nil {
			return e, nil
		}
		if salt, ok := chem.ElectrolyteOfSalt(s.Name); ok {
			return salt, nil
		}
		return e, err
	}
	if a, ok := chem.AcidByName(name); ok {
		return chem.Electrolyte{Acids: []chem.AcidCount{{Acid: a, Count: 1}}}, nil
	}
	if e, ok := chem.ElectrolyteOfSalt(name); ok {
		return e, nil
	}
	f, err := chem.ParseFormula(name)
	if err != nil {
		return chem.Electrolyte{}, &chem.DataError{Of: "acid dissociation of " + name, Err: chem.ErrNoData, Remedy: fmt.Sprintf("check the spelling, or give pka=%q", name+": 4.76")}
	}
	return chem.ElectrolyteOf(name, "", f)
}

func joinNumbers(xs []float64) string {
	texts := make([]string, len(xs))
	for i, x := range xs {
		texts[i] = fmt.Sprintf("%.4g", x)
	}
	return strings.Join(texts, ", ")
}

// ownConstants reads the key pka: constants without a name belong to the one
// substance of the mixture that the table lacks, or to the only one there is.
func ownConstants(args Args, pairs []Pair) (map[string]chem.Protolyte, error) {
	own := map[string]chem.Protolyte{}
	if !args.Has("pka") {
		return own, nil
	}
	charge := 0
	if args.Has("charge") {
		x, err := args.Number("charge")
		if err != nil {
			return nil, err
		}
		if charge = int(x); float64(charge) != x || charge < -10 || charge > 10 {
			return nil, &KeyError{Key: "charge", Text: args["charge"], What: "not a whole number from -10 to 10", Wanted: "write 0 for an acid, 1 for an amine", Cause: chem.ErrOutOfRange}
		}
	}
	if !strings.Contains(args["pka"], ":") {
		name, err := lacking(pairs)
		if err != nil {
			return nil, err
		}
		pKa, err := readConstants(strings.ReplaceAll(args["pka"], ";", "/"))
		own[strings.ToLower(name)] = chem.Protolyte{Name: name, PKa: pKa, Charge: charge}
		return own, err
	}
	named, err := args.Pairs("pka")
	if err != nil {
		return nil, err
	}
	for _, n := range named {
		pKa, err := readConstants(n.Value)
		if err != nil {
			return nil, err
		}
		own[strings.ToLower(n.Name)] = chem.Protolyte{Name: n.Name, PKa: pKa, Charge: charge}
	}
	return own, nil
}

// readConstants reads pKa parted by slashes, in the order of the steps.
func readConstants(text string) ([]float64, error) {
	var pKa []float64
	for _, part := range strings.Split(text, "/") {
		x, err := chem.ParseNumber(part)
		if err != nil {
			return nil, &KeyError{Key: "pka", Text: text, Cause: err}
		}
		pKa = append(pKa, x)
	}
	return pKa, nil
}

// lacking returns the one substance that the table can't take apart, or the only one.
func lacking(pairs []Pair) (string, error) {
	if len(pairs) == 1 {
		return pairs[0].Name, nil
	}
	var names []string
	for _, p := range pairs {
		var trial mixture
		if err := trial.dissolve(p.Name, 1, chem.Celsius(25)); errors.Is(err, chem.ErrNoData) {
			names = append(names, p.Name)
		}
	}
	if len(names) == 1 {
		return names[0], nil
	}
	return "", &KeyError{Key: "pka", What: "it isn't clear which substance it belongs to", Wanted: fmt.Sprintf("write pka=%q", pairs[0].Name+": 4.76"), Cause: chem.ErrAmbiguous}
}

package reckoner

import (
	"context"
	"errors"
	"fmt"
	"strings"

	"stillroom/chem"
	"stillroom/planner"
)

// hazardSums are the sums on hazards and carriers.
func hazardSums() []Sum { return []Sum{classifySum(), carriersSum()} }

func classifySum() Sum {
	return Sum{
		Name: "classify", Title: "Hazards of a mixture", Group: "Hazards and carrying",
		About: "Classifies a mixture from the records of its ingredients and says which sums led there.",
		Keys: []Key{
			{"mix", "Ingredients with their mass fractions", "acetic acid: 12 % w/w; water: 88 % w/w", false},
			{"ph", "pH of the mixture, if it was measured", "1.5", true},
		},
		Gives:   []string{"classes", "statements", "pictograms", "signal", "unknown", "physical", "one row for each sum"},
		Example: []string{"mix=acetic acid: 12 % w/w; water: 88 % w/w"},
		Range:   "health and environmental classes; physical hazards need a test and are only listed for the worst ingredient",
		Source:  "UN GHS with the categories of EU CLP 1272/2008, Annex I; each row names its rule",
		Run:     runClassify,
	}
}

func runClassify(_ context.Context, args Args) (Answer, error) {
	pairs, err := args.Pairs("mix")
	if err != nil {
		return Answer{}, err
	}
	var options chem.MixtureOptions
	if args.Has("ph") {
		options.HasPH = true
		if options.PH, err = args.Number("ph"); err != nil {
			return Answer{}, err
		}
	}
	var ingredients []chem.Ingredient
	for _, p := range pairs {
		w, err := ReadPair("mix", p, chem.ParseFraction)
		if err != nil {
			return Answer{}, err
		}
		s, _ := chem.LookupSubstance(p.Name) // nil is unknown, and the classification says so
		ingredients = append(ingredients, chem.IngredientOf(p.Name, s, w))
	}
	got, err := chem.ClassifyMixtureWith(ingredients, options)
	if err != nil {
		return Answer{}, &KeyError{Key: "mix", Text: args["mix"], Cause: err}
	}
	return classifyAnswer(got, ingredients), nil
}

func classifyAnswer(got chem.Classification, ingredients []chem.Ingredient) Answer {
	answer := Answer{
		Results: []Result{
			words("classes", got.Classes), words("statements", got.Statements), words("pictograms", got.Pictograms),
			words("signal", []string{got.Signal}), Number("unknown", got.Unknown.Percent(), "% w/w"),
			untested(got.Physical),
		},
		Notes: append([]string{"by " + string(got.System)}, got.Notes...),
	}
	for _, in := range ingredients {
		if in.Known && in.Hazard.Unverified {
			answer.Notes = append(answer.Notes, in.Name+": classification from memory, unverified: read the supplier's sheet")
		}
	}
	var inserted []string
	for _, r := range got.Reasons {
		answer.Results = append(answer.Results, Result{Name: r.Class, IsText: true, Text: r.Text() + " (" + r.Rule + ")"})
		inserted = append(inserted, r.Class+": "+r.Text())
	}
	answer.Notes = append(answer.Notes, "a calculation from records; tests on the mixture, expert judgement and local law go first")
	answer.Derivation = chem.Derivation{Of: "classification of the mixture", Formula: "Σ C/L ≥ 1; 100 / ATE = Σ C/ATE; Σ C·M ≥ 25 %",
		Inserted: strings.Join(inserted, "; "), Range: "mass fractions in per cent", Source: "CLP 1272/2008 Annex I, parts 3 and 4"}
	return answer
}

// untested says what the physical hazards may be when nobody tested the mixture.
func untested(physical []string) Result {
	text := "no others on record"
	if len(physical) > 0 {
		text = "not determined; treat as " + strings.Join(physical, "; ")
	}
	return Result{Name: "physical", Text: text, IsText: true}
}

// words is a text result of a list; "none" if it is empty, so that no field is
// ever blank.
func words(name string, list []string) Result {
	text := strings.Join(list, "; ")
	if text == "" {
		text = "none"
	}
	return Result{Name: name, Text: text, IsText: true}
}

func carriersSum() Sum {
	return Sum{
		Name: "carriers", Title: "Fewest carriers", Group: "Hazards and carrying",
		About: "Groups bottles into the fewest carriers so that none holds two that must not meet.",
		Keys: []Key{
			{"items", "What to carry, with a mass each if it matters", "a: 1.2 kg; b: 0.4 kg; c: 0.5 kg", false},
			{"conflicts", "Pairs that must travel apart", "a-b; b-c", true},
			{"most", "Most items in one carrier", "6", true},
			{"weight", "Most mass in one carrier", "5 kg", true},
		},
		Gives:   []string{"carriers", "one row for each group"},
		Example: []string{"items=acid; base; solvent; salt", "conflicts=acid-base; acid-solvent", "most=3"},
		Range:   "exact; says so if a very large one could not be proven",
		Source:  "vertex colouring with bounded classes by branch and bound (Brélaz, Comm. ACM 22, 251, 1979)",
		Run:     runCarriers,
	}
}

func runCarriers(_ context.Context, args Args) (Answer, error) {
	pairs, err := args.Items("items")
	if err != nil {
		return Answer{}, err
	}
	var items []planner.CarrierItem
	index := map[string]int{}
	for i, p := range pairs {
		it := planner.CarrierItem{Code: p.Name, Walk: i}
		if p.Value != "" {
			if it.Mass, err = ReadPair("items", p, chem.ParseMass); err != nil {
				return Answer{}, err
			}
		}
		index[strings.ToLower(p.Name)] = i
		items = append(items, it)
	}
	apart, err := conflictsOf(args, index)
	if err != nil {
		return Answer{}, err
	}
	limits, err := carrierLimits(args)
	if err != nil {
		return Answer{}, err
	}
	carriers, err := planner.GroupCarriers(items, func(i, j int) bool { return apart[[2]int{i, j}] }, limits)
	if err != nil && !errors.Is(err, planner.ErrCarriersNotProven) {
		return Answer{}, err
	}
	return carriersAnswer(carriers, len(items), err), nil
}

func carriersAnswer(carriers []planner.Carrier, items int, unproven error) Answer {
	answer := Answer{Results: []Result{Number("carriers", float64(len(carriers)), "")}}
	for _, c := range carriers {
		answer.Results = append(answer.Results, words(fmt.Sprintf("carrier %d", c.N), c.Bottles))
		if c.Note != "" {
			answer.Notes = append(answer.Notes, fmt.Sprintf("carrier %d: %s", c.N, c.Note))
		}
	}
	if unproven != nil {
		answer.Notes = append(answer.Notes, unproven.Error())
	} else {
		answer.Notes = append(answer.Notes, "fewer carriers are impossible with these conflicts and limits")
	}
	answer.Derivation = chem.Derivation{Of: "carriers", Formula: "fewest classes of a colouring of the conflict graph within count and mass",
		Inserted: fmt.Sprintf("%d items in %d carriers", items, len(carriers)), Value: float64(len(carriers)),
		Source: "branch and bound (Brélaz, Comm. ACM 22, 251, 1979)"}
	return answer
}

func carrierLimits(args Args) (planner.CarrierLimits, error) {
	var l planner.CarrierLimits
	if args.Has("most") {
		n, err := args.Number("most")
		if err != nil {
			return l, err
		}
		if n < 1 || n != float64(int(n)) {
			return l, &KeyError{Key: "most", Text: args["most"], What: "no whole number of items", Wanted: "write 1 or more", Cause: chem.ErrOutOfRange}
		}
		l.MostCount = int(n)
	}
	if args.Has("weight") {
		m, err := args.Mass("weight")
		if err != nil {
			return l, err
		}
		if m <= 0 {
			return l, &KeyError{Key: "weight", Text: args["weight"], What: "no mass a carrier can hold", Wanted: "write more than 0", Cause: chem.ErrOutOfRange}
		}
		l.MostMass = m
	}
	return l, nil
}

// conflictsOf reads "a-b; b-c". A hyphen inside a name is told from the one
// between two names by the items.
func conflictsOf(args Args, index map[string]int) (map[[2]int]bool, error) {
	apart := map[[2]int]bool{}
	if !args.Has("conflicts") {
		return apart, nil
	}
	list, err := args.List("conflicts")
	if err != nil {
		return nil, err
	}
	for _, text := range list {
		a, b, ok := cutConflict(text, index)
		if !ok || a == b {
			return nil, &KeyError{Key: "conflicts", Text: text, What: "not two of the items with a hyphen between", Wanted: "write a-b; b-c with names from items", Cause: chem.ErrSyntax}
		}
		apart[[2]int{a, b}], apart[[2]int{b, a}] = true, true
	}
	return apart, nil
}

func cutConflict(text string, index map[string]int) (a, b int, ok bool) {
	for i := range len(text) {
		if text[i] != '-' {
			continue
		}
		a, okA := index[strings.ToLower(strings.TrimSpace(text[:i]))]
		b, okB := index[strings.ToLower(strings.TrimSpace(text[i+1:]))]
		if okA && okB {
			return a, b, true
		}
	}
	return 0, 0, false
}

package reckoner

import (
	"context"
	"encoding/json"
	"strings"

	"stillroom/chem"
)

// Reckon runs the sum of a name. The error is a *SumError for an unknown sum and
// a *KeyError for an input that is missing, unknown or not understood; whatever
// the sum itself refuses comes back as it is.
func Reckon(ctx context.Context, name string, args Args) (Answer, error) {
	s, ok := SumByName(name)
	if !ok {
		return Answer{}, unknownSum(name)
	}
	return s.Reckon(ctx, args)
}

// Reckon checks that the keys are known and none is missing, runs the sum, and
// checks that every result is a number.
func (s Sum) Reckon(ctx context.Context, args Args) (Answer, error) {
	kept := make(Args, len(args))
	for _, key := range args.sorted() {
		if !s.hasKey(key) {
			return Answer{}, s.unknownKey(key)
		}
		if text := strings.TrimSpace(args[key]); text != "" {
			kept[key] = text
		}
	}
	for _, k := range s.Keys {
		if !k.Optional && !kept.Has(k.Name) {
			return Answer{}, missing(k.Name, k.Hint)
		}
	}
	answer, err := s.Run(ctx, kept)
	if err != nil {
		return Answer{}, err
	}
	answer.Sum = s.Name
	for _, r := range answer.Results {
		if !r.IsText && !chem.Finite(r.Value) {
			return Answer{}, &SumError{Sum: s.Name, What: r.Name + " comes out as no number", Wanted: "check the inputs for values far out of the ordinary"}
		}
	}
	return answer, nil
}

func (s Sum) hasKey(name string) bool {
	for _, k := range s.Keys {
		if k.Name == name {
			return true
		}
	}
	return false
}

// Result returns the result of a name.
func (a Answer) Result(name string) (Result, bool) {
	for _, r := range a.Results {
		if r.Name == name {
			return r, true
		}
	}
	return Result{}, false
}

// MarshalJSON writes the answer as scripts read it:
//
//	{"sum": "…", "results": [{"name": "…", "value": 1.5, "unit": "g"}], "notes": []}
//
// A text result has its text as the value. Numbers are not rounded.
func (a Answer) MarshalJSON() ([]byte, error) {
	type result struct {
		Name  string `json:"name"`
		Value any    `json:"value"`
		Unit  string `json:"unit"`
	}
	results := make([]result, len(a.Results))
	for i, r := range a.Results {
		results[i] = result{r.Name, r.Value, r.Unit}
		if r.IsText {
			results[i].Value = r.Text
		}
	}
	notes := a.Notes
	if notes == nil {
		notes = []string{}
	}
	return json.Marshal(struct {
		Sum     string   `json:"sum"`
		Results []result `json:"results"`
		Notes   []string `json:"notes"`
	}{a.Sum, results, notes})
}

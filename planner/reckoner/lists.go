package reckoner

import (
	"strings"

	"stillroom/chem"
)

// Pair is one item of a list with its value, such as "acetic acid" and "12 %".
type Pair struct{ Name, Value string }

// List reads items parted by ";". Blank items are left out; none at all is a
// *KeyError.
func (a Args) List(key string) ([]string, error) {
	text, err := a.Text(key)
	if err != nil {
		return nil, err
	}
	var items []string
	for item := range strings.SplitSeq(text, ";") {
		if item = strings.TrimSpace(item); item != "" {
			items = append(items, item)
		}
	}
	if len(items) == 0 {
		return nil, &KeyError{Key: key, Text: text, What: "no item in the list", Wanted: "part items by ;", Cause: ErrMissingKey}
	}
	return items, nil
}

// Items reads a list whose items may have a value behind their last colon: "a; b",
// "a: 1.2 kg; b: 0.4 kg". The same name twice is refused.
func (a Args) Items(key string) ([]Pair, error) {
	items, err := a.List(key)
	if err != nil {
		return nil, err
	}
	var pairs []Pair
	seen := map[string]bool{}
	for _, item := range items {
		name, value := item, ""
		if i := strings.LastIndex(item, ":"); i >= 0 {
			name, value = strings.TrimSpace(item[:i]), strings.TrimSpace(item[i+1:])
		}
		if name == "" {
			return nil, &KeyError{Key: key, Text: item, What: "an item without its name", Wanted: "write name: value", Cause: chem.ErrSyntax}
		}
		if seen[strings.ToLower(name)] {
			return nil, &KeyError{Key: key, Text: name, What: "listed twice", Wanted: "list each once", Cause: chem.ErrAmbiguous}
		}
		seen[strings.ToLower(name)] = true
		pairs = append(pairs, Pair{name, value})
	}
	return pairs, nil
}

// Pairs reads a list in which every item has a value: "acetic acid: 12 %; water: 88 %".
func (a Args) Pairs(key string) ([]Pair, error) {
	pairs, err := a.Items(key)
	for _, p := range pairs {
		if p.Value == "" {
			return nil, &KeyError{Key: key, Text: p.Name, What: "no value", Wanted: "write " + p.Name + ": value", Cause: chem.ErrNoNumber}
		}
	}
	return pairs, err
}

// Numbers reads a list of pure numbers, such as "8.07; 1730.6; 233.4".
func (a Args) Numbers(key string) ([]float64, error) {
	items, err := a.List(key)
	if err != nil {
		return nil, err
	}
	numbers := make([]float64, len(items))
	for i, item := range items {
		if numbers[i], err = chem.ParseNumber(item); err != nil {
			return nil, &KeyError{Key: key, Text: a[key], Cause: err}
		}
	}
	return numbers, nil
}

// ReadPair turns the value of a pair into a quantity; the *KeyError names the key
// and the item.
func ReadPair[T any](key string, p Pair, parse func(string) (T, error)) (T, error) {
	value, err := parse(p.Value)
	if err != nil {
		var none T
		return none, &KeyError{Key: key, Text: p.Name, Cause: err}
	}
	return value, nil
}

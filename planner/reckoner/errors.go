package reckoner

import (
	"errors"
	"fmt"
	"strings"
)

// Kinds of refusal, for errors.Is.
var (
	ErrUnknownSum       = errors.New("unknown sum")
	ErrUnknownKey       = errors.New("unknown key")
	ErrMissingKey       = errors.New("missing key")
	ErrUnknownSubstance = errors.New("unknown substance")
)

// KeyError says which input is wrong, how it was typed, and what would do.
type KeyError struct {
	Key    string
	Text   string // as typed; empty if missing
	What   string // what is wrong; empty if Cause says it all
	Wanted string // what would do
	Cause  error
}

func (e *KeyError) Error() string {
	var b strings.Builder
	fmt.Fprintf(&b, "key %q", e.Key)
	switch {
	case e.What == "" && e.Cause != nil:
		fmt.Fprintf(&b, ": %v", e.Cause)
	case e.Text == "":
		fmt.Fprintf(&b, ": %s", e.What)
	default:
		fmt.Fprintf(&b, ": %q: %s", e.Text, e.What)
	}
	if e.Wanted != "" {
		b.WriteString("; " + e.Wanted)
	}
	return b.String()
}

// Unwrap returns the cause: a kind above or the error of what was read.
func (e *KeyError) Unwrap() error { return e.Cause }

// SumError says what is wrong with a sum as a whole.
type SumError struct {
	Sum    string
	What   string
	Wanted string
	Cause  error
}

func (e *SumError) Error() string { return fmt.Sprintf("sum %q: %s; %s", e.Sum, e.What, e.Wanted) }

// Unwrap returns the kind.
func (e *SumError) Unwrap() error { return e.Cause }

// hints are examples for keys that a sum asks for only beside others.
var hints = map[string]string{
	"substance": "1-pentanol", "formula": "C5H12O", "pka": "4.83", "ph": "2", "heat_capacity": "3.0 J/(g K)", "mass": "1.5 kg",
	"rise": "25 K", "solvent": "ethyl acetate", "density": "1.05 g/mL",
}

// hintOf gives an example of a key's value.
func hintOf(key string) string {
	if hint, ok := hints[key]; ok {
		return hint
	}
	return "…"
}

func unknownSum(name string) error {
	var names []string
	for _, s := range Sums() {
		names = append(names, s.Name)
	}
	return &SumError{name, "there is no such sum", "known are " + strings.Join(names, ", "), ErrUnknownSum}
}

func (s Sum) unknownKey(key string) error {
	var names []string
	for _, k := range s.Keys {
		names = append(names, k.Name)
	}
	return &KeyError{Key: key, What: s.Name + " has no such key", Wanted: "its keys are " + strings.Join(names, ", "), Cause: ErrUnknownKey}
}

func missing(key, hint string) error {
	return &KeyError{Key: key, What: "missing", Wanted: fmt.Sprintf("give %s=%q", key, hint), Cause: ErrMissingKey}
}

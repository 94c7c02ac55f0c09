package main

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"os/exec"
	"strconv"
	"strings"

	"github.com/rogpeppe/go-internal/testscript"
)

func exitCodeOf(err error) string {
	var exit *exec.ExitError
	if errors.As(err, &exit) {
		return strconv.Itoa(exit.ExitCode())
	}
	return err.Error()
}

// checkJSON looks into the JSON last printed: "json needs.0.substance = water"
// compares text, "json scale.amount_mol ~ 0.72 1%" a number with a relative
// tolerance, "json needs[sodium dichromate].state" only wants it to be there.
// A list is entered by index or, in brackets, by the value of any of its
// members' text fields.
func checkJSON(ts *testscript.TestScript, neg bool, args []string) {
	if len(args) == 0 {
		ts.Fatalf("usage: json PATH [= TEXT | ~ NUMBER PERCENT%%]")
	}
	var doc any
	if err := json.Unmarshal([]byte(ts.ReadFile("stdout")), &doc); err != nil {
		ts.Fatalf("stdout is not JSON: %v", err)
	}
	got, err := descend(doc, args[0])
	if neg {
		if err == nil {
			ts.Fatalf("%s is there: %v", args[0], got)
		}
		return
	}
	ts.Check(err)
	if len(args) > 1 {
		ts.Check(compare(args[0], got, args[1:]))
	}
}

func compare(path string, got any, want []string) error {
	switch want[0] {
	case "=":
		if text := fmt.Sprint(got); text != strings.Join(want[1:], " ") {
			return fmt.Errorf("%s is %q, want %q", path, text, strings.Join(want[1:], " "))
		}
		return nil
	case "~":
		number, ok := got.(float64)
		value, err1 := strconv.ParseFloat(want[1], 64)
		percent, err2 := strconv.ParseFloat(strings.TrimSuffix(want[2], "%"), 64)
		if !ok || err1 != nil || err2 != nil {
			return fmt.Errorf("%s is %v: want a number and a tolerance in %%", path, got)
		}
		if math.Abs(number-value) > math.Abs(value)*percent/100 {
			return fmt.Errorf("%s is %v, want %v within %v %%", path, number, value, percent)
		}
		return nil
	}
	return fmt.Errorf("unknown comparison %q", want[0])
}

// descend follows a path such as needs[sodium dichromate].draws.0.mass_g.
func descend(doc any, path string) (any, error) {
	here := doc
	for _, key := range strings.Split(strings.ReplaceAll(path, "[", ".["), ".") {
		next, ok := child(here, key)
		if !ok {
			return nil, fmt.Errorf("%s: nothing at %q", path, key)
		}
		here = next
	}
	return here, nil
}

func child(here any, key string) (any, bool) {
	switch here := here.(type) {
	case map[string]any:
		v, ok := here[key]
		return v, ok
	case []any:
		if name, ok := strings.CutPrefix(key, "["); ok {
			return named(here, strings.TrimSuffix(name, "]"))
		}
		i, err := strconv.Atoi(key)
		if err != nil || i < 0 || i >= len(here) {
			return nil, false
		}
		return here[i], true
	}
	return nil, false
}

func named(list []any, name string) (any, bool) {
	for _, item := range list {
		object, _ := item.(map[string]any)
		for _, v := range object {
			if v == name {
				return item, true
			}
		}
	}
	return nil, false
}

package planner

import (
	"fmt"
	"reflect"
	"regexp"
	"strings"
	"testing"

	"stillroom/chem"
)

func TestWithoutPowers(t *testing.T) {
	for text, want := range map[string]string{
		fmt.Sprintf("%.3g g, %.3g mL", 1432.0, 998.0): "1430 g, 998 mL",
		fmt.Sprintf("%.2g g", 9.9e7):                  "99000000 g",
		fmt.Sprintf("%.4g mol", 9.745e-5):             "0.00009745 mol",
		fmt.Sprintf("%.3g of 1e-9", 2.5e-12):          "2.5e-12 of 1e-9",
	} {
		if got := withoutPowers(text); got != want {
			t.Errorf("withoutPowers(%q) = %q, want %q", text, got, want)
		}
	}
}

// No step of the program's recipes speaks in powers of ten, at any scale of a
// bench.
func TestStepsSpeakInPlainFigures(t *testing.T) {
	for _, r := range Recipes() {
		p, err := Compile(r)
		if err != nil {
			t.Fatal(err)
		}
		walk, err := p.Walk(labConditions(chem.Amount(5)))
		if err != nil {
			t.Errorf("%s at 5 mol: %v", r.Name, err)
			continue
		}
		for _, s := range walk.Steps {
			for _, say := range append(s.Says, s.Cautions...) {
				if strings.Contains(say, "e+") {
					t.Errorf("%s, step %d: %s", r.Name, s.N, say)
				}
			}
		}
	}
}

// Neither does a plan: no text in it, down to the arithmetic of its
// explanations, has a power of ten that a person would write out.
func TestPlansSpeakInPlainFigures(t *testing.T) {
	power := regexp.MustCompile(`[0-9]e(\+[0-9]|-0[1-6])`)
	texts := 0
	for _, r := range Recipes() {
		for _, target := range []float64{0.5, 50} {
			eachText(reflect.ValueOf(*demoPlan(t, r.Name, target, 44)), func(text string) {
				texts++
				if power.MatchString(text) {
					t.Errorf("%s, %g g: %s", r.Name, target, text)
				}
			})
		}
	}
	if texts == 0 {
		t.Error("no text looked at")
	}
}

// eachText visits every exported text of a value but the recipe's own.
func eachText(v reflect.Value, visit func(string)) {
	switch v.Kind() {
	case reflect.String:
		visit(v.String())
	case reflect.Slice:
		for i := range v.Len() {
			eachText(v.Index(i), visit)
		}
	case reflect.Pointer:
		if !v.IsNil() && v.Type() != reflect.TypeFor[*Recipe]() {
			eachText(v.Elem(), visit)
		}
	case reflect.Struct:
		for i := range v.NumField() {
			if v.Type().Field(i).IsExported() {
				eachText(v.Field(i), visit)
			}
		}
	}
}

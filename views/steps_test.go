package views

import (
	"strings"
	"testing"

	"stillroom/planner"
)

// The strip and the table below it give the same numbers, for every step: what
// goes in, what is inside at the fullest moment, how full, how warm, how much
// gas and how long.
func TestStepsInNumbers(t *testing.T) {
	s := newDemoServer(t)
	page := parse(t, get(t, s, "/runs/1"))
	rows := all(page, "table.steps tbody tr")
	vessels := all(page, "ol.strip li.v")
	if len(rows) == 0 || len(rows) != len(vessels) {
		t.Fatalf("%d rows for %d vessels", len(rows), len(vessels))
	}
	shelf, err := s.Lab.Load(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	run, _ := shelf.Run(1)
	recipe, _ := planner.RecipeByName(run.Recipe)
	plan, err := s.planKept(t.Context(), run, recipe, shelf)
	if err != nil {
		t.Fatal(err)
	}
	for i, step := range plan.Steps {
		row, vessel := text(rows[i]), text(vessels[i])
		both := []string{celsiusText(step.Temperature)}
		if step.Vessel.Size > 0 {
			both = append(both, volumePlain(step.Vessel.Size), fillText(step.Vessel.Fill))
		}
		if step.TimeNotAssessed {
			both = append(both, "not assessed")
		} else {
			both = append(both, timeText(step.Time))
		}
		if step.Gas.Litres() > 0.001 {
			both = append(both, volumeText(step.Gas))
		}
		both = append(both, intoLines(step.Adds)...)
		for _, want := range both {
			want = strings.Join(strings.Fields(want), " ")
			if !strings.Contains(row, want) || !strings.Contains(vessel, want) {
				t.Errorf("step %d: %q isn't in both\n%s\n%s", step.N, want, row, vessel)
			}
		}
		if inside := strings.Join(strings.Fields(insideText(step.Contents)), " "); inside != "" && !strings.Contains(vessel, inside) {
			t.Errorf("step %d doesn't say what is inside, %q: %s", step.N, inside, vessel)
		}
	}
}

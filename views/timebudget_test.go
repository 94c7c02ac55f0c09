package views

import (
	"strings"
	"testing"
	"time"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

func budget(t *testing.T, steps ...planner.StepReport) planner.TimeBudget {
	t.Helper()
	b, err := planner.TimeBudgetOf(steps, 1, inventory.NewDate(2027, time.January, 14), inventory.PolicyOf(inventory.PolicyDefaults(0)))
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// The delivered day is 08:30 to 17:00 with half an hour at noon; the times were
// worked out on paper.
func TestStartText(t *testing.T) {
	tests := []struct {
		name  string
		steps []planner.StepReport
		want  string
	}{
		{"to a hold point", []planner.StepReport{{N: 1, Name: "reflux", Time: 5 * chem.Hour, HoldPoint: true, HoldNote: "overnight"}, {N: 2, Name: "wash", Time: chem.Hour}},
			"Begin by 11:30 on Thursday 14 January 2027, and the hold point after step 1, reflux, is reached by 17:00."},
		{"to a hold point with a limit", []planner.StepReport{{N: 1, Name: "reflux", Time: 5 * chem.Hour, HoldPoint: true, HoldNote: "up to 16 h"}, {N: 2, Name: "wash", Time: 7 * chem.Hour}},
			"Begin from 11:00 to 11:30 on Thursday 14 January 2027, and the hold point after step 1, reflux, is reached by 17:00 and lasts no longer than 16 h until the next step."},
		{"to the end", []planner.StepReport{{N: 1, Name: "reflux", Time: chem.Hour}}, "Begin by 16:00 on Thursday 14 January 2027, and the last step is done by 17:00."},
		{"too long", []planner.StepReport{{N: 1, Name: "reflux", Time: 10 * chem.Hour}},
			"No start on Thursday 14 January 2027 is safe: step 1 takes 10 h in one go, and begun at 08:30 it is done at 19:00, after the day has ended at 17:00."},
		{"not assessed", []planner.StepReport{{N: 1, Name: "still", TimeNotAssessed: true}, {N: 2, Name: "cool", Time: chem.Hour, HoldPoint: true, HoldNote: "any time"}},
			"The last safe start is not assessed, because nobody has said how long step 1 takes. Without that it would be 16:00 on Thursday 14 January 2027 for the hold point after step 2, cool, to be reached by 17:00: begin well before."},
	}
	for _, tt := range tests {
		if got := plainSpaces(startText(budget(t, tt.steps...))); got != tt.want {
			t.Errorf("%s:\n got %s\nwant %s", tt.name, got, tt.want)
		}
	}
}

// A run of the demonstration lab says when to begin, on its page and on its
// pick list, and names every step whose time nobody knows.
func TestRunSaysWhenToBegin(t *testing.T) {
	s := newDemoServer(t)
	page := parse(t, get(t, s, "/runs/1"))
	words := text(one(t, page, "section[aria-labelledby=h-budget]"))
	for _, want := range []string{"Begin from", "hold point after step 5, reflux", "take: not assessed", "last safe start"} {
		if !strings.Contains(words, want) {
			t.Errorf("the time budget doesn't say %q: %s", want, words)
		}
	}
	rows := all(page, "section[aria-labelledby=h-budget] tbody tr")
	if len(rows) < 2 {
		t.Errorf("%d stretches, want one for every hold point and the rest", len(rows))
	}
}

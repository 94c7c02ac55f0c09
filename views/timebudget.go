package views

import (
	"fmt"
	"strconv"
	"strings"

	"stillroom/planner"
)

// budgetView is the time budget of a run in words and as a table.
type budgetView struct {
	Lead string // when to begin at the latest
	Rest string // how long it all takes, and what is not known
	Rows []stretchRow
}

// stretchRow is what has to be done in one go.
type stretchRow struct {
	Steps, Name, Time, When, Start, Stands string
	First                                  int // its first step
}

// budgetOf words a time budget; nil where none could be made.
func budgetOf(b planner.TimeBudget) *budgetView {
	if len(b.Stretches) == 0 {
		return nil
	}
	v := &budgetView{Lead: startText(b), Rest: benchText(b)}
	for _, s := range b.Stretches {
		v.Rows = append(v.Rows, newStretchRow(s, b.Batches > 1))
	}
	return v
}

// startText says by when the first stretch has to begin.
func startText(b planner.TimeBudget) string {
	s := b.Stretches[0]
	goal := "the hold point after step " + strconv.Itoa(s.Last) + ", " + s.Name + ", is reached"
	if s.Hold == "" {
		goal = "the last step is done"
	}
	ends := planner.ClockText(b.Day.End)
	switch {
	case !s.Fits:
		take, are := "take", "they are"
		if s.First == s.Last {
			take, are = "takes", "it is"
		}
		return fmt.Sprintf("No start on %s is safe: %s %s %s in one go, and begun at %s %s done at %s, after the day has ended at %s.",
			s.On.Long(), stepsText(s), take, atLeast(s)+timeText(s.Time), planner.ClockText(s.Begins), are, planner.ClockText(s.Done), ends)
	case len(s.NotAssessed) > 0:
		return fmt.Sprintf("The last safe start is not assessed, because nobody has said how long %s. Without that it would be %s on %s for %s by %s: begin well before.",
			takes(s.NotAssessed), planner.ClockText(s.LastStart), s.On.Long(), toReach(goal), ends)
	}
	begin := "Begin by " + planner.ClockText(s.LastStart)
	if s.NotBefore > 0 {
		begin = fmt.Sprintf("Begin from %s to %s", planner.ClockText(s.NotBefore), planner.ClockText(s.LastStart))
		ends += fmt.Sprintf(" and lasts no longer than %s until the next step", timeText(s.Longest))
	}
	return fmt.Sprintf("%s on %s, and %s by %s.", begin, s.On.Long(), goal, ends)
}

// toReach turns a goal that is reached into one to be reached.
func toReach(goal string) string {
	return strings.Replace(strings.Replace(goal, "is reached", "to be reached", 1), "is done", "to be done", 1)
}

// takes is the subject and verb of steps whose time isn't known.
func takes(steps []int) string {
	if len(steps) == 1 {
		return "step " + strconv.Itoa(steps[0]) + " takes"
	}
	words := make([]string, len(steps))
	for i, n := range steps {
		words[i] = strconv.Itoa(n)
	}
	return "steps " + strings.Join(words[:len(words)-1], ", ") + " and " + words[len(words)-1] + " take"
}

func benchText(b planner.TimeBudget) string {
	text := timeText(b.Bench) + " at the bench"
	if len(b.NotAssessed) > 0 {
		text += ", not counting how long " + takes(b.NotAssessed) + ": not assessed"
	}
	if b.Batches > 1 {
		text += ", for " + strconv.Itoa(b.Batches) + " batches one after the other"
	}
	last := b.Stretches[len(b.Stretches)-1]
	switch {
	case last.AtEarliest:
		text += ". The last day is " + last.On.Long() + " at the earliest."
	case last.Day > 1:
		text += ". The last day is " + last.On.Long() + "."
	default:
		text += "."
	}
	return text
}

func newStretchRow(s planner.Stretch, batches bool) stretchRow {
	row := stretchRow{Steps: stepsText(s), Name: s.Name, First: s.First, Time: atLeast(s) + timeText(s.Time), Stands: standsText(s)}
	if batches {
		row.Steps = "batch " + strconv.Itoa(s.Batch) + ", " + row.Steps
	}
	row.When = fmt.Sprintf("%s, %s to %s", s.On.Short(), planner.ClockText(s.Begins), planner.ClockText(s.Done))
	if s.AtEarliest {
		row.When += " at the earliest"
	}
	switch {
	case !s.Fits:
		row.Start = "no day holds it"
	case len(s.NotAssessed) > 0:
		row.Start = "not assessed; before " + planner.ClockText(s.LastStart)
	case s.NotBefore > 0:
		row.Start = planner.ClockText(s.LastStart) + ", not before " + planner.ClockText(s.NotBefore)
	default:
		row.Start = planner.ClockText(s.LastStart)
	}
	return row
}

func atLeast(s planner.Stretch) string {
	if len(s.NotAssessed) > 0 {
		return "at least "
	}
	return ""
}

func stepsText(s planner.Stretch) string {
	if s.First == s.Last {
		return "step " + strconv.Itoa(s.First)
	}
	return fmt.Sprintf("steps %d to %d", s.First, s.Last)
}

// standsText says where a stretch leaves the run.
func standsText(s planner.Stretch) string {
	switch {
	case s.Hold == "" && s.Ends:
		return "done"
	case s.Hold == "":
		return "–"
	case s.TooLong:
		return s.Hold + "; stands " + timeText(s.Waits) + ", too long"
	case s.Nights == 1:
		return s.Hold + "; stands one night"
	case s.Nights > 1:
		return fmt.Sprintf("%s; stands %d nights: see that it may for so long", s.Hold, s.Nights)
	}
	return s.Hold
}

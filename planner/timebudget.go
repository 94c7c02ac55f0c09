package planner

import (
	"errors"
	"fmt"
	"math"
	"regexp"
	"strconv"

	"stillroom/chem"
	"stillroom/inventory"
)

// ErrWorkingDay is the kind of a working day that can't be.
var ErrWorkingDay = errors.New("working day out of range")

// WorkingDay is when people are at the bench, as the policy table has it. Times
// of day are counted from midnight.
type WorkingDay struct {
	Start, End chem.Duration
	// BreakFrom and Break are the break in the middle of the day; a stretch that
	// runs over it takes that much longer.
	BreakFrom, Break chem.Duration
	// DaysAWeek are worked, from Monday on.
	DaysAWeek int
}

// TimeBudget is how the steps of a run fall on working days.
type TimeBudget struct {
	Day     WorkingDay
	Batches int
	// Bench is the time of all steps of all batches that have one. Where
	// NotAssessed lists steps it is only the least it can be.
	Bench       chem.Duration
	NotAssessed []int
	Stretches   []Stretch
}

// Stretch is what has to be done in one go: the steps after one hold point up
// to the next, or to the end of the run.
type Stretch struct {
	Batch       int // from 1
	First, Last int // numbers of its steps
	Name        string
	Time        chem.Duration
	NotAssessed []int
	// Hold says how long and how the run may stand after the last step; "" at
	// the end of a batch where the recipe names no hold point.
	Hold string
	Ends bool // the batch is done

	// Begins and Done are times of day on the Day-th working day, Done on the
	// same count of hours: 25 h is one in the morning of the next day.
	Day          int
	On           inventory.Date
	Begins, Done chem.Duration
	// LastStart is the time of day by which it has to begin, so that its last
	// step is done before the day ends.
	LastStart chem.Duration
	// Fits says that a working day holds it; otherwise LastStart is 0.
	Fits bool
	// Over is how far it runs past the end of the day.
	Over chem.Duration
	// AtEarliest says that it or a stretch before it has a step whose time is not
	// assessed: Day, Begins, Done and Fits are then the best case, and LastStart
	// is too late by that unknown time.
	AtEarliest bool
	// Nights is how many nights it stands at the hold point until the next
	// stretch begins, and Waits for how long.
	Nights int
	Waits  chem.Duration
	// Longest is how long it may stand there, as the hold point says with
	// "up to 16 h"; 0 where it says nothing. NotBefore is then the time of day
	// before which the stretch must not begin, so that it stands no longer; 0
	// where any time will do. TooLong says that no beginning on that day helps.
	Longest, NotBefore chem.Duration
	TooLong            bool
}

// TimeBudgetOf lays the steps of a run out over working days from on, one batch
// after the other, each stretch as early as it is sure to be done before the
// day ends. A stretch that no working day holds begins with a day and runs past
// its end. Steps without a time count nothing and are listed; they are not taken
// to be short. The error wraps ErrWorkingDay.
func TimeBudgetOf(steps []StepReport, batches int, on inventory.Date, policy inventory.Policy) (TimeBudget, error) {
	return timeBudget(steps, batches, on, newPolicyTable(policy))
}

func timeBudget(steps []StepReport, batches int, on inventory.Date, policy *policyTable) (TimeBudget, error) {
	day, err := workingDay(policy)
	if err != nil {
		return TimeBudget{}, err
	}
	b := TimeBudget{Day: day, Batches: max(batches, 1)}
	for batch := range b.Batches {
		b.Stretches = append(b.Stretches, stretchesOf(steps, batch+1)...)
	}
	for _, s := range b.Stretches {
		b.Bench += s.Time
		if s.Batch == 1 {
			b.NotAssessed = append(b.NotAssessed, s.NotAssessed...)
		}
	}
	b.lay(on)
	return b, nil
}

// workingDay reads the policy's rows and refuses a day that can't be.
func workingDay(t *policyTable) (WorkingDay, error) {
	hours := func(key string) chem.Duration { return chem.Duration(t.value(key)) * chem.Hour }
	d := WorkingDay{
		Start: hours("day.start"), End: hours("day.end"), BreakFrom: hours("day.break-from"), Break: hours("day.break"),
		DaysAWeek: int(t.value("day.week")),
	}
	refuse := func(key, what, would string) (WorkingDay, error) {
		return d, &RequestError{Field: "policy row " + key, Got: fmt.Sprintf("%g", t.value(key)), What: what, Would: would, Err: ErrWorkingDay}
	}
	switch {
	case !(d.Start >= 0):
		return refuse("day.start", "is before midnight", "give the hour at which work begins, such as 8.5")
	case !(d.End > d.Start && d.End <= 24*chem.Hour):
		return refuse("day.end", "isn't after the start of the day and by midnight", "give the hour at which work ends, such as 17")
	case !(d.Break >= 0):
		return refuse("day.break", "is less than nothing", "give its length in hours, or 0")
	case d.Break > 0 && !(d.BreakFrom >= d.Start && d.BreakFrom+d.Break <= d.End):
		return refuse("day.break-from", "doesn't lie within the day", "give an hour between start and end, such as 12")
	case d.DaysAWeek < 1 || d.DaysAWeek > 7:
		return refuse("day.week", "is no number of days from 1 to 7", "give the days worked from Monday on, such as 5")
	}
	return d, nil
}

// stretchesOf cuts the steps after every hold point.
func stretchesOf(steps []StepReport, batch int) []Stretch {
	var list []Stretch
	begin := true
	for i, s := range steps {
		if begin {
			list = append(list, Stretch{Batch: batch, First: s.N})
		}
		x := &list[len(list)-1]
		x.Last, x.Name, x.Ends = s.N, s.Name, i == len(steps)-1
		if s.TimeNotAssessed {
			x.NotAssessed = append(x.NotAssessed, s.N)
		} else {
			x.Time += max(s.Time, s.Shortest)
		}
		if begin = s.HoldPoint; begin {
			x.Hold = s.HoldNote
		}
	}
	return list
}

// lay gives every stretch its day and hours.
func (b *TimeBudget) lay(on inventory.Date) {
	day, now, doubt := 1, b.Day.Start, false
	for i := range b.Stretches {
		s := &b.Stretches[i]
		doubt = doubt || len(s.NotAssessed) > 0
		s.AtEarliest = doubt
		s.LastStart, s.Fits = b.Day.lastStart(s.Time)
		sure := s.Fits && now <= s.LastStart && len(s.NotAssessed) == 0
		if now > b.Day.Start && !sure {
			day, now = day+1, b.Day.Start
		}
		s.Day, s.On = day, b.Day.date(on, day)
		s.Begins = b.Day.atWork(now)
		s.Done = b.Day.after(s.Begins, s.Time)
		now = s.Done
		if !s.Fits {
			s.Over = s.Done - b.Day.End
			day, now = day+1+int(s.Done/(24*chem.Hour)), b.Day.Start
		}
		if i > 0 {
			before := &b.Stretches[i-1]
			before.Nights = int(s.On - before.On)
			before.Waits = chem.Duration(before.Nights)*24*chem.Hour + s.Begins - before.Done
			b.Day.limitWait(before)
		}
	}
}

// limitWait compares how long a stretch leaves the run standing with how long it
// may, and finds the time of day at which beginning it ends the wait in time.
func (d WorkingDay) limitWait(s *Stretch) {
	s.Longest = longestHold(s.Hold)
	if s.Longest == 0 || s.Waits <= s.Longest {
		return
	}
	begin := s.Done + s.Waits - s.Longest - s.Time
	if begin < d.BreakFrom+d.Break {
		begin -= d.Break
	}
	begin = chem.Duration(math.Ceil(begin.Minutes()-1e-6)) * chem.Minute
	if s.TooLong = !s.Fits || begin > s.LastStart; !s.TooLong {
		s.NotBefore = begin
	}
}

var holdLimit = regexp.MustCompile(`\bup to ([0-9]+(?:\.[0-9]+)?) ?(min|h|d|days?)\b`)

// longestHold reads how long a hold point allows: "up to 16 h, closed"; 0 where
// it doesn't say.
func longestHold(note string) chem.Duration {
	found := holdLimit.FindStringSubmatch(note)
	if found == nil {
		return 0
	}
	x, err := strconv.ParseFloat(found[1], 64)
	if err != nil {
		return 0
	}
	switch found[2] {
	case "min":
		return chem.Duration(x) * chem.Minute
	case "h":
		return chem.Duration(x) * chem.Hour
	}
	return chem.Duration(x) * 24 * chem.Hour
}

// lastStart is the latest time of day, down to the minute, at which work of a
// length may begin and be done before the day ends; false if the day doesn't
// hold it.
func (d WorkingDay) lastStart(work chem.Duration) (chem.Duration, bool) {
	t := d.End - work
	if t < d.BreakFrom+d.Break {
		t -= d.Break
	}
	if t < d.Start {
		return 0, false
	}
	whole := chem.Duration(math.Floor(t.Minutes()+1e-6)) * chem.Minute
	return max(whole, d.Start), true
}

// atWork moves a time within the break to its end.
func (d WorkingDay) atWork(t chem.Duration) chem.Duration {
	if t >= d.BreakFrom && t < d.BreakFrom+d.Break {
		return d.BreakFrom + d.Break
	}
	return t
}

// after is when work begun at a time of day outside the break is done.
func (d WorkingDay) after(begun, work chem.Duration) chem.Duration {
	if begun < d.BreakFrom && begun+work > d.BreakFrom {
		return begun + work + d.Break
	}
	return begun + work
}

// date is the n-th working day, counted from a day that is one itself, whatever
// day of the week it is.
func (d WorkingDay) date(first inventory.Date, n int) inventory.Date {
	for ; n > 1; n-- {
		first = first.AddDays(1)
		for !d.worked(first) {
			first = first.AddDays(1)
		}
	}
	return first
}

// worked reports whether a day of the week is worked.
func (d WorkingDay) worked(day inventory.Date) bool {
	fromMonday := (int(day.Time().Weekday()) + 6) % 7
	return fromMonday < d.DaysAWeek
}

// findings says of the first batch what no working day holds, and of the run
// whether it begins on a day that isn't worked.
func (b TimeBudget) findings() []Finding {
	var found []Finding
	for _, s := range b.Stretches {
		if s.TooLong && s.Batch == 1 {
			found = append(found, Finding{Kind: "hold-too-long", Severity: Warning, Step: s.Last,
				Text:  fmt.Sprintf("until the next working day the run stands at the hold point for %s, longer than the %s the recipe allows", hoursText(s.Waits), hoursText(s.Longest)),
				Would: "choose a day on which the next steps follow in time"})
		}
		if s.Fits || s.Batch > 1 {
			continue
		}
		take := "take "
		if len(s.NotAssessed) > 0 {
			take = "take at least "
		}
		found = append(found, Finding{Kind: "past-the-day", Severity: Warning, Step: s.Last,
			Text: fmt.Sprintf("%s have to be done in one go and %s; begun at %s they are done at %s, %s past the end of the day",
				stepsText(s.First, s.Last), take+hoursText(s.Time), ClockText(s.Begins), ClockText(s.Done), hoursText(s.Over)),
			Would: "have somebody take over who is named beforehand, or give the recipe a hold point between them"})
	}
	if len(b.Stretches) > 0 && !b.Day.worked(b.Stretches[0].On) {
		found = append(found, Finding{Kind: "not-a-working-day", Severity: Warning,
			Text:  b.Stretches[0].On.Long() + " isn't a day on which people are at the bench",
			Would: "choose a working day, or see that nobody works alone"})
	}
	return found
}

func stepsText(first, last int) string {
	if first == last {
		return fmt.Sprintf("the operations of step %d", first)
	}
	return fmt.Sprintf("steps %d to %d", first, last)
}

// ClockText writes a time of day counted from midnight, up to the next minute:
// 08:30. Past midnight it says how many days later.
func ClockText(t chem.Duration) string {
	minutes := int(math.Ceil(t.Minutes() - 1e-6)) // less is the noise of adding up
	days := minutes / (24 * 60)
	text := fmt.Sprintf("%02d:%02d", minutes/60%24, minutes%60)
	switch {
	case minutes == 24*60:
		return "24:00"
	case days == 1:
		return text + " the next day"
	case days > 1:
		return text + fmt.Sprintf(", %d days later", days)
	}
	return text
}

// hoursText writes a length of time to the minute.
func hoursText(d chem.Duration) string {
	minutes := int(math.Ceil(d.Minutes() - 1e-9))
	return fmt.Sprintf("%d h %02d min", minutes/60, minutes%60)
}

package planner

import (
	"errors"
	"strings"
	"testing"
	"time"

	"stillroom/chem"
	"stillroom/inventory"
)

// lasting makes a step by hand; a negative time stands for one nobody knows.
func lasting(n int, minutes float64, hold string) StepReport {
	return StepReport{N: n, Name: "step", Time: chem.Duration(max(minutes, 0)) * chem.Minute,
		TimeNotAssessed: minutes < 0, HoldPoint: hold != "", HoldNote: hold}
}

// The working day of these cases is 08:30 to 17:00 with half an hour at 12:00,
// 8 hours of work; times of day were worked out on paper.
var dayPolicy = inventory.PolicyOf([]inventory.PolicyRow{
	{Key: "day.start", Value: 8.5}, {Key: "day.end", Value: 17}, {Key: "day.break-from", Value: 12}, {Key: "day.break", Value: 0.5}, {Key: "day.week", Value: 5},
})

var aThursday = inventory.NewDate(2027, time.January, 14)

func TestTimeBudgetOf(t *testing.T) {
	type stretch struct {
		first, last, day    int
		begins, done, start string // last start; "" where no day holds it
		nights              int
		earliest            bool
	}
	tests := []struct {
		name    string
		steps   []StepReport
		batches int
		bench   float64 // minutes
		want    []stretch
	}{
		{"done before the break", []StepReport{lasting(1, 120, "")}, 1, 120, []stretch{{1, 1, 1, "08:30", "10:30", "15:00", 0, false}}},
		// 08:30 + 5 h + the break; back from 17:00, 5 h and the break.
		{"over the break", []StepReport{lasting(1, 60, ""), lasting(2, 240, "")}, 1, 300, []stretch{{1, 2, 1, "08:30", "14:00", "11:30", 0, false}}},
		{"as long as the day", []StepReport{lasting(1, 480, "")}, 1, 480, []stretch{{1, 1, 1, "08:30", "17:00", "08:30", 0, false}}},
		{"back to the end of the break", []StepReport{lasting(1, 270, "")}, 1, 270, []stretch{{1, 1, 1, "08:30", "13:30", "12:30", 0, false}}},
		// 08:30 + 4 h 30 + break = 13:30; 4 h more would end at 17:30.
		{"the second stretch on Friday", []StepReport{lasting(1, 270, "overnight, closed"), lasting(2, 240, "")}, 1, 510,
			[]stretch{{1, 1, 1, "08:30", "13:30", "12:30", 1, false}, {2, 2, 2, "08:30", "13:00", "13:00", 0, false}}},
		{"two stretches on one day", []StepReport{lasting(1, 210, "any time"), lasting(2, 270, "")}, 1, 480,
			[]stretch{{1, 1, 1, "08:30", "12:00", "13:30", 0, false}, {2, 2, 1, "12:30", "17:00", "12:30", 0, false}}},
		{"over the weekend", []StepReport{lasting(1, 400, "any time"), lasting(2, 400, "any time"), lasting(3, 400, "")}, 1, 1200,
			[]stretch{{1, 1, 1, "08:30", "15:40", "09:50", 1, false}, {2, 2, 2, "08:30", "15:40", "09:50", 3, false}, {3, 3, 3, "08:30", "15:40", "09:50", 0, false}}},
		{"longer than a day", []StepReport{lasting(1, 600, "any time"), lasting(2, 30, "")}, 1, 630,
			[]stretch{{1, 1, 1, "08:30", "19:00", "", 1, false}, {2, 2, 2, "08:30", "09:00", "16:30", 0, false}}},
		{"through the night", []StepReport{lasting(1, 24*60, "any time"), lasting(2, 30, "")}, 1, 1470,
			[]stretch{{1, 1, 1, "08:30", "09:00 the next day", "", 4, false}, {2, 2, 3, "08:30", "09:00", "16:30", 0, false}}},
		{"a time nobody knows", []StepReport{lasting(1, 60, "any time"), lasting(2, -1, ""), lasting(3, 30, "any time"), lasting(4, 30, "")}, 1, 120,
			[]stretch{{1, 1, 1, "08:30", "09:30", "16:00", 1, false}, {2, 3, 2, "08:30", "09:00", "16:30", 0, true}, {4, 4, 2, "09:00", "09:30", "16:30", 0, true}}},
		{"two batches", []StepReport{lasting(1, 300, "")}, 2, 600,
			[]stretch{{1, 1, 1, "08:30", "14:00", "11:30", 1, false}, {1, 1, 2, "08:30", "14:00", "11:30", 0, false}}},
		{"no steps", nil, 1, 0, nil},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			b, err := TimeBudgetOf(tt.steps, tt.batches, aThursday, dayPolicy)
			if err != nil {
				t.Fatal(err)
			}
			if got := b.Bench.Minutes(); got != tt.bench {
				t.Errorf("bench time %v min, want %v", got, tt.bench)
			}
			if len(b.Stretches) != len(tt.want) {
				t.Fatalf("%d stretches, want %d: %+v", len(b.Stretches), len(tt.want), b.Stretches)
			}
			for i, s := range b.Stretches {
				start := ""
				if s.Fits {
					start = ClockText(s.LastStart)
				}
				got := stretch{s.First, s.Last, s.Day, ClockText(s.Begins), ClockText(s.Done), start, s.Nights, s.AtEarliest}
				if got != tt.want[i] {
					t.Errorf("stretch %d is %+v, want %+v", i+1, got, tt.want[i])
				}
			}
		})
	}
}

// A dose that cooling allows only slowly counts at that length.
func TestTimeBudgetTakesTheShortestDose(t *testing.T) {
	s := lasting(1, 30, "")
	s.Shortest = 45 * chem.Minute
	b, err := TimeBudgetOf([]StepReport{s}, 1, aThursday, dayPolicy)
	if err != nil || b.Bench.Minutes() != 45 {
		t.Errorf("bench time %v min, %v; want 45", b.Bench.Minutes(), err)
	}
}

// Steps without a time are named, never counted as nothing.
func TestTimeBudgetNamesWhatIsNotAssessed(t *testing.T) {
	b, err := TimeBudgetOf([]StepReport{lasting(1, -1, ""), lasting(2, 10, "any time"), lasting(3, -1, "")}, 2, aThursday, dayPolicy)
	if err != nil || len(b.NotAssessed) != 2 || b.NotAssessed[0] != 1 || b.NotAssessed[1] != 3 {
		t.Errorf("not assessed: steps %v, %v; want 1 and 3 once", b.NotAssessed, err)
	}
}

func TestTimeBudgetFindings(t *testing.T) {
	saturday := aThursday.AddDays(2)
	b, err := TimeBudgetOf([]StepReport{lasting(1, 600, ""), lasting(2, -1, "")}, 1, saturday, dayPolicy)
	if err != nil {
		t.Fatal(err)
	}
	found := b.findings()
	if len(found) != 2 || found[0].Kind != "past-the-day" || found[1].Kind != "not-a-working-day" {
		t.Fatalf("findings %+v, want one for the long stretch and one for the Saturday", found)
	}
	for _, words := range []string{"steps 1 to 2", "at least 10 h 00 min", "19:00", "2 h 00 min past"} {
		if !strings.Contains(found[0].Text, words) {
			t.Errorf("%q doesn't say %q", found[0].Text, words)
		}
	}
}

func TestTimeBudgetRefusesDaysThatCantBe(t *testing.T) {
	for key, value := range map[string]float64{"day.start": -1, "day.end": 8, "day.break": -1, "day.break-from": 17, "day.week": 0} {
		policy := inventory.PolicyOf(dayPolicy.Rows())
		policy[key] = inventory.PolicyRow{Key: key, Value: value}
		_, err := TimeBudgetOf(nil, 1, aThursday, policy)
		if !errors.Is(err, ErrWorkingDay) || !strings.Contains(err.Error(), key) {
			t.Errorf("%s = %v: %v, want an error that names the row", key, value, err)
		}
	}
}

// A hold point with a limit bounds the beginning from below too: done at 16:30
// is 16 h before 08:30. Worked out on paper.
func TestTimeBudgetKeepsHoldLimits(t *testing.T) {
	tests := []struct {
		name      string
		minutes   float64
		hold      string
		on        inventory.Date
		waits     float64 // hours
		notBefore string
		tooLong   bool
	}{
		{"short morning", 120, "up to 16 h, closed", aThursday, 22, "14:30", false},
		{"over the break", 305, "up to 16 h", aThursday, 18 + 25.0/60, "10:55", false},
		{"long enough", 450, "up to 16 h", aThursday, 16, "", false},
		{"over the weekend", 305, "up to 16 h", aThursday.AddDays(1), 66 + 25.0/60, "", true},
		{"no limit", 120, "any time, closed", aThursday, 22, "", false},
		{"days", 120, "up to 3 d", aThursday.AddDays(1), 70, "", false},
	}
	for _, tt := range tests {
		b, err := TimeBudgetOf([]StepReport{lasting(1, tt.minutes, tt.hold), lasting(2, 400, "")}, 1, tt.on, dayPolicy)
		if err != nil {
			t.Fatal(err)
		}
		s := b.Stretches[0]
		notBefore := ""
		if s.NotBefore > 0 {
			notBefore = ClockText(s.NotBefore)
		}
		if got := float64(s.Waits / chem.Hour); got < tt.waits-1e-9 || got > tt.waits+1e-9 || notBefore != tt.notBefore || s.TooLong != tt.tooLong {
			t.Errorf("%s: waits %v h, not before %q, too long %v; want %v, %q, %v", tt.name, got, notBefore, s.TooLong, tt.waits, tt.notBefore, tt.tooLong)
		}
		if found := b.findings(); tt.tooLong != (len(found) == 1 && found[0].Kind == "hold-too-long") {
			t.Errorf("%s: findings %+v", tt.name, found)
		}
	}
}

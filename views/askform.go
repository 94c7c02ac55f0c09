package views

import (
	"errors"
	"net/url"
	"strings"
	"time"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// An askForm is what somebody typed about a run: how much, on which day, how
// surely. The typed text is kept, so that a fault can be mended where it stands.
type askForm struct {
	Wanted, On, Certainty string
	// Off are the hidden needs left out, by their keys.
	Off []string

	target    chem.Mass
	on        inventory.Date
	certainty chem.Fraction
}

// readAsk reads the three fields. Faults are collected, not only the first.
func readAsk(wanted, on, certainty string, today inventory.Date) (askForm, faults) {
	f := askForm{Wanted: strings.TrimSpace(wanted), On: strings.TrimSpace(on), Certainty: strings.TrimSpace(certainty)}
	var wrong faults
	f.target = readTarget(f.Wanted, &wrong)
	f.on = readRunDate(f.On, today, &wrong)
	f.certainty = readCertainty(f.Certainty, &wrong)
	return f, wrong
}

func readTarget(text string, wrong *faults) chem.Mass {
	if text == "" {
		wrong.add("wanted", "Say how much is wanted, with its unit, like 50 g.")
		return 0
	}
	m, err := chem.ParseMass(text)
	switch {
	case err != nil:
		wrong.add("wanted", sentence(err.Error()))
	case !(m > 0):
		wrong.add("wanted", "“"+text+"” can't be made: the amount has to be more than nothing, like 50 g.")
	}
	return m
}

func readRunDate(text string, today inventory.Date, wrong *faults) inventory.Date {
	if text == "" {
		wrong.add("on", "Say on which day, like "+today.AddDays(14).Short()+".")
		return 0
	}
	d, err := readDate(text)
	switch {
	case err != nil:
		wrong.add("on", sentence(err.Error()))
	case d < today:
		wrong.add("on", d.Short()+" is past; today is "+today.Short()+". Choose today or a later day.")
	}
	return d
}

func readCertainty(text string, wrong *faults) chem.Fraction {
	if text == "" {
		return 0
	}
	c, err := chem.ParseFraction(text)
	switch {
	case err != nil:
		wrong.add("certainty", sentence(err.Error()))
	case c < 0.5 || c > 0.99:
		wrong.add("certainty", "“"+text+"” is outside of what can be planned on: 50 % to 99 %.")
	}
	return c
}

// dateForms are the ways to type a day that can't be misread. 03/04/2027 can:
// it isn't among them.
var dateForms = []string{"2 Jan 2006", "2 January 2006", "Monday 2 January 2006", "Mon 2 Jan 2006"}

// readDate reads a day as people type it or as a calendar field sends it.
func readDate(text string) (inventory.Date, error) {
	for _, form := range dateForms {
		if t, err := time.Parse(form, text); err == nil {
			return inventory.DateOf(t), nil
		}
	}
	if len(text) == len("2006-01-02") {
		if d, err := inventory.ParseDate(text); err == nil {
			return d, nil
		}
	}
	return 0, &dateError{text}
}

// A dateError is a day that can't be read or could be read in two ways.
type dateError struct{ text string }

func (e *dateError) Error() string {
	if strings.Count(e.text, "/") == 2 || strings.Count(e.text, ".") == 2 {
		return "“" + e.text + "” may be read in two ways: write the month as a word, like 14 Jan 2027"
	}
	return "“" + e.text + "” is no day: write it like 14 Jan 2027 or 2027-01-14"
}

// query writes the form as the query of an address.
func (f askForm) query() string {
	v := url.Values{"wanted": {f.Wanted}, "on": {f.On}}
	if f.Certainty != "" {
		v.Set("certainty", f.Certainty)
	}
	if len(f.Off) > 0 {
		v["off"] = f.Off
	}
	return v.Encode()
}

// askFault says which field an error of the planner is about, in the planner's
// own words. It reports false for an error that no field can mend.
func askFault(err error) (fault, bool) {
	var request *planner.RequestError
	if errors.As(err, &request) {
		f := fault{Field: askFields[request.Field], Text: sentence(request.What)}
		if request.Would != "" {
			f.Text += " " + sentence(request.Would)
		}
		return f, true
	}
	if step := planner.IsStep(err); step != nil {
		return fault{Text: sentence(step.Error())}, true
	}
	return fault{}, false
}

// askFields leads from the planner's fields to those of the form.
var askFields = map[string]string{"target": "wanted", "on": "on", "certainty": "certainty", "recipe": "recipe"}

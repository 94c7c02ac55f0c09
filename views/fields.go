package views

import (
	"net/url"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
)

// A page with several forms knows which of them was sent and what was typed
// into it, so that it comes back filled with the faults beside its fields. The
// identity of a field is the name of its form, a hyphen and its own name.

// sentForm is the form of a page that was sent; the zero value is none.
type sentForm struct {
	name   string
	values url.Values
}

// keep notes which form was sent and what was typed into it.
func (f *frame) keep(c *gin.Context, form string) {
	if err := c.Request.ParseForm(); err == nil {
		f.sent = sentForm{form, c.Request.PostForm}
	}
}

// typed gives what was typed into a field of the form that was sent.
func (f *frame) typed(name string) string { return strings.TrimSpace(f.sent.values.Get(name)) }

// wrong adds a fault beside a field of the form that was sent.
func (f *frame) wrong(name, text string) { f.Faults.add(f.sent.name+"-"+name, text) }

// Sent reports whether a form was sent, so that its part of the page is open.
func (f *frame) Sent(form string) bool { return f.sent.name == form }

// act reads who acts and why out of the form that was sent. An empty reason
// stands for the one given here; with neither, asking for it is a fault, as is
// nobody named.
func (f *frame) act(why string) inventory.Act {
	act := inventory.Act{By: f.typed("who"), Why: f.typed("why"), Key: f.typed("key")}
	if act.By == "" {
		f.wrong("who", "Say who does this.")
	}
	if act.Why == "" {
		act.Why = why
	}
	if act.Why == "" {
		f.wrong("why", "Say why, in a few words.")
	}
	return act
}

// askField is one field of a form with what a template needs to place it.
type askField struct {
	ID, Name, Label, Hint, Value, Fault, Class string
	Options                                    []option // of a choice; none for a line to write on
}

// option is one of the things a field lets choose from.
type option struct {
	Value, Words string
	Chosen       bool
}

// Ask makes a line to write on.
func (f *frame) Ask(form, name, label, hint, class string) askField {
	a := askField{ID: form + "-" + name, Name: name, Label: label, Hint: hint, Class: class}
	a.Fault = f.Faults.Of(a.ID)
	if f.sent.name == form {
		a.Value = f.typed(name)
	}
	return a
}

// Choose makes a choice.
func (f *frame) Choose(form, name, label string, options []option) askField {
	a := f.Ask(form, name, label, "", "")
	for _, o := range options {
		o.Chosen = o.Value == a.Value
		a.Options = append(a.Options, o)
	}
	return a
}

// refuse puts a refusal of the stock records beside a field of the form that
// was sent. It returns the status to answer with, or the error if nobody at the
// form can mend it.
func (f *frame) refuse(err error, name string) (int, error) {
	wrong, ok := refusalFault(err)
	if !ok {
		return 0, err
	}
	f.wrong(name, wrong.Text)
	return refusalStatus(err), nil
}

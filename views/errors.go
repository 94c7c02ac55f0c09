package views

import (
	"context"
	"crypto/rand"
	"errors"
	"fmt"
	"html"
	"net/http"

	"github.com/gin-gonic/gin"
)

var (
	errNoPage   = errors.New("there is no such page")
	errNoMethod = errors.New("this page can't be asked for in that way")
)

// A missing says that something named in an address isn't there.
type missing struct {
	what  string // "run", "bottle", "recipe", …
	name  string
	would string // what would do
}

func (m *missing) Error() string { return fmt.Sprintf("there is no %s %q", m.what, m.name) }

// A fault is what is wrong with one field of a form. The same words stand in
// the summary and beside the field.
type fault struct {
	Field string // the field's name; "" for the form as a whole
	Text  string
}

type faults []fault

// Of returns what is wrong with a field, or "".
func (f faults) Of(field string) string {
	for _, x := range f {
		if x.Field == field {
			return x.Text
		}
	}
	return ""
}

func (f *faults) add(field, text string) { *f = append(*f, fault{field, text}) }

// errorPage is the page for what went wrong.
type errorPage struct {
	frame
	Status    int
	Heading   string
	Text      string
	Would     string
	Reference string // of the line in the log, for an unexpected error
}

// page makes a handler out of one that may fail. What a user may read and what
// the log keeps are different texts.
func (s *Server) page(f func(*gin.Context) error) gin.HandlerFunc {
	return func(c *gin.Context) {
		if err := f(c); err != nil {
			s.showError(c, err)
		}
	}
}

func (s *Server) showError(c *gin.Context, err error) {
	if errors.Is(err, context.Canceled) {
		return
	}
	p := s.describe(err)
	if p.Reference != "" {
		s.Log.Error("answering failed", "reference", p.Reference, "method", c.Request.Method, "path", c.Request.URL.Path, "cause", err)
	}
	p.Title = p.Heading
	if err := s.render(c, p.Status, "error", p); err != nil {
		s.Log.Error("rendering the error page failed", "cause", err)
		c.Data(http.StatusInternalServerError, "text/html; charset=utf-8", lastResort(p.Heading))
	}
}

// describe turns an error into what a user may read.
func (s *Server) describe(err error) *errorPage {
	var m *missing
	switch {
	case errors.As(err, &m):
		return &errorPage{Status: http.StatusNotFound, Heading: "No " + m.what + " “" + m.name + "”", Text: err.Error() + ".", Would: m.would}
	case errors.Is(err, errNoPage):
		return &errorPage{Status: http.StatusNotFound, Heading: "No such page", Text: "Nothing has this address.",
			Would: "Start from the slate, or look for the thing itself with the field at the top."}
	case errors.Is(err, errNoMethod):
		return &errorPage{Status: http.StatusMethodNotAllowed, Heading: "Not in this way", Text: "This address can't be asked for in that way."}
	}
	if f, ok := askFault(err); ok {
		return &errorPage{Status: http.StatusUnprocessableEntity, Heading: refusalHeading(http.StatusUnprocessableEntity), Text: f.Text}
	}
	if status := refusalStatus(err); status != http.StatusInternalServerError {
		return &errorPage{Status: status, Heading: refusalHeading(status), Text: sentence(err.Error())}
	}
	reference := rand.Text()[:8]
	return &errorPage{Status: http.StatusInternalServerError, Heading: "That didn't work", Reference: reference,
		Text:  "The fault is on this side; nothing was changed.",
		Would: "Try once more. If it stays, give reference " + reference + " to whoever looks after the program: it marks the line in the log."}
}

// lastResort is a page that can't fail.
func lastResort(heading string) []byte {
	return []byte(`<!doctype html><html lang="en"><title>Error – Stillroom</title><main><h1>` +
		html.EscapeString(heading) + `</h1><p><a href="/slate">Slate</a></p></main></html>`)
}

// recovered turns a panic into the page for an unexpected error.
func (s *Server) recovered(c *gin.Context) {
	defer func() {
		if r := recover(); r != nil {
			s.showError(c, fmt.Errorf("panic: %v", r))
			c.Abort()
		}
	}()
	c.Next()
}

func refusalHeading(status int) string {
	switch status {
	case http.StatusNotFound:
		return "That isn’t there"
	case http.StatusConflict:
		return "Somebody was first"
	case http.StatusServiceUnavailable:
		return "The stock records can’t be written now"
	}
	return "That can’t be done"
}

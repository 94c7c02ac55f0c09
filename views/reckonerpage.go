package views

import (
	"errors"
	"net/http"
	"net/url"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/planner/reckoner"
)

// reckonerPage lists the bench sums by group.
type reckonerPage struct {
	frame
	Groups []sumGroup
}

type sumGroup struct {
	Name string
	Sums []reckoner.Sum
}

// sumPage is the form of one sum and its answer.
type sumPage struct {
	frame
	Sum     reckoner.Sum
	Fields  []sumField
	Example string // address with the example put in
	Answer  *reckoner.Answer
}

// sumField is an input of a sum with what was typed.
type sumField struct {
	reckoner.Key
	Value string
	Fault string
}

// showReckoner answers /reckoner.
func (s *Server) showReckoner(c *gin.Context) error {
	p := &reckonerPage{Groups: groupSums(s.Sums)}
	p.Title, p.Section = "Reckoner", "/reckoner"
	return s.render(c, http.StatusOK, "reckoner", p)
}

// groupSums puts the sums under their headings, both in the order given.
func groupSums(sums []reckoner.Sum) []sumGroup {
	var groups []sumGroup
	at := map[string]int{}
	for _, sum := range sums {
		i, ok := at[sum.Group]
		if !ok {
			i = len(groups)
			at[sum.Group] = i
			groups = append(groups, sumGroup{Name: sum.Group})
		}
		groups[i].Sums = append(groups[i].Sums, sum)
	}
	return groups
}

// showSum answers /reckoner/:sum. The inputs stand in the address, so that a
// result can be kept, sent and opened again.
func (s *Server) showSum(c *gin.Context) error {
	sum, ok := s.sumNamed(c.Param("sum"))
	if !ok {
		return &missing{"sum", c.Param("sum"), "All sums are listed on the page of the reckoner."}
	}
	p := newSumPage(sum)
	args := reckoner.Args{}
	for i := range p.Fields {
		f := &p.Fields[i]
		if f.Value = strings.TrimSpace(c.Query(f.Name)); f.Value != "" {
			args[f.Name] = f.Value
		}
	}
	if len(c.Request.URL.Query()) == 0 {
		return s.render(c, http.StatusOK, "sum", p)
	}
	answer, err := sum.Run(c.Request.Context(), args)
	if err != nil {
		p.refuse(err)
		return s.render(c, http.StatusUnprocessableEntity, "sum", p)
	}
	p.Answer = &answer
	return s.render(c, http.StatusOK, "sum", p)
}

func (s *Server) sumNamed(name string) (reckoner.Sum, bool) {
	for _, sum := range s.Sums {
		if sum.Name == name {
			return sum, true
		}
	}
	return reckoner.Sum{}, false
}

func newSumPage(sum reckoner.Sum) *sumPage {
	p := &sumPage{Sum: sum, Example: exampleAddress(sum)}
	p.Title, p.Section = sum.Title, "/reckoner"
	for _, k := range sum.Keys {
		p.Fields = append(p.Fields, sumField{Key: k})
	}
	return p
}

// refuse puts what is wrong beside the input it is about.
func (p *sumPage) refuse(err error) {
	f := fault{Text: sentence(err.Error())}
	var named interface{ Key() string }
	if errors.As(err, &named) {
		for i := range p.Fields {
			if p.Fields[i].Name == named.Key() {
				f.Field, p.Fields[i].Fault = named.Key(), f.Text
			}
		}
	}
	p.Faults = append(p.Faults, f)
}

// exampleAddress is the address of the sum with its example put in.
func exampleAddress(sum reckoner.Sum) string {
	v := url.Values{}
	for _, e := range sum.Example {
		if key, value, ok := strings.Cut(e, "="); ok {
			v.Set(key, value)
		}
	}
	return "/reckoner/" + sum.Name + "?" + v.Encode()
}

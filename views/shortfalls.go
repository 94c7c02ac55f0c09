package views

import (
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/inventory"
	"stillroom/planner"
)

// shortfallsPage is what no fit bottle covers, run by run, and what would do.
type shortfallsPage struct {
	frame
	Runs []shortRun
	Fine int // runs with nothing short
}

// shortRun is a run that something stops.
type shortRun struct {
	inventory.Run
	Wanted, Product string
	Fault           string // why it couldn't be planned at all
	Needs           []shortNeed
}

// shortNeed is a need that is short, late or unfit, or tight.
type shortNeed struct {
	planner.Need
	Word    string
	Wanted  string
	Lack    string
	Answers []string
}

// showShortfalls answers /shortfalls.
func (s *Server) showShortfalls(c *gin.Context) error {
	_, lines, err := s.slate(c)
	if err != nil {
		return err
	}
	p := &shortfallsPage{}
	p.Title, p.Section = "Shortfalls", "/shortfalls"
	for _, l := range lines {
		short := shortRun{Run: l.Run, Wanted: wantedText(l.Run), Product: l.Run.Recipe}
		if l.Err != nil {
			short.Fault = sentence(l.Err.Error())
		} else {
			short.Product = l.Plan.Recipe.Product
			short.Needs = shortNeeds(l.Plan)
		}
		if short.Fault == "" && len(short.Needs) == 0 {
			p.Fine++
			continue
		}
		p.Runs = append(p.Runs, short)
	}
	return s.render(c, http.StatusOK, "shortfalls", p)
}

func shortNeeds(plan *planner.Plan) []shortNeed {
	var needs []shortNeed
	for _, n := range plan.Needs {
		if n.State == planner.Covered {
			continue
		}
		needs = append(needs, shortNeed{Need: n, Word: n.State.String(), Wanted: neededText(n), Lack: lackText(n), Answers: answers(plan, n)})
	}
	return needs
}

// answers lists what is known about a need that stops a run: who else was
// promised it, why bottles can't be used, what can be bought. What would really
// do, worked through, is on the page of answers.
func answers(plan *planner.Plan, n planner.Need) []string {
	var words []string
	if n.Earmarked > 0 {
		words = append(words, "Other runs were promised "+massText(n.Earmarked)+" of it.")
	}
	for _, b := range n.Barred {
		words = append(words, "Bottle "+b.Bottle.Code+" can’t be used: "+b.Why+".")
	}
	if n.BarredMore > 0 {
		words = append(words, trimmed(float64(n.BarredMore), 6)+" more bottles can’t be used.")
	}
	for _, buy := range plan.Buy {
		if buy.Substance == n.Substance {
			words = append(words, buyWords(buy))
		}
	}
	if n.CoveredOn.Set() {
		words = append(words, "Cover arrives on "+n.CoveredOn.Long()+".")
	}
	return words
}

func buyWords(b planner.Purchase) string {
	text := "Buy " + trimmed(float64(b.Packs), 6) + " × " + packSize(b.Offer, b.Form) + " " + b.Form.Name + " from " + b.Offer.Supplier +
		" for " + moneyText(b.Cost, b.Currency) + ": order by " + b.OrderBy.Short() + ", there by " + b.Arrives.Short()
	if !b.InTime {
		text += ", which is too late for the run"
	}
	return text + "."
}

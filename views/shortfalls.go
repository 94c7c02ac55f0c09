package views

import (
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
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
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return err
	}
	p := &shortfallsPage{}
	p.Title, p.Section = "Shortfalls", "/shortfalls"
	for _, run := range runsToCome(shelf.Runs) {
		short := shortRun{Run: run, Wanted: massPlain(chem.Mass(run.TargetUG) * chem.Microgram), Product: run.Recipe}
		plan, err := s.planKept(run, shelf)
		if err != nil {
			short.Fault = sentence(err.Error())
		} else {
			short.Product = plan.Recipe.Product
			short.Needs = shortNeeds(plan)
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

// answers lists what would do about a need, the cheapest first: what is known
// better, what is freed, what is bought, what is waited for.
func answers(plan *planner.Plan, n planner.Need) []string {
	var words []string
	for _, d := range n.Draws {
		if d.Bottle.Code == plan.Risk.WeighFirst {
			words = append(words, "Weigh bottle "+d.Bottle.Code+": the chance of running short goes from "+
				chanceText(plan.Risk.WeighBefore)+" to "+chanceText(plan.Risk.WeighAfter)+".")
		}
	}
	if n.Earmarked > 0 {
		words = append(words, "Other runs were promised "+massText(n.Earmarked)+" of it; ask whether they still need it.")
	}
	for _, b := range n.Barred {
		words = append(words, "Bottle "+b.Bottle.Code+" can’t be used: "+b.Why+".")
	}
	for _, buy := range plan.Buy {
		if buy.Substance == n.Substance {
			words = append(words, buyWords(buy))
		}
	}
	if n.CoveredOn.Set() {
		words = append(words, "Wait until "+n.CoveredOn.Long()+": cover arrives then.")
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

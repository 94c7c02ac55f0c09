package views

import (
	"net/http"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// countForm is what somebody found in a bottle.
type countForm struct {
	Amount, By, Who string
}

// countWays are the ways to find out what a bottle holds, with their words.
var countWays = []struct{ Way, Words string }{
	{string(inventory.ByWeighing), "weighed"},
	{string(inventory.ByLevel), "read off the level"},
	{string(inventory.ByGuess), "judged by eye"},
}

// Ways lists how a content may have been found out.
func (p *bottlePage) Ways() []struct{ Way, Words string } { return countWays }

// countBottle answers the form on a bottle's page that writes down what it
// holds.
func (s *Server) countBottle(c *gin.Context) error {
	p, err := s.findBottle(c)
	if err != nil {
		return err
	}
	p.Count = countForm{c.PostForm("amount"), c.PostForm("by"), strings.TrimSpace(c.PostForm("who"))}
	amount := readContent("amount", p.Count.Amount, p.Form, &p.Faults)
	act := actOf(c, "counted", &p.Faults)
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "bottle", p)
	}
	count := inventory.Count{Bottle: p.Code, Content: amount, By: inventory.MeasuredBy(p.Count.By)}
	_, cut, err := s.Lab.StockTake(c.Request.Context(), count, act)
	if err != nil {
		wrong, ok := refusalFault(err)
		if !ok {
			return err
		}
		wrong.Field = "amount"
		p.Faults = append(p.Faults, wrong)
		return s.render(c, refusalStatus(err), "bottle", p)
	}
	return s.goTo(c, bottleAddress(p.Code)+cutQuery(cut))
}

// readContent reads an amount of a bottle out of a field. What is measured by
// volume may be typed as a mass if its density is known, and the other way
// round.
func readContent(field, text string, form inventory.StockForm, wrong *faults) int64 {
	text = strings.TrimSpace(text)
	if text == "" {
		wrong.add(field, "Say how much, with its unit, like 250 "+exampleUnit(form)+".")
		return 0
	}
	if form.Measure == inventory.ByCount {
		return readPieces(field, text, wrong)
	}
	density := chem.Density(form.DensityGML) * chem.GramPerMillilitre
	mass, massErr := chem.ParseMass(text)
	volume, volumeErr := chem.ParseVolume(text)
	var units int64
	var fits bool
	switch {
	case massErr != nil && volumeErr != nil:
		if form.Measure == inventory.ByVolume {
			massErr = volumeErr
		}
		wrong.add(field, sentence(massErr.Error()))
		return 0
	case form.Measure == inventory.ByMass && massErr == nil:
		units, fits = inventory.UnitsNear(mass)
	case form.Measure == inventory.ByVolume && volumeErr == nil:
		units, fits = inventory.UnitsNear(volume)
	case density <= 0:
		wrong.add(field, "This bottle is counted in "+exampleUnit(form)+", and without a density (no data) nothing else can be converted.")
		return 0
	case form.Measure == inventory.ByMass:
		units, fits = inventory.UnitsNear(density.Mass(volume))
	default:
		units, fits = inventory.UnitsNear(density.Volume(mass))
	}
	if !fits {
		wrong.add(field, "“"+text+"” can’t be in a bottle: give nothing or more, like 250 "+exampleUnit(form)+".")
	}
	return units
}

func readPieces(field, text string, wrong *faults) int64 {
	n, err := chem.ParseNumber(text)
	if err != nil || n < 0 || n > 1e9 || n != float64(int64(n)) {
		wrong.add(field, "“"+text+"” is no whole number of pieces.")
		return 0
	}
	return int64(n)
}

func exampleUnit(form inventory.StockForm) string {
	switch form.Measure {
	case inventory.ByMass:
		return "g"
	case inventory.ByVolume:
		return "mL"
	}
	return "pieces"
}

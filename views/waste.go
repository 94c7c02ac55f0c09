package views

import (
	"html/template"
	"net/http"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// wastePage is the carboys and what the slate will put into them.
type wastePage struct {
	frame
	Carboys []carboyRow
	Unfit   []unfitWaste
}

// carboyRow is a waste container as it stands.
type carboyRow struct {
	inventory.Carboy
	Place   inventory.Place
	Picture template.HTML
	Holds   string
	Size    string
	Fill    string
	Limit   string
	Room    string // up to the fill limit
	Coming  []string
}

// unfitWaste is a waste lot that no carboy takes.
type unfitWaste struct {
	RunID         int64
	Stream, Words string
}

// showWaste answers /waste.
func (s *Server) showWaste(c *gin.Context) error {
	shelf, lines, err := s.slate(c)
	if err != nil {
		return err
	}
	p := &wastePage{}
	p.Title, p.Section = "Waste", "/waste"
	at := map[string]int{}
	for i, carboy := range shelf.Carboys {
		at[carboy.Code] = i
		p.Carboys = append(p.Carboys, newCarboyRow(carboy, shelf))
	}
	for _, l := range lines {
		if l.Err != nil {
			continue // the slate says why
		}
		run := l.Run
		for _, lot := range l.Plan.Waste {
			words := volumeText(lot.Volume)
			if i, ok := at[lot.Carboy]; ok && lot.Fits {
				p.Carboys[i].Coming = append(p.Carboys[i].Coming, words+" from run "+trimmed(float64(run.ID), 9)+" on "+run.On.Short())
				continue
			}
			p.Unfit = append(p.Unfit, unfitWaste{run.ID, lot.Stream, words + sentenceTail(lot.Note)})
		}
	}
	return s.render(c, http.StatusOK, "waste", p)
}

func sentenceTail(note string) string {
	if note == "" {
		return ""
	}
	return ": " + note
}

func newCarboyRow(c inventory.Carboy, shelf *inventory.Shelf) carboyRow {
	r := carboyRow{Carboy: c, Picture: drawCarboy(c, 150)}
	r.Place, _ = shelf.Place(c.PlaceID)
	liquid := func(ul int64) chem.Volume { return chem.Volume(ul) * chem.Microlitre }
	r.Holds, r.Size = volumeText(liquid(c.ContentUL)), volumePlain(liquid(c.SizeUL))
	if c.SizeUL > 0 {
		r.Fill = fillText(chem.Fraction(float64(c.ContentUL) / float64(c.SizeUL)))
	}
	r.Limit = percentText(chem.Fraction(c.FillLimit))
	room := int64(c.FillLimit*float64(c.SizeUL)) - c.ContentUL
	r.Room = volumeText(liquid(max(room, 0)))
	return r
}

package views

import (
	"errors"
	"net/http"
	"slices"
	"strings"

	"github.com/gin-gonic/gin"

	"stillroom/chem"
	"stillroom/inventory"
)

// carboyPage is one waste carboy: what is in it, what went in, and the forms
// for what goes in next and for its pick-up.
type carboyPage struct {
	frame
	carboyRow
	Parts    []string // what is in it, with shares
	Pairs    []chem.Incompatibility
	Unknown  []string // names the compatibility chart says nothing about
	Life     []lifeRow
	Unstated string // why the content can't be read
	Clash    bool   // the chart warned of what was to go in
}

func carboyAddress(code string) string { return "/waste/" + code }

// showCarboy answers /waste/:code.
func (s *Server) showCarboy(c *gin.Context) error {
	p, err := s.carboyPage(c)
	if err != nil {
		return err
	}
	return s.render(c, http.StatusOK, "carboy", p)
}

func (s *Server) carboyPage(c *gin.Context) (*carboyPage, error) {
	shelf, err := s.Lab.Load(c.Request.Context())
	if err != nil {
		return nil, err
	}
	code, err := inventory.NormalCode(c.Param("code"))
	i := slices.IndexFunc(shelf.Carboys, func(x inventory.Carboy) bool { return x.Code == code })
	if err != nil || i < 0 {
		return nil, &missing{"carboy", c.Param("code"), "All carboys stand on the page “Waste”."}
	}
	p := &carboyPage{carboyRow: newCarboyRow(shelf.Carboys[i], shelf)}
	p.Title, p.Section = "Carboy "+code, "/waste"
	p.assess()
	audit, err := s.Lab.Audit(c.Request.Context(), "carboy "+code, lifeLines)
	for _, a := range audit {
		p.Life = append(p.Life, newLifeRow(a.At, auditText(a), a.Why, a.ByWhom))
	}
	return p, err
}

// assess asks the compatibility chart about what is together in the carboy.
func (p *carboyPage) assess() {
	parts, err := p.Carboy.Parts()
	if err != nil {
		p.Unstated = sentence(err.Error())
		return
	}
	for _, part := range parts {
		p.Parts = append(p.Parts, part.Name+" "+percentText(chem.Fraction(part.Share)))
	}
	if p.Pairs, p.Unknown, err = p.Clashes(nil); err != nil {
		p.Unstated = sentence(err.Error())
	}
}

// pour answers the form that notes what went into a carboy. The compatibility
// chart warns by groups, of a chromium salt in water as of a strong oxidiser in
// a solvent; somebody in charge, who is named, may let in what it warns of.
func (s *Server) pour(c *gin.Context) error {
	p, err := s.carboyPage(c)
	if err != nil {
		return err
	}
	p.keep(c, "pour")
	pouring := inventory.Pouring{Carboy: p.Code, VolumeUL: p.readVolume(), Parts: p.readParts()}
	act := p.act("")
	if leave := p.typed("leave"); leave != "" {
		pouring.Despite, p.Clash = true, true
		act.Why += "; let in by " + leave
	}
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "carboy", p)
	}
	if _, err := s.Lab.Pour(c.Request.Context(), pouring, act); err != nil {
		p.Clash = p.Clash || errors.Is(err, inventory.ErrInvalid)
		status, err := p.refuse(err, "volume")
		if err != nil {
			return err
		}
		return s.render(c, status, "carboy", p)
	}
	return s.goTo(c, carboyAddress(p.Code))
}

func (p *carboyPage) readVolume() int64 {
	text := p.typed("volume")
	if text == "" {
		p.wrong("volume", "Say how much goes in, with its unit, like 350 mL.")
		return 0
	}
	v, err := chem.ParseVolume(text)
	if err != nil {
		p.wrong("volume", sentence(err.Error()))
		return 0
	}
	ul, ok := inventory.UnitsUp(v)
	if !ok || ul == 0 {
		p.wrong("volume", "“"+text+"” can’t go in: give more than nothing, like 350 mL.")
	}
	return ul
}

// readParts reads what goes in: names with their shares by volume, one a line
// or with semicolons between. A single name without a share is all of it.
func (p *carboyPage) readParts() []inventory.Part {
	text := strings.Join(strings.FieldsFunc(p.typed("parts"), func(r rune) bool { return r == '\n' || r == '\r' || r == ';' }), "; ")
	if text == "" {
		p.wrong("parts", "Say what it is, like “water: 80 %; sulfuric acid: 20 %”. Waste of unknown content doesn’t go into a carboy: ask the waste officer.")
		return nil
	}
	if !strings.ContainsAny(text, ":;") {
		return []inventory.Part{{Name: text, Share: 1}}
	}
	parts, err := inventory.Carboy{Code: p.Code, Contains: text}.Parts()
	if err != nil {
		p.wrong("parts", sentence(err.Error()))
		return nil
	}
	sum := 0.0
	for _, part := range parts {
		sum += part.Share
	}
	if sum < 1-1e-6 || sum > 1+1e-6 {
		p.wrong("parts", "The shares come to "+percentText(chem.Fraction(sum))+" together; they have to come to "+with("100", "%")+".")
	}
	return parts
}

// collect answers the form that notes that a carboy was picked up. What is gone
// is gone, and so it asks for a tick.
func (s *Server) collect(c *gin.Context) error {
	p, err := s.carboyPage(c)
	if err != nil {
		return err
	}
	p.keep(c, "collect")
	if p.typed("sure") == "" {
		p.wrong("sure", "Tick this if it is meant: it can’t be taken back.")
	}
	act := p.act("picked up")
	if len(p.Faults) > 0 {
		return s.render(c, http.StatusUnprocessableEntity, "carboy", p)
	}
	if err := s.Lab.Collect(c.Request.Context(), p.Code, act); err != nil {
		status, err := p.refuse(err, "sure")
		if err != nil {
			return err
		}
		return s.render(c, status, "carboy", p)
	}
	return s.goTo(c, carboyAddress(p.Code))
}

// Sure is the tick that a pick-up asks for.
func (p *carboyPage) Sure() askField {
	return p.Ask("collect", "sure", p.Holds+" went away and the carboy stands there empty", "", "")
}

package views

import (
	"errors"
	"fmt"
	"regexp"
	"slices"
	"strings"
	"unicode/utf8"

	"stillroom/chem"
	"stillroom/inventory"
	"stillroom/planner"
)

// recipeCheck is what a check finds in the text of a recipe: faults that keep it
// from being used, words that ask for a number, and what every step holds and
// loses.
type recipeCheck struct {
	File   string
	Recipe *planner.Recipe // nil where the text can't be read
	Faults []textFault
	Vague  []textFault
	Lines  []string // of the text, for the links to its places

	Scale    chem.Amount // of the limiting reagent, at which it was walked through
	Basis    string      // why at that scale
	Walk     *planner.Walk
	Balanced []balanceRow
}

// textFault is a fault with the line it stands on, cut where it begins.
type textFault struct {
	planner.RecipeFault
	Before, At string
}

// balanceRow is a step of the walk-through as the editor shows it.
type balanceRow struct {
	planner.StepReport
	Line    int
	Passes  []string // what goes in, what is given off, what product is lost
	Holds   []string // by phase, at the fullest moment
	OffText string   // what doesn't balance, of the whole
}

// mostRecipeBytes and mostRecipeLines bound the text of a recipe; comparing two
// versions takes time and room by the square of their lines.
const (
	mostRecipeBytes = 128 << 10
	mostRecipeLines = 2000
)

// triedTarget is the mass of product for which a recipe is walked through that
// is proven at no scale.
const triedTarget = 50 * chem.Gram

// checkRecipe reads a text, walks it through with the lab's ware at the proven
// scale or else for triedTarget, and looks for vague words.
func checkRecipe(file, text string, shelf *inventory.Shelf) *recipeCheck {
	k := &recipeCheck{File: file, Lines: strings.Split(strings.TrimRight(text, "\n"), "\n")}
	if fault := unreadable(file, text); fault != nil {
		k.add(*fault)
		return k
	}
	recipe, err := planner.ParseRecipe(file, []byte(text))
	if err == nil {
		k.Recipe = recipe
		err = k.walk(shelf)
	}
	k.add(planner.FaultsOf(file, recipe, err)...)
	for _, f := range planner.Lint(file, text) {
		k.Vague = append(k.Vague, k.placed(f))
	}
	return k
}

// unreadable finds what no file of text holds.
func unreadable(file, text string) *planner.RecipeFault {
	fault := func(what, expected string) *planner.RecipeFault {
		return &planner.RecipeFault{File: file, Line: 1, Column: 1, What: what, Expected: expected}
	}
	switch {
	case strings.TrimSpace(text) == "":
		return fault("there is no text", "a recipe")
	case len(text) > mostRecipeBytes:
		return fault(fmt.Sprintf("the text has %d bytes", len(text)), fmt.Sprintf("%d at most", mostRecipeBytes))
	case strings.Count(text, "\n") > mostRecipeLines:
		return fault(fmt.Sprintf("the text has %d lines", strings.Count(text, "\n")), fmt.Sprintf("%d at most", mostRecipeLines))
	case !utf8.ValidString(text) || strings.ContainsRune(text, 0):
		return fault("the text holds signs that aren’t letters", "plain text in UTF-8")
	}
	return nil
}

func (k *recipeCheck) add(found ...planner.RecipeFault) {
	for _, f := range found {
		k.Faults = append(k.Faults, k.placed(f))
	}
}

// placed quotes the line a fault is on. A place behind the last line is taken to
// the last line.
func (k *recipeCheck) placed(f planner.RecipeFault) textFault {
	f.Line = min(max(f.Line, 1), len(k.Lines))
	line := []rune(k.Lines[f.Line-1])
	f.Column = max(f.Column, 1)
	at := min(f.Column-1, len(line))
	return textFault{f, string(line[:at]), string(line[at:])}
}

// Clean reports that the recipe can be used.
func (k *recipeCheck) Clean() bool { return len(k.Faults) == 0 }

// walk takes the recipe through once.
func (k *recipeCheck) walk(shelf *inventory.Shelf) error {
	program, err := planner.Compile(k.Recipe)
	if err != nil {
		return err
	}
	if k.Scale, k.Basis, err = tryScale(program, shelf.Policy); err != nil {
		return err
	}
	walk, err := program.Walk(planner.Conditions{Limiting: k.Scale, Equipment: shelf.Equipment, Policy: shelf.Policy})
	if err != nil {
		return err
	}
	k.Walk = walk
	k.Balanced = balanceRows(k.Recipe, walk)
	return nil
}

// tryScale is the scale at which a recipe is shown: the largest proven one, or
// what triedTarget takes.
func tryScale(p *planner.Program, policy inventory.Policy) (chem.Amount, string, error) {
	if p.Recipe.ProvenScale > 0 {
		return p.Recipe.ProvenScale, "the largest proven scale", nil
	}
	certainty, ok := policy.Value("risk.certainty")
	if !ok {
		return 0, "", errors.New("the policy table has no row risk.certainty; set it")
	}
	scale, err := p.ScaleFor(triedTarget, chem.Fraction(certainty), policy)
	return scale.Amount, "scaled for " + massPlain(triedTarget) + ", because it is proven at no scale", err
}

func balanceRows(r *planner.Recipe, walk *planner.Walk) []balanceRow {
	rows := make([]balanceRow, len(walk.Steps))
	for i, s := range walk.Steps {
		rows[i] = balanceRow{StepReport: s, Passes: passLines(s, walk.Losses), Holds: phaseLines(s.Contents), OffText: numberText(s.Balance)}
		if s.N >= 1 && s.N <= len(r.Steps) {
			rows[i].Line = r.Steps[s.N-1].Line()
		}
	}
	return rows
}

// mostListed is how many components of a phase are named beside a step.
const mostListed = 3

// phaseLines sums the contents of a vessel by phase and names the largest parts.
func phaseLines(contents []planner.Content) []string {
	var lines []string
	for len(contents) > 0 {
		phase := contents[0].Phase
		end := slices.IndexFunc(contents, func(c planner.Content) bool { return c.Phase != phase })
		if end < 0 {
			end = len(contents)
		}
		lines = append(lines, phaseLine(phase, contents[:end]))
		contents = contents[end:]
	}
	return lines
}

func phaseLine(phase string, contents []planner.Content) string {
	var mass chem.Mass
	var names []string
	for i, c := range contents {
		mass += c.Mass
		if i < mostListed {
			names = append(names, c.Substance+" "+massText(c.Mass))
		}
	}
	if more := len(contents) - mostListed; more > 0 {
		names = append(names, fmt.Sprintf("%d more", more))
	}
	return phase + " " + massText(mass) + ": " + strings.Join(names, ", ")
}

// passLines is what goes into a step, what it gives off and what product it
// loses.
func passLines(s planner.StepReport, losses []planner.Loss) []string {
	var lines []string
	if len(s.Adds) > 0 {
		lines = append(lines, "in: "+strings.Join(intoLines(s.Adds), ", "))
	}
	if q := s.Heat.Kilojoules(); q >= 0.5 {
		lines = append(lines, "gives off "+heatText(s.Heat))
	} else if q <= -0.5 {
		lines = append(lines, "takes up "+heatText(-s.Heat))
	}
	if s.Gas > chem.Millilitre {
		lines = append(lines, "gas: "+volumeText(s.Gas)+" of "+s.GasOf)
	}
	for _, l := range losses {
		if l.Step == s.N {
			lines = append(lines, "loses "+massText(l.Mass)+" of "+l.Substance+", "+percentText(l.Share)+", "+l.Where)
		}
	}
	return lines
}

var (
	nameLine    = regexp.MustCompile(`(?m)^recipe:.*$`)
	versionLine = regexp.MustCompile(`(?m)^version:[ \t]*["']?([^"'#\n]*?)["']?[ \t]*$`)
	provenLine  = regexp.MustCompile(`(?m)^proven:.*\n`)
)

// lineOf is the line on which a pattern is found, or 1.
func lineOf(text string, pattern *regexp.Regexp) int {
	at := pattern.FindStringIndex(text)
	if at == nil {
		return 1
	}
	return 1 + strings.Count(text[:at[0]], "\n")
}

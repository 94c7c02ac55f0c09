package inventory

import (
	"fmt"
	"regexp"
	"strings"

	"stillroom/chem"
)

// identity is what a row's name, registry number and formula say it is: the
// pure, anhydrous substance and the form's own name.
type identity struct {
	substance Substance // ID 0; to be found or added by name
	formName  string    // the name without strength: "sodium dichromate dihydrate"
	formCAS   string    // of a hydrate
	waters    float64
	strength  strengthCell // from the name; zero for none
	solution  bool         // the name or the table says that it is an aqueous solution
	known     *chem.Substance
	grade     string // words left over in the name: "pellets", "ACS"
}

var (
	nameStrength = regexp.MustCompile(`^(.*?)[\s,(]+((?:≥|>=|>|~|ca\.?\s)?\s*\d{1,3}(?:[.,]\d+)?\+?\s*%?\s*(?:(?:-|–)\s*\d{1,3}(?:[.,]\d+)?\s*)?%\+?)\s*(?:w/w|m/m)?\s*\)?[\s,]*(.*)$`)
	solutionWord = regexp.MustCompile(`(?i)[\s,(]+(?:aqueous\s+solution|solution\s+in\s+water|solution|aqueous|aq\.?|sol\.?|in water)\)?(?:[\s,]|$)`)
	gradeWord    = regexp.MustCompile(`(?i)[\s,(]+(pellets|flakes|powder|granules|crystals|anhydrous|technical|tech\.?|extra pure|puriss\.?|p\.?a\.?|acs|reagent grade|acs reagent|for analysis|for synthesis|hplc grade|denatured|concentrated|conc\.?|dilute|glacial|dry)\)?$`)
)

// identify resolves a row's name, registry number and formula against the
// embedded table. Nothing is guessed: what contradicts itself is refused, and
// what isn't known stands as the lab's own substance without data.
func identify(name, cas, formula string) (identity, error) {
	name, cas = strings.Join(strings.Fields(name), " "), strings.TrimSpace(cas)
	id := identity{formName: name}
	if err := id.cutName(); err != nil {
		return id, err
	}
	byName := id.lookup()
	if cas == "" {
		if byName == nil && name == "" {
			return id, fmt.Errorf("neither a name nor a CAS number")
		}
		id.known = byName
		return id.settle(formula)
	}
	cas = strings.TrimPrefix(strings.TrimPrefix(cas, "CAS "), "CAS:")
	if !ValidCAS(strings.TrimSpace(cas)) {
		return id, fmt.Errorf("CAS number %q: the check digit doesn't fit", cas)
	}
	byCAS, ok := chem.SubstanceByCAS(cas)
	if !ok {
		if byName != nil {
			return id, fmt.Errorf("CAS number %s isn't that of %s, which is %s", cas, byName.Name, byName.CAS)
		}
		if name == "" {
			return id, fmt.Errorf("CAS number %s isn't in the embedded table, and there is no name", cas)
		}
		id.substance.CAS = cas
		return id.settle(formula)
	}
	if byName != nil && byName.CAS != byCAS.CAS && !sameButWater(byName, byCAS) {
		return id, fmt.Errorf("the name says %s (%s), the CAS number says %s (%s)", byName.Name, byName.CAS, byCAS.Name, byCAS.CAS)
	}
	id.known = byCAS
	if byName != nil && byName.CAS != byCAS.CAS {
		if byName.Hydrate() > 0 {
			id.known = byName // the number of the anhydrous substance beside the name of a hydrate
		} else if byCAS.Hydrate() == 0 {
			return id, fmt.Errorf("the name says %s, the CAS number says %s", byName.Name, byCAS.Name)
		}
	}
	if byName == nil && name != "" && looksHydrated(name) && id.known.Hydrate() == 0 {
		return id, fmt.Errorf("the name says a hydrate, CAS number %s is %s without water", cas, id.known.Name)
	}
	return id.settle(formula)
}

// cutName takes a strength, "solution" and grade words off the end of the name.
func (id *identity) cutName() error {
	if known(id.formName) {
		return nil
	}
	if m := nameStrength.FindStringSubmatch(id.formName); m != nil {
		s, err := parseStrength(m[2], "%")
		if err != nil {
			return err
		}
		id.strength = s
		id.formName = strings.TrimSpace(m[1] + " " + m[3])
	}
	if at := solutionWord.FindStringIndex(id.formName); at != nil && at[0] > 0 {
		short := strings.TrimSpace(id.formName[:at[0]] + " " + id.formName[at[1]:])
		if known(id.formName) || known(short) {
			id.solution = true
		}
		if !known(id.formName) && known(short) {
			id.formName = short
		}
	}
	id.cutGrade()
	return nil
}

// cutGrade takes grade words off, but only where a name the table knows is left:
// "granules" may as well belong to the name.
func (id *identity) cutGrade() {
	name, grade := id.formName, ""
	for range 3 {
		if known(name) {
			id.formName, id.grade = name, grade
			return
		}
		m := gradeWord.FindStringSubmatchIndex(name)
		if m == nil || m[0] == 0 {
			return
		}
		grade = strings.TrimSpace(name[m[2]:m[3]] + " " + grade)
		name = strings.TrimRight(name[:m[0]], " ,(")
	}
}

func known(name string) bool {
	_, ok := chem.LookupSubstance(name)
	return ok
}

func (id *identity) lookup() *chem.Substance {
	if id.formName == "" {
		return nil
	}
	s, _ := chem.LookupSubstance(id.formName)
	return s
}

func looksHydrated(name string) bool {
	lower := strings.ToLower(name)
	return strings.Contains(lower, "hydrate") && !strings.Contains(lower, "anhydr") && !strings.Contains(lower, "carbohydrate") && !strings.Contains(lower, "hydrated lime")
}

func sameButWater(a, b *chem.Substance) bool {
	fa, errA := chem.ParseFormula(a.Formula)
	fb, errB := chem.ParseFormula(b.Formula)
	return errA == nil && errB == nil && fa.Anhydrous().Hill() == fb.Anhydrous().Hill()
}

// settle finds the anhydrous substance of a hydrate and fills the record.
func (id identity) settle(formula string) (identity, error) {
	if id.known == nil {
		id.substance.Name, id.substance.Own, id.substance.Source = id.formName, true, "entered by the lab"
		if f, err := chem.ParseFormula(strings.TrimSpace(formula)); err == nil {
			id.waters = f.Waters()
			id.substance.Formula = f.Anhydrous().String()
		}
		return id, nil
	}
	if formula != "" {
		if err := formulaFits(formula, id.known); err != nil {
			return id, err
		}
	}
	pure := id.known
	if f, err := chem.ParseFormula(id.known.Formula); err == nil && f.Waters() > 0 {
		id.waters, id.formCAS = f.Waters(), id.known.CAS
		base, ok := anhydrousOf(id.known, f)
		if !ok {
			return id, fmt.Errorf("%s: the substance without its water isn't in the embedded table", id.known.Name)
		}
		pure = base
	}
	id.formName = id.known.Name
	id.solution = id.solution || pure.State == "liquid (solution)"
	id.substance = Substance{Name: pure.Name, Synonyms: strings.Join(pure.Synonyms, "; "), CAS: pure.CAS,
		Formula: pure.Formula, Source: "embedded substance table"}
	return id, nil
}

// anhydrousOf finds the substance a hydrate is a hydrate of: by its name
// without the water, or by the formula if only one substance has it.
func anhydrousOf(hydrate *chem.Substance, f chem.Formula) (*chem.Substance, bool) {
	name := hydrateWord.ReplaceAllString(hydrate.Name, "")
	if s, ok := chem.LookupSubstance(name); ok && s.Hydrate() == 0 && s.CAS != hydrate.CAS {
		return s, true
	}
	s, ok := chem.LookupSubstance(f.Anhydrous().String())
	return s, ok && s.Hydrate() == 0
}

var hydrateWord = regexp.MustCompile(`(?i)\s+\S*hydrate$`)

func formulaFits(text string, s *chem.Substance) error {
	f, err := chem.ParseFormula(strings.TrimSpace(text))
	if err != nil {
		return nil // a drawing or a brand's shorthand; the name and number decide
	}
	of, err := chem.ParseFormula(s.Formula)
	if err == nil && f.Anhydrous().Hill() != of.Anhydrous().Hill() {
		return fmt.Errorf("the formula %s isn't that of %s, which is %s", text, s.Name, s.Formula)
	}
	return nil
}

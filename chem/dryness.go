package chem

import (
	"fmt"
	"strings"
)

// An AgentNeed is the mass of a drying agent for a load of water. Low is what
// does if the agent works at its best, High if at its worst.
type AgentNeed struct{ Low, Typical, High Mass }

// For returns the agent needed for a mass of water,
//
//	m = m(water) / capacity
//
// with the capacity at its practical best, at the middle of the practical range
// and at its practical worst. A practical best above the hydrate's own capacity
// is cut back to it. The error wraps ErrNoData where the table has no practical
// range, as with sodium hydroxide.
func (a DryingAgent) For(water Mass) (AgentNeed, error) {
	of := fmt.Sprintf("amount of %s for %.3g g of water", a.Name, water.Grams())
	if !(water >= 0) || !Finite(water) {
		return AgentNeed{}, &DataError{Of: of, Err: ErrOutOfRange, Limit: "water must not be below zero", Remedy: "give the mass of water"}
	}
	low, high := a.practical()
	if low <= 0 || high <= 0 {
		limit := "no practical capacity"
		if a.Theoretical > 0 {
			limit = fmt.Sprintf("no practical capacity; the hydrate would hold %.3g g/g", a.Theoretical)
		}
		return AgentNeed{}, &DataError{Of: of, Err: ErrNoData, Limit: limit, Remedy: "name another agent or give capacity= in g water per g"}
	}
	return AgentNeed{Low: water / Mass(high), Typical: water / Mass((low+high)/2), High: water / Mass(low)}, nil
}

// practical returns the practical capacities, cut back to what the hydrate holds.
func (a DryingAgent) practical() (low, high float64) {
	low, high = a.Low, a.High
	if a.Theoretical > 0 {
		low, high = min(low, a.Theoretical), min(high, a.Theoretical)
	}
	return low, high
}

// WaterLoad returns the water that an organic layer brings to the drying agent:
// what is dissolved in the solvent at saturation and the droplets it carries
// along, as a share of the layer's mass.
func WaterLoad(solvent Mass, waterInSolvent Fraction, droplets Fraction) (Mass, error) {
	of := "water load"
	if err := firstError(
		mustBeShare(of, "water in the solvent", waterInSolvent, false),
		mustBeShare(of, "share of droplets", droplets, false),
	); err != nil {
		return 0, err
	}
	if !(solvent >= 0) || !Finite(solvent) {
		return 0, mustBePositive(of, "mass of solvent", solvent)
	}
	return solvent*Mass(waterInSolvent/(1-waterInSolvent)) + solvent*Mass(droplets), nil
}

// HeldBack returns the share of a dissolved product that stays in the wet cake
// of a drying agent: the liquid the cake holds, per mass of agent, against all
// the liquid, then thinned by each rinse that is mixed with what is held.
//
//	share = v/V · (v/(v + R))^n,   v = agent · held
//
// where V is the volume of the solution, R that of one rinse and n their number.
// It is 1 where the cake would hold all there is.
func HeldBack(agent Mass, heldPerMass float64, solution, rinse Volume, rinses int) (Fraction, error) {
	of := "product held back by the drying agent"
	if err := mustBePositive(of, "volume of solution", solution); err != nil {
		return 0, err
	}
	if !(agent >= 0) || !(heldPerMass >= 0) || !(rinse >= 0) || rinses < 0 || !Finite(agent) || !Finite(heldPerMass) {
		return 0, &DataError{Of: of, Err: ErrOutOfRange, Limit: "no input may be below zero", Remedy: "give the mass of agent and the liquid it holds in m³/kg"}
	}
	held := Volume(float64(agent) * heldPerMass)
	if held == 0 {
		return 0, nil
	}
	share := min(Fraction(held/solution), 1)
	if rinse > 0 {
		thinned := Fraction(held / (held + rinse))
		for range rinses {
			share *= thinned
		}
	}
	return share, nil
}

// Unsuitable says whether the agent must not meet a product of a class, such as
// "carboxylic acid" or "alcohol", and why. It is false for a class that the
// table doesn't speak of; that is no statement that the pair is good.
func (a DryingAgent) Unsuitable(class string) (reason string, bad bool) {
	want := strings.Fields(singular(strings.ToLower(strings.TrimSpace(class))))
	if len(want) == 0 {
		return "", false
	}
	for _, entry := range a.Incompatible {
		if !meetsClass(strings.ToLower(entry), want) {
			continue
		}
		return fmt.Sprintf("%s must not meet %s: %s (listed: %s)", a.Name, strings.Join(want, " "), a.why(), entry), true
	}
	return "", false
}

// classOfGroup names the reactivity groups of the compatibility chart
// (EPA-600/2-80-076) in the words of the table of drying agents.
var classOfGroup = map[int]string{
	1: "strong acids", 2: "strong acids", 3: "carboxylic acids", 4: "alcohols", 5: "aldehydes", 6: "amides",
	7: "amines", 13: "esters", 14: "ethers", 19: "ketones", 31: "phenols", 34: "epoxides",
}

// DryingClasses names the classes of a product, as the drying agents know them, by its
// reactivity groups.
func DryingClasses(groups []int) []string {
	var classes []string
	for _, g := range groups {
		if class, ok := classOfGroup[g]; ok {
			classes = append(classes, class)
		}
	}
	return classes
}

// UnsuitableFor is Unsuitable for a product by name: the name itself, then the classes
// of a substance that the table knows.
func (a DryingAgent) UnsuitableFor(product string) (reason string, bad bool) {
	if reason, bad = a.Unsuitable(product); bad {
		return reason, bad
	}
	s, ok := LookupSubstance(product)
	if !ok {
		return "", false
	}
	for _, class := range DryingClasses(s.ReactiveGroups) {
		if reason, bad = a.Unsuitable(class); bad {
			return fmt.Sprintf("%s is of the %s: %s", s.Name, class, reason), true
		}
	}
	return "", false
}

// why says what an agent does to the classes it must not meet (practice of the
// agents: Robertson, Laboratory Practice of Organic Chemistry, 3rd ed.,
// pp. 147 to 152; common practice).
func (a DryingAgent) why() string {
	switch a.CAS {
	case "10043-52-4":
		return "it binds them as a solid complex or salt"
	case "584-08-7", "1310-73-2":
		return "it is a base, forms the salt or splits them"
	case "1314-56-3":
		return "it dehydrates or esterifies them"
	case "7487-88-9":
		return "it is weakly acidic and can open or split them"
	case "308080-99-1", "70955-01-0":
		return "they attack the sieve or fill it"
	}
	return "the table lists them as incompatible"
}

// meetsClass compares a class with one entry of the table by their last word, so
// that "acids" meets "carboxylic acid" and "carboxylic acids" meets "fatty acid";
// doubt goes to the warning. Only an entry on strong ones leaves others be.
func meetsClass(entry string, want []string) bool {
	family, kind := want[len(want)-1], want[:len(want)-1]
	for part := range strings.FieldsFuncSeq(entry, func(r rune) bool { return strings.ContainsRune("(),", r) }) {
		for piece := range strings.SplitSeq(part, " and ") {
			words := strings.Fields(singular(strings.TrimSpace(piece)))
			if len(words) == 0 || words[len(words)-1] != family {
				continue
			}
			if words[0] == "strong" && len(kind) > 0 && kind[0] != "strong" {
				continue
			}
			return true
		}
	}
	return false
}

// singular takes the plural s off the last word, and off "-ies" the whole ending.
func singular(text string) string {
	switch {
	case strings.HasSuffix(text, "ies"):
		return strings.TrimSuffix(text, "ies") + "y"
	case strings.HasSuffix(text, "ss"), !strings.HasSuffix(text, "s"):
		return text
	}
	return strings.TrimSuffix(text, "s")
}

// HydrateCapacity returns the ceiling of what a salt binds on the way to a
// hydrate, in gram water per gram salt,
//
//	n · M(water) / M(salt)
//
// The error wraps ErrImpossible where the hydrate isn't one of the salt.
func HydrateCapacity(salt, hydrate Formula) (float64, error) {
	taken := hydrate.Waters() - salt.Waters()
	if taken <= 0 || salt.Anhydrous().Hill() != hydrate.Anhydrous().Hill() {
		return 0, &DataError{
			Of: fmt.Sprintf("capacity of %s as %s", salt, hydrate), Err: ErrImpossible,
			Limit: "it is no higher hydrate of the same salt", Remedy: "give a hydrate such as Na2SO4·10H2O",
		}
	}
	return taken * waterMolarMass / float64(salt.MolarMass()), nil
}

package planner

import (
	"fmt"
	"slices"
	"strings"

	"stillroom/chem"
)

// inCommon is what two charges of a substance both accept. Where no stock
// would do for both, clash says why.
func inCommon(a, b Accept) (both Accept, clash string) {
	both = Accept{
		Least: max(a.Least, b.Least), Most: leastBound(a.Most, b.Most),
		Hydrate: a.Hydrate && b.Hydrate, Solution: a.Solution && b.Solution, WithAdditive: a.WithAdditive && b.WithAdditive,
		Grades: gradesInCommon(a.Grades, b.Grades),
	}
	for _, s := range a.Substitutes {
		if slices.ContainsFunc(b.Substitutes, func(o Substitute) bool { return o.Substance == s.Substance && o.Factor == s.Factor }) {
			both.Substitutes = append(both.Substitutes, s)
		}
	}
	switch {
	case both.Most > 0 && both.Least > both.Most:
		return both, fmt.Sprintf("no stock is both %s and %s", a.strengthText(), b.strengthText())
	case len(both.Grades) == 0 && len(a.Grades)+len(b.Grades) > 0:
		return both, fmt.Sprintf("no grade is both %s and %s", strings.Join(a.Grades, " or "), strings.Join(b.Grades, " or "))
	}
	return both, ""
}

// leastBound is the stricter of two upper bounds, of which 0 is none.
func leastBound(a, b chem.Fraction) chem.Fraction {
	if a == 0 || b == 0 {
		return max(a, b)
	}
	return min(a, b)
}

// gradesInCommon keeps the grades of both lists, of which an empty one is any.
func gradesInCommon(a, b []string) []string {
	if len(a) == 0 || len(b) == 0 {
		return slices.Concat(a, b)
	}
	return slices.DeleteFunc(slices.Clone(a), func(g string) bool {
		return !slices.ContainsFunc(b, func(o string) bool { return strings.EqualFold(g, o) })
	})
}

// strengthText says what strengths are accepted.
func (a *Accept) strengthText() string {
	switch {
	case a.Most == 0:
		return plainf("at least %.3g %%", a.Least.Percent())
	case a.Least == 0:
		return plainf("at most %.3g %%", a.Most.Percent())
	}
	return plainf("%.3g to %.3g %%", a.Least.Percent(), a.Most.Percent())
}

package planner

import (
	"regexp"
	"strconv"
)

// powers are numbers that %g wrote with a power of ten.
var powers = regexp.MustCompile(`[0-9]+(?:\.[0-9]+)?e\+[0-9]+`)

// withoutPowers writes 1.43e+03 in a text as 1430, as people do.
func withoutPowers(text string) string {
	return powers.ReplaceAllStringFunc(text, func(s string) string {
		x, err := strconv.ParseFloat(s, 64)
		if err != nil {
			return s
		}
		return strconv.FormatFloat(x, 'f', -1, 64)
	})
}

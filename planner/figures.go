package planner

import (
	"fmt"
	"regexp"
	"strconv"
	"strings"
)

// plainf formats as fmt.Sprintf does and writes what %g gives a power of ten
// without it, as people do: %.3g of 1432 is 1430.
func plainf(format string, a ...any) string {
	return withoutPowers(fmt.Sprintf(format, a...))
}

// powers are numbers that %g wrote with a power of ten. What is under a
// millionth keeps it: its zeros couldn't be counted.
var powers = regexp.MustCompile(`[0-9]+(?:\.[0-9]+)?e(?:\+[0-9]+|-0[1-6])\b`)

// withoutPowers writes 1.43e+03 in a text as 1430 and 9.7e-05 as 0.000097.
func withoutPowers(text string) string {
	if !strings.Contains(text, "e+") && !strings.Contains(text, "e-0") {
		return text
	}
	return powers.ReplaceAllStringFunc(text, func(s string) string {
		x, err := strconv.ParseFloat(s, 64)
		if err != nil {
			return s
		}
		return strconv.FormatFloat(x, 'f', -1, 64)
	})
}

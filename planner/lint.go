package planner

import (
	"cmp"
	"fmt"
	"regexp"
	"slices"
	"strings"
)

// vague words leave to the reader what a recipe should say in a number.
var vague = []struct {
	pattern *regexp.Regexp
	ask     string
}{
	{regexp.MustCompile(`(?i)\b(slowly|gradually|rapidly|quickly)\b`), "a time or a rate, such as over 45 min"},
	{regexp.MustCompile(`(?i)\b(overnight)\b`), "a time, such as 16 h"},
	{regexp.MustCompile(`(?i)\b(for a while|for some time|briefly|a few minutes|a few hours|several hours)\b`), "a time, such as 20 min"},
	{regexp.MustCompile(`(?i)\b(usual work-?up|standard work-?up|worked up as usual|the usual way|as usual)\b`), "the steps themselves"},
	{regexp.MustCompile(`(?i)\b(excess)\b`), "how much more, such as 20 %"},
	{regexp.MustCompile(`(?i)\b(some|a little|a small amount|a few drops|plenty of|enough|sufficient|q\. ?s\.)\b`), "an amount, such as 5 mL"},
	{regexp.MustCompile(`(?i)\b(gentle heat|gently|moderate heat|ice-cold|room temperature)\b`), "a temperature, such as 35 °C"},
	{regexp.MustCompile(`(?i)\b(several times|a few times|repeatedly|thoroughly)\b`), "how often, such as 3 times"},
	{regexp.MustCompile(`(?i)\b(dilute|concentrated|strong|weak) (acid|base|alkali|sulfuric|hydrochloric|nitric)`), "a strength, such as 10 %"},
	{regexp.MustCompile(`(?i)\b(until complete|until done|to completion)\b`), "what is seen or measured when it is done"},
}

// proseKeys are the keys whose values tell people what to do.
var proseKeys = regexp.MustCompile(`^\s*(?:-\s*)?(?:\{.*)?\b(about|name|cautions|controls|hold-point|note|why|time)\s*:`)

// Lint finds vague words in a recipe's text, each with its place and what
// number it asks for. It looks at the values that tell people what to do; a
// number in the same sentence satisfies it.
func Lint(file, text string) []RecipeFault {
	var faults []RecipeFault
	prose, indent := false, 0
	for i, line := range strings.Split(text, "\n") {
		depth := len(line) - len(strings.TrimLeft(line, " "))
		if loc := proseKeys.FindStringIndex(line); loc != nil {
			prose, indent = true, depth
			faults = append(faults, lintLine(file, i+1, loc[1], line[loc[1]:])...)
			continue
		}
		if prose && depth > indent {
			faults = append(faults, lintLine(file, i+1, 0, line)...)
			continue
		}
		prose = false
	}
	return faults
}

// lintLine finds the vague words of one line, which begins at column offset.
func lintLine(file string, number, offset int, line string) []RecipeFault {
	var faults []RecipeFault
	for _, v := range vague {
		for _, at := range v.pattern.FindAllStringIndex(line, -1) {
			if hasNumber(sentenceAround(line, at[0], at[1])) {
				continue
			}
			column := len([]rune(line[:at[0]])) + offset + 1
			faults = append(faults, RecipeFault{file, number, column, fmt.Sprintf("%q leaves it to the reader", line[at[0]:at[1]]), v.ask})
		}
	}
	slices.SortStableFunc(faults, func(a, b RecipeFault) int { return cmp.Compare(a.Column, b.Column) })
	return faults
}

// sentenceAround returns the part of a line between the stops on both sides.
func sentenceAround(line string, from, to int) string {
	const stops = ".;:\"[]"
	left := strings.LastIndexAny(line[:from], stops) + 1
	right := strings.IndexAny(line[to:], stops)
	if right < 0 {
		return line[left:]
	}
	return line[left : to+right]
}

// hasNumber reports whether a text says a number, in digits.
func hasNumber(s string) bool { return strings.ContainsAny(s, "0123456789") }

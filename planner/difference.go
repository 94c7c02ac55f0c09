package planner

import (
	"fmt"
	"strings"
)

// Change is one line of the difference between two versions of a recipe.
type Change struct {
	// Old and New are line numbers from 1; 0 where the line isn't in that version.
	Old, New int
	Text     string
}

// Kept reports that the line is in both versions.
func (c Change) Kept() bool { return c.Old > 0 && c.New > 0 }

// Taken reports that the line is in the old version only.
func (c Change) Taken() bool { return c.New == 0 }

// Put reports that the line is in the new version only.
func (c Change) Put() bool { return c.Old == 0 }

// Difference compares two versions of a recipe's text line by line, by a longest
// common subsequence: all lines in order, each kept, taken out or put in.
func Difference(before, after string) []Change {
	a, b := strings.Split(before, "\n"), strings.Split(after, "\n")
	common := commonLines(a, b)
	var list []Change
	i, j := 0, 0
	for i < len(a) || j < len(b) {
		switch {
		case i < len(a) && j < len(b) && a[i] == b[j]:
			list = append(list, Change{i + 1, j + 1, a[i]})
			i, j = i+1, j+1
		case j == len(b) || i < len(a) && common[i+1][j] >= common[i][j+1]:
			list = append(list, Change{Old: i + 1, Text: a[i]})
			i++
		default:
			list = append(list, Change{New: j + 1, Text: b[j]})
			j++
		}
	}
	return list
}

// commonLines returns, for every pair of positions, how many lines the rests
// have in common in order.
func commonLines(a, b []string) [][]int {
	table := make([][]int, len(a)+1)
	for i := range table {
		table[i] = make([]int, len(b)+1)
	}
	for i := len(a) - 1; i >= 0; i-- {
		for j := len(b) - 1; j >= 0; j-- {
			if a[i] == b[j] {
				table[i][j] = table[i+1][j+1] + 1
				continue
			}
			table[i][j] = max(table[i+1][j], table[i][j+1])
		}
	}
	return table
}

// DifferenceInWords says what changed between two recipes that concerns
// quantities: charges, yield, proven scale and steps, one sentence each.
func DifferenceInWords(before, after *Recipe) []string {
	var list []string
	say := func(format string, a ...any) { list = append(list, fmt.Sprintf(format, a...)) }
	if before.Yield != after.Yield {
		say("yield %.3g ± %.2g %% instead of %.3g ± %.2g %%", after.Yield.Mean.Percent(), after.Yield.SD.Percent(), before.Yield.Mean.Percent(), before.Yield.SD.Percent())
	}
	if before.ProvenScale != after.ProvenScale {
		say("proven at %.3g mol instead of %.3g mol", float64(after.ProvenScale), float64(before.ProvenScale))
	}
	was := map[string]int{}
	for _, s := range before.Steps {
		was[s.Do+" "+s.Name]++
	}
	for _, s := range after.Steps {
		key := s.Do + " " + s.Name
		if was[key] == 0 {
			say("step %d is new: %s, %s", s.N, s.Do, s.Name)
			continue
		}
		was[key]--
	}
	for _, s := range before.Steps {
		if key := s.Do + " " + s.Name; was[key] > 0 {
			was[key]--
			say("step %d is gone: %s, %s", s.N, s.Do, s.Name)
		}
	}
	return list
}

package main

import (
	"encoding/json"
	"fmt"
	"io"
	"strings"
	"text/tabwriter"

	"github.com/spf13/cobra"

	"stillroom/planner/reckoner"
	"stillroom/views"
)

func newReckon() *cobra.Command {
	cmd := &cobra.Command{
		Use:   "reckon SUM key=value … [--json]",
		Short: "Do one of the bench sums; alone, list them",
		Args: func(cmd *cobra.Command, args []string) error {
			if len(args) == 0 {
				return nil
			}
			_, err := reckoner.Reckon(cmd.Context(), args[0], nil)
			return usageError{err}
		},
		RunE: func(cmd *cobra.Command, _ []string) error {
			return listSums(cmd.OutOrStdout())
		},
	}
	for _, sum := range reckoner.Sums() {
		cmd.AddCommand(newSum(sum))
	}
	return cmd
}

// newSum makes the command of one sum.
func newSum(sum reckoner.Sum) *cobra.Command {
	var asJSON bool
	cmd := &cobra.Command{
		Use:     sum.Name + " " + usageOf(sum),
		Short:   sum.About,
		Long:    sum.About + "\n\n" + keysOf(sum) + "\nGives: " + strings.Join(sum.Gives, ", ") + "\nHolds for: " + sum.Range + "\nSource: " + sum.Source,
		Example: "  " + exampleOf(sum),
		RunE: func(cmd *cobra.Command, args []string) error {
			inputs, err := reckoner.ParseArgs(args)
			if err != nil {
				return usageError{err}
			}
			answer, err := sum.Reckon(cmd.Context(), inputs)
			if err != nil {
				return usageError{err}
			}
			return showAnswer(cmd.OutOrStdout(), answer, asJSON)
		},
	}
	cmd.Flags().BoolVar(&asJSON, "json", false, "print the answer as JSON")
	return cmd
}

func usageOf(sum reckoner.Sum) string {
	var words []string
	for _, key := range sum.Keys {
		word := key.Name + "=…"
		if key.Optional {
			word = "[" + word + "]"
		}
		words = append(words, word)
	}
	return strings.Join(words, " ")
}

func keysOf(sum reckoner.Sum) string {
	var b strings.Builder
	w := tabwriter.NewWriter(&b, 0, 0, 2, ' ', 0)
	for _, key := range sum.Keys {
		need := ""
		if key.Optional {
			need = " (may be left out)"
		}
		fmt.Fprintf(w, "  %s\t%s%s, such as %s\n", key.Name, key.Label, need, key.Hint)
	}
	w.Flush()
	return b.String()
}

// exampleOf is the example as it is typed in a shell.
func exampleOf(sum reckoner.Sum) string {
	words := []string{"stillroom reckon", sum.Name}
	for _, arg := range sum.Example {
		words = append(words, quoted(arg))
	}
	return strings.Join(words, " ")
}

// quoted puts an argument into single quotes where a shell would take it apart.
func quoted(arg string) string {
	if strings.ContainsAny(arg, " ;*()<>&|$^[]{}·'\"") {
		return "'" + strings.ReplaceAll(arg, "'", `'\''`) + "'"
	}
	return arg
}

func listSums(out io.Writer) error {
	w := tabwriter.NewWriter(out, 0, 0, 2, ' ', 0)
	group := ""
	for _, sum := range reckoner.Sums() {
		if sum.Group != group {
			if group != "" {
				fmt.Fprintln(w)
			}
			group = sum.Group
			fmt.Fprintln(w, group)
		}
		fmt.Fprintf(w, "  %s\t%s\n", sum.Name, sum.About)
	}
	fmt.Fprintln(w, "\nstillroom reckon SUM --help shows the keys of a sum and an example.")
	return w.Flush()
}

// showAnswer prints an answer for scripts, unrounded, or for people, with the
// sum as it was done.
func showAnswer(out io.Writer, answer reckoner.Answer, asJSON bool) error {
	if asJSON {
		e := json.NewEncoder(out)
		e.SetEscapeHTML(false)
		e.SetIndent("", "  ")
		return e.Encode(answer)
	}
	return views.WriteAnswerText(out, answer)
}

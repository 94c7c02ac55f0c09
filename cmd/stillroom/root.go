package main

import (
	"io"
	"time"

	"github.com/spf13/cobra"

	"stillroom/inventory"
)

// today is the civil date of the machine's clock, the only clock the program
// reads besides the one that stamps changes of the stock.
func today() inventory.Date { return inventory.DateOf(time.Now()) }

// newRoot joins the commands. Each has its own file.
func newRoot(stdout, stderr io.Writer) *cobra.Command {
	root := &cobra.Command{
		Use:   "stillroom",
		Short: "Plan preparative chemistry runs against the stock on the shelf",
		Args: func(cmd *cobra.Command, args []string) error {
			if len(args) > 0 {
				return usagef("no command %q: want one of demo, serve, plan, reckon, import, export, backup, restore, check", args[0])
			}
			return nil
		},
		RunE:          func(cmd *cobra.Command, _ []string) error { return cmd.Help() },
		SilenceErrors: true,
		SilenceUsage:  true,
	}
	root.SetOut(stdout)
	root.SetErr(stderr)
	root.SetFlagErrorFunc(func(cmd *cobra.Command, err error) error {
		return usagef("%w\nusage: %s", err, cmd.UseLine())
	})
	root.CompletionOptions.DisableDefaultCmd = true
	root.AddCommand(newDemo(today), newServe(today), newPlan(today), newReckon(),
		newImport(), newExport(), newBackup(), newRestore(), newCheck())
	return root
}

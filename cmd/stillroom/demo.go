package main

import (
	"fmt"

	"github.com/spf13/cobra"

	"stillroom/inventory"
)

func newDemo(today func() inventory.Date) *cobra.Command {
	var listen string
	cmd := &cobra.Command{
		Use:   "demo [--listen ADDR]",
		Short: "Serve a demonstration lab, its data in memory",
		Long: `Serve a demonstration lab: an invented bench that prepares reference standards,
with some ninety bottles and the faults that real stockrooms have. Its data lies
in memory and is gone when the program ends.`,
		Args: exactly(0, "no arguments"),
		RunE: func(cmd *cobra.Command, _ []string) error {
			if err := onlyLoopback(listen); err != nil {
				return err
			}
			out := cmd.OutOrStdout()
			fmt.Fprintln(out, "setting up the demonstration lab in memory …")
			store, err := inventory.Open(cmd.Context(), inventory.Options{Memory: true})
			if err != nil {
				return err
			}
			defer store.Close()
			lab := inventory.DemoLab(today())
			act := inventory.Act{By: "demonstration", Why: "set up the demonstration lab"}
			if err := store.Fill(cmd.Context(), lab, act); err != nil {
				return err
			}
			fmt.Fprintf(out, "%d bottles, %d runs; everything in it is invented, and gone when you stop it\n", len(lab.Bottles), len(lab.Runs))
			return serve(cmd.Context(), store, listen, today, out)
		},
	}
	cmd.Flags().StringVar(&listen, "listen", defaultListen, "address to listen on")
	return cmd
}

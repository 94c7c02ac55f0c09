package main

import (
	"fmt"

	"github.com/spf13/cobra"

	"stillroom/inventory"
)

func newBackup() *cobra.Command {
	var o dataOptions
	cmd := &cobra.Command{
		Use:   "backup --data DIR FILE",
		Short: "Write a backup of one moment, while others go on working",
		Long: `Write a backup of one moment, while others go on working, and read it again to
see that it is whole. A FILE that ends in .db is a SQLite database; any other is
the portable archive, from which a PostgreSQL server can be filled too.`,
		Args: exactly(1, "a file to write"),
		RunE: func(cmd *cobra.Command, args []string) error {
			store, err := o.openExisting(cmd.Context(), "backup")
			if err != nil {
				return err
			}
			defer store.Close()
			if err := store.Backup(cmd.Context(), args[0]); err != nil {
				return err
			}
			fmt.Fprintf(cmd.OutOrStdout(), "backed up to %s and read again: it is whole\n", args[0])
			return nil
		},
	}
	o.register(cmd.Flags())
	return cmd
}

func newRestore() *cobra.Command {
	var o dataOptions
	cmd := &cobra.Command{
		Use:   "restore --data DIR FILE",
		Short: "Fill an empty database from a backup",
		Long: `Fill an empty database from a backup, in the folder or, with --database, on a
PostgreSQL server. Every row and the hashes of the ledger come over as they
were, and all is checked. A database that holds something is left alone.`,
		Args: exactly(1, "a backup file"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if !o.given() {
				return usagef("restore: --data is missing; give the folder to fill, such as --data lab")
			}
			rows, err := inventory.Restore(cmd.Context(), args[0], inventory.Options{Dir: o.dir, Database: o.database})
			if err != nil {
				return err
			}
			fmt.Fprintf(cmd.OutOrStdout(), "restored %d rows; ledger, hashes and references checked\n", rows)
			return nil
		},
	}
	o.register(cmd.Flags())
	return cmd
}

func newCheck() *cobra.Command {
	var o dataOptions
	cmd := &cobra.Command{
		Use:   "check --data DIR",
		Short: "Verify the ledger, its hashes and all references",
		Args:  exactly(0, "no arguments"),
		RunE: func(cmd *cobra.Command, _ []string) error {
			store, err := o.openExisting(cmd.Context(), "check")
			if err != nil {
				return err
			}
			defer store.Close()
			report, err := store.Check(cmd.Context())
			if err != nil {
				return err
			}
			for _, fault := range report.Faults {
				fmt.Fprintln(cmd.OutOrStdout(), fault)
			}
			if n := len(report.Faults); n > 0 {
				return fmt.Errorf("check: %d faults in %d bottles and %d ledger rows; restore the last good backup into an empty folder and compare", n, report.Bottles, report.Entries)
			}
			fmt.Fprintf(cmd.OutOrStdout(), "%d bottles and %d ledger rows: contents, hashes and references agree\n", report.Bottles, report.Entries)
			return nil
		},
	}
	o.register(cmd.Flags())
	return cmd
}

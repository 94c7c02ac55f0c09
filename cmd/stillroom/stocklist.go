package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/user"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"

	"stillroom/inventory"
)

// importOptions are what "stillroom import" is told.
type importOptions struct {
	data             dataOptions
	store, dates, by string
	refused          string
	preview          bool
}

func newImport() *cobra.Command {
	var o importOptions
	cmd := &cobra.Command{
		Use:   "import --data DIR FILE",
		Short: "Take a stock list (CSV or XLSX) into stock",
		Long: `Take a stock list into stock. Columns are matched by their headings; units may
stand in the heading or in the cell. The good rows are taken in one transaction,
every other is named by its line with the reason. The exit status is 0 if at
least one row was taken.`,
		Args: exactly(1, "a stock list"),
		RunE: func(cmd *cobra.Command, args []string) error {
			return o.run(cmd.Context(), args[0], cmd.OutOrStdout())
		},
	}
	f := cmd.Flags()
	f.StringVar(&o.store, "store", "", "storeroom for rows that name none")
	f.StringVar(&o.dates, "dates", "", `order of dates such as 03/04/2026: "day" or "month" first`)
	f.StringVar(&o.by, "by", "", "who imports (default: the name of the account)")
	f.StringVar(&o.refused, "refused", "", "file to write the rows that were not taken into, with the reasons")
	f.BoolVar(&o.preview, "preview", false, "go through everything and take nothing")
	o.data.register(f)
	return cmd
}

func (o *importOptions) run(ctx context.Context, file string, out io.Writer) error {
	table, err := readTable(file)
	if err != nil {
		return err
	}
	mapping := inventory.Match(table)
	if o.dates != "" && o.dates != "day" && o.dates != "month" {
		return usagef("--dates %q: want day or month", o.dates)
	}
	mapping.DayFirst = o.dates
	store, err := o.data.open(ctx, "import")
	if err != nil {
		return err
	}
	defer store.Close()
	report, err := store.Import(ctx, table, mapping, inventory.ImportOptions{
		Act:     inventory.Act{By: o.person(), Why: "import of " + filepath.Base(file)},
		Store:   o.store,
		Preview: o.preview,
	})
	if errors.Is(err, inventory.ErrInvalid) || errors.Is(err, inventory.ErrDuplicate) {
		return usageError{err}
	}
	if err != nil {
		return err
	}
	return o.tell(report, mapping, file, out)
}

func readTable(file string) (inventory.Table, error) {
	f, err := os.Open(file)
	if err != nil {
		return inventory.Table{}, usagef("import: %w", err)
	}
	defer f.Close()
	table, err := inventory.ReadTable(filepath.Base(file), f)
	if err != nil {
		return table, usageError{err}
	}
	return table, nil
}

func (o *importOptions) person() string {
	if o.by != "" {
		return o.by
	}
	if u, err := user.Current(); err == nil && u.Username != "" {
		return u.Username
	}
	return "command line"
}

// tell says what was taken and names every row that was not.
func (o *importOptions) tell(report inventory.ImportReport, m inventory.Mapping, file string, out io.Writer) error {
	for _, row := range report.Refused {
		fmt.Fprintf(out, "%s:%d: not taken: %s\n", file, row.Line, strings.Join(row.Why, "; "))
	}
	for _, question := range m.Questions {
		fmt.Fprintln(out, "to answer:", question)
	}
	for _, note := range report.Notes {
		fmt.Fprintln(out, "note:", note)
	}
	if len(m.Unused) > 0 {
		fmt.Fprintln(out, "columns not used:", strings.Join(m.Unused, ", "))
	}
	verb := "taken"
	if o.preview {
		verb = "would be taken"
	}
	fmt.Fprintf(out, "%d of %d rows %s, %d bottles\n", report.Taken, report.Rows, verb, report.Bottles)
	if o.refused != "" && len(report.Refused) > 0 {
		if err := writeFile(o.refused, report.WriteRefused); err != nil {
			return err
		}
	}
	if report.Taken == 0 {
		return usagef("import %s: no row was taken; the reasons stand above", file)
	}
	return nil
}

// writeFile makes a file whole or not at all.
func writeFile(file string, write func(io.Writer) error) error {
	part, err := os.CreateTemp(filepath.Dir(file), filepath.Base(file)+".part-*")
	if err != nil {
		return fmt.Errorf("writing %s: %w", file, err)
	}
	defer os.Remove(part.Name())
	if err := errors.Join(write(part), part.Sync(), part.Close()); err != nil {
		return fmt.Errorf("writing %s: %w", file, err)
	}
	return os.Rename(part.Name(), file)
}

func newExport() *cobra.Command {
	var o dataOptions
	cmd := &cobra.Command{
		Use:   "export --data DIR FILE",
		Short: "Write the stock as CSV, XLSX or JSON, by the ending of the file",
		Args:  exactly(1, "a file to write"),
		RunE: func(cmd *cobra.Command, args []string) error {
			write, err := exportAs(args[0])
			if err != nil {
				return err
			}
			store, err := o.openExisting(cmd.Context(), "export")
			if err != nil {
				return err
			}
			defer store.Close()
			shelf, err := store.Load(cmd.Context())
			if err != nil {
				return err
			}
			if err := writeFile(args[0], func(w io.Writer) error { return write(w, shelf) }); err != nil {
				return err
			}
			fmt.Fprintf(cmd.OutOrStdout(), "%d bottles written to %s\n", len(shelf.Bottles), args[0])
			return nil
		},
	}
	o.register(cmd.Flags())
	return cmd
}

func exportAs(file string) (func(io.Writer, *inventory.Shelf) error, error) {
	switch strings.ToLower(filepath.Ext(file)) {
	case ".csv":
		return inventory.ExportCSV, nil
	case ".xlsx":
		return inventory.ExportXLSX, nil
	case ".json":
		return inventory.ExportJSON, nil
	}
	return nil, usagef("export %s: the ending says how it is written; want .csv, .xlsx or .json", file)
}

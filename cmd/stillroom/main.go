// Command stillroom plans preparative chemistry runs against the stock that is
// really on the shelf.
//
// Usage:
//
//	stillroom demo  [--listen ADDR]
//	stillroom serve --data DIR [--listen ADDR] [--database URL]
//	stillroom plan RECIPE --target 50g [--on 2027-01-14] [--data DIR] [--json] [--papers DIR]
//	stillroom reckon SUM key=value … [--json]
//	stillroom import --data DIR FILE
//	stillroom export --data DIR FILE
//	stillroom backup --data DIR FILE
//	stillroom restore --data DIR FILE
//	stillroom check --data DIR
//
// The exit status is 0 when all is well (a plan that is covered or tight), 3
// for a plan that is short, late or unfit, 2 for wrong usage or a bad file,
// and 1 for anything else.
package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"os/signal"
	"syscall"
)

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	os.Exit(run(ctx, os.Args[1:], os.Stdout, os.Stderr))
}

// run is the whole program: it carries out the command line and returns the
// exit status.
func run(ctx context.Context, args []string, stdout, stderr io.Writer) int {
	root := newRoot(stdout, stderr)
	root.SetArgs(args)
	err := root.ExecuteContext(ctx)
	if text := errorText(err); text != "" {
		fmt.Fprintln(stderr, "stillroom: "+text)
	}
	return exitStatus(err)
}

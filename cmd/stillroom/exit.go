package main

import (
	"errors"
	"fmt"
	"strings"

	"github.com/spf13/cobra"
)

// The exit statuses of the command line.
const (
	statusOK      = 0
	statusFailed  = 1
	statusUsage   = 2
	statusBlocked = 3
)

// usageError is a mistake in what was typed or in a file that was named: the
// message says what, where, and what would do.
type usageError struct{ err error }

func (e usageError) Error() string { return e.err.Error() }
func (e usageError) Unwrap() error { return e.err }

// usagef makes a usageError.
func usagef(format string, args ...any) error {
	return usageError{fmt.Errorf(format, args...)}
}

// errBlocked says that a plan was made and shown, but the run can't go as
// planned. It has no message of its own: the plan said it.
var errBlocked = errors.New("the run is short, late or unfit")

// exitStatus maps an error to the exit status, in this one place.
func exitStatus(err error) int {
	var usage usageError
	switch {
	case err == nil:
		return statusOK
	case errors.Is(err, errBlocked):
		return statusBlocked
	case errors.As(err, &usage):
		return statusUsage
	}
	return statusFailed
}

// errorText is what is printed for an error: nothing for one that was already
// shown.
func errorText(err error) string {
	if err == nil || errors.Is(err, errBlocked) {
		return ""
	}
	return strings.TrimRight(err.Error(), "\n")
}

// exactly wants n arguments, described by what.
func exactly(n int, what string) cobra.PositionalArgs {
	return func(cmd *cobra.Command, args []string) error {
		if len(args) == n {
			return nil
		}
		return usagef("%s takes %s, not %d arguments\nusage: %s", cmd.CommandPath(), what, len(args), cmd.UseLine())
	}
}

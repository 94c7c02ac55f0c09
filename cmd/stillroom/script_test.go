package main

import (
	"context"
	"os"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

// TestMain lets the test binary stand in for the program, so that the scripts
// run it as a process, exit status included.
func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){
		"stillroom": func() {
			os.Exit(run(context.Background(), os.Args[1:], os.Stdout, os.Stderr))
		},
	})
}

// TestScripts runs the program as a user types it; each file in
// testdata/script is one sitting.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir: "testdata/script",
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			"status": status,
			"json":   checkJSON,
		},
	})
}

// status runs a command and wants exactly this exit status: "status 2 stillroom plan".
func status(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: status CODE command [args]")
	}
	got := "0"
	if err := ts.Exec(args[1], args[2:]...); err != nil {
		got = exitCodeOf(err)
	}
	if got != args[0] {
		ts.Fatalf("%v: exit status %s, want %s", args[1:], got, args[0])
	}
}

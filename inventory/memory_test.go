package inventory

import (
	"context"
	"fmt"
	"os"
	"os/exec"
	"strconv"
	"strings"
	"testing"
)

// A process that serves a stock is weighed on its own, because the one that
// runs the benchmarks has just made it.

const weighDir = "STILLROOM_TEST_WEIGH"

// serveForWeighing does what a server does all day and prints the most memory
// the process ever had, in kB, as Linux counts it.
func serveForWeighing(dir string) error {
	ctx := context.Background()
	s, err := Open(ctx, Options{Dir: dir, Now: noon})
	if err != nil {
		return err
	}
	defer s.Close()
	for i := range 200 {
		code := MakeCode(BottleCode, int64(1+i*37))
		if _, err := s.Search(ctx, []string{"ethyl", "N-00", "pilot", "cabinet 3"}[i%4]); err != nil {
			return err
		}
		if _, err := s.Ledger(ctx, code, 50); err != nil {
			return err
		}
		if _, err := s.Draw(ctx, Taking{code, 1, 0}, clerk); err != nil {
			return err
		}
	}
	if _, err := s.LoadFor(ctx, []string{"TEMPO"}); err != nil {
		return err
	}
	status, err := os.ReadFile("/proc/self/status")
	if err != nil {
		return err
	}
	for line := range strings.Lines(string(status)) {
		if rest, ok := strings.CutPrefix(line, "VmHWM:"); ok {
			fmt.Println(strings.Fields(rest)[0])
		}
	}
	return nil
}

// BenchmarkMemory reports the most memory a serving process needs (Linux only).
func BenchmarkMemory(b *testing.B) {
	dir := stocked(b, *benchBottles).options.Dir
	for b.Loop() {
		cmd := exec.Command(os.Args[0])
		cmd.Env = append(os.Environ(), weighDir+"="+dir)
		cmd.Stderr = os.Stderr
		out, err := cmd.Output()
		if err != nil {
			b.Fatal(err)
		}
		kB, err := strconv.ParseFloat(strings.TrimSpace(string(out)), 64)
		if err != nil {
			b.Skip("this system doesn't tell how much memory a process had")
		}
		b.ReportMetric(kB/1000, "MB-peak")
	}
}

package main

import (
	"bufio"
	"context"
	_ "embed"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"os/exec"
	"regexp"
	"testing"
	"time"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/chromedp"
)

// axe is axe-core 4.14.1 (MPL 2.0), used as it is and by the tests alone.
//
//go:embed testdata/axe/axe.min.js
var axe string

// needTool skips the test where a tool is missing, and fails it where
// STILLROOM_CI says that everything has been installed.
func needTool(t testing.TB, name string) string {
	t.Helper()
	path, err := exec.LookPath(name)
	if err == nil {
		return path
	}
	if os.Getenv("STILLROOM_CI") != "" {
		t.Fatalf("%s is not installed, and STILLROOM_CI makes it compulsory", name)
	}
	t.Skipf("skipped: %s is not installed", name)
	return ""
}

// startDemo runs the demonstration lab on a free port until the test ends and
// returns its address.
func startDemo(t testing.TB) string {
	t.Helper()
	ctx, cancel := context.WithCancel(context.Background())
	r, w := io.Pipe()
	done := make(chan int, 1)
	go func() {
		done <- run(ctx, []string{"demo", "--listen", "127.0.0.1:0"}, w, w)
		w.Close()
	}()
	t.Cleanup(func() {
		cancel()
		if status := <-done; status != statusOK {
			t.Errorf("demo ended with exit status %d", status)
		}
	})
	lines := bufio.NewScanner(r)
	address := regexp.MustCompile(`http://127\.0\.0\.1:\d+`)
	for lines.Scan() {
		if url := address.FindString(lines.Text()); url != "" {
			go io.Copy(io.Discard, r)
			return url
		}
	}
	t.Fatal("demo said no address")
	return ""
}

// newTab opens a browser tab; scripts says whether JavaScript runs in it.
func newTab(t testing.TB, scripts bool, width, height int64) context.Context {
	t.Helper()
	options := append(chromedp.DefaultExecAllocatorOptions[:],
		chromedp.ExecPath(needTool(t, "chromium")),
		chromedp.NoSandbox,
		chromedp.Flag("disable-quic", true),
		chromedp.Flag("disable-component-update", true),
		chromedp.WSURLReadTimeout(time.Minute))
	allocator, stop := chromedp.NewExecAllocator(context.Background(), options...)
	t.Cleanup(stop)
	tab, closeTab := chromedp.NewContext(allocator)
	t.Cleanup(closeTab)
	tab, expire := context.WithTimeout(tab, 2*time.Minute)
	t.Cleanup(expire)
	do(t, tab,
		emulation.SetScriptExecutionDisabled(!scripts),
		chromedp.EmulateViewport(width, height))
	return tab
}

// do carries out browser actions and fails the test if one fails.
func do(t testing.TB, tab context.Context, actions ...chromedp.Action) {
	t.Helper()
	if err := chromedp.Run(tab, actions...); err != nil {
		t.Fatal(err)
	}
}

// violations runs axe over the page that is open and returns what it objects to.
func violations(t testing.TB, tab context.Context) []string {
	t.Helper()
	var found string
	do(t, tab,
		chromedp.Evaluate(axe, nil),
		chromedp.Evaluate(`axe.run().then(r => JSON.stringify(r.violations.map(v =>
			v.id + ": " + v.help + " at " + v.nodes.map(n => n.target.join(" ")).join(", "))))`,
			&found, awaitPromise))
	var list []string
	if err := json.Unmarshal([]byte(found), &list); err != nil {
		t.Fatalf("axe said %q: %v", found, err)
	}
	return list
}

// within is an expression that is true once the text of an element has a piece.
func within(selector, text string) chromedp.Action {
	return chromedp.Poll(fmt.Sprintf(`document.querySelector(%q)?.textContent.includes(%q)`, selector, text), nil)
}

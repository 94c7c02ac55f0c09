package main

import (
	"bufio"
	"context"
	_ "embed"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strings"
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

// A tab is a browser tab. Its browser ends with the test.
type tab struct {
	testing.TB
	ctx     context.Context
	scripts bool
}

// newTab opens a browser tab; scripts says whether JavaScript runs in it.
func newTab(t testing.TB, scripts bool) tab {
	t.Helper()
	allocator, stop := chromedp.NewExecAllocator(context.Background(),
		chromedp.ExecPath(needTool(t, "chromium")),
		chromedp.Headless,
		chromedp.DisableGPU,
		chromedp.NoSandbox,
		chromedp.Flag("disable-quic", true),
		chromedp.Flag("disable-component-update", true),
		chromedp.WSURLReadTimeout(time.Minute))
	t.Cleanup(stop)
	ctx, closeTab := chromedp.NewContext(allocator)
	t.Cleanup(closeTab)
	b := tab{t, ctx, scripts}
	b.do()
	b.ctx, stop = context.WithTimeout(ctx, 3*time.Minute)
	t.Cleanup(stop)
	if !scripts {
		b.call(func() error {
			_, err := chromedp.Call(b.ctx, emulation.SetScriptExecutionDisabled, emulation.SetScriptExecutionDisabledParams{Value: true})
			return err
		})
	}
	b.do(chromedp.EmulateViewport(1280, 1000))
	return b
}

func (b tab) call(f func() error) {
	b.Helper()
	if err := f(); err != nil {
		b.Fatal(err)
	}
}

// do carries out browser actions and fails the test if one fails.
func (b tab) do(actions ...chromedp.Action[chromedp.Void]) {
	b.Helper()
	b.call(func() error { return chromedp.Do(b.ctx, actions...) })
}

// dark chooses the colour scheme the pages are asked for.
func (b tab) dark(dark bool) {
	b.Helper()
	scheme := "light"
	if dark {
		scheme = "dark"
	}
	b.call(func() error {
		_, err := chromedp.Call(b.ctx, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{
			Features: []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: scheme}}})
		return err
	})
}

// read evaluates an expression in the page.
func read[T any](b tab, expression string, options ...chromedp.EvaluateOption) T {
	b.Helper()
	v, err := chromedp.Run(b.ctx, chromedp.Evaluate[T](expression, options...))
	if err != nil {
		b.Fatalf("%s: %v", expression, err)
	}
	return v
}

// text returns the text of the first element a selector finds. It works with
// JavaScript off, too, because it asks the browser and not the page.
func (b tab) text(selector string) string {
	b.Helper()
	v, err := chromedp.Run(b.ctx, chromedp.TextContent(chromedp.CSS(selector)))
	if err != nil {
		b.Fatalf("text of %s: %v", selector, err)
	}
	return v
}

// violations runs axe over the page that is open and returns what it objects to.
func (b tab) violations() []string {
	b.Helper()
	read[chromedp.Void](b, axe)
	return read[[]string](b, `axe.run().then(r => r.violations.map(v =>
		v.id + ": " + v.help + " at " + v.nodes.map(n => n.target.join(" ")).join(", ")))`, chromedp.EvalAwaitPromise)
}

// until waits for the text of an element to hold a piece.
func until(selector, piece string) chromedp.Action[chromedp.Void] {
	return chromedp.Poll[chromedp.Void](fmt.Sprintf(`document.querySelector(%q)?.textContent.includes(%q)`, selector, piece))
}

// A look is a width and a colour scheme a page is seen in.
type look struct {
	name          string
	width, height int64
	dark          bool
}

var looks = []look{
	{"wide-light", 1280, 900, false},
	{"wide-dark", 1280, 900, true},
	{"narrow-light", 390, 844, false},
	{"narrow-dark", 390, 844, true},
}

func (b tab) look(l look) {
	b.Helper()
	b.dark(l.dark)
	b.do(chromedp.EmulateViewport(l.width, l.height))
}

// ask types a value into a field and submits its form. With JavaScript the
// part of the page that changes is exchanged, and done says when; without it
// the browser loads the page anew.
func (b tab) ask(field, value string, done chromedp.Action[chromedp.Void]) {
	b.Helper()
	b.do(chromedp.SetValue(chromedp.CSS(field), value))
	click := chromedp.Click(chromedp.CSS("form.set button.go"))
	if b.scripts {
		b.do(click, done)
		return
	}
	b.call(func() error {
		_, err := chromedp.RunResponse(b.ctx, click)
		return err
	})
	b.do(done)
}

// attribute returns an attribute of the first element a selector finds.
func (b tab) attribute(selector, name string) string {
	b.Helper()
	return read[string](b, fmt.Sprintf(`document.querySelector(%q)?.getAttribute(%q) ?? ""`, selector, name))
}

// photograph writes pictures of the page that is open into the folder that
// STILLROOM_SCREENSHOTS names, for people to look at: all of it, and what fits
// the window. Without the folder it does nothing.
func (b tab) photograph(page string, l look) {
	b.Helper()
	dir := os.Getenv("STILLROOM_SCREENSHOTS")
	if dir == "" {
		return
	}
	const lossless = 100
	name := strings.Trim(strings.NewReplacer("/", "-", "?", "-", "=", "-").Replace(page), "-") + "-" + l.name
	for ending, take := range map[string]chromedp.Action[[]byte]{
		"":        chromedp.FullScreenshot(lossless),
		"-window": chromedp.CaptureScreenshot(),
	} {
		png, err := chromedp.Run(b.ctx, take)
		if err != nil {
			b.Fatal(err)
		}
		b.call(func() error { return os.WriteFile(filepath.Join(dir, name+ending+".png"), png, 0o644) })
	}
}

package main

import (
	"bytes"
	"fmt"
	"io"
	"net/http"
	"net/url"
	"slices"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"

	"stillroom/inventory"
)

// TestRunInBrowser does what a chemist does: opens a run, asks for more than
// the shelf holds, sees a short need, and opens the papers. It is done twice,
// with JavaScript and without.
func TestRunInBrowser(t *testing.T) {
	base := startDemo(t)
	for _, scripts := range []bool{true, false} {
		t.Run(fmt.Sprintf("scripts=%v", scripts), func(t *testing.T) {
			b := newTab(t, scripts)
			b.do(chromedp.Navigate(base + "/slate"))
			b.do(chromedp.Navigate(base + b.attribute(`a[href="/runs/1"]`, "href")))
			before := b.text(".gut span")
			b.ask("#wanted", "400 g", until("h1", "400"))
			if got := b.attribute("#verdict", "data-state"); got != "short" {
				t.Errorf("verdict of 400 g is %q, want short", got)
			}
			if n := read[int](b, `document.querySelectorAll('#needs tr[data-state="short"]').length`); n == 0 {
				t.Error("no need is marked short")
			}
			if after := b.text(".gut span"); after == before {
				t.Errorf("the plan's revision stayed %q although the target changed", after)
			}
			if scripts {
				if at := read[string](b, `document.activeElement.id`); at != "verdict" {
					t.Errorf("after the swap the focus is on %q, want the verdict", at)
				}
			}
			for _, paper := range []string{"pick-list.pdf", "hazard-sheet.pdf", "requisition.pdf"} {
				wantPDF(t, base, b.attribute(fmt.Sprintf("a[href*=%q]", paper), "href"))
			}
			refuses(t, b)
		})
	}
}

// refuses types what isn't a mass and wants the form back with the fault beside it.
func refuses(t *testing.T, b tab) {
	t.Helper()
	b.ask("#wanted", "1,234 g", until("#wanted-fault", "1,234"))
	if typed := read[string](b, `document.querySelector("#wanted").value`); typed != "1,234 g" {
		t.Errorf("the form came back with %q, want what was typed", typed)
	}
	if title := read[string](b, `document.title`); !strings.HasPrefix(title, "Error:") {
		t.Errorf("title %q doesn't begin with Error:", title)
	}
}

// pages are all that a person can open in the demonstration lab.
var pages = []string{"/slate", "/runs/new", "/runs/1", "/runs/1/answers", "/runs/1/promise", "/runs/1/explain/scale", "/runs/1/explain/chance", "/runs/1/explain/waste-1",
	"/runs/1/steps/4", "/runs/1/chance", "/runs/1/hazards", "/shelf/import", "/shelf/bottles/BG9SH1",
	"/shelf", "/shelf?find=acid", "/recipes", "/recipes/pentanoic-acid-dichromate", "/recipes/pentanoic-acid-dichromate/edit",
	"/recipes/pentanoic-acid-dichromate/difference", "/recipes/new", "/shortfalls", "/buying", "/waste",
	"/shelf/receive", "/shelf/receive?what=acid", "/shelf/receive?order=1", "/shelf/stock-take", "/shelf/stock-take?scan=BOGUS", "/shelf/stock-take/BG9SH1",
	"/waste/" + inventory.MakeCode(inventory.CarboyCode, 2), "/reckoner", "/reckoner/dilute", "/nowhere", "/shelf?find=zzzz"}

// TestPagesAreAccessible runs axe over every page, wide and narrow, light and
// dark: WCAG 2.2 A and AA and its best practices.
func TestPagesAreAccessible(t *testing.T) {
	base := startDemo(t)
	b := newTab(t, true)
	for _, page := range pages {
		for _, look := range looks {
			b.look(look)
			b.do(chromedp.Navigate(base + page))
			b.photograph(page, look)
			for _, v := range b.violations() {
				t.Errorf("%s, %s: %s", page, look.name, v)
			}
			if over := read[int](b, `document.documentElement.scrollWidth - document.documentElement.clientWidth`); over > 0 {
				t.Errorf("%s, %s: the page is %d px wider than the window", page, look.name, over)
			}
		}
	}
}

// TestNothingComesFromElsewhere loads every page and wants every request to go
// to the lab itself, with nothing refused by the content security policy.
func TestNothingComesFromElsewhere(t *testing.T) {
	base := startDemo(t)
	b := newTab(t, true)
	for _, page := range pages {
		b.do(chromedp.Navigate(base + page))
		loaded := read[[]string](b, `performance.getEntriesByType("resource").map(e => e.name)`)
		loaded = slices.DeleteFunc(loaded, func(u string) bool { return strings.HasPrefix(u, base+"/") })
		if len(loaded) > 0 {
			t.Errorf("%s loads %v", page, loaded)
		}
		if inline := read[int](b, `document.querySelectorAll("script:not([src]), style, [style], [onclick]").length`); inline > 0 {
			t.Errorf("%s has %d inline scripts or styles", page, inline)
		}
	}
}

// wantPDF opens a paper the way the link on the page does.
func wantPDF(t *testing.T, base, href string) {
	t.Helper()
	page, err := url.Parse(base)
	if err != nil {
		t.Fatal(err)
	}
	address, err := page.Parse(href)
	if err != nil {
		t.Fatal(err)
	}
	answer, err := http.Get(address.String())
	if err != nil {
		t.Fatal(err)
	}
	defer answer.Body.Close()
	body, err := io.ReadAll(answer.Body)
	if err != nil {
		t.Fatal(err)
	}
	if answer.StatusCode != http.StatusOK || !bytes.HasPrefix(body, []byte("%PDF-")) {
		t.Errorf("%s: status %d, body begins %.20q, want a PDF", address, answer.StatusCode, body)
	}
}

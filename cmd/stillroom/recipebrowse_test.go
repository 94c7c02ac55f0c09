package main

import (
	"fmt"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
)

// TestRecipeInBrowser does what somebody does who changes a recipe: types a
// fault, is shown its place, mends it and saves a version. It is done twice,
// with JavaScript, where the check follows the typing, and without.
func TestRecipeInBrowser(t *testing.T) {
	for _, scripts := range []bool{true, false} {
		t.Run(fmt.Sprintf("scripts=%v", scripts), func(t *testing.T) {
			base := startDemo(t)
			b := newTab(t, scripts)
			b.do(chromedp.Navigate(base + "/recipes/pentyl-pentanoate/edit"))
			b.write("limiting:", "limitng:", scripts)
			b.do(until("#checked h2", "2 faults"))
			if !scripts {
				if at := read[string](b, `document.querySelector("#checked .places li:last-child a").hash`); read[int](b, fmt.Sprintf(`document.querySelectorAll(%q).length`, "code"+at)) != 1 {
					t.Errorf("the place %s leads to no line", at)
				}
			} else {
				b.do(chromedp.Click(chromedp.CSS("#checked .places li:last-child a")))
				chosen := read[string](b, `(f => f === document.activeElement ? f.value.slice(f.selectionStart, f.selectionEnd) : "")(document.querySelector("#text"))`)
				if !strings.HasPrefix(chosen, "limitng:") {
					t.Errorf("the place of the fault chooses %q in the text, want the key at fault", chosen)
				}
			}
			b.write("limitng:", "limiting:", scripts)
			b.do(until("#checked h2", "It balances"))
			b.fill("#why", "nothing but the number")
			b.fill("#who", "Rut Halvard")
			b.follow(`button[value="save"]`)
			b.do(until("#h-versions", "2"))
			if versions := b.text("section[aria-labelledby=h-versions]"); !strings.Contains(versions, "nothing but the number") {
				t.Errorf("the versions don't say why: %s", versions)
			}
			b.do(chromedp.Navigate(base + "/recipes/pentyl-pentanoate/difference"))
			if keys := read[int](b, `document.querySelectorAll("section[aria-labelledby=h-keys] tbody tr").length`); keys != 1 {
				t.Errorf("%d keys differ, want the version alone", keys)
			}
		})
	}
}

// write changes the text of the recipe as typing does, and asks for a check
// where nothing does so by itself.
func (b tab) write(old, instead string, scripts bool) {
	b.Helper()
	read[bool](b, fmt.Sprintf(`(f => {
		f.value = f.value.replace(%q, %q);
		f.dispatchEvent(new Event("input", {bubbles: true}));
		return true;
	})(document.querySelector("#text"))`, old, instead))
	if !scripts {
		b.follow(`button[value="check"]`)
	}
}

// follow clicks on what leads to another page and waits for it.
func (b tab) follow(selector string) {
	b.Helper()
	b.call(func() error {
		_, err := chromedp.RunResponse(b.ctx, chromedp.Click(chromedp.CSS(selector)))
		return err
	})
}

// fill puts a value into a field.
func (b tab) fill(selector, value string) {
	b.Helper()
	read[bool](b, fmt.Sprintf(`(document.querySelector(%q).value = %q) !== ""`, selector, value))
}

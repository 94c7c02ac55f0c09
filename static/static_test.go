package static

import (
	"net/http"
	"net/http/httptest"
	"regexp"
	"strings"
	"testing"
)

func get(address string) *httptest.ResponseRecorder {
	w := httptest.NewRecorder()
	Handler().ServeHTTP(w, httptest.NewRequest(http.MethodGet, address, nil))
	return w
}

func TestFilesAreServedForAYear(t *testing.T) {
	for name, kind := range map[string]string{
		"app.css": "text/css; charset=utf-8", "app.js": "text/javascript; charset=utf-8", "icon.svg": "image/svg+xml",
		"htmx/htmx.min.js": "text/javascript; charset=utf-8", "font/source-sans-3-latin-wght-normal.woff2": "font/woff2",
		"font/LICENSE": "text/plain; charset=utf-8", "htmx/LICENSE": "text/plain; charset=utf-8",
	} {
		address, ok := Address(name)
		if !ok {
			t.Errorf("%s has no address", name)
			continue
		}
		w := get(address)
		if w.Code != 200 || w.Header().Get("Content-Type") != kind || w.Body.Len() == 0 {
			t.Errorf("%s = %d, %s, %d bytes", address, w.Code, w.Header().Get("Content-Type"), w.Body.Len())
		}
		if !strings.Contains(w.Header().Get("Cache-Control"), "immutable") {
			t.Errorf("%s: Cache-Control %q", address, w.Header().Get("Cache-Control"))
		}
	}
}

// A name without its fingerprint isn't an address: nothing may be kept for a
// year under an address that could come to mean something else.
func TestNamesAreNoAddresses(t *testing.T) {
	for _, address := range []string{Root + "app.css", Root, Root + "../static.go", Root + "app.000000000000.css"} {
		if w := get(address); w.Code != http.StatusNotFound {
			t.Errorf("%s = %d, want 404", address, w.Code)
		}
	}
	if _, ok := Address("nothing.css"); ok {
		t.Error("a file that isn't there has an address")
	}
}

// Whatever the style sheet names is there and is ours.
func TestStyleSheetNamesOnlyOurFiles(t *testing.T) {
	address, _ := Address("app.css")
	named := regexp.MustCompile(`url\(([^)]*)\)`).FindAllStringSubmatch(get(address).Body.String(), -1)
	if len(named) == 0 {
		t.Fatal("the style sheet names no typeface")
	}
	for _, m := range named {
		if w := get(m[1]); w.Code != 200 {
			t.Errorf("url(%s) = %d", m[1], w.Code)
		}
	}
}

// htmx says its version in its file; the one that is pinned is 2.0.11.
func TestHtmxIsTheOnePinned(t *testing.T) {
	text, err := Read("htmx/htmx.min.js")
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(string(text), `version:"2.0.11"`) {
		t.Error("htmx isn't version 2.0.11")
	}
}

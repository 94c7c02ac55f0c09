// Package static holds the files that pages load: htmx 2.0.11, the style
// sheet, a small script for the focus, the typeface and the icon, with the
// licences of what isn't ours. They are part of the program, so that nothing is
// ever loaded from elsewhere.
//
// Every file has an address that carries a fingerprint of its content, and may
// therefore be kept by a browser for a year; a changed file has a new address.
package static

import (
	"bytes"
	"crypto/sha256"
	"embed"
	"encoding/hex"
	"io/fs"
	"net/http"
	"path"
	"strings"
	"sync"
	"time"
)

// Root is the path under which Handler serves the files.
const Root = "/static/"

//go:embed app.css app.js icon.svg htmx/* font/* font/*.ttf
var files embed.FS

// A file is what is sent for one address.
type file struct {
	name    string
	content []byte
	kind    string
}

// table is every file under its address without Root, and the address of every
// name.
type table struct {
	byAddress map[string]file
	addresses map[string]string
}

var index = sync.OnceValue(func() table {
	t := table{byAddress: map[string]file{}, addresses: map[string]string{}}
	for _, name := range names("font", "htmx", ".") {
		content, err := files.ReadFile(name)
		if err != nil {
			panic("static: embedded file can't be read: " + err.Error())
		}
		if strings.HasSuffix(name, ".css") {
			content = t.addressed(content)
		}
		t.add(name, content)
	}
	return t
})

// names lists the files of the folders in the order given: what a style sheet
// names comes before the style sheet.
func names(folders ...string) []string {
	var all []string
	for _, folder := range folders {
		entries, err := files.ReadDir(folder)
		if err != nil {
			panic("static: embedded folder can't be read: " + err.Error())
		}
		for _, e := range entries {
			if !e.IsDir() {
				all = append(all, path.Join(folder, e.Name()))
			}
		}
	}
	return all
}

// add enters a file under the address made of its name and its fingerprint.
func (t table) add(name string, content []byte) {
	sum := sha256.Sum256(content)
	ext := path.Ext(name)
	address := strings.TrimSuffix(name, ext) + "." + hex.EncodeToString(sum[:6]) + ext
	t.byAddress[address] = file{name: path.Base(name), content: content, kind: kindOf(ext)}
	t.addresses[name] = Root + address
}

// addressed puts the addresses of the files a style sheet names in place of
// their names.
func (t table) addressed(css []byte) []byte {
	for name, address := range t.addresses {
		css = bytes.ReplaceAll(css, []byte("url("+name+")"), []byte("url("+address+")"))
	}
	return css
}

func kindOf(ext string) string {
	switch ext {
	case ".css":
		return "text/css; charset=utf-8"
	case ".js":
		return "text/javascript; charset=utf-8"
	case ".svg":
		return "image/svg+xml"
	case ".woff2":
		return "font/woff2"
	}
	return "text/plain; charset=utf-8" // the licences
}

// Address returns the address of an embedded file, such as "app.css", with the
// fingerprint of its content. It reports false if there is no such file.
func Address(name string) (string, bool) {
	a, ok := index().addresses[name]
	return a, ok
}

// Handler answers requests for the addresses that Address gives.
func Handler() http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		f, ok := index().byAddress[strings.TrimPrefix(r.URL.Path, Root)]
		if !ok {
			http.NotFound(w, r)
			return
		}
		h := w.Header()
		h.Set("Content-Type", f.kind)
		h.Set("Cache-Control", "public, max-age=31536000, immutable")
		http.ServeContent(w, r, f.name, time.Time{}, bytes.NewReader(f.content))
	})
}

// Read returns an embedded file by its name, such as
// "font/source-sans-3-latin-wght-normal.woff2".
func Read(name string) ([]byte, error) { return fs.ReadFile(files, name) }

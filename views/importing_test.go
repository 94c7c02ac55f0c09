package views

import (
	"bytes"
	"mime/multipart"
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"
)

// send posts a form of several parts; a field "list" is sent as a file.
func send(t testing.TB, s http.Handler, address string, fields ...string) *httptest.ResponseRecorder {
	t.Helper()
	var b bytes.Buffer
	form := multipart.NewWriter(&b)
	for i := 0; i+1 < len(fields); i += 2 {
		if fields[i] != "list" {
			form.WriteField(fields[i], fields[i+1])
			continue
		}
		f, err := form.CreateFormFile("list", "stock.csv")
		if err != nil {
			t.Fatal(err)
		}
		f.Write([]byte(fields[i+1]))
	}
	form.Close()
	r := httptest.NewRequest(http.MethodPost, address, &b)
	r.Header.Set("Content-Type", form.FormDataContentType())
	w := httptest.NewRecorder()
	s.ServeHTTP(w, r)
	return w
}

const stockList = "name,cas,size,place\n" +
	"toluene,108-88-3,1 L,Solvents\n" +
	"toluene,108-88-4,1 L,Solvents\n"

// A list is tried, taken and taken back; the wrong row is named by its line.
func TestImportPage(t *testing.T) {
	s := newSampleServer(t)
	bottles := func() string { return text(one(t, parse(t, get(t, s, "/shelf?find=toluene")), "#h-found span")) }
	before := bottles()

	tried := send(t, s, "/shelf/import", "who", "Ines", "do", "try", "list", stockList)
	doc := parse(t, tried)
	if got := text(one(t, doc, "h2.say")); tried.Code != 200 || !strings.HasPrefix(got, "1 of 2 rows can be taken") {
		t.Fatalf("trying = %d, %q", tried.Code, got)
	}
	if got := text(one(t, doc, "details tbody tr")); !strings.HasPrefix(got, "3 ") {
		t.Errorf("the row not taken reads %q, want line 3", got)
	}
	if after := bottles(); after != before {
		t.Errorf("trying changed the shelf: %s, then %s", before, after)
	}
	content, _ := attribute(one(t, doc, "input[name=content]"), "value")
	refused := send(t, s, "/shelf/import", "who", "Ines", "do", "refused", "name", "stock.csv", "content", content)
	if lines := strings.Split(strings.TrimSpace(refused.Body.String()), "\r\n"); len(lines) != 2 || !strings.Contains(lines[1], "108-88-4") {
		t.Errorf("the rows not taken are %q", lines)
	}
	if w := send(t, s, "/shelf/import", "who", "Ines", "key", "k", "do", "take", "name", "stock.csv", "content", content); w.Code != 200 {
		t.Fatalf("taking = %d", w.Code)
	}
	if after := bottles(); after == before {
		t.Error("taking changed nothing")
	}
	if w := post(t, s, "/shelf/import/1/undo", "who", "Ines"); w.Code != http.StatusSeeOther {
		t.Fatalf("taking back = %d", w.Code)
	}
	if after := bottles(); after != before {
		t.Errorf("after taking back: %s, want %s", after, before)
	}
}

func TestImportRefusals(t *testing.T) {
	s := newSampleServer(t)
	for _, tt := range []struct {
		name   string
		fields []string
	}{
		{"no file", []string{"who", "Ines", "do", "try"}},
		{"nobody", []string{"do", "try", "list", stockList}},
		{"no list", []string{"who", "Ines", "do", "try", "list", ""}},
		{"nothing we keep", []string{"who", "Ines", "do", "try", "list", "colour,mood\nred,glad\n"}},
		{"not base64", []string{"who", "Ines", "do", "try", "content", "%%%"}},
	} {
		if w := send(t, s, "/shelf/import", tt.fields...); w.Code != 422 || len(all(parse(t, w), ".faults li")) == 0 {
			t.Errorf("%s = %d, want 422 with what is wrong", tt.name, w.Code)
		}
	}
}

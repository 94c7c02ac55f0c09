package views

import "net/http"

// policy is the content security policy: everything comes from this server,
// nothing is written into a page as script or style, and no other page may
// frame ours.
const policy = "default-src 'none'; script-src 'self'; style-src 'self'; font-src 'self'; img-src 'self'; " +
	"connect-src 'self'; form-action 'self'; base-uri 'none'; frame-ancestors 'none'"

// secured sets the headers every answer carries and refuses posts that come
// from another site.
func secured(next http.Handler) http.Handler {
	guarded := http.NewCrossOriginProtection().Handler(next)
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		h := w.Header()
		h.Set("Content-Security-Policy", policy)
		h.Set("X-Content-Type-Options", "nosniff")
		h.Set("Referrer-Policy", "same-origin")
		h.Set("Cross-Origin-Opener-Policy", "same-origin")
		h.Set("Cross-Origin-Resource-Policy", "same-origin")
		h.Add("Vary", "HX-Request")
		h.Add("Vary", "HX-Target")
		// Stock changes by the minute and is nobody else's business; the files
		// under /static/ say otherwise for themselves.
		h.Set("Cache-Control", "no-store")
		guarded.ServeHTTP(w, r)
	})
}

package web

import (
	"errors"
	"fmt"
	"io"
	"mime"
	"net"
	"net/http"
	"net/url"
	"os"
	"path"
	"strings"
)

// policy lets a page use what this server itself sends, and nothing else.
const policy = "default-src 'none'; img-src 'self'; style-src 'self'; script-src 'self'; connect-src 'self'; " +
	"form-action 'self'; base-uri 'none'; frame-ancestors 'none'"

// headers stand on every answer. There is no Strict-Transport-Security: it would
// bar a browser from accepting a certificate that was made on this machine.
func headers(h http.Header) {
	h.Set("Content-Security-Policy", policy)
	h.Set("X-Content-Type-Options", "nosniff")
	h.Set("X-Frame-Options", "DENY")
	// same-origin, for under no-referrer a browser sends "null" as the Origin of a form.
	h.Set("Referrer-Policy", "same-origin")
	h.Set("Cross-Origin-Opener-Policy", "same-origin")
	h.Set("Cross-Origin-Resource-Policy", "same-origin")
	h.Set("Permissions-Policy", "camera=(), geolocation=(), microphone=()")
	h.Set("Cache-Control", "no-store")
}

// ServeHTTP checks a request, step by step, and answers it.
func (s *Server) ServeHTTP(w http.ResponseWriter, r *http.Request) {
	headers(w.Header())
	v := &visit{server: s, w: w, r: r}
	defer func() {
		// What panicked is for the log alone. Pages are written in one piece, so
		// nothing of one is out yet.
		if x := recover(); x != nil {
			s.record(fmt.Sprintf("panic %s %s: %.200q", r.Method, r.URL.EscapedPath(), fmt.Sprint(x)))
			v.fail(errPanic)
		}
		if r.Method == http.MethodPost {
			s.record(fmt.Sprintf("POST %s %d operator=%q", r.URL.EscapedPath(), v.status, v.operator()))
		}
	}()
	if err := s.admit(v); err != nil {
		v.fail(err)
		return
	}
	if _, pattern := s.mux.Handler(r); pattern == "" {
		v.fail(s.unrouted(w, r))
		return
	}
	s.mux.ServeHTTP(w, r.WithContext(withVisit(r.Context(), v)))
}

// admit refuses what did not come from a page of this server, or from a person.
func (s *Server) admit(v *visit) error {
	r := v.r
	local, _ := r.Context().Value(http.LocalAddrContextKey).(net.Addr)
	if !s.hosts.allow(r.Host, local) {
		v.bare = true
		return &Refused{
			Status: http.StatusMisdirectedRequest, Text: fmt.Sprintf("read the host name %.80q, which is not one of this server", r.Host),
			Hint: "open it by its address, or start the server with this name",
		}
	}
	if p := r.URL.Path; p == "" || p != path.Clean(p) {
		return notFound(r)
	}
	// Sec-Fetch-Site is sent by the browser, not by the page. Another site may not
	// use anything here, not even a link: the cookie would not come with it.
	switch r.Header.Get("Sec-Fetch-Site") {
	case "", "same-origin", "none":
	default:
		if r.Method == http.MethodGet && r.Header.Get("Sec-Fetch-Mode") == "navigate" {
			v.again = r.URL.RequestURI()
		}
		return &Refused{Status: http.StatusForbidden, Text: "another site asked for this page", Hint: "open it from here"}
	}
	if r.Method != http.MethodPost {
		return nil
	}
	if err := s.sameOrigin(r); err != nil {
		return err
	}
	if kind, _, err := mime.ParseMediaType(r.Header.Get("Content-Type")); err != nil || kind != "application/x-www-form-urlencoded" {
		return &Refused{Status: http.StatusUnsupportedMediaType, Text: fmt.Sprintf("read a body of type %.60q, wanted a form", r.Header.Get("Content-Type"))}
	}
	form, err := s.body(v)
	v.form = form
	return err
}

// sameOrigin checks where a form was sent from. A browser says so in at least one
// of two headers.
func (s *Server) sameOrigin(r *http.Request) error {
	scheme := "http"
	if s.cfg.TLS {
		scheme = "https"
	}
	origin, sent := r.Header["Origin"]
	switch {
	case len(origin) == 1 && strings.EqualFold(origin[0], scheme+"://"+r.Host):
		return nil
	case !sent && r.Header.Get("Sec-Fetch-Site") == "same-origin":
		return nil
	}
	return &Refused{Status: http.StatusForbidden, Text: "the form did not come from a page of this server", Hint: "open the page here and type it again"}
}

// body reads the form of a request.
func (s *Server) body(v *visit) (values, error) {
	most := s.cfg.Limits.Body
	tooLarge := &Refused{Status: http.StatusRequestEntityTooLarge, Text: fmt.Sprintf("the form is larger than %d bytes", most)}
	if v.r.ContentLength > most {
		return nil, tooLarge
	}
	raw, err := io.ReadAll(http.MaxBytesReader(v.w, v.r.Body, most))
	var over *http.MaxBytesError
	switch {
	case errors.As(err, &over):
		return nil, tooLarge
	case errors.Is(err, os.ErrDeadlineExceeded):
		return nil, &Refused{Status: http.StatusRequestTimeout, Text: "the form came too slowly", Hint: "send it again"}
	case err != nil:
		return nil, badForm("the form broke off")
	}
	return parseForm(string(raw))
}

// unrouted is the error for a path or a method that no page has. The mux knows
// which methods a path has.
func (s *Server) unrouted(w http.ResponseWriter, r *http.Request) error {
	mute := mute{header: http.Header{}}
	s.mux.ServeHTTP(&mute, r)
	if mute.status != http.StatusMethodNotAllowed {
		return notFound(r)
	}
	allow := mute.header.Get("Allow")
	w.Header().Set("Allow", allow)
	return &Refused{Status: http.StatusMethodNotAllowed, Text: fmt.Sprintf("read the method %.20q, wanted %s", r.Method, allow)}
}

func notFound(r *http.Request) error {
	shown := r.URL.Path
	if u, err := url.PathUnescape(shown); err == nil {
		shown = u
	}
	return &Refused{Status: http.StatusNotFound, Text: fmt.Sprintf("no page at %.80q", shown)}
}

// mute keeps the status and the header of an answer that nobody reads.
type mute struct {
	header http.Header
	status int
}

func (m *mute) Header() http.Header         { return m.header }
func (m *mute) Write(p []byte) (int, error) { return len(p), nil }
func (m *mute) WriteHeader(status int)      { m.status = status }

package web

import (
	"bytes"
	"context"
	"errors"
	"net/http"
	"net/url"
	"strings"
)

// visit is one request on its way through the checks to its page.
type visit struct {
	server  *Server
	w       http.ResponseWriter
	r       *http.Request
	form    values
	session *session // nil where none is needed
	status  int
	bare    bool   // an error page without links: this server is not what was asked for
	again   string // the path that an error page leads to
}

type visitKey struct{}

func withVisit(ctx context.Context, v *visit) context.Context {
	return context.WithValue(ctx, visitKey{}, v)
}

// door says who may come in, and how.
type door int

const (
	anyone door = iota // no session
	member             // who has logged in, if that is asked for
	guest              // the same, before logging in
	part               // a piece of a page: no session is begun for it
)

// routes are all paths. Everything else is not found.
func (s *Server) routes() {
	for pattern, page := range map[string]struct {
		door door
		show func(*visit) error
	}{
		"GET /{$}":                  {member, s.showBoard},
		"GET /batch/{id}":           {member, s.showBatch},
		"GET /batch/{id}/readback":  {part, s.showReadback},
		"GET /batch/{id}/curve.svg": {part, s.showCurve("svg", "image/svg+xml")},
		"GET /batch/{id}/curve.png": {part, s.showCurve("png", "image/png")},
		"POST /batch/{id}/reading":  {member, s.judge},
		"POST /batch/{id}/store":    {member, s.store},
		"GET /batch/{id}/undo":      {member, s.showUndo},
		"POST /batch/{id}/undo":     {member, s.undo},
		"GET /bench":                {member, s.showBench},
		"GET /static/{file}":        {anyone, s.showStatic},
	} {
		s.handle(pattern, page.door, page.show)
	}
	if s.cfg.Passphrase != nil {
		s.handle("GET /login", guest, s.showLogin)
		s.handle("POST /login", guest, s.login)
		s.handle("POST /logout", member, s.logout)
	}
}

func (s *Server) handle(pattern string, at door, show func(*visit) error) {
	s.mux.HandleFunc(pattern, func(_ http.ResponseWriter, r *http.Request) {
		v := r.Context().Value(visitKey{}).(*visit)
		v.r = r // with the wildcards of the path
		moved, err := v.enter(at)
		if err == nil && !moved {
			err = show(v)
		}
		if err != nil {
			v.fail(err)
		}
	})
}

// errSession is a form whose session is over or was never there.
var errSession = &Refused{Status: http.StatusForbidden, Text: "this form is no longer good: it is too old, or did not come from a page of this server", Hint: "open the page anew and type it again"}

// enter finds or begins the session, and checks the token of a form. moved says
// that the answer is a way to the log-in.
func (v *visit) enter(at door) (moved bool, err error) {
	if at == anyone {
		return false, nil
	}
	s := v.server
	v.session = s.sessions.of(v.r)
	asked := s.cfg.Passphrase != nil
	in := v.session != nil && v.session.member
	post := v.r.Method == http.MethodPost
	switch {
	case post:
		if v.session == nil || at == member && !in || !v.session.holds(v.form["token"]) {
			if id, err := v.id(); err == nil {
				v.again = batchPath(id, "")
			}
			return false, errSession
		}
	case at == part:
		if asked && !in {
			return false, &Refused{Status: http.StatusForbidden, Text: "not logged in", Hint: "open the page anew"}
		}
	case at == member && asked && !in:
		v.redirect("/login?" + url.Values{"next": {v.r.URL.RequestURI()}}.Encode())
		return true, nil
	case v.session == nil:
		v.session, err = s.sessions.start(v.w, v.r, "", !asked)
	}
	return false, err
}

// operator is who is at the page, "" when not known.
func (v *visit) operator() string {
	if v.session == nil {
		return ""
	}
	return v.session.name()
}

// id is the batch in the path.
func (v *visit) id() (string, error) {
	id := v.r.PathValue("id")
	if clean, err := cleanValue(id); err != nil || clean != id || len(id) > maxValue {
		return "", notFound(v.r)
	}
	return id, nil
}

// query is what was asked in the URL.
func (v *visit) query() (values, error) { return parseForm(v.r.URL.RawQuery) }

// redirect sends the browser elsewhere, with GET.
func (v *visit) redirect(to string) {
	v.w.Header().Set("Location", to)
	v.status = http.StatusSeeOther
	v.w.WriteHeader(v.status)
}

// batchPath is the path of a batch's page, or of what lies below it.
func batchPath(id, below string) string { return "/batch/" + url.PathEscape(id) + below }

// localPath is a path of this server, else "/": a form may not send anybody to
// another host.
func localPath(to string) string {
	u, err := url.Parse(to)
	if err != nil || u.Scheme != "" || u.Host != "" || u.User != nil || !strings.HasPrefix(u.Path, "/") ||
		strings.HasPrefix(to, "//") || strings.ContainsAny(to, "\\\r\n\t") {
		return "/"
	}
	return u.RequestURI()
}

// show writes a page in one piece.
func (v *visit) show(status int, name string, p page) error {
	if v.session != nil {
		p.Token, p.Operator = v.session.token, v.session.name()
		p.LogOut = v.server.cfg.Passphrase != nil && v.session.member
	}
	asked := v.server.cfg.Passphrase != nil
	p.Bar = !v.bare && !(asked && v.session != nil && !v.session.member)
	var b bytes.Buffer
	if err := render(&b, name, p); err != nil {
		return err
	}
	v.send(status, "text/html; charset=utf-8", b.Bytes())
	return nil
}

func (v *visit) send(status int, kind string, body []byte) {
	v.w.Header().Set("Content-Type", kind)
	v.status = status
	v.w.WriteHeader(status)
	// A browser that has gone away is no failure of the server.
	_, _ = v.w.Write(body)
}

// refused is an error as it may be shown: its own words if it is a *Refused, else
// that something failed here.
func refused(err error) *Refused {
	var r *Refused
	if errors.As(err, &r) {
		shown := *r
		if shown.Status == 0 {
			shown.Status = http.StatusUnprocessableEntity
		}
		if shown.Status < 400 || shown.Status > 599 {
			shown.Status = http.StatusInternalServerError
		}
		return &shown
	}
	return &Refused{Status: http.StatusInternalServerError, Text: "something failed here, and it was not what you typed", Hint: "look at the batch before you type it again"}
}

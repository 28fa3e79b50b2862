package web

import (
	"fmt"
	"math"
	"net/http"
	"strconv"
	"time"
)

type loginPage struct {
	Name    string
	Next    string
	Token   string
	Problem *problem
	Least   int
}

var loginFields = []string{"operator", "passphrase"}

// showLogin asks who comes in.
func (s *Server) showLogin(v *visit) error {
	asked, err := v.query()
	if err != nil {
		return err
	}
	next := localPath(asked["next"])
	if v.session.member {
		v.redirect(next)
		return nil
	}
	return v.login(http.StatusOK, loginPage{Next: next})
}

func (v *visit) login(status int, p loginPage) error {
	p.Token = v.session.token
	title := "Log in"
	if p.Problem != nil {
		title = "Not logged in"
	}
	return v.show(status, "login", page{Title: title, Main: p})
}

// login lets in whoever has the passphrase, under the name given. The session gets
// a new id, so that one which was known before is worth nothing.
func (s *Server) login(v *visit) error {
	p := loginPage{Name: v.form["operator"], Next: localPath(v.form["next"])}
	if wait, ok := s.throttle.take(v.r.RemoteAddr); !ok {
		seconds := int(math.Ceil(wait.Seconds()))
		v.w.Header().Set("Retry-After", strconv.Itoa(seconds))
		p.Problem = &problem{"too many attempts", fmt.Sprintf("try again in %v", time.Duration(seconds)*time.Second), "passphrase"}
		return v.login(http.StatusTooManyRequests, p)
	}
	err := v.form.check([]string{"operator"}, map[string]string{"operator": "type your name: it stands with what you store"})
	if err == nil {
		err = s.verify(v)
	}
	if err != nil {
		wrong, status := problemOf(err, loginFields...)
		p.Problem = wrong
		return v.login(status, p)
	}
	s.throttle.forgive(v.r.RemoteAddr)
	if v.session, err = s.sessions.start(v.w, v.r, p.Name, true); err != nil {
		return err
	}
	v.redirect(p.Next)
	return nil
}

// verify compares the passphrase. One hash is computed at a time: it takes 64 MiB.
func (s *Server) verify(v *visit) error {
	select {
	case s.hashing <- struct{}{}:
		defer func() { <-s.hashing }()
	case <-v.r.Context().Done():
		return &Refused{Status: http.StatusServiceUnavailable, Text: "others are logging in", Hint: "try again"}
	}
	if !s.cfg.Passphrase.Verify([]byte(v.form["passphrase"])) {
		return &Refused{Text: "that is not the passphrase", Hint: fmt.Sprintf("it has at least %d characters; capitals count", MinPassphrase), Field: "passphrase"}
	}
	return nil
}

// logout ends the session.
func (s *Server) logout(v *visit) error {
	s.sessions.end(v.w, v.r)
	v.session = nil
	v.redirect("/login")
	return nil
}

package web

import (
	"crypto/sha256"
	"crypto/subtle"
	"encoding/base64"
	"fmt"
	"io"
	"net/http"
	"sync"
	"time"
)

// session is one browser. Its cookie holds 256 random bits that mean nothing.
type session struct {
	token   string // of its forms that may be sent more than once
	created time.Time
	member  bool // has given the passphrase, or none is asked for

	mu       sync.Mutex
	seen     time.Time
	operator string
	tickets  tickets
}

// name is the operator, "" when not known.
func (s *session) name() string {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.operator
}

func (s *session) rename(operator string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.operator = operator
}

// holds reports whether token is the session's own.
func (s *session) holds(token string) bool {
	return subtle.ConstantTimeCompare([]byte(token), []byte(s.token)) == 1
}

// sessions holds those that are open, by the digest of their id, so that neither a
// dump of it nor the time of a look-up gives an id away.
type sessions struct {
	limits Limits
	now    func() time.Time
	rand   io.Reader
	secure bool // over TLS alone

	mu   sync.Mutex
	open map[[sha256.Size]byte]*session
}

func newSessions(cfg Config) *sessions {
	return &sessions{limits: cfg.Limits, now: cfg.Now, rand: cfg.Rand, secure: cfg.TLS, open: map[[sha256.Size]byte]*session{}}
}

// cookieName says with its prefix, to a browser, that no other host or path may
// have set it.
func (t *sessions) cookieName() string {
	if t.secure {
		return "__Host-gylebook"
	}
	return "gylebook"
}

// of is the session of a request, nil if it has none. An id that is not known is
// never taken over.
func (t *sessions) of(r *http.Request) *session {
	now := t.now()
	t.mu.Lock()
	defer t.mu.Unlock()
	for _, c := range r.CookiesNamed(t.cookieName()) {
		key := sha256.Sum256([]byte(c.Value))
		s := t.open[key]
		if s == nil {
			continue
		}
		if t.over(s, now) {
			delete(t.open, key)
			continue
		}
		s.mu.Lock()
		s.seen = now
		s.mu.Unlock()
		return s
	}
	return nil
}

// over reports whether s has been idle too long or has lasted long enough.
func (t *sessions) over(s *session, now time.Time) bool {
	s.mu.Lock()
	defer s.mu.Unlock()
	return now.Sub(s.seen) > t.limits.Idle || now.Sub(s.created) > t.limits.Life
}

// start opens a session under a new id, sets its cookie and ends the one that the
// request came with.
func (t *sessions) start(w http.ResponseWriter, r *http.Request, operator string, member bool) (*session, error) {
	t.end(w, r)
	id, err := random(t.rand)
	if err != nil {
		return nil, err
	}
	token, err := random(t.rand)
	if err != nil {
		return nil, err
	}
	now := t.now()
	s := &session{token: token, created: now, seen: now, operator: operator, member: member}
	s.tickets.limits = t.limits
	t.mu.Lock()
	t.makeRoom(now)
	t.open[sha256.Sum256([]byte(id))] = s
	t.mu.Unlock()
	t.setCookie(w, id, 0)
	return s, nil
}

// end closes the session of a request, if there is one.
func (t *sessions) end(w http.ResponseWriter, r *http.Request) {
	t.mu.Lock()
	defer t.mu.Unlock()
	for _, c := range r.CookiesNamed(t.cookieName()) {
		delete(t.open, sha256.Sum256([]byte(c.Value)))
	}
	t.setCookie(w, "", -1)
}

func (t *sessions) setCookie(w http.ResponseWriter, value string, age int) {
	w.Header().Del("Set-Cookie") // one cookie, set once
	http.SetCookie(w, &http.Cookie{
		Name: t.cookieName(), Value: value, Path: "/", MaxAge: age,
		HttpOnly: true, SameSite: http.SameSiteStrictMode, Secure: t.secure,
	})
}

// makeRoom drops what is over and, when the table is full, the session that was
// seen longest ago, one that has not logged in before one that has: whoever asks for
// many sessions ends nobody else's. The caller holds the lock.
func (t *sessions) makeRoom(now time.Time) {
	if len(t.open) < t.limits.Sessions {
		return
	}
	var victim [sha256.Size]byte
	var last *session
	var lastSeen time.Time
	for key, s := range t.open {
		if t.over(s, now) {
			delete(t.open, key)
			continue
		}
		s.mu.Lock()
		seen := s.seen
		s.mu.Unlock()
		if last == nil || !s.member && last.member || s.member == last.member && seen.Before(lastSeen) {
			victim, last, lastSeen = key, s, seen
		}
	}
	if len(t.open) >= t.limits.Sessions {
		delete(t.open, victim)
	}
}

// random is 256 bits as text for a cookie or a form.
func random(from io.Reader) (string, error) {
	b := make([]byte, 32)
	if _, err := io.ReadFull(from, b); err != nil {
		return "", fmt.Errorf("random bytes: %w", err)
	}
	return base64.RawURLEncoding.EncodeToString(b), nil
}

package web

import (
	"crypto/rand"
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"
	"time"
)

func cookieOf(t *testing.T, w *httptest.ResponseRecorder) *http.Cookie {
	t.Helper()
	list := w.Result().Cookies()
	if len(list) != 1 {
		t.Fatalf("%d cookies, wanted one: %v", len(list), w.Header()["Set-Cookie"])
	}
	return list[0]
}

func TestCookie(t *testing.T) {
	c := cookieOf(t, newBrowser(t, newServer(t, &fakeDesk{})).get("/"))
	if c.Name != "gylebook" || !c.HttpOnly || c.SameSite != http.SameSiteStrictMode || c.Path != "/" || c.Domain != "" || c.MaxAge != 0 {
		t.Errorf("cookie %+v", c)
	}
	if len(c.Value) != 43 { // 256 bits in base64
		t.Errorf("id of %d characters", len(c.Value))
	}
	overTLS := newServer(t, &fakeDesk{}, func(c *Config) { c.TLS = true })
	c = cookieOf(t, newBrowser(t, overTLS).get("/"))
	// The browser keeps a __Host- cookie only with Secure, Path=/ and no Domain.
	if c.Name != "__Host-gylebook" || !c.Secure || !c.HttpOnly || c.SameSite != http.SameSiteStrictMode || c.Path != "/" || c.Domain != "" {
		t.Errorf("cookie %+v", c)
	}
}

// An id that this server has not given out is not taken over.
func TestSessionFixation(t *testing.T) {
	b := newBrowser(t, newServer(t, &fakeDesk{}))
	planted := strings.Repeat("A", 43)
	b.cookies["gylebook"] = planted
	if c := cookieOf(t, b.get("/")); c.Value == planted {
		t.Error("the planted id was taken")
	}
	// A second cookie of the same name, from another program on this machine, does
	// not end the session.
	r := httptest.NewRequest(http.MethodGet, "/", nil)
	r.Host = testHost
	r.Header.Set("Cookie", "gylebook="+planted+"; gylebook="+b.cookies["gylebook"])
	w := httptest.NewRecorder()
	b.s.ServeHTTP(w, r)
	if w.Header().Get("Set-Cookie") != "" {
		t.Error("a new session began")
	}
}

func TestSessionEnds(t *testing.T) {
	for _, c := range []struct {
		name  string
		steps []time.Duration
		lives bool
	}{
		{"in use", []time.Duration{11 * time.Hour, 11 * time.Hour, 11 * time.Hour}, true},
		{"idle", []time.Duration{12*time.Hour + time.Second}, false},
		{"in use for three days", []time.Duration{11 * time.Hour, 11 * time.Hour, 11 * time.Hour, 11 * time.Hour, 11 * time.Hour, 11 * time.Hour, 11 * time.Hour}, false},
	} {
		t.Run(c.name, func(t *testing.T) {
			clock := newClock()
			b := newBrowser(t, newServer(t, &fakeDesk{}, func(cfg *Config) { cfg.Now = clock.now }))
			b.get("/")
			first := b.cookies["gylebook"]
			for _, step := range c.steps {
				clock.pass(step)
				b.get("/")
			}
			if same := b.cookies["gylebook"] == first; same != c.lives {
				t.Errorf("the session is the same: %v, wanted %v", same, c.lives)
			}
		})
	}
}

// Whoever asks for many sessions ends nobody's who has logged in.
func TestSessionsAreBounded(t *testing.T) {
	clock := newClock()
	table := newSessions(Config{Limits: Limits{Sessions: 5, Idle: time.Hour, Life: time.Hour, Tickets: 1}, Now: clock.now, Rand: rand.Reader})
	begin := func(member bool) *http.Request {
		clock.pass(time.Second)
		w := httptest.NewRecorder()
		if _, err := table.start(w, httptest.NewRequest("GET", "/", nil), "", member); err != nil {
			t.Fatal(err)
		}
		r := httptest.NewRequest("GET", "/", nil)
		r.AddCookie(w.Result().Cookies()[0])
		return r
	}
	in := begin(true)
	for range 50 {
		begin(false)
	}
	if table.of(in) == nil {
		t.Error("the session that had logged in was ended")
	}
	for range 4 {
		in = begin(true)
	}
	if last := begin(true); table.of(last) == nil || table.of(in) == nil {
		t.Error("the newest sessions were ended")
	}
	if len(table.open) != 5 {
		t.Errorf("%d sessions, wanted at most 5", len(table.open))
	}
	clock.pass(2 * time.Hour)
	begin(false)
	if len(table.open) != 1 {
		t.Errorf("%d sessions, wanted those that are over gone", len(table.open))
	}
}

// Who reads is asked once.
func TestOperatorIsKept(t *testing.T) {
	b := newBrowser(t, newServer(t, &fakeDesk{}))
	wantStatus(t, b.get("/batch/B1"), 200, `<input id="operator"`)
	b.reading("1.016")
	wantStatus(t, b.get("/batch/B1"), 200, `maxlength="60" required value="ines"`)
	if w := newBrowser(t, b.s).get("/batch/B1"); strings.Contains(w.Body.String(), "ines") {
		t.Error("another browser knows the name")
	}
}

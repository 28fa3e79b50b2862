package web

import (
	"bytes"
	"crypto/rand"
	"net/http"
	"net/http/httptest"
	"net/url"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"
)

const secret = "four words of cellar"

// hashOnce saves the tests the time of a hash each.
var hashOnce = sync.OnceValues(func() (Hash, error) { return HashPassphrase([]byte(secret), rand.Reader) })

func withPassphrase(t *testing.T) func(*Config) {
	t.Helper()
	h, err := hashOnce()
	if err != nil {
		t.Fatal(err)
	}
	return func(c *Config) { c.Passphrase = &h }
}

// login logs in and returns the answer.
func (b *browser) login(name, passphrase, next string) *httptest.ResponseRecorder {
	b.t.Helper()
	fields := b.hidden(b.get("/login"), "/login")
	fields.Set("operator", name)
	fields.Set("passphrase", passphrase)
	fields.Set("next", next)
	return b.post("/login", fields)
}

func TestLogin(t *testing.T) {
	d := &fakeDesk{}
	var log bytes.Buffer
	s := newServer(t, d, withPassphrase(t), func(c *Config) { c.Log = &log })
	b := newBrowser(t, s)
	// Nothing of the cellar without it.
	for path, want := range map[string]int{
		"/": 303, "/batch/B1": 303, "/batch/B1/undo": 303, "/bench": 303, "/batch/B1/curve.svg": 403, "/batch/B1/readback?gravity=1&temp=1": 403, "/static/tank.css": 200,
	} {
		w := b.get(path)
		if w.Code != want || strings.Contains(w.Body.String(), "Lane Bitter") {
			t.Errorf("%s: status %d, wanted %d", path, w.Code, want)
		}
		checkHeaders(t, path, w)
	}
	if w := b.get("/batch/B1?gravity=1.016"); w.Header().Get("Location") != "/login?next=%2Fbatch%2FB1%3Fgravity%3D1.016" {
		t.Errorf("sent to %q", w.Header().Get("Location"))
	}
	before := b.hidden(b.get("/login"), "/login")
	wantStatus(t, b.post("/batch/B1/reading", before), 403)
	planted := b.cookies["gylebook"]

	wantStatus(t, b.login("ines", "four words of cellars", "/"), 422, "that is not the passphrase", `href="#passphrase"`)
	wantStatus(t, b.login("", secret, "/"), 422, `href="#operator"`)
	w := b.login("ines", secret, "/batch/B1?gravity=1.016")
	wantStatus(t, w, 303)
	if to := w.Header().Get("Location"); to != "/batch/B1?gravity=1.016" {
		t.Errorf("sent to %q after logging in", to)
	}
	// The id that was known before is worth nothing.
	if b.cookies["gylebook"] == planted {
		t.Error("the session kept its id")
	}
	known := httptest.NewRequest("GET", "/", nil)
	known.AddCookie(&http.Cookie{Name: "gylebook", Value: planted})
	if s.sessions.of(known) != nil {
		t.Error("the session before logging in goes on")
	}
	if w := newBrowser(t, s).login("ada", secret, "https://rebound.example/"); w.Header().Get("Location") != "/" {
		t.Errorf("sent to %q", w.Header().Get("Location"))
	}

	wantStatus(t, b.get("/"), 200, "ines", "Log out")
	if w := b.get("/batch/B1"); strings.Contains(w.Body.String(), `id="operator"`) {
		t.Error("the name is asked again")
	}
	// The name is that of the session, whatever a form says.
	_, fields := b.reading("1.016")
	fields.Set("operator", "mallory")
	wantStatus(t, b.post("/batch/B1/store", fields), 303)
	if d.logged[0].Operator != "ines" {
		t.Errorf("stored by %q", d.logged[0].Operator)
	}
	// Logging out wants the token too, and ends the session.
	wantStatus(t, b.post("/logout", url.Values{}), 403)
	old := b.cookies["gylebook"]
	wantStatus(t, b.post("/logout", b.hidden(b.get("/"), "/logout")), 303)
	b.cookies["gylebook"] = old
	wantStatus(t, b.get("/"), 303)

	if strings.Contains(log.String(), "four") || strings.Contains(log.String(), fields.Get("ticket")) || strings.Contains(log.String(), old) {
		t.Errorf("a secret in the log:\n%s", &log)
	}
	if want := "2026-11-18T12:00:00Z POST /batch/B1/store 303 operator=\"ines\"\n"; !strings.Contains(log.String(), want) {
		t.Errorf("wanted the line %q in the log:\n%s", want, &log)
	}
}

// After logging in nobody is sent to another host.
func TestNext(t *testing.T) {
	for to, want := range map[string]string{
		"/": "/", "/batch/B1?gravity=1": "/batch/B1?gravity=1", "": "/", "batch": "/",
		"https://rebound.example/": "/", "//rebound.example/": "/", `/\rebound.example`: "/", `\\rebound.example`: "/",
		"javascript:alert(1)": "/", "/\t/rebound.example": "/", "///rebound.example": "/", "/a\r\nSet-Cookie: x=y": "/",
	} {
		if got := localPath(to); got != want {
			t.Errorf("%q leads to %q, wanted %q", to, got, want)
		}
	}
}

func TestLoginRate(t *testing.T) {
	clock := newClock()
	s := newServer(t, &fakeDesk{}, withPassphrase(t), func(c *Config) { c.Now = clock.now })
	b := newBrowser(t, s)
	// Without a name no hash is computed, but the attempt counts.
	for range burstAddress {
		wantStatus(t, b.login("", "x", "/"), 422)
	}
	w := b.login("ines", secret, "/")
	wantStatus(t, w, 429, "too many attempts")
	wait, err := strconv.Atoi(w.Header().Get("Retry-After"))
	if err != nil || wait < 1 || wait > 60 {
		t.Errorf("Retry-After %q", w.Header().Get("Retry-After"))
	}
	checkHeaders(t, "too many", w)
	// Another address is not kept waiting.
	other := newBrowser(t, s)
	other.from = "127.0.0.2:50000"
	wantStatus(t, other.login("ada", secret, "/"), 303)
	clock.pass(time.Duration(wait) * time.Second)
	wantStatus(t, b.login("ines", secret, "/"), 303)
}

func TestThrottle(t *testing.T) {
	clock := newClock()
	s := newServer(t, &fakeDesk{}, func(c *Config) { c.Now = clock.now })
	took := 0
	for i := range 100 {
		if _, ok := s.throttle.take("192.0.2." + strconv.Itoa(i) + ":1"); ok {
			took++
		}
	}
	if took != burstAll {
		t.Errorf("%d attempts from 100 addresses at once, wanted %d", took, burstAll)
	}
	// One machine has a whole /64 of IPv6.
	took = 0
	clock.pass(24 * time.Hour)
	for i := range 10 {
		if _, ok := s.throttle.take("[2001:db8::" + strconv.Itoa(i) + "]:1"); ok {
			took++
		}
	}
	if took != burstAddress {
		t.Errorf("%d attempts from one network, wanted %d", took, burstAddress)
	}
	for i := range 10 * throttleEntries {
		clock.pass(everyAll)
		s.throttle.take("[2001:db8:" + strconv.FormatInt(int64(i%0x7fff), 16) + "::1]:1")
	}
	if len(s.throttle.each) > throttleEntries+1 {
		t.Errorf("%d addresses kept, wanted at most %d", len(s.throttle.each), throttleEntries+1)
	}
}
